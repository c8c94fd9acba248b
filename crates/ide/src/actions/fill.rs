//! Writes the lines of fields that are missing, their values left to be given: never a number that nobody chose. Until
//! it is filled in, each line is told as an error of its own.

use layshaft_diagnostics::{Code, Edit, FileSpan, Span};
use layshaft_mechanics::registry::{self, Field, Role, Shape};
use layshaft_present::sheet::role_word;
use layshaft_semantics::say::column;
use layshaft_syntax::{Item, ItemKind};

use super::accept::into_block;
use super::{ActionKind, Claim, Offer, Place};

/// Lines for the fields that findings at the place ask for, one offer for each way to mend it.
pub(super) fn offers(place: &Place<'_>) -> Vec<Offer> {
    let mut offers = Vec::new();
    for (index, found) in place.findings() {
        if !matches!(found.code, Code::MissingField | Code::BrakingUnknown) {
            continue;
        }
        let Some(item) = place.item_of(found) else { continue };
        let only = found.fields.len() == 1;
        offers.extend(found.fields.iter().filter_map(|group| offer(place, item, index, group, only)));
    }
    offers
}

fn offer(place: &Place<'_>, item: &Item, index: usize, group: &[&'static str], only: bool) -> Option<Offer> {
    let lines: Vec<String> = group.iter().map(|name| line(place, item, name)).collect();
    if lines.is_empty() {
        return None;
    }
    let names: Vec<String> = group.iter().map(|name| format!("`{name}`")).collect();
    let block = match &item.tree.kind {
        ItemKind::Part { block, .. } => Some(block.span),
        ItemKind::Drive { block, .. } => block.as_ref().map(|block| block.span),
        _ => return None,
    };
    let edit = match block.filter(|span| span.end > span.start + 1) {
        Some(span) => into_block(place, item, span, &lines),
        None => {
            let end = place.of(item, item.tree.span).span.end;
            let text = format!(" {{\n    {}\n}}", lines.join("\n    "));
            Edit { place: FileSpan { file: place.file, span: Span::new(end, end) }, text }
        }
    };
    Some(Offer {
        title: format!("add {}", names.join(", ")),
        kind: ActionKind::Fix,
        edits: vec![edit],
        mends: Some(index),
        preferred: only,
        claim: Claim::ToFill,
    })
}

/// `stall_torque =  # N·m: torque at standstill`
fn line(place: &Place<'_>, item: &Item, name: &str) -> String {
    let Some(row) = row(place, item, name) else { return format!("{name} = ") };
    format!("{name} =  # {}: {}", wanted(row), row.meaning)
}

fn row(place: &Place<'_>, item: &Item, name: &str) -> Option<&'static Field> {
    let word = name.split(' ').next().unwrap_or(name);
    match &item.tree.kind {
        ItemKind::Part { name, .. } => {
            let part = place.snapshot.part(place.of(item, name.span))?;
            let own = part.row?.fields.iter().chain(registry::common_fields(part.role));
            own.into_iter().find(|field| field.name == word)
        }
        _ => registry::DRIVE_FIELDS.iter().find(|field| field.name == word),
    }
}

/// What can stand in a field, in a few words.
fn wanted(row: &Field) -> String {
    let unit = |kind: &str| match layshaft_units::kind(kind) {
        Some(kind) if kind.unit.is_empty() => kind.title.to_owned(),
        Some(kind) => kind.unit.to_owned(),
        None => kind.to_owned(),
    };
    match row.shape {
        Shape::Quantity(kind) => unit(kind),
        Shape::OfRated(kind) => format!("{}, or so many × rated", unit(kind)),
        Shape::Interval(kind) => format!("from .. to, {}", unit(kind)),
        Shape::Choice(words) => words.iter().map(|(word, _)| *word).collect::<Vec<_>>().join(" or "),
        Shape::Flag => String::from("yes or no"),
        Shape::Part(role @ (Role::Supply | Role::Source | Role::Transmission | Role::Load)) => {
            format!("the name of a {}", role_word(role))
        }
        Shape::Points(columns) => {
            let heads: Vec<String> = columns.iter().map(column).collect();
            format!("points ({}) {{ … }}", heads.join(", "))
        }
        Shape::Ratio { diameters: true } => String::from("one diameter drives the other"),
        Shape::Ratio { diameters: false } => String::from("teeth drives teeth"),
        Shape::Gears => String::from("reduction or increase"),
        Shape::Duty => String::from("S1, S2 30 min, S3 40 %"),
    }
}
