//! Loads that grow with a power of the speed.
//!
//! Formula: `T = T_r * (w / w_r)^n` with n = 0 constant, 1 viscous, 2 quadratic; polynomial `T = c_0 + c_1*w + …`.
//! Symbols: T torque (N·m) or force (N); T_r at the rated point; w speed (rad/s) or (m/s), w_r at the rated point;
//! c_k coefficients.
//! Validity: the load resists motion in either direction: against reversed motion the same law holds with the sign
//! of the motion. A fan or pump follows the square only against a system that does (no static head), and its torque
//! near standstill is friction, given as breakaway.
//! Source: affinity laws of fans and pumps (usual handbooks); closed form.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Resistance that does not change with speed.
pub const CONSTANT: Formula = Formula {
    name: "torque",
    text: "T",
    symbols: &[("T", "torque", "torque it takes at every speed; a force for a load that runs straight")],
    validity: "moving; at rest the breakaway ratio times as much sets it moving",
    source: "Coulomb's law of friction",
    revision: 1,
};

/// Resistance that grows evenly with speed.
pub const VISCOUS: Formula = Formula {
    name: "torque",
    text: "b * w",
    symbols: &[("b", "viscous_torque_coefficient", "torque per speed"), ("w", "rotational_speed", "speed")],
    validity: "laminar friction, eddy-current brakes well below their peak",
    source: "definition",
    revision: 1,
};

/// Resistance that grows with the square of speed.
pub const QUADRATIC: Formula = Formula {
    name: "torque",
    text: "T_r * (w / w_r)^2",
    symbols: &[
        ("T_r", "torque", "torque at the rated point"),
        ("w", "rotational_speed", "speed"),
        ("w_r", "rotational_speed", "speed at the rated point"),
    ],
    validity: "fans and pumps on a system without static head, density unchanged",
    source: "affinity laws of fans and pumps, usual handbooks",
    revision: 1,
};

/// A polynomial in speed.
pub const POLYNOMIAL: Formula = Formula {
    name: "torque",
    text: "c_0 + c_1 * w + c_2 * w^2",
    symbols: &[
        ("c_0", "torque", "constant part"),
        ("c_1", "viscous_torque_coefficient", "torque per speed"),
        ("w", "rotational_speed", "speed"),
        ("c_2", "quadratic_torque_coefficient", "torque per square of the speed"),
    ],
    validity: "a fit holds in the range of speeds it was made for",
    source: "closed form",
    revision: 1,
};

/// The same for a load that runs straight.
pub const CONSTANT_FORCE: Formula = Formula {
    name: "force",
    text: "F",
    symbols: &[("F", "force", "force it takes at every speed")],
    validity: "moving; at rest the breakaway ratio times as much sets it moving",
    source: "Coulomb's law of friction",
    revision: 1,
};

/// The same for a load that runs straight.
pub const VISCOUS_FORCE: Formula = Formula {
    name: "force",
    text: "b_v * v",
    symbols: &[("b_v", "viscous_force_coefficient", "force per speed"), ("v", "speed", "speed")],
    validity: "laminar friction",
    source: "definition",
    revision: 1,
};

/// The same for a load that runs straight.
pub const QUADRATIC_FORCE: Formula = Formula {
    name: "force",
    text: "c_v * v^2",
    symbols: &[
        ("c_v", "quadratic_force_coefficient", "force per square of the speed"),
        ("v", "speed", "speed"),
    ],
    validity: "turbulent drag of a body in air or water, waves left aside",
    source: "usual handbooks of fluid mechanics",
    revision: 1,
};

/// The same for a load that runs straight.
pub const POLYNOMIAL_FORCE: Formula = Formula {
    name: "force",
    text: "F_0 + F_1 * v + F_2 * v^2 + F_3 * v^3",
    symbols: &[
        ("F_0", "force", "constant part"),
        ("F_1", "viscous_force_coefficient", "force per speed"),
        ("v", "speed", "speed"),
        ("F_2", "quadratic_force_coefficient", "force per square of the speed"),
        ("F_3", "cubic_force_coefficient", "force per cube of the speed"),
    ],
    validity: "a fit holds in the range of speeds it was made for",
    source: "closed form",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &CONSTANT,
        domain: &[(0.0, 1e4)],
        kernel: |x| Powers { coefficients: [x[0], 0.0, 0.0, 0.0] }.at(12.0),
    },
    Checked {
        formula: &VISCOUS,
        domain: &[(1e-5, 10.0), (0.0, 500.0)],
        kernel: |x| Powers { coefficients: [0.0, x[0], 0.0, 0.0] }.at(x[1]),
    },
    Checked {
        formula: &QUADRATIC,
        domain: &[(0.1, 1e4), (0.0, 500.0), (1.0, 500.0)],
        kernel: |x| Powers::through(2, x[2], x[0]).at(x[1]),
    },
    Checked {
        formula: &POLYNOMIAL,
        domain: &[(0.0, 100.0), (0.0, 10.0), (0.0, 500.0), (0.0, 0.1)],
        kernel: |x| Powers { coefficients: [x[0], x[1], x[3], 0.0] }.at(x[2]),
    },
    Checked {
        formula: &CONSTANT_FORCE,
        domain: &[(0.0, 1e4)],
        kernel: |x| Powers { coefficients: [x[0], 0.0, 0.0, 0.0] }.at(3.0),
    },
    Checked {
        formula: &VISCOUS_FORCE,
        domain: &[(1e-3, 1e3), (0.0, 50.0)],
        kernel: |x| Powers { coefficients: [0.0, x[0], 0.0, 0.0] }.at(x[1]),
    },
    Checked {
        formula: &QUADRATIC_FORCE,
        domain: &[(1e-3, 1e3), (0.0, 50.0)],
        kernel: |x| Powers { coefficients: [0.0, 0.0, x[0], 0.0] }.at(x[1]),
    },
    Checked {
        formula: &POLYNOMIAL_FORCE,
        domain: &[(0.0, 1e3), (0.0, 10.0), (0.0, 50.0), (0.0, 5.0), (0.0, 0.5)],
        kernel: |x| Powers { coefficients: [x[0], x[1], x[3], x[4]] }.at(x[2]),
    },
];

