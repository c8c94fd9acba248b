//! Ratio and loss between two shafts, for each direction of power.
//!
//! Formula: `w_out = w_in / i`; load driven: `T_out = i * eta * T_in`; load driving: `T_in = eta_b * T_out / i`.
//! Symbols: i reduction, driver's speed over driven's (-); w speed (rad/s); T torque (N·m); eta efficiency when
//! power flows to the load, eta_b when it flows back (-); z_1, z_2 teeth of the driving and the driven wheel (-).
//! Validity: steady running at the load the efficiency was given for; at part load the real efficiency is lower.
//! The two efficiencies differ for worms and screws and are close for spur, bevel and chain drives.
//! Source: balance of power; tooth ratios as ISO 1122-1 (from memory).
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Reduction of a pair of wheels.
pub const REDUCTION: Formula = Formula {
    name: "reduction",
    text: "z_2 / z_1",
    symbols: &[("z_2", "count", "teeth of the driven wheel"), ("z_1", "count", "teeth of the driving wheel")],
    validity: "positive drive without slip",
    source: "definition, ISO 1122-1 (from memory)",
    revision: 1,
};

/// Speed behind the gear.
pub const SPEED: Formula = Formula {
    name: "speed",
    text: "w_in / i",
    symbols: &[("w_in", "rotational_speed", "speed of the input shaft"), ("i", "number", "reduction")],
    validity: "positive drive without slip",
    source: "definition",
    revision: 1,
};

/// Torque behind the gear when the source drives.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "i * eta * T_in",
    symbols: &[
        ("i", "number", "reduction"),
        ("eta", "percentage", "efficiency, power flowing to the load"),
        ("T_in", "torque", "torque on the input shaft"),
    ],
    validity: "power flows to the load",
    source: "balance of power",
    revision: 1,
};

/// Torque that reaches the source's side when the load drives.
pub const TORQUE_BACKWARD: Formula = Formula {
    name: "input_torque_backward",
    text: "eta_b * T_out / i",
    symbols: &[
        ("eta_b", "percentage", "efficiency, power flowing back"),
        ("T_out", "torque", "torque of the load on the output shaft"),
        ("i", "number", "reduction"),
    ],
    validity: "power flows back from the load",
    source: "balance of power",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked { formula: &REDUCTION, domain: &[(5.0, 200.0), (5.0, 200.0)], kernel: |x| reduction(x[1], x[0]) },
    Checked { formula: &SPEED, domain: &[(-400.0, 400.0), (0.1, 100.0)], kernel: |x| x[0] / x[1] },
    Checked {
        formula: &TORQUE,
        domain: &[(0.1, 100.0), (0.2, 1.0), (0.0, 1e3)],
        kernel: |x| torque_forward(x[2], x[0], x[1]),
    },
    Checked {
        formula: &TORQUE_BACKWARD,
        domain: &[(0.1, 1.0), (0.0, 1e5), (0.1, 100.0)],
        kernel: |x| torque_backward(x[1], x[2], x[0]),
    },
];

/// Reduction of a driving and a driven wheel, by teeth or by pitch diameters.
#[must_use]
pub fn reduction(driver: f64, driven: f64) -> f64 {
    driven / driver
}

/// Torque on the output shaft, power flowing to the load.
#[must_use]
pub fn torque_forward(input: f64, reduction: f64, efficiency: f64) -> f64 {
    reduction * efficiency * input
}

/// Torque that reaches the input shaft, power flowing back.
#[must_use]
pub fn torque_backward(output: f64, reduction: f64, efficiency_backward: f64) -> f64 {
    efficiency_backward * output / reduction
}

/// Inertia or mass of the output side as the input shaft feels it.
#[must_use]
pub fn reflected(inertia: f64, reduction: f64) -> f64 {
    inertia / (reduction * reduction)
}

#[cfg(test)]
mod tests {
    use super::{reduction, reflected, torque_backward, torque_forward};
    use crate::laws::testing::{close, rpm};

    #[test]
    fn published_compound_train() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 13.1.
        let train = reduction(20.0, 50.0) * reduction(25.0, 75.0) * reduction(26.0, 65.0);
        close(rpm(975.0) / train, rpm(52.0), 1e-12);
    }

    #[test]
    fn published_reflection_of_two_paths() {
        // G. K. Dubey, Fundamentals of Electrical Drives, 2nd ed., 2004, Ex. 2.1, with its g = 9.81 m/s².
        let winch = 1.5 / rpm(1420.0);
        let inertia = 0.2 + reflected(10.0, 10.0) + 1000.0 * winch * winch;
        close(inertia, 0.401_753_321_204, 1e-10);
        let torque = 10.0 / (10.0 * 0.9) + 1000.0 * 9.81 * winch / 0.85;
        close(torque, 117.530_248_854, 1e-10);
        // The same through the kernel: what stands behind the gear is given by what stands before it.
        close(torque_forward(10.0 / 9.0, 10.0, 0.9), 10.0, 1e-14);
    }

    #[test]
    fn losses_never_make_power() {
        for efficiency in [0.05, 0.5, 0.94, 1.0] {
            for i in [0.2, 1.0, 41.2] {
                assert!(torque_forward(10.0, i, efficiency) / i <= 10.0 * (1.0 + 1e-15));
                assert!(torque_backward(10.0, i, efficiency) * i <= 10.0 * (1.0 + 1e-15));
            }
        }
    }
}
