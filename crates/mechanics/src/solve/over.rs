//! The least and the greatest value of an answer while the stated speed runs over a range: no extreme between the
//! ends is missed.

use std::sync::Arc;

use super::answers::Solution;
use super::assembly::Assembly;
use super::extreme::greatest_of_dear;
use super::flow::{Acting, Flow, flow};
use super::held;
use super::points::pieces;
use super::share::{Shared, shared};
use crate::curve::{Curve, Law};
use crate::drive::{DriveSpec, Port, StatedSpeed};
use crate::fault::{Fault, FaultKind, Note};
use crate::model::{Model, Own};
use crate::scalar::Real;
use crate::solution::Answer;

/// A question about a solved drive.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Question<'a> {
    /// The part; none for the drive.
    pub part: Option<usize>,
    /// The side of it.
    pub port: Option<Port>,
    /// The name of the result.
    pub name: &'a str,
}

/// The extremes of an answer over a range of speeds.
#[derive(Clone, Debug, PartialEq)]
pub struct Extremes {
    /// The stated speed at which it is least, and the answer there.
    pub least: (f64, Answer),
    /// The stated speed at which it is greatest, and the answer there.
    pub greatest: (f64, Answer),
    /// A stated speed in the range at which it has no answer (more is required than the sources give, say), and why.
    pub unanswered: Option<(f64, Answer)>,
}

/// The extremes of an answer while a speed is stated anywhere from `low` to `high` at a station.
///
/// # Errors
///
/// As [`solve_at`](super::solve_at) at the ends of the range.
pub fn worst_over(
    spec: &DriveSpec,
    station: (Option<usize>, Option<Port>),
    (low, high): (f64, f64),
    question: Question<'_>,
) -> Result<Extremes, Vec<Fault>> {
    let drive = Arc::new(Assembly::new(spec)?);
    let electrical = ["current", "voltage", "input_power", "efficiency"].contains(&question.name)
        || question
            .part
            .is_some_and(|part| matches!(drive.models.get(part).map(AsRef::as_ref), Some(Model::Supply(_))));
    if electrical && drive.sources.iter().any(|s| s.coupled.is_some()) {
        let how = "over a range of speeds the currents of different sources on one sagging supply are not covered: ask \
                   at single speeds";
        return Err(vec![Fault {
            part: question.part,
            kind: FaultKind::Unsettled { how: Note::plain(how) },
        }]);
    }
    if let Some((holder, _)) = held::holder(&drive) {
        let how = "a source of constant speed is asked at single speeds, not over a range of them";
        return Err(vec![Fault {
            part: Some(drive.sources[holder].at.part),
            kind: FaultKind::Unsettled { how: Note::plain(how) },
        }]);
    }
    let of_source = question.part.is_none_or(|part| drive.sources.iter().any(|s| s.at.part == part));
    if (of_source || electrical) && drive.sources.iter().any(|s| s.behind.is_some()) {
        let how = "over a range of speeds what a source does before a fluid coupling is not covered: ask at single \
                   speeds, or of the parts behind it";
        return Err(vec![Fault {
            part: question.part,
            kind: FaultKind::Unsettled { how: Note::plain(how) },
        }]);
    }
    let stated = |speed| StatedSpeed { part: station.0, port: station.1, speed };
    let (from, to) = (drive.coordinate(&stated(low))?, drive.coordinate(&stated(high))?);
    let ratio = low / from;
    let ask = |speed: f64| -> Result<(f64, Answer), Vec<Fault>> {
        // The drive is put together once, not for each speed.
        let solution = Solution::at_speed(Arc::clone(&drive), drive.coordinate(&stated(speed))?);
        Ok((speed, solution.answer(question.part, question.port, question.name)))
    };
    let mut tried = vec![ask(low)?, ask(high)?];
    let pieces = pieces(&drive.jumps(), from, to);
    for law in watched(&drive, &question) {
        for sign in [1.0, -1.0] {
            let stated = Stated { drive: &drive, law, sign };
            if let Some(found) = greatest_of_dear(&stated, &pieces) {
                tried.push(ask((found.x * ratio).clamp(low, high))?);
            }
        }
    }
    Ok(extremes(tried))
}

