//! A load whose torque grows evenly with speed.

use super::power;
use crate::fault::Fault;
use crate::kinds::fields::{positive, range};
use crate::laws::drag;
use crate::model::{Model, Motion};
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

static FIELDS: &[Field] = &power::fields(
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
);

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    power::build(values, 1, |law| {
        vec![(if law.motion == Motion::Rotary { "b" } else { "b_v" }, law.powers.coefficients[1])]
    })
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
