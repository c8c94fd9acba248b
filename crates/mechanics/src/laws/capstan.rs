//! Friction around a pulley: how much pull a wrapped belt or rope passes before it slips.
//!
//! Formula: `F_1 / F_2 = exp(mu * a / sin(g / 2))`; a running belt presses less by `q * v^2`:
//! `(F_1 - q * v^2) / (F_2 - q * v^2)` is that ratio. The pull is `F_1 - F_2`.
//! Symbols: F_1 tension of the tight side, F_2 of the slack side (N); mu coefficient of friction (-); a angle of wrap
//! (rad); g groove angle between both flanks, a straight angle for a flat belt or a plain drum (rad); q mass of the
//! belt per length (kg/m); v speed (m/s).
//! Validity: friction the same all around, belt without stiffness, the whole wrap about to slip. The slack tension
//! is what the take-up holds while it runs.
//! Source: Euler and Eytelwein; R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 11.4 and 11.5
//! (pp. 342, 343).
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

const BOOK: &str =
    "Euler and Eytelwein; R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 11";

/// Tight over slack tension when the wrap slips.
pub const TENSION_RATIO: Formula = Formula {
    name: "tension_ratio",
    text: "exp(mu * a / sin(g / 2))",
    symbols: &[
        ("mu", "number", "coefficient of friction"),
        ("a", "angle", "angle of wrap"),
        ("g", "angle", "groove angle; 180 degrees where it is flat"),
    ],
    validity: "the whole wrap about to slip",
    source: BOOK,
    revision: 1,
};

/// Most pull by the slack tension.
pub const PULL_BY_SLACK: Formula = Formula {
    name: "most_pull_by_slack_side",
    text: "(F_2 - q * v^2) * (K - 1)",
    symbols: &[
        ("F_2", "force", "tension of the slack side, held by the take-up"),
        ("q", "mass_per_length", "mass of the belt per length"),
        ("v", "speed", "speed of the belt"),
        ("K", "number", "tension ratio when it slips"),
    ],
    validity: "the slack tension stays as it is while it runs",
    source: BOOK,
    revision: 1,
};

/// Most pull by the tight tension.
pub const PULL_BY_TIGHT: Formula = Formula {
    name: "most_pull_by_tight_side",
    text: "(F_1 - q * v^2) * (1 - 1 / K)",
    symbols: &[
        ("F_1", "force", "tension of the tight side"),
        ("q", "mass_per_length", "mass of the belt per length"),
        ("v", "speed", "speed of the belt"),
        ("K", "number", "tension ratio when it slips"),
    ],
    validity: "the tight side carries no more than this",
    source: BOOK,
    revision: 1,
};

const PULL_DOMAIN: &[(f64, f64)] = &[(500.0, 5e3), (0.0, 2.0), (0.0, 12.0), (1.2, 12.0)];

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TENSION_RATIO,
        domain: &[(0.0, 0.6), (0.5, 16.0), (0.5, 3.1)],
        kernel: |x| tension_ratio(x[0], x[1], x[2]),
    },
    Checked {
        formula: &PULL_BY_SLACK,
        domain: PULL_DOMAIN,
        kernel: |x| pull_by_slack(x[0] - centrifugal(x[1], x[2]), x[3]),
    },
    Checked {
        formula: &PULL_BY_TIGHT,
        domain: PULL_DOMAIN,
        kernel: |x| pull_by_tight(x[0] - centrifugal(x[1], x[2]), x[3]),
    },
];

/// Tight over slack tension when a wrap (rad) in a groove (rad) slips.
#[must_use]
pub fn tension_ratio(friction: f64, wrap: f64, groove: f64) -> f64 {
    libm::exp(friction * wrap / libm::sin(groove / 2.0))
}

/// Tension (N) that a belt takes for running round, and that presses nothing on the pulley.
#[must_use]
pub fn centrifugal(mass_per_length: f64, speed: f64) -> f64 {
    mass_per_length * speed * speed
}

/// Most pull of a slack tension that presses; 0 where the belt lifts off.
#[must_use]
pub fn pull_by_slack(pressing: f64, tension_ratio: f64) -> f64 {
    f64::max(pressing, 0.0) * (tension_ratio - 1.0)
}

/// Most pull of a tight tension that presses; 0 where the belt lifts off.
#[must_use]
pub fn pull_by_tight(pressing: f64, tension_ratio: f64) -> f64 {
    f64::max(pressing, 0.0) * (1.0 - 1.0 / tension_ratio)
}

#[cfg(test)]
mod tests {
    use super::{pull_by_slack, pull_by_tight, tension_ratio};
    use crate::laws::testing::close;
    use core::f64::consts::PI;

    #[test]
    fn published_wraps() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 11.4 and 11.5, recomputed.
        let belt = tension_ratio(0.25, 160.0 * PI / 180.0, PI);
        close(2500.0 / belt, 1_243.784_852_34, 1e-10);
        close(pull_by_tight(2500.0, belt) * 0.3 * 200.0 * PI / 30.0, 7_893.032_558_46, 1e-10);
        let capstan = tension_ratio(0.25, 2.5 * 2.0 * PI, PI);
        close(9000.0 / capstan, 177.325_856_88, 1e-10);
        close(pull_by_slack(9000.0 / capstan, capstan), 9000.0 - 177.325_856_88, 1e-10);
    }

    #[test]
    fn a_belt_that_lifts_off_pulls_nothing() {
        assert_eq!(pull_by_slack(-5.0, 3.0), 0.0);
        assert_eq!(pull_by_tight(-5.0, 3.0), 0.0);
    }
}
