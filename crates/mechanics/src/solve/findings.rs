//! What a colleague would raise about a solved drive.

use super::answers::Solution;
use super::assembly::{Far, Stage};
use super::extreme::greatest;
use super::points::range;
use super::ratings::ratings;
use super::rest::about_to_move;
use super::run_up::{Loading, smooth_pieces};
use super::state::State;
use crate::curve::Law;
use crate::fault::Note;
use crate::model::{Known, Limit, LimitOn, Model, Motion, Slip, TransmissionState};
use crate::solution::{Answer, Finding, Mode, Outcome, Stability};

/// A ratio of available to required effort on the way up below which a dip is worth a remark.
const THIN: f64 = 1.1;

/// A value beyond a limit by more than rounding.
fn above(value: f64, limit: f64) -> bool {
    value > limit * (1.0 + 1e-9)
}

impl Solution {
    /// What a colleague would raise, in the order of the chain.
    #[must_use]
    pub fn findings(&self) -> &[Finding] {
        self.findings.get_or_init(|| self.raised())
    }

    fn raised(&self) -> Vec<Finding> {
        let mut found = Vec::new();
        self.without_brake(&mut found);
        self.dip(&mut found);
        self.unstable(&mut found);
        self.too_fast(&mut found);
        self.runs_away(&mut found);
        self.without_derating(&mut found);
        if let Ok(here) = &self.here {
            self.beyond_ratings(here, &mut found);
            self.near_peak(here, &mut found);
            self.sharing(here, &mut found);
            self.outside(here, &mut found);
            self.beyond_points(here, &mut found);
            self.beyond_limits(here, &mut found);
            self.grip(here, &mut found);
            self.slipping(here, &mut found);
        }
        found
    }

    fn without_brake(&self, found: &mut Vec<Finding>) {
        let drive = &self.drive;
        if drive.stages.iter().any(|s| drive.transmission(s).is_some_and(|t| t.brake().is_some())) {
            return;
        }
        let locked = |s: &&Stage| matches!(s.coupling.backward, Known::Value(value) if value <= 0.0);
        let locking = drive.stages.iter().find(locked);
        for load in &drive.loads {
            if !drive.load(load).is_some_and(|l| l.needs_holding()) {
                continue;
            }
            let finding = match locking {
                Some(stage) => Finding {
                    code: "self-locking-trusted",
                    part: Some(stage.at.part),
                    note: Note::plain(
                        "only its friction holds the load when the source is off: shaking, wear, heat or grease make it \
                         run down; self-locking is no brake, and a load that can fall needs one of its own, chosen by \
                         the rules that apply where it is used",
                    ),
                },
                None => Finding {
                    code: "hoist-without-brake",
                    part: Some(load.at.part),
                    note: Note::plain(
                        "nothing holds this load when the source is off: a load that can fall needs a brake of its own \
                         (self-locking is none), chosen by the rules that apply where it is used",
                    ),
                },
            };
            found.push(finding);
        }
    }

    /// A dip on the way up at which the drive hangs, or nearly.
    fn dip(&self, found: &mut Vec<Finding>) {
        let (Some(path), Ok(here)) = (&self.path, &self.here) else { return };
        // A load that drives leaves nothing for the source to bring up: there is no dip to hang in.
        let moves = !path.back
            && matches!(path.outcome, Outcome::Starts | Outcome::SelfMoving)
            && here.mode == Mode::Motoring;
        let Some(index) = path.reached.filter(|_| moves) else { return };
        let source = self.drive.sources.first();
        let Some(source) = source else { return };
        let shaft = &self.drive.shafts[source.at.shaft];
        let kind = shaft.motion.speed_kind();
        let higher = self.points[index + 1..].iter().rfind(|s| s.stability == Some(Stability::Stable));
        let part = Some(source.at.part);
        if let Some(higher) = higher {
            let template = "on the way up the drive hangs at {0}, where the load takes all the source gives; its \
                            highest operating point at {1} is not reached";
            let quantities = vec![(here.x * shaft.speed, kind), (higher.x * shaft.speed, kind)];
            found.push(Finding { code: "pull-up-dip", part, note: Note { template, quantities } });
            return;
        }
        let (near, _) = range(&self.drive);
        let (start, end) = (f64::max(path.start, near), 0.9 * here.x);
        if end <= start {
            return;
        }
        let loading = Loading(&self.drive);
        let Some(worst) = greatest(&loading, &smooth_pieces(&self.drive, start, end)) else { return };
        let inside = worst.x > 1.01 * start && worst.x < 0.99 * end;
        let dips = worst.value > 1.01 * loading.eval(start) && worst.value > 1.01 * loading.eval(end);
        if inside && dips && worst.value * THIN > 1.0 {
            let template = "at {0} on the way up the source gives only {1} times what is required: a little less \
                            voltage or a little more load and the drive hangs there";
            let quantities = vec![(worst.x * shaft.speed, kind), (1.0 / worst.value, "number")];
            found.push(Finding { code: "pull-up-dip", part, note: Note { template, quantities } });
        }
    }

