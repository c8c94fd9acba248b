//! Weight on a slope: the share that pulls down and the share that presses.
//!
//! Formula: `F = m * g * (sin(a) + mu * cos(a))`, `a = atan(G)`.
//! Symbols: m mass (kg); g standard gravity 9.80665 (m/s²); a slope (rad); G grade, rise per run, uphill positive (-);
//! mu coefficient of friction, opposing motion (-); F force along the slope (N).
//! Validity: Coulomb friction, the same at all speeds. A grade of 15 % is 8.53°, not 15°.
//! Source: Coulomb's law of friction; standard gravity of the 3rd CGPM (1901), ISO 80000-3.
//! Revision: 1

use super::{Checked, G_N};
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Slope of a grade.
pub const SLOPE: Formula = Formula {
    name: "slope",
    text: "atan(G)",
    symbols: &[("G", "grade", "grade, rise per run, uphill positive")],
    validity: "a sign of 1 in 4 may mean the sine instead: ask",
    source: "definition",
    revision: 1,
};

/// Force along the slope, moving uphill.
pub const UPHILL_FORCE: Formula = Formula {
    name: "force",
    text: "m * (9.80665 m/s²) * (sin(a) + mu * cos(a))",
    symbols: &[
        ("m", "mass", "mass"),
        ("a", "slope", "slope, uphill positive"),
        ("mu", "number", "coefficient of friction"),
    ],
    validity: "moving in the direction counted positive; friction opposes motion",
    source: "Coulomb's law of friction",
    revision: 1,
};

/// Effort on a rope of what hangs on it.
pub const LIFTING_FORCE: Formula = Formula {
    name: "force",
    text: "(m - m_c) * (9.80665 m/s²) + F_f",
    symbols: &[
        ("m", "mass", "mass that is lifted, hook and block included"),
        ("m_c", "mass", "mass of the counterweight"),
        ("F_f", "force", "friction of guides and bearings, opposing motion"),
    ],
    validity: "steady motion upward; downward the friction has the other sign; the rope's own weight left aside",
    source: "Newton's laws of motion",
    revision: 1,
};

/// Mass of a counterweight that balances the car and a share of the load.
pub const COUNTERWEIGHT: Formula = Formula {
    name: "counterweight_mass",
    text: "m_0 + s * m_n",
    symbols: &[
        ("m_0", "mass", "mass of the empty car"),
        ("s", "percentage", "balanced share of the rated load"),
        ("m_n", "mass", "rated load"),
    ],
    validity: "ropes left aside",
    source: "common practice, no source",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked { formula: &SLOPE, domain: &[(-2.0, 2.0)], kernel: |x| libm::atan(x[0]) },
    Checked {
        formula: &UPHILL_FORCE,
        domain: &[(0.1, 1e5), (-1.5, 1.5), (0.0, 1.0)],
        kernel: |x| weight(x[0]) * (libm::sin(x[1]) + x[2] * libm::cos(x[1])),
    },
    Checked {
        formula: &COUNTERWEIGHT,
        domain: &[(0.0, 1e4), (0.0, 1.0), (0.0, 1e4)],
        kernel: |x| balanced(x[0], x[1], x[2]),
    },
    Checked {
        formula: &LIFTING_FORCE,
        domain: &[(0.0, 1e5), (0.0, 1e5), (0.0, 1e3)],
        kernel: |x| Pull { pull: weight(x[0] - x[1]), friction: x[2] }.eval(1.0),
    },
];

/// A steady pull with friction that opposes motion, and turns over with it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pull {
    /// Effort without friction, against the sense counted positive.
    pub pull: f64,
    /// Size of the friction while moving.
    pub friction: f64,
}

impl Law for Pull {
    fn eval<R: Real>(&self, speed: R) -> R {
        speed.piecewise(&[0.0], |piece, _| {
            R::of(if piece == 0 { self.pull - self.friction } else { self.pull + self.friction })
        })
    }

    fn jumps(&self) -> Vec<f64> {
        if self.friction == 0.0 { Vec::new() } else { vec![0.0] }
    }
}

/// Mass (kg) of a counterweight that balances a car and a share of its rated load.
#[must_use]
pub fn balanced(car: f64, share: f64, load: f64) -> f64 {
    car + share * load
}

/// Weight (N) of a mass (kg) under standard gravity.
#[must_use]
pub fn weight(mass: f64) -> f64 {
    mass * G_N
}

/// Sine of the slope that has this grade.
#[must_use]
pub fn sine_of_grade(grade: f64) -> f64 {
    grade / (1.0 + grade * grade).sqrt()
}

/// Cosine of the slope that has this grade.
#[must_use]
pub fn cosine_of_grade(grade: f64) -> f64 {
    1.0 / (1.0 + grade * grade).sqrt()
}

#[cfg(test)]
mod tests {
    use super::{cosine_of_grade, sine_of_grade, weight};
    use crate::laws::testing::close;

    #[test]
    fn percent_is_not_degrees() {
        // Closed form: 85 kg on 15 % and on 15°.
        close(weight(85.0) * sine_of_grade(0.15), 123.65, 1e-4);
        close(weight(85.0) * libm::sin(15.0_f64.to_radians()), 215.7, 2e-4);
    }

    #[test]
    fn sine_and_cosine_belong_together() {
        for grade in [-0.3, 0.0, 0.06, 1.0, 30.0] {
            let (s, c) = (sine_of_grade(grade), cosine_of_grade(grade));
            close(s * s + c * c, 1.0, 1e-15);
            close(s, libm::sin(libm::atan(grade)), 1e-14);
        }
    }
}
