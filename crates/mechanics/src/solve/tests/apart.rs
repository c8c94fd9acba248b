//! Parts that can be out, reversed or slip: neutral gears, clutches, reversing gears, self-locking.

use crate::drive::{Chain, Direction, DriveSpec, PartSpec, Settings};
use crate::registry::{Role, row};
use crate::solution::{Answer, Mode, Outcome};
use crate::solve::{Solution, solve};
use crate::values::FieldValue::{Flag, Gears, Si};
use crate::values::{Gear, Values};

fn values(fields: &[(&'static str, f64)]) -> Values {
    fields.iter().fold(Values::default(), |all, (name, si)| all.with(name, Si(*si)))
}

fn part(role: Role, kind: &str, values: Values) -> PartSpec {
    PartSpec { name: kind.to_owned(), row: row(role, kind).unwrap(), values, on: true }
}

fn solved(parts: Vec<PartSpec>, settings: Settings) -> Solution {
    let chain = (0..parts.len()).map(|index| Chain::Part { index, count: 1 }).collect();
    solve(&DriveSpec { parts, chain: Chain::Series(chain), settings }).unwrap()
}

fn motor() -> PartSpec {
    let braking = crate::values::FieldValue::Word("as_generator");
    let fields = values(&[("stall_torque", 40.0), ("no_load_speed", 150.0)]).with("braking", braking);
    part(Role::Source, "straight_line", fields)
}

fn tyre() -> PartSpec {
    part(Role::Transmission, "wheel", values(&[("rolling_radius", 0.3)]))
}

fn car(grade: f64) -> PartSpec {
    let fields = [
        ("mass", 300.0),
        ("rolling_resistance", 0.01),
        ("drag_area", 0.9),
        ("air_density", 1.2),
        ("grade", grade),
    ];
    part(Role::Load, "vehicle", values(&fields))
}

fn codes(solution: &Solution) -> Vec<&'static str> {
    solution.findings().iter().map(|finding| finding.code).collect()
}

#[test]
fn in_neutral_the_load_is_alone() {
    let gears = vec![
        Gear::of("1", 8.0),
        Gear { name: "n".into(), reduction: None, efficiency: None, efficiency_backward: None },
    ];
    let box_of = || {
        let fields = values(&[("efficiency", 0.95), ("efficiency_backward", 0.95)]);
        part(Role::Transmission, "gearbox", fields.with("gear", Gears(gears.clone())))
    };
    let at = |gear: &str, grade| {
        let settings = Settings { gear: Some(gear.to_owned()), ..Settings::default() };
        solved(vec![motor(), box_of(), tyre(), car(grade)], settings)
    };
    assert_eq!(at("1", 0.06).outcome(), Some(Outcome::Starts));
    assert_eq!(at("n", 0.0).outcome(), Some(Outcome::Stalls));
    let hill = at("n", 0.06);
    assert_eq!(hill.outcome(), Some(Outcome::DrivenBack));
    assert!(matches!(hill.answer(Some(0), None, "torque"), Answer::Quantity { si, .. } if si == 0.0));
    let valley = at("n", -0.06);
    assert_eq!(valley.outcome(), Some(Outcome::SelfMoving));
    let reached = valley.reached().unwrap();
    assert_eq!(reached.mode, Mode::Freewheeling);
    // It coasts where drag holds it: m·g·(sin − c·cos) = ½·rho·A·v².
    let angle = libm::atan(0.06);
    let pull = 300.0 * 9.806_65 * (libm::sin(angle) - 0.01 * libm::cos(angle));
    assert!((reached.speed - (2.0 * pull / (1.2 * 0.9)).sqrt()).abs() < 1e-9);
}

#[test]
fn a_clutch_that_is_out_and_one_that_slips() {
    let clutch = |torque| part(Role::Transmission, "clutch", values(&[("max_torque", torque)]));
    let run = |clutch| solved(vec![motor(), clutch, tyre(), car(0.02)], Settings::default());
    let mut out = clutch(50.0);
    out.values.set("engaged", Flag(false));
    assert_eq!(run(out).outcome(), Some(Outcome::DrivenBack));
    assert_eq!(codes(&run(clutch(50.0))), Vec::<&str>::new());
    let slipping = run(clutch(5.0));
    assert_eq!(codes(&slipping), ["slips"]);
    assert!(
        matches!(slipping.answer(Some(1), None, "slip_reserve"), Answer::Quantity { si, .. } if si < 1.0)
    );
}

#[test]
fn a_reversing_gear_follows_the_direction() {
    let gear = || {
        let fields = [
            ("ahead_reduction", 4.0),
            ("astern_reduction", 5.0),
            ("efficiency", 0.95),
            ("efficiency_backward", 0.95),
        ];
        part(Role::Transmission, "reversing_gear", values(&fields))
    };
    let speed = |direction| {
        let settings = Settings { direction, ..Settings::default() };
        let solution = solved(vec![motor(), gear(), tyre(), car(0.0)], settings);
        let ratio = |part| match solution.answer(Some(part), None, "speed") {
            Answer::Quantity { si, .. } => si,
            other => panic!("{other:?}"),
        };
        ratio(0) / ratio(1)
    };
    assert!((speed(Direction::Forward) - 4.0).abs() < 1e-12);
    assert!((speed(Direction::Reverse) - 5.0).abs() < 1e-12);
}

#[test]
fn what_only_locks_itself_is_no_brake() {
    let screw = || {
        let fields = [("lead", 0.008), ("mean_diameter", 0.044), ("friction_coefficient", 0.14)];
        part(Role::Transmission, "screw", values(&fields))
    };
    let load = || part(Role::Load, "hoist", values(&[("mass", 900.0)]));
    let bare = solved(vec![motor(), screw(), load()], Settings::default());
    assert_eq!(codes(&bare), ["self-locking-trusted"]);
    let brake = part(Role::Transmission, "brake", values(&[("torque", 30.0), ("apply_time", 0.05)]));
    let braked = solved(vec![motor(), brake, screw(), load()], Settings::default());
    assert_eq!(codes(&braked), Vec::<&str>::new());
}
