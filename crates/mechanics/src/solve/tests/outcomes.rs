//! What happens from rest, the braking side, joined branches, set speeds, freewheels.

use crate::drive::{Port, StatedSpeed};
use crate::fault::FaultKind;
use crate::solution::{Answer, Outcome};
use crate::solve::testing::{Rig, near, number, number_at, values};
use crate::solve::{gears, solve, solve_at};
use crate::values::FieldValue;

const LINE: &[(&str, f64)] = &[("c0", 50.0), ("c1", -0.5), ("top_speed", 100.0)];

fn flag(solution: &crate::Solution, name: &str) -> bool {
    match solution.answer(None, None, name) {
        Answer::Flag(flag) => flag,
        other => panic!("{name}: {other:?}"),
    }
}

#[test]
fn friction_holds_or_the_load_wins() {
    // Friction 60 holds 50 at rest.
    let held = Rig::new().source(LINE).load(&[("c0", 60.0)]).solved();
    assert_eq!(held.outcome(), Some(Outcome::Stalls));
    assert!(flag(&held, "stalls") && !flag(&held, "starts") && !flag(&held, "driven_back"));
    // A weight of 60 drives it back until the source, driven backwards, pushes as much: 50 + 0.5 w = 60.
    let back = Rig::new().source(LINE).load(&[("weight", 60.0)]).solved();
    assert_eq!(back.outcome(), Some(Outcome::DrivenBack));
    let point = back.reached().unwrap();
    near(point.speed, -20.0, 1e-12);
    assert!(matches!(number(&back, None, "speed"), Err(Answer::Absent(_))));
    near(number(&back, None, "highest_speed").unwrap(), 20.0, 1e-12);
    // Without a source that holds, it runs away.
    let mut off = Rig::new().source(LINE).load(&[("weight", 60.0)]);
    off.spec.parts[0].on = false;
    let off = off.solved();
    assert_eq!(off.outcome(), Some(Outcome::Runaway));
    assert!(flag(&off, "runaway") && flag(&off, "driven_back"));
    assert!(matches!(off.answer(None, None, "highest_speed"), Answer::Unbounded(_)));
}

#[test]
fn braking_has_no_default() {
    let source = |word: Option<&'static str>| {
        let plain = values(LINE).with("brake_effort", FieldValue::Si(50.0));
        word.map_or(plain.clone(), |w| plain.with("braking", FieldValue::Word(w)))
    };
    let lowered = |word| Rig::new().source_of(source(word)).load(&[("weight", 10.0), ("c2", 1e-4)]).reverse();
    let unknown = lowered(None).solved();
    assert!(matches!(&unknown.faults()[..], [f] if f.kind == FaultKind::BrakingUnknown { field: "braking" }));
    assert!(matches!(unknown.answer(None, None, "speed"), Answer::Refused(_)));
    // It does start by itself: that needs no braking.
    assert!(flag(&unknown, "starts") && flag(&unknown, "self_moving"));
    // The machine holds it a little above its no-load speed; without braking only the drag does, at √(10 / 1e-4).
    let held = lowered(Some("as_generator")).solved();
    let speed = number(&held, None, "speed").unwrap();
    assert!(speed > 100.0 && speed < 120.0);
    assert_eq!(held.answer(None, None, "mode"), Answer::Word("braking"));
    let free = lowered(Some("none")).solved();
    near(number(&free, None, "speed").unwrap(), 316.227_766_016_838, 1e-12);
    assert_eq!(free.answer(None, None, "mode"), Answer::Word("freewheeling"));
    // A load that does not overhaul asks for none of this.
    let up = Rig::new().source_of(source(None)).load(&[("weight", 10.0)]).solved();
    near(number(&up, None, "speed").unwrap(), 80.0, 1e-12);
}

#[test]
fn losses_by_the_direction_of_power() {
    let rig = Rig::new()
        .source(LINE)
        .stage(&[("ratio", 4.0), ("forward", 0.8), ("backward", 0.5)])
        .load(&[("weight", 64.0)]);
    let up = rig.solved();
    near(number(&up, Some(0), "torque").unwrap(), 20.0, 1e-12);
    near(number_at(&up, Some(1), Some(Port::Input), "torque").unwrap(), 20.0, 1e-12);
    near(number(&up, Some(1), "torque").unwrap(), 64.0, 1e-12);
    near(number(&up, Some(1), "efficiency").unwrap(), 0.8, 1e-12);
    let down = rig.clone().reverse().solved();
    near(number(&down, Some(0), "torque").unwrap(), 8.0, 1e-12);
    near(number(&down, Some(0), "speed").unwrap(), 116.0, 1e-12);
    near(number(&down, None, "efficiency").unwrap(), 0.5, 1e-12);
}

