//! A fluid coupling between a source and its load: two speeds, one torque.

use crate::drive::{Chain, DriveSpec, PartSpec, Port, Settings, StatedSpeed};
use crate::registry::{Role, row};
use crate::solution::{Answer, Outcome};
use crate::solve::{Solution, solve, solve_at};
use crate::values::{FieldValue, FieldValue::Si, Table, Values};

fn part(role: Role, kind: &str, fields: &[(&'static str, f64)]) -> PartSpec {
    let values = fields.iter().fold(Values::default(), |all, (name, si)| all.with(name, Si(*si)));
    let row = row(role, kind).unwrap();
    PartSpec { name: kind.to_owned(), row, values, on: true }
}

fn drive(parts: Vec<PartSpec>) -> DriveSpec {
    let chain = (0..parts.len()).map(|index| Chain::Part { index, count: 1 }).collect();
    DriveSpec { parts, chain: Chain::Series(chain), settings: Settings::default() }
}

fn number(solution: &Solution, part: usize, port: Option<Port>, name: &str) -> f64 {
    match solution.answer(Some(part), port, name) {
        Answer::Quantity { si, .. } => si,
        other => panic!("{name}: {other:?}"),
    }
}

fn plant(load: f64) -> DriveSpec {
    drive(vec![
        part(Role::Source, "straight_line", &[("stall_torque", 400.0), ("no_load_speed", 160.0)]),
        part(
            Role::Transmission,
            "fluid_coupling",
            &[
                ("rated_torque", 60.0),
                ("rated_speed", 150.0),
                ("rated_slip", 0.03),
                ("stall_torque_ratio", 2.0),
            ],
        ),
        part(Role::Load, "constant", &[("torque", load)]),
    ])
}

#[test]
fn source_and_load_at_their_own_speeds() {
    let solution = solve(&plant(50.0)).unwrap();
    assert_eq!(solution.outcome(), Some(Outcome::Starts));
    // The source gives 50 N·m at 160·(1 − 50/400) rad/s; the slip by the hyperbola through rated point and stall.
    let own = 160.0 * (1.0 - 50.0 / 400.0);
    let shape = 0.03 * (2.0 - 1.0) / (1.0 - 2.0 * 0.03);
    let share = 50.0 / (60.0 * (own / 150.0) * (own / 150.0) * 2.0 * (1.0 + shape));
    let slip = share * shape / (1.0 - share);
    let near =
        |found: f64, wanted: f64| assert!((found / wanted - 1.0).abs() < 1e-9, "{found}, not {wanted}");
    near(number(&solution, 0, None, "speed"), own);
    near(number(&solution, 2, None, "speed"), own * (1.0 - slip));
    near(number(&solution, 1, None, "slip"), slip);
    near(number(&solution, 1, Some(Port::Input), "speed"), own);
    near(number(&solution, 0, None, "torque"), 50.0);
    near(number(&solution, 0, None, "power"), 50.0 * own);
    near(number(&solution, 1, None, "efficiency"), 1.0 - slip);
    near(number(&solution, 1, None, "heat"), 50.0 * own * slip);
    near(number(&solution, 0, None, "peak_power"), 400.0 * 160.0 / 4.0);
    assert_eq!(solution.points().len(), 1);
}

#[test]
fn what_it_cannot_break_away_stalls() {
    // Held, the coupling passes 120 N·m at 150 rad/s; the source keeps 126.1 rad/s there, and 84.8 N·m.
    let solution = solve(&plant(86.0)).unwrap();
    assert_eq!(solution.outcome(), Some(Outcome::Stalls));
    let solution = solve(&plant(83.0)).unwrap();
    assert_eq!(solution.outcome(), Some(Outcome::Starts));
}

#[test]
fn only_directly_behind_its_source() {
    let mut spec = plant(50.0);
    spec.parts.insert(1, part(Role::Transmission, "coupling", &[]));
    let chain = (0..spec.parts.len()).map(|index| Chain::Part { index, count: 1 }).collect();
    spec.chain = Chain::Series(chain);
    assert!(solve(&spec).is_err());
}

#[test]
fn a_coupling_that_is_too_large_is_refused() {
    // A machine whose torque dips: a large coupling catches it in the dip.
    let dipping = |coupling: f64| {
        let columns = vec![
            ("speed", vec![0.0, 40.0, 60.0, 150.0, 160.0]),
            ("torque", vec![100.0, 20.0, 110.0, 90.0, 0.0]),
        ];
        let curve = FieldValue::Points(Table { columns, at: Vec::new() });
        let mut spec = plant(5.0);
        spec.parts[0] = part(Role::Source, "measured_curve", &[]);
        spec.parts[0].values.set("curve", curve);
        spec.parts[1].values.set("rated_torque", Si(coupling));
        solve(&spec)
    };
    assert!(dipping(60.0).is_ok());
    assert!(dipping(300.0).is_err());
}

#[test]
fn at_a_stated_speed_the_slip_follows_the_torque() {
    let at = |part| solve_at(&plant(30.0), StatedSpeed { part, port: None, speed: 100.0 });
    let solution = at(None).unwrap();
    let own = number(&solution, 0, None, "speed");
    assert!(own > 100.0 && own < 110.0, "{own}");
    let law = crate::laws::fluid_coupling::Fluid::rated(60.0, 150.0, 0.03, 2.0);
    assert!((law.torque(own, 100.0) - 30.0).abs() < 1e-8);
    // What the source turns at is its own affair.
    assert!(at(Some(0)).is_err());
}
