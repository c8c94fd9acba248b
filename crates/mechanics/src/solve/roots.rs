//! All zeros of a curve on a range, none missed.
//!
//! Branch and prune: a box whose bounds exclude zero is dropped; a box on which the curve rises or falls throughout
//! is decided by the signs at its ends; every other box is halved. What is still undecided at the smallest width is
//! a place where the curve touches zero, or nearly: it is judged by the signs beside it. The range must not hold a
//! jump inside; the work is bounded.

use crate::curve::Curve;
use crate::scalar::{Dual, Enclosure, Interval};

/// How a curve meets zero, seen with growing speed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Crossing {
    /// From above to below.
    Falling,
    /// From below to above.
    Rising,
    /// Touches and turns back, or stays at zero for a while.
    Touching,
}

/// A zero.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Root {
    /// Where.
    pub x: f64,
    /// How.
    pub crossing: Crossing,
}

/// What a search found.
#[derive(Clone, Debug, Default)]
pub(crate) struct Found {
    /// All zeros, rising.
    pub roots: Vec<Root>,
    /// A range that could not be decided within the bound on work.
    pub undecided: Option<(f64, f64)>,
}

/// Boxes looked at before a search gives up.
const BUDGET: usize = 20_000;

/// Smallest width of a box beside its own place on the axis.
const NARROW: f64 = 1.0 / (1u64 << 30) as f64;

/// A value this small beside the efforts that make it up counts as a touch.
const TOUCH: f64 = 4e-12;

/// A curve on a range, and the size of the efforts whose difference it is.
pub(crate) struct Task<'a> {
    /// The curve.
    pub curve: &'a dyn Curve,
    /// The size of what it is the difference of.
    pub size: &'a dyn Fn(f64) -> f64,
}

