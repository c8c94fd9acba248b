//! How a number came about: formulas with the numbers put in, from the laws of the parts and of the drive.

use super::answers::Solution;
use super::state::State;
use crate::drive::Port;
use crate::laws::checked;
use crate::model::{LoadState, Model, SourceState};
use crate::registry::Formula;
use crate::solution::{Answer, Mode, Stability};

/// A formula with the numbers put in.
#[derive(Clone, Debug, PartialEq)]
pub struct Step {
    /// The part whose law it is; none for the drive.
    pub part: Option<usize>,
    /// The name of what the formula gives.
    pub name: &'static str,
    /// The formula in the language's own expression syntax, or in words where it is an integral.
    pub text: &'static str,
    /// Its symbols with the numbers put in.
    pub symbols: Vec<Symbol>,
    /// What it gives, in SI, and its kind where that is fixed.
    pub result: Option<f64>,
    /// The kind of the result.
    pub kind: Option<&'static str>,
    /// Where it holds.
    pub validity: &'static str,
    /// Where it is published.
    pub source: &'static str,
    /// Its revision.
    pub revision: u32,
}

/// A symbol of a formula with its number.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Symbol {
    /// As it stands in the formula.
    pub name: &'static str,
    /// Its kind.
    pub kind: &'static str,
    /// What it is.
    pub meaning: &'static str,
    /// Its SI value.
    pub si: f64,
}

const PRACTICE: &str = "common practice, no source";

/// A formula of the drive itself.
const fn own(
    name: &'static str,
    text: &'static str,
    symbols: &'static [(&'static str, &'static str, &'static str)],
    validity: &'static str,
) -> Formula {
    Formula { name, text, symbols, validity, source: PRACTICE, revision: 1 }
}

/// Power at a rotary station.
pub const POWER: Formula = own(
    "power",
    "T * w",
    &[("T", "torque", "torque here"), ("w", "rotational_speed", "speed here")],
    "always",
);

/// Power at a linear station.
pub const LINEAR_POWER: Formula =
    own("power", "F * v", &[("F", "force", "force here"), ("v", "speed", "speed here")], "always");

/// Share of the peak power.
pub const POWER_SHARE: Formula = own(
    "power_share",
    "P / P_peak",
    &[("P", "mechanical_power", "power here"), ("P_peak", "mechanical_power", "most power along the curve")],
    "always",
);

/// Reserve of a source.
pub const RESERVE: Formula = own(
    "torque_reserve",
    "T_most / T",
    &[("T_most", "torque", "most torque at this speed"), ("T", "torque", "torque here")],
    "always",
);

/// Efficiency of a chain or a stage.
pub const EFFICIENCY: Formula = own(
    "efficiency",
    "P_out / P_in",
    &[
        ("P_out", "mechanical_power", "power that arrives"),
        ("P_in", "mechanical_power", "power that is put in"),
    ],
    "in the direction in which power flows",
);

/// Time of a run-up, in words: an integral has no form in the language.
pub const RUN_UP: Formula = own(
    "run_up_time",
    "integral of dw / a(w) from rest to w, where a(w) is what available less required torque gives all inertias",
    &[
        ("w", "rotational_speed", "speed at which the run-up counts as done, at the first source"),
        ("J", "moment_of_inertia", "all inertias seen at the first source, losses left aside"),
    ],
    "speeds fixed to one another; losses act on accelerating power too",
);

/// The same balance for a stop, in words.
pub const STOP: Formula = own(
    "stop_time",
    "time until each brake bites, the load driving, and integral of dw / a(w) to rest under the brakes",
    &[
        ("w", "rotational_speed", "speed at which the source is switched off, at the first source"),
        ("J", "moment_of_inertia", "all inertias seen at the first source, losses left aside"),
    ],
    "speeds fixed to one another; the brake at full torque from its apply time on",
);

/// The formulas of the drive itself, in the language's own syntax, with their kernels.
pub const DRIVE_FORMULAS: &[&Formula] = &[&POWER, &LINEAR_POWER, &POWER_SHARE, &RESERVE, &EFFICIENCY];

