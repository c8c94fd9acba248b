//! Affinity of fans, pumps and propellers: the same machine at another speed.
//!
//! Formula: `Q = q * w / w_r`, `H = H_q * (w / w_r)^2`, `T = P_q * (w / w_r)^2 / w_r`; propellers by their coefficients
//! `T = K_Q * rho * n^2 * D^5`, `F = K_T * rho * n^2 * D^4` with `n = w / (2 * pi)`.
//! Symbols: Q flow (m³/s), H head (m) or pressure (Pa), T torque (N·m), F thrust (N), w speed (rad/s); q, H_q, P_q flow,
//! head and shaft power at the speed w_r of the curve; K_Q, K_T coefficients (-), rho density (kg/m³), D diameter (m).
//! Validity: density and efficiency unchanged; the similar point is the same one only where the system's resistance
//! grows with the square of the flow, else it moves with the speed. Propellers: at one advance coefficient.
//! Source: affinity laws, usual handbooks of turbomachines (R. W. Fox, A. T. McDonald, Introduction to Fluid Mechanics,
//! ch. 7); E. C. Tupper, Introduction to Naval Architecture, propulsion.
//! Revision: 1

use std::f64::consts::TAU;

use super::{Checked, G_N};
use crate::registry::Formula;

const HANDBOOKS: &str = "affinity laws of turbomachines, usual handbooks";
const NAVAL: &str = "E. C. Tupper, Introduction to Naval Architecture, propulsion";

const SPEED: (&str, &str, &str) = ("w", "rotational_speed", "speed");
const CURVE_SPEED: (&str, &str, &str) = ("w_r", "rotational_speed", "speed of the curve or rated point");

/// Flow at a speed.
pub const FLOW: Formula = Formula {
    name: "flow",
    text: "q * w / w_r",
    symbols: &[("q", "flow", "similar flow on the curve"), SPEED, CURVE_SPEED],
    validity: "efficiency unchanged by the speed",
    source: HANDBOOKS,
    revision: 1,
};

/// Head at a speed.
pub const HEAD: Formula = Formula {
    name: "head",
    text: "H_q * (w / w_r)^2",
    symbols: &[("H_q", "length", "head on the curve at the similar flow"), SPEED, CURVE_SPEED],
    validity: "efficiency unchanged by the speed",
    source: HANDBOOKS,
    revision: 1,
};

/// Pressure at a speed.
pub const PRESSURE: Formula = Formula {
    name: "pressure",
    text: "p_q * (w / w_r)^2",
    symbols: &[("p_q", "pressure", "pressure on the curve at the similar flow"), SPEED, CURVE_SPEED],
    validity: "density and efficiency unchanged by the speed",
    source: HANDBOOKS,
    revision: 1,
};

/// Torque at a speed.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "P_q * (w / w_r)^2 / w_r",
    symbols: &[
        ("P_q", "mechanical_power", "shaft power on the curve at the similar flow"),
        SPEED,
        CURVE_SPEED,
    ],
    validity: "density and efficiency unchanged by the speed; bearings and seals left aside",
    source: HANDBOOKS,
    revision: 1,
};

/// Power a liquid takes up.
pub const HYDRAULIC_POWER: Formula = Formula {
    name: "hydraulic_power",
    text: "rho * (9.80665 m/s²) * Q * H",
    symbols: &[("rho", "density", "density"), ("Q", "flow", "flow"), ("H", "length", "head")],
    validity: "incompressible",
    source: "definition",
    revision: 1,
};

/// Power a gas takes up.
pub const AIR_POWER: Formula = Formula {
    name: "air_power",
    text: "Q * p",
    symbols: &[("Q", "flow", "flow"), ("p", "pressure", "pressure")],
    validity: "pressure small against the absolute pressure of the gas",
    source: "definition",
    revision: 1,
};

/// Thrust by affinity.
pub const THRUST: Formula = Formula {
    name: "thrust",
    text: "F_r * (w / w_r)^2",
    symbols: &[("F_r", "force", "thrust at the rated speed"), SPEED, CURVE_SPEED],
    validity: "at the advance coefficient of the rated point",
    source: NAVAL,
    revision: 1,
};

/// Torque of a propeller.
pub const PROPELLER_TORQUE: Formula = Formula {
    name: "torque",
    text: "K_Q * rho * (w / (2 * pi))^2 * D^5",
    symbols: &[
        ("K_Q", "number", "torque coefficient"),
        ("rho", "density", "density of the water or air"),
        SPEED,
        ("D", "length", "diameter"),
    ],
    validity: "at the advance coefficient K_Q is for",
    source: NAVAL,
    revision: 1,
};