    /// A point at which the curves only touch, or which a push leaves for good.
    fn unstable(&self, found: &mut Vec<Finding>) {
        let Some(path) = self.path.as_ref().filter(|p| !p.back && p.start == 0.0 && p.refused.is_empty())
        else {
            return;
        };
        let Ok((motion, speed)) = self.own_shaft() else { return };
        let at = |state: &State| (state.x * speed, motion.speed_kind());
        let part = self.drive.loads.first().map(|load| load.at.part);
        let note = match path.reached {
            Some(index) if self.points[index].stability == Some(Stability::Marginal) => Note {
                template: "at {0} source and load only touch: a little more load, or a little less of the source, and \
                           there is no operating point",
                quantities: vec![at(&self.points[index])],
            },
            // A hoist that is lowered too fast runs away as any hoist does: its highest speed is another question.
            Some(index) if self.here.as_ref().is_ok_and(|here| here.mode == Mode::Motoring) => {
                let above = &self.points[index + 1..];
                let Some(left) = above.iter().rfind(|s| s.stability != Some(Stability::Marginal)) else {
                    return;
                };
                if left.stability != Some(Stability::Unstable) {
                    return;
                }
                let template = "it runs at {0}, and pushed past {1} it runs away: from there on the source gives more \
                                than the load takes";
                Note { template, quantities: vec![at(&self.points[index]), at(left)] }
            }
            _ => return,
        };
        found.push(Finding { code: "unstable-point", part, note });
    }

    /// Speeds the drive can reach against the limits of its parts.
    fn too_fast(&self, found: &mut Vec<Finding>) {
        let drive = &self.drive;
        for source in &drive.sources {
            let Model::Source(model) = drive.models[source.at.part].as_ref() else { continue };
            if let Some(limit) = model.ratings(drive.spec.settings.duty).max_speed {
                self.speed_limit(source.at.part, source.at.shaft, limit, found);
            }
        }
        for stage in &drive.stages {
            for limit in drive.transmission(stage).map(|t| t.limits()).unwrap_or_default() {
                match limit.on {
                    LimitOn::InputSpeed => {
                        self.speed_limit(stage.at.part, stage.at.input, limit.value, found)
                    }
                    LimitOn::OutputSpeed => {
                        self.speed_limit(stage.at.part, stage.at.output, limit.value, found)
                    }
                    _ => {}
                }
            }
        }
        for load in &drive.loads {
            for limit in drive.load(load).map(|l| l.limits()).unwrap_or_default() {
                if matches!(limit.on, LimitOn::InputSpeed | LimitOn::OutputSpeed) {
                    self.speed_limit(load.at.part, load.at.shaft, limit.value, found);
                }
            }
        }
    }

    fn speed_limit(&self, part: usize, shaft: usize, limit: f64, found: &mut Vec<Finding>) {
        let kind = self.drive.shafts[shaft].motion.speed_kind();
        if self.here.as_ref().is_ok_and(|here| here.behind[shaft]) {
            return;
        }
        let note = match self.highest_speed_of(shaft) {
            Ok(Answer::Quantity { si, .. }) if above(si, limit) => Note {
                template: "it can reach {0}, and {1} is the most it may turn: see that something holds the speed down",
                quantities: vec![(si, kind), (limit, kind)],
            },
            Err(Answer::Unbounded(_)) => Note {
                template: "the load can drive it faster without end, and {0} is the most it may turn",
                quantities: vec![(limit, kind)],
            },
            _ => return,
        };
        found.push(Finding { code: "overspeed", part: Some(part), note });
    }

