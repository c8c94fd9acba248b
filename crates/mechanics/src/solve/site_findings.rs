//! What a colleague would raise about a source: what it is rated for against where and how long it is used.

use super::answers::Solution;
use super::ratings::{derating, ratings};
use super::state::State;
use crate::fault::Note;
use crate::kinds::derating::Derating;
use crate::solution::{Finding, Mode, Outcome};
use crate::values::Duty;

/// Altitude (m) and ambient temperature (K) up to which rated values hold: IEC 60034-1 (from memory).
const SITE: (f64, f64) = (1000.0, 313.15);

/// Torque over the most measured from which a straight line is trusted no more without a word.
const EXTRAPOLATED: f64 = 1.1;

/// Share of its peak power from which a motor counts as run at its peak.
const NEAR_PEAK: f64 = 0.8;

/// The share of the time a duty is on load; none where its type does not say.
fn on_load(duty: Duty) -> Option<f64> {
    match (duty.class, duty.value) {
        (1, _) => Some(1.0),
        (2, _) => Some(0.0),
        (3..=8, Some(factor)) => Some(factor),
        _ => None,
    }
}

impl Solution {
    /// Nothing bounds the speed.
    pub(super) fn runs_away(&self, found: &mut Vec<Finding>) {
        let Some(path) = self.path.as_ref().filter(|path| path.refused.is_empty()) else { return };
        if path.outcome != Outcome::Runaway || path.unsettled.is_some() {
            return;
        }
        let note = if path.back {
            Note::plain(
                "the load drives it back and nothing bounds its speed: it needs a brake, or a source that holds back",
            )
        } else {
            Note::plain(
                "at every speed something drives it on and nothing bounds its speed: a series motor without load and a load \
                 that nothing holds back run away",
            )
        };
        let part = self.drive.sources.first().map(|source| source.at.part);
        found.push(Finding { code: "runaway", part, note });
    }

    /// A site beyond what rated values hold for, and no table of the user's.
    pub(super) fn without_derating(&self, found: &mut Vec<Finding>) {
        let settings = &self.drive.spec.settings;
        let high = settings.altitude.filter(|altitude| *altitude > SITE.0);
        let hot = settings.ambient.filter(|ambient| *ambient > SITE.1);
        if high.is_none() && hot.is_none() {
            return;
        }
        for source in &self.drive.sources {
            let part = &self.drive.spec.parts[source.at.part];
            let machine = part.row.fields.iter().any(|field| field.name == "rated_duty");
            let idles = source.character.as_ref().is_some_and(|c| c.idle.is_some());
            let rated = ratings(&self.drive, source);
            let rated = rated.effort.is_some() || rated.power.is_some() || rated.current.is_some();
            if !part.on || !machine || !(rated || idles) {
                continue;
            }
            let (knows_high, knows_hot) = Derating::read(&part.values, &mut Vec::new()).knows();
            let note = match (high.filter(|_| !knows_high), hot.filter(|_| !knows_hot)) {
                (Some(altitude), _) => Note {
                    template: "it stands at {0}, and rated values hold up to {1}: its altitude_derating says what is left",
                    quantities: vec![(altitude, "length"), (SITE.0, "length")],
                },
                (None, Some(ambient)) => Note {
                    template: "it stands in {0}, and rated values hold up to {1}: its ambient_derating says what is left",
                    quantities: vec![(ambient, "temperature"), (SITE.1, "temperature")],
                },
                (None, None) => continue,
            };
            found.push(Finding { code: "no-derating", part: Some(source.at.part), note });
        }
    }

    /// A motor near its peak power whose data say nothing of what it can do for long.
    pub(super) fn near_peak(&self, here: &State, found: &mut Vec<Finding>) {
        if here.mode != Mode::Motoring || self.drive.spec.settings.duty.is_some_and(|duty| duty.class == 2) {
            return;
        }
        for (source, effort) in self.drive.sources.iter().zip(&here.flow.sources) {
            let rated = ratings(&self.drive, source);
            if rated.effort.is_some() || rated.power.is_some() || rated.current.is_some() {
                continue;
            }
            let speed = here.x * self.drive.shafts[source.at.shaft].speed;
            let power = effort * speed;
            let Some(input) = self.drawn(here, source, *effort, speed).input_power else { continue };
            let Ok((_, peak)) = self.source_peak(source) else { continue };
            let electrical = source.feed.supply.is_some_and(|supply| supply.voltage.is_some());
            if electrical && power > NEAR_PEAK * peak && power < 0.5 * input {
                let template = "it runs near its peak power, where {0} of what it takes in warms it, and nothing says that it \
                                stands that: give rated_torque or rated_current";
                let note = Note { template, quantities: vec![(1.0 - power / input, "percentage")] };
                found.push(Finding { code: "half-speed-peak", part: Some(source.at.part), note });
            }
        }
    }

    /// A motor that gives more than at any of its measured points.
    pub(super) fn beyond_points(&self, here: &State, found: &mut Vec<Finding>) {
        for (source, effort) in self.drive.sources.iter().zip(&here.flow.sources) {
            let measured = source.character.as_ref().and_then(|c| c.measured_effort);
            let Some((low, high)) = measured.filter(|(_, high)| *effort > EXTRAPOLATED * high) else {
                continue;
            };
            let kind = self.drive.shafts[source.at.shaft].motion.effort_kind();
            let template = "it gives {0}, and its points were measured from {1} to {2}: the result is no more than an \
                            extrapolation";
            let note = Note { template, quantities: vec![(*effort, kind), (low, kind), (high, kind)] };
            found.push(Finding { code: "outside-data", part: Some(source.at.part), note });
        }
    }

    /// Rated values for a lighter duty than the drive's; whether it is one.
    pub(super) fn lighter_duty(&self, source: &super::source::SourceAt, found: &mut Vec<Finding>) -> bool {
        let rated = ratings(&self.drive, source);
        let (Some(duty), true) =
            (self.drive.spec.settings.duty, rated.effort.is_some() || rated.power.is_some())
        else {
            return false;
        };
        let rated_for = rated.duty.map_or(Some(1.0), on_load);
        let (Some(used), Some(rated_for)) = (on_load(duty), rated_for) else { return false };
        if used <= rated_for * (1.0 + 1e-9) || derating(&self.drive, source).is_err() {
            return false;
        }
        let template = if rated_for > 0.0 {
            "its rated values are for {0} of the time on load, and the drive is used {1} of the time"
        } else {
            "its rated values are for a short time, and the drive is used {1} of the time"
        };
        let note = Note { template, quantities: vec![(rated_for, "percentage"), (used, "percentage")] };
        found.push(Finding { code: "peak-as-continuous", part: Some(source.at.part), note });
        true
    }
}
