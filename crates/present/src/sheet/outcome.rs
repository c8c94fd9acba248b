//! What becomes of a drive from rest, and all its operating points.

use layshaft_mechanics::solution::{Answer, Mode, Outcome, Stability};
use layshaft_mechanics::solve::{OperatingPoint, Solution};

use super::PointRow;
use crate::number::DIGITS;
use crate::shown::Number;

/// The outcome in words, and whether the drive comes to run the way it is asked to.
pub(super) fn words(solution: &Solution, unit: &str) -> (String, bool) {
    let Some(outcome) = solution.outcome() else { return (String::from("not known"), false) };
    let back = solution.reached().filter(|point| point.mode == Mode::DrivenBack);
    let runs_up = || solution.answer(None, None, "runs_up") == Answer::Flag(true);
    match outcome {
        Outcome::Starts if runs_up() => (String::from("runs up"), true),
        Outcome::Starts => (String::from("hangs below its highest point"), false),
        Outcome::SelfMoving => (String::from("self-moving"), true),
        Outcome::Stalls => (String::from("stalls"), false),
        Outcome::Runaway => (String::from("runs away"), false),
        Outcome::DrivenBack => match back {
            Some(point) => (format!("driven back at {}", speed(&point, -1.0, unit).text), false),
            None => (String::from("driven back"), false),
        },
    }
}

/// All operating points, slowest first.
pub(super) fn points(solution: &Solution, unit: &str) -> Vec<PointRow> {
    let row = |point: &OperatingPoint| PointRow {
        speed: speed(point, 1.0, unit),
        stability: match point.stability {
            Stability::Stable => "stable",
            Stability::Unstable => "unstable",
            Stability::Marginal => "marginal",
        },
        mode: point.mode.word(),
        reached: point.reached,
    };
    solution.points().iter().map(row).collect()
}

fn speed(point: &OperatingPoint, sign: f64, unit: &str) -> Number {
    let kind = point.motion.speed_kind();
    let usual = if unit.is_empty() { crate::unit::usual_unit(kind, [point.speed]) } else { unit.to_string() };
    Number::computed(sign * point.speed, kind, &usual, DIGITS)
}
