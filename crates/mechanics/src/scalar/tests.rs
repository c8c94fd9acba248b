//! Enclosures hold what they enclose, and duals carry true slopes.

use super::{Dual, Enclosure, Real};
use proptest::prelude::*;

/// A law that uses every operation.
fn mixed<R: Real>(x: R, pick: u8) -> R {
    match pick % 12 {
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
        _ => (x - x.square()) / (x.square() + 1.0),
    }
}

proptest! {
    #[test]
    fn enclosures_hold_value_and_slope(pick in 0u8..12, lo in -8.0..8.0f64, width in 0.0..4.0f64, t in 0.0..1.0f64) {
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
    fn duals_carry_the_slope(pick in 0u8..12, x in -6.0..6.0f64) {
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