#[test]
fn a_missing_backward_efficiency_is_refused_only_where_power_flows_back() {
    let stage = values(&[("ratio", 4.0), ("forward", 0.8)]).with("lossy", FieldValue::Flag(true));
    let rig = Rig::new().source(LINE).stage_of(stage).load(&[("weight", 64.0)]);
    near(number(&rig.solved(), Some(0), "torque").unwrap(), 20.0, 1e-12);
    let down = rig.reverse().solved();
    let faults = down.faults();
    assert!(
        matches!(&faults[..], [f] if f.part == Some(1) && matches!(f.kind, FaultKind::Missing { .. })),
        "{faults:?}"
    );
}

#[test]
fn a_self_locking_stage_must_be_driven_down() {
    let rig = Rig::new()
        .source(LINE)
        .stage(&[("ratio", 4.0), ("forward", 0.4), ("backward", -0.25)])
        .load(&[("weight", 64.0)])
        .reverse();
    let down = rig.solved();
    assert_eq!(down.outcome(), Some(Outcome::Starts));
    near(number(&down, Some(0), "torque").unwrap(), 4.0, 1e-12);
    assert_eq!(down.answer(None, None, "mode"), Answer::Word("motoring"));
}

fn with_set(rig: Rig, speed: f64, droop: f64) -> Rig {
    let mut rig = rig;
    rig.spec.settings.set_speed = Some(StatedSpeed { part: Some(0), port: None, speed });
    rig.spec.settings.droop = droop;
    rig
}

#[test]
fn set_speed_is_a_vertical_line() {
    let source = &[("c0", 50.0), ("c1", -0.5), ("top_speed", 100.0), ("brake_effort", 15.0)];
    let held = with_set(Rig::new().source(source).load(&[("weight", 10.0)]), 60.0, 0.0).solved();
    near(number(&held, None, "speed").unwrap(), 60.0, 1e-12);
    near(number(&held, Some(0), "torque").unwrap(), 10.0, 1e-9);
    near(number(&held, Some(0), "torque_reserve").unwrap(), 2.0, 1e-9);
    assert_eq!(held.answer(None, None, "holds_set_speed"), Answer::Flag(true));
    assert_eq!(held.answer(None, None, "limited_by"), Answer::Word("governor"));
    // More than it can give at 60: where envelope and load meet.
    let weak = with_set(Rig::new().source(source).load(&[("weight", 30.0)]), 60.0, 0.0).solved();
    near(number(&weak, None, "speed").unwrap(), 40.0, 1e-12);
    assert_eq!(weak.answer(None, None, "holds_set_speed"), Answer::Flag(false));
    assert_eq!(weak.answer(None, None, "limited_by"), Answer::Word("torque"));
    // Lowering 10 is held at 60 by braking; 20 is more than the 15 it can hold back.
    let down = with_set(Rig::new().source(source).load(&[("weight", 10.0)]).reverse(), 60.0, 0.0).solved();
    near(number(&down, None, "speed").unwrap(), 60.0, 1e-12);
    assert_eq!(down.answer(None, None, "mode"), Answer::Word("braking"));
    let lost = with_set(Rig::new().source(source).load(&[("weight", 20.0)]).reverse(), 60.0, 0.0).solved();
    assert_eq!(lost.outcome(), Some(Outcome::Runaway));
}

#[test]
fn droop_tilts_the_line() {
    let source = &[("c0", 40.0), ("top_speed", 200.0), ("brake_effort", 40.0)];
    let at = |weight| {
        let rig = with_set(Rig::new().source(source).load(&[("weight", weight)]), 100.0, 0.05);
        number(&rig.solved(), None, "speed").unwrap()
    };
    near(at(0.0), 100.0, 1e-9);
    near(at(20.0), 97.5, 1e-12);
    near(at(40.0 * (1.0 - 1e-9)), 95.0, 1e-9);
}

