//! How fast a drive gains speed: every inertia on its own shaft, with the losses of the direction in which power
//! flows, accelerating power included.

use super::assembly::Assembly;
use super::bracket::bracketed;
use super::flow::{Acting, Flow, flow};
use crate::scalar::{Dual, Real};

/// Efforts that do not change while the acceleration is sought.
struct Held<'a, R> {
    sources: &'a [f64],
    loads: &'a [f64],
    brakes: &'a [f64],
    acceleration: R,
}

impl<R: Real> Acting<R> for Held<'_, R> {
    fn source(&self, index: usize, _: R) -> R {
        R::of(self.sources[index])
    }
    fn load(&self, index: usize, _: R) -> R {
        R::of(self.loads[index])
    }
    fn acceleration(&self) -> Option<R> {
        Some(self.acceleration)
    }
    fn brake(&self, index: usize) -> f64 {
        self.brakes.get(index).copied().unwrap_or(0.0)
    }
}

/// The acceleration of the root at `x`, moving back or not, under the efforts of `standing` and the brakes that bite.
/// The drive has some inertia.
pub(crate) fn acceleration(
    drive: &Assembly,
    x: f64,
    back: bool,
    standing: &Flow<f64>,
    brakes: &[f64],
) -> f64 {
    let held =
        |acceleration| Held { sources: &standing.sources, loads: &standing.loads, brakes, acceleration };
    // Piecewise straight in the acceleration: Newton ends on the right piece.
    let mut a = 0.0;
    for _ in 0..24 {
        let there = Held {
            sources: &standing.sources,
            loads: &standing.loads,
            brakes,
            acceleration: Dual::variable(a),
        };
        let net = flow(drive, Dual::of(x), back, &there).net;
        let next = a - net.value / net.slope;
        if !next.is_finite() || (next - a).abs() <= 4.0 * f64::EPSILON * next.abs() {
            return if next.is_finite() { next } else { a };
        }
        a = next;
    }
    let net = |a: f64| flow(drive, x, back, &held(a)).net;
    let mut reach = f64::max(a.abs(), 1e-6);
    while net(reach) > 0.0 || net(-reach) < 0.0 {
        reach *= 2.0;
        if reach > 1e30 {
            return a;
        }
    }
    bracketed(net, -reach, reach)
}

/// Whether anything in the drive has inertia.
pub(crate) fn has_inertia(drive: &Assembly) -> bool {
    drive.shafts.iter().any(|shaft| shaft.inertia > 0.0)
}
