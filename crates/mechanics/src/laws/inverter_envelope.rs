//! What an induction motor on an inverter gives at the most: constant flux up to its rated frequency, weakened field above.
//!
//! Formula: breakdown torque `T_b` up to the speed of breakdown at rated frequency, `T_b * (w_s / (w + s_b * w_s))^2` above; with
//! a limit of the inverter `T_m` up to the rated speed and `T_m * w_n / w` above, whichever is less.
//! Symbols: T_b breakdown torque (N·m), s_b its slip at rated frequency (-); w_s synchronous speed at rated frequency
//! (rad/s); w speed (rad/s); T_m torque the inverter's current allows (N·m); w_n rated speed (rad/s).
//! Validity: the inverter makes up for the drop in the stator's resistance at low frequency; voltage in proportion to the
//! frequency up to the rated one, constant above.
//! Source: closed form of Kloss's formula with the flux as voltage over frequency; the limit is common practice, no source.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Breakdown in the weakened field.
pub const WEAKENED: Formula = Formula {
    name: "breakdown_torque_in_weakened_field",
    text: "T_b * (w_s / (w + s_b * w_s))^2",
    symbols: &[
        ("T_b", "torque", "breakdown torque"),
        ("w_s", "rotational_speed", "synchronous speed at rated frequency"),
        ("w", "rotational_speed", "speed"),
        ("s_b", "percentage", "slip at breakdown, at rated frequency"),
    ],
    validity: "above the speed of breakdown at rated frequency",
    source: "closed form of Kloss's formula with the flux as voltage over frequency",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &WEAKENED,
    domain: &[(1.0, 1e3), (100.0, 160.0), (160.0, 500.0), (0.05, 0.3)],
    kernel: |x| {
        let bare = InverterEnvelope { breakdown: x[0], field: x[1], slip: x[3], limit: None, highest: 1e9 };
        bare.eval(x[2])
    },
}];

/// The most torque over the speed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct InverterEnvelope {
    /// Breakdown torque at rated frequency, N·m.
    pub breakdown: f64,
    /// Synchronous speed at rated frequency, rad/s.
    pub field: f64,
    /// Slip at breakdown, at rated frequency.
    pub slip: f64,
    /// Torque the inverter allows, N·m, and the speed up to which it does, rad/s.
    pub limit: Option<(f64, f64)>,
    /// Highest speed, rad/s.
    pub highest: f64,
}

impl InverterEnvelope {
    /// The speed from which the field weakens.
    #[must_use]
    pub fn corner(&self) -> f64 {
        self.field * (1.0 - self.slip)
    }

    fn ahead<R: Real>(&self, speed: R) -> R {
        let breakdown = speed.piecewise(&[self.corner()], |piece, w| {
            if piece == 0 {
                R::of(self.breakdown)
            } else {
                (R::of(self.field) / (w + self.slip * self.field)).square() * self.breakdown
            }
        });
        let Some((torque, corner)) = self.limit else { return breakdown };
        let allowed =
            speed.piecewise(
                &[corner],
                |piece, w| {
                    if piece == 0 { R::of(torque) } else { R::of(torque * corner) / w }
                },
            );
        breakdown.min(allowed)
    }
}

impl Law for InverterEnvelope {
    fn eval<R: Real>(&self, speed: R) -> R {
        // Turned backwards it pushes with the same torque.
        speed.abs().piecewise(&[self.highest], |piece, w| if piece == 0 { self.ahead(w) } else { R::of(0.0) })
    }

    fn jumps(&self) -> Vec<f64> {
        vec![-self.highest, self.highest]
    }

    fn kinks(&self) -> Vec<f64> {
        let mut kinks = vec![-self.corner(), self.corner()];
        kinks.extend(self.limit.iter().flat_map(|(_, corner)| [-corner, *corner]));
        kinks.sort_by(f64::total_cmp);
        kinks
    }
}

#[cfg(test)]
mod tests {
    use super::InverterEnvelope;
    use crate::curve::Curve;
    use crate::laws::testing::{close, encloses};
    use proptest::prelude::*;

    fn drive(limit: Option<(f64, f64)>) -> InverterEnvelope {
        InverterEnvelope { breakdown: 70.0, field: 157.0, slip: 0.2, limit, highest: 500.0 }
    }

    #[test]
    fn flux_constant_then_weakened() {
        // Closed form: at twice the synchronous speed of breakdown a quarter of the torque.
        let bare = drive(None);
        close(bare.at(50.0), 70.0, 1e-15);
        close(bare.at(bare.corner()), 70.0, 1e-12);
        close(bare.at(2.0 * 157.0 - 0.2 * 157.0), 70.0 / 4.0, 1e-12);
        let limited = drive(Some((40.0, 150.0)));
        close(limited.at(100.0), 40.0, 1e-15);
        close(limited.at(200.0), 30.0, 1e-12);
        assert_eq!(limited.at(501.0), 0.0);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(100))]
        #[test]
        fn bounds_hold(
            limit in proptest::option::of((5.0..80.0f64, 100.0..200.0f64)),
            lo in -450.0..450.0f64, width in 0.0..100.0f64, t in 0.0..1.0f64,
        ) {
            encloses(&drive(limit), lo, width.min(499.0 - lo), t);
        }
    }
}
