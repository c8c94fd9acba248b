//! What the loads share that go by one power of the speed: by a rated point, or by their coefficient.

use super::fields::{BREAKAWAY_FORCE, BREAKAWAY_TORQUE, MASS, RATED_POWER, RATED_SPEED, RATED_TORQUE};
use super::resisting::{Resisting, breakaway};
use crate::fault::Fault;
use crate::kinds::fields::{FLYWHEEL_EFFECT, INERTIA, MAX_SPEED};
use crate::kinds::reading::{contradiction, differ, done, missing};
use crate::laws::drag::Powers;
use crate::model::{Model, Motion};
use crate::registry::Field;
use crate::values::Values;

/// The fields of such a load around its two coefficients.
pub(super) const fn fields(torque_coefficient: Field, force_coefficient: Field) -> [Field; 11] {
    [
        RATED_TORQUE,
        RATED_POWER,
        RATED_SPEED,
        torque_coefficient,
        force_coefficient,
        BREAKAWAY_TORQUE,
        BREAKAWAY_FORCE,
        INERTIA,
        FLYWHEEL_EFFECT,
        MASS,
        MAX_SPEED,
    ]
}

/// A single power of speed through a rated point or by its coefficient.
pub(super) struct PowerLaw {
    /// How it moves.
    pub motion: Motion,
    /// The law.
    pub powers: Powers,
    /// The rated speed, where one is given.
    pub rated_speed: Option<f64>,
}

/// The torque of a rated point said by torque or power; with a speed, both must agree.
pub(super) fn rated_torque(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    match (values.si("rated_torque"), values.si("rated_power"), values.si("rated_speed")) {
        (Some(torque), Some(power), Some(speed)) if differ(torque * speed, power, 0.02) => {
            faults.push(contradiction(
                &["rated_torque", "rated_power", "rated_speed"],
                "{0} at {1} is {2}, not {3}: which two of torque, power and speed are true?",
                &[
                    (torque, "torque"),
                    (speed, "rotational_speed"),
                    (torque * speed, "mechanical_power"),
                    (power, "mechanical_power"),
                ],
            ));
            None
        }
        (Some(torque), _, _) => Some(torque),
        (None, Some(power), Some(speed)) => Some(power / speed),
        _ => None,
    }
}

/// Reads `rated_torque` or `rated_power` with `rated_speed`, `torque_coefficient` or `force_coefficient`.
fn power_law(values: &Values, power: usize, faults: &mut Vec<Fault>) -> Option<PowerLaw> {
    let speed = values.si("rated_speed");
    let before = faults.len();
    let torque = rated_torque(values, faults);
    if faults.len() > before {
        return None;
    }
    let coefficient = |motion, value| {
        let mut powers = Powers::default();
        powers.coefficients[power] = value;
        Some(PowerLaw { motion, powers, rated_speed: speed })
    };
    match (torque, speed, values.si("torque_coefficient"), values.si("force_coefficient")) {
        (Some(torque), Some(speed), None, None) => {
            let powers = Powers::through(power, speed, torque);
            Some(PowerLaw { motion: Motion::Rotary, powers, rated_speed: Some(speed) })
        }
        (None, None, Some(value), None) => coefficient(Motion::Rotary, value),
        (None, None, None, Some(value)) => coefficient(Motion::Linear, value),
        (_, _, None, None) => {
            let choices: [&[&'static str]; 4] = [
                &["rated_torque", "rated_speed"],
                &["rated_power", "rated_speed"],
                &["torque_coefficient"],
                &["force_coefficient"],
            ];
            faults.push(missing(&choices, "one rated point, or one coefficient, settles the curve"));
            None
        }
        _ => {
            let ways =
                ["rated_torque", "rated_power", "rated_speed", "torque_coefficient", "force_coefficient"];
            let given: Vec<&'static str> = ways.into_iter().filter(|way| values.get(way).is_some()).collect();
            faults.push(contradiction(
                &given,
                "a rated point or one coefficient settles the curve; keep one",
                &[],
            ));
            None
        }
    }
}

/// Builds such a load; `symbols` gives those of its formulas but for the speed.
pub(super) fn build(
    values: &Values,
    power: usize,
    symbols: impl Fn(&PowerLaw) -> Vec<(&'static str, f64)>,
) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some(law) = power_law(values, power, &mut faults) else { return Err(faults) };
    let load = Resisting {
        breakaway: breakaway(values, law.motion, 0.0, &mut faults),
        usual_speed: law.rated_speed,
        symbols: symbols(&law),
        ..Resisting::new(law.motion, law.powers, values, &mut faults)
    };
    done(Model::Load(Box::new(load)), faults)
}
