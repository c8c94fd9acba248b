//! The shaft in its bearings: drag and twist.
//!
//! Formula: `T_d = T_0 + b * w`, against the motion; `twist = T / k`.
//! Symbols: T_0 drag of seals and bearings at any speed (N·m); b drag per speed (N·m·s/rad); w speed (rad/s); T torque
//! (N·m); k torsional stiffness (N·m/rad).
//! Validity: drag that does not depend on the load; what grows with the load belongs into an efficiency. The twist is
//! that of steady torque.
//! Source: Coulomb's and Newton's laws of friction; Hooke's law.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Drag.
pub const DRAG: Formula = Formula {
    name: "drag",
    text: "T_0 + b * w",
    symbols: &[
        ("T_0", "torque", "drag of seals and bearings at any speed"),
        ("b", "viscous_torque_coefficient", "drag per speed"),
        ("w", "rotational_speed", "speed of the shaft"),
    ],
    validity: "turning forward; backward both turn round",
    source: "Coulomb's and Newton's laws of friction",
    revision: 1,
};

/// Twist between the ends.
pub const TWIST: Formula = Formula {
    name: "twist",
    text: "T / k",
    symbols: &[
        ("T", "torque", "torque it passes on"),
        ("k", "torsional_stiffness", "torque per angle of twist"),
    ],
    validity: "steady torque, inside the elastic range",
    source: "Hooke's law",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &DRAG,
        domain: &[(0.0, 20.0), (0.0, 0.1), (1.0, 400.0)],
        kernel: |x| Drag { constant: x[0], viscous: x[1] }.eval(x[2]),
    },
    Checked { formula: &TWIST, domain: &[(0.0, 1e3), (1e2, 1e6)], kernel: |x| x[0] / x[1] },
];

/// Drag over speed, against motion either way.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Drag {
    /// At any speed, N·m.
    pub constant: f64,
    /// Per speed, N·m·s/rad.
    pub viscous: f64,
}

impl Law for Drag {
    fn eval<R: Real>(&self, x: R) -> R {
        x.piecewise(&[0.0], |piece, x| {
            let held = if piece == 0 { -self.constant } else { self.constant };
            x * self.viscous + held
        })
    }

    fn jumps(&self) -> Vec<f64> {
        if self.constant > 0.0 { vec![0.0] } else { Vec::new() }
    }
}