#[test]
fn equal_and_unequal_sources_on_a_shaft() {
    let rig = Rig::new().source(LINE).source(&[("c0", 10.0), ("c1", -0.2), ("top_speed", 50.0)]).joined();
    // At 80: 10 from the first, -6 from the second, which is beyond its no-load speed.
    let solution = rig.load(&[("c0", 4.0)]).solved();
    near(number(&solution, None, "speed").unwrap(), 80.0, 1e-12);
    near(number(&solution, Some(0), "torque").unwrap(), 10.0, 1e-12);
    near(number(&solution, Some(1), "torque").unwrap(), 6.0, 1e-12);
    assert_eq!(solution.answer(Some(1), None, "mode"), Answer::Word("braking"));
    near(number(&solution, Some(0), "load_share").unwrap(), 2.5, 1e-12);
}

#[test]
fn a_freewheel_leaves_a_branch_behind() {
    let slow = [("c0", 10.0), ("c1", -0.2), ("top_speed", 50.0)];
    let wheel = values(&[]).with("freewheel", FieldValue::Flag(true));
    // Branches: source 0 alone; source 1 through a freewheel.
    let mut rig = Rig::new().source(LINE).source(&slow).stage_of(wheel).load(&[("c0", 4.0)]);
    let part = |index| crate::drive::Chain::Part { index, count: 1 };
    let branch = crate::drive::Chain::Series(vec![part(1), part(2)]);
    rig.spec.chain =
        crate::drive::Chain::Series(vec![crate::drive::Chain::Joined(vec![part(0), branch]), part(3)]);
    let solution = rig.solved();
    near(number(&solution, None, "speed").unwrap(), 92.0, 1e-12);
    assert_eq!(number(&solution, Some(1), "torque"), Ok(0.0));
    assert_eq!(solution.answer(Some(1), None, "mode"), Answer::Word("freewheeling"));
    assert!(matches!(solution.answer(Some(1), None, "speed"), Answer::Absent(_)));
}

#[test]
fn a_trunk_freewheel_lets_the_load_run_ahead() {
    let wheel = values(&[]).with("freewheel", FieldValue::Flag(true));
    let rig = Rig::new().source(LINE).stage_of(wheel).load(&[("weight", -10.0), ("c2", 1e-4)]);
    let solution = rig.solved();
    near(number(&solution, None, "speed").unwrap(), 316.227_766_016_838, 1e-12);
    assert_eq!(number(&solution, Some(0), "torque"), Ok(0.0));
    assert_eq!(solution.answer(None, None, "mode"), Answer::Word("freewheeling"));
}

#[test]
fn a_stated_speed_asks_for_what_is_needed() {
    let rig = Rig::new().source(LINE).load(&[("weight", 10.0)]);
    let at = |speed| solve_at(&rig.spec, StatedSpeed { part: None, port: None, speed }).unwrap();
    near(number(&at(30.0), Some(0), "torque").unwrap(), 10.0, 1e-12);
    near(number(&at(30.0), Some(0), "torque_reserve").unwrap(), 3.5, 1e-12);
    assert!(matches!(at(90.0).answer(Some(0), None, "torque"), Answer::Absent(_)));
    assert!(matches!(at(30.0).answer(None, None, "starts"), Answer::Absent(_)));
    assert!(solve_at(&rig.spec, StatedSpeed { part: None, port: None, speed: -1.0 }).is_err());
}

#[test]
fn gears_are_never_chosen_silently() {
    let mut rig = Rig::new().source(LINE).stage(&[("ratio", 4.0), ("second", 2.0)]).load(&[("c0", 20.0)]);
    assert_eq!(gears(&rig.spec), vec!["1".to_owned(), "2".to_owned()]);
    assert!(solve(&rig.spec).is_err());
    rig.spec.settings.gear = Some("2".into());
    near(number(&rig.solved(), None, "speed").unwrap(), 40.0, 1e-12);
}

