//! The plate clutch: torque by friction.
//!
//! Formula: `T = n * mu * F * (d_o + d_i) / 4`.
//! Engaging with the output at rest, source and load left aside: common speed `J_1 * w / (J_1 + J_2)`, time
//! `J_1 * J_2 * w / ((J_1 + J_2) * T)`, heat `J_1 * J_2 * w^2 / (2 * (J_1 + J_2))`.
//! Symbols: n rubbing surfaces (-); mu coefficient of friction (-); F clamping force (N); d_o, d_i outer and inner
//! diameter of the lining (m); T torque at which it slips (N·m); J_1, J_2
//! inertia before and behind it, at its shaft (kg·m²); w speed before it when it engages (rad/s).
//! Validity: run in, wear even over the lining; a new lining that is pressed evenly carries a little more.
//! Source: R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 10 (uniform wear) and Ex. 3.12 (p. 47).
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

/// Symbols of an engagement.
const SIDES: [(&str, &str, &str); 3] = [
    ("J_1", "moment_of_inertia", "inertia before the clutch, at its shaft"),
    ("J_2", "moment_of_inertia", "inertia behind it, at its shaft"),
    ("w", "rotational_speed", "speed before it when it engages"),
];

const EXAMPLE: &str = "R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 3.12 (p. 47)";
const ASIDE: &str = "output at rest before; torques of source and load and losses left aside meanwhile";

/// Speed at which both sides meet.
pub const ENGAGEMENT_SPEED: Formula = Formula {
    name: "engagement_speed",
    text: "J_1 * w / (J_1 + J_2)",
    symbols: &SIDES,
    validity: ASIDE,
    source: EXAMPLE,
    revision: 1,
};

/// Time it slips.
pub const ENGAGEMENT_TIME: Formula = Formula {
    name: "engagement_time",
    text: "J_1 * J_2 * w / ((J_1 + J_2) * T)",
    symbols: &[SIDES[0], SIDES[1], SIDES[2], ("T", "torque", "torque at which it slips")],
    validity: ASIDE,
    source: EXAMPLE,
    revision: 1,
};

/// Heat in its linings.
pub const ENGAGEMENT_HEAT: Formula = Formula {
    name: "engagement_heat",
    text: "J_1 * J_2 * w^2 / (2 * (J_1 + J_2))",
    symbols: &SIDES,
    validity: ASIDE,
    source: EXAMPLE,
    revision: 1,
};

const SIDES_DOMAIN: &[(f64, f64)] = &[(0.01, 5.0), (0.01, 5.0), (1.0, 300.0)];

fn engagement(x: &[f64], torque: f64) -> Engagement {
    Engagement::new(x[0], x[1], x[2], torque).unwrap_or(Engagement { speed: 0.0, time: 0.0, heat: 0.0 })
}

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TORQUE,
        domain: &[(1.0, 12.0), (0.05, 0.6), (50.0, 2e4), (0.1, 0.5), (0.05, 0.1)],
        kernel: |x| torque(x[0], x[1], x[2], (x[3], x[4])),
    },
    Checked { formula: &ENGAGEMENT_SPEED, domain: SIDES_DOMAIN, kernel: |x| engagement(x, 1.0).speed },
    Checked {
        formula: &ENGAGEMENT_TIME,
        domain: &[(0.01, 5.0), (0.01, 5.0), (1.0, 300.0), (5.0, 500.0)],
        kernel: |x| engagement(x, x[3]).time,
    },
    Checked { formula: &ENGAGEMENT_HEAT, domain: SIDES_DOMAIN, kernel: |x| engagement(x, 1.0).heat },
];

/// What becomes of a clutch that engages with its output at rest.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Engagement {
    /// Speed at which both sides meet, rad/s.
    pub speed: f64,
    /// Time it slips, s.
    pub time: f64,
    /// Heat in its linings, J.
    pub heat: f64,
}

impl Engagement {
    /// By the inertias before and behind it, the speed before it and its torque; none where one of them is nought.
    #[must_use]
    pub fn new(driving: f64, driven: f64, speed: f64, torque: f64) -> Option<Self> {
        let both = driving + driven;
        let found = Self {
            speed: driving * speed / both,
            time: driving * driven * speed / (both * torque),
            heat: driving * driven * speed * speed / (2.0 * both),
        };
        (driving > 0.0 && driven > 0.0 && torque > 0.0).then_some(found)
    }
}

/// Torque at which it slips, by the outer and inner diameter of its lining.
#[must_use]
pub fn torque(surfaces: f64, friction: f64, force: f64, diameters: (f64, f64)) -> f64 {
    surfaces * friction * force * (diameters.0 + diameters.1) / 4.0
}

#[cfg(test)]
mod tests {
    use super::Engagement;
    use crate::laws::testing::{close, rpm};

    #[test]
    fn published_engagement() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 3.12 (p. 47), recomputed.
        let found = Engagement::new(60.0 * 0.14 * 0.14, 20.0 * 0.08 * 0.08, rpm(750.0), 150.0).unwrap();
        close(found.speed, 70.830_386_514_984_6, 1e-12);
        close(found.time, 0.060_441_929_826_120_2, 1e-12);
        close(found.heat, 356.032_355_082_242, 1e-12);
        assert_eq!(Engagement::new(1.0, 0.0, 10.0, 5.0), None);
    }
}
