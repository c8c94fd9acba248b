//! Torque of an induction motor over its whole speed range, from the name plate and the catalogue's ratios.
//!
//! Formula: Kloss's curve through the rated point, `K(s)`, from breakdown on and above the synchronous speed; between
//! pull-up and breakdown `T_u + (T_b - T_u) * (K(s) - K(s_u)) / (T_b - K(s_u))`; a straight line from pull-up
//! to standstill; all times `((U / U_n) / (f / f_n))^2`.
//! Symbols: s slip speed over rated synchronous speed (the rotor's frequency over the rated frequency) (-); T_b, T_u,
//! T_l breakdown, pull-up and locked-rotor torque (N·m); s_b, s_u slip at breakdown and pull-up (-); U, U_n supply
//! and rated voltage (V); f, f_n supply and rated frequency (Hz).
//! Validity: the shape between the catalogue's points is an assumption (it meets each of them and Kloss's curve
//! without a kink at breakdown); direct on line; the stator's resistance is left aside, so the law does not hold far
//! below rated frequency.
//! Source: Kloss's formula; torque by the square of the voltage and pull-up, breakdown, locked-rotor torque as IEC
//! 60034-12 (from memory); the stretch is common practice, no source.
//! Revision: 1

use super::{Checked, kloss};
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// What another voltage does.
pub const VOLTAGE: Formula = Formula {
    name: "torque_at_voltage",
    text: "T * (U / U_n)^2",
    symbols: &[
        ("T", "torque", "torque at rated voltage"),
        ("U", "voltage", "voltage of the supply"),
        ("U_n", "voltage", "rated voltage"),
    ],
    validity: "iron not saturated: at 90 % voltage 81 % of the torque, in star instead of delta one third",
    source: "IEC 60034-12 (from memory), closed form of the equivalent circuit",
    revision: 1,
};

/// The curve between pull-up and breakdown.
pub const STRETCHED: Formula = Formula {
    name: "torque_below_breakdown",
    text: "T_u + (T_b - T_u) * (K - K_u) / (T_b - K_u)",
    symbols: &[
        ("T_u", "torque", "pull-up torque, or locked-rotor torque where no pull-up is given"),
        ("T_b", "torque", "breakdown torque"),
        ("K", "torque", "Kloss's formula at this slip"),
        ("K_u", "torque", "Kloss's formula at the slip of the pull-up torque"),
    ],
    validity: "an assumed shape through the catalogue's points",
    source: "common practice, no source",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &VOLTAGE,
        domain: &[(0.1, 1e4), (100.0, 800.0), (100.0, 800.0)],
        kernel: |x| x[0] * flux_factor(x[1], x[2], 50.0, 50.0),
    },
    Checked {
        formula: &STRETCHED,
        domain: &[(1.0, 20.0), (40.0, 80.0), (20.0, 40.0), (1.0, 20.0)],
        kernel: |x| stretched(x[0], x[1], x[2], x[3]),
    },
];

/// Factor on the torque at another voltage and frequency: the square of the flux.
#[must_use]
pub fn flux_factor(voltage: f64, rated_voltage: f64, frequency: f64, rated_frequency: f64) -> f64 {
    let flux = (voltage / rated_voltage) / (frequency / rated_frequency);
    flux * flux
}

/// A Kloss curve value moved so that `from` becomes `low` and breakdown stays.
fn stretched<R: Real>(low: f64, breakdown: f64, value: R, from: f64) -> R {
    (value - from) * ((breakdown - low) / (breakdown - from)) + low
}

/// A point of a catalogue curve below breakdown.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CataloguePoint {
    /// Slip at rated frequency.
    pub slip: f64,
    /// N·m at rated voltage and frequency.
    pub torque: f64,
}

/// The whole curve at one voltage and frequency.
#[derive(Clone, Debug, PartialEq)]
pub struct InductionCurve {
    /// Synchronous speed at the supply's frequency, rad/s.
    pub field_speed: f64,
    /// Synchronous speed at rated frequency, rad/s.
    pub rated_field_speed: f64,
    /// N·m, rated voltage and frequency.
    pub breakdown: CataloguePoint,
    /// Torque at standstill, where the catalogue gives one; slip 1.
    pub locked_rotor: Option<f64>,
    /// The lowest torque on the way up, where the catalogue gives one.
    pub pull_up: Option<CataloguePoint>,
    /// Factor on every torque, from [`flux_factor`].
    pub factor: f64,
}

impl InductionCurve {
    fn kloss<R: Real>(&self, slip: R) -> R {
        kloss::torque(self.breakdown.torque, self.breakdown.slip, slip)
    }

