//! The permanent-magnet dc machine: constants, current and torque.
//!
//! Formula: `U = k_E * w + R * I`, `T = k_T * I - T_0`; standstill current `U / R`, no-load current `T_0 / k_T`.
//! Symbols: U voltage at the terminals (V); I current (A); R resistance of the winding, brushes included (Ω);
//! k_E voltage constant (V·s/rad); k_T torque constant (N·m/A); T_0 loss torque (N·m); T torque at the shaft (N·m);
//! w speed (rad/s).
//! Validity: steady running with a field that does not change: no saturation, no weakening of warm magnets,
//! loss torque the same at all speeds. In one consistent set of units k_T equals k_E up to iron losses; constants
//! fitted to measured points may differ by some ten percent.
//! Source: the equivalent circuit of every textbook of electrical machines (common practice, no single source).
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Current at a torque.
pub const CURRENT: Formula = Formula {
    name: "current",
    text: "(T + T_0) / k_T",
    symbols: &[
        ("T", "torque", "torque at the shaft"),
        ("T_0", "torque", "loss torque of friction and iron"),
        ("k_T", "torque_constant", "torque constant"),
    ],
    validity: "steady running, constant field",
    source: "equivalent circuit of the dc machine, common practice",
    revision: 1,
};

/// Speed at a voltage and a current.
pub const SPEED: Formula = Formula {
    name: "speed",
    text: "(U - R * I) / k_E",
    symbols: &[
        ("U", "voltage", "voltage at the terminals"),
        ("R", "resistance", "resistance of the winding, warm, with brushes"),
        ("I", "current", "current"),
        ("k_E", "voltage_constant", "voltage constant"),
    ],
    validity: "steady running, constant field",
    source: "equivalent circuit of the dc machine, common practice",
    revision: 1,
};

/// Torque at a voltage and a speed, no limit in force.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "k_T * (U_0 - k_E * w) / (R + R_s) - T_0",
    symbols: &[
        ("k_T", "torque_constant", "torque constant"),
        ("U_0", "voltage", "open-circuit voltage of the supply"),
        ("k_E", "voltage_constant", "voltage constant"),
        ("w", "rotational_speed", "speed"),
        ("R", "resistance", "resistance of the winding, warm, with brushes"),
        ("R_s", "resistance", "resistance of the supply"),
        ("T_0", "torque", "loss torque of friction and iron"),
    ],
    validity: "full voltage, below every current limit",
    source: "equivalent circuit of the dc machine, common practice",
    revision: 1,
};

/// Current when the supply, not the motor, is at its limit and a loss-free controller stands between.
pub const POWER_LIMITED_CURRENT: Formula = Formula {
    name: "power_limited_current",
    text: "2 * P / (k_E * w + sqrt((k_E * w)^2 + 4 * R * P))",
    symbols: &[
        ("P", "electrical_power", "power the controller may pass"),
        ("k_E", "voltage_constant", "voltage constant"),
        ("w", "rotational_speed", "speed"),
        ("R", "resistance", "resistance of the winding, warm, with brushes"),
    ],
    validity: "a loss-free controller that can lower the motor's voltage but not raise it above the supply's",
    source: "closed form, root of R·I² + k_E·w·I = P",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &CURRENT,
        domain: &[(-50.0, 50.0), (0.0, 2.0), (0.01, 3.0)],
        kernel: |x| DcConstants { k_t: x[2], k_e: 1.0, resistance: 1.0, loss_torque: x[1] }.current(x[0]),
    },
    Checked {
        formula: &SPEED,
        domain: &[(1.0, 800.0), (0.001, 5.0), (-50.0, 50.0), (0.01, 3.0)],
        kernel: |x| DcConstants { k_t: 1.0, k_e: x[3], resistance: x[1], loss_torque: 0.0 }.speed(x[0], x[2]),
    },
    Checked {
        formula: &TORQUE,
        domain: &[
            (0.01, 3.0),
            (1.0, 800.0),
            (0.01, 3.0),
            (-500.0, 500.0),
            (0.001, 5.0),
            (0.0, 5.0),
            (0.0, 2.0),
        ],
        kernel: |x| {
            let dc = DcConstants { k_t: x[0], k_e: x[2], resistance: x[4], loss_torque: x[6] };
            dc.torque(dc.full_voltage_current(x[1], x[5], x[3]))
        },
    },
    Checked {
        formula: &POWER_LIMITED_CURRENT,
        domain: &[(1.0, 1e5), (0.01, 3.0), (0.0, 500.0), (0.001, 5.0)],
        kernel: |x| power_limited_current(x[0], x[1] * x[2], x[3]),
    },
];