    /// What a source gives for long against what it can give for long.
    fn beyond_ratings(&self, here: &State, found: &mut Vec<Finding>) {
        if !matches!(here.mode, Mode::Motoring | Mode::Braking) {
            return;
        }
        for (source, effort) in self.drive.sources.iter().zip(&here.flow.sources) {
            let shaft = &self.drive.shafts[source.at.shaft];
            let ratings = ratings(&self.drive, source);
            let speed = self.drive.speed_at(source.at.shaft, here.x, &here.flow);
            let current = self.drawn(here, source, *effort, speed).current.unwrap_or(0.0);
            let checks = [
                (ratings.effort, effort.abs(), shaft.motion.effort_kind()),
                (ratings.power, (effort * speed).abs(), "mechanical_power"),
                (ratings.current, current.abs(), "current"),
            ];
            if self.lighter_duty(source, found) {
                continue;
            }
            let beyond = checks.into_iter().find_map(|(limit, value, kind)| {
                limit.filter(|limit| above(value, *limit)).map(|limit| (value, limit, kind))
            });
            if let Some((value, limit, kind)) = beyond {
                let template = "it runs at {0} here, and can give only {1} for long at this duty";
                let quantities = vec![(value, kind), (limit, kind)];
                let note = Note { template, quantities };
                found.push(Finding { code: "peak-as-continuous", part: Some(source.at.part), note });
            }
        }
    }

    /// One source driving another.
    fn sharing(&self, here: &State, found: &mut Vec<Finding>) {
        let powers: Vec<f64> = self
            .drive
            .sources
            .iter()
            .zip(&here.flow.sources)
            .map(|(s, effort)| effort * s.at.count * here.x * self.drive.shafts[s.at.shaft].speed)
            .collect();
        let most = powers.iter().copied().fold(0.0, f64::max);
        for (source, power) in self.drive.sources.iter().zip(&powers) {
            // Where every source holds back they share the braking.
            if most > 0.0 && *power < -1e-9 * most {
                let template =
                    "it does not share the load: the other source drives it, and it holds back with {0}";
                let note = Note { template, quantities: vec![(-power, "mechanical_power")] };
                found.push(Finding { code: "load-share", part: Some(source.at.part), note });
            }
        }
    }

    /// Curves used outside the range in which they were measured.
    fn outside(&self, here: &State, found: &mut Vec<Finding>) {
        let sources = self.drive.sources.iter().filter(|s| !here.behind[s.at.shaft]);
        let of_sources = sources.map(|s| {
            let character = s.character.as_ref();
            let idle = character.and_then(|c| c.idle).unwrap_or(f64::NEG_INFINITY);
            (s.at, character.and_then(|c| c.measured), 1.0, idle)
        });
        let of_loads = self.drive.loads.iter().map(|l| {
            let measured = self.drive.load(l).and_then(|model| model.measured());
            (l.at, measured, l.sense, f64::NEG_INFINITY)
        });
        for (at, measured, sense, idle) in of_sources.chain(of_loads) {
            let Some((lo, hi)) = measured else { continue };
            let shaft = &self.drive.shafts[at.shaft];
            let speed = f64::max(sense * here.x * shaft.speed, idle);
            let kind = shaft.motion.speed_kind();
            let slack = 1e-9 * f64::max(lo.abs(), hi.abs());
            if speed < lo - slack || speed > hi + slack {
                let template = "it runs at {0}, and its curve was measured from {1} to {2}: the result is no more \
                                than an extrapolation";
                let note = Note { template, quantities: vec![(speed, kind), (lo, kind), (hi, kind)] };
                found.push(Finding { code: "outside-data", part: Some(at.part), note });
            }
        }
    }

