//! The share of what the sources can give at which the net effort of a drive is zero, in numbers of any kind.

use super::assembly::Assembly;
use super::bracket::bracketed;
use super::flow::{Acting, flow};
use crate::curve::Curve;
use crate::scalar::{Dual, Enclosure, Interval, Real};

/// Sources at a share of what they can give or hold back.
pub(super) struct Shared<'a, R> {
    /// The drive.
    pub drive: &'a Assembly,
    /// The share: below zero of what they hold back.
    pub share: R,
}

impl<R: Real> Acting<R> for Shared<'_, R> {
    fn source(&self, index: usize, speed: R) -> R {
        let source = &self.drive.sources[index];
        let zero = R::of(0.0);
        self.share.max(zero) * source.most(speed) + self.share.min(zero) * source.braking(speed)
    }
    fn load(&self, index: usize, speed: R) -> R {
        self.drive.loads[index].effort(speed)
    }
}

/// The share at which the net effort is zero, in numbers of any kind.
trait ShareOf: Real {
    fn share(drive: &Assembly, x: Self) -> Self;
}

impl ShareOf for f64 {
    fn share(drive: &Assembly, x: f64) -> f64 {
        bracketed(|share| flow(drive, x, false, &Shared { drive, share }).net, -1.0, 1.0)
    }
}

impl ShareOf for Dual {
    fn share(drive: &Assembly, x: Dual) -> Dual {
        let share = f64::share(drive, x.value);
        let by_x = flow(drive, x, false, &Shared { drive, share: Dual::of(share) }).net.slope;
        let there = Shared { drive, share: Dual::variable(share) };
        let by_share = flow(drive, Dual::of(x.value), false, &there).net.slope;
        Dual { value: share, slope: -by_x / by_share }
    }
}

impl ShareOf for Enclosure {
    fn share(drive: &Assembly, x: Enclosure) -> Enclosure {
        let net = |x: Enclosure, share: Enclosure| flow(drive, x, false, &Shared { drive, share }).net;
        let held = Enclosure { value: x.value, slope: Interval::ZERO };
        // The net effort rises with the share: below the least such share it is below zero all over the box.
        let end = |below: bool| {
            let (mut lo, mut hi) = (-1.0, 1.0);
            for _ in 0..40 {
                let middle = 0.5 * lo + 0.5 * hi;
                let there = net(held, Enclosure::of(middle)).value;
                let outside = if below { there.hi < 0.0 } else { there.lo > 0.0 };
                if outside == below {
                    lo = middle;
                } else {
                    hi = middle;
                }
            }
            if below { lo } else { hi }
        };
        let value = Interval::new(end(true), end(false));
        let by_x = net(x, Enclosure { value, slope: Interval::ZERO }).slope;
        let by_share = net(held, Enclosure { value, slope: Interval::point(1.0) }).slope;
        Enclosure { value, slope: -(by_x / by_share) }
    }
}

/// A number that knows how to share.
pub(super) fn shared<R: Real>(drive: &Assembly, x: R) -> R {
    x.on(&ShareLaw(drive))
}

/// The share over the speed of the root; not a law, since each kind of number finds it in its own way.
struct ShareLaw<'a>(&'a Assembly);

impl Curve for ShareLaw<'_> {
    fn at(&self, x: f64) -> f64 {
        f64::share(self.0, x)
    }
    fn over(&self, x: Enclosure) -> Enclosure {
        Enclosure::share(self.0, x)
    }
    fn dual(&self, x: Dual) -> Dual {
        Dual::share(self.0, x)
    }
    fn jumps(&self) -> Vec<f64> {
        Vec::new()
    }
    fn kinks(&self) -> Vec<f64> {
        Vec::new()
    }
}
