//! How long a drive takes from running one way to running the other, its source switched over at once.
//!
//! Seen in the new direction it begins at a speed below zero: the source already drives, the loads and what turns still
//! run back. From rest on it is a run-up. Losses act by the direction of power all the way, as in a run-up.

use super::answers::absent;
use super::assembly::Assembly;
use super::flow::flow;
use super::motion::{acceleration, has_inertia};
use super::points::{Full, range};
use super::quadrature::integrate;
use super::rest::path;
use super::run_up::{smooth_pieces, target};
use super::state::State;
use crate::drive::Direction;
use crate::fault::{Fault, FaultKind, Note};
use crate::model::Known;
use crate::solution::{Answer, Outcome};

/// The time from speed `x` of the root to the share of the speed reached the other way that counts as run up.
pub(crate) fn reversal(drive: &Assembly, x: f64) -> Result<f64, Answer> {
    if drive.sources.iter().any(|s| s.character.as_ref().is_some_and(|c| !c.reversible)) {
        return Err(absent("a source of this drive runs one way only"));
    }
    if drive.stages.iter().any(|stage| stage.one_way) {
        return Err(absent("a freewheel of this drive passes nothing the other way"));
    }
    let other = turned(drive)?;
    if !other.missing_inertia.is_empty() {
        return Err(Answer::Refused(other.missing_inertia));
    }
    if !has_inertia(&other) {
        return Err(absent("nothing in this drive has inertia: it turns over at once"));
    }
    let unknown = losses_not_given(&other);
    if !unknown.is_empty() {
        return Err(Answer::Refused(unknown));
    }
    let path = path(&other);
    let reached = match (path.outcome, path.reached.and_then(|index| path.meets.get(index))) {
        (Outcome::Starts | Outcome::SelfMoving, Some(meet)) if path.refused.is_empty() => {
            State::at_meet(&other, meet)
        }
        _ => return Err(absent("it does not run up the other way")),
    };
    let end = target(&other, &reached);
    let (near, _) = range(&other);
    let rate = |x: f64| {
        let back = x < 0.0;
        let x = if back { f64::min(x, -near) } else { f64::max(x, near) };
        let a = acceleration(&other, x, back, &flow(&other, x, back, &Full(&other)), &[]);
        (a > 0.0).then(|| [1.0 / a, x / a])
    };
    let mut pieces = smooth_pieces(&other, -x, 0.0);
    pieces.extend(smooth_pieces(&other, 0.0, end));
    match integrate(rate, &pieces) {
        Some([time, _]) => Ok(time),
        None => Err(absent("the time to turn over does not settle: it hardly gains speed on the way")),
    }
}

/// The same drive asked to go the other way.
fn turned(drive: &Assembly) -> Result<Assembly, Answer> {
    let mut spec = drive.spec.clone();
    spec.settings.direction = match spec.settings.direction {
        Direction::Forward => Direction::Reverse,
        Direction::Reverse => Direction::Forward,
    };
    Assembly::new(&spec).map_err(Answer::Refused)
}

/// While it turns over, power flows back through every stage.
fn losses_not_given(drive: &Assembly) -> Vec<Fault> {
    let missing = |stage: &super::assembly::Stage| {
        let Known::Missing(field) = stage.coupling.backward else { return None };
        let why = Note::plain(
            "while it turns over power flows back through it, and its loss that way has no default",
        );
        let kind = FaultKind::Missing { any_of: vec![vec![field]], why };
        Some(Fault { part: Some(stage.at.part), kind })
    };
    drive.stages.iter().filter_map(missing).collect()
}
