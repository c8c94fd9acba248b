//! The curves at a station, in the units in which they are shown.

use layshaft_mechanics::solution::{Mode, Stability};
use layshaft_mechanics::solve::{Chart, ChartCurve, ChartPoint, CurveRole};
use layshaft_present::number::DIGITS;
use layshaft_present::shown::Number;
use layshaft_present::unit::{convert, usual_unit};
use layshaft_semantics::analysis::DriveCase;

use crate::Snapshot;

/// An axis.
#[derive(Clone, Debug, PartialEq)]
pub struct Axis {
    /// The kind of quantity.
    pub kind: &'static str,
    /// The unit of every number along it.
    pub unit: String,
}

impl Axis {
    fn number(&self, si: f64) -> Number {
        Number::computed(si, self.kind, &self.unit, DIGITS)
    }

    fn value(&self, si: f64) -> f64 {
        convert(si, &self.unit)
    }
}

/// Curves over speed, and what is marked on them.
#[derive(Clone, Debug, PartialEq)]
pub struct Picture {
    /// Speed of the station.
    pub speed: Axis,
    /// Torque or force there.
    pub effort: Axis,
    /// Power.
    pub power: Axis,
    /// Effort available from the sources.
    pub available: Vec<(f64, f64)>,
    /// Effort required by the loads, losses included.
    pub required: Vec<(f64, f64)>,
    /// Power available.
    pub available_power: Vec<(f64, f64)>,
    /// Every operating point.
    pub points: Vec<Point>,
    /// What the source can give for long.
    pub continuous: Option<Number>,
    /// The range of speeds in which the source's data were measured.
    pub measured: Option<(Number, Number)>,
}

/// An operating point.
#[derive(Clone, Debug, PartialEq)]
pub struct Point {
    /// Speed of the station.
    pub speed: Number,
    /// Effort there.
    pub effort: Number,
    /// `stable`, `unstable`, `marginal`
    pub stability: &'static str,
    /// `motoring`, `braking` …
    pub mode: &'static str,
    /// Whether the drive comes to it from rest.
    pub reached: bool,
}

/// The curves, or why there are none.
pub(super) fn picture(
    snapshot: &Snapshot,
    case: &DriveCase,
    station: Option<usize>,
) -> (Option<Picture>, Option<String>) {
    let Some(solution) = case.solution.as_deref() else {
        return (None, Some(String::from("the drive is not solved in this case")));
    };
    let Some(chart) = solution.chart(station) else {
        return (None, Some(String::from("this part does not turn or move with the drive")));
    };
    (Some(drawn(snapshot, &chart)), None)
}

fn drawn(snapshot: &Snapshot, chart: &Chart) -> Picture {
    let line = |role| {
        let curve = chart.curves.iter().find(|curve: &&ChartCurve| curve.role == role);
        curve.map_or(&[][..], |curve| curve.line.as_slice())
    };
    let (available, required) = (line(CurveRole::Available), line(CurveRole::Required));
    let power = line(CurveRole::Power);
    let largest = |line: &[(f64, f64)]| line.iter().map(|(_, value)| value.abs()).fold(0.0, f64::max);
    let fastest = available.last().map_or(0.0, |(speed, _)| *speed);
    let (across, up) = (chart.motion.speed_kind(), chart.motion.effort_kind());
    let of_points = chart.points.iter().map(|point| point.effort.abs()).fold(0.0, f64::max);
    let speed = Axis { kind: across, unit: snapshot.habits().unit(across, [fastest]) };
    let effort = Axis { kind: up, unit: usual_unit(up, [largest(available).max(of_points)]) };
    let watts = Axis { kind: "mechanical_power", unit: usual_unit("mechanical_power", [largest(power)]) };
    let shown = |line: &[(f64, f64)], up: &Axis| {
        let finite = line.iter().filter(|(speed, value)| speed.is_finite() && value.is_finite());
        finite.map(|(at, value)| (speed.value(*at), up.value(*value))).collect::<Vec<_>>()
    };
    Picture {
        available: shown(available, &effort),
        required: shown(required, &effort),
        available_power: shown(power, &watts),
        points: chart.points.iter().map(|point| mark(point, &speed, &effort)).collect(),
        continuous: chart.continuous.filter(|si| si.is_finite()).map(|si| effort.number(si)),
        measured: chart.measured.map(|(low, high)| (speed.number(low), speed.number(high))),
        speed,
        effort,
        power: watts,
    }
}

fn mark(point: &ChartPoint, speed: &Axis, effort: &Axis) -> Point {
    Point {
        speed: speed.number(point.speed),
        effort: effort.number(point.effort),
        stability: match point.stability {
            Stability::Stable => "stable",
            Stability::Unstable => "unstable",
            Stability::Marginal => "marginal",
        },
        mode: Mode::word(point.mode),
        reached: point.reached,
    }
}
