//! Torque, current and power of an induction machine from its equivalent circuit, one phase of three.
//!
//! Formula: `T_g = 3 * U_th^2 * R_2 * s / (w_s * ((R_th * s + R_2)^2 + (s * (X_th + X_2))^2))` with the Thévenin values of
//! the stator; the current from the whole circuit, `I_1 = U_p * Y / (1 + Z_1 * Y)`.
//! Symbols: T_g air-gap torque (N·m); U_th, R_th, X_th voltage (V), resistance and reactance (Ω) of the stator seen from
//! the rotor; R_2, X_2 resistance and leakage reactance of the rotor, referred to the stator (Ω); s slip (-); w_s
//! synchronous speed (rad/s); Y admittance of magnetising branch and rotor, Z_1 impedance of the stator.
//! Validity: steady state, sinusoidal voltage, constant parameters: no deep bars, no saturation of the leakage paths.
//! Reactances go with the frequency. Friction and windage are taken as a constant power above half the synchronous speed
//! and as a torque that falls with the speed below it; what sticks at rest belongs to the load.
//! Source: A. E. Fitzgerald, C. Kingsley, S. D. Umans, Electric Machinery, 6th ed., 2003, ch. 6 (from memory); the checks
//! name theirs.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Voltage of the stator seen from the rotor.
pub const THEVENIN_VOLTAGE: Formula = Formula {
    name: "thevenin_voltage",
    text: "U_p * X_m / sqrt(R_1^2 + (X_1 + X_m)^2)",
    symbols: &[
        ("U_p", "voltage", "voltage of a phase"),
        ("X_m", "resistance", "magnetising reactance"),
        ("R_1", "resistance", "stator resistance"),
        ("X_1", "resistance", "stator leakage reactance"),
    ],
    validity: "magnetising branch without a core-loss resistance",
    source: "Thévenin's theorem, closed form",
    revision: 1,
};

/// Resistance of the stator seen from the rotor.
pub const THEVENIN_RESISTANCE: Formula = Formula {
    name: "thevenin_resistance",
    text: "R_1 * X_m^2 / (R_1^2 + (X_1 + X_m)^2)",
    symbols: &[
        ("R_1", "resistance", "stator resistance"),
        ("X_m", "resistance", "magnetising reactance"),
        ("X_1", "resistance", "stator leakage reactance"),
    ],
    validity: "magnetising branch without a core-loss resistance",
    source: "Thévenin's theorem, closed form",
    revision: 1,
};

/// Reactance of the stator seen from the rotor.
pub const THEVENIN_REACTANCE: Formula = Formula {
    name: "thevenin_reactance",
    text: "X_m * (R_1^2 + X_1 * (X_1 + X_m)) / (R_1^2 + (X_1 + X_m)^2)",
    symbols: &[
        ("X_m", "resistance", "magnetising reactance"),
        ("R_1", "resistance", "stator resistance"),
        ("X_1", "resistance", "stator leakage reactance"),
    ],
    validity: "magnetising branch without a core-loss resistance",
    source: "Thévenin's theorem, closed form",
    revision: 1,
};

/// Torque in the air gap.
pub const AIR_GAP_TORQUE: Formula = Formula {
    name: "air_gap_torque",
    text: "3 * U_th^2 * R_2 * s / (w_s * ((R_th * s + R_2)^2 + (s * (X_th + X_2))^2))",
    symbols: &[
        ("U_th", "voltage", "voltage of the stator seen from the rotor"),
        ("R_2", "resistance", "rotor resistance, referred to the stator"),
        ("s", "percentage", "slip"),
        ("w_s", "rotational_speed", "synchronous speed"),
        ("R_th", "resistance", "resistance of the stator seen from the rotor"),
        ("X_th", "resistance", "reactance of the stator seen from the rotor"),
        ("X_2", "resistance", "rotor leakage reactance, referred to the stator"),
    ],
    validity: "steady state, sinusoidal voltage, constant parameters",
    source: "A. E. Fitzgerald, C. Kingsley, S. D. Umans, Electric Machinery, 6th ed., 2003, ch. 6 (from memory)",
    revision: 1,
};

