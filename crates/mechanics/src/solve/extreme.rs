//! The greatest value of a curve on a range, with a bound on what could have been missed.

use crate::curve::Curve;
use crate::scalar::{Dual, Enclosure, Interval};

/// A greatest value.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Greatest {
    /// Where; the lowest such place.
    pub x: f64,
    /// How much.
    pub value: f64,
    /// No value anywhere is above this.
    pub bound: f64,
}

/// Boxes looked at before the bound is left as wide as it is.
const BUDGET: usize = 4_000;

/// Values this near, as a share, are told apart no more.
const NEAR: f64 = 1e-10;

/// The greatest value over pieces without jumps inside; `None` for no pieces.
pub(crate) fn greatest(curve: &dyn Curve, pieces: &[(f64, f64)]) -> Option<Greatest> {
    greatest_above(curve, pieces, f64::NEG_INFINITY)
}

/// The greatest value of a curve that is dear to evaluate: with a wider bound where it is level.
pub(crate) fn greatest_of_dear(curve: &dyn Curve, pieces: &[(f64, f64)]) -> Option<Greatest> {
    within(curve, pieces, f64::NEG_INFINITY, BUDGET / 16)
}

/// The greatest value if it is above a floor; `None` where nothing is.
pub(crate) fn greatest_above(curve: &dyn Curve, pieces: &[(f64, f64)], floor: f64) -> Option<Greatest> {
    within(curve, pieces, floor, BUDGET)
}

fn within(curve: &dyn Curve, pieces: &[(f64, f64)], floor: f64, budget: usize) -> Option<Greatest> {
    let mut best = Best { curve, x: f64::NAN, value: floor };
    let mut boxes: Vec<(f64, f64)> = pieces.iter().copied().filter(|(lo, hi)| lo <= hi).collect();
    for (lo, hi) in &boxes {
        best.try_at(*lo);
        best.try_at(*hi);
    }
    let mut left = budget;
    let mut bound = f64::NEG_INFINITY;
    while !boxes.is_empty() {
        let mut next = Vec::new();
        for (lo, hi) in boxes {
            let upper = best.upper(lo, hi);
            let Some(upper) = upper else { continue };
            if upper <= best.value + NEAR * best.value.abs() {
                continue;
            }
            let middle = Interval { lo, hi }.mid();
            if left == 0 || middle <= lo || middle >= hi {
                bound = f64::max(bound, upper);
                continue;
            }
            left -= 1;
            best.try_at(middle);
            next.push((lo, middle));
            next.push((middle, hi));
        }
        boxes = next;
    }
    best.polish(pieces);
    (best.value.is_finite() && !best.x.is_nan()).then_some(Greatest {
        x: best.x,
        value: best.value,
        bound: f64::max(bound, best.value + NEAR * best.value.abs()),
    })
}

struct Best<'a> {
    curve: &'a dyn Curve,
    x: f64,
    value: f64,
}

impl Best<'_> {
    fn try_at(&mut self, x: f64) {
        let value = self.curve.at(x);
        let tie = 1e-12 * value.abs();
        if value > self.value + tie || (value >= self.value - tie && x < self.x && value.is_finite()) {
            self.x = x;
            self.value = value;
        } else if value > self.value {
            self.value = value;
            self.x = x;
        }
    }

    /// A smooth top is flat: its place is where the slope turns, found more sharply than from the values.
    fn polish(&mut self, pieces: &[(f64, f64)]) {
        let Some((from, to)) = pieces.iter().find(|(lo, hi)| *lo < self.x && self.x < *hi) else { return };
        let reach = 1e-5 * self.x.abs();
        let (mut lo, mut hi) = (f64::max(self.x - reach, *from), f64::min(self.x + reach, *to));
        let slope = |x: f64| self.curve.dual(Dual::variable(x)).slope;
        if !(slope(lo) > 0.0 && slope(hi) < 0.0) {
            return;
        }
        for _ in 0..100 {
            let middle = 0.5 * lo + 0.5 * hi;
            if middle <= lo || middle >= hi {
                break;
            }
            let rate = slope(middle);
            if rate >= 0.0 {
                lo = middle;
            }
            if rate <= 0.0 {
                hi = middle;
            }
        }
        self.x = 0.5 * lo + 0.5 * hi;
        self.value = self.curve.at(self.x);
    }

    /// An upper bound over a box; `None` where the curve only rises or falls and the ends, already tried, settle it.
    fn upper(&self, lo: f64, hi: f64) -> Option<f64> {
        let over = self.curve.over(Enclosure::variable(lo, hi));
        if over.slope.lo >= 0.0 || over.slope.hi <= 0.0 {
            return None;
        }
        let mut upper = over.value.hi;
        if over.slope.magnitude().is_finite() {
            let middle = Interval { lo, hi }.mid();
            let there = self.curve.over(Enclosure::variable(middle, middle)).value;
            let reach = Interval { lo, hi } - Interval::point(middle);
            upper = f64::min(upper, (there + over.slope * reach).hi);
        }
        Some(upper)
    }
}

#[cfg(test)]
mod tests {
    use super::greatest;
    use crate::curve::{Curve, Law};
    use crate::scalar::Real;
    use proptest::prelude::*;

    struct Hill(f64, f64);

    impl Law for Hill {
        fn eval<R: Real>(&self, x: R) -> R {
            x * (R::of(self.0) - x * self.1)
        }
    }

    #[test]
    fn a_parabola_peaks_at_its_middle() {
        let peak = greatest(&Hill(10.0, 0.04), &[(0.0, 250.0)]).unwrap();
        assert!((peak.value - 625.0).abs() < 1e-9);
        assert!((peak.x - 125.0).abs() < 1e-11, "{peak:?}");
        assert!(peak.bound >= peak.value && peak.bound - peak.value < 1e-7);
    }

    #[test]
    fn no_pieces_no_peak() {
        assert_eq!(greatest(&Hill(1.0, 1.0), &[]), None);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(100))]
        #[test]
        fn no_sample_is_greater(a in 0.0..3.0f64, b in 0.1..3.0f64, c in 0.2..6.0f64) {
            struct Wavy(f64, f64, f64);
            impl Law for Wavy {
                fn eval<R: Real>(&self, x: R) -> R {
                    (x * self.2).sin() * self.1 + x * self.0 - x.square() * 0.3
                }
            }
            let curve = Wavy(a, b, c);
            let peak = greatest(&curve, &[(0.0, 4.0), (4.0, 9.0)]).unwrap();
            for i in 0..=2000 {
                prop_assert!(curve.at(9.0 * f64::from(i) / 2000.0) <= peak.bound);
            }
            prop_assert_eq!(curve.at(peak.x), peak.value);
        }
    }
}
