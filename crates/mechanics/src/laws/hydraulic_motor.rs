//! A hydraulic motor of constant displacement on a unit of limited pressure and flow.
//!
//! Formula: `T = dp * V_d * eta_hm`; `Q = V_d * w / eta_v`; highest speed `Q_max * eta_v / V_d`.
//! Symbols: T torque (N·m); dp pressure difference over the motor (Pa); V_d displacement (m³/rad); eta_hm
//! hydraulic-mechanical, eta_v volumetric efficiency (-); Q flow (m³/s); w speed (rad/s).
//! Validity: constant efficiencies, as at the speed and pressure they are given for; at very low speed both are worse.
//! Source: ISO 4391 definitions (from memory).
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// The torque at full pressure.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "dp * V_d * eta_hm",
    symbols: &[
        ("dp", "pressure", "pressure difference over the motor"),
        ("V_d", "displacement", "volume per turn"),
        ("eta_hm", "percentage", "hydraulic-mechanical efficiency"),
    ],
    validity: "up to the speed that the flow allows",
    source: "ISO 4391 (from memory)",
    revision: 1,
};

/// The flow it takes.
pub const FLOW: Formula = Formula {
    name: "flow",
    text: "V_d * w / eta_v",
    symbols: &[
        ("V_d", "displacement", "volume per turn"),
        ("w", "rotational_speed", "speed"),
        ("eta_v", "percentage", "volumetric efficiency"),
    ],
    validity: "constant volumetric efficiency",
    source: "ISO 4391 (from memory)",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TORQUE,
        domain: &[(1e5, 4e7), (1e-7, 1e-3), (0.6, 1.0)],
        kernel: |x| torque(x[0], x[1], x[2]),
    },
    Checked {
        formula: &FLOW,
        domain: &[(1e-7, 1e-3), (0.0, 300.0), (0.6, 1.0)],
        kernel: |x| flow(x[0], x[1], x[2]),
    },
];

/// Torque (N·m) of a displacement (m³/rad) at a pressure difference (Pa).
#[must_use]
pub fn torque(pressure: f64, displacement: f64, efficiency: f64) -> f64 {
    pressure * displacement * efficiency
}

/// Flow (m³/s) at a speed (rad/s).
#[must_use]
pub fn flow(displacement: f64, speed: f64, efficiency: f64) -> f64 {
    displacement * speed / efficiency
}

/// A level effort up to the speed that the flow allows.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FlowLimited {
    /// Torque at full pressure, N·m.
    pub torque: f64,
    /// Speed at the unit's whole flow, rad/s.
    pub highest: f64,
    /// What it holds back beyond it, N·m.
    pub hold: f64,
}

impl Law for FlowLimited {
    fn eval<R: Real>(&self, speed: R) -> R {
        speed.piecewise(&[self.highest], |piece, _| R::of(if piece == 0 { self.torque } else { -self.hold }))
    }

    fn jumps(&self) -> Vec<f64> {
        vec![self.highest]
    }
}

#[cfg(test)]
mod tests {
    use super::{FlowLimited, flow, torque};
    use crate::curve::Curve;
    use crate::laws::testing::{close, rpm};
    use core::f64::consts::TAU;

    #[test]
    fn a_motor_of_a_hundred_cubic_centimetres() {
        // Closed form: 100 cm³/rev at 200 bar is 2000/2π N·m; at 50 l/min it turns at 500 rpm.
        let displacement = 1e-4 / TAU;
        close(torque(2e7, displacement, 1.0), 2000.0 / TAU, 1e-14);
        close(flow(displacement, rpm(500.0), 1.0), 0.05 / 60.0, 1e-14);
        let motor = FlowLimited { torque: 300.0, highest: 50.0, hold: 0.0 };
        assert_eq!((motor.at(49.0), motor.at(51.0)), (300.0, 0.0));
    }
}
