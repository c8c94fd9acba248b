//! A gear pair or gear train of fixed ratio.

use super::fixed::{Fixed, Symbols};
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, MAX_OUTPUT_TORQUE, SMALL_INERTIA,
    plain, positive, range,
};
use crate::kinds::reading::{bad_value, only_one};
use crate::laws::gear as law;
use crate::model::{Coupling, Known, LimitOn, Model, TransmissionState};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::{FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "gear",
    title: "gear",
    summary: "A gear pair or train of fixed ratio, by its reduction (slower, more torque), its increase (faster, less \
              torque) or its teeth. Losses follow the direction in which power really flows.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::REDUCTION, law::SPEED, law::TORQUE, law::TORQUE_BACKWARD],
    cautions: &["Guard open gears. A gear that will not run backwards under load is not a brake."],
    example: "transmission reducer: gear { reduction = 41.2; efficiency = 94 %; efficiency_backward = 93 % }",
    build,
    given: |values| reduction(values, &mut Vec::new()).map(|i| ("reduction", i)).into_iter().collect(),
};

static FIELDS: &[Field] = &[
    REDUCTION,
    INCREASE,
    TEETH,
    EFFICIENCY,
    EFFICIENCY_BACKWARD,
    MAX_INPUT_TORQUE,
    MAX_OUTPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
    plain(
        "reversing",
        Shape::Flag,
        Need::Optional,
        "whether the output turns against the input; only the direction of running changes with it, no number",
    ),
];

/// Slower at the output.
pub(super) const REDUCTION: Field = positive(
    "reduction",
    "number",
    Need::OneOf,
    range(1.0, 1e5),
    "input speed over output speed: the output turns slower by this and has more torque; below 1 say increase",
);

/// Faster at the output.
pub(super) const INCREASE: Field = positive(
    "increase",
    "number",
    Need::OneOf,
    range(1.0, 1e3),
    "output speed over input speed: the output turns faster by this and has less torque",
);

/// By counting.
pub(super) const TEETH: Field = plain(
    "teeth",
    Shape::Ratio { diameters: false },
    Need::OneOf,
    "teeth of the driving and of the driven wheel: `17 drives 51` turns slower by 3",
);

/// The ratio that comes out of the ways to say it.
pub(super) const REDUCTION_RESULT: ResultRow = ResultRow {
    name: "reduction",
    shape: ResultShape::Quantity("number"),
    meaning: "input speed over output speed",
};

/// Results of a part that has no others of its own.
pub(super) static RESULTS: &[ResultRow] = &[REDUCTION_RESULT];

/// What the limits of a rotary part are about.
pub(super) const LIMITS: &[(&str, LimitOn)] = &[
    ("max_input_torque", LimitOn::InputEffort),
    ("max_output_torque", LimitOn::OutputEffort),
    ("max_input_speed", LimitOn::InputSpeed),
    ("max_power", LimitOn::Power),
];

/// Reduction by any of its three spellings.
fn reduction(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let why = "the ratio of the gear: how many times slower or faster its output turns, or its teeth";
    match only_one(values, &["reduction", "increase", "teeth"], why, faults)? {
        "reduction" => values.si("reduction"),
        "increase" => values.si("increase").map(|increase| 1.0 / increase),
        _ => ratio(values, "teeth", faults),
    }
}

/// Reduction of a part that has no increase.
pub(super) fn by_reduction_or_teeth(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let why = "the ratio: input speed over output speed, or the teeth";
    match only_one(values, &["reduction", "teeth"], why, faults)? {
        "reduction" => values.si("reduction"),
        _ => ratio(values, "teeth", faults),
    }
}

/// The reduction of a field `a drives b`; two teeth or diameters above zero, teeth whole.
pub(super) fn ratio(values: &Values, field: &'static str, faults: &mut Vec<Fault>) -> Option<f64> {
    let Some(FieldValue::Ratio { driver, driven }) = values.get(field) else { return None };
    let (driver, driven) = (*driver, *driven);
    let kind = if field == "teeth" { "number" } else { "length" };
    let whole = field != "teeth" || (driver == driver.round() && driven == driven.round());
    let reduction = law::reduction(driver, driven);
    if driver > 0.0 && driven > 0.0 && whole && reduction.is_finite() && reduction > 0.0 {
        return Some(reduction);
    }
    let template =
        if whole { "both must be above zero: {0} drives {1}" } else { "teeth are counted: {0} drives {1}" };
    faults.push(bad_value(field, template, &[(driver, kind), (driven, kind)]));
    None
}

/// A part of fixed ratio between two turning shafts, with the fields every such part has.
pub(super) fn fixed_ratio(values: &Values, reduction: f64) -> Fixed {
    Fixed { symbols, ..Fixed::geared(values, reduction).limited(values, LIMITS) }
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some(reduction) = reduction(values, &mut faults) else { return Err(faults) };
    let mut gear = fixed_ratio(values, reduction);
    gear.coupling.reverses = values.flag("reversing").unwrap_or(false);
    Ok(gear.model())
}

/// The symbols of the gear's formulas.
pub(super) fn symbols(coupling: &Coupling, state: &TransmissionState) -> Symbols {
    let mut out = vec![
        ("i", coupling.effort),
        ("eta", coupling.forward),
        ("w_in", state.input_speed),
        ("T_in", state.input_effort),
        ("T_out", state.output_effort),
    ];
    if let Known::Value(backward) = coupling.backward {
        out.push(("eta_b", backward));
    }
    out
}

#[cfg(test)]
mod tests {
    use super::{build, reduction};
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::{Known, Model};
    use crate::values::{FieldValue, Values};

    #[test]
    fn three_spellings_of_one_ratio() {
        let ways = [
            ("reduction", FieldValue::Si(0.25)),
            ("increase", FieldValue::Si(4.0)),
            ("teeth", FieldValue::Ratio { driver: 60.0, driven: 15.0 }),
        ];
        for (name, value) in ways {
            let values = Values::default().with(name, value).with("efficiency", FieldValue::Si(0.9));
            close(reduction(&values, &mut Vec::new()).unwrap(), 0.25, 1e-15);
            let Ok(Model::Transmission(gear)) = build(&values) else { panic!("no gear") };
            let coupling = gear.coupling(0);
            close(coupling.speed, coupling.effort, 1e-15);
            assert_eq!(coupling.backward, Known::Missing("efficiency_backward"));
        }
    }

    #[test]
    fn teeth_that_cannot_be() {
        for (driver, driven) in [(0.0, 10.0), (10.0, 0.0), (10.0, -10.0), (10.5, 20.0)] {
            let values = Values::default().with("teeth", FieldValue::Ratio { driver, driven });
            assert!(matches!(build(&values).unwrap_err()[..], [_]), "{driver} drives {driven}");
        }
    }

    #[test]
    fn none_and_two_of_them() {
        let kind = |values: Values| build(&values).unwrap_err().remove(0).kind;
        let FaultKind::Missing { any_of, .. } = kind(Values::default()) else { panic!("missing") };
        assert_eq!(any_of, [["reduction"], ["increase"], ["teeth"]]);
        let both =
            Values::default().with("reduction", FieldValue::Si(3.0)).with("increase", FieldValue::Si(3.0));
        assert!(matches!(kind(both), FaultKind::Contradiction { .. }));
    }
}
