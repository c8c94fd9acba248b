//! The envelope of a servo or field-weakened drive: constant torque, then constant power, then nothing.
//!
//! Formula: `T = T_c` up to the corner speed, `T_c * w_c / w` above it, 0 beyond the highest speed.
//! Symbols: T torque (N·m); T_c torque below the corner (N·m); w speed, w_c corner speed (rad/s).
//! Validity: one envelope for peak (seconds, limited by the drive's current) and one for rated (continuous, limited by
//! warmth). The drive's electronics cut off beyond the highest speed: there it neither drives nor brakes.
//! Source: common practice, no source.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Torque above the corner speed.
pub const FIELD_WEAKENING: Formula = Formula {
    name: "torque_above_corner",
    text: "T_c * w_c / w",
    symbols: &[
        ("T_c", "torque", "torque up to the corner speed"),
        ("w_c", "rotational_speed", "corner speed, where field weakening begins"),
        ("w", "rotational_speed", "speed"),
    ],
    validity: "from the corner speed to the highest speed",
    source: "common practice, no source",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &FIELD_WEAKENING,
    domain: &[(0.1, 1e3), (10.0, 100.0), (100.0, 500.0)],
    kernel: |x| Envelope { torque: x[0], corner: x[1], highest: 1e9 }.eval(x[2]),
}];

/// One envelope; `0 < corner <= highest`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Envelope {
    /// Torque up to the corner speed, N·m.
    pub torque: f64,
    /// Corner speed, rad/s.
    pub corner: f64,
    /// Highest speed, rad/s.
    pub highest: f64,
}

impl Law for Envelope {
    fn eval<R: Real>(&self, speed: R) -> R {
        let breaks = [-self.highest, -self.corner, self.corner, self.highest];
        let power = self.torque * self.corner;
        speed.piecewise(&breaks, |piece, speed| match piece {
            1 => -(R::of(power) / speed),
            2 => R::of(self.torque),
            3 => R::of(power) / speed,
            _ => R::of(0.0),
        })
    }

    fn jumps(&self) -> Vec<f64> {
        vec![-self.highest, self.highest]
    }

    fn kinks(&self) -> Vec<f64> {
        vec![-self.corner, self.corner]
    }
}

#[cfg(test)]
mod tests {
    use super::Envelope;
    use crate::curve::Curve;
    use crate::laws::testing::{close, encloses};
    use proptest::prelude::*;

    const SERVO: Envelope = Envelope { torque: 12.0, corner: 300.0, highest: 600.0 };

    #[test]
    fn corners() {
        close(SERVO.at(0.0), 12.0, 1e-15);
        close(SERVO.at(300.0), 12.0, 1e-15);
        close(SERVO.at(450.0) * 450.0, 3600.0, 1e-14);
        close(SERVO.at(-450.0) * 450.0, 3600.0, 1e-14);
        assert_eq!(SERVO.at(600.1), 0.0);
    }

    #[test]
    fn without_field_weakening() {
        let plain = Envelope { torque: 12.0, corner: 300.0, highest: 300.0 };
        assert_eq!(plain.at(299.9), 12.0);
        assert_eq!(plain.at(300.1), 0.0);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(200))]
        #[test]
        fn bounds_hold(lo in -599.0..599.0f64, width in 0.0..400.0f64, t in 0.0..1.0f64) {
            encloses(&SERVO, lo, width.min(599.9 - lo), t);
        }
    }
}
