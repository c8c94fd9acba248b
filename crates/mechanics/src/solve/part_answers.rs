//! What a part of a solved drive answers: speeds, efforts and powers of its stations, and its own results.

use super::answers::{Solution, absent};
use super::held;
use super::source::SourceAt;
use super::source_peak::search_peak;
use super::state::State;
use crate::drive::Port;
use crate::model::{Drawn, LoadState, Model, Motion, SourceState, TransmissionState};
use crate::solution::{Answer, Marks, Mode};

impl Solution {
    pub(super) fn of_part(&self, part: usize, port: Option<Port>, name: &str) -> Answer {
        let Some(row) = self.drive.spec.parts.get(part).map(|p| p.row) else { return Answer::NoSuch };
        let answer = if let Some(index) = self.drive.sources.iter().position(|s| s.at.part == part) {
            self.of_source(index, name)
        } else if let Some(index) = self.drive.stages.iter().position(|s| s.at.part == part) {
            self.of_stage(index, port, name)
        } else if let Some(index) = self.drive.loads.iter().position(|l| l.at.part == part) {
            self.of_load(index, name)
        } else if let Some(Model::Supply(_)) = self.drive.models.get(part).map(AsRef::as_ref) {
            self.of_supply(part, name)
        } else {
            return Answer::NoSuch;
        };
        match answer {
            Ok(Answer::NoSuch) => {
                let given = (row.given)(&self.drive.spec.parts[part].values);
                let kind = row.results.iter().find(|r| r.name == name).and_then(|r| match r.shape {
                    crate::registry::ResultShape::Quantity(kind) => Some(kind),
                    _ => None,
                });
                match (given.iter().find(|(n, _)| *n == name), kind) {
                    (Some((_, si)), Some(kind)) => self.quantity(*si, kind, Marks::default()),
                    _ => Answer::NoSuch,
                }
            }
            Ok(answer) | Err(answer) => answer,
        }
    }

    /// Whether a word names the effort of this motion; the other motion's word is no such result.
    fn effort_word(&self, shaft: usize, name: &str) -> bool {
        self.drive.shafts[shaft].motion.effort_kind() == name
    }

    fn effort(&self, shaft: usize, effort: f64, marks: Marks) -> Result<Answer, Answer> {
        if effort.is_nan() {
            return Err(absent(
                "at rest the efforts behind a fork are not settled: friction holds part of them",
            ));
        }
        Ok(self.quantity(effort.abs(), self.drive.shafts[shaft].motion.effort_kind(), marks))
    }

    fn of_source(&self, index: usize, name: &str) -> Result<Answer, Answer> {
        let source = &self.drive.sources[index];
        let shaft = source.at.shaft;
        let kind = self.drive.shafts[shaft].motion.speed_kind();
        let scaled = source.character.as_ref().is_some_and(|c| c.scaled);
        let of_curve = Marks { outside: false, scaled };
        match name {
            "speed" => return self.speed(Some(source.at.part), None),
            "highest_speed" => return self.highest_speed(Some(source.at.part), None),
            "peak_power" => {
                return Ok(self.quantity(self.source_peak(source)?.1, "mechanical_power", of_curve));
            }
            "peak_power_speed" => {
                return Ok(self.quantity(self.source_peak(source)?.0, kind, of_curve));
            }
            "continuous_torque" | "continuous_power" | "derating" => return self.continuous(source, name),
            _ => {}
        }
        if !self.known_of_source(source, name) {
            return Ok(Answer::NoSuch);
        }
        let here = self.here()?;
        let behind = here.behind[shaft];
        let effort = if behind { 0.0 } else { here.flow.sources[index] };
        let speed = self.drive.speed_at(shaft, here.x, &here.flow);
        match name {
            "power" => Ok(self.quantity((effort * speed).abs(), "mechanical_power", here.marks)),
            "power_share" if here.mode == Mode::DrivenBack => Err(absent(TURNED_BACK)),
            "power_share" => {
                let share = (effort * speed).abs() / self.source_peak(source)?.1;
                Ok(self.quantity(share, "percentage", here.marks))
            }
            "mode" => Ok(Answer::Word(source_mode(here, source, effort, behind))),
            "load_share" => self.load_share(here, effort * speed * source.at.count),
            "torque_reserve" | "force_reserve" => {
                self.reserve(here, source, effort, here.x * self.drive.shafts[shaft].speed)
            }
            "current" | "voltage" | "input_power" | "efficiency" => {
                if behind {
                    return Err(absent(
                        "a freewheel, a neutral gear or an open clutch parts it from the load: it gives nothing",
                    ));
                }
                self.electrical(here, source, effort, speed, name)
            }
            _ if self.effort_word(shaft, name) => self.effort(shaft, effort, here.marks),
            _ => {
                let Model::Source(model) = self.drive.models[source.at.part].as_ref() else {
                    return Ok(Answer::NoSuch);
                };
                let state = SourceState { speed, effort, feed: &source.feed };
                Ok(model.answer(name, &state).unwrap_or(Answer::NoSuch))
            }
        }
    }

