//! Rope reeved over sheaves.

use super::fixed::Fixed;
use crate::fault::Fault;
use crate::kinds::fields::{EFFICIENCY, EFFICIENCY_BACKWARD, positive, quantity, range};
use crate::kinds::reading::bad_value;
use crate::laws::rope as law;
use crate::model::{LimitOn, Model, Motion};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "reeving",
    title: "reeving",
    summary: "Rope over a block: the load hangs on several falls, moves slower than the rope by their number and pulls \
              less on it. The blocks' own mass belongs to the load.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::HOOK_FORCE],
    cautions: &[
        "Rope, sheaves and blocks follow the local code for the machine; have lifting gear checked by a licensed person.",
    ],
    example: "transmission block: reeving { falls = 2; efficiency = 98 %; efficiency_backward = 98 % }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    quantity(
        "falls",
        "count",
        Need::Required,
        range(1.0, 64.0),
        range(1.0, 16.0),
        "falls of rope that carry the load, per drum; the rope runs faster than the load by this",
    ),
    EFFICIENCY,
    EFFICIENCY_BACKWARD,
    positive("max_load", "force", Need::Optional, range(10.0, 1e8), "most force the block may carry"),
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let falls = values.si("falls").unwrap_or(1.0);
    if falls != falls.round() {
        return Err(vec![bad_value(
            "falls",
            "falls are counted: {0} is no whole number",
            &[(falls, "number")],
        )]);
    }
    let block = Fixed {
        ports: (Motion::Linear, Motion::Linear),
        symbols: |coupling, state| {
            vec![("n", coupling.effort), ("eta", coupling.forward), ("F", state.input_effort)]
        },
        ..Fixed::geared(values, falls)
    };
    Ok(block.limited(values, &[("max_load", LimitOn::OutputEffort)]).model())
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::model::{Model, Motion};
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn falls_divide_speed_and_multiply_force() {
        let values = Values::default().with("falls", Si(4.0)).with("efficiency", Si(0.95));
        let Ok(Model::Transmission(block)) = build(&values) else { panic!("no reeving") };
        assert_eq!((block.input(), block.output()), (Motion::Linear, Motion::Linear));
        assert_eq!((block.coupling(0).speed, block.coupling(0).effort), (4.0, 4.0));
        assert!(build(&Values::default().with("falls", Si(2.5))).is_err());
    }
}
