//! Synchronous speed, slip and the torque on a name plate.
//!
//! Formula: `w_s = 4 * pi * f / p`, `s = (w_s - w) / w_s`, `T_n = P_n / w_n`.
//! Symbols: f supply frequency (Hz); p number of poles (-); w_s synchronous speed (rad/s); w shaft speed (rad/s);
//! s slip (-); P_n rated power at the shaft (W), w_n rated speed (rad/s), T_n rated torque (N·m).
//! Validity: three-phase machines; the rated speed of an induction motor lies below the synchronous speed.
//! Source: definitions, IEC 60034-1 and IEC 60050-411 (from memory).
//! Revision: 1

use super::Checked;
use crate::registry::Formula;
use core::f64::consts::PI;

/// The speed of the rotating field.
pub const SYNCHRONOUS_SPEED: Formula = Formula {
    name: "synchronous_speed",
    text: "4 * pi * f / p",
    symbols: &[("f", "frequency", "supply frequency"), ("p", "count", "number of poles, an even number")],
    validity: "three-phase machines",
    source: "definition, IEC 60050-411 (from memory)",
    revision: 1,
};

/// How far the shaft lags behind the field.
pub const SLIP: Formula = Formula {
    name: "slip",
    text: "(w_s - w) / w_s",
    symbols: &[
        ("w_s", "rotational_speed", "synchronous speed"),
        ("w", "rotational_speed", "speed of the shaft"),
    ],
    validity: "below zero above the synchronous speed, where the machine brakes",
    source: "definition, IEC 60050-411 (from memory)",
    revision: 1,
};

/// Torque at the rated point.
pub const RATED_TORQUE: Formula = Formula {
    name: "rated_torque",
    text: "P_n / w_n",
    symbols: &[
        ("P_n", "mechanical_power", "rated power, at the shaft"),
        ("w_n", "rotational_speed", "rated speed"),
    ],
    validity: "the power on a motor's name plate is mechanical",
    source: "definition of power; name plates as IEC 60034-1 (from memory)",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &SYNCHRONOUS_SPEED,
        domain: &[(1.0, 400.0), (2.0, 24.0)],
        kernel: |x| synchronous_speed(x[0], x[1]),
    },
    Checked { formula: &SLIP, domain: &[(10.0, 400.0), (-400.0, 800.0)], kernel: |x| slip(x[0], x[1]) },
    Checked {
        formula: &RATED_TORQUE,
        domain: &[(1.0, 1e6), (1.0, 1e3)],
        kernel: |x| rated_torque(x[0], x[1]),
    },
];

/// Speed of the field (rad/s) at a frequency (Hz) and a number of poles.
#[must_use]
pub fn synchronous_speed(frequency: f64, poles: f64) -> f64 {
    4.0 * PI * frequency / poles
}

/// Share by which the shaft lags behind the field.
#[must_use]
pub fn slip(synchronous: f64, speed: f64) -> f64 {
    (synchronous - speed) / synchronous
}

/// Torque (N·m) of a power (W) at a speed (rad/s).
#[must_use]
pub fn rated_torque(power: f64, speed: f64) -> f64 {
    power / speed
}

#[cfg(test)]
mod tests {
    use super::{rated_torque, slip, synchronous_speed};
    use crate::laws::testing::{close, rpm};

    #[test]
    fn published_slip() {
        // B. S. Guru, H. R. Hiziroglu, Electric Machinery and Transformers, 3rd ed., 2004, Ex. 9.1.
        let field = synchronous_speed(60.0, 4.0);
        close(field, rpm(1800.0), 1e-12);
        let s = slip(field, rpm(1755.0));
        close(s, 0.025, 1e-12);
        close(s * 60.0, 1.5, 1e-12);
    }

    #[test]
    fn plate_torque() {
        // Closed form: 7.5 kW at 1500 rpm is 47.75 N·m, not the 0.523 N·m of a speed inverted.
        close(rated_torque(7500.0, rpm(1500.0)), 47.746_482_927_57, 1e-10);
        // Closed form: 5.44 N·m at 4900 rpm is 2791 W, a plate of 3000 W contradicts it.
        close(5.44 * rpm(4900.0), 2791.41, 1e-6);
    }
}