/// The constants of a machine, all SI.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DcConstants {
    /// Torque constant, N·m/A, above zero.
    pub k_t: f64,
    /// Voltage constant, V·s/rad, above zero.
    pub k_e: f64,
    /// Resistance of the winding with brushes, Ω, above zero.
    pub resistance: f64,
    /// Loss torque, N·m, zero or above.
    pub loss_torque: f64,
}

/// A measured point of a machine at a known voltage.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DcPoint {
    /// rad/s
    pub speed: f64,
    /// N·m at the shaft
    pub torque: f64,
    /// A
    pub current: f64,
}

impl DcConstants {
    /// Current (A) at a torque at the shaft (N·m).
    #[must_use]
    pub fn current(&self, torque: f64) -> f64 {
        (torque + self.loss_torque) / self.k_t
    }

    /// Torque at the shaft (N·m) at a current (A).
    #[must_use]
    pub fn torque(&self, current: f64) -> f64 {
        self.k_t * current - self.loss_torque
    }

    /// Speed (rad/s) at a terminal voltage (V) and a current (A).
    #[must_use]
    pub fn speed(&self, voltage: f64, current: f64) -> f64 {
        (voltage - self.resistance * current) / self.k_e
    }

    /// Voltage at the terminals (V) at a speed (rad/s) and a current (A).
    #[must_use]
    pub fn voltage(&self, speed: f64, current: f64) -> f64 {
        self.k_e * speed + self.resistance * current
    }

    /// Current (A) on a supply of this open-circuit voltage (V) and resistance (Ω), nothing limiting it.
    #[must_use]
    pub fn full_voltage_current(&self, voltage: f64, supply_resistance: f64, speed: f64) -> f64 {
        (voltage - self.k_e * speed) / (self.resistance + supply_resistance)
    }

    /// From two points taken at one voltage. `None` unless all four constants come out positive (the loss torque
    /// may be zero).
    #[must_use]
    pub fn from_points(a: DcPoint, b: DcPoint, voltage: f64) -> Option<Self> {
        let k_t = (b.torque - a.torque) / (b.current - a.current);
        let loss_torque = k_t * a.current - a.torque;
        // U = k_E w + R I at both points.
        let determinant = a.speed * b.current - b.speed * a.current;
        let k_e = voltage * (b.current - a.current) / determinant;
        let resistance = voltage * (a.speed - b.speed) / determinant;
        // A loss torque of zero may come out a rounding error below it.
        let slack = 1e-12 * a.torque.abs().max(b.torque.abs());
        let loss_torque = if loss_torque.abs() <= slack { 0.0 } else { loss_torque };
        let good = k_t > 0.0 && k_e > 0.0 && resistance > 0.0 && loss_torque >= 0.0;
        let finite = k_t.is_finite() && k_e.is_finite() && resistance.is_finite();
        (good && finite).then_some(Self { k_t, k_e, resistance, loss_torque })
    }
}

/// Current (A) of a winding of this resistance (Ω) behind this induced voltage (V) that takes this power (W).
///
/// The form keeps all digits where the induced voltage is large against the drop.
#[must_use]
pub fn power_limited_current(power: f64, induced: f64, resistance: f64) -> f64 {
    let root = (induced * induced + 4.0 * resistance * power).sqrt();
    let sum = induced + root;
    if sum > 0.0 { 2.0 * power / sum } else { 0.0 }
}

