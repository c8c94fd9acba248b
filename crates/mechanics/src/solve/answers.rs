//! A solved drive and what it answers about itself.

use std::sync::OnceLock;

use super::assembly::Assembly;
use super::extreme::{Greatest, greatest};
use super::points::{Full, pieces, range};
use super::rest::{Path, path};
use super::roots::Crossing;
use super::run_up::{RunUp, reserve, run_up};
use super::state::State;
use super::stop::{Stop, load_drives_on, stop};
use super::{flow::flow, stated};
use crate::curve::Law;
use crate::drive::Port;
use crate::fault::{Fault, Note};
use crate::model::{Model, Motion};
use crate::scalar::Real;
use crate::solution::{Answer, Marks, Mode, Outcome, Stability};

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
    pub(super) drive: Assembly,
    pub(super) path: Option<Path>,
    pub(super) points: Vec<State>,
    pub(super) here: Result<State, Answer>,
    stop: OnceLock<Result<Stop, Answer>>,
    run_up: OnceLock<Result<RunUp, Answer>>,
    reserve: OnceLock<Result<f64, Answer>>,
    peak: OnceLock<Option<Greatest>>,
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
    fn new(drive: Assembly, path: Option<Path>, points: Vec<State>, here: Result<State, Answer>) -> Self {
        Self {
            drive,
            path,
            points,
            here,
            stop: OnceLock::new(),
            run_up: OnceLock::new(),
            reserve: OnceLock::new(),
            peak: OnceLock::new(),
        }
    }

    pub(super) fn from_rest(drive: Assembly) -> Result<Self, Vec<Fault>> {
        let path = path(&drive);
        let points = path.meets.iter().map(|meet| State::at_meet(&drive, meet)).collect();
        let here = come_to(&drive, &path);
        Ok(Self::new(drive, Some(path), points, here))
    }

    pub(super) fn at_speed(drive: Assembly, x: f64) -> Self {
        let here = stated::at(&drive, x).and_then(|state| {
            if state.faults.is_empty() { Ok(state) } else { Err(Answer::Refused(state.faults)) }
        });
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
            source_speed: state.x * shaft.speed,
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

    fn of_drive(&self, name: &str) -> Answer {
        self.drive_answer(name).unwrap_or_else(|answer| answer)
    }

    fn drive_answer(&self, name: &str) -> Result<Answer, Answer> {
        let none = Marks::default();
        Ok(match name {
            "speed" => self.speed(None, None)?,
            "power" => {
                let here = self.here()?;
                self.quantity(here.source_power(&self.drive).abs(), "mechanical_power", here.marks)
            }
            "peak_power" => self.quantity(self.peak()?.value, "mechanical_power", none),
            "peak_power_speed" => {
                let own = self.own_shaft()?;
                self.quantity(self.peak()?.x * own.1, own.0.speed_kind(), none)
            }
            "power_share" => {
                let here = self.here()?;
                let share = here.source_power(&self.drive).abs() / self.peak()?.value;
                self.quantity(share, "percentage", here.marks)
            }
            "efficiency" => self.chain_efficiency()?,
            "mode" => Answer::Word(self.here()?.mode.word()),
            "starts" | "stalls" | "driven_back" | "runaway" | "self_moving" | "runs_up" => self.flag(name)?,
            "hangs_at" => self.hangs_at()?,
            "run_up_time" => self.quantity(self.run_up()?.time, "time", self.here()?.marks),
            "run_up_distance" => {
                let kind = way_kind(self.own_shaft()?.0);
                self.quantity(self.run_up()?.distance, kind, self.here()?.marks)
            }
            "run_up_reserve" => self.quantity(self.run_up_reserve()?, "number", self.here()?.marks),
            "stop_time" => self.quantity(self.stop()?.time, "time", self.here()?.marks),
            "stop_distance" => {
                let kind = way_kind(self.own_shaft()?.0);
                self.quantity(self.stop()?.distance, kind, self.here()?.marks)
            }
            "stop_peak_speed" => {
                let (motion, speed) = self.own_shaft()?;
                self.quantity(self.stop()?.peak * speed, motion.speed_kind(), self.here()?.marks)
            }
            "highest_speed" => self.highest_speed(None, None)?,
            "holds_set_speed" => Answer::Flag(self.holds_set_speed()?),
            "limited_by" => Answer::Word(self.limited_by()?),
            _ => Answer::NoSuch,
        })
    }

    /// Motion of the drive's own station, and its speed per speed of the root.
    pub(super) fn own_shaft(&self) -> Result<(Motion, f64), Answer> {
        let shaft = self.drive.shaft_of(None, None).ok_or(Answer::NoSuch)?;
        let shaft = &self.drive.shafts[shaft];
        Ok((shaft.motion, shaft.speed))
    }

    /// Speed of a station in the direction of motion.
    pub(super) fn speed(&self, part: Option<usize>, port: Option<Port>) -> Result<Answer, Answer> {
        let here = self.here()?;
        let index = self.drive.shaft_of(part, port).ok_or(Answer::NoSuch)?;
        let shaft = &self.drive.shafts[index];
        if here.mode == Mode::DrivenBack {
            let quantities = vec![(-here.x * shaft.speed, shaft.motion.speed_kind())];
            let template = "the load drives it back, at {0}: it has no speed in the direction asked for";
            return Err(Answer::Absent(Note { template, quantities }));
        }
        if here.behind[index] {
            return Err(absent("its freewheel leaves it behind: its speed is its own"));
        }
        Ok(self.quantity(here.x * shaft.speed, shaft.motion.speed_kind(), here.marks))
    }

    fn flag(&self, name: &str) -> Result<Answer, Answer> {
        let Some(path) = &self.path else {
            return Err(absent("a stated speed is not reached from rest"));
        };
        if !path.refused.is_empty() {
            return Err(Answer::Refused(path.refused.clone()));
        }
        if let Some(fault) = &path.unsettled {
            return Err(Answer::Refused(vec![fault.clone()]));
        }
        let moves = !path.back && path.outcome != Outcome::Stalls;
        Ok(Answer::Flag(match name {
            "starts" => moves,
            "stalls" => path.outcome == Outcome::Stalls,
            "driven_back" => path.back,
            "runaway" => {
                self.sound_if_not_runaway(path)?;
                path.outcome == Outcome::Runaway
            }
            "self_moving" => path.outcome == Outcome::SelfMoving,
            _ => {
                self.here()?;
                moves && path.reached.is_some_and(|index| self.is_highest(index))
            }
        }))
    }

    /// A reached point that rests on a missing field says nothing about running away either.
    fn sound_if_not_runaway(&self, path: &Path) -> Result<(), Answer> {
        match (&self.here, path.outcome) {
            (Err(answer @ Answer::Refused(_)), _) => Err(answer.clone()),
            _ => Ok(()),
        }
    }

    /// Whether no stable point lies above this one.
    pub(super) fn is_highest(&self, index: usize) -> bool {
        let stable = |state: &State| state.stability == Some(Stability::Stable);
        self.points.get(index).is_some_and(stable) && !self.points[index + 1..].iter().any(stable)
    }

    fn hangs_at(&self) -> Result<Answer, Answer> {
        let here = self.here()?;
        let index = self.path.as_ref().filter(|p| !p.back).and_then(|p| p.reached);
        match index {
            Some(index) if !self.is_highest(index) => {
                let (motion, speed) = self.own_shaft()?;
                Ok(self.quantity(here.x * speed, motion.speed_kind(), here.marks))
            }
            _ => Err(absent("it does not hang below its highest operating point")),
        }
    }

    /// Power to the loads over that of the sources while these drive, the other way round while they brake.
    fn chain_efficiency(&self) -> Result<Answer, Answer> {
        let here = self.here()?;
        let drive = &self.drive;
        let mut taken = 0.0;
        for (load, effort) in drive.loads.iter().zip(&here.flow.loads) {
            taken += effort * load.at.count * here.x * drive.shafts[load.at.shaft].speed;
        }
        let given = here.source_power(drive);
        let share = match here.mode {
            Mode::Motoring => taken / given,
            Mode::Braking => given / taken,
            _ => return Err(absent("no power passes through")),
        };
        if share > 0.0 {
            Ok(self.quantity(share, "percentage", here.marks))
        } else {
            Err(absent("source and load both put power in: all of it is lost between them"))
        }
    }

    pub(super) fn peak(&self) -> Result<Greatest, Answer> {
        let peak = self.peak.get_or_init(|| {
            let top = 4.0 * self.drive.scale;
            greatest(&Peak(&self.drive), &with_kinks(&self.drive, top)).filter(|p| p.value > 0.0)
        });
        peak.ok_or_else(|| absent("no source is on"))
    }

    fn run_up(&self) -> Result<RunUp, Answer> {
        self.run_up.get_or_init(|| run_up(&self.drive, self.moving()?, self.here()?)).clone()
    }

    fn run_up_reserve(&self) -> Result<f64, Answer> {
        self.reserve.get_or_init(|| reserve(&self.drive, self.moving()?, self.here()?)).clone()
    }

    /// The path of a drive that moves the way it is asked to.
    fn moving(&self) -> Result<&Path, Answer> {
        self.here()?;
        match &self.path {
            None => Err(absent("a stated speed is not reached from rest")),
            Some(path) if path.back => Err(absent("it does not run up: the load drives it back")),
            Some(path) if path.outcome == Outcome::Stalls => Err(absent("it does not run up: it stalls")),
            Some(path) => Ok(path),
        }
    }

    pub(super) fn stop(&self) -> Result<Stop, Answer> {
        self.stop.get_or_init(|| stop(&self.drive, self.here()?.x)).clone()
    }

    /// The highest speed a station can reach in this case: at the reached point or while it stops.
    pub(super) fn highest_speed(&self, part: Option<usize>, port: Option<Port>) -> Result<Answer, Answer> {
        let index = self.drive.shaft_of(part, port).ok_or(Answer::NoSuch)?;
        let shaft = &self.drive.shafts[index];
        let runaway =
            self.path.as_ref().is_some_and(|p| p.outcome == Outcome::Runaway && p.refused.is_empty());
        if runaway {
            return Err(Answer::Unbounded(Note::plain("it runs away: nothing bounds its speed")));
        }
        let here = self.here()?;
        let mut peak = here.x.abs();
        let brakes =
            self.drive.stages.iter().any(|s| self.drive.transmission(s).is_some_and(|t| t.brake().is_some()));
        if brakes && here.x != 0.0 && load_drives_on(&self.drive, here.x) {
            peak = match self.stop() {
                Ok(stop) => stop.peak,
                Err(answer @ Answer::Refused(_)) => return Err(answer),
                Err(_) => {
                    let why = "it runs away once the source is off: the brake does not stop it";
                    return Err(Answer::Unbounded(Note::plain(why)));
                }
            };
        }
        Ok(self.quantity(peak * shaft.speed, shaft.motion.speed_kind(), here.marks))
    }

    pub(super) fn holds_set_speed(&self) -> Result<bool, Answer> {
        let here = self.here()?;
        let Some(set) = self.drive.set else { return Err(absent("the drive has no set speed")) };
        let droop = self.drive.spec.settings.droop;
        Ok(here.x > 0.0 && here.x <= set * (1.0 + 1e-9) && here.x >= set * (1.0 - droop) * (1.0 - 1e-9))
    }

    /// What bounds the drive where it runs.
    fn limited_by(&self) -> Result<&'static str, Answer> {
        let here = self.here()?;
        if self.drive.set.is_some() && self.holds_set_speed()? {
            return Ok("governor");
        }
        if here.mode == Mode::Braking {
            return Ok("braking");
        }
        let power = |index: &usize| {
            let source = &self.drive.sources[*index];
            here.flow.sources[*index].abs() * source.at.count * self.drive.shafts[source.at.shaft].speed
        };
        let on = (0..self.drive.sources.len()).filter(|i| self.drive.sources[*i].character.is_some());
        let Some(index) = on.max_by(|a, b| power(a).total_cmp(&power(b))) else {
            return Err(absent("no source is on"));
        };
        let source = &self.drive.sources[index];
        match &self.drive.models[source.at.part] {
            Model::Source(model) => {
                Ok(model.limited_by(&source.feed, here.x * self.drive.shafts[source.at.shaft].speed))
            }
            _ => Err(Answer::NoSuch),
        }
    }
}

