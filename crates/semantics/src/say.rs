//! Sentences with their quantities put in, each in the unit its kind is usually given in.

use layshaft_mechanics::fault::Note;
use layshaft_mechanics::registry::ColumnRow;

use crate::number::{DIGITS, digits, shortened};
use crate::unit::usual_unit;

/// A number with four significant digits, zeros at the end of its fraction cut.
pub(crate) fn plain(value: f64) -> String {
    shortened(&digits(value, DIGITS))
}

/// A column as the head of a table says it: `speed [rpm]`; of plain numbers the name alone.
#[must_use]
pub fn column(row: &ColumnRow) -> String {
    match usual_unit(row.kind, []).as_str() {
        "" => row.name.to_owned(),
        unit => format!("{} [{unit}]", row.name),
    }
}

/// An SI value of a kind in its usual unit: `1450 rpm`.
fn in_usual_unit(si: f64, kind: &str) -> String {
    in_unit(si, &usual_unit(kind, [si]))
}

/// An SI value in a unit.
pub(crate) fn in_unit(si: f64, unit: &str) -> String {
    match layshaft_units::parse_unit(unit) {
        Ok(unit) => {
            let number = plain(unit.from_si(si));
            if unit.text.is_empty() { number } else { format!("{number} {}", unit.text) }
        }
        Err(_) => plain(si),
    }
}

/// The sentence of a note, its quantities in the units their kinds are usually given in.
pub(crate) fn note(note: &Note) -> String {
    filled(note, in_usual_unit)
}

/// The sentence of a note, each `{0}` replaced by its quantity as `write` puts an SI value of a kind.
pub fn filled(note: &Note, write: impl Fn(f64, &'static str) -> String) -> String {
    let mut out = String::with_capacity(note.template.len() + 16);
    let mut rest = note.template;
    while let Some(open) = rest.find('{') {
        out.push_str(&rest[..open]);
        let body = &rest[open + 1..];
        let filled = body.split_once('}').and_then(|(index, behind)| {
            let (si, kind) = note.quantities.get(index.parse::<usize>().ok()?)?;
            Some((write(*si, kind), behind))
        });
        match filled {
            Some((text, behind)) => {
                out.push_str(&text);
                rest = behind;
            }
            None => {
                out.push('{');
                rest = body;
            }
        }
    }
    out.push_str(rest);
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_column_of_plain_numbers_has_no_brackets() {
        let row = |kind| ColumnRow { name: "x", kind, optional: false };
        assert_eq!(column(&row("rotational_speed")), "x [rpm]");
        assert_eq!(column(&row("percentage")), "x [%]");
        assert_eq!(column(&row("number")), "x");
    }
}
