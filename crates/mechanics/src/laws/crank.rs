//! The slider-crank: a turning crank pushes a slider to and fro.
//!
//! Formula: lever arm `h = r * (sin(t) + r * sin(2 * t) / (2 * sqrt(l^2 - r^2 * sin(t)^2)))`; slider speed `w * h`,
//! slider force `eta * T / h`.
//! Symbols: r crank radius, half the stroke (m); l length of the rod (m); t crank angle from the dead centre at which
//! the slider is farthest (rad); w speed (rad/s); T torque (N·m).
//! Validity: slider on a line through the crank's axis; rod longer than the crank. The lever arm is nought at both dead
//! centres and greatest a little before the quarter turn: there the torque for a given force is the most.
//! Source: R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 15 (velocity of the slider, exact form).
//! Revision: 1

use super::Checked;
use crate::registry::Formula;
use core::f64::consts::PI;

/// Way of the slider per angle of the crank.
pub const LEVER_ARM: Formula = Formula {
    name: "lever_arm",
    text: "r * (sin(t) + r * sin(2 * t) / (2 * sqrt(l^2 - r^2 * sin(t)^2)))",
    symbols: &[
        ("r", "length", "crank radius, half the stroke"),
        ("t", "angle", "crank angle from the farther dead centre"),
        ("l", "length", "length of the rod"),
    ],
    validity: "slider in line with the axis of the crank, rod longer than the crank",
    source: "R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 15",
    revision: 1,
};

/// Speed of the slider.
pub const SPEED: Formula = Formula {
    name: "speed",
    text: "w * h",
    symbols: &[
        ("w", "rotational_speed", "speed of the crank"),
        ("h", "length", "lever arm at this crank angle"),
    ],
    validity: "at this crank angle",
    source: "definition",
    revision: 1,
};

/// Force of the slider.
pub const FORCE: Formula = Formula {
    name: "force",
    text: "eta * T / h",
    symbols: &[
        ("eta", "percentage", "efficiency, power flowing to the load"),
        ("T", "torque", "torque on the crank"),
        ("h", "length", "lever arm at this crank angle"),
    ],
    validity: "power flows to the load; inertia of the slider left aside",
    source: "balance of power",
    revision: 1,
};

/// Mean speed of the slider.
pub const MEAN_SPEED: Formula = Formula {
    name: "mean_speed",
    text: "2 * r * w / pi",
    symbols: &[("r", "length", "crank radius"), ("w", "rotational_speed", "speed of the crank")],
    validity: "over a whole turn, to and fro",
    source: "definition",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &LEVER_ARM,
        domain: &[(0.02, 0.2), (0.0, 3.1), (0.25, 1.0)],
        kernel: |x| lever_arm(x[0], x[2], x[1]),
    },
    Checked { formula: &SPEED, domain: &[(-50.0, 50.0), (0.01, 0.5)], kernel: |x| x[0] * x[1] },
    Checked {
        formula: &FORCE,
        domain: &[(0.5, 1.0), (0.0, 1e4), (0.01, 0.5)],
        kernel: |x| x[0] * x[1] / x[2],
    },
    Checked {
        formula: &MEAN_SPEED,
        domain: &[(0.02, 0.2), (0.0, 100.0)],
        kernel: |x| mean_speed(x[0], x[1]),
    },
];

/// Way of the slider (m) per angle of the crank (rad), by crank radius, rod (m) and crank angle (rad).
#[must_use]
pub fn lever_arm(radius: f64, rod: f64, angle: f64) -> f64 {
    let sine = libm::sin(angle);
    let along = (rod * rod - radius * radius * sine * sine).sqrt();
    radius * (sine + radius * libm::sin(2.0 * angle) / (2.0 * along))
}

/// The crank angle at which the lever arm is greatest: it rises to there and falls behind it.
#[must_use]
pub fn worst_angle(radius: f64, rod: f64) -> f64 {
    let (mut low, mut high) = (0.0, PI);
    for _ in 0..200 {
        let (first, second) = (low + (high - low) / 3.0, high - (high - low) / 3.0);
        if lever_arm(radius, rod, first) < lever_arm(radius, rod, second) {
            low = first;
        } else {
            high = second;
        }
    }
    0.5 * (low + high)
}

/// Mean speed of the slider over a turn.
#[must_use]
pub fn mean_speed(radius: f64, speed: f64) -> f64 {
    2.0 * radius * speed / PI
}

#[cfg(test)]
mod tests {
    use super::{lever_arm, mean_speed, worst_angle};
    use crate::laws::testing::close;
    use core::f64::consts::PI;
    use proptest::prelude::*;

    #[test]
    fn an_endless_rod_is_a_sine() {
        close(lever_arm(0.1, 1e6, 0.7), 0.1 * libm::sin(0.7), 1e-6);
        close(worst_angle(0.1, 1e6), PI / 2.0, 1e-6);
    }

    #[test]
    fn the_mean_is_the_way_over_the_time() {
        // Four crank radii in a turn.
        close(mean_speed(0.15, 2.0 * PI), 4.0 * 0.15, 1e-15);
    }

    proptest! {
        #[test]
        fn no_angle_is_worse(radius in 0.01..0.2f64, share in 1.05..8.0f64, angle in 0.0..PI) {
            let rod = share * radius;
            let worst = lever_arm(radius, rod, worst_angle(radius, rod));
            prop_assert!(lever_arm(radius, rod, angle) <= worst * (1.0 + 1e-9));
        }

        #[test]
        fn the_arm_is_the_slope_of_the_way(radius in 0.01..0.2f64, share in 1.2..8.0f64, angle in 0.1..3.0f64) {
            let rod = share * radius;
            let place = |t: f64| {
                radius * libm::cos(t) + (rod * rod - radius * radius * libm::sin(t) * libm::sin(t)).sqrt()
            };
            let slope = -(place(angle + 1e-6) - place(angle - 1e-6)) / 2e-6;
            prop_assert!((slope - lever_arm(radius, rod, angle)).abs() < 1e-6 * radius.max(0.01));
        }
    }
}
