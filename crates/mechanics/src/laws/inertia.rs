//! Moment of inertia, flywheel effect, radius of gyration.
//!
//! Formula: `J = GD2 / 4`, `J = m * k^2`.
//! Symbols: J moment of inertia (kg·m²); GD2 flywheel effect, mass times the square of the diameter of gyration
//! (kg·m²); m mass (kg); k radius of gyration (m).
//! Validity: a rigid body about its own axis. A flywheel effect in kgf·m² has the same number in kg·m².
//! Source: definitions; GD² as used on name plates and in catalogues (common practice, no source).
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Inertia of a flywheel effect.
pub const FROM_FLYWHEEL_EFFECT: Formula = Formula {
    name: "inertia",
    text: "GD2 / 4",
    symbols: &[("GD2", "flywheel_effect", "flywheel effect, GD²")],
    validity: "GD² with the diameter of gyration",
    source: "definition, common practice",
    revision: 1,
};

/// Inertia of a mass at its radius of gyration.
pub const FROM_GYRATION: Formula = Formula {
    name: "inertia",
    text: "m * k^2",
    symbols: &[("m", "mass", "mass"), ("k", "length", "radius of gyration")],
    validity: "a solid disc has k = r / sqrt(2), a thin rim k = r",
    source: "definition",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &FROM_FLYWHEEL_EFFECT,
        domain: &[(1e-4, 1e4)],
        kernel: |x| from_flywheel_effect(x[0]),
    },
    Checked {
        formula: &FROM_GYRATION,
        domain: &[(0.1, 1e4), (0.01, 3.0)],
        kernel: |x| from_gyration(x[0], x[1]),
    },
];

/// Moment of inertia (kg·m²) of a flywheel effect (kg·m²).
#[must_use]
pub fn from_flywheel_effect(gd2: f64) -> f64 {
    gd2 / 4.0
}

/// Moment of inertia (kg·m²) of a mass (kg) at a radius of gyration (m).
#[must_use]
pub fn from_gyration(mass: f64, radius: f64) -> f64 {
    mass * radius * radius
}

#[cfg(test)]
mod tests {
    use super::{from_flywheel_effect, from_gyration};
    use crate::laws::testing::close;

    #[test]
    fn flywheel_effect_is_four_inertias() {
        // Closed form.
        close(from_flywheel_effect(1.788), 0.4470, 1e-14);
        close(from_gyration(500.0, 0.6), 180.0, 1e-14);
    }
}