fn extremes(tried: Vec<(f64, Answer)>) -> Extremes {
    let value = |answer: &Answer| match answer {
        Answer::Quantity { si, .. } => Some(*si),
        _ => None,
    };
    let unanswered = tried.iter().find(|(_, answer)| {
        matches!(answer, Answer::Absent(_) | Answer::Refused(_) | Answer::Unbounded(_) | Answer::NoSuch)
    });
    let mut out =
        Extremes { least: tried[0].clone(), greatest: tried[0].clone(), unanswered: unanswered.cloned() };
    for (speed, answer) in &tried {
        let Some(si) = value(answer) else { continue };
        if value(&out.least.1).is_none_or(|least| si < least) {
            out.least = (*speed, answer.clone());
        }
        if value(&out.greatest.1).is_none_or(|most| si > most) {
            out.greatest = (*speed, answer.clone());
        }
    }
    out
}

/// Something that is watched over the range.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Watched<'a> {
    /// What is left of the sources' most, and of their holding back.
    Spare,
    Hold,
    /// What is required at the root: where it turns, power flows back.
    Required,
    /// Results of a source.
    Source(usize, OfSource),
    /// Results of a side of a stage.
    Stage(usize, Port, bool),
    /// Results of a load.
    Load(usize, bool),
    /// A result of a load's own.
    Own(usize, &'a str),
    /// Results of a supply.
    Supply(usize, OfSupply),
    /// Power of all sources.
    Power,
    /// Power to the loads over that of the sources.
    Efficiency,
}

#[derive(Clone, Copy, Debug, PartialEq)]
enum OfSource {
    Effort,
    Power,
    Current,
    Voltage,
    Input,
    Efficiency,
    Reserve,
}

#[derive(Clone, Copy, Debug, PartialEq)]
enum OfSupply {
    Current,
    Voltage,
    Power,
}

/// What has to be watched for a question.
fn watched<'a>(drive: &Assembly, question: &Question<'a>) -> Vec<Watched<'a>> {
    let mut out = vec![Watched::Spare, Watched::Hold, Watched::Required];
    let power = question.name == "power" || question.name == "power_share";
    let Some(part) = question.part else {
        if power {
            out.push(Watched::Power);
        } else if question.name == "efficiency" {
            out.push(Watched::Efficiency);
        }
        return out;
    };
    if let Some(index) = drive.sources.iter().position(|s| s.at.part == part) {
        let what = match question.name {
            "current" => OfSource::Current,
            "voltage" => OfSource::Voltage,
            "input_power" => OfSource::Input,
            "efficiency" => OfSource::Efficiency,
            "torque_reserve" | "force_reserve" => OfSource::Reserve,
            _ if power => OfSource::Power,
            _ => OfSource::Effort,
        };
        out.push(Watched::Source(index, what));
    } else if let Some(index) = drive.stages.iter().position(|s| s.at.part == part) {
        out.push(Watched::Stage(index, question.port.unwrap_or(Port::Output), power));
    } else if let Some(index) = drive.loads.iter().position(|l| l.at.part == part) {
        out.push(Watched::Load(index, power));
        if own(drive, index, question.name).is_some() {
            out.push(Watched::Own(index, question.name));
        }
    } else {
        let what = match question.name {
            "voltage" => OfSupply::Voltage,
            "power" => OfSupply::Power,
            _ => OfSupply::Current,
        };
        out.push(Watched::Supply(part, what));
    }
    out
}

/// A result of a load's own, as a law of its speed.
fn own(drive: &Assembly, index: usize, name: &str) -> Option<Arc<dyn Curve>> {
    match drive.load(&drive.loads[index])?.own(name)? {
        Own::Law { curve, .. } => Some(curve),
        Own::Missing(_) => None,
    }
}

/// Something watched, over the speed of the root; `sign` -1 to seek the least.
struct Stated<'a> {
    drive: &'a Assembly,
    law: Watched<'a>,
    sign: f64,
}

/// Sources that give these efforts.
struct Given<'a, R> {
    drive: &'a Assembly,
    efforts: &'a [R],
}

impl<R: Real> Acting<R> for Given<'_, R> {
    fn source(&self, index: usize, _: R) -> R {
        self.efforts[index]
    }
    fn load(&self, index: usize, speed: R) -> R {
        self.drive.loads[index].effort(speed)
    }
}

