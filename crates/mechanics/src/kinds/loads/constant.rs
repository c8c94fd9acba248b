//! A load that takes the same torque or force at every speed.

use super::fields::{BREAKAWAY_FORCE_INSTEAD, BREAKAWAY_TORQUE_INSTEAD, MASS};
use super::resisting::{Resisting, breakaway};
use crate::fault::Fault;
use crate::kinds::fields::{BREAKAWAY_RATIO, FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, not_negative, range};
use crate::kinds::reading::{done, only_one};
use crate::laws::drag::{self, Powers};
use crate::model::{Model, Motion};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "constant",
    title: "constant load",
    summary: "Resists motion with the same torque (or force) at every speed: friction, reciprocating pumps against a \
              fixed pressure, cutting at a fixed feed. What hangs and can drive back is a hoist, not this.",
    fields: FIELDS,
    results: &[],
    formulas: &[drag::CONSTANT, drag::CONSTANT_FORCE],
    cautions: &[],
    example: "load press_roll: constant { torque = 35 N·m; breakaway_ratio = 1.3; inertia = 0.2 kg·m² }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    not_negative("torque", "torque", Need::OneOf, range(1e-4, 1e8), "torque it takes, turning"),
    not_negative("force", "force", Need::OneOf, range(1e-3, 1e8), "force it takes, running straight"),
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
    let why = "what it takes: a torque if it turns, a force if it runs straight";
    let Some(way) = only_one(values, &["torque", "force"], why, &mut faults) else { return Err(faults) };
    let motion = if way == "torque" { Motion::Rotary } else { Motion::Linear };
    let effort = values.si(way).unwrap_or(0.0);
    let powers = Powers { coefficients: [effort, 0.0, 0.0, 0.0] };
    let load = Resisting {
        breakaway: breakaway(values, motion, effort, &mut faults),
        symbols: vec![(if motion == Motion::Rotary { "T" } else { "F" }, effort)],
        moving: Vec::new(),
        ..Resisting::new(motion, powers, values, &mut faults)
    };
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::model::{Known, Model, Motion};
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn opposes_motion_and_sticks() {
        let values = Values::default().with("torque", Si(30.0)).with("breakaway_ratio", Si(1.5));
        let Ok(Model::Load(load)) = build(&values) else { panic!("no load") };
        let demand = load.demand();
        assert_eq!((demand.at(10.0), demand.at(-10.0)), (30.0, -30.0));
        assert_eq!(demand.jumps(), [0.0]);
        let rest = load.standstill();
        assert_eq!((rest.holding, rest.breakaway_forward, rest.breakaway_reverse), (0.0, 45.0, -45.0));
        assert_eq!(load.inertia(), Known::Missing("inertia"));
    }

    #[test]
    fn a_force_moves_a_mass() {
        let values = Values::default().with("force", Si(200.0)).with("mass", Si(50.0));
        let Ok(Model::Load(load)) = build(&values) else { panic!("no load") };
        assert_eq!((load.motion(), load.inertia()), (Motion::Linear, Known::Value(50.0)));
        assert!(build(&values.with("inertia", Si(1.0))).is_err());
        assert!(build(&Values::default()).is_err());
    }
}
