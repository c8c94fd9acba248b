//! The rows of the registry in words: what a field may hold, whether it must be given, what a result is.

use layshaft_mechanics::registry::{Bounds, ColumnRow, Field, Need, ResultRow, ResultShape, Shape};

use crate::note::quantity;
use crate::number::written;
use crate::sheet::role_word;
use crate::unit::Habits;

/// What can stand in a field.
#[must_use]
pub fn shape(field: &Field) -> String {
    match field.shape {
        Shape::Quantity(kind) => kind.to_string(),
        Shape::OfRated(kind) => format!("{kind}, or a multiple of `rated`"),
        Shape::Interval(kind) => format!("{kind}, lo .. hi"),
        Shape::Choice(words) => words.iter().map(|(word, _)| *word).collect::<Vec<_>>().join(" | "),
        Shape::Flag => String::from("yes | no"),
        Shape::Part(role) => format!("name of a {}", role_word(role)),
        Shape::Points(columns) => {
            let name = |column: &ColumnRow| {
                if column.optional {
                    format!("{} (may be missing)", column.name)
                } else {
                    column.name.to_string()
                }
            };
            format!("points of {}", columns.iter().map(name).collect::<Vec<_>>().join(", "))
        }
        Shape::Ratio { diameters: true } => String::from("length drives length"),
        Shape::Ratio { diameters: false } => String::from("teeth drives teeth"),
        Shape::Gears => String::from("named gears, each a reduction or an increase"),
        Shape::Duty => String::from("duty type: S1, S3 40 %"),
    }
}

/// Whether it must be given.
#[must_use]
pub const fn need(field: &Field) -> &'static str {
    match field.need {
        Need::Required => "required",
        Need::Optional | Need::Default { .. } => "may be left out",
        Need::Where(_) => "required where it is asked for",
        Need::OneOf => "one of several",
    }
}

/// Why it may be left out, or which question needs it.
#[must_use]
pub fn reason(field: &Field) -> Option<String> {
    match field.need {
        Need::Default { si, why } => Some(format!("taken as {}: {why}", value(field, si))),
        Need::Where(question) => Some(format!("needed for {question}")),
        _ => None,
    }
}

/// An SI value of a field in its usual unit.
fn value(field: &Field, si: f64) -> String {
    match field.shape {
        Shape::Quantity(kind) | Shape::OfRated(kind) | Shape::Interval(kind) => {
            quantity(si, kind, &Habits::default())
        }
        Shape::Flag => String::from(if si == 0.0 { "no" } else { "yes" }),
        Shape::Choice(words) => {
            words.get(si as usize).map_or_else(|| written(si), |(word, _)| (*word).to_owned())
        }
        _ => written(si),
    }
}

/// The values it may have; empty where any.
#[must_use]
pub fn range(field: &Field) -> String {
    let Bounds { low, low_in, high, high_in } = field.hard;
    let (below, above) = (low.is_finite(), high.is_finite());
    match (below, above) {
        (false, false) => String::new(),
        (true, false) if low == 0.0 => String::from(if low_in { "0 or above" } else { "above 0" }),
        (true, false) => format!("{} {}", if low_in { "from" } else { "above" }, value(field, low)),
        (false, true) => format!("{} {}", if high_in { "up to" } else { "below" }, value(field, high)),
        (true, true) => {
            let word = if low_in { "" } else { "above " };
            let end = if high_in { "" } else { " (not itself)" };
            format!("{word}{} .. {}{end}", value(field, low), value(field, high))
        }
    }
}

/// What a result is.
#[must_use]
pub fn result_shape(result: &ResultRow) -> String {
    match result.shape {
        ResultShape::Quantity(kind) => kind.to_string(),
        ResultShape::Speed => String::from("speed, of its motion"),
        ResultShape::Effort => String::from("torque or force, of its motion"),
        ResultShape::Way => String::from("angle or length, of its motion"),
        ResultShape::Flag => String::from("yes | no"),
        ResultShape::Word(words) => words.join(" | "),
    }
}
