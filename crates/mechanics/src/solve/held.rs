//! A drive whose source holds one speed whatever it takes: what that source has to give.

use super::answers::absent;
use super::assembly::Assembly;
use super::bracket::bracketed;
use super::flow::{Acting, Flow, flow};
use super::points::size;
use super::state::State;
use crate::fault::{Fault, FaultKind, Note};
use crate::scalar::Real;
use crate::solution::{Answer, Stability};

/// One source gives this effort, the others what they can.
struct Given<'a, R> {
    drive: &'a Assembly,
    holder: usize,
    effort: R,
}

impl<R: Real> Acting<R> for Given<'_, R> {
    fn source(&self, index: usize, speed: R) -> R {
        if index == self.holder { self.effort } else { self.drive.sources[index].effort(speed) }
    }
    fn load(&self, index: usize, speed: R) -> R {
        self.drive.loads[index].effort(speed)
    }
}

/// The source that holds a speed of its own, and that speed.
pub(crate) fn holder(drive: &Assembly) -> Option<(usize, f64)> {
    drive.sources.iter().enumerate().find_map(|(index, source)| {
        let held = source.character.as_ref()?.holds?;
        Some((index, held))
    })
}

/// Two sources that each hold a speed of their own fit no drive.
pub(crate) fn more_than_one(drive: &Assembly) -> Option<Fault> {
    let mut holders =
        drive.sources.iter().filter(|source| source.character.as_ref().is_some_and(|c| c.holds.is_some()));
    let second = holders.nth(1)?;
    let how =
        "two sources of constant speed stand in one drive: how they share the load is settled by motors only";
    Some(Fault { part: Some(second.at.part), kind: FaultKind::Chain { how: Note::plain(how) } })
}

/// Why nothing is known of what such a source could do beyond what it does.
pub(crate) fn without_limits() -> Answer {
    absent(
        "a source of constant speed has no limits to compare with: they come with the motor that takes its place",
    )
}

/// The drive at its held speed.
pub(crate) fn state(drive: &Assembly, holder: usize, speed: f64) -> State {
    let x = speed / drive.shafts[drive.sources[holder].at.shaft].speed;
    State { stability: Some(Stability::Stable), vertical: true, ..at(drive, holder, x) }
}

/// The drive at speed `x` of its root, whatever that takes.
pub(crate) fn at(drive: &Assembly, holder: usize, x: f64) -> State {
    let given = |effort: f64| -> Flow<f64> { flow(drive, x, false, &Given { drive, holder, effort }) };
    let source = &drive.sources[holder].at;
    let of_source = 1.0 / (drive.shafts[source.shaft].speed * source.count);
    let mut most = f64::max(size(drive, x) * of_source, f64::MIN_POSITIVE);
    // Losses on the way multiply what is asked for.
    for _ in 0..1000 {
        if given(most).net >= 0.0 && given(-most).net <= 0.0 {
            break;
        }
        most *= 2.0;
    }
    let effort = bracketed(|effort| given(effort).net, -most, most);
    State::with(drive, x, given(effort))
}
