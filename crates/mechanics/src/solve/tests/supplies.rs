//! Sources that hang on one supply.

use crate::drive::{Chain, DriveSpec, PartSpec, Settings};
use crate::registry::{Role, row};
use crate::solution::Answer;
use crate::solve::testing::{near, number};
use crate::solve::{Question, solve, worst_over};
use crate::values::{FieldValue, Values};

fn part(name: &str, role: Role, kind: &str, fields: &[(&'static str, f64)]) -> PartSpec {
    let mut values = Values::default();
    fields.iter().for_each(|(name, value)| values.set(name, FieldValue::Si(*value)));
    PartSpec { name: name.into(), row: row(role, kind).unwrap(), values, on: true }
}

fn one(index: usize) -> Chain {
    Chain::Part { index, count: 1 }
}

/// Two motors of these constants (N·m/A, Ω) joined on a shaft that takes `torque`, on a pack of 48 V and 50 mΩ.
fn pair(a: (f64, f64), b: (f64, f64), torque: f64, limit: Option<f64>) -> DriveSpec {
    let motor = |name, (k, r): (f64, f64)| {
        let fields = [("torque_constant", k), ("resistance", r), ("no_load_current", 0.0)];
        let mut part = part(name, Role::Source, "dc_motor", &fields);
        part.values.set("supply", FieldValue::Part(3));
        part.values.set("braking", FieldValue::Word("as_generator"));
        part
    };
    let mut pack =
        part("pack", Role::Supply, "battery", &[("open_circuit_voltage", 48.0), ("resistance", 0.05)]);
    pack.values.set("accepts_return", FieldValue::Flag(true));
    if let Some(limit) = limit {
        pack.values.set("current_limit", FieldValue::Si(limit));
    }
    let load = part("mill", Role::Load, "constant", &[("torque", torque)]);
    DriveSpec {
        parts: vec![motor("left", a), motor("right", b), load, pack],
        chain: Chain::Series(vec![Chain::Joined(vec![one(0), one(1)]), one(2)]),
        settings: Settings::default(),
    }
}

#[test]
fn different_motors_pull_each_other_down() {
    // I = (U - k w) / R each, U = 48 - 0.05 (I1 + I2), 0.1 I1 + 0.2 I2 = 5: two lines in U and w.
    let (a, b) = ((0.1, 0.1), (0.2, 0.3));
    let (g1, g2) = (1.0 / a.1, 1.0 / b.1);
    // U (1 + 0.05 (g1 + g2)) - 0.05 w (g1 k1 + g2 k2) = 48;  U (k1 g1 + k2 g2) - w (k1² g1 + k2² g2) = 5
    let (m11, m12) = (1.0 + 0.05 * (g1 + g2), -0.05 * (g1 * a.0 + g2 * b.0));
    let (m21, m22) = (a.0 * g1 + b.0 * g2, -(a.0 * a.0 * g1 + b.0 * b.0 * g2));
    let det = m11 * m22 - m12 * m21;
    let (voltage, speed) = ((48.0 * m22 - m12 * 5.0) / det, (m11 * 5.0 - m21 * 48.0) / det);
    let solution = solve(&pair(a, b, 5.0, None)).unwrap();
    near(number(&solution, None, "speed").unwrap(), speed, 1e-9);
    near(number(&solution, Some(3), "voltage").unwrap(), voltage, 1e-9);
    let (left, right) = ((voltage - a.0 * speed) * g1, (voltage - b.0 * speed) * g2);
    near(number(&solution, Some(0), "current").unwrap(), left, 1e-8);
    near(number(&solution, Some(1), "current").unwrap(), right.abs(), 1e-8);
    near(number(&solution, Some(3), "current").unwrap(), left + right, 1e-8);
    let question = Question { part: Some(3), port: None, name: "current" };
    assert!(worst_over(&pair(a, b, 5.0, None), (None, None), (10.0, 20.0), question).is_err());
}

#[test]
fn equal_motors_by_two_names_are_two_machines() {
    let both = solve(&pair((0.1, 0.1), (0.1, 0.1), 5.0, None)).unwrap();
    let mut twin = pair((0.1, 0.1), (0.1, 0.1), 5.0, None);
    twin.chain = Chain::Series(vec![Chain::Part { index: 0, count: 2 }, one(2)]);
    let twin = solve(&twin).unwrap();
    near(number(&both, None, "speed").unwrap(), number(&twin, None, "speed").unwrap(), 1e-12);
    near(number(&both, Some(3), "current").unwrap(), number(&twin, Some(3), "current").unwrap(), 1e-12);
    near(number(&both, Some(0), "load_share").unwrap(), 0.5, 1e-12);
}

#[test]
fn a_shared_limit_is_not_shared_out_silently() {
    assert!(solve(&pair((0.1, 0.1), (0.2, 0.3), 5.0, Some(40.0))).is_err());
    // One of them off leaves nothing to share.
    let mut alone = pair((0.1, 0.1), (0.2, 0.3), 1.0, Some(40.0));
    alone.parts[1].on = false;
    let alone = solve(&alone).unwrap();
    assert!(matches!(alone.answer(Some(1), None, "current"), Answer::Absent(_)));
    assert!(number(&alone, Some(0), "current").is_ok());
}