impl Task<'_> {
    /// The sign of the value, zero within rounding.
    fn sign(&self, x: f64) -> i8 {
        let value = self.curve.at(x);
        if value > 0.0 {
            1
        } else if value < 0.0 {
            -1
        } else {
            0
        }
    }

    fn touches(&self, x: f64) -> bool {
        self.curve.at(x).abs() <= TOUCH * (self.size)(x)
    }

    /// All zeros on `from ..= to`, looked for first between these cuts, in any order.
    pub fn roots_cut(&self, from: f64, to: f64, cuts: &[f64]) -> Found {
        let mut found = Found::default();
        let mut open: Vec<(f64, f64)> = Vec::new();
        let mut borders: Vec<f64> = cuts.iter().copied().filter(|c| *c > from && *c < to).collect();
        borders.extend([from, to]);
        borders.sort_by(f64::total_cmp);
        let mut stack: Vec<(f64, f64)> = borders.windows(2).map(|w| (w[0], w[1])).rev().collect();
        let mut left = BUDGET;
        while let Some((lo, hi)) = stack.pop() {
            if left == 0 {
                found.undecided = Some((lo, to));
                break;
            }
            left -= 1;
            match self.judge(lo, hi, hi >= to) {
                Verdict::Empty => {}
                Verdict::Root(root) => found.roots.push(root),
                Verdict::Undecided => match open.last_mut() {
                    Some(last) if last.1 == lo => last.1 = hi,
                    _ => open.push((lo, hi)),
                },
                Verdict::Split(middle) => {
                    stack.push((middle, hi));
                    stack.push((lo, middle));
                }
            }
        }
        for cluster in open {
            self.settle(cluster, (from, to), &mut found.roots);
        }
        found.roots.sort_by(|a, b| a.x.total_cmp(&b.x));
        self.join_touching(&mut found.roots);
        found
    }

    fn judge(&self, lo: f64, hi: f64, last: bool) -> Verdict {
        let over = self.curve.over(Enclosure::variable(lo, hi));
        if !over.value.holds(0.0) {
            return Verdict::Empty;
        }
        if over.slope.lo > 0.0 || over.slope.hi < 0.0 {
            let crossing = if over.slope.lo > 0.0 { Crossing::Rising } else { Crossing::Falling };
            return match self.monotone(lo, hi, last) {
                Some(x) => Verdict::Root(Root { x, crossing }),
                None => Verdict::Empty,
            };
        }
        let middle = halved(lo, hi);
        let mut value = over.value;
        if over.slope.magnitude().is_finite() {
            let there = self.curve.over(Enclosure::variable(middle, middle)).value;
            let reach = Interval { lo, hi } - Interval::point(middle);
            let mean = there + over.slope * reach;
            if !mean.holds(0.0) {
                return Verdict::Empty;
            }
            value = value.meet(mean);
        }
        let narrow = hi - lo <= NARROW * f64::max(lo.abs(), hi.abs()) || middle <= lo || middle >= hi;
        if narrow || value.magnitude() <= TOUCH * (self.size)(middle) {
            return Verdict::Undecided;
        }
        Verdict::Split(middle)
    }

    /// The zero of a stretch on which the curve rises or falls throughout. A zero on the border of two boxes
    /// belongs to the right one; the border itself has one value, so no zero falls between them.
    fn monotone(&self, lo: f64, hi: f64, last: bool) -> Option<f64> {
        match (self.sign(lo), self.sign(hi)) {
            (0, _) => Some(lo),
            (_, 0) => last.then_some(hi),
            (a, b) if a != b => Some(self.refine(lo, hi, a)),
            _ => None,
        }
    }

    /// Newton's method held inside a bracket: `sign` is the sign at `lo`, the other end has the other one.
    fn refine(&self, mut lo: f64, mut hi: f64, sign: i8) -> f64 {
        let mut x = 0.5 * lo + 0.5 * hi;
        let mut halved = false;
        for _ in 0..200 {
            let here = self.curve.dual(Dual::variable(x));
            if here.value == 0.0 {
                return x;
            }
            if (here.value > 0.0) == (sign > 0) {
                lo = x;
            } else {
                hi = x;
            }
            let middle = 0.5 * lo + 0.5 * hi;
            if middle <= lo || middle >= hi {
                break;
            }
            let step = x - here.value / here.slope;
            let next = if step >= lo && step <= hi && !halved { step } else { middle };
            // Newton's step is bound to halve the bracket every other time.
            halved = !halved && (next - x).abs() > 0.25 * (hi - lo);
            if next == x || (next - x).abs() <= 2.0 * f64::EPSILON * x.abs() {
                return next;
            }
            x = next;
        }
        if self.curve.at(lo).abs() <= self.curve.at(hi).abs() { lo } else { hi }
    }

    /// Judges a stretch that bounds cannot decide by the signs beside it.
    fn settle(&self, cluster: (f64, f64), range: (f64, f64), roots: &mut Vec<Root>) {
        let size = f64::max(cluster.0.abs(), cluster.1.abs());
        let (mut lo, mut hi) = cluster;
        // Beside the stretch the curve may still be too near zero for its sign to mean anything.
        let mut pad = 8.0 * NARROW * size;
        while pad < 1e-2 * size {
            lo = if self.touches(lo) { f64::max(cluster.0 - pad, range.0) } else { lo };
            hi = if self.touches(hi) { f64::min(cluster.1 + pad, range.1) } else { hi };
            if !self.touches(lo) && !self.touches(hi) {
                break;
            }
            pad *= 2.0;
        }
        // A zero already found beside the stretch is the same place.
        roots.retain(|root| root.x < lo || root.x > hi);
        let outer = |x: f64| if self.touches(x) { 0 } else { self.sign(x) };
        let (before, after) = (outer(lo), outer(hi));
        // A smooth touch is never so wide; a stretch at zero is reached at its start.
        let wide = cluster.1 - cluster.0 > 1e-3 * cluster.1.abs();
        if before * after < 0 {
            let crossing = if before > 0 { Crossing::Falling } else { Crossing::Rising };
            let x = if wide { cluster.0 } else { self.bisect(lo, hi, before) };
            roots.push(Root { x, crossing });
            return;
        }
        let x = if wide { cluster.0 } else { self.turning(lo, hi) };
        if self.touches(x) {
            roots.push(Root { x, crossing: Crossing::Touching });
        }
    }

    fn bisect(&self, mut lo: f64, mut hi: f64, before: i8) -> f64 {
        for _ in 0..200 {
            let middle = 0.5 * lo + 0.5 * hi;
            if middle <= lo || middle >= hi {
                break;
            }
            if self.sign(middle) == before {
                lo = middle;
            } else {
                hi = middle;
            }
        }
        hi
    }

    /// Where the slope changes its sign, or the end that is nearer to zero.
    fn turning(&self, lo: f64, hi: f64) -> f64 {
        let slope = |x: f64| self.curve.dual(Dual::variable(x)).slope;
        let rises = slope(lo) > 0.0;
        if rises == (slope(hi) > 0.0) {
            return if self.curve.at(lo).abs() <= self.curve.at(hi).abs() { lo } else { hi };
        }
        let (mut a, mut b) = (lo, hi);
        for _ in 0..200 {
            let middle = 0.5 * a + 0.5 * b;
            if middle <= a || middle >= b {
                break;
            }
            if (slope(middle) > 0.0) == rises {
                a = middle;
            } else {
                b = middle;
            }
        }
        a
    }

    /// Two zeros so near that the curve between them does not leave zero are one touch.
    fn join_touching(&self, roots: &mut Vec<Root>) {
        let mut index = 0;
        while index + 1 < roots.len() {
            let (a, b) = (roots[index].x, roots[index + 1].x);
            let near = b - a <= 1e-4 * f64::max(a.abs(), b.abs());
            if near && self.touches(0.5 * a + 0.5 * b) {
                let (first, second) = (roots[index].crossing, roots[index + 1].crossing);
                let crossing = match (first, second) {
                    (Crossing::Touching, other) | (other, Crossing::Touching) => other,
                    (a, b) if a == b => a,
                    _ => Crossing::Touching,
                };
                roots[index] = Root { x: 0.5 * a + 0.5 * b, crossing };
                roots.remove(index + 1);
            } else {
                index += 1;
            }
        }
    }
}

/// Where to halve a box: far out by the ratio of its ends.
fn halved(lo: f64, hi: f64) -> f64 {
    let (near, far) = if lo > 0.0 { (lo, hi) } else { (-hi, -lo) };
    let far_out = near > 0.0 && far > 4.0 * near && far < 1e6 * near;
    if far_out { (near * far).sqrt().copysign(lo + hi) } else { Interval { lo, hi }.mid() }
}

enum Verdict {
    Empty,
    Root(Root),
    Undecided,
    Split(f64),
}

#[cfg(test)]
mod tests;