/// Slip at the highest torque.
pub const BREAKDOWN_SLIP: Formula = Formula {
    name: "breakdown_slip",
    text: "R_2 / sqrt(R_th^2 + (X_th + X_2)^2)",
    symbols: &[
        ("R_2", "resistance", "rotor resistance, referred to the stator"),
        ("R_th", "resistance", "resistance of the stator seen from the rotor"),
        ("X_th", "resistance", "reactance of the stator seen from the rotor"),
        ("X_2", "resistance", "rotor leakage reactance, referred to the stator"),
    ],
    validity: "as the torque",
    source: "maximum power transfer to R_2/s, closed form",
    revision: 1,
};

/// Torque at the shaft.
pub const SHAFT_TORQUE: Formula = Formula {
    name: "torque",
    text: "y * T_g - T_r",
    symbols: &[
        ("y", "number", "share left by star start, reduced voltage or a current limit; 1 without"),
        ("T_g", "torque", "torque in the air gap at full voltage"),
        ("T_r", "torque", "torque of friction and windage"),
    ],
    validity: "friction and windage a constant power above half the synchronous speed",
    source: "balance of torque",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &THEVENIN_VOLTAGE,
        domain: &[(100.0, 4e3), (5.0, 80.0), (0.01, 3.0), (0.05, 3.0)],
        kernel: |x| phase(x[2], x[3], x[1], x[0]).thevenin().voltage,
    },
    Checked {
        formula: &THEVENIN_RESISTANCE,
        domain: &[(0.01, 3.0), (5.0, 80.0), (0.05, 3.0)],
        kernel: |x| phase(x[0], x[2], x[1], 230.0).thevenin().resistance,
    },
    Checked {
        formula: &THEVENIN_REACTANCE,
        domain: &[(5.0, 80.0), (0.01, 3.0), (0.05, 3.0)],
        kernel: |x| phase(x[1], x[2], x[0], 230.0).thevenin().reactance,
    },
    Checked {
        formula: &AIR_GAP_TORQUE,
        domain: &[
            (100.0, 4e3),
            (0.05, 2.0),
            (0.005, 1.5),
            (30.0, 400.0),
            (0.02, 2.0),
            (0.1, 3.0),
            (0.1, 3.0),
        ],
        // Without a magnetising branch the stator is its own Thévenin circuit.
        kernel: |x| {
            let circuit = Circuit { r2: x[1], x2: x[6], magnetizing: None, ..phase(x[4], x[5], 1.0, x[0]) };
            circuit.on(x[3]).air_gap_torque(x[2])
        },
    },
    Checked {
        formula: &BREAKDOWN_SLIP,
        domain: &[(0.05, 2.0), (0.02, 2.0), (0.1, 3.0), (0.1, 3.0)],
        kernel: |x| {
            let circuit = Circuit { r2: x[0], x2: x[3], magnetizing: None, ..phase(x[1], x[2], 1.0, 230.0) };
            circuit.on(150.0).breakdown_slip()
        },
    },
    Checked {
        formula: &SHAFT_TORQUE,
        domain: &[(0.1, 1.0), (1.0, 500.0), (0.0, 20.0)],
        kernel: |x| x[0] * x[1] - x[2],
    },
];

fn phase(r1: f64, x1: f64, xm: f64, voltage: f64) -> Circuit {
    Circuit { r1, x1, r2: 0.3, x2: 0.5, magnetizing: Some(xm), core: None, voltage }
}

