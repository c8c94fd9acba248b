//! A driven wheel on the ground.

use super::fixed::Fixed;
use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, MAX_INPUT_TORQUE, SMALL_INERTIA, positive, quantity, range};
use crate::kinds::reading::only_one;
use crate::laws::wheel as law;
use crate::model::{Coupling, Grip, Known, LimitOn, Model, Motion};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;
use core::f64::consts::TAU;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "wheel",
    title: "driven wheel",
    summary: "Turning shaft to rolling vehicle. Its size is the rolling circumference, the way covered in one turn \
              under load. With grip and the share of the weight on driven wheels, slipping is checked.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::ROLLING_SPEED],
    cautions: &[
        "A wheel that slips neither drives nor brakes: grip on wet, loose or icy ground may be a tenth of dry.",
    ],
    example: "transmission rear: wheel { rolling_circumference = 2.1 m; grip = 0.6; driven_weight_share = 55 % }",
    build,
    given: |values| {
        radius(values, &mut Vec::new()).map(|r| ("rolling_circumference", r * TAU)).into_iter().collect()
    },
};

static FIELDS: &[Field] = &[
    positive(
        "rolling_circumference",
        "length",
        Need::OneOf,
        range(0.05, 15.0),
        "way covered in one turn under load",
    ),
    positive(
        "rolling_radius",
        "length",
        Need::OneOf,
        range(0.01, 2.5),
        "height of the axle over ground under load",
    ),
    positive("rolling_diameter", "length", Need::OneOf, range(0.02, 5.0), "twice the rolling radius"),
    positive(
        "grip",
        "number",
        Need::Optional,
        range(0.02, 1.2),
        "most force along the ground over the force that presses on it; slipping is checked where it is given",
    ),
    quantity(
        "driven_weight_share",
        "percentage",
        Need::Where("grip: the share of the weight that stands on the driven wheels"),
        Bounds::EFFICIENCY,
        range(0.1, 1.0),
        "share of the vehicle's weight on the driven wheels",
    ),
    MAX_INPUT_TORQUE,
    MAX_INPUT_SPEED,
    Field { meaning: "moment of inertia of all wheels that turn with this shaft", ..SMALL_INERTIA },
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "rolling_circumference",
        shape: ResultShape::Quantity("length"),
        meaning: "way covered in one turn",
    },
    ResultRow {
        name: "grip_reserve",
        shape: ResultShape::Quantity("number"),
        meaning: "most force the ground takes over the force at the wheel; below 1 it slips",
    },
];

fn radius(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let ways = ["rolling_circumference", "rolling_radius", "rolling_diameter"];
    let way = only_one(values, &ways, "the size of the wheel, rolling under load", faults)?;
    let size = values.si(way)?;
    Some(match way {
        "rolling_circumference" => law::radius_of(size),
        "rolling_diameter" => size / 2.0,
        _ => size,
    })
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some(radius) = radius(values, &mut faults) else { return Err(faults) };
    let share = Known::of(values.si("driven_weight_share"), "driven_weight_share");
    let wheel = Fixed {
        ports: (Motion::Rotary, Motion::Linear),
        coupling: Coupling::ideal(law::wheel_ratio(radius)),
        grip: values.si("grip").map(|friction| Grip { friction, share }),
        constants: vec![("C", radius * TAU)],
        symbols: |_, state| vec![("w", state.input_speed)],
        ..Fixed::shafts(values)
    };
    let limits = [("max_input_torque", LimitOn::InputEffort), ("max_input_speed", LimitOn::InputSpeed)];
    Ok(wheel.limited(values, &limits).model())
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::{Known, Model};
    use crate::values::{FieldValue::Si, Values};
    use core::f64::consts::TAU;

    #[test]
    fn three_sizes_of_one_wheel() {
        for (name, size) in
            [("rolling_circumference", TAU * 0.3), ("rolling_radius", 0.3), ("rolling_diameter", 0.6)]
        {
            let Ok(Model::Transmission(wheel)) = build(&Values::default().with(name, Si(size))) else {
                panic!("no wheel")
            };
            close(wheel.coupling(0).speed, 1.0 / 0.3, 1e-14);
            assert!(wheel.grip().is_none());
        }
    }

    #[test]
    fn grip_asks_for_the_share() {
        let values = Values::default().with("rolling_radius", Si(0.3)).with("grip", Si(0.6));
        let Ok(Model::Transmission(wheel)) = build(&values) else { panic!("no wheel") };
        assert_eq!(wheel.grip().unwrap().share, Known::Missing("driven_weight_share"));
        let kind = build(&values.with("rolling_diameter", Si(0.6))).unwrap_err().remove(0).kind;
        assert!(matches!(kind, FaultKind::Contradiction { .. }));
    }
}
