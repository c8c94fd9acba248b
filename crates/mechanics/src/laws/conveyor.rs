//! Belt conveyor, in the form of ISO 5048 and DIN 22101.
//!
//! Formula: `F_H = f * L * g * (q_RO + q_RU + (2*q_B + q_G) * cos(delta))`, `F_St = q_G * H * g`,
//! `F_U = C * F_H + F_St + F_S`, `cos(delta) = sqrt(1 - (H / L)^2)`.
//! Symbols: F_U effective pull at the drum, F_H main resistance, F_St slope resistance, F_S special resistances (N);
//! f artificial friction coefficient (-); L distance between the end drums along the belt, H rise (m); q_RO, q_RU turning
//! masses of the idlers, q_B of the belt, q_G of the material, per length (kg/m); C factor of the secondary resistances
//! (-); g standard gravity 9.80665 m/s².
//! Validity: steady motion, evenly loaded, C for long conveyors (80 m and more); the resistances oppose motion, the rise
//! does not. Inertias and starting come from the drive.
//! Source: ISO 5048:1989 and DIN 22101, the structure of the formula as told by secondary texts.
//! Revision: 1

use super::{Checked, G_N};
use crate::registry::Formula;

const STANDARD: &str = "ISO 5048:1989, DIN 22101 (structure as told by secondary texts)";

/// Main resistance.
pub const MAIN_RESISTANCE: Formula = Formula {
    name: "main_resistance",
    text: "f * L * (9.80665 m/s²) * (q_RO + q_RU + (2 * q_B + q_G) * sqrt(1 - (H / L)^2))",
    symbols: &[
        ("f", "number", "artificial friction coefficient"),
        ("L", "length", "distance between the end drums"),
        ("q_RO", "mass_per_length", "turning mass of the carrying idlers"),
        ("q_RU", "mass_per_length", "turning mass of the return idlers"),
        ("q_B", "mass_per_length", "belt"),
        ("q_G", "mass_per_length", "material"),
        ("H", "length", "rise"),
    ],
    validity: "evenly loaded, steady",
    source: STANDARD,
    revision: 1,
};

/// What the rise takes.
pub const SLOPE_RESISTANCE: Formula = Formula {
    name: "lift_force",
    text: "q_G * H * (9.80665 m/s²)",
    symbols: &[("q_G", "mass_per_length", "material"), ("H", "length", "rise")],
    validity: "always; below zero downhill",
    source: STANDARD,
    revision: 1,
};

/// Effective pull.
pub const EFFECTIVE_PULL: Formula = Formula {
    name: "force",
    text: "C * F_H + F_St + F_S",
    symbols: &[
        ("C", "number", "factor of the secondary resistances"),
        ("F_H", "force", "main resistance"),
        ("F_St", "force", "slope resistance"),
        ("F_S", "force", "special resistances"),
    ],
    validity: "long conveyors; moving in the direction counted positive",
    source: STANDARD,
    revision: 1,
};

/// Tension in the tight strand.
pub const BELT_TENSION: Formula = Formula {
    name: "belt_tension",
    text: "F_U + T_2",
    symbols: &[("F_U", "force", "effective pull"), ("T_2", "force", "tension of the slack strand")],
    validity: "at the drive drum, while it drives",
    source: "balance of forces",
    revision: 1,
};

