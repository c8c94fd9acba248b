//! An air motor: a straight line of torque over speed that rises with the pressure.
//!
//! Formula: `T = T_0 * (p / p_n) * (1 - w / w_0)`; free air `Q = Q_n * (p + p_0) / (p_n + p_0) * w / w_n`.
//! Symbols: T torque (N·m); T_0 stall torque, w_0 no-load speed (rad/s) at the rated gauge pressure p_n (Pa); p gauge
//! pressure at the motor (Pa); Q free air (m³/s), Q_n at the speed w_n of peak power; p_0 air pressure of the
//! surroundings (Pa).
//! Validity: near the rated pressure; the no-load speed is taken as the same at every pressure, though it falls a
//! little with it. Stalled motors leak more than the line says.
//! Source: common practice, no source.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Air pressure of the surroundings near the sea, Pa.
pub const ATMOSPHERE: f64 = 101_325.0;

/// The torque.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "T_0 * (p / p_n) * (1 - w / w_0)",
    symbols: &[
        ("T_0", "torque", "stall torque at rated pressure"),
        ("p", "pressure", "gauge pressure at the motor"),
        ("p_n", "pressure", "rated gauge pressure"),
        ("w", "rotational_speed", "speed"),
        ("w_0", "rotational_speed", "no-load speed"),
    ],
    validity: "near the rated pressure",
    source: "common practice, no source",
    revision: 1,
};

/// The free air it takes.
pub const CONSUMPTION: Formula = Formula {
    name: "flow",
    text: "Q_n * (p + p_0) / (p_n + p_0) * w / w_n",
    symbols: &[
        ("Q_n", "flow", "free air at peak power and rated pressure"),
        ("p", "pressure", "gauge pressure at the motor"),
        ("p_0", "pressure", "air pressure of the surroundings"),
        ("p_n", "pressure", "rated gauge pressure"),
        ("w", "rotational_speed", "speed"),
        ("w_n", "rotational_speed", "speed of peak power"),
    ],
    validity: "one filling of the chambers a turn, leakage left aside",
    source: "common practice, no source",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TORQUE,
        domain: &[(0.1, 100.0), (2e5, 8e5), (4e5, 7e5), (0.0, 300.0), (400.0, 900.0)],
        kernel: |x| AirMotor { stall: x[0] * (x[1] / x[2]), no_load: x[4], highest: None }.eval(x[3]),
    },
    Checked {
        formula: &CONSUMPTION,
        domain: &[
            (1e-3, 0.1),
            (2e5, 8e5),
            (ATMOSPHERE, ATMOSPHERE),
            (4e5, 7e5),
            (0.0, 300.0),
            (100.0, 400.0),
        ],
        kernel: |x| x[0] * filling(x[1], x[3]) * x[4] / x[5],
    },
];

/// Absolute pressure over the rated one, from gauge pressures.
#[must_use]
pub fn filling(pressure: f64, rated: f64) -> f64 {
    (pressure + ATMOSPHERE) / (rated + ATMOSPHERE)
}

/// A motor at a pressure.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AirMotor {
    /// Stall torque at this pressure, N·m.
    pub stall: f64,
    /// No-load speed, rad/s.
    pub no_load: f64,
    /// Speed at which it takes all the air there is, rad/s.
    pub highest: Option<f64>,
}

impl Law for AirMotor {
    fn eval<R: Real>(&self, speed: R) -> R {
        let line = |speed: R| speed * (-self.stall / self.no_load) + self.stall;
        match self.highest {
            None => line(speed),
            Some(highest) => {
                speed.piecewise(&[highest], |piece, speed| if piece == 0 { line(speed) } else { R::of(0.0) })
            }
        }
    }

    fn jumps(&self) -> Vec<f64> {
        self.highest.into_iter().collect()
    }
}

#[cfg(test)]
mod tests {
    use super::{ATMOSPHERE, AirMotor, filling};
    use crate::curve::Curve;
    use crate::laws::testing::close;

    #[test]
    fn line_and_end_of_the_air() {
        let motor = AirMotor { stall: 8.0, no_load: 400.0, highest: Some(300.0) };
        close(motor.at(200.0), 4.0, 1e-14);
        assert_eq!(motor.at(301.0), 0.0);
        close(filling(2.0 * ATMOSPHERE, 5.0 * ATMOSPHERE), 0.5, 1e-14);
    }
}
