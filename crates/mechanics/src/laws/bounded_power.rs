//! A load that takes the same power at every speed, within a bound on its torque.
//!
//! Formula: `T = min(T_max, P / w)`, `F = min(F_max, P / v)`.
//! Symbols: T torque (N·m), F force (N); P power at its shaft (W); w speed (rad/s), v speed (m/s); T_max, F_max the most
//! it takes, below the speed P / T_max.
//! Validity: above that speed the torque falls as the speed rises, so that against a source that falls more slowly the
//! operating point is unstable; without the bound the torque at rest would have no end.
//! Source: definition of power; closed form.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Torque at constant power.
pub const BOUNDED_TORQUE: Formula = Formula {
    name: "torque",
    text: "min(T_max, P / w)",
    symbols: &[
        ("T_max", "torque", "most torque it takes"),
        ("P", "mechanical_power", "power it takes"),
        ("w", "rotational_speed", "speed"),
    ],
    validity: "turning; at rest the breakaway ratio times T_max sets it moving",
    source: "definition of power",
    revision: 1,
};

/// The same for a load that runs straight.
pub const BOUNDED_FORCE: Formula = Formula {
    name: "force",
    text: "min(F_max, P / v)",
    symbols: &[
        ("F_max", "force", "most force it takes"),
        ("P", "mechanical_power", "power it takes"),
        ("v", "speed", "speed"),
    ],
    validity: "moving; at rest the breakaway ratio times F_max sets it moving",
    source: "definition of power",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked { formula: &BOUNDED_TORQUE, domain: &[(1.0, 100.0), (10.0, 1e4), (1.0, 500.0)], kernel },
    Checked { formula: &BOUNDED_FORCE, domain: &[(1.0, 1e4), (10.0, 1e4), (0.01, 20.0)], kernel },
];

fn kernel(x: &[f64]) -> f64 {
    BoundedPower { power: x[1], most: x[0] }.eval(x[2])
}

/// Effort over a speed of zero or above.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BoundedPower {
    /// W
    pub power: f64,
    /// The most effort it takes.
    pub most: f64,
}

impl BoundedPower {
    /// The speed from which the power is taken in full.
    #[must_use]
    pub fn corner(&self) -> f64 {
        self.power / self.most
    }
}

impl Law for BoundedPower {
    fn eval<R: Real>(&self, speed: R) -> R {
        speed.piecewise(&[self.corner()], |piece, speed| {
            if piece == 0 { R::of(self.most) } else { R::of(self.power) / speed }
        })
    }

    fn kinks(&self) -> Vec<f64> {
        vec![self.corner()]
    }
}

#[cfg(test)]
mod tests {
    use super::BoundedPower;
    use crate::curve::{Against, Curve};
    use crate::laws::testing::{close, encloses};
    use proptest::prelude::*;

    #[test]
    fn same_power_from_the_corner_on() {
        // Closed form: 500 W are 2.7639 N·m at 180.9 rad/s.
        let load = Against(BoundedPower { power: 500.0, most: 12.5 });
        close(load.at(180.901_699_437_5), 2.763_932_022_5, 1e-10);
        assert_eq!((load.at(10.0), load.at(-10.0)), (12.5, -12.5));
        assert_eq!(load.jumps(), [0.0]);
        assert_eq!(load.kinks(), [-40.0, 0.0, 40.0]);
    }

    proptest! {
        #[test]
        fn bounds_hold(
            power in 1.0..1e4f64, most in 0.5..200.0f64, lo in 0.01..400.0f64, width in 0.0..200.0f64, t in 0.0..1.0f64,
        ) {
            encloses(&BoundedPower { power, most }, lo, width, t);
        }
    }
}
