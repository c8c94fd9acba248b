//! A load whose torque grows evenly with speed.

use super::fields::{BREAKAWAY_FORCE, BREAKAWAY_TORQUE, MASS, RATED_POWER, RATED_SPEED, RATED_TORQUE};
use super::resisting::{Resisting, mass_or_inertia, power_law};
use crate::fault::Fault;
use crate::kinds::fields::{FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, positive, range};
use crate::kinds::reading::{done, limits};
use crate::laws::drag;
use crate::model::{LimitOn, Model, Motion};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "viscous",
    title: "viscous load",
    summary: "Resists motion in step with speed: laminar friction, calenders, stirrers in thick liquids, a generator on \
              a resistor. By one rated point or by its coefficient.",
    fields: FIELDS,
    results: &[],
    formulas: &[drag::VISCOUS, drag::VISCOUS_FORCE],
    cautions: &[],
    example: "load stirrer: viscous { rated_torque = 12 N·m; rated_speed = 180 rpm }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    RATED_TORQUE,
    RATED_POWER,
    RATED_SPEED,
    positive(
        "torque_coefficient",
        "viscous_torque_coefficient",
        Need::OneOf,
        range(1e-8, 1e6),
        "torque per speed; instead of a rated point",
    ),
    positive(
        "force_coefficient",
        "viscous_force_coefficient",
        Need::OneOf,
        range(1e-6, 1e7),
        "force per speed, for a load that runs straight",
    ),
    BREAKAWAY_TORQUE,
    BREAKAWAY_FORCE,
    INERTIA,
    FLYWHEEL_EFFECT,
    MASS,
    MAX_SPEED,
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some(law) = power_law(values, 1, &mut faults) else { return Err(faults) };
    let breakaway = if law.motion == Motion::Rotary { "breakaway_torque" } else { "breakaway_force" };
    let load = Resisting {
        motion: law.motion,
        powers: law.powers,
        breakaway: values.si(breakaway).unwrap_or(0.0),
        inertia: mass_or_inertia(law.motion, values, &mut faults),
        usual_speed: law.rated_speed,
        limits: limits(values, &[("max_speed", LimitOn::InputSpeed)]),
        symbols: vec![(if law.motion == Motion::Rotary { "b" } else { "b_v" }, law.powers.coefficients[1])],
        names_speed: true,
    };
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::{Model, Motion};
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn through_its_rated_point_both_ways() {
        let values = Values::default().with("rated_power", Si(200.0)).with("rated_speed", Si(20.0));
        let Ok(Model::Load(load)) = build(&values) else { panic!("no load") };
        close(load.demand().at(20.0), 10.0, 1e-14);
        close(load.demand().at(-10.0), -5.0, 1e-14);
        assert_eq!(load.standstill().breakaway_forward, 0.0);
    }

    #[test]
    fn by_force() {
        let Ok(Model::Load(load)) = build(&Values::default().with("force_coefficient", Si(3.0))) else {
            panic!("no load")
        };
        assert_eq!((load.motion(), load.demand().at(2.0)), (Motion::Linear, 6.0));
    }

    #[test]
    fn one_way_to_say_it() {
        let half = Values::default().with("rated_torque", Si(10.0));
        assert!(build(&half).is_err());
        let twice = half.with("rated_speed", Si(20.0)).with("torque_coefficient", Si(0.5));
        assert!(build(&twice).is_err());
    }
}