    /// Whether a source has a result of this name at all.
    fn known_of_source(&self, source: &SourceAt, name: &str) -> bool {
        let own = self.drive.spec.parts[source.at.part].row.results.iter().any(|r| r.name == name);
        let common = ["power", "power_share", "mode", "load_share"].contains(&name);
        let reserve = match self.drive.shafts[source.at.shaft].motion {
            Motion::Rotary => "torque_reserve",
            Motion::Linear => "force_reserve",
        };
        let electrical = ["current", "voltage", "input_power", "efficiency"].contains(&name);
        own || common || electrical || name == reserve || self.effort_word(source.at.shaft, name)
    }

    /// Speed and power of a source's peak.
    pub(super) fn source_peak(&self, source: &SourceAt) -> Result<(f64, f64), Answer> {
        let index = self.drive.sources.iter().position(|own| std::ptr::eq(own, source));
        match index.and_then(|index| self.source_peaks.get(index)) {
            Some(known) => known.get_or_init(|| search_peak(source)).clone(),
            None => search_peak(source),
        }
    }

    /// Its share of the power of all sources.
    fn load_share(&self, here: &State, power: f64) -> Result<Answer, Answer> {
        let all = here.source_power(&self.drive);
        if all == 0.0 || here.x == 0.0 {
            return Err(absent("the sources give no power here"));
        }
        Ok(self.quantity(power / all, "percentage", here.marks))
    }

    /// The most it can give (or hold back) here over what it gives.
    fn reserve(&self, here: &State, source: &SourceAt, effort: f64, speed: f64) -> Result<Answer, Answer> {
        if source.character.as_ref().is_some_and(|c| c.holds.is_some()) {
            return Err(held::without_limits());
        }
        let most = if effort >= 0.0 { source.most(speed) } else { source.braking(speed) };
        if effort == 0.0 || most == 0.0 {
            return Err(absent("it gives nothing here"));
        }
        // Below zero speed the curve itself is what it pushes with.
        let ratio = f64::max(most / effort.abs(), 1.0);
        Ok(self.quantity(ratio, "number", here.marks))
    }

    /// What each machine of a source takes in.
    pub(super) fn drawn(&self, here: &State, source: &SourceAt, effort: f64, speed: f64) -> Drawn<f64> {
        if let Some((group, index)) = &source.coupled {
            return group.drawn(*index, here.x, &here.flow.sources);
        }
        source.draw.as_ref().map_or(Drawn::NOTHING, |draw| draw.at(speed, effort))
    }

    fn electrical(
        &self,
        here: &State,
        source: &SourceAt,
        effort: f64,
        speed: f64,
        name: &str,
    ) -> Result<Answer, Answer> {
        if source.character.is_none() {
            return Err(absent("this source is off"));
        }
        let drawn = self.drawn(here, source, effort, speed);
        let unknown = || absent("its data do not say it: no electrical side is made up from a torque curve");
        let (value, kind) = match name {
            "current" => (drawn.current.map(f64::abs), "current"),
            "voltage" => (drawn.voltage, "voltage"),
            "input_power" => {
                let electrical = source.feed.supply.is_none_or(|supply| supply.pressure.is_none());
                (drawn.input_power.map(f64::abs).filter(|_| electrical), "electrical_power")
            }
            _ => {
                let input = drawn.input_power.ok_or_else(unknown)?;
                let output = effort * speed;
                let share = if input > 0.0 { output / input } else { input / output };
                if !(share.is_finite() && share > 0.0) {
                    return Err(absent("all the power put in is lost in the machine"));
                }
                (Some(share), "percentage")
            }
        };
        Ok(self.quantity(value.ok_or_else(unknown)?, kind, here.marks))
    }

    fn of_supply(&self, part: usize, name: &str) -> Result<Answer, Answer> {
        let Model::Supply(model) = self.drive.models[part].as_ref() else { return Ok(Answer::NoSuch) };
        let own = self.drive.spec.parts[part].row.results.iter().any(|r| r.name == name);
        if !own && !["current", "voltage", "power"].contains(&name) {
            return Ok(Answer::NoSuch);
        }
        let here = self.here()?;
        let mut current = 0.0;
        for (source, effort) in self.drive.sources.iter().zip(&here.flow.sources) {
            if source.supply != Some(part) || source.character.is_none() {
                continue;
            }
            let behind = here.behind[source.at.shaft];
            let speed = self.drive.speed_at(source.at.shaft, here.x, &here.flow);
            let drawn = self.drawn(here, source, if behind { 0.0 } else { *effort }, speed);
            let Some(each) = drawn.supply_current else {
                return Err(absent("a source on this supply does not know its current or flow"));
            };
            current += each * source.at.count;
        }
        if model.data().voltage.is_none() {
            return Ok(model.answer(name, current).unwrap_or(Answer::NoSuch));
        }
        let voltage = model.terminal(current);
        match name {
            "current" => Ok(self.quantity(current.abs(), "current", here.marks)),
            "voltage" => Ok(self.quantity(voltage, "voltage", here.marks)),
            "power" => Ok(self.quantity((voltage * current).abs(), "electrical_power", here.marks)),
            _ => Ok(model.answer(name, current).unwrap_or(Answer::NoSuch)),
        }
    }

