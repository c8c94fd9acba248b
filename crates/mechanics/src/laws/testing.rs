//! What the tests of the laws share.

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