impl Stated<'_> {
    /// What each source gives at `x`.
    fn efforts<R: Real>(&self, x: R) -> Vec<R> {
        let drive = self.drive;
        let on: Vec<usize> =
            (0..drive.sources.len()).filter(|i| drive.sources[*i].character.is_some()).collect();
        if let [only] = on[..]
            && drive.sources[only].at.shaft == drive.root
        {
            let mut efforts = vec![R::of(0.0); drive.sources.len()];
            efforts[only] = drive.program.at(drive, x, false).required / drive.sources[only].at.count;
            return efforts;
        }
        let acting = Shared { drive, share: shared(drive, x) };
        flow(drive, x, false, &acting).sources
    }

    fn flow<R: Real>(&self, x: R) -> Flow<R> {
        flow(self.drive, x, false, &Given { drive: self.drive, efforts: &self.efforts(x) })
    }

    fn of_source<R: Real>(&self, index: usize, what: OfSource, x: R) -> R {
        let source = &self.drive.sources[index];
        let effort = self.efforts(x)[index];
        let speed = x * self.drive.shafts[source.at.shaft].speed;
        let drawn = || source.draw.as_ref().map(|draw| R::drawn(draw.as_ref(), speed, effort));
        let none = R::of(0.0);
        match what {
            OfSource::Effort => effort.abs(),
            OfSource::Power => (effort * speed).abs(),
            OfSource::Reserve => source.most(speed) / effort.abs(),
            OfSource::Current => drawn().and_then(|d| d.current).unwrap_or(none).abs(),
            OfSource::Voltage => drawn().and_then(|d| d.voltage).unwrap_or(none),
            OfSource::Input => drawn().and_then(|d| d.input_power).unwrap_or(none).abs(),
            OfSource::Efficiency => match drawn().and_then(|d| d.input_power) {
                Some(input) => effort * speed / input,
                None => none,
            },
        }
    }

    fn of_supply<R: Real>(&self, part: usize, what: OfSupply, x: R) -> R {
        let mut current = R::of(0.0);
        let efforts = self.efforts(x);
        for (source, effort) in self.drive.sources.iter().zip(efforts) {
            let speed = x * self.drive.shafts[source.at.shaft].speed;
            let draw =
                source.draw.as_ref().filter(|_| source.supply == Some(part) && source.character.is_some());
            if let Some(each) = draw.and_then(|d| R::drawn(d.as_ref(), speed, effort).supply_current) {
                current = current + each * source.at.count;
            }
        }
        let data = match self.drive.models[part].as_ref() {
            Model::Supply(model) => model.data(),
            _ => return current,
        };
        // Straight in the current, as supplies answer at their terminals.
        let voltage = R::of(data.voltage.unwrap_or(0.0)) - current * data.resistance.unwrap_or(0.0);
        match what {
            OfSupply::Current => current.abs(),
            OfSupply::Voltage => voltage,
            OfSupply::Power => (voltage * current).abs(),
        }
    }
}

impl Law for Stated<'_> {
    fn eval<R: Real>(&self, x: R) -> R {
        let drive = self.drive;
        let at = |shaft: usize| x * drive.shafts[shaft].speed;
        let value = match self.law {
            Watched::Spare => flow(drive, x, false, &Shared { drive, share: R::of(1.0) }).net,
            Watched::Hold => flow(drive, x, false, &Shared { drive, share: R::of(-1.0) }).net,
            Watched::Required => drive.program.at(drive, x, false).required,
            Watched::Source(index, what) => self.of_source(index, what, x),
            Watched::Stage(index, port, power) => {
                let through = self.flow(x).through[index];
                let stage = &drive.stages[index];
                let (effort, shaft) = match port {
                    Port::Input => (through.input + through.hold, stage.at.input),
                    Port::Output => (through.output, stage.at.output),
                };
                if power { (effort * at(shaft)).abs() } else { effort.abs() }
            }
            Watched::Load(index, power) => {
                let load = &drive.loads[index];
                let effort = load.effort(at(load.at.shaft));
                if power { (effort * at(load.at.shaft)).abs() } else { effort.abs() }
            }
            Watched::Own(index, name) => {
                let load = &drive.loads[index];
                own(drive, index, name)
                    .map_or(R::of(0.0), |law| (at(load.at.shaft) * load.sense).on(law.as_ref()))
            }
            Watched::Supply(part, what) => self.of_supply(part, what, x),
            Watched::Power => self.power(x).abs(),
            Watched::Efficiency => {
                let each = drive.loads.iter();
                let taken = each
                    .fold(R::of(0.0), |sum, l| sum + l.effort(at(l.at.shaft)) * at(l.at.shaft) * l.at.count);
                taken / self.power(x)
            }
        };
        value * self.sign
    }
}

impl Stated<'_> {
    fn power<R: Real>(&self, x: R) -> R {
        let efforts = self.efforts(x);
        let each = self.drive.sources.iter().zip(efforts);
        each.fold(R::of(0.0), |sum, (s, e)| sum + e * x * (self.drive.shafts[s.at.shaft].speed * s.at.count))
    }
}