    /// A transmission's place in the solved drive, of each of equal parts.
    pub(super) fn stage_state(&self, here: &State, index: usize) -> TransmissionState {
        let stage = &self.drive.stages[index];
        let through = &here.flow.through[index];
        let behind = here.behind[stage.at.input];
        let count = stage.at.count;
        TransmissionState {
            input_speed: self.drive.speed_at(stage.at.input, here.x, &here.flow),
            input_effort: if behind { 0.0 } else { (through.input + through.hold) / count },
            output_speed: here.x * self.drive.shafts[stage.at.output].speed,
            output_effort: if behind { 0.0 } else { through.output / count },
            gear: stage.gear,
        }
    }

    fn of_stage(&self, index: usize, port: Option<Port>, name: &str) -> Result<Answer, Answer> {
        let stage = &self.drive.stages[index];
        let part = Some(stage.at.part);
        let input = port == Some(Port::Input);
        let shaft = if input { stage.at.input } else { stage.at.output };
        match name {
            "speed" => return self.speed(part, port),
            "highest_speed" => return self.highest_speed(part, port),
            "holding_reserve" => return self.holding_reserve(stage),
            "grip_reserve" => return self.grip_reserve(index),
            "engagement_time" | "engagement_speed" | "engagement_heat" => {
                return self.engagement(index, name);
            }
            _ => {}
        }
        let own = self.drive.spec.parts[stage.at.part].row.results.iter().any(|r| r.name == name);
        if !own && !["power", "efficiency"].contains(&name) && !self.effort_word(shaft, name) {
            return Ok(Answer::NoSuch);
        }
        let here = self.here()?;
        let state = self.stage_state(here, index);
        let (speed, effort) = if input {
            (state.input_speed, state.input_effort)
        } else {
            (state.output_speed, state.output_effort)
        };
        match name {
            "power" => Ok(self.quantity((speed * effort).abs(), "mechanical_power", here.marks)),
            "efficiency" => {
                let (given, taken) =
                    (state.input_speed * state.input_effort, state.output_speed * state.output_effort);
                let share = if given > 0.0 { taken / given } else { given / taken };
                if share.is_finite() && share > 0.0 {
                    Ok(self.quantity(share, "percentage", here.marks))
                } else {
                    Err(absent("no power passes through"))
                }
            }
            _ if self.effort_word(shaft, name) => self.effort(shaft, effort, here.marks),
            _ => Ok(self
                .drive
                .transmission(stage)
                .and_then(|model| model.answer(name, &state))
                .unwrap_or(Answer::NoSuch)),
        }
    }

    fn of_load(&self, index: usize, name: &str) -> Result<Answer, Answer> {
        let load = &self.drive.loads[index];
        let part = Some(load.at.part);
        match name {
            "speed" => return self.speed(part, None),
            "highest_speed" => return self.highest_speed(part, None),
            _ => {}
        }
        let own = self.drive.spec.parts[load.at.part].row.results.iter().any(|r| r.name == name);
        let shaft = load.at.shaft;
        if !own && name != "power" && !self.effort_word(shaft, name) {
            return Ok(Answer::NoSuch);
        }
        let here = self.here()?;
        let speed = here.x * self.drive.shafts[shaft].speed;
        let effort = here.flow.loads[index];
        match name {
            "power" => Ok(self.quantity((speed * effort).abs(), "mechanical_power", here.marks)),
            _ if self.effort_word(shaft, name) => self.effort(shaft, effort, here.marks),
            _ => {
                let state = LoadState { speed: load.sense * speed, effort: load.sense * effort };
                Ok(self.own_of_load(load, name, &state, here.marks))
            }
        }
    }
}

/// Why a drive that is turned back has no share of a peak power.
pub(super) const TURNED_BACK: &str =
    "the load turns it back: it takes up power, and a share of the peak it could give says nothing";

/// How power flows at one source.
fn source_mode(here: &State, source: &SourceAt, effort: f64, behind: bool) -> &'static str {
    let mode = if source.character.is_none() {
        Mode::Off
    } else if here.x == 0.0 {
        Mode::Standstill
    } else if here.x < 0.0 {
        Mode::DrivenBack
    } else if behind || effort == 0.0 {
        Mode::Freewheeling
    } else if effort > 0.0 {
        Mode::Motoring
    } else {
        Mode::Braking
    };
    mode.word()
}
