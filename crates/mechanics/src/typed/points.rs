//! All operating points of two laws of your own.

use uom::si::angular_velocity::radian_per_second;
use uom::si::f64::AngularVelocity;

use super::{OutOfRange, Station, positive};
use crate::curve::{Curve, Law};
use crate::scalar::Real;
use crate::solution::Stability;
use crate::solve::zeros;

/// An operating point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point {
    /// Speed, torque and power of the source.
    pub at: Station,
    /// Whether a small push comes back.
    pub stability: Stability,
}

/// Available less required torque.
struct Net<'a, S, L>(&'a S, &'a L);

impl<S: Law, L: Law> Law for Net<'_, S, L> {
    fn eval<R: Real>(&self, x: R) -> R {
        self.0.eval(x) - self.1.eval(x)
    }
    fn jumps(&self) -> Vec<f64> {
        let mut jumps = Law::jumps(self.0);
        jumps.extend(Law::jumps(self.1));
        jumps
    }
}

/// All operating points of a source and a load between rest and a speed, rising; none is missed. Laws take rad/s and
/// give N·m.
///
/// ```
/// use layshaft_mechanics::curve::Law;
/// use layshaft_mechanics::scalar::Real;
/// use layshaft_mechanics::solution::Stability;
/// use layshaft_mechanics::typed::operating_points;
/// use uom::si::angular_velocity::radian_per_second;
/// use uom::si::f64::AngularVelocity;
///
/// /// An induction machine by Kloss's formula, written once for all numbers.
/// struct Motor;
/// impl Law for Motor {
///     fn eval<R: Real>(&self, w: R) -> R {
///         let r = (R::of(157.0) - w) / (157.0 * 0.2);
///         r * (2.0 * 25.0) / (r.square() + 1.0)
///     }
/// }
/// struct Crusher;
/// impl Law for Crusher {
///     fn eval<R: Real>(&self, _: R) -> R {
///         R::of(12.0)
///     }
/// }
///
/// let points = operating_points(&Motor, &Crusher, AngularVelocity::new::<radian_per_second>(160.0))?;
/// let stable: Vec<bool> = points.iter().map(|p| p.stability == Stability::Stable).collect();
/// assert_eq!(stable, [false, true]);
/// # Ok::<(), layshaft_mechanics::typed::OutOfRange>(())
/// ```
///
/// # Errors
///
/// The speed must be above zero and finite. A range that the bounds of the laws cannot settle (a law that is not
/// defined there, say) is refused too.
pub fn operating_points<S: Law, L: Law>(
    source: &S,
    load: &L,
    up_to: AngularVelocity,
) -> Result<Vec<Point>, OutOfRange> {
    let top = positive("the highest speed", up_to.get::<radian_per_second>())?;
    let size = |x: f64| source.at(x).abs() + load.at(x).abs();
    let found = zeros(&Net(source, load), &size, 0.0, top).map_err(|si| OutOfRange {
        what: "a speed",
        si,
        wanted: "where both laws are defined and continuous",
    })?;
    let point =
        |(speed, stability): (f64, Stability)| Point { at: Station::of(speed, source.at(speed)), stability };
    Ok(found.into_iter().map(point).collect())
}
