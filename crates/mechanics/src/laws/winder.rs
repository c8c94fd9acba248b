//! Winding a web under tension.
//!
//! Formula: `F = F_0 * (1 - t * (1 - d / D))`, `T = F * D / 2 + T_f`, `v = w * D / 2`; the roll
//! `J = pi / 32 * rho * b * (D^4 - d^4)`.
//! Symbols: F web tension (N), F_0 at the core; t taper (-); D diameter of the roll, d of the core (m); T torque, T_f
//! friction (N·m); v web speed (m/s), w speed (rad/s); rho density of the wound web (kg/m³), b its width (m).
//! Validity: tension held by the machine, thickness small against the diameter. Torque is greatest on the full roll, speed
//! on the core.
//! Source: definition of torque; inertia of a hollow cylinder; taper as usual in web handling (common practice, no source).
//! Revision: 1

use std::f64::consts::PI;

use super::Checked;
use crate::registry::Formula;

/// Tension with taper.
pub const TENSION: Formula = Formula {
    name: "web_tension",
    text: "F_0 * (1 - t * (1 - d / D))",
    symbols: &[
        ("F_0", "force", "tension at the core"),
        ("t", "percentage", "taper"),
        ("d", "length", "diameter of the core"),
        ("D", "length", "diameter of the roll"),
    ],
    validity: "tension falls toward (1 - t) of that at the core",
    source: "common practice, no source",
    revision: 1,
};

/// Torque of a tension.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "F * D / 2 + T_f",
    symbols: &[
        ("F", "force", "tension"),
        ("D", "length", "diameter of the roll"),
        ("T_f", "torque", "friction"),
    ],
    validity: "winding; unwinding the friction has the other sign",
    source: "definition",
    revision: 1,
};

/// Inertia of the wound web.
pub const ROLL_INERTIA: Formula = Formula {
    name: "roll_inertia",
    text: "pi / 32 * rho * b * (D^4 - d^4)",
    symbols: &[
        ("rho", "density", "density of the wound web, air between the layers included"),
        ("b", "length", "width"),
        ("D", "length", "diameter of the roll"),
        ("d", "length", "diameter of the core"),
    ],
    validity: "a hollow cylinder about its axis",
    source: "closed form",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TENSION,
        domain: &[(1.0, 1e4), (0.0, 0.9), (0.05, 0.3), (0.3, 2.0)],
        kernel: |x| tension(x[0], x[1], x[2], x[3]),
    },
    Checked {
        formula: &TORQUE,
        domain: &[(1.0, 1e4), (0.05, 2.0), (0.0, 50.0)],
        kernel: |x| x[0] * x[1] / 2.0 + x[2],
    },
    Checked {
        formula: &ROLL_INERTIA,
        domain: &[(100.0, 8e3), (0.1, 3.0), (0.4, 2.0), (0.05, 0.3)],
        kernel: |x| roll_inertia(x[0], x[1], x[2], x[3]),
    },
];

/// Tension (N) on a roll, tapered from that at the core.
#[must_use]
pub fn tension(at_core: f64, taper: f64, core: f64, roll: f64) -> f64 {
    at_core * (1.0 - taper * (1.0 - core / roll))
}

/// Mass (kg) of the wound web by density, width and both diameters.
#[must_use]
pub fn roll_mass(density: f64, width: f64, roll: f64, core: f64) -> f64 {
    PI / 4.0 * density * width * (roll * roll - core * core)
}

/// Inertia (kg·m²) of the wound web.
#[must_use]
pub fn roll_inertia(density: f64, width: f64, roll: f64, core: f64) -> f64 {
    roll_mass(density, width, roll, core) * (roll * roll + core * core) / 8.0
}

#[cfg(test)]
mod tests {
    use super::{roll_inertia, roll_mass, tension};
    use crate::laws::testing::close;

    #[test]
    fn hollow_cylinder_and_taper() {
        // Closed form: m·(R² + r²)/2.
        let mass = roll_mass(800.0, 1.2, 1.0, 0.2);
        close(mass, std::f64::consts::PI * (0.25 - 0.01) * 1.2 * 800.0, 1e-12);
        close(roll_inertia(800.0, 1.2, 1.0, 0.2), mass * (0.25 + 0.01) / 2.0, 1e-12);
        assert_eq!(tension(300.0, 0.4, 0.2, 0.2), 300.0);
        close(tension(300.0, 0.4, 0.2, 0.8), 210.0, 1e-12);
    }
}