/// The kind of a way, by motion.
fn way_kind(motion: Motion) -> &'static str {
    match motion {
        Motion::Rotary => "angle",
        Motion::Linear => "length",
    }
}

/// Pieces up to a speed of the root, cut at the kinks too, so that a level top begins at the start of a piece.
fn with_kinks(drive: &Assembly, top: f64) -> Vec<(f64, f64)> {
    let mut cut = Vec::new();
    let kinks = drive.kinks();
    for (from, to) in pieces(&drive.jumps(), 0.0, top) {
        let mut start = from;
        for kink in kinks.iter().filter(|k| **k > from && **k < to).take(1000) {
            cut.push((start, *kink));
            start = *kink;
        }
        cut.push((start, to));
    }
    cut
}

/// The most mechanical power of all sources over the speed of the root.
struct Peak<'a>(&'a Assembly);

impl Law for Peak<'_> {
    fn eval<R: Real>(&self, x: R) -> R {
        let mut sum = R::of(0.0);
        for source in &self.0.sources {
            let speed = x * self.0.shafts[source.at.shaft].speed;
            sum = sum + source.most(speed) * speed * source.at.count;
        }
        sum
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
        return Ok(at_rest(drive));
    }
    let Some(meet) = path.reached.and_then(|index| path.meets.get(index)) else {
        return Err(absent("it runs away: the load drives it and nothing holds it"));
    };
    debug_assert!(meet.crossing != Crossing::Rising);
    let state = State::at_meet(drive, meet);
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
