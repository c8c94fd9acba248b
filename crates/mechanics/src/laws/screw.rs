//! The power screw: a nut that runs along a turning thread, with friction of thread and collar, both ways.
//!
//! Formula: `tan(l) = L / (pi * d)`, `m = mu / cos(b / 2)`; pushing the load
//! `T = F * d / 2 * ((tan(l) + m) / (1 - m * tan(l)) + m_c * d_c / d)`; the load pushing back
//! `T = F * d / 2 * ((tan(l) - m) / (1 + m * tan(l)) - m_c * d_c / d)`, below zero where the screw locks itself and has
//! to be turned down. Efficiencies are these against the loss-free `F * L / (2 * pi)`.
//! Symbols: L lead, way of the nut in one turn (m); d mean (pitch) diameter of the thread (m); l lead angle (rad); mu
//! coefficient of friction of the thread (-); b thread angle between both flanks: 0 square, 29 degrees Acme, 30
//! degrees trapezoidal, 60 degrees V (rad); m_c, d_c friction (-) and mean diameter (m) of the collar that takes the
//! thrust; F force (N); T torque (N·m).
//! Validity: sliding threads of small lead angle; the flank's slope is taken in the axial plane. Rolling screws are
//! given by their efficiencies. Static friction is higher than running friction: a start asks more.
//! Source: T. H. Wentzell, Machine Design, 2007, Ex. 18.1 (p. 399); R. S. Khurmi, J. K. Gupta, Theory of Machines,
//! 14th ed., 2009, ch. 10.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;
use core::f64::consts::TAU;

const BOOK: &str = "R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 10";

/// Lead angle.
pub const LEAD_ANGLE: Formula = Formula {
    name: "lead_angle",
    text: "atan(L / (pi * d))",
    symbols: &[
        ("L", "length", "lead, way of the nut in one turn"),
        ("d", "length", "mean diameter of the thread"),
    ],
    validity: "at the mean diameter",
    source: "definition",
    revision: 1,
};

/// Friction along a sloping flank.
pub const THREAD_FRICTION: Formula = Formula {
    name: "thread_friction",
    text: "mu / cos(b / 2)",
    symbols: &[
        ("mu", "number", "coefficient of friction of the thread"),
        ("b", "angle", "thread angle, between both flanks"),
    ],
    validity: "flank slope taken in the axial plane: small lead angles",
    source: BOOK,
    revision: 1,
};

/// Symbols of both efficiencies.
const LOSSES: &[(&str, &str, &str)] = &[
    ("l", "angle", "lead angle"),
    ("m", "number", "friction along the flank"),
    ("m_c", "number", "coefficient of friction of the collar"),
    ("d_c", "length", "mean diameter of the collar"),
    ("d", "length", "mean diameter of the thread"),
];

/// Efficiency while the screw drives.
pub const EFFICIENCY: Formula = Formula {
    name: "efficiency_of_friction",
    text: "tan(l) / ((tan(l) + m) / (1 - m * tan(l)) + m_c * d_c / d)",
    symbols: LOSSES,
    validity: "the screw drives the nut",
    source: BOOK,
    revision: 1,
};

/// Efficiency while the nut drives.
pub const EFFICIENCY_BACKWARD: Formula = Formula {
    name: "efficiency_of_friction_backward",
    text: "((tan(l) - m) / (1 + m * tan(l)) - m_c * d_c / d) / tan(l)",
    symbols: LOSSES,
    validity: "the load drives the screw; 0 or below is self-locking at this friction",
    source: BOOK,
    revision: 1,
};

/// Speed of the nut.
pub const SPEED: Formula = Formula {
    name: "speed",
    text: "w * L / (2 * pi)",
    symbols: &[("w", "rotational_speed", "speed of the screw"), ("L", "length", "lead")],
    validity: "always",
    source: "definition",
    revision: 1,
};

/// Force of the nut.
pub const FORCE: Formula = Formula {
    name: "force",
    text: "2 * pi * eta * T / L",
    symbols: &[
        ("eta", "percentage", "efficiency, power flowing to the load"),
        ("T", "torque", "torque on the screw"),
        ("L", "length", "lead"),
    ],
    validity: "power flows to the load",
    source: "balance of power",
    revision: 1,
};

/// Torque that reaches the screw when the load drives.
pub const TORQUE_BACKWARD: Formula = Formula {
    name: "input_torque_backward",
    text: "eta_b * F * L / (2 * pi)",
    symbols: &[
        ("eta_b", "percentage", "efficiency, power flowing back; below 0 the screw has to be turned"),
        ("F", "force", "force of the load on the nut"),
        ("L", "length", "lead"),
    ],
    validity: "the load pushes the way it moves",
    source: "balance of power",
    revision: 1,
};

