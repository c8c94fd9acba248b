//! The solver: from parts in a chain to operating points and everything that is asked about them.
//!
//! A drive has one degree of freedom: every speed in it is a fixed multiple of the speed x of its root shaft.
//! `net(x)`, the available less the required effort there, is evaluated in bounds, so that no operating point is
//! missed; what a field would have to say and does not is refused by name, for the questions that need it.

mod answers;
mod assembly;
mod balance;
mod bracket;
mod chain;
mod chart;
mod derive;
mod drive_answers;
mod engagement;
mod extreme;
mod findings;
mod flow;
mod fluid;
mod held;
mod holding;
mod motion;
mod over;
mod own_results;
mod part_answers;
mod points;
mod quadrature;
mod ratings;
mod rest;
mod reversal;
mod roots;
mod run_up;
mod shafts;
mod share;
mod shared;
mod site_findings;
mod source;
mod source_peak;
mod state;
mod stated;
mod stop;
#[cfg(test)]
mod testing;
#[cfg(test)]
mod tests;

pub use answers::{OperatingPoint, Solution};
pub use chart::{Chart, ChartCurve, ChartPoint, CurveRole};
pub use derive::{DRIVE_FORMULAS, Step, Symbol};
pub use over::{Extremes, Question, worst_over};

use std::sync::Arc;

use crate::drive::{DriveSpec, StatedSpeed};
use crate::fault::Fault;
use crate::registry::Role;
use crate::solution::Stability;

/// How near to a jump, as a share, the two sides of it are evaluated.
pub(crate) const BESIDE: f64 = 1e-13;

/// Follows a drive from rest: all its operating points, the one it comes to, and what can be asked about it.
///
/// # Errors
///
/// Everything that keeps the drive from being solved at all: parts that cannot be built, a chain that does not fit,
/// several gears and none engaged. What only one question needs is refused by that question alone.
pub fn solve(spec: &DriveSpec) -> Result<Solution, Vec<Fault>> {
    Solution::from_rest(Arc::new(assembly::Assembly::new(spec)?))
}

/// Takes a drive at a stated speed: the sources give what is required there, each the same share of what it can, if
/// that lies within what they can give or hold back.
///
/// # Errors
///
/// As [`solve`]; a speed stated at a part that does not stand in the drive, or not above zero.
pub fn solve_at(spec: &DriveSpec, speed: StatedSpeed) -> Result<Solution, Vec<Fault>> {
    let drive = Arc::new(assembly::Assembly::new(spec)?);
    let x = drive.coordinate(&speed)?;
    Ok(Solution::at_speed(drive, x))
}

/// All zeros of a curve from `lo` to `hi`, rising, jumps among them, with the stability of an operating point there;
/// a place that could not be settled otherwise. `size` is the size of what the curve is the difference of.
pub(crate) fn zeros(
    curve: &dyn crate::curve::Curve,
    size: &dyn Fn(f64) -> f64,
    lo: f64,
    hi: f64,
) -> Result<Vec<(f64, Stability)>, f64> {
    let task = roots::Task { curve, size };
    let mut jumps = curve.jumps();
    jumps.sort_by(f64::total_cmp);
    let pieces = points::pieces(&jumps, lo, hi);
    let mut out = Vec::new();
    for (index, (from, to)) in pieces.iter().enumerate() {
        let found = task.roots_cut(*from, *to, &[]);
        if let Some((place, _)) = found.undecided {
            return Err(place);
        }
        out.extend(found.roots.iter().map(|root| (root.x, state::stability(root.crossing))));
        let Some((next, _)) = pieces.get(index + 1) else { continue };
        let (before, after) = (curve.at(*to), curve.at(*next));
        if before * after < 0.0 {
            let crossing = if before > 0.0 { roots::Crossing::Falling } else { roots::Crossing::Rising };
            out.push((0.5 * to + 0.5 * next, state::stability(crossing)));
        }
    }
    Ok(out)
}

/// The gears a drive can be in: the names all its gearboxes have; empty without a gearbox, or when it cannot be built.
#[must_use]
pub fn gears(spec: &DriveSpec) -> Vec<String> {
    let built: Result<Vec<_>, _> =
        spec.parts.iter().map(|part| (part.row.build)(&part.values).map(Arc::new)).collect();
    let Ok(models) = built else { return Vec::new() };
    let roles: Vec<Role> = spec.parts.iter().map(|part| part.row.role).collect();
    chain::tree(&spec.chain, &roles, &models)
        .map(|tree| shafts::gear_names(&tree, &models))
        .unwrap_or_default()
}
