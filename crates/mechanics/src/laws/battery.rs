//! A voltage behind a resistance: battery, dc bus, or a weak feeder.
//!
//! Formula: `U = U_0 - R * I`; greatest power `U_0^2 / (4 * R)` at half the open-circuit voltage.
//! Symbols: U voltage at the terminals (V); U_0 open-circuit voltage (V); R internal resistance (Ω); I current (A).
//! Validity: one state of charge, one temperature, a load of seconds to minutes.
//! Source: Thévenin's equivalent circuit; maximum power transfer, closed form.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Voltage under load.
pub const TERMINAL_VOLTAGE: Formula = Formula {
    name: "voltage",
    text: "U_0 - R * I",
    symbols: &[
        ("U_0", "voltage", "open-circuit voltage"),
        ("R", "resistance", "internal resistance, cables included"),
        ("I", "current", "current drawn, below zero when power is returned"),
    ],
    validity: "one state of charge, one temperature",
    source: "Thévenin's equivalent circuit",
    revision: 1,
};

/// The most a supply can give whatever the load.
pub const PEAK_POWER: Formula = Formula {
    name: "peak_power",
    text: "U_0^2 / (4 * R)",
    symbols: &[
        ("U_0", "voltage", "open-circuit voltage"),
        ("R", "resistance", "internal resistance, cables included"),
    ],
    validity: "at half the open-circuit voltage; half of the power heats the supply, so never a working point",
    source: "maximum power transfer, closed form",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TERMINAL_VOLTAGE,
        domain: &[(1.0, 800.0), (0.0, 2.0), (-200.0, 200.0)],
        kernel: |x| Thevenin { open_circuit: x[0], resistance: x[1] }.voltage(x[2]),
    },
    Checked {
        formula: &PEAK_POWER,
        domain: &[(1.0, 800.0), (0.001, 2.0)],
        kernel: |x| Thevenin { open_circuit: x[0], resistance: x[1] }.peak_power(),
    },
];

/// A voltage behind a resistance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Thevenin {
    /// Open-circuit voltage, V, above zero.
    pub open_circuit: f64,
    /// Internal resistance, Ω, zero or above.
    pub resistance: f64,
}

impl Thevenin {
    /// Terminal voltage (V) at a current (A).
    #[must_use]
    pub fn voltage(&self, current: f64) -> f64 {
        self.open_circuit - self.resistance * current
    }

    /// The most power (W) it can give; infinite without resistance.
    #[must_use]
    pub fn peak_power(&self) -> f64 {
        self.open_circuit * self.open_circuit / (4.0 * self.resistance)
    }

    /// The current (A) at which it gives a power (W), on the side of high voltage; `None` beyond its peak power.
    /// A power below zero is returned to it.
    #[must_use]
    pub fn current(&self, power: f64) -> Option<f64> {
        let square = self.open_circuit * self.open_circuit - 4.0 * self.resistance * power;
        (square >= 0.0).then(|| 2.0 * power / (self.open_circuit + square.sqrt()))
    }
}

#[cfg(test)]
mod tests {
    use super::Thevenin;
    use crate::laws::testing::close;

    #[test]
    fn peak_power_at_half_voltage() {
        // Maximum power transfer, closed form.
        let pack = Thevenin { open_circuit: 12.6, resistance: 0.020 };
        close(pack.peak_power(), 1984.5, 1e-12);
        let current = pack.current(pack.peak_power() * (1.0 - 1e-15)).unwrap();
        close(current, 315.0, 1e-6);
        close(pack.voltage(315.0), 6.3, 1e-12);
        assert_eq!(pack.current(1985.0), None);
    }

    #[test]
    fn power_comes_back_as_it_went() {
        let pack = Thevenin { open_circuit: 37.0, resistance: 0.11 };
        for power in [-500.0, 0.0, 1.0, 900.0, 3000.0] {
            let current = pack.current(power).unwrap();
            close(pack.voltage(current) * current, power, 1e-12);
        }
        let stiff = Thevenin { open_circuit: 37.0, resistance: 0.0 };
        close(stiff.current(370.0).unwrap(), 10.0, 1e-15);
    }
}
