//! What a dc machine gives at full command, by everything that bounds it.
//!
//! Formula: `T = k_T * I - T_0` with the least of the currents: at full voltage `(U_0 - k_E * w) / (R + R_s)`; at
//! the supply's limit the root of `R * I^2 + k_E * w * I = (U_0 - R_s * I_s) * I_s`; the motor's own limit.
//! Symbols: as in `dc_machine`; I current of the motor (A); I_s most current of the supply for this machine (A).
//! Validity: a current limit of the motor means a controller that lowers the motor's voltage without loss and
//! cannot raise it above the supply's; without one, motor and supply carry the same current. Where the supply's
//! resistance is large, the controller keeps to the side of high voltage: the supply is at its limit at half its
//! open-circuit voltage at the latest.
//! Source: balance of power over a loss-free controller, closed form.
//! Revision: 1

use super::Checked;
use super::dc_machine::DcConstants;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Current at full voltage.
pub const FULL_VOLTAGE_CURRENT: Formula = Formula {
    name: "full_voltage_current",
    text: "(U_0 - k_E * w) / (R + R_s)",
    symbols: &[
        ("U_0", "voltage", "open-circuit voltage of the supply"),
        ("k_E", "voltage_constant", "voltage constant"),
        ("w", "rotational_speed", "speed"),
        ("R", "resistance", "resistance of the winding, warm, with brushes"),
        ("R_s", "resistance", "resistance of the supply as this machine sees it"),
    ],
    validity: "below every current limit",
    source: "equivalent circuit of the dc machine, common practice",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &FULL_VOLTAGE_CURRENT,
    domain: &[(1.0, 800.0), (0.01, 3.0), (-500.0, 500.0), (0.001, 5.0), (0.0, 5.0)],
    kernel: |x| {
        let dc = DcConstants { k_t: 1.0, k_e: x[1], resistance: x[3], loss_torque: 0.0 };
        let bare = DcEnvelope {
            dc,
            open_circuit: x[0],
            supply_resistance: x[4],
            supply_limit: None,
            motor_limit: None,
        };
        bare.current(x[2])
    },
}];

/// A machine on its supply.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DcEnvelope {
    /// The machine, warm.
    pub dc: DcConstants,
    /// Open-circuit voltage of the supply, V, above zero.
    pub open_circuit: f64,
    /// Resistance of the supply as this machine sees it, Ω.
    pub supply_resistance: f64,
    /// Most current of the supply for this machine, A.
    pub supply_limit: Option<f64>,
    /// Most current of the motor, A: it hangs on a controller.
    pub motor_limit: Option<f64>,
}

impl DcEnvelope {
    /// The supply current at which the controller stops asking for more; infinite without limit.
    #[must_use]
    pub fn supply_cap(&self) -> f64 {
        let half_voltage = if self.supply_resistance > 0.0 {
            self.open_circuit / (2.0 * self.supply_resistance)
        } else {
            f64::INFINITY
        };
        self.supply_limit.map_or(half_voltage, |limit| f64::min(limit, half_voltage))
    }

    /// Speed below which the supply's limit, not its voltage, bounds the current.
    #[must_use]
    pub fn supply_speed(&self) -> f64 {
        let cap = match self.motor_limit {
            Some(_) => self.supply_cap(),
            None => self.supply_limit.unwrap_or(f64::INFINITY),
        };
        (self.open_circuit - cap * (self.dc.resistance + self.supply_resistance)) / self.dc.k_e
    }

    /// Current at full command.
    pub fn current<R: Real>(&self, speed: R) -> R {
        let full = |speed: R| {
            (-(speed * self.dc.k_e) + self.open_circuit) / (self.dc.resistance + self.supply_resistance)
        };
        let from = self.supply_speed();
        let available = if from.is_finite() {
            speed.piecewise(&[from], |piece, speed| if piece == 0 { self.at_cap(speed) } else { full(speed) })
        } else {
            full(speed)
        };
        match self.motor_limit {
            Some(limit) => available.min(R::of(limit)).max(R::of(-limit)),
            None => available,
        }
    }

    /// Current while the supply is at its limit.
    fn at_cap<R: Real>(&self, speed: R) -> R {
        if self.motor_limit.is_none() {
            return R::of(self.supply_limit.unwrap_or(0.0));
        }
        let cap = self.supply_cap();
        let power = (self.open_circuit - self.supply_resistance * cap) * cap;
        let resistance = self.dc.resistance;
        // Two forms of one root, each where it neither cancels nor divides by little.
        speed.piecewise(&[0.0], |piece, speed| {
            let induced = speed * self.dc.k_e;
            let root = (induced.square() + 4.0 * resistance * power).sqrt();
            if piece == 0 {
                (root - induced) / (2.0 * resistance)
            } else {
                R::of(2.0 * power) / (root + induced)
            }
        })
    }

