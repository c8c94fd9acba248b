//! A drive at one speed: efforts, direction of power, and what of it rests on fields that are not given.

use super::assembly::{Assembly, Far};
use super::flow::{Flow, Through};
use super::points::{Meet, at};
use super::roots::Crossing;
use super::source::SourceAt;
use crate::fault::{Fault, FaultKind, Note};
use crate::model::Known;
use crate::solution::{Marks, Mode, Stability};

/// A drive at one speed.
pub(crate) struct State {
    /// Speed of the root, with its sign.
    pub x: f64,
    /// Efforts.
    pub flow: Flow<f64>,
    /// How the efforts meet here; none at a stated speed and at rest.
    pub stability: Option<Stability>,
    /// Whether it lies on a vertical piece.
    pub vertical: bool,
    /// Fields that would have to be given for this to be said.
    pub faults: Vec<Fault>,
    /// Marks on every number taken here.
    pub marks: Marks,
    /// How power flows.
    pub mode: Mode,
    /// Shafts that a freewheel leaves behind or an open stage cuts off.
    pub behind: Vec<bool>,
}

/// The stability of an operating point where the net effort meets zero so.
pub(crate) fn stability(crossing: Crossing) -> Stability {
    match crossing {
        Crossing::Falling => Stability::Stable,
        Crossing::Rising => Stability::Unstable,
        Crossing::Touching => Stability::Marginal,
    }
}

/// Shares of an effort below this are rounding.
const TRACE: f64 = 1e-11;

impl State {
    /// At a meeting of available and required effort.
    pub fn at_meet(drive: &Assembly, meet: &Meet) -> Self {
        let flow = at(drive, meet);
        Self {
            stability: Some(stability(meet.crossing)),
            vertical: meet.vertical,
            ..Self::with(drive, meet.x, flow)
        }
    }

    /// With given efforts.
    pub fn with(drive: &Assembly, x: f64, mut flow: Flow<f64>) -> Self {
        let behind = left_behind(drive, &flow);
        for (source, effort) in drive.sources.iter().zip(&mut flow.sources) {
            if behind[source.at.shaft] {
                *effort = 0.0;
            }
        }
        for (load, effort) in drive.loads.iter().zip(&mut flow.loads) {
            if behind[load.at.shaft] {
                *effort = 0.0;
            }
        }
        for (stage, through) in drive.stages.iter().zip(&mut flow.through) {
            if behind[stage.at.input] {
                *through = Through { input: 0.0, output: 0.0, hold: 0.0 };
            }
        }
        let mode = mode(drive, x, &flow);
        let faults = unknowns(drive, x, &flow);
        Self {
            x,
            stability: None,
            vertical: false,
            faults,
            marks: marks(drive, x, &flow),
            mode,
            behind,
            flow,
        }
    }

    /// Mechanical power of all sources.
    pub fn source_power(&self, drive: &Assembly) -> f64 {
        power(drive, self.x, &self.flow)
    }
}

/// The shafts before a freewheel that passes nothing, and beyond an open stage: they run, or rest, at a speed of their own.
fn left_behind(drive: &Assembly, flow: &Flow<f64>) -> Vec<bool> {
    let mut behind = vec![false; drive.shafts.len()];
    for index in drive.order.iter().rev() {
        let stage = &drive.stages[*index];
        let (near, far) = match stage.far {
            Far::Input => (stage.at.output, stage.at.input),
            Far::Output => (stage.at.input, stage.at.output),
        };
        let passes_nothing = stage.far == Far::Input && stage.one_way && flow.through[*index].input <= 0.0;
        behind[far] = behind[near] || passes_nothing || stage.open;
    }
    behind
}

/// Mechanical power of all sources.
fn power(drive: &Assembly, x: f64, flow: &Flow<f64>) -> f64 {
    let each = drive.sources.iter().zip(&flow.sources);
    let own = |s: &SourceAt, effort: f64| s.own_speed(x * drive.shafts[s.at.shaft].speed, effort);
    each.map(|(s, effort)| effort * s.at.count * own(s, *effort)).sum()
}

