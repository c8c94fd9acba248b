//! Units behind a number, behind `as` and in the head of a table.

use std::collections::BTreeSet;

use layshaft_mechanics::registry::{ColumnRow, Shape};
use layshaft_units::{KINDS, Kind};

use super::Asked;
use super::menu::{CompletionKind, Menu};
use super::wanted::Wanted;

/// The units that fit, the author's own first; every unit where nothing is known of the kind.
pub(super) fn units(asked: Asked<'_, '_>, wanted: &Wanted, menu: &mut Menu<'_>) {
    let mut seen = BTreeSet::new();
    match wanted.field.map(|field| field.shape) {
        Some(Shape::Gears | Shape::Ratio { diameters: false } | Shape::Choice(_) | Shape::Flag) => return,
        Some(Shape::Duty) => {
            for unit in ["%", "min", "h"] {
                add(unit, "of a duty type", 0, &mut seen, menu);
            }
            return;
        }
        _ => {}
    }
    let fitting: Vec<&'static Kind> =
        if wanted.kinds.is_empty() { KINDS.iter().collect() } else { wanted.rows().collect() };
    let known = !wanted.kinds.is_empty();
    for kind in &fitting {
        if known {
            let own = asked.snapshot.habits().unit(kind.name, []);
            add(&own, kind.title, 0, &mut seen, menu);
        }
    }
    for kind in fitting {
        for unit in kind.units {
            add(unit, kind.title, 1, &mut seen, menu);
        }
    }
}

fn add(unit: &str, kind: &'static str, rank: u8, seen: &mut BTreeSet<String>, menu: &mut Menu<'_>) {
    if unit.is_empty() || !seen.insert(unit.to_owned()) {
        return;
    }
    let plain = menu.typed().contains(['*', '^']);
    let entry = menu.add(rank, CompletionKind::Unit, unit);
    entry.note(kind).about(format!("unit:{unit}"));
    if plain {
        entry.filter = Some(in_ascii(unit));
    }
}

/// A unit as it is typed without signs beyond ASCII.
fn in_ascii(unit: &str) -> String {
    unit.replace('·', "*").replace('²', "^2").replace('³', "^3").replace('°', "deg").replace('μ', "u")
}

/// Columns of a table with their usual units.
pub(super) fn columns(columns: &[ColumnRow], menu: &mut Menu<'_>) {
    for column in columns {
        let text = layshaft_semantics::say::column(column);
        let needed = if column.optional { "" } else { " · required" };
        let title = layshaft_units::kind(column.kind).map_or(column.kind, |kind| kind.title);
        let entry = menu.add(u8::from(column.optional), CompletionKind::Field, &text);
        entry.note(format!("{title}{needed}"));
        entry.filter = Some(column.name.to_owned());
    }
}
