//! A reversing gear: one ratio ahead, one astern.

use super::fixed::Fixed;
use super::gear::LIMITS;
use super::shifted::Shifted;
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, MAX_OUTPUT_TORQUE, SMALL_INERTIA,
    positive, range,
};
use crate::kinds::reading::limits;
use crate::laws::gear;
use crate::model::{Coupling, Model};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "reversing_gear",
    title: "reversing gear",
    summary: "A gear that turns its output either way while its input turns on the same way, so that an engine can drive \
              ahead and astern. The direction of the drive engages it: forward is ahead, reverse is astern.",
    fields: FIELDS,
    results: &[],
    formulas: &[gear::SPEED, gear::TORQUE, gear::TORQUE_BACKWARD],
    cautions: &[
        "Shift at idle with the output nearly at rest: what runs on behind it turns the engine against its sense.",
    ],
    example: "transmission marine_gear: reversing_gear { ahead_reduction = 2.52; astern_reduction = 2.94; efficiency = 96 % }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive(
        "ahead_reduction",
        "number",
        Need::Required,
        range(0.2, 100.0),
        "input speed over output speed while the drive runs forward",
    ),
    positive(
        "astern_reduction",
        "number",
        Need::Required,
        range(0.2, 100.0),
        "the same in reverse, where the output turns against the input",
    ),
    EFFICIENCY,
    EFFICIENCY_BACKWARD,
    MAX_INPUT_TORQUE,
    MAX_OUTPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let gear = |field, reverses| {
        let ratio = values.si(field).unwrap_or(1.0);
        (field.to_owned(), Some(Coupling { reverses, ..Fixed::geared(values, ratio).coupling }))
    };
    Ok(Model::Transmission(Box::new(Shifted {
        gears: vec![gear("ahead_reduction", false), gear("astern_reduction", true)],
        by_direction: true,
        inertia: values.si("inertia").unwrap_or(0.0),
        limits: limits(values, LIMITS),
    })))
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::drive::Direction;
    use crate::model::Model;
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn the_direction_engages_it() {
        let values = Values::default().with("ahead_reduction", Si(2.5)).with("astern_reduction", Si(3.0));
        let Ok(Model::Transmission(gear)) = build(&values) else { panic!("no gear") };
        assert!(gear.gears().is_empty());
        let engaged = |direction| gear.coupling(gear.gear_towards(direction).unwrap());
        let (ahead, astern) = (engaged(Direction::Forward), engaged(Direction::Reverse));
        assert_eq!((ahead.speed, ahead.reverses), (2.5, false));
        assert_eq!((astern.speed, astern.reverses), (3.0, true));
    }
}
