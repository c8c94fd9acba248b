//! A brake on a shaft.

use super::fixed::Fixed;
use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, SMALL_INERTIA, not_negative, positive, range};
use crate::laws::brake as law;
use crate::model::{Brake, Known, LimitOn, Model};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "brake",
    title: "brake",
    summary: "A brake that is open while the drive runs and bites some time after it is switched off. The speed a load \
              gains before it bites counts.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::HOLDING_RESERVE],
    cautions: &[
        "What reserve a brake needs, how it is proved and how often it is checked stands in the local code for the \
         machine; a brake that holds people or loads over people is a matter for licensed practice.",
        "A brake fades when hot, wet or oily: use its least torque, not its rated one.",
    ],
    example: "transmission holding_brake: brake { torque = 60 N·m; apply_time = 30 ms; inertia = 0.0012 kg·m² }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive("torque", "torque", Need::Required, range(1e-3, 1e7), "torque with which it brakes and holds"),
    not_negative(
        "apply_time",
        "time",
        Need::Where("stopping"),
        range(1e-3, 5.0),
        "time from switching off until it bites",
    ),
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[ResultRow {
    name: "holding_reserve",
    shape: ResultShape::Quantity("number"),
    meaning: "its torque over the static torque of the load at its shaft, losses not counted on",
}];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let effort = values.si("torque").unwrap_or(0.0);
    let brake = Brake { effort, apply_time: Known::of(values.si("apply_time"), "apply_time") };
    let part = Fixed { brake: Some(brake), constants: vec![("T_b", effort)], ..Fixed::shafts(values) };
    Ok(part.limited(values, &[("max_input_speed", LimitOn::InputSpeed)]).model())
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::model::{Known, Model};
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn bites_after_its_time() {
        let values = Values::default().with("torque", Si(60.0));
        let Ok(Model::Transmission(brake)) = build(&values) else { panic!("no brake") };
        assert_eq!(brake.brake().unwrap().apply_time, Known::Missing("apply_time"));
        let Ok(Model::Transmission(brake)) = build(&values.with("apply_time", Si(0.03))) else {
            panic!("no brake")
        };
        assert_eq!(brake.brake().unwrap().apply_time, Known::Value(0.03));
        assert_eq!(brake.brake().unwrap().effort, 60.0);
        assert_eq!(brake.coupling(0).forward, 1.0);
    }
}
