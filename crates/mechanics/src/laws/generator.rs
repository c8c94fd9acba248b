//! Electrical machines that are driven.
//!
//! Formula: by a rated point `T = P_r / (eta * w_r) * (w / w_r)^n` with n = 0 constant torque, 1 on a resistor, 2 tracking
//! the greatest power of wind or water; at constant power see the law of bounded power; permanent magnets on a resistor
//! `I = k * w / (R_a + R_L)`, on a battery `I = max((k * w - U) / R_a, 0)`, `T = k * I + T_0`.
//! Symbols: P_r electrical power at the rated speed w_r (W); eta efficiency there (-); k torque constant (N·m/A), equal to
//! the voltage constant; R_a resistance of the winding, R_L of the load (Ω); U voltage of the battery with its rectifier
//! (V); T_0 torque of the idle losses (N·m).
//! Validity: the efficiency is that of the rated point at every speed; magnets: mean values behind a rectifier, reactance
//! left aside, so that near short circuit the current is less.
//! Source: permanent-magnet dc machine, usual handbooks; definition of efficiency.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

const HANDBOOKS: &str = "permanent-magnet machine, usual handbooks";

/// Torque by a rated point.
pub const RATED: Formula = Formula {
    name: "torque",
    text: "P_r / (eta * w_r) * (w / w_r)^n",
    symbols: &[
        ("P_r", "electrical_power", "electrical power at the rated speed"),
        ("eta", "percentage", "efficiency there"),
        ("w_r", "rotational_speed", "rated speed"),
        ("w", "rotational_speed", "speed"),
        ("n", "number", "exponent of the regulation"),
    ],
    validity: "efficiency as at the rated point",
    source: "definition of efficiency",
    revision: 1,
};

/// Current into a resistor.
pub const CURRENT_IN_RESISTOR: Formula = Formula {
    name: "current",
    text: "k * w / (R_a + R_L)",
    symbols: &[
        ("k", "torque_constant", "torque constant"),
        ("w", "rotational_speed", "speed"),
        ("R_a", "resistance", "winding"),
        ("R_L", "resistance", "load"),
    ],
    validity: "reactance left aside",
    source: HANDBOOKS,
    revision: 1,
};

/// Current into a battery.
pub const CHARGING_CURRENT: Formula = Formula {
    name: "current",
    text: "max((k * w - U) / R_a, 0 A)",
    symbols: &[
        ("k", "torque_constant", "torque constant"),
        ("w", "rotational_speed", "speed"),
        ("U", "voltage", "voltage of the battery with its rectifier"),
        ("R_a", "resistance", "winding and cables"),
    ],
    validity: "above the cut-in speed; the rectifier lets nothing back",
    source: HANDBOOKS,
    revision: 1,
};

/// Torque of a current.
pub const TORQUE_OF_CURRENT: Formula = Formula {
    name: "torque",
    text: "k * I + T_0",
    symbols: &[
        ("k", "torque_constant", "torque constant"),
        ("I", "current", "current"),
        ("T_0", "torque", "idle losses"),
    ],
    validity: "turning",
    source: HANDBOOKS,
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &RATED,
        domain: &[(10.0, 1e5), (0.3, 1.0), (1.0, 300.0), (1.0, 300.0), (0.0, 2.0)],
        kernel: |x| x[0] / (x[1] * x[2]) * libm::pow(x[3] / x[2], x[4]),
    },
    Checked {
        formula: &CURRENT_IN_RESISTOR,
        domain: &[(0.01, 5.0), (0.0, 300.0), (0.01, 5.0), (0.1, 50.0)],
        kernel: |x| Magnets::resistor(x[0], x[2], x[3]).current(x[1]),
    },
    Checked {
        formula: &CHARGING_CURRENT,
        domain: &[(0.01, 5.0), (0.0, 300.0), (1.0, 60.0), (0.01, 5.0)],
        kernel: |x| Magnets::battery(x[0], x[3], x[2]).current(x[1]),
    },
    Checked {
        formula: &TORQUE_OF_CURRENT,
        domain: &[(0.01, 5.0), (0.0, 100.0), (0.0, 5.0)],
        kernel: |x| x[0] * x[1] + x[2],
    },
];

/// A machine with permanent magnets and what it works on.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Magnets {
    /// N·m/A and V·s/rad
    pub constant: f64,
    /// All the current passes, Ω.
    pub resistance: f64,
    /// Of it the load's share, Ω.
    pub load: f64,
    /// Voltage it works against, V.
    pub against: f64,
    /// Torque of the idle losses, N·m.
    pub idle: f64,
}

impl Magnets {
    /// On a resistor.
    #[must_use]
    pub fn resistor(constant: f64, winding: f64, load: f64) -> Self {
        Self { constant, resistance: winding + load, load, against: 0.0, idle: 0.0 }
    }

    /// On a battery.
    #[must_use]
    pub fn battery(constant: f64, winding: f64, against: f64) -> Self {
        Self { constant, resistance: winding, load: 0.0, against, idle: 0.0 }
    }

    /// The speed from which a current flows.
    #[must_use]
    pub fn cut_in(&self) -> f64 {
        self.against / self.constant
    }

    /// The current at a speed of zero or above.
    pub fn current<R: Real>(&self, speed: R) -> R {
        speed.piecewise(&[self.cut_in()], |piece, speed| {
            if piece == 0 && self.against > 0.0 {
                R::of(0.0)
            } else {
                (speed * self.constant - self.against) / self.resistance
            }
        })
    }

    /// The voltage at its terminals while a current flows.
    pub fn voltage<R: Real>(&self, speed: R) -> R {
        if self.against > 0.0 {
            (speed * self.constant).min(R::of(self.against))
        } else {
            self.current(speed) * self.load
        }
    }

    /// The electrical power it gives.
    pub fn power<R: Real>(&self, speed: R) -> R {
        let current = self.current(speed);
        current * (current * self.load + self.against)
    }
}

impl Law for Magnets {
    fn eval<R: Real>(&self, speed: R) -> R {
        self.current(speed) * self.constant + self.idle
    }

    fn kinks(&self) -> Vec<f64> {
        if self.against > 0.0 { vec![self.cut_in()] } else { Vec::new() }
    }
}

#[cfg(test)]
mod tests {
    use super::Magnets;
    use crate::curve::Law;
    use crate::laws::testing::{close, encloses};
    use proptest::prelude::*;

    #[test]
    fn power_in_is_power_out_and_heat() {
        // Closed form: k·w·I = I²·R + U·I.
        for magnets in [Magnets::resistor(0.8, 0.5, 6.0), Magnets::battery(0.8, 0.5, 48.0)] {
            let speed = 90.0;
            let current: f64 = magnets.current(speed);
            let heat = current * current * (magnets.resistance - magnets.load);
            close(magnets.eval(speed) * speed, magnets.power(speed) + heat, 1e-12);
        }
        assert_eq!(Magnets::battery(0.8, 0.5, 48.0).eval(59.0), 0.0);
        close(Magnets::battery(0.8, 0.5, 48.0).current(65.0), 8.0, 1e-12);
    }

    proptest! {
        #[test]
        fn bounds_hold(against in 0.0..60.0f64, lo in 0.1..100.0f64, width in 0.0..60.0f64, t in 0.0..1.0f64) {
            encloses(&Magnets::battery(0.8, 0.5, against), lo, width, t);
        }
    }
}