    /// Torque over slip at rated voltage and frequency.
    pub fn over_slip<R: Real>(&self, slip: R) -> R {
        let Some(locked) = self.locked_rotor else { return self.kloss(slip) };
        let low = self.pull_up.unwrap_or(CataloguePoint { slip: 1.0, torque: locked });
        let below = |slip: R| {
            let from = kloss::torque(self.breakdown.torque, self.breakdown.slip, low.slip);
            if self.breakdown.torque - from > 0.0 {
                stretched(low.torque, self.breakdown.torque, self.kloss(slip), from)
            } else {
                R::of(self.breakdown.torque)
            }
        };
        let rise = if low.slip < 1.0 { (locked - low.torque) / (1.0 - low.slip) } else { 0.0 };
        let beyond = locked / kloss::torque(self.breakdown.torque, self.breakdown.slip, 1.0);
        slip.piecewise(&[self.breakdown.slip, low.slip, 1.0], |piece, slip| match piece {
            0 => self.kloss(slip),
            1 => below(slip),
            2 => (slip - low.slip) * rise + low.torque,
            _ => self.kloss(slip) * beyond,
        })
    }

    /// The speed (rad/s) at a slip, at the supply's frequency.
    #[must_use]
    pub fn speed_at(&self, slip: f64) -> f64 {
        self.field_speed - slip * self.rated_field_speed
    }
}

impl Law for InductionCurve {
    fn eval<R: Real>(&self, speed: R) -> R {
        let slip = (-speed + self.field_speed) / self.rated_field_speed;
        self.over_slip(slip) * self.factor
    }

    fn kinks(&self) -> Vec<f64> {
        let mut slips = vec![1.0];
        slips.extend(self.pull_up.map(|point| point.slip));
        slips.push(self.breakdown.slip);
        slips.into_iter().map(|slip| self.speed_at(slip)).collect()
    }
}

#[cfg(test)]
mod tests {
    use super::{CataloguePoint, InductionCurve, flux_factor};
    use crate::curve::Curve;
    use crate::laws::testing::{close, encloses, rpm};
    use crate::laws::{kloss, synchronous};
    use proptest::prelude::*;

    /// An invented motor: 4 kW, 1440 rpm, 50 Hz, four poles, 2.3, 1.9 and 2.9 times rated torque.
    fn hoist_motor() -> (InductionCurve, f64) {
        let rated = synchronous::rated_torque(4000.0, rpm(1440.0));
        let breakdown = CataloguePoint { slip: kloss::breakdown_slip(0.04, 2.9), torque: 2.9 * rated };
        let curve = InductionCurve {
            field_speed: rpm(1500.0),
            rated_field_speed: rpm(1500.0),
            breakdown,
            locked_rotor: Some(2.3 * rated),
            pull_up: Some(CataloguePoint { slip: 0.8, torque: 1.9 * rated }),
            factor: 1.0,
        };
        (curve, rated)
    }

    #[test]
    fn meets_the_plate_and_the_catalogue() {
        let (curve, rated) = hoist_motor();
        close(curve.at(0.0), 2.3 * rated, 1e-12);
        close(curve.at(rpm(300.0)), 1.9 * rated, 1e-12);
        close(curve.at(curve.speed_at(curve.breakdown.slip)), 2.9 * rated, 1e-12);
        close(curve.at(rpm(1440.0)), rated, 1e-12);
        assert_eq!(curve.at(rpm(1500.0)), 0.0);
        close(curve.at(rpm(1560.0)), -rated, 1e-12);
    }

    #[test]
    fn hand_values_of_a_hoist() {
        // By hand, Kloss's formula: 23.55 N·m at 1447.1 rpm, 18.81 N·m braking at 1541.9 rpm.
        let (curve, _) = hoist_motor();
        close(curve.at(rpm(1447.1)), 23.55, 3e-3);
        close(curve.at(rpm(1541.9)), -18.81, 3e-3);
    }

    #[test]
    fn torque_goes_by_the_square_of_the_voltage() {
        close(flux_factor(360.0, 400.0, 50.0, 50.0), 0.81, 1e-14);
        let star = 400.0 / 3.0_f64.sqrt();
        close(flux_factor(star, 400.0, 50.0, 50.0), 1.0 / 3.0, 1e-14);
        close(flux_factor(240.0, 400.0, 30.0, 50.0), 1.0, 1e-14);
    }

    #[test]
    fn breakdown_at_standstill_is_level() {
        let curve = InductionCurve {
            field_speed: 100.0,
            rated_field_speed: 100.0,
            breakdown: CataloguePoint { slip: 1.0, torque: 30.0 },
            locked_rotor: Some(30.0),
            pull_up: None,
            factor: 1.0,
        };
        close(curve.at(0.0), 30.0, 1e-12);
        assert!(curve.at(-50.0) < 30.0);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(200))]
        #[test]
        fn pull_up_is_the_lowest_torque_on_the_way_up(t in 0.0..1.0f64) {
            let (curve, rated) = hoist_motor();
            let top = curve.speed_at(curve.breakdown.slip);
            prop_assert!(curve.at(t * top) >= 1.9 * rated * (1.0 - 1e-12));
            prop_assert!(curve.at(t * top) <= 2.9 * rated * (1.0 + 1e-12));
        }

        #[test]
        fn bounds_hold(lo in -100.0..300.0f64, width in 0.0..80.0f64, t in 0.0..1.0f64) {
            encloses(&hoist_motor().0, lo, width, t);
        }
    }
}
