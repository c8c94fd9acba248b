//! A load that is a polynomial in speed.

use super::fields::{BREAKAWAY_FORCE_INSTEAD, BREAKAWAY_TORQUE_INSTEAD, MASS};
use super::resisting::{Resisting, breakaway};
use crate::fault::Fault;
use crate::kinds::fields::{
    BREAKAWAY_RATIO, FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, not_negative, quantity, range,
};
use crate::kinds::reading::{contradiction, done, missing};
use crate::laws::drag::{self, Powers};
use crate::model::{Model, Motion};
use crate::registry::{Bounds, Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "polynomial",
    title: "polynomial load",
    summary: "A constant, a viscous and a quadratic part together: a machine measured while coasting down, a vehicle by \
              its coast-down numbers. All parts resist motion in either direction.",
    fields: FIELDS,
    results: &[],
    formulas: &[drag::POLYNOMIAL, drag::POLYNOMIAL_FORCE],
    cautions: &[],
    example: "load mill: polynomial { constant_torque = 4 N·m; viscous_torque = 0.02 N·m/(rad/s); inertia = 1.2 kg·m² }",
    build,
    given: |_| Vec::new(),
};

const ANY: Bounds = Bounds::ANY;

static FIELDS: &[Field] = &[
    not_negative("constant_torque", "torque", Need::OneOf, range(0.0, 1e8), "torque at every speed"),
    quantity(
        "viscous_torque",
        "viscous_torque_coefficient",
        Need::OneOf,
        ANY,
        range(0.0, 1e7),
        "torque per speed",
    ),
    quantity(
        "quadratic_torque",
        "quadratic_torque_coefficient",
        Need::OneOf,
        ANY,
        range(0.0, 1e7),
        "torque per square of the speed",
    ),
    not_negative(
        "constant_force",
        "force",
        Need::OneOf,
        range(0.0, 1e8),
        "force at every speed, running straight",
    ),
    quantity(
        "viscous_force",
        "viscous_force_coefficient",
        Need::OneOf,
        ANY,
        range(0.0, 1e8),
        "force per speed",
    ),
    quantity(
        "quadratic_force",
        "quadratic_force_coefficient",
        Need::OneOf,
        ANY,
        range(0.0, 1e8),
        "force per square of the speed",
    ),
    quantity(
        "cubic_force",
        "cubic_force_coefficient",
        Need::OneOf,
        ANY,
        range(0.0, 1e8),
        "force per cube of the speed",
    ),
    BREAKAWAY_RATIO,
    BREAKAWAY_TORQUE_INSTEAD,
    BREAKAWAY_FORCE_INSTEAD,
    INERTIA,
    FLYWHEEL_EFFECT,
    MASS,
    MAX_SPEED,
];

const TORQUES: [&str; 3] = ["constant_torque", "viscous_torque", "quadratic_torque"];
const FORCES: [&str; 4] = ["constant_force", "viscous_force", "quadratic_force", "cubic_force"];

/// The motion the parts belong to; torques and forces do not mix.
fn motion(values: &Values, faults: &mut Vec<Fault>) -> Option<Motion> {
    let given = |names: &[&'static str]| -> Vec<&'static str> {
        names.iter().copied().filter(|name| values.get(name).is_some()).collect()
    };
    match (given(&TORQUES).as_slice(), given(&FORCES).as_slice()) {
        ([_, ..], []) => return Some(Motion::Rotary),
        ([], [_, ..]) => return Some(Motion::Linear),
        ([], []) => {
            let why = "at least one part: torques if it turns, forces if it runs straight";
            faults.push(missing(&[&["constant_torque"], &["viscous_torque"], &["constant_force"]], why));
        }
        (torques, forces) => {
            let both = [torques, forces].concat();
            faults.push(contradiction(
                &both,
                "a load turns or runs straight; torques and forces do not mix",
                &[],
            ));
        }
    }
    None
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some(motion) = motion(values, &mut faults) else { return Err(faults) };
    let names: &[&str] = if motion == Motion::Rotary { &TORQUES } else { &FORCES };
    let mut powers = Powers::default();
    for (coefficient, name) in powers.coefficients.iter_mut().zip(names) {
        *coefficient = values.si(name).unwrap_or(0.0);
    }
    let symbols: &[&'static str] = match motion {
        Motion::Rotary => &["c_0", "c_1", "c_2"],
        Motion::Linear => &["F_0", "F_1", "F_2", "F_3"],
    };
    let load = Resisting {
        breakaway: breakaway(values, motion, powers.coefficients[0], &mut faults),
        symbols: symbols.iter().copied().zip(powers.coefficients).collect(),
        ..Resisting::new(motion, powers, values, &mut faults)
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
    fn parts_add_up() {
        let values = Values::default()
            .with("constant_force", Si(12.0))
            .with("quadratic_force", Si(0.25))
            .with("cubic_force", Si(0.01));
        let Ok(Model::Load(load)) = build(&values) else { panic!("no load") };
        assert_eq!(load.motion(), Motion::Linear);
        close(load.demand().at(10.0), 12.0 + 25.0 + 10.0, 1e-14);
        close(load.demand().at(-10.0), -47.0, 1e-14);
        assert_eq!(load.standstill().breakaway_reverse, -12.0);
    }

    #[test]
    fn torques_and_forces_do_not_mix() {
        let values = Values::default().with("constant_force", Si(12.0));
        assert!(build(&values.with("viscous_torque", Si(1.0))).is_err());
        assert!(build(&Values::default()).is_err());
    }
}
