//! The driven wheel: turning to rolling, and the grip that limits it.
//!
//! Formula: `v = w * C / (2 * pi)`; greatest force before the wheel slips: `mu * c * m * g * cos(atan(G))`.
//! Symbols: C rolling circumference, way covered in one turn under load (m); w speed (rad/s); v speed (m/s);
//! mu grip between tyre and ground (-); c share of the weight on the driven wheels (-); m mass (kg); g gravity
//! (m/s²); G grade, rise per run (-).
//! Validity: no shift of weight to the rear by acceleration or grade (it helps a rear wheel and harms a front
//! wheel), slip of the tyre left aside.
//! Source: Coulomb's law of friction; vehicle dynamics in the usual handbooks.
//! Revision: 1

use super::{Checked, G_N};
use crate::registry::Formula;
use core::f64::consts::PI;

/// Speed over ground.
pub const ROLLING_SPEED: Formula = Formula {
    name: "speed",
    text: "w * C / (2 * pi)",
    symbols: &[("w", "rotational_speed", "speed of the wheel"), ("C", "length", "rolling circumference")],
    validity: "no slip; circumference under load, shorter than that of the free wheel",
    source: "definition",
    revision: 1,
};

/// The most force the ground takes.
pub const GRIP_FORCE: Formula = Formula {
    name: "grip_force",
    text: "mu * c * m * (9.80665 m/s²) * cos(atan(G))",
    symbols: &[
        ("mu", "number", "grip, friction between tyre and ground"),
        ("c", "percentage", "share of the weight on the driven wheels"),
        ("m", "mass", "mass of the vehicle"),
        ("G", "grade", "grade, rise per run"),
    ],
    validity: "no shift of weight between the axles",
    source: "Coulomb's law of friction",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &ROLLING_SPEED,
        domain: &[(-100.0, 100.0), (0.1, 5.0)],
        kernel: |x| x[0] / wheel_ratio(radius_of(x[1])),
    },
    Checked {
        formula: &GRIP_FORCE,
        domain: &[(0.05, 1.2), (0.05, 1.0), (10.0, 4e4), (-0.3, 0.3)],
        kernel: |x| grip_force(x[0], x[1], x[2] * G_N * super::incline::cosine_of_grade(x[3])),
    },
];

/// Rolling radius (m) of a rolling circumference (m).
#[must_use]
pub fn radius_of(circumference: f64) -> f64 {
    circumference / (2.0 * PI)
}

/// Turning speed over rolling speed (rad/s per m/s) of a rolling radius (m).
#[must_use]
pub fn wheel_ratio(radius: f64) -> f64 {
    1.0 / radius
}

/// The most force (N) before the wheel slips, by the force with which the whole vehicle presses on the ground (N).
#[must_use]
pub fn grip_force(grip: f64, driven_share: f64, normal_force: f64) -> f64 {
    grip * driven_share * normal_force
}
