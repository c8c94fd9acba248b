//! A measured curve taken to other conditions by similarity: its speeds by one factor, its efforts by another.
//!
//! Formula: `T = y * T_1` at the speed `w = x * w_1`: for a dc machine at another voltage `x = y = U / U_1`, for an induction
//! machine `x = 1`, `y = (U / U_1)^2`, for a water turbine at another head `x = sqrt(H / H_1) * D_1 / D` and
//! `y = (H / H_1) * (D / D_1)^3`.
//! Symbols: T torque (N·m) at the speed w (rad/s); T_1, w_1 as measured; U, H, D voltage (V), head (m), diameter (m).
//! Validity: what the similarity leaves aside is small: friction and iron losses of a motor, viscosity and the efficiency
//! of small turbines. Results are marked as scaled.
//! Source: closed form of the dc machine and of the induction machine without their losses; affinity laws of hydraulic
//! machines, IEC 60193 (from memory).
//! Revision: 1

use super::Checked;
use super::table::Table;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// A dc machine's curve at another voltage.
pub const DC_VOLTAGE: Formula = Formula {
    name: "torque_at_voltage",
    text: "T * U / U_1",
    symbols: &[
        ("T", "torque", "torque measured, at the speed that goes with the voltage: w_1 = w * U_1 / U"),
        ("U", "voltage", "voltage of the supply"),
        ("U_1", "voltage", "voltage of the measurement"),
    ],
    validity: "direct voltage, losses small: speeds and torques both go with the voltage",
    source: "closed form of the dc machine without losses",
    revision: 1,
};

/// A turbine's curve at another head and size.
pub const HEAD: Formula = Formula {
    name: "torque_at_head",
    text: "T * (H / H_1) * (D / D_1)^3",
    symbols: &[
        ("T", "torque", "torque measured, at the speed that goes with head and size"),
        ("H", "length", "net head"),
        ("H_1", "length", "net head of the measurement"),
        ("D", "length", "diameter of the runner"),
        ("D_1", "length", "diameter of the runner measured"),
    ],
    validity: "same gate opening, similar shape, speeds by w_1 = w * sqrt(H_1 / H) * D / D_1",
    source: "affinity laws of hydraulic machines, IEC 60193 (from memory)",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &DC_VOLTAGE,
        domain: &[(0.1, 100.0), (6.0, 400.0), (6.0, 400.0)],
        kernel: |x| scaled_level(x[0], x[1] / x[2], x[1] / x[2]),
    },
    Checked {
        formula: &HEAD,
        domain: &[(0.1, 1e4), (1.0, 200.0), (1.0, 200.0), (0.1, 3.0), (0.1, 3.0)],
        kernel: |x| {
            let (speed, effort) = head_factors(x[1] / x[2], x[3] / x[4]);
            scaled_level(x[0], speed, effort)
        },
    },
];

/// A curve of one torque, scaled.
fn scaled_level(torque: f64, speed: f64, effort: f64) -> f64 {
    let level = Table::new(vec![(0.0, torque), (1.0, torque)]);
    level.map_or(f64::NAN, |table| ScaledTable { table, speed, effort }.eval(0.5))
}

/// Factors on speeds and torques of a turbine, for the ratios of its heads and diameters.
#[must_use]
pub fn head_factors(heads: f64, diameters: f64) -> (f64, f64) {
    (heads.sqrt() / diameters, heads * diameters * diameters * diameters)
}

/// A curve taken to other conditions.
#[derive(Clone, Debug, PartialEq)]
pub struct ScaledTable {
    /// As measured.
    pub table: Table,
    /// Factor on the speeds, above zero.
    pub speed: f64,
    /// Factor on the efforts, above zero.
    pub effort: f64,
}

impl ScaledTable {
    /// As measured.
    #[must_use]
    pub fn plain(table: Table) -> Self {
        Self { table, speed: 1.0, effort: 1.0 }
    }

    /// The speeds it was measured in, taken along.
    #[must_use]
    pub fn range(&self) -> (f64, f64) {
        let (low, high) = self.table.range();
        (low * self.speed, high * self.speed)
    }
}

impl Law for ScaledTable {
    fn eval<R: Real>(&self, x: R) -> R {
        if self.speed == 1.0 && self.effort == 1.0 {
            return self.table.eval(x);
        }
        self.table.eval(x / self.speed) * self.effort
    }

    fn kinks(&self) -> Vec<f64> {
        Law::kinks(&self.table).into_iter().map(|x| x * self.speed).collect()
    }
}

#[cfg(test)]
mod tests {
    use super::{ScaledTable, head_factors};
    use crate::curve::Curve;
    use crate::laws::table::Table;
    use crate::laws::testing::{close, encloses};
    use proptest::prelude::*;

    fn table() -> Table {
        Table::new(vec![(0.0, 12.0), (100.0, 9.0), (300.0, 0.0)]).unwrap()
    }

    #[test]
    fn a_straight_line_keeps_its_machine() {
        // Closed form: at twice the voltage a dc machine has twice the stall torque and twice the no-load speed.
        let line = Table::new(vec![(0.0, 10.0), (200.0, 0.0)]).unwrap();
        let scaled = ScaledTable { table: line, speed: 2.0, effort: 2.0 };
        close(scaled.at(0.0), 20.0, 1e-14);
        close(scaled.at(400.0) + 1.0, 1.0, 1e-14);
        assert_eq!(scaled.range(), (0.0, 400.0));
    }

    #[test]
    fn power_of_a_turbine_goes_with_head_to_three_halves() {
        // Affinity laws: P ~ H^(3/2) D².
        let (speed, torque) = head_factors(4.0, 0.5);
        close(speed * torque, 8.0 * 0.25, 1e-14);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(100))]
        #[test]
        fn bounds_hold(
            speed in 0.3..3.0f64, effort in 0.3..3.0f64,
            lo in -100.0..500.0f64, width in 0.0..200.0f64, t in 0.0..1.0f64,
        ) {
            encloses(&ScaledTable { table: table(), speed, effort }, lo, width, t);
        }
    }
}
