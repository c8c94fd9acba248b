//! How values hang together: what feeds one, with numbers, and what it moves.

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_present::escape;
use layshaft_present::sheet;
use layshaft_semantics::index::{Reference, Target};
use layshaft_syntax::{Item, ItemKind};

use crate::hover::{entries, verdict};
use crate::symbols::SymbolKind;
use crate::{Snapshot, numbers};

/// A value, field, part, drive or criterion in the hierarchy. It is known by `place`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Node {
    /// `motor.stall_torque`
    pub name: String,
    /// What it comes to: `1622.5 kg`, `holds`.
    pub detail: String,
    /// What it is.
    pub kind: SymbolKind,
    /// Its name in the text.
    pub place: FileSpan,
    /// The whole of it.
    pub whole: FileSpan,
}

/// A step along the hierarchy.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Call {
    /// The other end.
    pub node: Node,
    /// The names that make the step.
    pub places: Vec<FileSpan>,
}

/// The node at a place: that of the name there, else of the criterion whose clause stands there.
#[must_use]
pub fn prepare(snapshot: &Snapshot, file: FileId, offset: u32) -> Option<Node> {
    if let Some(name) = snapshot.reference(file, offset) {
        return node_of(snapshot, &name.target);
    }
    let item = snapshot.item(file, offset)?;
    matches!(item.tree.kind, ItemKind::Require { .. }).then(|| node_of_item(snapshot, file, item)).flatten()
}

/// What feeds a node, in the order of the text.
#[must_use]
pub fn outgoing(snapshot: &Snapshot, place: FileSpan) -> Vec<Call> {
    let Some(region) = region(snapshot, place) else { return Vec::new() };
    let mut calls: Vec<Call> = Vec::new();
    for name in snapshot.names_in(region) {
        // The fields of a part feed it; the names in their values feed the fields.
        let own = matches!(&name.target, Target::Field(owner, _) if *owner == place && name.declares);
        if (name.declares && !own) || name.place == place {
            continue;
        }
        let of_field = entry_of(snapshot, name).is_some_and(|entry| entry != name.place && entry != place);
        if of_field && !own && is_part(snapshot, place) {
            continue;
        }
        if let Some(node) = node_of(snapshot, &name.target).filter(|node| node.place != place) {
            push(&mut calls, node, name.place);
        }
    }
    calls
}

/// What a node moves, in the order of the texts.
#[must_use]
pub fn incoming(snapshot: &Snapshot, place: FileSpan) -> Vec<Call> {
    let Some(name) = snapshot.reference(place.file, place.span.start) else { return Vec::new() };
    let mut calls = Vec::new();
    if let Target::Field(owner, _) = &name.target
        && let Some(node) =
            node_of(snapshot, &Target::Part(*owner)).or_else(|| node_of(snapshot, &Target::Drive(*owner)))
    {
        push(&mut calls, node, place);
    }
    for other in snapshot.index.of_target(&name.target) {
        if other.declares || other.place == place {
            continue;
        }
        let Some(item) = snapshot.item(other.place.file, other.place.span.start) else { continue };
        let field = entry_of(snapshot, other).filter(|entry| *entry != other.place);
        let node = field
            .and_then(|entry| snapshot.reference(entry.file, entry.span.start))
            .and_then(|entry| node_of(snapshot, &entry.target))
            .or_else(|| node_of_item(snapshot, other.place.file, item));
        if let Some(node) = node.filter(|node| node.place != place) {
            push(&mut calls, node, other.place);
        }
    }
    calls
}

fn push(calls: &mut Vec<Call>, node: Node, place: FileSpan) {
    match calls.iter_mut().find(|call| call.node.place == node.place) {
        Some(call) => call.places.push(place),
        None => calls.push(Call { node, places: vec![place] }),
    }
}

fn is_part(snapshot: &Snapshot, place: FileSpan) -> bool {
    snapshot.part(place).is_some()
}

/// The key of the part's line that a name stands in.
fn entry_of(snapshot: &Snapshot, name: &Reference) -> Option<FileSpan> {
    let item = snapshot.item(name.place.file, name.place.span.start)?;
    if !matches!(item.tree.kind, ItemKind::Part { .. }) {
        return None;
    }
    let here = name.place.span.start.checked_sub(item.offset)?;
    let entry = entries(item).iter().find(|entry| entry.span.start <= here && here < entry.span.end)?;
    let last = entry.member.as_ref().map_or(entry.key.span, |member| member.span);
    let span = entry.key.span.cover(last).shifted(item.offset);
    Some(FileSpan { file: name.place.file, span })
}

/// The text in which the names stand that feed a node.
fn region(snapshot: &Snapshot, place: FileSpan) -> Option<FileSpan> {
    let item = snapshot.item(place.file, place.span.start)?;
    let at = |span: Span| FileSpan { file: place.file, span: span.shifted(item.offset) };
    let here = place.span.start.checked_sub(item.offset)?;
    Some(match &item.tree.kind {
        ItemKind::Let { value, .. } => at(value.span),
        ItemKind::Part { name, .. } if name.span.start != here => {
            let entry = entries(item).iter().find(|entry| entry.key.span.start == here)?;
            at(entry.value.span)
        }
        _ => at(item.tree.span),
    })
}