#[cfg(test)]
mod tests {
    use super::{DcConstants, DcPoint, power_limited_current};
    use crate::laws::testing::{close, rpm};

    fn trike() -> DcConstants {
        // An invented machine: two points at 36 V.
        let a = DcPoint { speed: rpm(2850.0), torque: 1.2, current: 13.0 };
        let b = DcPoint { speed: rpm(2400.0), torque: 4.8, current: 44.7 };
        DcConstants::from_points(a, b, 36.0).unwrap()
    }

    #[test]
    fn two_points_give_back_themselves() {
        let dc = trike();
        for (n, torque, current) in [(2850.0, 1.2, 13.0), (2400.0, 4.8, 44.7)] {
            close(dc.current(torque), current, 1e-12);
            close(dc.speed(36.0, current), rpm(n), 1e-12);
            close(dc.voltage(rpm(n), current), 36.0, 1e-12);
        }
    }

    #[test]
    fn ends_of_a_measured_line() {
        // Closed form: T and I both straight over speed, 12 V, 5330 rpm, 2.413 N·m, 2.7 A, 131.055 A.
        let a = DcPoint { speed: rpm(5330.0), torque: 0.0, current: 2.7 };
        let b = DcPoint { speed: 0.0, torque: 2.413, current: 131.055 };
        let dc = DcConstants::from_points(a, b, 12.0).unwrap();
        close(dc.k_t, 0.018_799_423_474, 1e-9);
        close(dc.k_e, 0.021_056_423_912_1, 1e-9);
        let half = rpm(2665.0);
        let current = dc.full_voltage_current(12.0, 0.0, half);
        close(current, 66.8775, 1e-9);
        let power = dc.torque(current) * half;
        close(power, 336.707_784_831, 1e-9);
        close(power / (12.0 * current), 0.419_557_879_245, 1e-9);
        let best = (2.7_f64 * 131.055).sqrt();
        close(best, 18.810_861_224_3, 1e-9);
        let speed = dc.speed(12.0, best);
        close(speed, rpm(4_660.989_129_17), 1e-9);
        close(dc.torque(best) * speed / (12.0 * best), 0.654_907_659_998, 1e-9);
    }

    #[test]
    fn ideal_machine_at_its_best_efficiency() {
        // Closed form: (1 - sqrt(I0 / Is))², which needs k_T = k_E.
        let dc = DcConstants { k_t: 0.05, k_e: 0.05, resistance: 1.2, loss_torque: 0.025 };
        let best = 10.0_f64.sqrt();
        close(dc.torque(best), 0.133_113_883_008, 1e-10);
        let speed = dc.speed(24.0, best);
        close(speed, 404.105_336_156, 1e-10);
        close(dc.torque(best) * speed / (24.0 * best), 0.708_772_233_983, 1e-10);
        close(dc.torque(dc.full_voltage_current(24.0, 0.0, 0.0)), 0.975, 1e-10);
    }

    #[test]
    fn points_that_make_no_machine() {
        let a = DcPoint { speed: 100.0, torque: 1.0, current: 10.0 };
        for b in [
            a,
            DcPoint { speed: 80.0, torque: 2.0, current: 10.0 },
            DcPoint { speed: 120.0, torque: 2.0, current: 20.0 },
            DcPoint { speed: 80.0, torque: 1.9, current: 20.0 },
        ] {
            assert_eq!(DcConstants::from_points(a, b, 36.0), None, "{b:?}");
        }
    }

    #[test]
    fn power_limit_is_the_root() {
        for (power, induced, resistance) in [(900.0, 20.0, 0.1), (900.0, 0.0, 0.1), (1e-3, 300.0, 0.01)] {
            let current = power_limited_current(power, induced, resistance);
            close(resistance * current * current + induced * current, power, 1e-12);
        }
        assert_eq!(power_limited_current(0.0, 0.0, 0.1), 0.0);
    }
}