const LOSS_DOMAIN: &[(f64, f64)] = &[(0.02, 0.4), (0.0, 0.3), (0.0, 0.3), (0.01, 0.2), (0.01, 0.2)];

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &LEAD_ANGLE,
        domain: &[(0.001, 0.05), (0.005, 0.2)],
        kernel: |x| lead_angle(x[0], x[1]),
    },
    Checked {
        formula: &THREAD_FRICTION,
        domain: &[(0.02, 0.3), (0.0, 1.1)],
        kernel: |x| flank_friction(x[0], x[1]),
    },
    Checked { formula: &EFFICIENCY, domain: LOSS_DOMAIN, kernel: |x| thread(x).efficiency() },
    Checked {
        formula: &EFFICIENCY_BACKWARD,
        domain: LOSS_DOMAIN,
        kernel: |x| thread(x).efficiency_backward(),
    },
    Checked {
        formula: &SPEED,
        domain: &[(-300.0, 300.0), (0.001, 0.05)],
        kernel: |x| x[0] / screw_ratio(x[1]),
    },
    Checked {
        formula: &FORCE,
        domain: &[(0.05, 1.0), (0.0, 1e4), (0.001, 0.05)],
        kernel: |x| x[1] * screw_ratio(x[2]) * x[0],
    },
    Checked {
        formula: &TORQUE_BACKWARD,
        domain: &[(-2.0, 1.0), (0.0, 1e6), (0.001, 0.05)],
        kernel: |x| x[0] * x[1] / screw_ratio(x[2]),
    },
];

fn thread(x: &[f64]) -> Thread {
    Thread { lead_angle: x[0], friction: x[1], collar: x[2] * x[3] / x[4] }
}

/// Turning speed over speed of the nut (rad/s per m/s), and force over torque, of a lead (m per turn).
#[must_use]
pub fn screw_ratio(lead: f64) -> f64 {
    TAU / lead
}

/// Lead angle, rad.
#[must_use]
pub fn lead_angle(lead: f64, mean_diameter: f64) -> f64 {
    libm::atan(lead / (core::f64::consts::PI * mean_diameter))
}

/// Friction along a flank that slopes by half the thread angle (rad).
#[must_use]
pub fn flank_friction(friction: f64, thread_angle: f64) -> f64 {
    friction / libm::cos(thread_angle / 2.0)
}

/// What the losses of a screw follow from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Thread {
    /// Lead angle, rad.
    pub lead_angle: f64,
    /// Friction along the flank.
    pub friction: f64,
    /// Friction of the collar times its mean diameter over that of the thread.
    pub collar: f64,
}

impl Thread {
    /// Efficiency while the screw drives; 0 or below where the friction is too high for it to turn under load.
    #[must_use]
    pub fn efficiency(self) -> f64 {
        let tangent = libm::tan(self.lead_angle);
        tangent / ((tangent + self.friction) / (1.0 - self.friction * tangent) + self.collar)
    }

    /// Efficiency while the nut drives; 0 or below is self-locking.
    #[must_use]
    pub fn efficiency_backward(self) -> f64 {
        let tangent = libm::tan(self.lead_angle);
        ((tangent - self.friction) / (1.0 + self.friction * tangent) - self.collar) / tangent
    }
}

#[cfg(test)]
mod tests {
    use super::{Thread, lead_angle, screw_ratio};
    use crate::laws::testing::close;
    use proptest::prelude::*;

    #[test]
    fn published_screws() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 10.10 (p. 279), recomputed.
        let thread = Thread { lead_angle: lead_angle(0.0125, 0.05), friction: 0.13, collar: 0.0 };
        let ratio = screw_ratio(0.0125);
        close(25e3 / ratio / thread.efficiency(), 132.355_143_109, 1e-10);
        close(-25e3 / ratio * thread.efficiency_backward(), 31.191_402_995_8, 1e-10);
        close(thread.efficiency(), 0.375_776_252_8, 1e-9);
        // T. H. Wentzell, Machine Design, 2007, Ex. 18.1 (p. 399): in inches and pounds.
        let thread = Thread { lead_angle: lead_angle(1.0 / 3.0, 1.354), friction: 0.15, collar: 0.0 };
        close(2900.0 / screw_ratio(1.0 / 3.0) / thread.efficiency(), 453.677_497_398, 1e-9);
    }

    proptest! {
        #[test]
        fn friction_loses_in_both_directions(l in 0.02..0.4f64, m in 0.0..0.3f64, c in 0.0..0.3f64) {
            let thread = Thread { lead_angle: l, friction: m, collar: c };
            prop_assert!(thread.efficiency() > 0.0 && thread.efficiency() <= 1.0);
            prop_assert!(thread.efficiency_backward() <= 1.0 + 1e-15);
        }
    }
}