/// Thrust of a propeller.
pub const PROPELLER_THRUST: Formula = Formula {
    name: "thrust",
    text: "K_T * rho * (w / (2 * pi))^2 * D^4",
    symbols: &[
        ("K_T", "number", "thrust coefficient"),
        ("rho", "density", "density of the water or air"),
        SPEED,
        ("D", "length", "diameter"),
    ],
    validity: "at the advance coefficient K_T is for",
    source: NAVAL,
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &FLOW,
        domain: &[(0.0, 2.0), (0.0, 300.0), (1.0, 300.0)],
        kernel: |x| x[0] * (x[1] / x[2]),
    },
    Checked { formula: &HEAD, domain: SQUARE, kernel: |x| similar(x[0], x[1], x[2]) },
    Checked { formula: &PRESSURE, domain: SQUARE, kernel: |x| similar(x[0], x[1], x[2]) },
    Checked { formula: &THRUST, domain: SQUARE, kernel: |x| similar(x[0], x[1], x[2]) },
    Checked { formula: &TORQUE, domain: SQUARE, kernel: |x| similar(x[0] / x[2], x[1], x[2]) },
    Checked {
        formula: &HYDRAULIC_POWER,
        domain: &[(500.0, 2000.0), (0.0, 2.0), (0.0, 100.0)],
        kernel: |x| hydraulic_power(x[0], x[1], x[2]),
    },
    Checked { formula: &AIR_POWER, domain: &[(0.0, 50.0), (0.0, 5e3)], kernel: |x| x[0] * x[1] },
    Checked {
        formula: &PROPELLER_TORQUE,
        domain: PROPELLER,
        kernel: |x| propeller_torque(x[0], x[1], x[3]) * x[2] * x[2],
    },
    Checked {
        formula: &PROPELLER_THRUST,
        domain: PROPELLER,
        kernel: |x| propeller_thrust(x[0], x[1], x[3]) * x[2] * x[2],
    },
];

const SQUARE: &[(f64, f64)] = &[(0.0, 1e4), (0.0, 300.0), (1.0, 300.0)];
const PROPELLER: &[(f64, f64)] = &[(0.005, 0.1), (1.0, 1030.0), (0.0, 300.0), (0.1, 6.0)];

fn similar(rated: f64, speed: f64, rated_speed: f64) -> f64 {
    let ratio = speed / rated_speed;
    rated * ratio * ratio
}

/// Power (W) a liquid of this density takes up at a flow (m³/s) and a head (m).
#[must_use]
pub fn hydraulic_power(density: f64, flow: f64, head: f64) -> f64 {
    density * G_N * flow * head
}

/// Torque (N·m) of a propeller per square of its speed (rad/s).
#[must_use]
pub fn propeller_torque(coefficient: f64, density: f64, diameter: f64) -> f64 {
    propeller_thrust(coefficient, density, diameter) * diameter
}

/// Thrust (N) of a propeller per square of its speed (rad/s).
#[must_use]
pub fn propeller_thrust(coefficient: f64, density: f64, diameter: f64) -> f64 {
    let area = diameter * diameter;
    coefficient * density * area * area / (TAU * TAU)
}

#[cfg(test)]
mod tests {
    use super::{hydraulic_power, propeller_torque, similar};
    use crate::laws::testing::{close, rpm};

    #[test]
    fn published_propeller() {
        // E. C. Tupper, Introduction to Naval Architecture: Q = K_Q rho n² D⁵ with n = 2 per second.
        let speed = rpm(120.0);
        close(propeller_torque(0.05, 1025.0, 4.0) * speed * speed, 209_920.0, 1e-12);
    }

    #[test]
    fn published_pump() {
        // R. W. Fox, A. T. McDonald, Introduction to Fluid Mechanics, 5th ed., Ex. 7.6 (p. 297).
        close(similar(21.925_793_754_4, 1750.0, 1170.0), 49.052_336_454_8, 1e-10);
        // Y. A. Çengel, J. M. Cimbala, Fluid Mechanics, 2nd ed., Ex. 14-2 (p. 770), with its g of 9.81 m/s².
        close(hydraulic_power(998.0, 0.0233, 7.3) * 9.81 / 9.806_65 / 0.70, 2_378.922_477_43, 1e-10);
    }
}
