//! Cutting by the specific cutting force.
//!
//! Formula: `F_c = k_c * A`, `A = a_p * 2*pi*f` turning (f feed per angle, so 2*pi*f per turn), `A = a_p * b` running
//! straight; `T = F_c * D / 2`; by the volume removed `P = k_c * Q`.
//! Symbols: F_c cutting force (N); k_c specific cutting force (Pa), also the energy per volume (J/m³); a_p depth of cut,
//! b width of cut, D diameter at the tool (m); f feed (m/rad); Q volume removed per time (m³/s); P cutting power (W).
//! Validity: one edge in steady cut, k_c for the chip thickness and the material at hand; a dull tool takes more.
//! Source: specific cutting force after O. Kienzle, usual handbooks of machining.
//! Revision: 1

use std::f64::consts::TAU;

use super::Checked;
use crate::registry::Formula;

const HANDBOOKS: &str = "specific cutting force, usual handbooks of machining";

/// Cutting force of a turning tool.
pub const TURNING_FORCE: Formula = Formula {
    name: "cutting_force",
    text: "k_c * a_p * 2 * pi * f",
    symbols: &[
        ("k_c", "pressure", "specific cutting force, wear included"),
        ("a_p", "length", "depth of cut"),
        ("f", "lead", "feed"),
    ],
    validity: "one edge in steady cut",
    source: HANDBOOKS,
    revision: 1,
};

/// Torque of a cutting force.
pub const CUTTING_TORQUE: Formula = Formula {
    name: "torque",
    text: "F_c * D / 2",
    symbols: &[("F_c", "force", "cutting force"), ("D", "length", "diameter at the tool")],
    validity: "cut at the stated diameter",
    source: "definition",
    revision: 1,
};

/// Cutting force, running straight.
pub const PLANING_FORCE: Formula = Formula {
    name: "force",
    text: "k_c * a_p * b",
    symbols: &[
        ("k_c", "pressure", "specific cutting force, wear included"),
        ("a_p", "length", "depth of cut"),
        ("b", "length", "width of cut"),
    ],
    validity: "one edge in steady cut",
    source: HANDBOOKS,
    revision: 1,
};

/// Power of the volume removed.
pub const CUTTING_POWER: Formula = Formula {
    name: "cutting_power",
    text: "k_c * Q",
    symbols: &[
        ("k_c", "pressure", "specific cutting force, wear included"),
        ("Q", "flow", "volume removed per time"),
    ],
    validity: "steady cut",
    source: HANDBOOKS,
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TURNING_FORCE,
        domain: &[(1e8, 5e9), (1e-4, 0.01), (1e-6, 2e-4)],
        kernel: |x| x[0] * turned_chip(x[1], x[2]),
    },
    Checked { formula: &CUTTING_TORQUE, domain: &[(0.0, 1e4), (0.005, 2.0)], kernel: |x| x[0] * x[1] / 2.0 },
    Checked {
        formula: &PLANING_FORCE,
        domain: &[(1e8, 5e9), (1e-4, 0.01), (1e-4, 0.01)],
        kernel: |x| x[0] * x[1] * x[2],
    },
    Checked { formula: &CUTTING_POWER, domain: &[(1e8, 5e9), (1e-7, 1e-4)], kernel: |x| x[0] * x[1] },
];

/// Section (m²) of the chip of a turning tool, by depth (m) and feed (m/rad).
#[must_use]
pub fn turned_chip(depth: f64, feed: f64) -> f64 {
    depth * TAU * feed
}

#[cfg(test)]
mod tests {
    use super::turned_chip;
    use crate::laws::testing::close;

    #[test]
    fn a_third_of_a_millimetre_each_turn() {
        // Closed form: 3 mm deep at 0.3 mm a turn are 0.9 mm²; at 2000 N/mm² 1800 N.
        let feed = 0.3e-3 / std::f64::consts::TAU;
        close(2000e6 * turned_chip(3e-3, feed), 1800.0, 1e-12);
    }
}
