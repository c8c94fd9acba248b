//! Every case and variant that changes a value, a field or a part.

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_semantics::index::Target;
use layshaft_syntax::{Item, ItemKind, PartBase};

use crate::Snapshot;
use crate::hover::entries;

/// The lines of cases that override the thing named at a place, and the variants that change it, in the order of the
/// texts.
#[must_use]
pub fn implementations(snapshot: &Snapshot, file: FileId, offset: u32) -> Vec<FileSpan> {
    let Some(name) = snapshot.reference(file, offset) else { return Vec::new() };
    let (owner, field) = match &name.target {
        Target::Let(place) | Target::Drive(place) | Target::Part(place) => (*place, None),
        Target::Field(owner, field) => (*owner, Some(field.as_str())),
        _ => return Vec::new(),
    };
    let any_field = matches!(name.target, Target::Part(_) | Target::Drive(_));
    let changes = snapshot.analysis.cases.iter().flat_map(|case| &case.changes);
    let mut found: Vec<FileSpan> = changes
        .filter(|change| change.owner == owner && (any_field || change.field.as_deref() == field))
        .map(|change| change.place)
        .collect();
    for index in 0..snapshot.analysis.files.len() as u32 {
        let file = FileId(index);
        let Some(source) = snapshot.file(file) else { continue };
        found.extend(source.tree.items.iter().filter_map(|item| variant(snapshot, file, item, owner, field)));
    }
    found.sort();
    found.dedup();
    found
}

/// The variant's name, or its line that changes the field.
fn variant(
    snapshot: &Snapshot,
    file: FileId,
    item: &Item,
    owner: FileSpan,
    field: Option<&str>,
) -> Option<FileSpan> {
    let ItemKind::Part { name, base: PartBase::Variant(base), .. } = &item.tree.kind else { return None };
    let last = base.names.last()?;
    let reference = snapshot.reference(file, last.span.start + item.offset)?;
    if reference.target != Target::Part(owner) {
        return None;
    }
    let place = |span: layshaft_diagnostics::Span| FileSpan { file, span: span.shifted(item.offset) };
    match field {
        None => Some(place(name.span)),
        Some(field) => {
            let entry = entries(item).iter().find(|entry| crate::hover::key(entry) == field)?;
            Some(place(entry.key.span))
        }
    }
}

#[cfg(test)]
mod tests {
    use super::implementations;
    use crate::fixture::Fixture;

    fn check(drawn: &str) {
        let fixture = Fixture::new(drawn);
        assert_eq!(implementations(&fixture.snapshot, fixture.file, fixture.offset), fixture.ranges);
    }

    #[test]
    fn a_value_in_its_cases() {
        check("let lo$0ad = 5 kg\ncase a { <|load|> = each 6 kg, 7 kg }\ncase b { <|load|> = 8 kg }\n");
    }

    #[test]
    fn a_field_in_cases_and_variants() {
        check(
            "source m: straight_line { stall$0_torque = 5 N·m; no_load_speed = 3000 rpm }\nsource n = m with { <|stall_torque|> = 6 N·m }\nsource o = m with { no_load_speed = 2000 rpm }\ncase a { <|m.stall_torque|> = 4 N·m }\n",
        );
    }

    #[test]
    fn a_part_with_all_that_changes_it() {
        check(
            "source m$0: straight_line { stall_torque = 5 N·m; no_load_speed = 3000 rpm }\nsource <|n|> = m with { stall_torque = 6 N·m }\ncase a { <|m.stall_torque|> = 4 N·m }\n",
        );
    }
}
