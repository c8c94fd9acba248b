//! What becomes of a drive from rest, and all its operating points.

use layshaft_mechanics::solution::{Answer, Mode, Outcome, Stability};
use layshaft_mechanics::solve::Solution;

use super::PointRow;
use crate::number::DIGITS;
use crate::shown::Number;

/// The outcome in words, and whether the drive comes to run.
pub(super) fn words(solution: &Solution) -> (String, bool) {
    let flag = |name: &str| solution.answer(None, None, name) == Answer::Flag(true);
    match solution.outcome {
        Outcome::Starts if flag("runs_up") => (String::from("runs up"), true),
        Outcome::Starts => (String::from("starts, hangs below its highest point"), true),
        Outcome::Stalls => (String::from("stalls"), false),
        Outcome::DrivenBack => (String::from("driven back"), false),
        Outcome::Runaway => (String::from("runs away"), false),
        Outcome::SelfMoving => (String::from("moved by its load"), true),
    }
}

/// All operating points, slowest first.
pub(super) fn points(solution: &Solution, unit: &str) -> Vec<PointRow> {
    let point = |(at, point): (usize, &layshaft_mechanics::solve::OperatingPoint)| PointRow {
        speed: Number::computed(point.speed, solution.speed_kind, unit, DIGITS),
        stability: match point.stability {
            Stability::Stable => "stable",
            Stability::Unstable => "unstable",
            Stability::Marginal => "marginal",
        },
        mode: mode(point.mode),
        reached: solution.reached == Some(at),
    };
    solution.points.iter().enumerate().map(point).collect()
}

/// The language's word for a mode.
pub const fn mode(mode: Mode) -> &'static str {
    match mode {
        Mode::Motoring => "motoring",
        Mode::Braking => "braking",
        Mode::Standstill => "standstill",
        Mode::DrivenBack => "driven_back",
        Mode::Freewheeling => "freewheeling",
    }
}
