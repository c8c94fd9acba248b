//! Rack and pinion: turning to straight.
//!
//! Formula: `d = m * z`, `v = w * d / 2`, `F = 2 * eta * T / d`.
//! Symbols: m module (m); z teeth of the pinion (-); d pitch diameter (m); w speed (rad/s); v speed (m/s); T torque
//! (N·m); F force along the rack (N); eta efficiency (-).
//! Validity: no slip; losses of mesh and guides in the efficiency.
//! Source: definition of the module (ISO 1122-1, from memory); balance of power.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Pitch diameter of the pinion.
pub const PITCH_DIAMETER: Formula = Formula {
    name: "pitch_diameter",
    text: "m * z",
    symbols: &[("m", "length", "module"), ("z", "count", "teeth of the pinion")],
    validity: "always",
    source: "definition, ISO 1122-1 (from memory)",
    revision: 1,
};

/// Speed of the rack.
pub const SPEED: Formula = Formula {
    name: "speed",
    text: "w * d / 2",
    symbols: &[("w", "rotational_speed", "speed of the pinion"), ("d", "length", "pitch diameter")],
    validity: "always",
    source: "definition",
    revision: 1,
};

/// Force along the rack.
pub const FORCE: Formula = Formula {
    name: "force",
    text: "2 * eta * T / d",
    symbols: &[
        ("eta", "percentage", "efficiency, power flowing to the load"),
        ("T", "torque", "torque on the pinion"),
        ("d", "length", "pitch diameter"),
    ],
    validity: "power flows to the load",
    source: "balance of power",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &PITCH_DIAMETER,
        domain: &[(5e-4, 0.02), (10.0, 80.0)],
        kernel: |x| pitch_diameter(x[0], x[1]),
    },
    Checked { formula: &SPEED, domain: &[(-50.0, 50.0), (0.01, 1.0)], kernel: |x| x[0] / pinion_ratio(x[1]) },
    Checked {
        formula: &FORCE,
        domain: &[(0.5, 1.0), (0.0, 1e4), (0.01, 1.0)],
        kernel: |x| x[1] * pinion_ratio(x[2]) * x[0],
    },
];

/// Pitch diameter (m) by module (m) and teeth.
#[must_use]
pub fn pitch_diameter(module: f64, teeth: f64) -> f64 {
    module * teeth
}

/// Turning speed over speed of the rack (rad/s per m/s).
#[must_use]
pub fn pinion_ratio(pitch_diameter: f64) -> f64 {
    2.0 / pitch_diameter
}
