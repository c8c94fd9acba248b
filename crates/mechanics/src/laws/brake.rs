//! The holding brake: how well it holds.
//!
//! Formula: `r = T_b / T_s`.
//! Symbols: T_b torque of the brake (N·m); T_s static torque of the load at the brake, losses left aside (N·m);
//! r reserve (-).
//! Validity: standstill. Losses between load and brake help to hold but may not be counted on, so they are not.
//! Source: common practice of hoist brakes; what reserve is required stands in the local code for the machine.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Brake torque over static torque.
pub const HOLDING_RESERVE: Formula = Formula {
    name: "holding_reserve",
    text: "T_b / T_s",
    symbols: &[
        ("T_b", "torque", "torque of the brake"),
        ("T_s", "torque", "static torque of the load at the brake, without losses"),
    ],
    validity: "standstill",
    source: "common practice, no source",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &HOLDING_RESERVE,
    domain: &[(0.1, 1e5), (0.1, 1e5)],
    kernel: |x| holding_reserve(x[0], x[1]),
}];

/// Brake torque over the size of the static torque; infinite where nothing has to be held.
#[must_use]
pub fn holding_reserve(brake_torque: f64, static_torque: f64) -> f64 {
    brake_torque / static_torque.abs()
}

#[cfg(test)]
mod tests {
    use super::holding_reserve;
    use crate::laws::{incline::weight, testing::close};

    #[test]
    fn a_goods_hoist() {
        // An invented hoist: 1310 kg on two falls, drum of 0.27 m, reduction 41.2, brake of 60 N·m.
        let at_brake = weight(1310.0) / 2.0 * 0.135 / 41.2;
        close(at_brake, 21.05, 1e-3);
        close(holding_reserve(60.0, at_brake), 2.85, 1e-3);
    }
}
