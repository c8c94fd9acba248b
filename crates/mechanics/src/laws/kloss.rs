//! Kloss's formula: torque of an induction machine over slip, from its breakdown point.
//!
//! Formula: `T = 2 * T_b / (s / s_b + s_b / s)`; through a rated point: `s_b = s_n * (k + sqrt(k^2 - 1))`, `k = T_b / T_n`.
//! Symbols: T torque (N·m); T_b breakdown torque (N·m); s slip (-); s_b slip at breakdown (-); T_n, s_n torque and
//! slip at the rated point.
//! Validity: stator resistance left aside, which serves well from the rated point to breakdown and above the
//! synchronous speed. Deep-bar and double-cage rotors give more near standstill: there the catalogue's ratios shape
//! the curve (see `catalogue_curve`).
//! Source: M. Kloss, Archiv für Elektrotechnik 5 (1916) (from memory); the checks name theirs.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;
use crate::scalar::Real;

/// The curve.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "2 * T_b / (s / s_b + s_b / s)",
    symbols: &[
        ("T_b", "torque", "breakdown torque"),
        ("s", "percentage", "slip"),
        ("s_b", "percentage", "slip at breakdown"),
    ],
    validity: "stator resistance left aside; near standstill the catalogue's ratios replace it",
    source: "M. Kloss, Archiv für Elektrotechnik 5 (1916) (from memory)",
    revision: 1,
};

/// Where it breaks down.
pub const BREAKDOWN_SLIP: Formula = Formula {
    name: "breakdown_slip",
    text: "s_n * (k + sqrt(k^2 - 1))",
    symbols: &[
        ("s_n", "percentage", "slip at the rated point"),
        ("k", "number", "breakdown torque over rated torque"),
    ],
    validity: "the rated point lies between no load and breakdown",
    source: "closed form, Kloss's formula through the rated point",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TORQUE,
        domain: &[(1.0, 1e4), (0.001, 2.0), (0.02, 0.9)],
        kernel: |x| torque(x[0], x[2], x[1]),
    },
    Checked {
        formula: &BREAKDOWN_SLIP,
        domain: &[(0.002, 0.1), (1.0, 6.0)],
        kernel: |x| breakdown_slip(x[0], x[1]),
    },
];

/// Torque at a slip; below zero above the synchronous speed. Written without a division by the slip, which may be 0.
#[must_use]
pub fn torque<R: Real>(breakdown_torque: f64, breakdown_slip: f64, slip: R) -> R {
    (slip * (1.0 / breakdown_slip)).kloss(2.0 * breakdown_torque)
}

/// Slip at breakdown, from the slip at the rated point and the ratio of breakdown to rated torque (1 or above).
#[must_use]
pub fn breakdown_slip(rated_slip: f64, ratio: f64) -> f64 {
    rated_slip * (ratio + (ratio * ratio - 1.0).max(0.0).sqrt())
}

#[cfg(test)]
mod tests {
    use super::{breakdown_slip, torque};
    use crate::laws::testing::close;

    /// Slip at which the curve gives `1 / ratio` of its breakdown torque, on the running side.
    fn running_slip(breakdown: f64, ratio: f64) -> f64 {
        breakdown * (ratio - (ratio * ratio - 1.0).sqrt())
    }

    #[test]
    fn published_ratios() {
        // S. K. Pillai, A First Course on Electrical Drives, 2nd ed., 1989, Ex. 4.1: starting 1.5, breakdown 2.25
        // times full load.
        let s_b = running_slip(1.0, 1.5);
        close(s_b, 0.381_966_011_25, 1e-10);
        let s_n = running_slip(s_b, 2.25);
        close(s_n, 0.089_546_416_865_8, 1e-10);
        close(breakdown_slip(s_n, 2.25), s_b, 1e-12);
        close(torque(2.25, s_b, 1.0), 1.5, 1e-12);
        close(torque(2.25, s_b, s_n), 1.0, 1e-12);
    }

    #[test]
    fn published_slips_against_a_constant_torque() {
        // S. K. Pillai, A First Course on Electrical Drives, 2nd ed., 1989, Ex. 4.3: s_b = 0.2, breakdown 1.6625 times load.
        for s in [0.066_875_735_295_1, 0.598_124_264_705] {
            close(torque(1.6625, 0.2, s), 1.0, 1e-9);
        }
    }

    #[test]
    fn ends_of_the_curve() {
        // Closed form of Kloss's formula.
        close(torque(2.5, 0.2, 1.0), 0.961_538_461_538, 1e-10);
        close(torque(2.5, 0.2, 0.051_138_130_009), 1.2, 1e-10);
        close(torque(2.5, 0.2, 0.782_195_203_324), 1.2, 1e-10);
        close(torque(2.5, 0.2, 0.2), 2.5, 1e-15);
        assert_eq!(torque(2.5, 0.2, 0.0), 0.0);
        close(torque(2.5, 0.2, -0.2), -2.5, 1e-15);
        close(torque(2.5, 0.2, 0.045_996_520_473_3), 1.092_147_166_74, 1e-9);
    }
}