/// One phase at one frequency and voltage.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Circuit {
    /// Stator resistance, Ω, zero or above.
    pub r1: f64,
    /// Stator leakage reactance, Ω.
    pub x1: f64,
    /// Rotor resistance referred to the stator, Ω, above zero.
    pub r2: f64,
    /// Rotor leakage reactance referred to the stator, Ω.
    pub x2: f64,
    /// Magnetising reactance, Ω; none where the branch is left aside.
    pub magnetizing: Option<f64>,
    /// Resistance for the core loss across it, Ω.
    pub core: Option<f64>,
    /// Voltage of a phase, V.
    pub voltage: f64,
}

/// The stator seen from the rotor.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Thevenin {
    /// V
    pub voltage: f64,
    /// Ω
    pub resistance: f64,
    /// Ω
    pub reactance: f64,
}

impl Circuit {
    /// Conductance and susceptance of the magnetising branch.
    fn branch(&self) -> (f64, f64) {
        (self.core.map_or(0.0, |r| 1.0 / r), self.magnetizing.map_or(0.0, |x| -1.0 / x))
    }

    /// The stator seen from the rotor.
    #[must_use]
    pub fn thevenin(&self) -> Thevenin {
        let (g, b) = self.branch();
        // 1 + Z_1 Y_m
        let (re, im) = (1.0 + self.r1 * g - self.x1 * b, self.r1 * b + self.x1 * g);
        let square = re * re + im * im;
        Thevenin {
            voltage: self.voltage / square.sqrt(),
            resistance: (self.r1 * re + self.x1 * im) / square,
            reactance: (self.x1 * re - self.r1 * im) / square,
        }
    }

    /// The machine at a synchronous speed, rad/s.
    #[must_use]
    pub fn on(self, field_speed: f64) -> CircuitCurve {
        let seen = self.thevenin();
        CircuitCurve {
            circuit: self,
            seen,
            field_speed,
            rotational: None,
            start: None,
            current_limit: None,
            lines: 1.0,
        }
    }
}

/// What stands between mains and machine below a speed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Start {
    /// Factor on the torque: a third in star, the square of a reduced voltage.
    pub torque: f64,
    /// Factor on the current in each line: a third in star, the reduced voltage itself.
    pub current: f64,
    /// Speed of the change to full voltage, rad/s.
    pub until: f64,
}

/// A machine over its speed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CircuitCurve {
    /// One phase.
    pub circuit: Circuit,
    /// Its stator seen from the rotor.
    pub seen: Thevenin,
    /// Synchronous speed, rad/s.
    pub field_speed: f64,
    /// Friction and windage (W) and the synchronous speed at rated frequency, above half of which they are constant.
    pub rotational: Option<(f64, f64)>,
    /// How it is started.
    pub start: Option<Start>,
    /// Most current in each line, A, held by a soft starter or inverter.
    pub current_limit: Option<f64>,
    /// Current in a line over current of a phase: 1 in star, √3 in delta.
    pub lines: f64,
}

impl CircuitCurve {
    /// Torque in the air gap at full voltage.
    pub fn air_gap_torque<R: Real>(&self, slip: R) -> R {
        let Thevenin { voltage, resistance, reactance } = self.seen;
        let r2 = self.circuit.r2;
        let x = reactance + self.circuit.x2;
        let below = (slip * resistance + r2).square() + (slip * x).square();
        slip * (3.0 * voltage * voltage * r2 / self.field_speed) / below
    }

    /// The slip at a speed.
    pub fn slip<R: Real>(&self, speed: R) -> R {
        (-speed + self.field_speed) / self.field_speed
    }

    /// Slip of the highest torque.
    #[must_use]
    pub fn breakdown_slip(&self) -> f64 {
        let x = self.seen.reactance + self.circuit.x2;
        self.circuit.r2 / (self.seen.resistance * self.seen.resistance + x * x).sqrt()
    }

    /// Torque of friction and windage.
    pub fn friction<R: Real>(&self, speed: R) -> R {
        let Some((power, field)) = self.rotational else { return R::of(0.0) };
        let half = 0.5 * field;
        speed.piecewise(&[-half, half], |piece, speed| {
            if piece == 1 { speed * (power / (half * half)) } else { R::of(power) / speed }
        })
    }