fn mode(drive: &Assembly, x: f64, flow: &Flow<f64>) -> Mode {
    if x == 0.0 {
        return Mode::Standstill;
    }
    if x < 0.0 {
        return Mode::DrivenBack;
    }
    let given = power(drive, x, flow);
    let trace = TRACE * x * efforts(drive, flow);
    if given > trace {
        Mode::Motoring
    } else if given < -trace {
        Mode::Braking
    } else {
        Mode::Freewheeling
    }
}

/// The size of all efforts, referred to the root.
fn efforts(drive: &Assembly, flow: &Flow<f64>) -> f64 {
    let sources = drive.sources.iter().zip(&flow.sources);
    let loads = drive.loads.iter().zip(&flow.loads);
    let given: f64 = sources.map(|(s, e)| (e * s.at.count * drive.shafts[s.at.shaft].speed).abs()).sum();
    let taken: f64 = loads.map(|(l, e)| (e * l.at.count * drive.shafts[l.at.shaft].speed).abs()).sum();
    given + taken
}

/// Whether any curve is used outside its measured range at this speed, or scaled.
fn marks(drive: &Assembly, x: f64, flow: &Flow<f64>) -> Marks {
    let mut marks = Marks::default();
    let outside = |range: Option<(f64, f64)>, speed: f64| {
        range.is_some_and(|(lo, hi)| {
            let slack = 1e-9 * f64::max(lo.abs(), hi.abs());
            speed < lo - slack || speed > hi + slack
        })
    };
    for (source, effort) in drive.sources.iter().zip(&flow.sources) {
        let Some(character) = &source.character else { continue };
        // What gives nothing rests on no data.
        marks.outside |= *effort != 0.0 && outside(character.measured_effort, *effort);
        // An engine below its idle speed idles on behind its clutch.
        let speed =
            f64::max(x * drive.shafts[source.at.shaft].speed, character.idle.unwrap_or(f64::NEG_INFINITY));
        marks.outside |= outside(character.measured, speed);
        marks.scaled |= character.scaled;
    }
    for load in &drive.loads {
        let measured = drive.load(load).and_then(|l| l.measured());
        marks.outside |= outside(measured, load.sense * x * drive.shafts[load.at.shaft].speed);
    }
    marks
}

/// Fields that are not given and on which the efforts at `x` rest.
pub(crate) fn unknowns(drive: &Assembly, x: f64, flow: &Flow<f64>) -> Vec<Fault> {
    let mut faults = Vec::new();
    for (stage, through) in drive.stages.iter().zip(&flow.through) {
        let Known::Missing(field) = stage.coupling.backward else { continue };
        let back = through.input * x < 0.0;
        let trace = TRACE * efforts(drive, flow) / drive.shafts[stage.at.input].speed;
        if back && through.input.abs() > trace {
            let why = Note::plain("power flows back through it here, and its loss that way has no default");
            let kind = FaultKind::Missing { any_of: vec![vec![field]], why };
            faults.push(Fault { part: Some(stage.at.part), kind });
        }
    }
    let behind = left_behind(drive, flow);
    for source in &drive.sources {
        let Some(field) = source.braking_unknown().filter(|_| !behind[source.at.shaft]) else { continue };
        if brakes_here(drive, source, x) {
            let part = if field == "accepts_return" { source.supply } else { None };
            let part = part.or(Some(source.at.part));
            faults.push(Fault { part, kind: FaultKind::BrakingUnknown { field } });
        }
    }
    faults
}

/// Whether a source would have to say here how it brakes: it is faster than it can drive, or than its set speed.
fn brakes_here(drive: &Assembly, source: &super::source::SourceAt, x: f64) -> bool {
    let Some(character) = &source.character else { return false };
    let speed = x * drive.shafts[source.at.shaft].speed;
    if speed <= 0.0 {
        return false;
    }
    let raw = character.drive.at(speed);
    let stall = character.drive.at(0.0).abs();
    let above_set = source.governor.is_some_and(|g| speed > g.speed * (1.0 + 1e-9));
    raw < -TRACE * f64::max(stall, raw.abs()) || above_set
}
