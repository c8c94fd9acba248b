//! How a drive comes up to speed: time, distance and the least reserve on the way.
//!
//! dt = dx / a(x), where the acceleration a carries every inertia on its own shaft with the losses on the way to it
//! (the same result as inertias reflected by the square of the ratio and divided by the efficiency).

use super::assembly::Assembly;
use super::extreme::greatest_above;
use super::flow::flow;
use super::motion::{acceleration, has_inertia};
use super::points::{Full, pieces, range};
use super::quadrature::integrate;
use super::rest::{Path, about_to_move};
use super::state::State;
use crate::curve::Law;
use crate::fault::Note;
use crate::scalar::Real;
use crate::solution::Answer;

/// Time and distance of a run-up.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct RunUp {
    /// s
    pub time: f64,
    /// m or rad at the drive's own station.
    pub distance: f64,
}

/// The speed of the root at which the run-up counts as done.
pub(crate) fn target(drive: &Assembly, reached: &State) -> f64 {
    reached.x * drive.spec.settings.run_up_to.clamp(0.0, 1.0)
}

/// Kinks at which an integral is cut; more are left to the halving.
const CUTS: usize = 200;

/// The pieces of a range between jumps and kinks.
pub(crate) fn smooth_pieces(drive: &Assembly, lo: f64, hi: f64) -> Vec<(f64, f64)> {
    let kinks = drive.kinks();
    let mut cut = Vec::new();
    for (from, to) in pieces(&drive.jumps(), lo, hi) {
        let mut start = from;
        let inside = kinks.iter().filter(|k| **k > from && **k < to);
        for kink in inside.take(CUTS) {
            if *kink > start {
                cut.push((start, *kink));
                start = *kink;
            }
        }
        cut.push((start, to));
    }
    cut
}

/// Time and distance from rest (or idle) to the target.
pub(crate) fn run_up(drive: &Assembly, path: &Path, reached: &State) -> Result<RunUp, Answer> {
    if !drive.missing_inertia.is_empty() {
        return Err(Answer::Refused(drive.missing_inertia.clone()));
    }
    if !has_inertia(drive) {
        return Err(Answer::Absent(Note::plain("nothing in this drive has inertia: it is at speed at once")));
    }
    let end = target(drive, reached);
    if drive.spec.settings.run_up_to >= 1.0 && !reached.vertical {
        let why = "the last of the speed is reached ever more slowly: the run-up needs a share below 100 %";
        return Err(Answer::Absent(Note::plain(why)));
    }
    let start = f64::max(path.start, 0.0);
    if end <= start {
        return Ok(RunUp { time: 0.0, distance: 0.0 });
    }
    let station = drive.shaft_of(None, None).map_or(1.0, |shaft| drive.shafts[shaft].speed);
    let (near, _) = range(drive);
    let rate = |x: f64| {
        let x = f64::max(x, near);
        let a = acceleration(drive, x, false, &flow(drive, x, false, &Full(drive)), &[]);
        (a > 0.0).then(|| [1.0 / a, x * station / a])
    };
    match integrate(rate, &smooth_pieces(drive, start, end)) {
        Some([time, distance]) => Ok(RunUp { time, distance }),
        None => Err(Answer::Absent(Note::plain(
            "the time to come up to speed does not settle: it hardly gains speed on the way, or its curve is too rough",
        ))),
    }
}

/// Required over available effort at the root.
pub(super) struct Loading<'a>(pub &'a Assembly);

impl Law for Loading<'_> {
    fn eval<R: Real>(&self, x: R) -> R {
        let there = self.0.program.at(self.0, x, false);
        there.required / there.driving
    }
}

/// The least ratio of available to required effort on the way up, breakaway included.
pub(crate) fn reserve(drive: &Assembly, path: &Path, reached: &State) -> Result<f64, Answer> {
    let (near, _) = range(drive);
    let (start, end) = (f64::max(path.start, near), target(drive, reached));
    let rest = about_to_move(drive, false, true);
    let mut loading = (rest.driving - rest.net) / rest.driving;
    if end > start
        && let Some(worst) =
            greatest_above(&Loading(drive), &smooth_pieces(drive, start, end), f64::max(loading, 1e-9))
    {
        loading = worst.value;
    }
    if loading > 0.0 && loading.is_finite() {
        Ok(1.0 / loading)
    } else {
        Err(Answer::Absent(Note::plain(
            "the load helps all the way up: there is nothing to be in reserve against",
        )))
    }
}