    /// Conductance and susceptance of the circuit behind the stator, and the square of `1 + Z_1 Y`.
    fn admittance<R: Real>(&self, slip: R) -> (R, R, R) {
        let Circuit { r1, x1, r2, x2, .. } = self.circuit;
        let (g, b) = self.circuit.branch();
        let below = slip.square() * (x2 * x2) + r2 * r2;
        let conductance = slip * r2 / below + g;
        let susceptance = -(slip.square() * x2 / below) + b;
        let re = conductance * r1 - susceptance * x1 + 1.0;
        let im = susceptance * r1 + conductance * x1;
        (conductance, susceptance, re.square() + im.square())
    }

    /// Current of a phase of the stator at full voltage, A.
    pub fn phase_current<R: Real>(&self, slip: R) -> R {
        let (g, b, below) = self.admittance(slip);
        ((g.square() + b.square()) / below).sqrt() * self.circuit.voltage
    }

    /// Current of a phase of the rotor, referred to the stator, at full voltage, A.
    #[must_use]
    pub fn rotor_current(&self, slip: f64) -> f64 {
        let Circuit { r2, x2, voltage, .. } = self.circuit;
        let (_, _, below) = self.admittance(slip);
        voltage * slip.abs() / ((r2 * r2 + slip * slip * x2 * x2) * below).sqrt()
    }

    /// Power of all phases at the terminals, W, and what it is beside: reactive power, var.
    pub fn power<R: Real>(&self, slip: R) -> (R, R) {
        let (g, b, below) = self.admittance(slip);
        let square = g.square() + b.square();
        let scale = 3.0 * self.circuit.voltage * self.circuit.voltage;
        ((square * self.circuit.r1 + g) / below * scale, (square * self.circuit.x1 - b) / below * scale)
    }

    /// Share of the torque at full voltage that start and current limit leave.
    pub fn share<R: Real>(&self, speed: R) -> R {
        let started = match self.start {
            None => R::of(1.0),
            Some(start) => {
                speed.piecewise(&[start.until], |piece, _| R::of(if piece == 0 { start.torque } else { 1.0 }))
            }
        };
        let Some(limit) = self.current_limit else { return started };
        let (g, b, below) = self.admittance(self.slip(speed));
        let full = (self.lines * self.circuit.voltage) * (self.lines * self.circuit.voltage);
        // The current goes with the voltage, the torque with its square.
        let limited = below * (limit * limit / full) / (g.square() + b.square());
        started.min(limited)
    }

    /// Current in each line over that at full voltage, for a share of the torque.
    pub fn line_factor<R: Real>(&self, speed: R, share: R) -> R {
        let root = share.max(R::of(0.0)).sqrt();
        let Some(start) = self.start else { return root * self.lines };
        // In star the line carries the current of the phase.
        let star = start.current / start.torque.sqrt();
        speed.piecewise(&[start.until], |piece, _| {
            root * if piece == 0 { self.lines * star } else { self.lines }
        })
    }
}

impl Law for CircuitCurve {
    fn eval<R: Real>(&self, speed: R) -> R {
        let torque = self.air_gap_torque(self.slip(speed));
        let given = if self.start.is_none() && self.current_limit.is_none() {
            torque
        } else {
            torque * self.share(speed)
        };
        if self.rotational.is_none() { given } else { given - self.friction(speed) }
    }

    fn jumps(&self) -> Vec<f64> {
        self.start.iter().map(|start| start.until).collect()
    }

    fn kinks(&self) -> Vec<f64> {
        let half = self.rotational.map(|(_, field)| 0.5 * field);
        let mut kinks: Vec<f64> = half.into_iter().flat_map(|half| [-half, half]).collect();
        kinks.push(self.field_speed * (1.0 - self.breakdown_slip()));
        kinks.sort_by(f64::total_cmp);
        kinks
    }
}

#[cfg(test)]
mod tests;
