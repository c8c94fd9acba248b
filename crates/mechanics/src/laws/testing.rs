//! What the tests of the laws share.

use crate::curve::Curve;
use crate::scalar::Enclosure;

/// A speed in rpm as rad/s.
pub(crate) fn rpm(n: f64) -> f64 {
    n * core::f64::consts::PI / 30.0
}

/// Fails unless two numbers agree to a share of the larger one.
#[track_caller]
pub(crate) fn close(found: f64, wanted: f64, share: f64) {
    let bound = share * found.abs().max(wanted.abs());
    assert!((found - wanted).abs() <= bound, "{found} is not {wanted} to {share}");
}

/// Fails unless the curve's bounds over `lo .. lo + width` hold its value at a share `t` of the way, and its bounds on
/// the slope the difference quotient over the whole range (which has no jump inside).
#[track_caller]
pub(crate) fn encloses(curve: &dyn Curve, lo: f64, width: f64, t: f64) {
    let hi = lo + width.max(0.0);
    let x = (lo + t * (hi - lo)).clamp(lo, hi);
    let over = curve.over(Enclosure::variable(lo, hi));
    assert!(over.value.holds(curve.at(x)), "{over:?} does not hold {} at {x}", curve.at(x));
    if hi - lo > 1e-6 {
        let slope = (curve.at(hi) - curve.at(lo)) / (hi - lo);
        let slack = 1e-9 * (1.0 + slope.abs() + over.value.magnitude() / (hi - lo));
        let (low, high) = (over.slope.lo - slack, over.slope.hi + slack);
        assert!(low <= slope && slope <= high, "{over:?} does not hold the slope {slope}");
    }
}