    /// Efforts and powers against the limits of parts, with the application factor.
    fn beyond_limits(&self, here: &State, found: &mut Vec<Finding>) {
        let drive = &self.drive;
        let factor = drive.spec.settings.application_factor;
        for (index, stage) in drive.stages.iter().enumerate() {
            let state = self.stage_state(here, index);
            for limit in drive.transmission(stage).map(|t| t.limits()).unwrap_or_default() {
                let (value, kind) = match limit.on {
                    LimitOn::InputEffort => {
                        (state.input_effort, effort_kind(drive.shafts[stage.at.input].motion))
                    }
                    LimitOn::OutputEffort => {
                        (state.output_effort, effort_kind(drive.shafts[stage.at.output].motion))
                    }
                    LimitOn::Power => (state.input_effort * state.input_speed, "mechanical_power"),
                    LimitOn::InputSpeed | LimitOn::OutputSpeed => continue,
                };
                check(&limit, stage.at.part, value.abs() * factor, kind, factor, found);
            }
        }
        for (load, effort) in drive.loads.iter().zip(&here.flow.loads) {
            let shaft = &drive.shafts[load.at.shaft];
            for limit in drive.load(load).map(|l| l.limits()).unwrap_or_default() {
                let (value, kind) = match limit.on {
                    LimitOn::InputEffort | LimitOn::OutputEffort => (*effort, effort_kind(shaft.motion)),
                    LimitOn::Power => (effort * here.x * shaft.speed, "mechanical_power"),
                    LimitOn::InputSpeed | LimitOn::OutputSpeed => continue,
                };
                check(&limit, load.at.part, value.abs() * factor, kind, factor, found);
            }
        }
        for (source, effort) in drive.sources.iter().zip(&here.flow.sources) {
            let Model::Source(model) = drive.models[source.at.part].as_ref() else { continue };
            let Some(value) = model.ratings(drive.spec.settings.duty).max_effort else { continue };
            let limit = Limit { field: "", on: LimitOn::OutputEffort, value, code: "part-limit" };
            let kind = drive.shafts[source.at.shaft].motion.effort_kind();
            check(&limit, source.at.part, effort.abs(), kind, 1.0, found);
        }
    }

    /// Wheels that ask for more than their grip.
    fn grip(&self, here: &State, found: &mut Vec<Finding>) {
        for (stage, through) in self.drive.stages.iter().zip(&here.flow.through) {
            let Ok(Some(most)) = self.grip_force(stage) else { continue };
            if above(through.output.abs(), most) {
                let template = "the wheel would have to pass {0}, and its grip carries {1}: it slips";
                let note =
                    Note { template, quantities: vec![(through.output.abs(), "force"), (most, "force")] };
                found.push(Finding { code: "slips", part: Some(stage.at.part), note });
            }
        }
    }
}

impl Solution {
    /// Belts, pulleys and clutches that are asked for more than their friction passes, running or to set the load
    /// moving.
    fn slipping(&self, here: &State, found: &mut Vec<Finding>) {
        let drive = &self.drive;
        let moves = self.path.as_ref().is_some_and(|path| !path.back && path.outcome == Outcome::Starts);
        let start = moves.then(|| about_to_move(drive, false, true));
        let factor = drive.spec.settings.application_factor;
        for (index, stage) in drive.stages.iter().enumerate() {
            let Some(part) = drive.transmission(stage) else { continue };
            let running = part.slip(&self.stage_state(here, index));
            // Between source and root what passes at rest is what the source pushes with, not what is asked.
            let start = start.as_ref().filter(|_| stage.far == Far::Output);
            let starting = start.and_then(|flow| {
                let through = &flow.through[index];
                part.slip(&TransmissionState {
                    input_speed: 0.0,
                    input_effort: through.input / stage.at.count,
                    output_speed: 0.0,
                    output_effort: through.output / stage.at.count,
                    gear: stage.gear,
                })
            });
            let beyond = |slip: &Slip| above(slip.asked * factor, slip.most);
            let (slip, template) = match (running.filter(beyond), starting.filter(beyond)) {
                (Some(slip), _) => {
                    (slip, "{0} would have to pass here, and its friction passes {1}: it slips")
                }
                (None, Some(slip)) => (
                    slip,
                    "to set the load moving {0} would have to pass, and its friction passes {1}: it slips",
                ),
                (None, None) => continue,
            };
            let quantities = vec![(slip.asked * factor, slip.kind), (slip.most, slip.kind)];
            let note = Note { template, quantities };
            found.push(Finding { code: "slips", part: Some(stage.at.part), note });
        }
    }
}

fn effort_kind(motion: Motion) -> &'static str {
    motion.effort_kind()
}

fn check(limit: &Limit, part: usize, value: f64, kind: &'static str, factor: f64, found: &mut Vec<Finding>) {
    if !above(value, limit.value) {
        return;
    }
    let template = if factor == 1.0 {
        "{0} passes here, and {1} is the most it may carry"
    } else {
        "{0} passes here with the application factor {2}, and {1} is the most it may carry"
    };
    let quantities = vec![(value, kind), (limit.value, kind), (factor, "number")];
    found.push(Finding { code: limit.code, part: Some(part), note: Note { template, quantities } });
}
