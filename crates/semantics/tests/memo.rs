//! What is kept between two states of a text: the drives an edit leaves alone, and no more.

use std::sync::Arc;

use layshaft_mechanics::solve::Solution;
use layshaft_semantics::{Analysis, Memo, NoFiles, analyze, analyze_with};

const TWO: &str = "\
source motor: straight_line { stall_torque = 40 N·m; no_load_speed = 3000 rpm; braking = none }
load fan: quadratic { rated_torque = 8 N·m; rated_speed = 1500 rpm }
load saw: constant { torque = 7 N·m }
drive blow = motor -> fan
drive cut = motor -> saw
case gusty { fan.rated_torque = 9 N·m }
require \"F1\" blow.speed >= 100 rpm at blow.speed = 1000 rpm .. 1400 rpm
require \"F2\" blow.motor.torque <= 30 N·m at blow.speed = 1200 rpm
";

fn kept(text: &str, memo: &mut Memo) -> Analysis {
    let analysis = analyze_with("a.shaft", Arc::from(text), &NoFiles, memo);
    assert!(!analysis.has_errors(), "{:#?}", analysis.diagnostics);
    let fresh = analyze("a.shaft", Arc::from(text), &NoFiles);
    assert_eq!(format!("{:?}", analysis.criteria), format!("{:?}", fresh.criteria));
    analysis
}

fn solution(analysis: &Analysis, drive: &str, case: usize) -> Arc<Solution> {
    let record = analysis.drives.iter().find(|record| record.name == drive).expect("a drive");
    Arc::clone(record.cases[case].solution.as_ref().expect("it is solved"))
}

#[test]
fn an_edit_solves_what_it_changes() {
    let mut memo = Memo::default();
    let before = kept(TWO, &mut memo);
    let after = kept(&TWO.replace("= 7 N·m", "= 7.5 N·m"), &mut memo);
    assert!(Arc::ptr_eq(&solution(&before, "blow", 0), &solution(&after, "blow", 0)));
    assert!(Arc::ptr_eq(&solution(&before, "blow", 1), &solution(&after, "blow", 1)));
    assert!(!Arc::ptr_eq(&solution(&before, "cut", 0), &solution(&after, "cut", 0)));
}

#[test]
fn cases_that_leave_a_drive_alone_share_its_solution() {
    let analysis = kept(TWO, &mut Memo::default());
    assert!(Arc::ptr_eq(&solution(&analysis, "cut", 0), &solution(&analysis, "cut", 1)));
    assert!(!Arc::ptr_eq(&solution(&analysis, "blow", 0), &solution(&analysis, "blow", 1)));
}

#[test]
fn the_last_bit_is_another_drive() {
    let text = |torque: &str| TWO.replace("= 7 N·m", &format!("= {torque} N·m"));
    let mut memo = Memo::default();
    let one = kept(&text("7.000000000000000"), &mut memo);
    let same = kept(&text("7.0"), &mut memo);
    let other = kept(&text("7.000000000000001"), &mut memo);
    assert!(Arc::ptr_eq(&solution(&one, "cut", 0), &solution(&same, "cut", 0)));
    assert!(!Arc::ptr_eq(&solution(&same, "cut", 0), &solution(&other, "cut", 0)));
}

#[test]
fn what_the_newest_text_does_not_ask_for_is_dropped() {
    let mut memo = Memo::default();
    let _ = kept(TWO, &mut memo);
    let full = memo.solved();
    assert!(full > 3, "drives and questions are remembered: {full}");
    for torque in 1..40 {
        let _ = kept(&TWO.replace("= 7 N·m", &format!("= {torque} N·m")), &mut memo);
        assert_eq!(memo.solved(), full);
    }
    let without: String =
        TWO.lines().filter(|line| !line.contains("F1")).map(|line| format!("{line}\n")).collect();
    let _ = kept(&without, &mut memo);
    assert!(memo.solved() < full, "a question nobody asks any more is forgotten");
    let _ = kept("let a = 5 kW\n", &mut memo);
    assert_eq!(memo.solved(), 0);
}
