//! A mass beside its axis.
//!
//! Formula: `T = m * g * r * cos(a) + T_f`, `J = m * r^2 + J_0`.
//! Symbols: T torque (N·m), T_f friction, opposing motion; m mass (kg); g standard gravity 9.80665 (m/s²); r distance of
//! the centre of mass from the axis (m); a angle of the arm above the level (rad); J inertia about the axis, J_0 about the
//! centre of mass (kg·m²).
//! Validity: rigid body, horizontal axis. The torque is taken at one angle at every speed: the worst of those swept.
//! Source: Newton's laws of motion; parallel axis theorem.
//! Revision: 1

use super::{Checked, G_N};
use crate::registry::Formula;

/// Torque at an angle.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "m * (9.80665 m/s²) * r * cos(a) + T_f",
    symbols: &[
        ("m", "mass", "mass"),
        ("r", "length", "distance of its centre from the axis"),
        ("a", "angle", "angle of the arm above the level, the worst of those swept"),
        ("T_f", "torque", "friction"),
    ],
    validity: "lifting; at one angle, whatever the speed",
    source: "Newton's laws of motion",
    revision: 1,
};

/// Inertia about the axis.
pub const INERTIA: Formula = Formula {
    name: "inertia",
    text: "m * r^2 + J_0",
    symbols: &[
        ("m", "mass", "mass"),
        ("r", "length", "distance of its centre from the axis"),
        ("J_0", "moment_of_inertia", "inertia about its own centre"),
    ],
    validity: "rigid body",
    source: "parallel axis theorem",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TORQUE,
        domain: &[(0.1, 1e4), (0.01, 5.0), (-3.0, 3.0), (0.0, 50.0)],
        kernel: |x| pull(x[0], x[1], x[2]) + x[3],
    },
    Checked {
        formula: &INERTIA,
        domain: &[(0.1, 1e4), (0.01, 5.0), (0.0, 100.0)],
        kernel: |x| inertia(x[0], x[1], x[2]),
    },
];

/// Torque (N·m) of the weight at an angle of the arm above the level.
#[must_use]
pub fn pull(mass: f64, radius: f64, angle: f64) -> f64 {
    mass * G_N * radius * libm::cos(angle)
}

/// Inertia (kg·m²) about the axis.
#[must_use]
pub fn inertia(mass: f64, radius: f64, own: f64) -> f64 {
    mass * radius * radius + own
}

/// Of the angles between two, those at which the weight pulls most and least against forward motion.
#[must_use]
pub fn extremes(from: f64, to: f64) -> (f64, f64) {
    use std::f64::consts::{PI, TAU};
    let holds = |angle: f64| {
        let next = angle + TAU * ((from - angle) / TAU).ceil();
        (next <= to).then_some(next)
    };
    let (near, far) = if libm::cos(from) >= libm::cos(to) { (from, to) } else { (to, from) };
    (holds(0.0).unwrap_or(near), holds(PI).unwrap_or(far))
}

#[cfg(test)]
mod tests {
    use super::{extremes, inertia, pull};
    use crate::laws::testing::close;

    #[test]
    fn greatest_on_the_level() {
        // Closed form: 12 kg at 0.4 m pull 47.07 N·m on the level, half of it at 60°.
        close(pull(12.0, 0.4, 0.0), 47.071_92, 1e-12);
        close(pull(12.0, 0.4, 60.0_f64.to_radians()), 23.535_96, 1e-12);
        close(inertia(12.0, 0.4, 0.1), 2.02, 1e-12);
    }

    #[test]
    fn the_worst_of_a_swing() {
        let degrees = |from: f64, to: f64| {
            let (most, least) = extremes(from.to_radians(), to.to_radians());
            (most.to_degrees(), least.to_degrees())
        };
        let (most, least) = degrees(-30.0, 60.0);
        assert_eq!(most, 0.0);
        close(least, 60.0, 1e-12);
        let (most, least) = degrees(20.0, 200.0);
        close(most, 20.0, 1e-12);
        close(least, 180.0, 1e-12);
        let (most, least) = degrees(0.0, 360.0);
        assert_eq!(most, 0.0);
        close(least, 180.0, 1e-12);
        let (most, _) = degrees(300.0, 380.0);
        close(most, 360.0, 1e-12);
    }
}
