//! A gearbox with named gears.

use super::gear::{LIMITS, symbols};
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, MAX_OUTPUT_TORQUE, SMALL_INERTIA,
    plain,
};
use crate::kinds::reading::{bad_value, limits, missing};
use crate::laws::gear as law;
use crate::model::{Coupling, Known, Limit, Model, Transmission, TransmissionState};
use crate::registry::{Field, KindRow, Need, Role, Shape};
use crate::values::{FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "gearbox",
    title: "gearbox",
    summary: "A gearbox of which one gear is engaged at a time; the drive or a case says which. No gear is chosen \
              silently: where none is said, every gear is solved and shown.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::SPEED, law::TORQUE, law::TORQUE_BACKWARD],
    cautions: &[],
    example: "transmission box: gearbox { gear 1 = reduction 14.5; gear 2 = reduction 8.2; efficiency = 93 % }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    plain("gear", Shape::Gears, Need::Required, "a gear and its ratio: `gear 1 = reduction 14.5`"),
    EFFICIENCY,
    EFFICIENCY_BACKWARD,
    MAX_INPUT_TORQUE,
    MAX_OUTPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

#[derive(Debug)]
struct Gearbox {
    gears: Vec<(String, f64)>,
    /// Everything but the ratio.
    coupling: Coupling,
    inertia: f64,
    limits: Vec<Limit>,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let gears = match values.get("gear") {
        Some(FieldValue::Gears(gears)) if !gears.is_empty() => gears.clone(),
        _ => {
            return Err(vec![missing(
                &[&["gear"]],
                "a gearbox has at least one gear: `gear 1 = reduction 14.5`",
            )]);
        }
    };
    if let Some((_, ratio)) = gears.iter().find(|(_, ratio)| !(*ratio > 0.0 && ratio.is_finite())) {
        let template =
            "the ratio of a gear must be above zero, not {0}; a reversing gear is a part of its own";
        return Err(vec![bad_value("gear", template, &[(*ratio, "number")])]);
    }
    Ok(Model::Transmission(Box::new(Gearbox {
        gears,
        coupling: Coupling {
            forward: values.si("efficiency").unwrap_or(1.0),
            backward: Known::of(values.si("efficiency_backward"), "efficiency_backward"),
            ..Coupling::ideal(1.0)
        },
        inertia: values.si("inertia").unwrap_or(0.0),
        limits: limits(values, LIMITS),
    })))
}

impl Transmission for Gearbox {
    fn gears(&self) -> Vec<String> {
        self.gears.iter().map(|(name, _)| name.clone()).collect()
    }

    fn coupling(&self, gear: usize) -> Coupling {
        // The caller engages gears by their index; one that does not exist is the last.
        let (_, reduction) = &self.gears[gear.min(self.gears.len() - 1)];
        Coupling { speed: *reduction, effort: *reduction, ..self.coupling }
    }

    fn input_inertia(&self) -> Known {
        Known::Value(self.inertia)
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }

    fn symbols(&self, state: &TransmissionState) -> Vec<(&'static str, f64)> {
        symbols(&self.coupling(state.gear), state)
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::model::Model;
    use crate::values::{FieldValue, Values};

    #[test]
    fn gears_by_name_and_index() {
        let gears = vec![("1".to_owned(), 14.5), ("2".to_owned(), 8.2)];
        let values =
            Values::default().with("gear", FieldValue::Gears(gears)).with("efficiency", FieldValue::Si(0.93));
        let Ok(Model::Transmission(gearbox)) = build(&values) else { panic!("no gearbox") };
        assert_eq!(gearbox.gears(), ["1", "2"]);
        assert_eq!(gearbox.coupling(0).speed, 14.5);
        assert_eq!(gearbox.coupling(1).effort, 8.2);
        assert_eq!(gearbox.coupling(1).forward, 0.93);
    }

    #[test]
    fn a_gearbox_without_gears() {
        assert!(build(&Values::default()).is_err());
        for gears in [vec![], vec![("r".to_owned(), -3.0)], vec![("n".to_owned(), 0.0)]] {
            assert!(build(&Values::default().with("gear", FieldValue::Gears(gears))).is_err());
        }
    }
}
