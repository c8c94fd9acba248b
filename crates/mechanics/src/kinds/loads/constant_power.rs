//! A load that takes the same power at every speed.

use super::fields::{BREAKAWAY_FORCE_INSTEAD, BREAKAWAY_TORQUE_INSTEAD, MASS};
use super::resisting::{Resisting, breakaway};
use crate::curve::Against;
use crate::fault::Fault;
use crate::kinds::fields::{BREAKAWAY_RATIO, FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, positive, range};
use crate::kinds::reading::{done, only_one};
use crate::laws::bounded_power::{self as law, BoundedPower};
use crate::model::{Model, Motion};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "constant_power",
    title: "load at constant power",
    summary: "Takes the same power at every speed, so that its torque falls as the speed rises: facing at constant cutting \
              speed, winding at constant web speed, a generator whose controller holds its power. Below a bound, which \
              must be given, the torque stays at its most.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::BOUNDED_TORQUE, law::BOUNDED_FORCE],
    cautions: &[],
    example: "load lathe: constant_power { power = 5.5 kW; from_speed = 120 rpm; inertia = 0.3 kg·m² }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive("power", "mechanical_power", Need::Required, range(1e-2, 1e9), "power it takes at its shaft"),
    positive(
        "max_torque",
        "torque",
        Need::OneOf,
        range(1e-4, 1e8),
        "most torque it takes: below the speed where this gives the power it takes no more; instead of from_speed",
    ),
    positive(
        "from_speed",
        "rotational_speed",
        Need::OneOf,
        range(1e-2, 1e4),
        "speed from which it takes the power in full; below it the torque stays as it is there",
    ),
    positive(
        "max_force",
        "force",
        Need::OneOf,
        range(1e-3, 1e8),
        "most force it takes, for a load that runs straight",
    ),
    BREAKAWAY_RATIO,
    BREAKAWAY_TORQUE_INSTEAD,
    BREAKAWAY_FORCE_INSTEAD,
    INERTIA,
    FLYWHEEL_EFFECT,
    MASS,
    MAX_SPEED,
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let why = "at constant power the torque at rest would have no end: say the most it takes, or the speed from which \
               the power holds";
    let ways = ["max_torque", "from_speed", "max_force"];
    let Some(way) = only_one(values, &ways, why, &mut faults) else { return Err(faults) };
    let bound = values.si(way).unwrap_or(1.0);
    let power = values.si("power").unwrap_or(0.0);
    let (motion, most) = match way {
        "max_force" => (Motion::Linear, bound),
        "from_speed" => (Motion::Rotary, power / bound),
        _ => (Motion::Rotary, bound),
    };
    let law = BoundedPower { power, most };
    let load = Resisting {
        breakaway: breakaway(values, motion, most, &mut faults),
        usual_speed: Some(law.corner()),
        symbols: vec![(if motion == Motion::Rotary { "T_max" } else { "F_max" }, most), ("P", power)],
        ..Resisting::new(motion, Against(law), values, &mut faults)
    };
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::model::{Model, Motion};
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn needs_a_bound_and_takes_one() {
        let power = Values::default().with("power", Si(500.0));
        assert!(build(&power).is_err());
        let Ok(Model::Load(load)) = build(&power.clone().with("from_speed", Si(40.0))) else {
            panic!("no load")
        };
        assert_eq!((load.demand().at(20.0), load.demand().at(100.0)), (12.5, 5.0));
        assert_eq!(load.standstill().breakaway_forward, 12.5);
        let Ok(Model::Load(load)) = build(&power.clone().with("max_force", Si(250.0))) else {
            panic!("no load")
        };
        assert_eq!((load.motion(), load.demand().at(4.0)), (Motion::Linear, 125.0));
        assert!(build(&power.with("max_torque", Si(5.0)).with("from_speed", Si(40.0))).is_err());
    }
}