#[test]
fn chains_that_do_not_fit_are_refused() {
    let linear = values(&[("c0", 1.0)]).with("linear", FieldValue::Flag(true));
    let chains = [
        Rig::new().source(LINE).load_of(linear),
        Rig::new().source(LINE).stage(&[]),
        Rig::new().stage(&[]).load(&[]),
        Rig::new().load(&[]),
        Rig::new().source(LINE).load(&[]).load(&[]),
        Rig::new().source(LINE).source(LINE).load(&[]),
        Rig::new(),
    ];
    for (index, rig) in chains.iter().enumerate() {
        let faults = solve(&rig.spec).expect_err(&format!("chain {index}"));
        assert!(faults.iter().all(|f| matches!(f.kind, FaultKind::Chain { .. })), "{index}: {faults:?}");
    }
}

#[test]
fn one_way_sources_need_a_reversing_stage() {
    let engine = || {
        let flag = FieldValue::Flag(true);
        values(LINE).with("one_way", flag).with("braking", FieldValue::Word("none"))
    };
    let load = &[("c1", 0.1)];
    assert!(solve(&Rig::new().source_of(engine()).load(load).reverse().spec).is_err());
    let turned = values(&[("ratio", 1.0)]).with("reverses", FieldValue::Flag(true));
    let rig = Rig::new().source_of(engine()).stage_of(turned).load(load).reverse();
    assert_eq!(rig.solved().outcome(), Some(Outcome::Starts));
}

#[test]
fn hanging_below_the_highest_point() {
    // A dip between 20 and 60: 50 - 2 w at first, then rising again.
    let source = &[("c0", 30.0), ("c1", -2.0), ("c2", 0.05), ("c3", -0.000_35), ("top_speed", 110.0)];
    let solution = Rig::new().source(source).load(&[("c0", 10.0)]).solved();
    assert_eq!(solution.points().len(), 3, "{solution:?}");
    assert!(!flag(&solution, "runs_up") && flag(&solution, "starts"));
    let hangs = number(&solution, None, "hangs_at").unwrap();
    near(hangs, number(&solution, None, "speed").unwrap(), 1e-15);
}

#[test]
fn an_engine_starts_from_idle() {
    let engine = &[("c0", 40.0), ("c1", -0.2), ("top_speed", 200.0), ("idle", 80.0), ("inertia", 0.5)];
    let solution = Rig::new().source(engine).load(&[("c0", 10.0), ("inertia", 0.5)]).solved();
    near(number(&solution, None, "speed").unwrap(), 150.0, 1e-12);
    // From idle on: M = 1, 30 - 0.2 w, so t = ln(14 / 1.5) / 0.2 to 95 %.
    near(number(&solution, None, "run_up_time").unwrap(), libm::log(14.0 / 1.5) / 0.2, 1e-9);
    // At idle it gives 24: through the clutch that moves 20 from rest, not 26.
    let moved = |weight| Rig::new().source(engine).load(&[("weight", weight)]).solved().outcome();
    assert_eq!(moved(20.0), Some(Outcome::Starts));
    assert_eq!(moved(26.0), Some(Outcome::Runaway));
    // A fan that takes 30 at idle: the clutch slips on below it.
    let fan = Rig::new().source(engine).load(&[("c2", 30.0 / 6400.0)]).solved();
    assert_eq!(fan.outcome(), Some(Outcome::Stalls));
    assert!(matches!(number(&fan, None, "speed"), Err(Answer::Absent(_))));
}

#[test]
fn several_loads_on_a_shaft_and_a_reversing_stage_between() {
    // A pump on the shaft and, through a reversing pair 1:2, a generator that counts its own sense.
    let pair = values(&[("ratio", 0.5), ("forward", 0.8)]).with("reverses", FieldValue::Flag(true));
    let mut rig = Rig::new().source(LINE).load(&[("c0", 5.0)]).stage_of(pair).load(&[("c0", 4.0)]);
    let part = |index| crate::drive::Chain::Part { index, count: 1 };
    let branch = crate::drive::Chain::Series(vec![part(2), part(3)]);
    rig.spec.chain =
        crate::drive::Chain::Series(vec![part(0), crate::drive::Chain::Joined(vec![part(1), branch])]);
    let solution = rig.solved();
    // 5 + 4 / (0.5 · 0.8) = 15 of 50 - 0.5 w.
    near(number(&solution, Some(0), "speed").unwrap(), 70.0, 1e-12);
    near(number(&solution, Some(3), "speed").unwrap(), 140.0, 1e-12);
    near(number(&solution, Some(3), "torque").unwrap(), 4.0, 1e-12);
}
