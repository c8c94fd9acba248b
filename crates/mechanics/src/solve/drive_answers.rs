//! What a solved drive answers about itself as a whole.

use super::answers::{Solution, absent};
use super::assembly::Assembly;
use super::extreme::{Greatest, greatest};
use super::held;
use super::points::pieces;
use super::rest::Path;
use super::run_up::{RunUp, reserve, run_up};
use super::source_peak::search_peak;
use super::state::State;
use super::stop::{Stop, load_drives_on, stop};
use crate::curve::Law;
use crate::drive::Port;
use crate::fault::Note;
use crate::model::{Model, Motion};
use crate::scalar::Real;
use crate::solution::{Answer, Marks, Mode, Outcome, Stability};

impl Solution {
    pub(super) fn of_drive(&self, name: &str) -> Answer {
        self.drive_answer(name).unwrap_or_else(|answer| answer)
    }

    fn drive_answer(&self, name: &str) -> Result<Answer, Answer> {
        let scaled = self.drive.sources.iter().any(|s| s.character.as_ref().is_some_and(|c| c.scaled));
        let of_curve = Marks { outside: false, scaled };
        Ok(match name {
            "speed" => self.speed(None, None)?,
            "power" => {
                let here = self.here()?;
                self.quantity(here.source_power(&self.drive).abs(), "mechanical_power", here.marks)
            }
            "peak_power" => self.quantity(self.peak()?.value, "mechanical_power", of_curve),
            "peak_power_speed" => {
                let own = self.own_shaft()?;
                self.quantity(self.peak()?.x * own.1, own.0.speed_kind(), of_curve)
            }
            "power_share" => {
                let here = self.here()?;
                if here.mode == Mode::DrivenBack {
                    return Err(absent(super::part_answers::TURNED_BACK));
                }
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
            "reversal_time" => {
                let here = self.moving().and_then(|_| self.here())?;
                self.quantity(super::reversal::reversal(&self.drive, here.x)?, "time", here.marks)
            }
            "reflected_inertia" => self.inertia_at_source()?,
            "highest_speed" => self.highest_speed(None, None)?,
            "holds_set_speed" => Answer::Flag(self.holds_set_speed()?),
            "limited_by" => Answer::Word(self.limited_by()?),
            _ => Answer::NoSuch,
        })
    }

    fn inertia_at_source(&self) -> Result<Answer, Answer> {
        if !self.drive.missing_inertia.is_empty() {
            return Err(Answer::Refused(self.drive.missing_inertia.clone()));
        }
        match self.reflected_inertia().ok_or(Answer::NoSuch)? {
            (Motion::Rotary, inertia) => Ok(self.quantity(inertia, "moment_of_inertia", Marks::default())),
            _ => Err(absent("its (first) source runs straight: what it moves is a mass")),
        }
    }

    /// All inertias seen at the (first) source, losses left aside.
    pub(super) fn reflected_inertia(&self) -> Option<(Motion, f64)> {
        let source = &self.drive.shafts[self.drive.sources.first()?.at.shaft];
        let all: f64 = self.drive.shafts.iter().map(|s| s.inertia * s.speed * s.speed).sum();
        Some((source.motion, all / (source.speed * source.speed)))
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
            return Err(absent(
                "a freewheel, a neutral gear or an open clutch parts it from the load: its speed is its own",
            ));
        }
        Ok(self.quantity(
            self.drive.speed_at(index, here.x, &here.flow),
            shaft.motion.speed_kind(),
            here.marks,
        ))
    }

    fn flag(&self, name: &str) -> Result<Answer, Answer> {
        let Some(path) = &self.path else {
            return Err(self.no_way_from_rest());
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
        let peak = *self.peak.get_or_init(|| {
            let drive = &self.drive;
            if let [only] = &drive.sources[..]
                && let Some(behind) = &only.behind
            {
                let (speed, power) = search_peak(only).ok()?;
                let x = behind.output(speed) / drive.shafts[only.at.shaft].speed;
                let value = power * only.at.count;
                return Some(Greatest { x, value, bound: value });
            }
            // Along measured curves: what lies beyond their last points is no more than an extrapolation.
            let measured = drive.sources.iter().filter_map(|s| {
                let (_, last) = s.character.as_ref()?.measured?;
                Some(last / drive.shafts[s.at.shaft].speed)
            });
            let top = measured.fold(4.0 * drive.scale, f64::min);
            greatest(&Peak(&self.drive), &with_kinks(&self.drive, top)).filter(|p| p.value > 0.0)
        });
        match peak {
            _ if held::holder(&self.drive).is_some() => Err(held::without_limits()),
            Some(peak) => Ok(peak),
            None => Err(absent("no source is on")),
        }
    }

    /// Why a state is not one that was reached from rest.
    fn no_way_from_rest(&self) -> Answer {
        match held::holder(&self.drive) {
            Some(_) => held::without_limits(),
            None => absent("a stated speed is not reached from rest"),
        }
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
            None => Err(self.no_way_from_rest()),
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
        self.highest_speed_of(self.drive.shaft_of(part, port).ok_or(Answer::NoSuch)?)
    }

    /// The same for a shaft.
    pub(super) fn highest_speed_of(&self, index: usize) -> Result<Answer, Answer> {
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
        let behind = self.drive.sources.iter().find(|s| s.at.shaft == index).and_then(|s| s.behind.as_ref());
        let speed = behind.map_or(peak * shaft.speed, |behind| behind.input(peak * shaft.speed));
        Ok(self.quantity(speed, shaft.motion.speed_kind(), here.marks))
    }

    pub(super) fn holds_set_speed(&self) -> Result<bool, Answer> {
        let here = self.here()?;
        let Some(set) = self.drive.set else { return Err(absent("the drive has no set speed")) };
        let own = self.drive.sources.iter().filter_map(|s| s.character.as_ref()?.droop);
        let droop = own.fold(self.drive.spec.settings.droop, f64::max);
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
        match self.drive.models[source.at.part].as_ref() {
            Model::Source(model) => {
                Ok(model.limited_by(&source.feed, self.drive.speed_at(source.at.shaft, here.x, &here.flow)))
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
