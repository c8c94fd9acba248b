//! A load whose torque grows with the square of speed: fan, pump without static head, agitator, propeller.

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
    name: "quadratic",
    title: "load with quadratic torque",
    summary: "Torque grows with the square of speed, power with the cube: agitators, fans and pumps without static head \
              whose flow is not asked for. A fifth more speed asks 44 % more torque and 73 % more power.",
    fields: FIELDS,
    results: &[],
    formulas: &[drag::QUADRATIC, drag::QUADRATIC_FORCE],
    cautions: &[],
    example: "load fan: quadratic { rated_torque = 10 N·m; rated_speed = 1450 rpm; breakaway_torque = 0.8 N·m }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &power::fields(
    positive(
        "torque_coefficient",
        "quadratic_torque_coefficient",
        Need::OneOf,
        range(1e-12, 1e6),
        "torque per square of the speed; instead of a rated point",
    ),
    positive(
        "force_coefficient",
        "quadratic_force_coefficient",
        Need::OneOf,
        range(1e-6, 1e7),
        "force per square of the speed, for a load that runs straight",
    ),
);

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    power::build(values, 2, |law| match law.motion {
        Motion::Rotary => {
            // A coefficient is a rated point at unit speed.
            let speed = law.rated_speed.unwrap_or(1.0);
            vec![("T_r", law.powers.at(speed)), ("w_r", speed)]
        }
        Motion::Linear => vec![("c_v", law.powers.coefficients[2])],
    })
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::{close, rpm};
    use crate::model::Model;
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn through_its_rated_point() {
        let values = Values::default()
            .with("rated_torque", Si(30.0))
            .with("rated_speed", Si(rpm(1450.0)))
            .with("breakaway_torque", Si(2.0));
        let Ok(Model::Load(fan)) = build(&values) else { panic!("no load") };
        close(fan.demand().at(rpm(1740.0)), 30.0 * 1.44, 1e-14);
        close(fan.demand().at(-rpm(725.0)), -7.5, 1e-14);
        assert_eq!(fan.standstill().breakaway_forward, 2.0);
        assert_eq!(fan.usual_speed(), Some(rpm(1450.0)));
    }

    #[test]
    fn power_speed_and_torque_have_to_agree() {
        // 5.44 N·m at 4900 rpm is 2791 W, not 3000 W.
        let values = Values::default()
            .with("rated_torque", Si(5.44))
            .with("rated_speed", Si(rpm(4900.0)))
            .with("rated_power", Si(3000.0));
        let kind = build(&values).unwrap_err().remove(0).kind;
        let FaultKind::Contradiction { how, .. } = kind else { panic!("a contradiction") };
        close(how.quantities[2].0, 2791.41, 1e-6);
        assert!(build(&values.with("rated_power", Si(2790.0))).is_ok());
    }
}
