//! What a drive does when it is switched on at rest, and the point it comes to.

use super::assembly::Assembly;
use super::flow::{Acting, Flow, flow};
use super::points::{Meet, Net, meets, range, size};
use super::roots::Crossing;
use super::state::unknowns;
use crate::curve::Law;
use crate::fault::{Fault, FaultKind, Note};
use crate::scalar::Real;
use crate::solution::Outcome;

/// What happens from rest.
pub(crate) struct Path {
    /// What it does.
    pub outcome: Outcome,
    /// Whether it goes against the direction asked for.
    pub back: bool,
    /// All meetings in the direction it goes, rising in speed.
    pub meets: Vec<Meet>,
    /// The first one met from rest.
    pub reached: Option<usize>,
    /// The speed from which sources drive: zero, or that of an idling engine.
    pub start: f64,
    /// Fields without which this cannot be said.
    pub refused: Vec<Fault>,
    /// What the solver could not decide.
    pub unsettled: Option<Fault>,
}

/// Everything about to move from rest: loads at breakaway, sources at full command or off.
struct AtRest<'a> {
    drive: &'a Assembly,
    back: bool,
    powered: bool,
}

impl<R: Real> Acting<R> for AtRest<'_> {
    fn source(&self, index: usize, speed: R) -> R {
        let source = &self.drive.sources[index];
        if !self.powered {
            return R::of(0.0);
        }
        source.effort(speed)
    }

    fn load(&self, index: usize, _: R) -> R {
        let load = &self.drive.loads[index];
        let Some(model) = self.drive.load(load) else { return R::of(0.0) };
        let rest = model.standstill();
        R::of(match (load.sense > 0.0, self.back) {
            (true, false) => rest.breakaway_forward,
            (true, true) => rest.breakaway_reverse,
            (false, false) => -rest.breakaway_reverse,
            (false, true) => -rest.breakaway_forward,
        })
    }
}

/// Efforts at rest, about to move one way or the other.
pub(crate) fn about_to_move(drive: &Assembly, back: bool, powered: bool) -> Flow<f64> {
    let (near, _) = range(drive);
    let x = if back { -near } else { near };
    flow(drive, x, back, &AtRest { drive, back, powered })
}

/// Speed of the root at which an engine idles; zero without one.
fn idle(drive: &Assembly) -> f64 {
    let speed = |s: &super::source::SourceAt| {
        s.character.as_ref().and_then(|c| c.idle).map(|idle| idle / drive.shafts[s.at.shaft].speed)
    };
    drive.sources.iter().filter_map(speed).fold(0.0, f64::max)
}

/// Follows the drive from rest.
pub(crate) fn path(drive: &Assembly) -> Path {
    let start = idle(drive);
    let ahead = about_to_move(drive, false, true);
    let net = Net { drive, back: false };
    let (near, far) = range(drive);
    let forward = meets(drive, false);
    let unsettled = forward.undecided.map(|range| undecided(drive, range));
    let mut path = Path {
        outcome: Outcome::Stalls,
        back: false,
        meets: forward.all,
        reached: None,
        start,
        refused: Vec::new(),
        unsettled,
    };
    if ahead.net > 0.0 && net.eval(near) > 0.0 && pushes(drive, &ahead) {
        let alone = about_to_move(drive, false, false);
        let self_moving = alone.net > 0.0;
        if self_moving {
            path.refused = unknowns(drive, near, &alone);
        }
        path.reached = path.meets.iter().position(|m| m.crossing != Crossing::Rising);
        let below_idle = path.reached.is_some_and(|index| path.meets[index].x < start * (1.0 - 1e-9));
        path.outcome = match (path.reached, self_moving) {
            (None, _) => Outcome::Runaway,
            // The engine does not pull the load up to its idle speed: the clutch would slip on.
            (Some(_), _) if below_idle => Outcome::Stalls,
            (Some(_), true) => Outcome::SelfMoving,
            (Some(_), false) => Outcome::Starts,
        };
        if below_idle {
            path.reached = None;
        }
        if path.reached.is_none() {
            let end = flow(drive, far, false, &super::points::Full(drive));
            path.refused.extend(unknowns(drive, far, &end));
        }
        return path;
    }
    let behind = about_to_move(drive, true, true);
    if behind.net < 0.0 {
        driven_back(drive, &mut path, &behind);
    }
    path
}

/// Whether anything sets the drive moving: a source without torque at standstill does not start itself, however small the
/// load, though the least speed would do.
fn pushes(drive: &Assembly, ahead: &Flow<f64>) -> bool {
    const TRACE: f64 = 1e-10;
    ahead.driving > TRACE * size(drive, 0.5 * drive.scale) || about_to_move(drive, false, false).net > 0.0
}

/// The load wins: follows it backwards.
fn driven_back(drive: &Assembly, path: &mut Path, behind: &Flow<f64>) {
    let (near, far) = range(drive);
    path.refused = unknowns(drive, -near, behind);
    let found = meets(drive, true);
    path.unsettled = path.unsettled.take().or(found.undecided.map(|range| undecided(drive, range)));
    path.back = true;
    path.meets = found.all;
    path.reached = path.meets.iter().rposition(|m| m.crossing != Crossing::Rising);
    path.outcome = if path.reached.is_some() { Outcome::DrivenBack } else { Outcome::Runaway };
    if path.reached.is_none() {
        let end = flow(drive, -far, true, &super::points::Full(drive));
        path.refused.extend(unknowns(drive, -far, &end));
    }
}

fn undecided(drive: &Assembly, (lo, hi): (f64, f64)) -> Fault {
    let kind = drive.shafts[drive.root].motion.speed_kind();
    let template = "between {0} and {1} at the shaft of the source the bounds on the efforts did not settle whether \
                    there is an operating point";
    let how = Note { template, quantities: vec![(lo, kind), (hi, kind)] };
    Fault { part: None, kind: FaultKind::Unsettled { how } }
}
