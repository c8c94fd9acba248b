//! A transmission whose ratio can be set anywhere in a range.

use super::fixed::Fixed;
use super::gear::{LIMITS, symbols};
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, MAX_OUTPUT_TORQUE, MAX_POWER,
    SMALL_INERTIA, positive, range,
};
use crate::kinds::reading::contradiction;
use crate::laws::gear;
use crate::model::Model;
use crate::registry::{Field, KindRow, Need, Role, Shape};
use crate::values::{FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "variable",
    title: "continuously variable transmission",
    summary: "A transmission whose ratio is set anywhere in a range: variable pulleys, rolling bodies, a divided \
              hydrostatic path. A spec says at which ratio it runs; cases take others, `each 0.5, 1, 2`.",
    fields: FIELDS,
    results: &[],
    formulas: &[gear::SPEED, gear::TORQUE, gear::TORQUE_BACKWARD],
    cautions: &["Its efficiency changes with ratio and load: use the one of the ratio that is set."],
    example: "transmission cvt: variable { reduction_range = 0.5 .. 2.2; reduction = 1.4; efficiency = 88 % }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    Field {
        shape: Shape::Interval("number"),
        ..positive(
            "reduction_range",
            "number",
            Need::Required,
            range(0.02, 1e4),
            "least and greatest reduction it can be set to",
        )
    },
    positive(
        "reduction",
        "number",
        Need::Required,
        range(0.02, 1e4),
        "input speed over output speed it is set to; none is chosen silently",
    ),
    EFFICIENCY,
    EFFICIENCY_BACKWARD,
    MAX_INPUT_TORQUE,
    MAX_OUTPUT_TORQUE,
    MAX_INPUT_SPEED,
    MAX_POWER,
    SMALL_INERTIA,
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let reduction = values.si("reduction").unwrap_or(1.0);
    if let Some(FieldValue::Interval(low, high)) = values.get("reduction_range") {
        let (low, high) = (*low, *high);
        if reduction < low * (1.0 - 1e-9) || reduction > high * (1.0 + 1e-9) {
            let how = "it can be set from {0} to {1}, not to {2}";
            let quantities = [(low, "number"), (high, "number"), (reduction, "number")];
            return Err(vec![contradiction(&["reduction", "reduction_range"], how, &quantities)]);
        }
    }
    let set = Fixed { symbols, ..Fixed::geared(values, reduction) };
    Ok(set.limited(values, LIMITS).model())
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::model::Model;
    use crate::values::{FieldValue, Values};

    #[test]
    fn set_inside_its_range() {
        let set = |low, reduction| {
            let range = FieldValue::Interval(low, 2.2);
            build(
                &Values::default()
                    .with("reduction_range", range)
                    .with("reduction", FieldValue::Si(reduction)),
            )
        };
        let Ok(Model::Transmission(cvt)) = set(0.5, 1.4) else { panic!("no transmission") };
        assert_eq!(cvt.coupling(0).speed, 1.4);
        assert!(matches!(set(0.5, 2.4).unwrap_err()[0].kind, FaultKind::Contradiction { .. }));
    }
}
