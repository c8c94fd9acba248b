//! The universal joint of Hooke: even speed in, uneven speed out.
//!
//! Formula: over half a turn the output runs between `w / cos(a)` and `w * cos(a)`; a second joint turned the wrong way
//! makes it between `w / cos(a)^2` and `w * cos(a)^2`, turned the right way even again.
//! Symbols: a angle between the shafts (rad), the same at both joints; w speed of the input (rad/s).
//! Validity: a cross in rigid forks; both joints in one plane at the same angle. The torque swings as the speed does.
//! Source: R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 9.5 and 9.7 (pp. 252, 254).
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

const BOOK: &str = "R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 9";

/// Symbols of both ends of the swing.
const SWING: &[(&str, &str, &str)] = &[
    ("w", "rotational_speed", "speed of the input"),
    ("a", "angle", "angle between the shafts"),
    ("k", "count", "joints that add up: 1, or 2 where the second is turned the wrong way"),
];

/// Highest speed in a turn.
pub const HIGHEST: Formula = Formula {
    name: "fastest_speed",
    text: "w / cos(a)^k",
    symbols: SWING,
    validity: "even speed of the input",
    source: BOOK,
    revision: 1,
};

/// Lowest speed in a turn.
pub const LOWEST: Formula = Formula {
    name: "slowest_speed",
    text: "w * cos(a)^k",
    symbols: SWING,
    validity: "even speed of the input",
    source: BOOK,
    revision: 1,
};

const DOMAIN: &[(f64, f64)] = &[(1.0, 300.0), (0.0, 0.7), (1.0, 2.0)];

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked { formula: &HIGHEST, domain: DOMAIN, kernel: |x| x[0] * swing(x[1], x[2]) },
    Checked { formula: &LOWEST, domain: DOMAIN, kernel: |x| x[0] / swing(x[1], x[2]) },
];

/// Highest over mean speed of so many joints that add up, at an angle (rad).
#[must_use]
pub fn swing(angle: f64, joints: f64) -> f64 {
    libm::pow(libm::cos(angle), -joints)
}

#[cfg(test)]
mod tests {
    use super::swing;
    use crate::laws::testing::close;

    #[test]
    fn published_joints() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 9.5 and 9.7, recomputed.
        let deg = core::f64::consts::PI / 180.0;
        close(1200.0 * swing(16.422_907_927_710_23 * deg, 1.0), 1_251.041_214_946_43, 1e-12);
        close(1200.0 / swing(16.422_907_927_710_23 * deg, 1.0), 1_151.041_214_946_43, 1e-12);
        close(500.0 * swing(20.0 * deg, 2.0), 566.237_165_715_897, 1e-12);
    }
}
