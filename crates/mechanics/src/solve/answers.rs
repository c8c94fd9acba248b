//! A solved drive and what it answers about itself.

use std::sync::{Arc, OnceLock};

use super::assembly::Assembly;
use super::extreme::Greatest;
use super::held;
use super::points::{Full, range};
use super::rest::{Path, path};
use super::roots::Crossing;
use super::run_up::RunUp;
use super::state::State;
use super::stop::Stop;
use super::{flow::flow, stated};
use crate::drive::Port;
use crate::fault::{Fault, Note};
use crate::model::Motion;
use crate::solution::{Answer, Finding, Marks, Mode, Outcome, Stability};

/// An operating point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct OperatingPoint {
    /// Speed of the drive's own station (its first load), below zero when the load drives it back.
    pub speed: f64,
    /// How that station moves.
    pub motion: Motion,
    /// Effort of the (first) source, each machine, with its sign.
    pub source_effort: f64,
    /// Speed of the (first) source.
    pub source_speed: f64,
    /// How that source moves.
    pub source_motion: Motion,
    /// Mechanical power of all sources, W; below zero when they brake.
    pub power: f64,
    /// Whether a small push comes back.
    pub stability: Stability,
    /// How power flows.
    pub mode: Mode,
    /// Whether this is the point the drive comes to from rest.
    pub reached: bool,
}

/// A solved drive.
pub struct Solution {
    pub(super) drive: Arc<Assembly>,
    pub(super) path: Option<Path>,
    pub(super) points: Vec<State>,
    pub(super) here: Result<State, Answer>,
    pub(super) stop: OnceLock<Result<Stop, Answer>>,
    pub(super) run_up: OnceLock<Result<RunUp, Answer>>,
    pub(super) reserve: OnceLock<Result<f64, Answer>>,
    pub(super) peak: OnceLock<Option<Greatest>>,
    /// Speed and value of each source's own peak power.
    pub(super) source_peaks: Vec<OnceLock<Result<(f64, f64), Answer>>>,
    pub(super) findings: OnceLock<Vec<Finding>>,
}

impl std::fmt::Debug for Solution {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.debug_struct("Solution").field("points", &self.points()).finish_non_exhaustive()
    }
}

/// An answer without a value: the reason.
pub(super) fn absent(why: &'static str) -> Answer {
    Answer::Absent(Note::plain(why))
}

impl Solution {
    fn new(
        drive: Arc<Assembly>,
        path: Option<Path>,
        points: Vec<State>,
        here: Result<State, Answer>,
    ) -> Self {
        let source_peaks = drive.sources.iter().map(|_| OnceLock::new()).collect();
        Self {
            drive,
            path,
            points,
            here,
            stop: OnceLock::new(),
            run_up: OnceLock::new(),
            reserve: OnceLock::new(),
            peak: OnceLock::new(),
            source_peaks,
            findings: OnceLock::new(),
        }
    }

    pub(super) fn from_rest(drive: Arc<Assembly>) -> Result<Self, Vec<Fault>> {
        if let Some((holder, speed)) = held::holder(&drive) {
            let point = held::state(&drive, holder, speed);
            let here = sound(held::state(&drive, holder, speed));
            return Ok(Self::new(drive, None, vec![point], here));
        }
        let path = path(&drive);
        let points = path.meets.iter().map(|meet| State::at_meet(&drive, meet)).collect();
        let here = come_to(&drive, &path);
        Ok(Self::new(drive, Some(path), points, here))
    }

    pub(super) fn at_speed(drive: Arc<Assembly>, x: f64) -> Self {
        let here = match held::holder(&drive) {
            Some((holder, _)) => sound(held::at(&drive, holder, x)),
            None => stated::at(&drive, x).and_then(sound),
        };
        Self::new(drive, None, Vec::new(), here)
    }

    /// All operating points in the direction the drive goes, rising in speed. Points that rest on a field which is
    /// not given are left out: [`faults`](Self::faults) names it.
    #[must_use]
    pub fn points(&self) -> Vec<OperatingPoint> {
        let sound = self.points.iter().filter(|state| state.faults.is_empty());
        sound.filter_map(|state| self.point(state)).collect()
    }

    fn point(&self, state: &State) -> Option<OperatingPoint> {
        let own = &self.drive.shafts[self.drive.shaft_of(None, None)?];
        let source = self.drive.sources.first()?;
        let shaft = &self.drive.shafts[source.at.shaft];
        let reached = self.here.as_ref().is_ok_and(|here| here.x == state.x);
        Some(OperatingPoint {
            speed: state.x * own.speed,
            motion: own.motion,
            source_effort: state.flow.sources[0],
            source_speed: self.drive.speed_at(source.at.shaft, state.x, &state.flow),
            source_motion: shaft.motion,
            power: state.source_power(&self.drive),
            stability: state.stability?,
            mode: state.mode,
            reached,
        })
    }

