//! The belt drive: pulleys, slip and loss.
//!
//! Formula: `w_out = w_in * (1 - s) / i` with `i = d_2 / d_1`; the forces on the belt are the same at both pulleys,
//! so the torque is multiplied by `i` and the slip is a loss of its own: total efficiency `eta * (1 - s)`.
//! Symbols: d_1, d_2 pitch diameters of the driving and the driven pulley (m); s slip and creep together (-);
//! eta efficiency without slip: bending, bearings, air (-); w speed (rad/s); i ratio of the diameters (-).
//! Validity: a belt inside its rating; slip of one to two percent is creep, more is a belt about to fail. A toothed
//! belt has none. Pitch diameters, not outside diameters.
//! Source: belt drives in the usual handbooks of machine elements; the check is R. S. Khurmi, J. K. Gupta, Theory of
//! Machines, 14th ed., 2009, Ex. 11.1.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Speed of the driven pulley.
pub const SPEED: Formula = Formula {
    name: "speed",
    text: "w_in * (1 - s) / i",
    symbols: &[
        ("w_in", "rotational_speed", "speed of the driving pulley"),
        ("s", "percentage", "slip, creep included"),
        ("i", "number", "pitch diameter of the driven over that of the driving pulley"),
    ],
    validity: "a belt inside its rating",
    source: "usual handbooks of machine elements",
    revision: 1,
};

/// Efficiency with the loss of the slip.
pub const TOTAL_EFFICIENCY: Formula = Formula {
    name: "total_efficiency",
    text: "eta * (1 - s)",
    symbols: &[("eta", "percentage", "efficiency without slip"), ("s", "percentage", "slip, creep included")],
    validity: "a belt inside its rating",
    source: "balance of power",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &SPEED,
        domain: &[(-400.0, 400.0), (0.0, 0.1), (0.1, 10.0)],
        kernel: |x| x[0] / speed_ratio(x[2], x[1]),
    },
    Checked {
        formula: &TOTAL_EFFICIENCY,
        domain: &[(0.5, 1.0), (0.0, 0.1)],
        kernel: |x| x[0] * slip_factor(x[1]),
    },
];

/// Speed of the driven pulley's rim over that of the driving one.
#[must_use]
pub fn slip_factor(slip: f64) -> f64 {
    1.0 - slip
}

/// Driving speed over driven speed, slip included, power flowing to the load.
#[must_use]
pub fn speed_ratio(diameter_ratio: f64, slip: f64) -> f64 {
    diameter_ratio / slip_factor(slip)
}

#[cfg(test)]
mod tests {
    use super::speed_ratio;
    use crate::laws::testing::{close, rpm};

    #[test]
    fn published_two_stages() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 11.1.
        let (first, second) = (450.0 / 750.0, 150.0 / 900.0);
        close(rpm(150.0) / speed_ratio(first, 0.0) / speed_ratio(second, 0.0), rpm(1500.0), 1e-12);
        close(rpm(150.0) / speed_ratio(first, 0.02) / speed_ratio(second, 0.02), rpm(1440.6), 1e-12);
    }
}
