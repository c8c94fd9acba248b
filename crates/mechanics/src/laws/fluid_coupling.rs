//! The fluid coupling: torque by slip and by the square of the speed.
//!
//! Formula: `T = T_r * (w / w_r)^2 * R * (1 + a) * s / (s + a)` with `a = s_r * (R - 1) / (1 - R * s_r)`, so that it is
//! T_r at the rated slip and R times that with the output held, both at rated speed.
//! Symbols: T_r rated torque (N·m) at rated input speed w_r (rad/s) and rated slip s_r (-); R stall torque over rated
//! torque at that speed (-); w input speed (rad/s); s slip, 1 - output speed / input speed (-); a shape (-).
//! Validity: constant filling, oil at its working temperature. Torque grows with the square of the speed exactly as long
//! as the flow is turbulent; between rated slip and stall the curve is a hyperbola laid through both, a real one bulges.
//! Source: similarity of hydrodynamic machines (usual handbooks); shape over the slip common practice, no source.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;
use crate::scalar::Real;

/// Shape of the curve over the slip.
pub const SHAPE: Formula = Formula {
    name: "shape",
    text: "s_r * (R - 1) / (1 - R * s_r)",
    symbols: &[
        ("s_r", "percentage", "rated slip"),
        ("R", "number", "stall torque over rated torque, at rated input speed"),
    ],
    validity: "R above 1, and R times the rated slip below 1",
    source: "common practice, no source: a hyperbola through the rated point and stall",
    revision: 1,
};

/// Torque.
pub const TORQUE: Formula = Formula {
    name: "coupling_torque",
    text: "T_r * (w / w_r)^2 * R * (1 + a) * s / (s + a)",
    symbols: &[
        ("T_r", "torque", "rated torque"),
        ("w", "rotational_speed", "input speed"),
        ("w_r", "rotational_speed", "rated input speed"),
        ("R", "number", "stall torque over rated torque"),
        ("a", "number", "shape"),
        ("s", "percentage", "slip"),
    ],
    validity: "constant filling, turbulent flow",
    source: "similarity of hydrodynamic machines, usual handbooks",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked { formula: &SHAPE, domain: &[(0.01, 0.08), (1.2, 6.0)], kernel: |x| shape(x[0], x[1]) },
    Checked {
        formula: &TORQUE,
        domain: &[(10.0, 500.0), (10.0, 200.0), (100.0, 200.0), (1.2, 6.0), (0.005, 0.2), (0.001, 1.0)],
        kernel: |x| {
            let law = Fluid { coefficient: x[0] * x[3] * (1.0 + x[4]) / (x[2] * x[2]), shape: x[4] };
            law.torque(x[1], x[1] * (1.0 - x[5]))
        },
    },
];

/// Shape by rated slip and stall ratio.
#[must_use]
pub fn shape(rated_slip: f64, stall_ratio: f64) -> f64 {
    rated_slip * (stall_ratio - 1.0) / (1.0 - stall_ratio * rated_slip)
}

/// The law with its numbers.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Fluid {
    /// `T_r * R * (1 + a) / w_r^2`
    pub coefficient: f64,
    /// a
    pub shape: f64,
}

impl Fluid {
    /// By rated torque, input speed and slip, and stall over rated torque.
    #[must_use]
    pub fn rated(torque: f64, speed: f64, slip: f64, stall_ratio: f64) -> Self {
        let shape = shape(slip, stall_ratio);
        Self { coefficient: torque * stall_ratio * (1.0 + shape) / (speed * speed), shape }
    }

    /// Torque between an input and an output speed.
    #[must_use]
    pub fn torque(&self, input: f64, output: f64) -> f64 {
        self.coefficient * input * input * (input - output) / ((1.0 + self.shape) * input - output)
    }

    /// How the torque falls with the output speed.
    #[must_use]
    pub fn by_output<R: Real>(&self, input: R, output: R) -> R {
        let reach = input * (1.0 + self.shape) - output;
        -(input * input.square() * (self.coefficient * self.shape)) / reach.square()
    }

    /// The output speed at which an input speed passes this torque.
    pub fn output<R: Real>(&self, input: R, torque: R) -> R {
        let share = torque / (input.square() * self.coefficient);
        input * (R::of(1.0) - share * (1.0 + self.shape)) / (R::of(1.0) - share)
    }
}

#[cfg(test)]
mod tests {
    use super::Fluid;
    use crate::laws::testing::close;
    use proptest::prelude::*;

    #[test]
    fn through_the_rated_point_and_stall() {
        let law = Fluid::rated(100.0, 150.0, 0.03, 2.2);
        close(law.torque(150.0, 150.0 * 0.97), 100.0, 1e-12);
        close(law.torque(150.0, 0.0), 220.0, 1e-13);
        // Half the speed carries a quarter.
        close(law.torque(75.0, 0.0), 55.0, 1e-13);
        assert_eq!(law.torque(150.0, 150.0), 0.0);
    }

    proptest! {
        #[test]
        fn output_undoes_torque(w in 10.0..300.0f64, s in 0.002..0.99f64, stall in 1.3..5.0f64) {
            let law = Fluid::rated(100.0, 150.0, 0.03, stall);
            let y = w * (1.0 - s);
            prop_assert!((law.output(w, law.torque(w, y)) - y).abs() < 1e-9 * w);
            // Faster at the output passes less.
            let step = 1e-6 * w;
            let slope = (law.torque(w, y + step) - law.torque(w, y - step)) / (2.0 * step);
            let exact: f64 = law.by_output(w, y);
            prop_assert!((slope - exact).abs() < 1e-4 * exact.abs() && exact < 0.0);
        }
    }
}