fn node_of(snapshot: &Snapshot, target: &Target) -> Option<Node> {
    let detail = || numbers::plain_text(snapshot, target).unwrap_or_default();
    match target {
        Target::Let(place) => {
            let value = snapshot.value(*place)?;
            Some(node(snapshot, &value.name, &detail(), SymbolKind::Value, *place))
        }
        Target::Part(place) => {
            let part = snapshot.part(*place)?;
            let kind = part.row.map_or("", |row| row.title);
            Some(node(snapshot, &part.name, kind, crate::symbols::kind_of_role(part.role), *place))
        }
        Target::Drive(place) => {
            let (index, drive) = snapshot.drive(*place)?;
            let sheet = sheet::drive(&snapshot.analysis, index, snapshot.habits(), 1)?;
            let told = sheet.rows.first().map(|row| format!("{} {}", row.outcome, row.speed.text()));
            let told = told.unwrap_or_default();
            Some(node(snapshot, &drive.name, told.trim(), SymbolKind::Drive, *place))
        }
        Target::Field(owner, name) => {
            let part = snapshot.part(*owner)?;
            let field = part.fields.iter().find(|field| field.name == *name)?;
            let name = format!("{}.{}", part.name, field.name);
            Some(node(snapshot, &name, &detail(), SymbolKind::Field, field.place))
        }
        Target::Result { part: Some(place), drive: None, .. } => node_of(snapshot, &Target::Part(*place)),
        _ => None,
    }
}

fn node_of_item(snapshot: &Snapshot, file: FileId, item: &Item) -> Option<Node> {
    let at = |span: Span| FileSpan { file, span: span.shifted(item.offset) };
    match &item.tree.kind {
        ItemKind::Let { name, .. } => node_of(snapshot, &Target::Let(at(name.span))),
        ItemKind::Part { name, .. } => node_of(snapshot, &Target::Part(at(name.span))),
        ItemKind::Drive { name, .. } => node_of(snapshot, &Target::Drive(at(name.span))),
        ItemKind::Case { name, .. } => Some(node(snapshot, &name.text, "", SymbolKind::Case, at(name.span))),
        ItemKind::Require { clause, .. } => {
            let whole = at(item.tree.span);
            let criteria = &snapshot.analysis.criteria;
            let index = criteria.binary_search_by(|criterion| criterion.place.cmp(&whole)).ok()?;
            let told = verdict(criteria.get(index)?.verdict);
            Some(node(snapshot, &clause.value, told, SymbolKind::Criterion, at(clause.span)))
        }
        _ => None,
    }
}

/// Names and details are plain text in a client; control characters are written out.
fn node(snapshot: &Snapshot, name: &str, detail: &str, kind: SymbolKind, place: FileSpan) -> Node {
    let item = snapshot.item(place.file, place.span.start);
    let whole = item.map_or(place.span, |item| match kind {
        SymbolKind::Field => {
            let here = place.span.start.saturating_sub(item.offset);
            let entry = entries(item).iter().find(|entry| entry.span.start <= here && here < entry.span.end);
            entry.map_or(place.span, |entry| entry.span.shifted(item.offset))
        }
        _ => item.tree.span.shifted(item.offset),
    });
    Node {
        name: escape::terminal(name).into_owned(),
        detail: escape::terminal(detail).into_owned(),
        kind,
        place,
        whole: FileSpan { file: place.file, span: whole },
    }
}

#[cfg(test)]
mod tests {
    use super::{Call, incoming, outgoing, prepare};
    use crate::fixture::Fixture;

    const SPEC: &str = "let load = 1250 kg
let block = 60 kg
let total = load + 2 * block + block
source motor: straight_line { stall_torque = total * standard_gravity * 1 mm; no_load_speed = 3000 rpm }
load fan: quadratic { rated_torque = 12 N·m; rated_speed = 600 rpm }
drive d = motor -> fan
case heavy { load = 2 * block }
require \"R1 slow\" d.motor.speed <= 300 rpm
";

    fn drawn(calls: &[Call]) -> Vec<String> {
        calls
            .iter()
            .map(|call| format!("{} {} ×{}", call.node.name, call.node.detail, call.places.len()))
            .collect()
    }

    fn both(cursor: &str) -> (Vec<String>, Vec<String>) {
        let plain = cursor.replace("$0", "");
        let fixture = Fixture::new(&SPEC.replacen(&plain, cursor, 1));
        let node = prepare(&fixture.snapshot, fixture.file, fixture.offset).expect("a node");
        (drawn(&outgoing(&fixture.snapshot, node.place)), drawn(&incoming(&fixture.snapshot, node.place)))
    }

    #[test]
    fn a_value_is_fed_and_moves() {
        let (feeds, moves) = both("let to$0tal");
        assert_eq!(feeds, ["load 1250 kg ×1", "block 60 kg ×2"]);
        assert_eq!(moves, ["motor.stall_torque 14.02 N·m ×1"]);
        let (_, moves) = both("let bl$0ock");
        assert_eq!(moves, ["total 1430 kg ×2", "heavy  ×1"]);
    }

    #[test]
    fn a_field_a_part_and_a_criterion() {
        let (feeds, moves) = both("stall$0_torque = total");
        assert_eq!(
            (feeds, moves),
            (vec!["total 1430 kg ×1".to_owned()], vec!["motor straight-line source ×1".to_owned()])
        );
        let (feeds, moves) = both("source mo$0tor");
        assert_eq!(feeds, ["motor.stall_torque 14.02 N·m ×1", "motor.no_load_speed 3000 rpm ×1"]);
        assert!(moves[0].starts_with("d runs up") && moves[1] == "R1 slow fails ×1", "{moves:?}");
        let (feeds, _) = both("\"R1 sl$0ow\"");
        assert_eq!(feeds.len(), 2, "{feeds:?}");
    }
}
