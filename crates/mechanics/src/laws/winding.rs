//! Resistance of a copper winding at another temperature.
//!
//! Formula: `R = R_1 * (235 K + t - t_0) / (235 K + t_1 - t_0)`.
//! Symbols: R, R_1 resistance (Ω) at the temperatures t, t_1 (K); t_0 = 273.15 K, the zero of the Celsius scale.
//! Validity: copper windings, −50 °C to 250 °C. Brushes do not follow it; a motor whose brushes take a large share
//! of the resistance is better given by its warm value.
//! Source: temperature rise by resistance, IEC 60034-1 (235 for copper, from memory).
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Temperature at which the resistance of copper would reach zero on its straight line, below 0 °C (K).
const COPPER: f64 = 235.0;
/// 0 °C in K.
const ZERO_CELSIUS: f64 = 273.15;

/// Resistance at another temperature.
pub const RESISTANCE: Formula = Formula {
    name: "resistance",
    text: "R_1 * (235 K + (t - t_0)) / (235 K + (t_1 - t_0))",
    symbols: &[
        ("R_1", "resistance", "resistance as measured"),
        ("t", "temperature", "temperature of the winding"),
        ("t_0", "temperature", "0 °C"),
        ("t_1", "temperature", "temperature of the measurement"),
    ],
    validity: "copper windings, -50 °C to 250 °C",
    source: "IEC 60034-1, temperature rise by resistance (from memory)",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &RESISTANCE,
    domain: &[(0.001, 10.0), (240.0, 500.0), (ZERO_CELSIUS, ZERO_CELSIUS), (240.0, 500.0)],
    kernel: |x| copper_resistance(x[0], x[3], x[1]),
}];

/// Resistance (Ω) at `at` (K) of a winding that has `resistance` (Ω) at `measured_at` (K).
#[must_use]
pub fn copper_resistance(resistance: f64, measured_at: f64, at: f64) -> f64 {
    resistance * (COPPER + (at - ZERO_CELSIUS)) / (COPPER + (measured_at - ZERO_CELSIUS))
}

#[cfg(test)]
mod tests {
    use super::copper_resistance;
    use crate::laws::testing::close;

    #[test]
    fn warm_copper() {
        // Closed form: from 20 °C to 100 °C a factor of 335/255.
        close(copper_resistance(1.0, 293.15, 373.15), 335.0 / 255.0, 1e-14);
        close(copper_resistance(0.4, 300.0, 300.0), 0.4, 1e-15);
    }

    #[test]
    fn close_to_the_coefficient_at_twenty_degrees() {
        // 0.003 93 per kelvin at 20 °C, the international annealed copper standard (IEC 60028, from memory).
        close(copper_resistance(1.0, 293.15, 303.15), 1.0393, 1e-3);
    }
}