    /// What the drive does when switched on at rest; `None` at a stated speed, or when a field is missing to say it.
    #[must_use]
    pub fn outcome(&self) -> Option<Outcome> {
        let path = self.path.as_ref()?;
        (path.refused.is_empty() && path.unsettled.is_none()).then_some(path.outcome)
    }

    /// The point the drive comes to from rest.
    #[must_use]
    pub fn reached(&self) -> Option<OperatingPoint> {
        self.here.as_ref().ok().and_then(|state| self.point(state))
    }

    /// What keeps the drive itself from being judged: a field that is not given and the reached point rests on, or
    /// bounds that did not settle. Questions that need more refuse it in their own answer.
    #[must_use]
    pub fn faults(&self) -> Vec<Fault> {
        match &self.here {
            Err(Answer::Refused(faults)) => faults.clone(),
            _ => Vec::new(),
        }
    }

    /// How a station moves; a part that does not stand in the chain has none.
    #[must_use]
    pub fn motion(&self, part: Option<usize>, port: Option<Port>) -> Option<Motion> {
        Some(self.drive.shafts[self.drive.shaft_of(part, port)?].motion)
    }

    /// Answers a question about the drive (`part` none) or about a part, by the name of its result.
    #[must_use]
    pub fn answer(&self, part: Option<usize>, port: Option<Port>, name: &str) -> Answer {
        match part {
            None => self.of_drive(name),
            Some(part) => self.of_part(part, port, name),
        }
    }

    /// The state everything is taken at.
    pub(super) fn here(&self) -> Result<&State, Answer> {
        self.here.as_ref().map_err(Clone::clone)
    }

    pub(super) fn quantity(&self, si: f64, kind: &'static str, marks: Marks) -> Answer {
        if si.is_finite() {
            Answer::Quantity { si, kind, marks }
        } else {
            absent("the number grows beyond what can be computed")
        }
    }
}

/// The state a drive comes to from rest.
fn come_to(drive: &Assembly, path: &Path) -> Result<State, Answer> {
    if !path.refused.is_empty() {
        return Err(Answer::Refused(path.refused.clone()));
    }
    if let Some(fault) = &path.unsettled {
        return Err(Answer::Refused(vec![fault.clone()]));
    }
    if path.outcome == Outcome::Stalls {
        if path.start > 0.0 && super::rest::about_to_move(drive, false, true).net > 0.0 {
            return Err(absent(
                "the engine does not pull the load up to its idle speed: its clutch would slip on and burn",
            ));
        }
        return Ok(at_rest(drive));
    }
    let Some(meet) = path.reached.and_then(|index| path.meets.get(index)) else {
        return Err(absent("it runs away: the load drives it and nothing holds it"));
    };
    debug_assert!(meet.crossing != Crossing::Rising);
    sound(State::at_meet(drive, meet))
}

/// A state that rests on no field that is not given.
fn sound(state: State) -> Result<State, Answer> {
    if state.faults.is_empty() { Ok(state) } else { Err(Answer::Refused(state.faults)) }
}

/// Held at rest by friction: sources push, and what each stage passes on is known only along a single way.
fn at_rest(drive: &Assembly) -> State {
    let (near, _) = range(drive);
    let mut flow = flow(drive, near, false, &Full(drive));
    let mut pushed: Vec<f64> = vec![0.0; drive.shafts.len()];
    pushed[drive.root] = flow.driving;
    let ways = |shaft: usize| {
        let stages =
            drive.stages.iter().filter(|s| s.far == super::assembly::Far::Output && s.at.input == shaft);
        stages.count() + drive.loads.iter().filter(|l| l.at.shaft == shaft).count()
    };
    for index in drive.order.iter().rev() {
        let stage = &drive.stages[*index];
        if stage.far == super::assembly::Far::Input {
            continue;
        }
        let input = if ways(stage.at.input) == 1 { pushed[stage.at.input] } else { f64::NAN };
        let output = input * stage.gains(false).0;
        flow.through[*index].input = input;
        flow.through[*index].output = output;
        pushed[stage.at.output] = output;
    }
    for (index, load) in drive.loads.iter().enumerate() {
        let single = ways(load.at.shaft) == 1;
        flow.loads[index] = if single { pushed[load.at.shaft] / load.at.count } else { f64::NAN };
    }
    State { mode: Mode::Standstill, faults: Vec::new(), ..State::with(drive, 0.0, flow) }
}
