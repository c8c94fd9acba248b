//! What a source can give for long where the drive stands: its ratings, derated by its own tables.

use super::answers::{Solution, absent};
use super::assembly::Assembly;
use super::source::SourceAt;
use crate::fault::Fault;
use crate::kinds::derating::Derating;
use crate::model::{Model, Motion, Ratings};
use crate::solution::{Answer, Marks};

/// The share of its rated values that is left where the drive stands.
pub(crate) fn derating(drive: &Assembly, source: &SourceAt) -> Result<f64, Vec<Fault>> {
    let mut faults = Vec::new();
    let tables = Derating::read(&drive.spec.parts[source.at.part].values, &mut faults);
    if faults.is_empty() { tables.factor(&source.feed) } else { Err(faults) }
}

/// Its ratings at the drive's duty, derated.
pub(crate) fn ratings(drive: &Assembly, source: &SourceAt) -> Ratings {
    let Model::Source(model) = drive.models[source.at.part].as_ref() else { return Ratings::default() };
    let plain = model.ratings(drive.spec.settings.duty);
    let factor = derating(drive, source).unwrap_or(1.0);
    let less = |value: Option<f64>| value.map(|value| value * factor);
    Ratings { effort: less(plain.effort), power: less(plain.power), current: less(plain.current), ..plain }
}

impl Solution {
    /// What it can give for long where the drive stands.
    pub(super) fn continuous(&self, source: &SourceAt, name: &str) -> Result<Answer, Answer> {
        let unknown = || absent("nothing says what this source can give for long");
        let rated = ratings(&self.drive, source);
        let (value, kind) = match name {
            "derating" => (derating(&self.drive, source).ok(), "percentage"),
            "continuous_power" => (rated.power, "mechanical_power"),
            _ if self.drive.shafts[source.at.shaft].motion == Motion::Linear => return Ok(Answer::NoSuch),
            _ => (rated.effort, "torque"),
        };
        Ok(self.quantity(value.ok_or_else(unknown)?, kind, Marks::default()))
    }
}
