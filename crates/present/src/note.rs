//! Sentences of the mechanics with their quantities put in.

use layshaft_mechanics::fault::{Fault, FaultKind, Note};
use layshaft_semantics::say;

use crate::number::{DIGITS, digits, percent, shortened};
use crate::shown::joined;
use crate::unit::{Habits, convert};

/// The sentence, each `{0}` replaced by its quantity in the unit the author uses for its kind.
#[must_use]
pub fn fill(note: &Note, habits: &Habits) -> String {
    say::filled(note, |si, kind| quantity(si, kind, habits))
}

/// An SI value within a sentence: `12.5 kN·m`, zeros at the end cut.
#[must_use]
pub fn quantity(si: f64, kind: &'static str, habits: &Habits) -> String {
    let unit = habits.unit(kind, [si]);
    let text = if unit == "%" { percent(si) } else { digits(convert(si, &unit), DIGITS) };
    joined(&shortened(&text), &unit)
}

/// Why a drive could not be solved, in one sentence without a final point; `part` names the part it is about.
#[must_use]
pub fn fault(fault: &Fault, part: Option<&str>, habits: &Habits) -> String {
    let of = part.map_or(String::new(), |part| format!("{part}: "));
    let words = match &fault.kind {
        FaultKind::Missing { any_of, why } => {
            let groups: Vec<String> = any_of.iter().map(|group| group.join(" and ")).collect();
            format!("{} is not given: {}", groups.join(", or "), fill(why, habits))
        }
        FaultKind::Contradiction { fields, how } => {
            format!("{} disagree: {}", fields.join(", "), fill(how, habits))
        }
        FaultKind::Value { field, why } => format!("{field}: {}", fill(why, habits)),
        FaultKind::BrakingUnknown { field } => {
            format!("the load drives and {field} does not say how that is taken")
        }
        FaultKind::Chain { how } => fill(how, habits),
        FaultKind::Unsettled { how } => format!("no solution was found: {}", fill(how, habits)),
    };
    format!("{of}{words}")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quantities_take_their_places_and_braces_of_the_text_stay() {
        let note =
            Note { template: "{1} of {0}, {2} {x", quantities: vec![(23.5, "torque"), (0.5, "percentage")] };
        assert_eq!(fill(&note, &Habits::default()), "50 % of 23.5 N·m, {2} {x");
    }

    #[test]
    fn a_fault_names_part_and_fields() {
        let kind = FaultKind::Missing {
            any_of: vec![vec!["teeth"], vec!["reduction"]],
            why: Note::plain("a gear has a ratio"),
        };
        let text = fault(&Fault { part: Some(0), kind }, Some("reducer"), &Habits::default());
        assert_eq!(text, "reducer: teeth, or reduction is not given: a gear has a ratio");
    }
}
