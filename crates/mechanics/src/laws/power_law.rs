//! A load that grows with any power of the speed.
//!
//! Formula: `T = T_r * (w / w_r)^n`.
//! Symbols: T torque (N·m), T_r at the rated point; w speed (rad/s), w_r at the rated point; n exponent (-).
//! Validity: a fit to measured points holds in their range of speeds. With an exponent of zero the torque is constant,
//! with 1 viscous, with 2 quadratic; below 1 it rises steeply from rest.
//! Source: closed form; exponents of machines are common practice, no source.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Torque by a power of the speed.
pub const POWER_LAW: Formula = Formula {
    name: "torque",
    text: "T_r * (w / w_r)^n",
    symbols: &[
        ("T_r", "torque", "torque at the rated point"),
        ("w", "rotational_speed", "speed"),
        ("w_r", "rotational_speed", "speed at the rated point"),
        ("n", "number", "exponent"),
    ],
    validity: "in the range of speeds the exponent was found in",
    source: "closed form",
    revision: 1,
};

/// The formula with the kernel that must equal it.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &POWER_LAW,
    domain: &[(0.1, 1e4), (1.0, 500.0), (1.0, 500.0), (0.0, 3.0)],
    kernel: |x| PowerLaw { torque: x[0], speed: x[2], exponent: x[3] }.eval(x[1]),
}];

/// Effort over a speed of zero or above.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PowerLaw {
    /// Torque at the rated point.
    pub torque: f64,
    /// Speed of the rated point.
    pub speed: f64,
    /// Exponent, zero or above.
    pub exponent: f64,
}

impl Law for PowerLaw {
    fn eval<R: Real>(&self, speed: R) -> R {
        let ratio = speed / self.speed;
        let power = if self.exponent == 0.0 {
            R::of(1.0)
        } else if self.exponent == 0.5 {
            ratio.sqrt()
        } else {
            ratio.powf(self.exponent)
        };
        power * self.torque
    }
}

#[cfg(test)]
mod tests {
    use super::PowerLaw;
    use crate::curve::{Against, Curve};
    use crate::laws::testing::{close, encloses};
    use proptest::prelude::*;

    #[test]
    fn square_root_of_the_speed() {
        let load = Against(PowerLaw { torque: 2.8, speed: 1.0, exponent: 0.5 });
        close(load.at(0.067_726_360_476_9), 0.728_680_085, 1e-8);
        close(load.at(-4.0), -5.6, 1e-14);
        assert!(load.jumps().is_empty());
    }

    proptest! {
        #[test]
        fn bounds_hold(
            exponent in 0.0..3.0f64, lo in 0.01..400.0f64, width in 0.0..200.0f64, t in 0.0..1.0f64,
        ) {
            encloses(&PowerLaw { torque: 30.0, speed: 100.0, exponent }, lo, width, t);
        }
    }
}
