//! Torque of a source as a polynomial of its speed, up to the square.
//!
//! Formula: `T = c_0 + c_1 * w + c_2 * w^2`.
//! Symbols: T torque (N·m); w speed (rad/s); c_0, c_1, c_2 coefficients of either sign.
//! Validity: in the range of speeds the polynomial was fitted in.
//! Source: closed form.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// The torque.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "c_0 + c_1 * w + c_2 * w^2",
    symbols: &[
        ("c_0", "torque", "torque at standstill"),
        ("c_1", "viscous_torque_coefficient", "torque per speed; below zero where it falls"),
        ("w", "rotational_speed", "speed"),
        ("c_2", "quadratic_torque_coefficient", "torque per square of the speed"),
    ],
    validity: "in the range of speeds the polynomial was fitted in",
    source: "closed form",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &TORQUE,
    domain: &[(0.0, 100.0), (-2.0, 2.0), (0.0, 200.0), (-0.02, 0.02)],
    kernel: |x| TorquePolynomial { coefficients: [x[0], x[1], x[3]] }.eval(x[2]),
}];

/// Coefficients of the speed to the powers 0 to 2.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TorquePolynomial {
    /// N·m, N·m·s, N·m·s².
    pub coefficients: [f64; 3],
}

impl TorquePolynomial {
    /// The highest speed above zero at which the torque falls through zero, if it does.
    #[must_use]
    pub fn no_load_speed(&self) -> Option<f64> {
        let [c, b, a] = self.coefficients;
        let falls = |w: &f64| *w > 0.0 && w.is_finite() && b + 2.0 * a * w < 0.0;
        if a == 0.0 {
            return Some(-c / b).filter(falls);
        }
        let square = b * b - 4.0 * a * c;
        if square < 0.0 {
            return None;
        }
        // The form without a difference of nearly equal numbers.
        let half = -0.5 * (b + square.sqrt().copysign(b));
        let roots = [half / a, if half == 0.0 { f64::NAN } else { c / half }];
        roots.into_iter().find(falls)
    }

    /// The highest torque between standstill and a speed.
    #[must_use]
    pub fn highest(&self, top: f64) -> f64 {
        let [_, b, a] = self.coefficients;
        let turn = -b / (2.0 * a);
        let turn = if turn > 0.0 && turn < top { turn } else { 0.0 };
        [0.0, turn, top].into_iter().map(|w| self.eval(w)).fold(f64::NEG_INFINITY, f64::max)
    }
}

impl Law for TorquePolynomial {
    fn eval<R: Real>(&self, speed: R) -> R {
        let [c, b, a] = self.coefficients;
        speed.square() * a + speed * b + c
    }
}

#[cfg(test)]
mod tests {
    use super::TorquePolynomial;
    use crate::curve::Curve;
    use crate::laws::testing::{close, encloses};
    use core::f64::consts::PI;
    use proptest::prelude::*;

    #[test]
    fn a_source_that_cannot_start() {
        // Closed form: T = 0.01·(60π − w)·w has no torque at 0 and at 60π, most at 30π.
        let source = TorquePolynomial { coefficients: [0.0, 0.6 * PI, -0.01] };
        close(source.no_load_speed().unwrap(), 60.0 * PI, 1e-14);
        close(source.highest(60.0 * PI), 9.0 * PI * PI, 1e-13);
        assert_eq!(source.at(0.0), 0.0);
    }

    #[test]
    fn no_load_speeds() {
        let speed = |coefficients| TorquePolynomial { coefficients }.no_load_speed();
        close(speed([10.0, -0.05, 0.0]).unwrap(), 200.0, 1e-14);
        assert_eq!(speed([0.6, 1.9, 0.0]), None);
        assert_eq!(speed([1.0, 0.0, 0.0]), None);
        assert_eq!(speed([1.0, 0.0, 1.0]), None);
        close(speed([4.0, 0.0, -1.0]).unwrap(), 2.0, 1e-14);
        // Falls through zero at 1, rises again at 3.
        close(speed([3.0, -4.0, 1.0]).unwrap(), 1.0, 1e-14);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(100))]
        #[test]
        fn bounds_hold(
            c in -5.0..5.0f64, b in -1.0..1.0f64, a in -0.1..0.1f64,
            lo in -50.0..50.0f64, width in 0.0..40.0f64, t in 0.0..1.0f64,
        ) {
            encloses(&TorquePolynomial { coefficients: [c, b, a] }, lo, width, t);
        }
    }
}
