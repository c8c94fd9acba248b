//! The plate clutch: torque by friction.
//!
//! Formula: `T = n * mu * F * (d_o + d_i) / 4`.
//! Symbols: n rubbing surfaces (-); mu coefficient of friction (-); F clamping force (N); d_o, d_i outer and inner
//! diameter of the lining (m); T torque at which it slips (N·m).
//! Validity: run in, wear even over the lining; a new lining that is pressed evenly carries a little more.
//! Source: R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 10 (uniform wear).
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Torque at which it slips.
pub const TORQUE: Formula = Formula {
    name: "torque_capacity",
    text: "n * mu * F * (d_o + d_i) / 4",
    symbols: &[
        ("n", "count", "rubbing surfaces, two for a plate that is gripped on both sides"),
        ("mu", "number", "coefficient of friction of the lining"),
        ("F", "force", "clamping force"),
        ("d_o", "length", "outer diameter of the lining"),
        ("d_i", "length", "inner diameter of the lining"),
    ],
    validity: "a lining that is run in: wear even over it",
    source: "R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 10",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &TORQUE,
    domain: &[(1.0, 12.0), (0.05, 0.6), (50.0, 2e4), (0.1, 0.5), (0.05, 0.1)],
    kernel: |x| torque(x[0], x[1], x[2], (x[3], x[4])),
}];

/// Torque at which it slips, by the outer and inner diameter of its lining.
#[must_use]
pub fn torque(surfaces: f64, friction: f64, force: f64, diameters: (f64, f64)) -> f64 {
    surfaces * friction * force * (diameters.0 + diameters.1) / 4.0
}
