//! Enclosures hold what they enclose, and duals carry true slopes.

use super::{Dual, Enclosure, Real};
use proptest::prelude::*;

/// A law that uses every operation.
fn mixed<R: Real>(x: R, pick: u8) -> R {
    match pick % 14 {
        0 => x * x * 3.0 - x * 2.0 + 1.0,
        1 => (x.square() + 1.0).sqrt(),
        2 => x.sin() * x.cos(),
        3 => (x * 0.3).exp() - x,
        4 => (x.square() + 0.5).ln(),
        5 => x.abs().powf(1.7),
        6 => x.atan() + x.tanh(),
        7 => x.min(x.square()).max(R::of(-2.0)),
        8 => x.by_sign(0.9, 1.0 / 0.9),
        9 => R::of(2.0) / (x / 0.2 + R::of(0.2) / (x + 20.0)),
        10 => x.piecewise(&[-1.0, 0.5, 2.0], |i, x| match i {
            0 => x + 1.0,
            1 => R::of(0.0),
            2 => (x - 0.5) * 2.0,
            _ => R::of(3.0) - (x - 2.0),
        }),
        11 => x.kloss(3.0) - (x * 0.5).kloss(-1.25),
        12 => (x.square() * 40.0).kloss(2.0),
        _ => (x - x.square()) / (x.square() + 1.0),
    }
}

proptest! {
    #[test]
    fn enclosures_hold_value_and_slope(pick in 0u8..14, lo in -8.0..8.0f64, width in 0.0..4.0f64, t in 0.0..1.0f64) {
        let hi = lo + width;
        let x = (lo + t * width).clamp(lo, hi);
        let over = mixed(Enclosure::variable(lo, hi), pick);
        let at = mixed(Dual::variable(x), pick);
        prop_assert!(over.value.holds(at.value), "{over:?} {at:?}");
        // The slope of a dual is itself rounded.
        let slack = 1e-9 * (1.0 + at.slope.abs());
        prop_assert!(over.slope.lo - slack <= at.slope && at.slope <= over.slope.hi + slack, "{over:?} {at:?}");
        prop_assert_eq!(mixed(x, pick), at.value);
    }

    #[test]
    fn duals_carry_the_slope(pick in 0u8..14, x in -6.0..6.0f64) {
        let h = 1e-6;
        let exact = mixed(Dual::variable(x), pick).slope;
        let (a, b) = (mixed(x - h, pick), mixed(x + h, pick));
        let near = mixed(Dual::variable(x - h), pick).slope;
        let past = mixed(Dual::variable(x + h), pick).slope;
        // Away from kinks only.
        prop_assume!((near - past).abs() < 1e-3);
        prop_assert!(((b - a) / (2.0 * h) - exact).abs() < 1e-4 * (1.0 + exact.abs()));
    }
}

#[test]
fn kloss_is_bounded_without_slack() {
    for (lo, hi) in [(0.0, 1.0), (-1.0, 0.5), (-3.0, 3.0), (1.5, 9.0), (0.0, 0.0), (-1e-310, 1e-310)] {
        let over = Enclosure::variable(lo, hi).kloss(1.0);
        let at = |t: f64| Dual::variable(lo + t * (hi - lo)).kloss(1.0);
        let all: Vec<Dual> = (0..=6000).map(|n| at(f64::from(n) / 6000.0)).collect();
        let range = |of: &dyn Fn(&Dual) -> f64| {
            all.iter().map(of).fold((f64::MAX, f64::MIN), |(a, b), v| (f64::min(a, v), f64::max(b, v)))
        };
        let (value, slope) = (range(&|at| at.value), range(&|at| at.slope));
        assert!(over.value.lo <= value.0 && value.1 <= over.value.hi, "{lo} {hi}: {over:?}");
        assert!(over.slope.lo <= slope.0 && slope.1 <= over.slope.hi, "{lo} {hi}: {over:?}");
        assert!(value.0 - over.value.lo < 1e-6 && over.value.hi - value.1 < 1e-6, "{lo} {hi}: {over:?}");
        assert!(slope.0 - over.slope.lo < 1e-6 && over.slope.hi - slope.1 < 1e-6, "{lo} {hi}: {over:?}");
    }
    // Where a square leaves the numbers the bounds hold still.
    let far = Enclosure::variable(1e160, 1e170).kloss(1.0);
    assert!(far.value.holds(1e-165), "{far:?}");
}
