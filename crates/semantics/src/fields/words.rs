//! Ranges and samples of fields, in words.

use layshaft_mechanics::registry::{Bounds, Field, Shape};
use layshaft_units::Kind;

use crate::defs::role_word;

/// "above 0", "between 0 % and 100 %".
pub(crate) fn say_bounds(bounds: &Bounds, kind: &Kind, unit: &str) -> String {
    let unit =
        if kind.ty().is_plain_number() && bounds.high == 1.0 && bounds.low >= 0.0 { "%" } else { unit };
    let say = |si: f64| {
        if si == 0.0 && !bounds.high.is_finite() { "0".to_owned() } else { crate::say::in_unit(si, unit) }
    };
    match (bounds.low.is_finite(), bounds.high.is_finite()) {
        (true, true) => format!("between {} and {}", say(bounds.low), say(bounds.high)),
        (true, false) if bounds.low_in => format!("{} or more", say(bounds.low)),
        (true, false) => format!("above {}", say(bounds.low)),
        (false, true) if bounds.high_in => format!("at most {}", say(bounds.high)),
        (false, true) => format!("below {}", say(bounds.high)),
        (false, false) => "a number".to_owned(),
    }
}

/// How a field is written, for a message that asks for it.
pub(crate) fn sample(field: &Field) -> String {
    match field.shape {
        Shape::Quantity(kind) | Shape::OfRated(kind) => layshaft_units::kind(kind)
            .map_or_else(String::new, |kind| format!("… {}", kind.unit).trim_end().to_owned()),
        Shape::Interval(kind) => layshaft_units::kind(kind)
            .map_or_else(String::new, |kind| format!("… {0} .. … {0}", kind.unit).trim_end().to_owned()),
        Shape::Choice(words) => words.iter().map(|(word, _)| *word).collect::<Vec<_>>().join(" | "),
        Shape::Flag => "yes | no".to_owned(),
        Shape::Part(role) => format!("(a {})", role_word(role)),
        Shape::Points(columns) => {
            let heads: Vec<_> = columns.iter().map(crate::say::column).collect();
            format!("points ({}) {{ … }}", heads.join(", "))
        }
        Shape::Ratio { diameters: true } => "… mm drives … mm".to_owned(),
        Shape::Ratio { diameters: false } => "… drives …".to_owned(),
        Shape::Gears => "reduction …".to_owned(),
        Shape::Duty => "S1".to_owned(),
    }
}