impl Step {
    fn of(formula: &Formula, part: Option<usize>, values: &[(&'static str, f64)]) -> Option<Self> {
        let mut symbols = Vec::with_capacity(formula.symbols.len());
        for (name, kind, meaning) in formula.symbols {
            let (_, si) = values.iter().find(|(n, _)| n == name)?;
            symbols.push(Symbol { name, kind, meaning, si: *si });
        }
        let kernel = checked().find(|c| c.formula.name == formula.name && c.formula.text == formula.text);
        let numbers: Vec<f64> = symbols.iter().map(|s| s.si).collect();
        Some(Self {
            part,
            name: formula.name,
            text: formula.text,
            symbols,
            result: kernel.map(|c| (c.kernel)(&numbers)).filter(|r| r.is_finite()),
            kind: None,
            validity: formula.validity,
            source: formula.source,
            revision: formula.revision,
        })
    }

    fn giving(mut self, answer: &Answer) -> Self {
        if let Answer::Quantity { si, kind, .. } = answer {
            self.result = Some(*si);
            self.kind = Some(kind);
        }
        self
    }
}

/// How a part stands at a state.
struct Standing {
    symbols: Vec<(&'static str, f64)>,
    speed: f64,
    effort: f64,
    shaft: usize,
}

impl Solution {
    /// How an answer came about: the formulas of the part's law with the numbers of this point, the one that gives the
    /// answer last; empty where it is no number or needs no formula.
    #[must_use]
    pub fn derivation(&self, part: Option<usize>, port: Option<Port>, name: &str) -> Vec<Step> {
        let answer = self.answer(part, port, name);
        let (Ok(here), Answer::Quantity { .. }) = (&self.here, &answer) else { return Vec::new() };
        let mut steps = match part {
            None => self.steps_of_drive(here, name),
            Some(part) => self.steps_of_part(here, part, port, name),
        };
        if let Some(last) = steps.last_mut()
            && last.name == name
        {
            *last = last.clone().giving(&answer);
        }
        steps
    }

    fn steps_of_drive(&self, here: &State, name: &str) -> Vec<Step> {
        let values = match name {
            "power_share" => {
                let peak = self.peak().map(|p| p.value).unwrap_or(f64::NAN);
                return step(
                    &POWER_SHARE,
                    None,
                    &[("P", here.source_power(&self.drive).abs()), ("P_peak", peak)],
                );
            }
            "efficiency" => {
                let taken: f64 = self
                    .drive
                    .loads
                    .iter()
                    .zip(&here.flow.loads)
                    .map(|(l, e)| e * l.at.count * here.x * self.drive.shafts[l.at.shaft].speed)
                    .sum();
                let given = here.source_power(&self.drive);
                let (out, into) = if here.mode == Mode::Braking { (given, taken) } else { (taken, given) };
                return step(&EFFICIENCY, None, &[("P_out", out.abs()), ("P_in", into.abs())]);
            }
            "power" => {
                let sources = 0..self.drive.sources.len();
                return sources.flat_map(|i| self.source_power_step(here, i)).collect();
            }
            "run_up_time" | "run_up_distance" | "stop_time" | "stop_distance" => {
                let Some(source) = self.drive.sources.first() else { return Vec::new() };
                let speed = self.drive.shafts[source.at.shaft].speed;
                let inertia = self.reflected_inertia().map_or(f64::NAN, |(_, inertia)| inertia);
                vec![("w", here.x * speed), ("J", inertia)]
            }
            _ => return Vec::new(),
        };
        if name.starts_with("run_up") {
            let end = values[0].1 * self.drive.spec.settings.run_up_to;
            step(&RUN_UP, None, &[("w", end), values[1]])
        } else {
            step(&STOP, None, &values)
        }
    }

    fn source_power_step(&self, here: &State, index: usize) -> Vec<Step> {
        let source = &self.drive.sources[index];
        let shaft = &self.drive.shafts[source.at.shaft];
        power_step(
            Some(source.at.part),
            shaft.motion,
            here.flow.sources[index],
            self.drive.speed_at(source.at.shaft, here.x, &here.flow),
        )
    }

    fn steps_of_part(&self, here: &State, part: usize, port: Option<Port>, name: &str) -> Vec<Step> {
        let row = self.drive.spec.parts[part].row;
        let Some(standing) = self.standing(here, part, port) else { return Vec::new() };
        let Standing { symbols: mut values, speed, effort, shaft } = standing;
        let motion = self.drive.shafts[shaft].motion;
        let place = Some(part);
        match name {
            "power" => return power_step(place, motion, effort, speed),
            "power_share" => {
                let peak = match self.answer(place, None, "peak_power") {
                    Answer::Quantity { si, .. } => si,
                    _ => return Vec::new(),
                };
                return step(&POWER_SHARE, place, &[("P", (effort * speed).abs()), ("P_peak", peak)]);
            }
            "torque_reserve" => {
                let Answer::Quantity { si, .. } = self.answer(place, None, name) else { return Vec::new() };
                return step(&RESERVE, place, &[("T_most", si * effort.abs()), ("T", effort.abs())]);
            }
            "holding_reserve" => values.push(("T_s", self.static_effort(shaft).abs())),
            _ => {}
        }
        // Of the two directions of power the one that is used.
        let back = effort * speed < 0.0;
        let unused = if back { "eta" } else { "eta_b" };
        let fits = |formula: &&Formula| {
            let stage = matches!(self.drive.models[part].as_ref(), Model::Transmission(_));
            !(stage && formula.symbols.iter().any(|(symbol, _, _)| *symbol == unused))
        };
        let mut steps: Vec<Step> =
            row.formulas.iter().filter(fits).filter_map(|f| Step::of(f, place, &values)).collect();
        if let Some(at) = steps.iter().rposition(|s| s.name == name) {
            steps.truncate(at + 1);
        }
        steps
    }

    /// How a part stands here.
    fn standing(&self, here: &State, part: usize, port: Option<Port>) -> Option<Standing> {
        let drive = &self.drive;
        if let Some(index) = drive.sources.iter().position(|s| s.at.part == part) {
            let source = &drive.sources[index];
            let speed = drive.speed_at(source.at.shaft, here.x, &here.flow);
            let effort = here.flow.sources[index];
            let Model::Source(model) = drive.models[part].as_ref() else { return None };
            let symbols = model.symbols(&SourceState { speed, effort, feed: &source.feed });
            return Some(Standing { symbols, speed, effort, shaft: source.at.shaft });
        }
        if let Some(index) = drive.stages.iter().position(|s| s.at.part == part) {
            let stage = &drive.stages[index];
            let state = self.stage_state(here, index);
            let symbols = drive.transmission(stage)?.symbols(&state);
            let (speed, effort, shaft) = match port {
                Some(Port::Input) => (state.input_speed, state.input_effort, stage.at.input),
                _ => (state.output_speed, state.output_effort, stage.at.output),
            };
            return Some(Standing { symbols, speed, effort, shaft });
        }
        let index = drive.loads.iter().position(|l| l.at.part == part)?;
        let load = &drive.loads[index];
        let speed = here.x * drive.shafts[load.at.shaft].speed;
        let effort = here.flow.loads[index];
        let state = LoadState { speed: load.sense * speed, effort: load.sense * effort };
        Some(Standing { symbols: drive.load(load)?.symbols(&state), speed, effort, shaft: load.at.shaft })
    }

    /// Whether the reached point is stable, for those who show it.
    #[must_use]
    pub fn stability(&self) -> Option<Stability> {
        self.here.as_ref().ok().and_then(|state| state.stability)
    }
}

fn step(formula: &Formula, part: Option<usize>, values: &[(&'static str, f64)]) -> Vec<Step> {
    Step::of(formula, part, values).into_iter().collect()
}

fn power_step(part: Option<usize>, motion: crate::model::Motion, effort: f64, speed: f64) -> Vec<Step> {
    let (formula, effort_name, speed_name) = match motion {
        crate::model::Motion::Rotary => (&POWER, "T", "w"),
        crate::model::Motion::Linear => (&LINEAR_POWER, "F", "v"),
    };
    let mut steps = step(formula, part, &[(effort_name, effort.abs()), (speed_name, speed.abs())]);
    for step in &mut steps {
        step.result = Some((effort * speed).abs());
        step.kind = Some("mechanical_power");
    }
    steps
}