/// Coefficients of speed to the powers 0 to 3.
#[derive(Clone, Copy, Debug, PartialEq, Default)]
pub struct Powers {
    /// Of the powers 0, 1, 2, 3.
    pub coefficients: [f64; 4],
}

impl Powers {
    /// The single power (0 to 3) of speed that passes through a point.
    #[must_use]
    pub fn through(power: usize, speed: f64, effort: f64) -> Self {
        let mut scale = 1.0;
        for _ in 0..power {
            scale *= speed;
        }
        let mut coefficients = [0.0; 4];
        coefficients[power.min(3)] = effort / scale;
        Self { coefficients }
    }

    /// Effort at a speed of zero or above.
    #[must_use]
    pub fn at<R: Real>(&self, speed: R) -> R {
        let [constant, viscous, quadratic, cubic] = self.coefficients;
        let mut sum = R::of(0.0);
        // Leading powers that are not there would only widen an enclosure.
        for coefficient in [cubic, quadratic, viscous] {
            sum = if coefficient == 0.0 { sum * speed } else { (sum + coefficient) * speed };
        }
        sum + constant
    }
}

/// Against motion in either direction.
impl Law for Powers {
    fn eval<R: Real>(&self, speed: R) -> R {
        speed.piecewise(&[0.0], |piece, speed| if piece == 0 { -self.at(-speed) } else { self.at(speed) })
    }

    fn jumps(&self) -> Vec<f64> {
        if self.coefficients[0] == 0.0 { Vec::new() } else { vec![0.0] }
    }

    fn kinks(&self) -> Vec<f64> {
        vec![0.0]
    }
}

#[cfg(test)]
mod tests {
    use super::Powers;
    use crate::curve::Curve;
    use crate::laws::testing::{close, encloses, rpm};
    use proptest::prelude::*;

    #[test]
    fn a_fifth_more_speed_asks_half_as_much_torque_again() {
        // Affinity laws: a fan sped up by 20 % takes 1.44 times the torque and 1.73 times the power.
        let fan = Powers::through(2, rpm(1000.0), 30.0);
        close(fan.at(rpm(1200.0)), 30.0 * 1.44, 1e-14);
        close(fan.at(rpm(1200.0)) * 1.2 / 30.0, 1.728, 1e-14);
    }

    #[test]
    fn friction_turns_over_with_motion() {
        let load = Powers { coefficients: [5.0, 0.1, 0.02, 0.003] };
        for speed in [0.1, 3.0, 40.0] {
            assert_eq!(Curve::at(&load, -speed), -Curve::at(&load, speed));
            let direct = 5.0 + 0.1 * speed + 0.02 * speed * speed + 0.003 * speed * speed * speed;
            close(Curve::at(&load, speed), direct, 1e-14);
        }
        assert_eq!(Curve::jumps(&load), [0.0]);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(200))]
        #[test]
        fn bounds_hold(
            c in proptest::array::uniform4(-2.0..5.0f64),
            lo in -20.0..20.0f64, width in 0.0..10.0f64, t in 0.0..1.0f64,
        ) {
            let smooth = Powers { coefficients: [0.0, c[1], c[2], c[3]] };
            encloses(&smooth, lo, width, t);
            encloses(&Powers { coefficients: c }, lo.abs() + 0.1, width, t);
        }
    }

    #[test]
    fn propeller_law() {
        // E. C. Tupper, Introduction to Naval Architecture, propulsion: Q = K_Q rho n² D⁵, n in revolutions per second.
        let torque = 0.05 * 1025.0 * 2.0 * 2.0 * 1024.0;
        let propeller = Powers::through(2, rpm(120.0), torque);
        close(torque, 209_920.0, 1e-14);
        close(torque * rpm(120.0), 2_637_932.519_37, 1e-11);
        close(propeller.at(rpm(108.0)) * 0.9 / torque, 0.729, 1e-12);
        close(propeller.at(rpm(132.0)) * 1.1 / torque, 1.331, 1e-12);
    }
}
