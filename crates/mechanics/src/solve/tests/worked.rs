//! The two worked drives of the language's design, by their registry rows, against the hand values beside them.

use crate::drive::{Chain, Direction, DriveSpec, PartSpec, Port, Settings, StatedSpeed};
use crate::laws::testing::rpm;
use crate::registry::{Role, row};
use crate::solution::{Answer, Outcome};
use crate::solve::testing::{near, number, number_at};
use crate::solve::{Extremes, Question, Solution, gears, solve, solve_at, worst_over};
use crate::values::{Duty, FieldValue, Gear, Table, Values};

fn si(fields: &[(&'static str, f64)]) -> Values {
    fields.iter().fold(Values::default(), |values, (name, value)| values.with(name, FieldValue::Si(*value)))
}

fn part(name: &str, role: Role, kind: &str, values: Values) -> PartSpec {
    let row = row(role, kind).unwrap_or_else(|| panic!("no kind {kind}"));
    PartSpec { name: name.into(), row, values, on: true }
}

fn one(index: usize) -> Chain {
    Chain::Part { index, count: 1 }
}

/// Goods hoist of a flour mill.
fn hoist(voltage: f64, mass: f64, direction: Direction) -> DriveSpec {
    let duty = Duty { class: 3, value: Some(0.4) };
    let mains =
        si(&[("voltage", voltage), ("frequency", 50.0)]).with("accepts_return", FieldValue::Flag(true));
    let motor = si(&[
        ("rated_power", 4000.0),
        ("rated_speed", rpm(1440.0)),
        ("rated_voltage", 400.0),
        ("rated_frequency", 50.0),
        ("poles", 4.0),
        ("inertia", 0.019),
    ])
    .with("supply", FieldValue::Part(6))
    .with("rated_duty", FieldValue::Duty(duty))
    .with("locked_rotor_torque", FieldValue::OfRated(2.3))
    .with("pull_up_torque", FieldValue::OfRated(1.9))
    .with("breakdown_torque", FieldValue::OfRated(2.9));
    let gear = si(&[
        ("reduction", 41.2),
        ("efficiency", 0.94),
        ("efficiency_backward", 0.94),
        ("max_output_torque", 1400.0),
    ]);
    let drum =
        si(&[("pitch_diameter", 0.27), ("layers", 1.0), ("efficiency", 0.97), ("efficiency_backward", 0.97)]);
    let block = si(&[("falls", 2.0), ("efficiency", 0.98), ("efficiency_backward", 0.98)]);
    let brake = si(&[("torque", 60.0), ("apply_time", 0.03), ("inertia", 0.0012)]);
    DriveSpec {
        parts: vec![
            part("motor", Role::Source, "induction_motor", motor),
            part("holding_brake", Role::Transmission, "brake", brake),
            part("reducer", Role::Transmission, "gear", gear),
            part("rope_drum", Role::Transmission, "drum", drum),
            part("block", Role::Transmission, "reeving", block),
            part("hook", Role::Load, "hoist", si(&[("mass", mass), ("breakaway_ratio", 1.15)])),
            part("mill_mains", Role::Supply, "mains", mains),
        ],
        chain: Chain::Series((0..6).map(one).collect()),
        settings: Settings { duty: Some(duty), direction, ..Settings::default() },
    }
}

const MOTOR: Option<usize> = Some(0);

#[test]
fn mill_hoist_lifting() {
    let solution = solve(&hoist(400.0, 1310.0, Direction::Forward)).unwrap();
    near(number(&solution, MOTOR, "speed").unwrap(), rpm(1447.1), 5e-5);
    near(number(&solution, MOTOR, "torque").unwrap(), 23.55, 5e-4);
    near(number(&solution, None, "speed").unwrap() * 60.0, 14.90, 5e-4);
    near(number(&solution, Some(1), "holding_reserve").unwrap(), 2.85, 1e-3);
    // By hand 10.2 mm, with inertias reflected free of losses; with the losses on the accelerating torque 10.0 mm.
    near(number(&solution, None, "stop_distance").unwrap(), 10.2e-3, 0.03);
    assert!(number(&solution, None, "run_up_reserve").unwrap() > 1.25);
    assert_eq!(solution.answer(None, None, "runs_up"), Answer::Flag(true));
    assert!(solution.findings().is_empty(), "{:?}", solution.findings());
}

#[test]
fn mill_hoist_lowering() {
    let solution = solve(&hoist(400.0, 1310.0, Direction::Reverse)).unwrap();
    assert_eq!(solution.outcome(), Some(Outcome::SelfMoving));
    near(number(&solution, MOTOR, "speed").unwrap(), rpm(1541.9), 5e-5);
    near(number(&solution, MOTOR, "torque").unwrap(), 18.81, 5e-4);
    near(number(&solution, None, "speed").unwrap() * 60.0, 15.87, 5e-4);
    near(number(&solution, MOTOR, "power").unwrap(), 3040.0, 2e-3);
    assert_eq!(solution.answer(None, None, "mode"), Answer::Word("braking"));
    near(number(&solution, MOTOR, "highest_speed").unwrap(), rpm(1769.0), 3e-3);
    near(number(&solution, None, "stop_distance").unwrap(), 24.7e-3, 0.03);
}

#[test]
fn mill_hoist_in_every_corner() {
    for voltage in [360.0, 400.0, 440.0] {
        for mass in [60.0, 1310.0] {
            for direction in [Direction::Forward, Direction::Reverse] {
                let solution = solve(&hoist(voltage, mass, direction)).unwrap();
                assert!(solution.faults().is_empty());
                assert_eq!(solution.answer(None, None, "starts"), Answer::Flag(true));
                for name in ["stop_distance", "highest_speed", "run_up_time", "efficiency"] {
                    number(&solution, None, name).unwrap_or_else(|a| panic!("{name} {direction:?}: {a:?}"));
                }
            }
        }
    }
}

/// What a case of the tricycle changes.
#[derive(Clone, Copy)]
struct Ride {
    grade: f64,
    gear: &'static str,
    rider: bool,
    pack: (f64, f64),
    accepts_return: bool,
}

const PLAIN: Ride = Ride { grade: 0.0, gear: "2", rider: true, pack: (37.0, 0.110), accepts_return: true };
const HILL_ALONE: Ride = Ride { grade: 0.06, gear: "1", rider: false, ..PLAIN };

/// Bakery trike.
fn trike(ride: Ride) -> DriveSpec {
    let pack =
        si(&[("open_circuit_voltage", ride.pack.0), ("resistance", ride.pack.1), ("current_limit", 30.0)])
            .with("accepts_return", FieldValue::Flag(ride.accepts_return));
    let columns = vec![
        ("speed", vec![rpm(2850.0), rpm(2400.0)]),
        ("torque", vec![1.2, 4.8]),
        ("current", vec![13.0, 44.7]),
    ];
    let motor = si(&[("current_limit", 45.0), ("measured_voltage", 36.0)])
        .with("supply", FieldValue::Part(7))
        .with("braking", FieldValue::Word("as_generator"))
        .with("point", FieldValue::Points(Table { columns, at: Vec::new() }));
    let rider = si(&[("sustained_power", 90.0)]).with("cadence", FieldValue::Interval(rpm(50.0), rpm(90.0)));
    let gearbox = si(&[("efficiency", 0.93), ("efficiency_backward", 0.93)])
        .with("gear", FieldValue::Gears(vec![Gear::of("1", 14.5), Gear::of("2", 8.2)]));
    let chain = si(&[("efficiency", 0.97)]).with("teeth", FieldValue::Ratio { driver: 42.0, driven: 18.0 });
    let wheel = si(&[("rolling_circumference", 1.52), ("grip", 0.6), ("driven_weight_share", 0.34)]);
    let road = si(&[
        ("mass", 240.0),
        ("rolling_resistance", 0.008),
        ("rolling_breakaway", 0.012),
        ("drag_area", 0.9),
        ("air_density", 1.20),
        ("grade", ride.grade),
    ]);
    let mut parts = vec![
        part("motor", Role::Source, "dc_motor", motor),
        part("rider", Role::Source, "person", rider),
        part("gearbox", Role::Transmission, "gearbox", gearbox),
        part("chain", Role::Transmission, "chain", chain),
        part("clutch", Role::Transmission, "freewheel", Values::default()),
        part("wheel", Role::Transmission, "wheel", wheel),
        part("road", Role::Load, "vehicle", road),
        part("pack", Role::Supply, "battery", pack),
    ];
    parts[1].on = ride.rider;
    let motor_side = Chain::Series(vec![one(0), one(2)]);
    let rider_side = Chain::Series(vec![one(1), one(3), one(4)]);
    let chain = Chain::Series(vec![Chain::Joined(vec![motor_side, rider_side]), one(5), one(6)]);
    let settings = Settings { gear: Some(ride.gear.into()), run_up_to: 0.9, ..Settings::default() };
    DriveSpec { parts, chain, settings }
}

const PACK: Option<usize> = Some(7);

fn kmh(solution: &Solution) -> f64 {
    number(solution, None, "speed").unwrap() * 3.6
}

#[test]
fn trike_uphill_and_on_the_flat() {
    let hill = solve(&trike(HILL_ALONE)).unwrap();
    near(kmh(&hill), 15.3, 4e-3);
    near(number(&hill, PACK, "current").unwrap(), 29.2, 3e-3);
    near(number(&hill, PACK, "voltage").unwrap(), 33.8, 2e-3);
    let old = solve(&trike(Ride { pack: (35.0, 0.200), ..HILL_ALONE })).unwrap();
    near(kmh(&old), 12.9, 4e-3);
    let plain = solve(&trike(PLAIN)).unwrap();
    near(kmh(&plain), 29.9, 2e-3);
    near(number(&plain, PACK, "current").unwrap(), 18.1, 5e-3);
    let cruise = Ride { rider: false, ..PLAIN };
    let stated = StatedSpeed { part: None, port: None, speed: 15.0 / 3.6 };
    let cruise = solve_at(&trike(cruise), stated).unwrap();
    near(number(&cruise, PACK, "current").unwrap(), 5.0, 0.01);
    assert_eq!(gears(&trike(PLAIN)), vec!["1".to_owned(), "2".to_owned()]);
}

#[test]
fn trike_on_the_ramp_and_downhill() {
    let ramp = |gear| solve(&trike(Ride { grade: 0.10, gear, rider: false, ..PLAIN })).unwrap();
    assert_eq!(ramp("1").answer(None, None, "starts"), Answer::Flag(true));
    let second = ramp("2");
    assert_eq!(second.answer(None, None, "driven_back"), Answer::Flag(true));
    let down =
        |accepts_return| solve(&trike(Ride { grade: -0.06, rider: false, accepts_return, ..PLAIN })).unwrap();
    let free = down(false);
    near(number(&free, None, "highest_speed").unwrap() * 3.6, 54.1, 1e-3);
    let braked = down(true);
    let speed = number(&braked, None, "highest_speed").unwrap() * 3.6;
    assert!(speed > 25.0 && speed < 40.0, "{speed}");
    assert_eq!(braked.answer(None, None, "mode"), Answer::Word("braking"));
    assert_eq!(number_at(&braked, Some(5), Some(Port::Output), "torque"), Err(Answer::NoSuch));
}

#[test]
fn numbers_say_how_they_came_about() {
    let solution = solve(&hoist(400.0, 1310.0, Direction::Forward)).unwrap();
    let power = solution.derivation(MOTOR, None, "power");
    assert_eq!(power.len(), 1);
    let product: f64 = power[0].symbols.iter().map(|s| s.si).product();
    near(power[0].result.unwrap(), product, 1e-15);
    let torque = solution.derivation(MOTOR, None, "torque");
    assert!(torque.iter().any(|s| s.text.contains("s_b")), "{torque:?}");
    assert!(torque.iter().all(|s| s.symbols.iter().all(|symbol| symbol.si.is_finite())));
    let hold = solution.derivation(Some(1), None, "holding_reserve");
    near(hold[0].result.unwrap(), 2.85, 1e-3);
    // Lifting uses the forward efficiency of the gear, lowering the backward one.
    let texts =
        |s: &Solution| s.derivation(Some(2), None, "torque").iter().map(|s| s.text).collect::<Vec<_>>();
    assert!(texts(&solution).iter().all(|t| !t.contains("eta_b")));
    let down = solve(&hoist(400.0, 1310.0, Direction::Reverse)).unwrap();
    assert!(texts(&down).iter().any(|t| t.contains("eta_b")));
    assert!(!solution.derivation(None, None, "run_up_time").is_empty());
    assert!(solution.derivation(None, None, "starts").is_empty());
}

#[test]
fn charts_meet_at_the_operating_points() {
    let solution = solve(&hoist(400.0, 1310.0, Direction::Forward)).unwrap();
    let chart = solution.chart(MOTOR).unwrap();
    let reached = chart.points.iter().find(|p| p.reached).unwrap();
    near(reached.speed, rpm(1447.1), 5e-5);
    near(reached.effort, 23.55, 5e-4);
    for curve in &chart.curves {
        assert!(curve.line.windows(2).all(|w| w[0].0 < w[1].0));
        assert!(curve.line.iter().all(|(x, y)| x.is_finite() && y.is_finite()));
    }
    near(chart.continuous.unwrap(), 26.526, 1e-4);
    let own = solution.chart(None).unwrap();
    assert_eq!(own.motion, crate::model::Motion::Linear);
}

/// The range is scanned beside: no value lies outside the extremes, and they are reached.
#[track_caller]
fn extremes_hold(spec: &DriveSpec, range: (f64, f64), question: Question<'_>) -> Extremes {
    let found = worst_over(spec, (None, None), range, question).unwrap();
    let value = |answer: &Answer| match answer {
        Answer::Quantity { si, .. } => *si,
        other => panic!("{question:?} {other:?}"),
    };
    let (least, greatest) = (value(&found.least.1), value(&found.greatest.1));
    for i in 0..=300 {
        let speed = range.0 + (range.1 - range.0) * f64::from(i) / 300.0;
        let stated = StatedSpeed { part: None, port: None, speed };
        if let Answer::Quantity { si, .. } =
            solve_at(spec, stated).unwrap().answer(question.part, question.port, question.name)
        {
            let slack = 1e-9 * greatest.abs();
            assert!(
                si >= least - slack && si <= greatest + slack,
                "{question:?} {speed} {si} {least} {greatest}"
            );
        }
    }
    found
}

#[test]
fn extremes_over_a_range_of_speeds() {
    let cruise = trike(Ride { rider: false, ..PLAIN });
    let range = (5.0 / 3.6, 20.0 / 3.6);
    for (part, name) in [
        (PACK, "current"),
        (PACK, "voltage"),
        (PACK, "power"),
        (MOTOR, "torque"),
        (MOTOR, "current"),
        (MOTOR, "efficiency"),
        (Some(5), "force"),
        (Some(6), "power"),
        (None, "power"),
        (None, "efficiency"),
    ] {
        let found = extremes_hold(&cruise, range, Question { part, port: None, name });
        assert_eq!(found.unanswered, None, "{name}");
    }
    // With the rider each source gives the same share of what it can.
    let both = extremes_hold(&trike(PLAIN), range, Question { part: MOTOR, port: None, name: "torque" });
    assert_eq!(both.unanswered, None);
    // Faster than the tricycle can go, somewhere in the range there is no answer.
    let question = Question { part: PACK, port: None, name: "current" };
    let far = worst_over(&cruise, (None, None), (20.0 / 3.6, 45.0 / 3.6), question).unwrap();
    assert!(matches!(far.unanswered, Some((_, Answer::Absent(_)))));
}
