//! A person at a crank: a power that can be kept up within a range of cadence.
//!
//! Formula: `T = P / w` between the lowest and the highest cadence, `P / w_1` below, 0 above.
//! Symbols: T torque averaged over a turn (N·m); P sustained power (W); w speed of the crank, w_1 lowest cadence
//! (rad/s).
//! Validity: mean over a turn, an effort as long as the power was given for; who cannot follow a faster crank
//! gives nothing.
//! Source: common practice, no source. The best cadence depends on the effort: 66 rpm at the first lactate threshold to 84 rpm
//! at the highest oxygen uptake, A. K. Dunst, C. Hesse, O. Ueberschär, Front. Physiol. 15 (2024) 1343601.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Torque within the range of cadence.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "P / w",
    symbols: &[("P", "mechanical_power", "sustained power"), ("w", "rotational_speed", "speed of the crank")],
    validity: "between lowest and highest cadence; below, the torque of the lowest; above, none",
    source: "common practice, no source",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &TORQUE,
    domain: &[(10.0, 500.0), (5.0, 10.0)],
    kernel: |x| PersonPower { power: x[0], lowest: 1e-3, highest: 1e9 }.eval(x[1]),
}];

/// A person; `0 < lowest <= highest`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PersonPower {
    /// W
    pub power: f64,
    /// Lowest cadence, rad/s.
    pub lowest: f64,
    /// Highest cadence, rad/s.
    pub highest: f64,
}

impl Law for PersonPower {
    fn eval<R: Real>(&self, speed: R) -> R {
        speed.piecewise(&[self.lowest, self.highest], |piece, speed| match piece {
            0 => R::of(self.power / self.lowest),
            1 => R::of(self.power) / speed,
            _ => R::of(0.0),
        })
    }

    fn jumps(&self) -> Vec<f64> {
        vec![self.highest]
    }

    fn kinks(&self) -> Vec<f64> {
        vec![self.lowest]
    }
}

#[cfg(test)]
mod tests {
    use super::PersonPower;
    use crate::curve::Curve;
    use crate::laws::testing::{close, encloses, rpm};
    use proptest::prelude::*;

    #[test]
    fn power_is_kept_between_the_cadences() {
        let rider = PersonPower { power: 90.0, lowest: rpm(50.0), highest: rpm(90.0) };
        close(rider.at(rpm(70.0)) * rpm(70.0), 90.0, 1e-14);
        close(rider.at(0.0), 90.0 / rpm(50.0), 1e-14);
        assert_eq!(rider.at(rpm(91.0)), 0.0);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(100))]
        #[test]
        fn bounds_hold(lo in -5.0..9.0f64, width in 0.0..5.0f64, t in 0.0..1.0f64) {
            let rider = PersonPower { power: 90.0, lowest: 5.0, highest: 9.5 };
            encloses(&rider, lo, width.min(9.4 - lo), t);
        }
    }
}
