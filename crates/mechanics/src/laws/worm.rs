//! The worm and its wheel: sliding friction along the thread, in both directions of power.
//!
//! Formula: `tan(l) = z_1 / q`; worm driving `eta = (cos(a) - mu * tan(l)) / (cos(a) + mu / tan(l))`; wheel driving
//! `eta_b = (cos(a) - mu / tan(l)) / (cos(a) + mu * tan(l))`. With `a = 0` and `mu = tan(r)` these are
//! `tan(l) / tan(l + r)` and `tan(l - r) / tan(l)`.
//! Symbols: l lead angle of the worm (rad); z_1 starts (-); q diameter factor, pitch diameter of the worm over the
//! axial module (-); a normal pressure angle (rad); mu coefficient of friction along the thread (-).
//! Validity: losses of the mesh alone; bearings, seals and churning oil come on top. The friction of a worm falls with
//! its sliding speed: at rest it is the highest, which is why a worm that holds at rest may run back once it turns or
//! shakes. An efficiency backward of 0 or below is self-locking.
//! Source: R. L. Mott, Machine Elements in Mechanical Design, 4th ed., sec. 8-10; U. C. Jindal, Machine Design, 2010,
//! Ex. 28-4 (p. 728), for the pressure angle.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Lead angle by starts and diameter factor.
pub const LEAD_ANGLE: Formula = Formula {
    name: "lead_angle",
    text: "atan(z_1 / q)",
    symbols: &[
        ("z_1", "count", "starts of the worm"),
        ("q", "number", "diameter factor, pitch diameter of the worm over the axial module"),
    ],
    validity: "a cylindrical worm, at its pitch diameter",
    source: "R. L. Mott, Machine Elements in Mechanical Design, 4th ed., sec. 8-10",
    revision: 1,
};

/// Efficiency while the worm drives.
pub const EFFICIENCY: Formula = Formula {
    name: "efficiency_of_friction",
    text: "(cos(a) - mu * tan(l)) / (cos(a) + mu / tan(l))",
    symbols: &[
        ("a", "angle", "normal pressure angle"),
        ("mu", "number", "coefficient of friction along the thread"),
        ("l", "angle", "lead angle"),
    ],
    validity: "the worm drives; losses of the mesh alone",
    source: "U. C. Jindal, Machine Design, 2010, Ex. 28-4 (p. 728)",
    revision: 1,
};

/// Efficiency while the wheel drives.
pub const EFFICIENCY_BACKWARD: Formula = Formula {
    name: "efficiency_of_friction_backward",
    text: "(cos(a) - mu / tan(l)) / (cos(a) + mu * tan(l))",
    symbols: &[
        ("a", "angle", "normal pressure angle"),
        ("mu", "number", "coefficient of friction along the thread"),
        ("l", "angle", "lead angle"),
    ],
    validity: "the wheel drives; 0 or below is self-locking at this friction",
    source: "balance of forces on the thread with friction turned round; R. L. Mott, Machine Elements in Mechanical Design, \
             4th ed., sec. 8-10, for self-locking",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked { formula: &LEAD_ANGLE, domain: &[(1.0, 6.0), (6.0, 20.0)], kernel: |x| lead_angle(x[0], x[1]) },
    Checked {
        formula: &EFFICIENCY,
        domain: &[(0.0, 0.5), (0.0, 0.2), (0.02, 0.7)],
        kernel: |x| efficiency(x[2], x[0], x[1]),
    },
    Checked {
        formula: &EFFICIENCY_BACKWARD,
        domain: &[(0.0, 0.5), (0.0, 0.2), (0.02, 0.7)],
        kernel: |x| efficiency_backward(x[2], x[0], x[1]),
    },
];

/// Lead angle, rad, of so many starts at a diameter factor.
#[must_use]
pub fn lead_angle(starts: f64, diameter_factor: f64) -> f64 {
    libm::atan(starts / diameter_factor)
}

/// Efficiency while the worm drives, by lead angle and normal pressure angle (rad) and friction.
#[must_use]
pub fn efficiency(lead_angle: f64, pressure_angle: f64, friction: f64) -> f64 {
    let (tangent, cosine) = (libm::tan(lead_angle), libm::cos(pressure_angle));
    (cosine - friction * tangent) / (cosine + friction / tangent)
}

/// Efficiency while the wheel drives; 0 or below is self-locking.
#[must_use]
pub fn efficiency_backward(lead_angle: f64, pressure_angle: f64, friction: f64) -> f64 {
    let (tangent, cosine) = (libm::tan(lead_angle), libm::cos(pressure_angle));
    (cosine - friction / tangent) / (cosine + friction * tangent)
}

/// The friction that makes this efficiency while the worm drives.
#[must_use]
pub fn friction_of(efficiency: f64, lead_angle: f64, pressure_angle: f64) -> f64 {
    let (tangent, cosine) = (libm::tan(lead_angle), libm::cos(pressure_angle));
    cosine * (1.0 - efficiency) / (tangent + efficiency / tangent)
}

#[cfg(test)]
mod tests {
    use super::{efficiency, efficiency_backward, friction_of, lead_angle};
    use crate::laws::testing::close;
    use core::f64::consts::PI;
    use proptest::prelude::*;

    #[test]
    fn published_efficiencies() {
        // R. L. Mott, 4th ed., sec. 8-10, tan(l) / tan(l + r): numbers recomputed.
        let deg = PI / 180.0;
        close(efficiency(5.0 * deg, 0.0, 0.10), 0.462_551_896_581, 1e-11);
        close(efficiency_backward(5.0 * deg, 0.0, 0.10), -0.141_764_947_695, 1e-11);
        close(efficiency(20.0 * deg, 0.0, 0.05), 0.863_217_903_403, 1e-11);
        close(efficiency_backward(20.0 * deg, 0.0, 0.05), 0.847_208_200_664, 1e-11);
        close(efficiency(libm::atan(0.1), 0.0, 0.10), 0.495, 1e-11);
        // U. C. Jindal, Machine Design, 2010, Ex. 28-4.
        close(efficiency(lead_angle(2.0, 8.0), 20.0 * deg, 0.032), 0.872_622_515_739, 1e-10);
    }

    proptest! {
        #[test]
        fn friction_loses_in_both_directions(l in 0.02..0.7f64, a in 0.0..0.5f64, mu in 0.0..0.2f64) {
            let forward = efficiency(l, a, mu);
            prop_assert!(forward > 0.0 && forward <= 1.0);
            let backward = efficiency_backward(l, a, mu);
            prop_assert!(backward <= 1.0 + 1e-15);
            // Self-locking goes with an efficiency of half or less where the thread is steep no more than usual.
            if backward <= 0.0 {
                prop_assert!(forward <= 0.5 + 1e-12);
            }
            prop_assert!((friction_of(forward, l, a) - mu).abs() < 1e-12);
        }
    }
}
