//! The one operating point of two laws, when there is one, as fast as it can be proved.

use uom::si::angular_velocity::radian_per_second;
use uom::si::f64::AngularVelocity;

use super::Station;
use crate::curve::Law;
use crate::scalar::{Dual, Enclosure};

/// What is known of the operating points between two speeds.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Sole {
    /// Exactly one, and it is stable: available less required torque falls all the way.
    Stable(Station),
    /// Exactly one, and it is unstable: the difference rises all the way.
    Unstable(Station),
    /// None.
    Nowhere,
    /// More than one, or the bounds of the laws do not settle it: see [`operating_points`](super::operating_points).
    Open,
}

/// The one operating point of a source and a load between two speeds. The laws (rad/s to N·m) must not jump between
/// them. Nothing is allocated: meant for sweeps over many drives.
pub fn sole_operating_point<S: Law, L: Law>(
    source: &S,
    load: &L,
    (low, high): (AngularVelocity, AngularVelocity),
) -> Sole {
    let (low, high) = (low.get::<radian_per_second>(), high.get::<radian_per_second>());
    if !(low < high && low.is_finite() && high.is_finite()) {
        return Sole::Open;
    }
    match bracket(source, load, low, high) {
        Found::One(bracket) => {
            let x = newton(source, load, &bracket);
            let station = Station::of(x, source.eval(x));
            if bracket.falls { Sole::Stable(station) } else { Sole::Unstable(station) }
        }
        Found::None => Sole::Nowhere,
        Found::Unsettled => Sole::Open,
    }
}

/// A stretch on which the net torque falls or rises throughout and changes its sign.
struct Bracket {
    ends: (f64, f64),
    /// Net torque at the ends.
    nets: (f64, f64),
    falls: bool,
}

enum Found {
    One(Bracket),
    None,
    Unsettled,
}

/// Pieces looked at before it is left open.
const PIECES: usize = 400;
/// How often the range is halved before it is left open.
const DEEPEST: u32 = 46;

/// A step this small beside the speed is the last one: the error it leaves goes by its square, far below rounding.
const SETTLED: f64 = 1e-14;

/// A piece: the range halved `level` times, the one of number `index` from below.
#[derive(Clone, Copy)]
struct Piece {
    index: u64,
    level: u32,
}

impl Piece {
    /// Its ends; pieces that touch share theirs to the bit.
    #[inline]
    fn ends(self, low: f64, high: f64) -> (f64, f64) {
        if self.level == 0 {
            return (low, high);
        }
        let parts = (1_u64 << self.level) as f64;
        let at = |index: u64| {
            let share = index as f64 / parts;
            low * (1.0 - share) + high * share
        };
        (at(self.index), at(self.index + 1))
    }

    #[inline]
    fn lower_half(self) -> Self {
        Self { index: 2 * self.index, level: self.level + 1 }
    }

    /// The piece behind it, the largest that begins there; none at the end of the range.
    #[inline]
    fn next(self) -> Option<Self> {
        let (mut index, mut level) = (self.index + 1, self.level);
        while level > 0 && index % 2 == 0 {
            index /= 2;
            level -= 1;
        }
        (level > 0).then_some(Self { index, level })
    }
}

/// Looks for stretches on which the net torque falls or rises throughout and changes its sign.
fn bracket<S: Law, L: Law>(source: &S, load: &L, low: f64, high: f64) -> Found {
    let net = |x: f64| source.eval(x) - load.eval(x);
    let mut one = Found::None;
    let mut here = Piece { index: 0, level: 0 };
    for _ in 0..PIECES {
        let (lo, hi) = here.ends(low, high);
        let range = Enclosure::variable(lo, hi);
        let over = source.eval(range) - load.eval(range);
        let falls = over.slope.hi < 0.0;
        if over.value.holds(0.0) {
            if !(falls || over.slope.lo > 0.0) {
                if here.level == DEEPEST || lo >= hi {
                    return Found::Unsettled;
                }
                here = here.lower_half();
                continue;
            }
            // A zero on the border of two pieces belongs to the right one.
            let nets = (net(lo), net(hi));
            let (first, last) = nets;
            let crosses =
                first == 0.0 || (last != 0.0 && (first > 0.0) != (last > 0.0)) || (last == 0.0 && hi == high);
            if crosses {
                if matches!(one, Found::One(..)) {
                    return Found::Unsettled;
                }
                one = Found::One(Bracket { ends: (lo, hi), nets, falls });
            }
        }
        match here.next() {
            Some(next) => here = next,
            None => return one,
        }
    }
    Found::Unsettled
}

/// Newton's method from the chord, held inside the bracket of a zero of one-signed slope.
fn newton<S: Law, L: Law>(source: &S, load: &L, of: &Bracket) -> f64 {
    let ((mut lo, mut hi), (first, last)) = (of.ends, of.nets);
    let mut x = (lo + (hi - lo) * (first / (first - last))).clamp(lo, hi);
    for _ in 0..100 {
        let here = source.eval(Dual::variable(x)) - load.eval(Dual::variable(x));
        if (here.value > 0.0) == of.falls {
            lo = x;
        } else {
            hi = x;
        }
        let step = x - here.value / here.slope;
        let next = if step >= lo && step <= hi { step } else { 0.5 * lo + 0.5 * hi };
        if (next - x).abs() <= SETTLED * x.abs() {
            return next;
        }
        x = next;
    }
    x
}

#[cfg(test)]
mod tests {
    use super::{Sole, sole_operating_point};
    use crate::curve::{Constant, Law, Line};
    use crate::laws::kloss;
    use crate::scalar::Real;
    use crate::typed::operating_points;
    use uom::si::angular_velocity::radian_per_second;
    use uom::si::f64::AngularVelocity;

    struct Motor(f64);

    impl Law for Motor {
        fn eval<R: Real>(&self, w: R) -> R {
            kloss::torque(self.0, 0.2, (R::of(157.0) - w) / 157.0)
        }
    }

    fn rads(value: f64) -> AngularVelocity {
        AngularVelocity::new::<radian_per_second>(value)
    }

    #[test]
    fn one_none_or_open() {
        let motor = Motor(25.0);
        // From breakdown to synchronous speed the torque only falls.
        let range = (rads(157.0 * 0.81), rads(157.0));
        let Sole::Stable(point) = sole_operating_point(&motor, &Constant(12.0), range) else { panic!("one") };
        let all = operating_points(&motor, &Constant(12.0), rads(157.0)).unwrap();
        assert_eq!(all.len(), 2);
        assert!((all[1].at.speed - point.speed).abs() < rads(1e-10));
        assert_eq!(sole_operating_point(&motor, &Constant(30.0), range), Sole::Nowhere);
        // Over the whole range there are two.
        assert_eq!(sole_operating_point(&motor, &Constant(12.0), (rads(0.0), rads(157.0))), Sole::Open);
        assert_eq!(sole_operating_point(&motor, &Constant(12.0), (rads(1.0), rads(1.0))), Sole::Open);
        let rising = Line { at_zero: -1.0, slope: 1.0 };
        let found = sole_operating_point(&rising, &Constant(0.0), (rads(0.0), rads(5.0)));
        assert!(matches!(found, Sole::Unstable(at) if at.speed == rads(1.0)), "{found:?}");
    }
}
