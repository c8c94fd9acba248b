//! What the loads share that resist motion with a power of the speed: constant, viscous, quadratic, polynomial.

use crate::curve::Curve;
use crate::fault::Fault;
use crate::kinds::reading::{contradiction, differ, inertia, missing};
use crate::laws::drag::Powers;
use crate::model::{Known, Limit, Load, LoadState, Motion, Standstill};
use crate::values::Values;

/// A load that resists motion in either direction.
#[derive(Debug)]
pub(super) struct Resisting {
    /// How it moves.
    pub motion: Motion,
    /// Effort over the size of the speed.
    pub powers: Powers,
    /// Effort that sets it moving from rest.
    pub breakaway: f64,
    /// Inertia or mass.
    pub inertia: Known,
    /// A speed of the order of its usual one.
    pub usual_speed: Option<f64>,
    /// Limits.
    pub limits: Vec<Limit>,
    /// Symbols of its formula, but for the speed.
    pub symbols: Vec<(&'static str, f64)>,
    /// Whether its formula names the speed.
    pub names_speed: bool,
}

impl Load for Resisting {
    fn motion(&self) -> Motion {
        self.motion
    }

    fn demand(&self) -> Box<dyn Curve> {
        Box::new(self.powers)
    }

    fn standstill(&self) -> Standstill {
        Standstill { holding: 0.0, breakaway_forward: self.breakaway, breakaway_reverse: -self.breakaway }
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn usual_speed(&self) -> Option<f64> {
        self.usual_speed
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }

    fn symbols(&self, state: &LoadState) -> Vec<(&'static str, f64)> {
        let mut out = self.symbols.clone();
        if self.names_speed {
            out.push((if self.motion == Motion::Rotary { "w" } else { "v" }, state.speed));
        }
        out
    }
}

/// Inertia of a load whose motion its fields decide: `inertia` turning, `mass` running straight.
pub(super) fn mass_or_inertia(motion: Motion, values: &Values, faults: &mut Vec<Fault>) -> Known {
    let foreign: &[&'static str] = match motion {
        Motion::Rotary => &["mass"],
        Motion::Linear => &["inertia", "flywheel_effect"],
    };
    for field in foreign.iter().copied().filter(|field| values.get(field).is_some()) {
        let template = "a load that turns has an inertia, one that runs straight has a mass";
        faults.push(contradiction(&[field], template, &[]));
    }
    match motion {
        Motion::Rotary => inertia(values, faults),
        Motion::Linear => Known::of(values.si("mass"), "mass"),
    }
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

/// Reads `rated_torque` or `rated_power` with `rated_speed`, `torque_coefficient` or `force_coefficient`.
pub(super) fn power_law(values: &Values, power: usize, faults: &mut Vec<Fault>) -> Option<PowerLaw> {
    let speed = values.si("rated_speed");
    let torque = match (values.si("rated_torque"), values.si("rated_power"), speed) {
        (Some(torque), Some(given), Some(speed)) if differ(torque * speed, given, 0.02) => {
            faults.push(contradiction(
                &["rated_torque", "rated_power", "rated_speed"],
                "{0} at {1} is {2}, not {3}: which two of torque, power and speed are true?",
                &[
                    (torque, "torque"),
                    (speed, "rotational_speed"),
                    (torque * speed, "mechanical_power"),
                    (given, "mechanical_power"),
                ],
            ));
            return None;
        }
        (Some(torque), _, _) => Some(torque),
        (None, Some(power), Some(speed)) => Some(power / speed),
        _ => None,
    };
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