/// Tension the slack strand needs.
pub const SLACK_TENSION: Formula = Formula {
    name: "least_slack_tension",
    text: "F_U / (exp(mu * phi) - 1)",
    symbols: &[
        ("F_U", "force", "effective pull"),
        ("mu", "number", "friction of the belt on the drum"),
        ("phi", "angle", "wrap"),
    ],
    validity: "just before the belt slips on the drum; the belt's own inertia left aside",
    source: "Euler and Eytelwein",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &MAIN_RESISTANCE,
        domain: &[
            (0.01, 0.05),
            (20.0, 2e3),
            (0.0, 40.0),
            (0.0, 20.0),
            (1.0, 50.0),
            (0.0, 500.0),
            (-19.0, 19.0),
        ],
        kernel: |x| {
            Conveyor {
                friction: x[0],
                length: x[1],
                carry: x[2],
                back: x[3],
                belt: x[4],
                material: x[5],
                rise: x[6],
            }
            .main_resistance()
        },
    },
    Checked {
        formula: &SLOPE_RESISTANCE,
        domain: &[(0.0, 500.0), (-100.0, 100.0)],
        kernel: |x| x[0] * G_N * x[1],
    },
    Checked {
        formula: &EFFECTIVE_PULL,
        domain: &[(1.0, 5.0), (0.0, 1e5), (-1e5, 1e5), (0.0, 1e4)],
        kernel: |x| x[0] * x[1] + x[2] + x[3],
    },
    Checked { formula: &BELT_TENSION, domain: &[(0.0, 1e5), (0.0, 1e5)], kernel: |x| x[0] + x[1] },
    Checked {
        formula: &SLACK_TENSION,
        domain: &[(0.0, 1e5), (0.1, 0.5), (2.0, 8.0)],
        kernel: |x| least_slack_tension(x[0], x[1], x[2]),
    },
];

/// A belt with its idlers and material, per length.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Conveyor {
    /// Artificial friction coefficient.
    pub friction: f64,
    /// Distance between the end drums, m.
    pub length: f64,
    /// Rise, m.
    pub rise: f64,
    /// Turning mass of the carrying idlers, kg/m.
    pub carry: f64,
    /// Turning mass of the return idlers, kg/m.
    pub back: f64,
    /// Belt, kg/m.
    pub belt: f64,
    /// Material, kg/m.
    pub material: f64,
}

impl Conveyor {
    /// Main resistance, N.
    #[must_use]
    pub fn main_resistance(&self) -> f64 {
        let sine = self.rise / self.length;
        let cosine = f64::max(1.0 - sine * sine, 0.0).sqrt();
        let pressing = (2.0 * self.belt + self.material) * cosine;
        self.friction * self.length * G_N * (self.carry + self.back + pressing)
    }

    /// What the rise takes, N.
    #[must_use]
    pub fn lift_force(&self) -> f64 {
        self.material * G_N * self.rise
    }

    /// All that moves, kg: belt, material, rims of the idlers.
    #[must_use]
    pub fn moved_mass(&self) -> f64 {
        (2.0 * self.belt + self.material + self.carry + self.back) * self.length
    }
}

/// Tension (N) the slack strand needs for a pull (N) to pass without slip, by friction and wrap (rad).
#[must_use]
pub fn least_slack_tension(pull: f64, friction: f64, wrap: f64) -> f64 {
    pull / (libm::exp(friction * wrap) - 1.0)
}

#[cfg(test)]
mod tests {
    use super::{Conveyor, least_slack_tension};
    use crate::laws::testing::close;

    #[test]
    fn form_of_the_standard() {
        // ISO 5048:1989 form, inputs of our own, with the g of 9.81 m/s² the check was made with: F_H 7536.87 N,
        // F_St 9810 N, F_U 19683.3 N with C = 1.31 (from memory, for 300 m).
        let belt = Conveyor {
            friction: 0.02,
            length: 300.0,
            rise: 12.0,
            carry: 14.8,
            back: 6.0,
            belt: 12.0,
            material: 600.0 / 3.6 / 2.0,
        };
        let scale = 9.81 / 9.806_65;
        close(belt.main_resistance() * scale, 7_536.871_864_74, 1e-11);
        close(belt.lift_force() * scale, 9810.0, 1e-12);
        close((1.31 * belt.main_resistance() + belt.lift_force()) * scale, 19_683.302_142_8, 1e-11);
        close(belt.moved_mass(), 300.0 * (24.0 + 20.8 + 83.0 + 1.0 / 3.0), 1e-12);
    }

    #[test]
    fn published_wrap() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., Ex. 11.4: 2500 N against 1243.78 N at 160° and 0.25.
        let pull = 2500.0 - 1_243.784_852_34;
        close(least_slack_tension(pull, 0.25, 160.0_f64.to_radians()), 1_243.784_852_34, 1e-10);
    }
}
