//! The most power of one source along its own curve.

use super::answers::absent;
use super::extreme::greatest;
use super::held;
use super::points::pieces;
use super::source::SourceAt;
use crate::curve::{Curve, Law};
use crate::scalar::Real;
use crate::solution::Answer;

/// The most power of one source over its speed.
struct SourcePeak<'a>(&'a dyn Curve);

impl Law for SourcePeak<'_> {
    fn eval<R: Real>(&self, speed: R) -> R {
        speed.on(self.0).max(R::of(0.0)) * speed
    }
}

/// Where a source gives the most power along its own curve, and how much.
pub(super) fn search_peak(source: &SourceAt) -> Result<(f64, f64), Answer> {
    let Some(character) = &source.character else { return Err(absent("this source is off")) };
    if character.holds.is_some() {
        return Err(held::without_limits());
    }
    // Before a fluid coupling it runs along its own curve.
    let drive = source.behind.as_ref().map_or(character.drive.as_ref(), |behind| behind.source());
    let mut jumps = drive.jumps();
    jumps.extend(drive.kinks());
    jumps.sort_by(f64::total_cmp);
    // Along a measured curve: what lies beyond its last point is no more than an extrapolation.
    let measured = character.measured.filter(|_| source.behind.is_none());
    let top = measured.map_or(4.0 * character.top_speed, |(_, last)| last);
    match greatest(&SourcePeak(drive), &pieces(&jumps, 0.0, top)) {
        Some(peak) if peak.value > 0.0 => Ok((peak.x, peak.value)),
        _ => Err(absent("this source gives no power at any speed")),
    }
}