    /// Speed without load, at full voltage.
    #[must_use]
    pub fn no_load_speed(&self) -> f64 {
        let current = self.dc.loss_torque / self.dc.k_t;
        (self.open_circuit - current * (self.dc.resistance + self.supply_resistance)) / self.dc.k_e
    }
}

impl Law for DcEnvelope {
    fn eval<R: Real>(&self, speed: R) -> R {
        self.current(speed) * self.dc.k_t - self.dc.loss_torque
    }

    fn kinks(&self) -> Vec<f64> {
        let mut kinks = Vec::new();
        let from = self.supply_speed();
        if from.is_finite() {
            kinks.push(from);
        }
        if let Some(limit) = self.motor_limit {
            let drop = limit * (self.dc.resistance + self.supply_resistance);
            kinks.push((self.open_circuit - drop) / self.dc.k_e);
            kinks.push((self.open_circuit + drop) / self.dc.k_e);
            let cap = self.supply_cap();
            if cap.is_finite() && limit > 0.0 {
                // Where the motor's limit takes all the power of the supply's.
                let power = (self.open_circuit - self.supply_resistance * cap) * cap;
                kinks.push((power / limit - self.dc.resistance * limit) / self.dc.k_e);
            }
        }
        kinks.sort_by(f64::total_cmp);
        kinks
    }
}

#[cfg(test)]
mod tests {
    use super::DcEnvelope;
    use crate::curve::Curve;
    use crate::laws::dc_machine::{DcConstants, DcPoint};
    use crate::laws::testing::{close, encloses, rpm};
    use proptest::prelude::*;

    /// An invented machine and pack: two points at 36 V, 37 V behind 110 mΩ, 30 A, controller of 45 A.
    fn trike() -> DcEnvelope {
        let a = DcPoint { speed: rpm(2850.0), torque: 1.2, current: 13.0 };
        let b = DcPoint { speed: rpm(2400.0), torque: 4.8, current: 44.7 };
        DcEnvelope {
            dc: DcConstants::from_points(a, b, 36.0).unwrap(),
            open_circuit: 37.0,
            supply_resistance: 0.110,
            supply_limit: Some(30.0),
            motor_limit: Some(45.0),
        }
    }

    #[test]
    fn every_limit_has_its_speeds() {
        let drive = trike();
        assert_eq!(drive.current(0.0), 45.0);
        // At the supply's limit the power of the pack arrives at the motor.
        let speed = drive.supply_speed() - 5.0;
        let current = drive.current(speed);
        let taken = drive.dc.voltage(speed, current) * current;
        close(taken, (37.0 - 0.110 * 30.0) * 30.0, 1e-12);
        assert!(30.0 < current && current < 45.0);
        // Above it the voltage bounds.
        let speed = drive.supply_speed() + 5.0;
        close(drive.dc.voltage(speed, drive.current(speed)), 37.0 - 0.110 * drive.current(speed), 1e-12);
        close(drive.at(drive.no_load_speed()) + 1.0, 1.0, 1e-12);
    }

    #[test]
    fn without_a_controller_both_carry_the_same_current() {
        let bare = DcEnvelope { motor_limit: None, ..trike() };
        assert_eq!(bare.current(0.0), 30.0);
        let unlimited = DcEnvelope { supply_limit: None, ..bare };
        close(unlimited.current(0.0), 37.0 / (unlimited.dc.resistance + 0.110), 1e-14);
    }

    #[test]
    fn a_weak_supply_is_never_drawn_below_half_its_voltage() {
        // Closed form: a quarter of U²/R_s, all of it in the winding at standstill.
        let weak =
            DcEnvelope { supply_resistance: 1.0, supply_limit: None, motor_limit: Some(1000.0), ..trike() };
        close(weak.current(0.0), 37.0 / 2.0 / weak.dc.resistance.sqrt(), 1e-12);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(300))]
        #[test]
        fn bounds_hold(
            supply_limit in proptest::option::of(1.0..60.0f64),
            motor_limit in proptest::option::of(1.0..90.0f64),
            supply_resistance in 0.0..1.0f64,
            lo in -100.0..500.0f64, width in 0.0..100.0f64, t in 0.0..1.0f64,
        ) {
            let drive = DcEnvelope { supply_limit, motor_limit, supply_resistance, ..trike() };
            encloses(&drive, lo, width, t);
        }

        #[test]
        fn torque_falls_with_speed(
            supply_limit in proptest::option::of(1.0..60.0f64),
            motor_limit in proptest::option::of(1.0..90.0f64),
            supply_resistance in 0.0..1.0f64,
            a in -100.0..500.0f64, b in -100.0..500.0f64,
        ) {
            let drive = DcEnvelope { supply_limit, motor_limit, supply_resistance, ..trike() };
            let (slow, fast) = (f64::min(a, b), f64::max(a, b));
            prop_assert!(drive.at(slow) >= drive.at(fast) - 1e-12);
        }
    }
}
