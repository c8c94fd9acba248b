//! The curves of a drive for drawing: what is available, what is required, and where they meet.

use super::answers::Solution;
use super::assembly::Assembly;
use super::points::pieces;
use super::ratings::ratings;
use super::source::SourceAt;
use crate::model::Motion;
use crate::solution::{Mode, Stability};

/// Curves over the speed of one station.
#[derive(Clone, Debug, PartialEq)]
pub struct Chart {
    /// How the station moves.
    pub motion: Motion,
    /// The curves, efforts counted positive in the direction of motion.
    pub curves: Vec<ChartCurve>,
    /// The operating points.
    pub points: Vec<ChartPoint>,
    /// Range in which the data of the source were measured, as speeds of this station; at a station that is not a
    /// source's own, that of the only source.
    pub measured: Option<(f64, f64)>,
    /// What the source can give for long at the drive's duty.
    pub continuous: Option<f64>,
}

/// What a curve shows.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum CurveRole {
    /// Effort available from the sources.
    Available,
    /// Effort required by the loads, losses included.
    Required,
    /// Power available.
    Power,
}

/// One curve.
#[derive(Clone, Debug, PartialEq)]
pub struct ChartCurve {
    /// What it shows.
    pub role: CurveRole,
    /// Speed and value, rising in speed; a jump has two points at (nearly) one speed.
    pub line: Vec<(f64, f64)>,
}

/// An operating point on a chart.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ChartPoint {
    /// Speed of the station.
    pub speed: f64,
    /// Effort there.
    pub effort: f64,
    /// Whether a small push comes back.
    pub stability: Stability,
    /// How power flows there.
    pub mode: Mode,
    /// Whether the drive comes to it from rest.
    pub reached: bool,
}

/// Points of a smooth curve.
const SAMPLES: usize = 96;

impl Solution {
    /// The curves at a source's shaft (one machine's share), or at the station of the drive for anything else: sampled,
    /// with every kink and jump among the samples.
    #[must_use]
    pub fn chart(&self, part: Option<usize>) -> Option<Chart> {
        let drive = &self.drive;
        let source = part.and_then(|p| drive.sources.iter().find(|s| s.at.part == p));
        let (shaft, share) = match source {
            Some(source) => (source.at.shaft, source.at.count),
            None => (drive.shaft_of(part, None)?, 1.0),
        };
        let station = &drive.shafts[shaft];
        // Efforts at the root turned to the station by power.
        let scale = 1.0 / (station.speed * share);
        let xs = samples(drive, self.widest());
        let mut available = Vec::with_capacity(xs.len());
        let mut required = Vec::with_capacity(xs.len());
        let mut power = Vec::with_capacity(xs.len());
        for x in xs {
            let balance = drive.program.at(drive, x, false);
            let speed = x * station.speed;
            available.push((speed, balance.driving * scale));
            required.push((speed, balance.required * scale));
            power.push((speed, balance.driving * x / share));
        }
        let points = self.points.iter().filter(|s| s.faults.is_empty()).filter_map(|state| {
            let balance = drive.program.at(drive, state.x, state.x < 0.0);
            Some(ChartPoint {
                speed: state.x * station.speed,
                effort: balance.required * scale,
                stability: state.stability?,
                mode: state.mode,
                reached: self.here.as_ref().is_ok_and(|here| here.x == state.x),
            })
        });
        let continuous = source.and_then(|s| ratings(drive, s).effort);
        Some(Chart {
            motion: station.motion,
            curves: vec![
                ChartCurve { role: CurveRole::Available, line: available },
                ChartCurve { role: CurveRole::Required, line: required },
                ChartCurve { role: CurveRole::Power, line: power },
            ],
            points: points.collect(),
            measured: self.measured_at(source, station.speed),
            continuous,
        })
    }

    /// The measured range of a source, or of the only one, turned to a station of this speed at unit speed of the root.
    fn measured_at(&self, source: Option<&SourceAt>, station: f64) -> Option<(f64, f64)> {
        let only = match self.drive.sources.as_slice() {
            [only] => Some(only),
            _ => None,
        };
        let source = source.or(only)?;
        let (low, high) = source.character.as_ref()?.measured?;
        let ratio = station / self.drive.shafts[source.at.shaft].speed;
        let (low, high) = (low * ratio, high * ratio);
        (low.is_finite() && high.is_finite()).then(|| (low.min(high), low.max(high)))
    }

    /// The greatest speed of the root that a chart shows.
    fn widest(&self) -> f64 {
        let farthest = self.points.iter().map(|s| s.x.abs()).fold(self.drive.scale, f64::max);
        1.08 * f64::min(farthest, 20.0 * self.drive.scale)
    }
}

/// Speeds at which to sample: even, and both sides of every jump, and every kink.
fn samples(drive: &Assembly, widest: f64) -> Vec<f64> {
    let mut xs: Vec<f64> = (0..=SAMPLES).map(|i| widest * i as f64 / SAMPLES as f64).collect();
    xs[0] = 1e-9 * widest;
    for (from, to) in pieces(&drive.jumps(), xs[0], widest) {
        xs.extend([from, to]);
    }
    xs.extend(drive.kinks().into_iter().filter(|k| *k > 0.0 && *k < widest).take(1000));
    xs.sort_by(f64::total_cmp);
    xs.dedup();
    xs
}
