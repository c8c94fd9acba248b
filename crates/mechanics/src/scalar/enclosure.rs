//! A law over a whole range: an interval for its value and one for its slope.

use std::ops::{Add, Div, Mul, Neg, Sub};

use super::{Interval, Real};
use crate::curve::Curve;
use crate::model::{Draw, Drawn};

/// Bounds on value and slope of a law over a range of its variable.
///
/// At kinks the slope interval holds the slopes of both sides, so the mean value theorem stands for every
/// continuous law. Across a jump it does not: jumps are cut out before.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Enclosure {
    /// Bounds on the value.
    pub value: Interval,
    /// Bounds on the slope.
    pub slope: Interval,
}

impl Enclosure {
    /// The variable itself over a range.
    #[must_use]
    #[inline]
    pub fn variable(lo: f64, hi: f64) -> Self {
        Self { value: Interval::new(lo, hi), slope: Interval::point(1.0) }
    }

    /// The smallest enclosure that holds both.
    #[must_use]
    #[inline]
    pub fn hull(self, other: Self) -> Self {
        Self { value: self.value.hull(other.value), slope: self.slope.hull(other.slope) }
    }

    /// A rising or falling function with the bounds of its derivative.
    fn monotone(self, f: impl Fn(f64) -> f64, derivative: Interval) -> Self {
        let value = Interval::new(f(self.value.lo), f(self.value.hi)).widened(3);
        Self { value, slope: derivative * self.slope }
    }
}

impl Neg for Enclosure {
    type Output = Self;
    #[inline]
    fn neg(self) -> Self {
        Self { value: -self.value, slope: -self.slope }
    }
}

impl Add for Enclosure {
    type Output = Self;
    #[inline]
    fn add(self, other: Self) -> Self {
        Self { value: self.value + other.value, slope: self.slope + other.slope }
    }
}

impl Sub for Enclosure {
    type Output = Self;
    #[inline]
    fn sub(self, other: Self) -> Self {
        self + -other
    }
}

impl Mul for Enclosure {
    type Output = Self;
    #[inline]
    fn mul(self, other: Self) -> Self {
        Self { value: self.value * other.value, slope: self.slope * other.value + self.value * other.slope }
    }
}

impl Div for Enclosure {
    type Output = Self;
    #[inline]
    fn div(self, other: Self) -> Self {
        let value = self.value / other.value;
        Self { value, slope: (self.slope - value * other.slope) / other.value }
    }
}

impl Add<f64> for Enclosure {
    type Output = Self;
    #[inline]
    fn add(self, other: f64) -> Self {
        Self { value: self.value + Interval::point(other), slope: self.slope }
    }
}

impl Sub<f64> for Enclosure {
    type Output = Self;
    #[inline]
    fn sub(self, other: f64) -> Self {
        self + -other
    }
}

impl Mul<f64> for Enclosure {
    type Output = Self;
    #[inline]
    fn mul(self, other: f64) -> Self {
        if other.is_nan() {
            return Self { value: Interval::ENTIRE, slope: Interval::ENTIRE };
        }
        Self { value: self.value.times(other), slope: self.slope.times(other) }
    }
}

impl Div<f64> for Enclosure {
    type Output = Self;
    #[inline]
    fn div(self, other: f64) -> Self {
        let divisor = Interval::point(other);
        Self { value: self.value / divisor, slope: self.slope / divisor }
    }
}

/// Beyond this the square of a number, or a fraction of it, leaves what can be computed.
const VAST: f64 = 1e75;

/// `x / (x² + 1)` over a range within [`VAST`]: it rises between -1 and 1 and falls outside.
#[inline]
fn hump(x: Interval) -> Interval {
    let at = |x: f64| x / (x * x + 1.0);
    let (first, last) = (at(x.lo), at(x.hi));
    let (mut lo, mut hi) = if first <= last { (first, last) } else { (last, first) };
    if x.lo < 1.0 && x.hi > 1.0 {
        hi = 0.5;
    }
    if x.lo < -1.0 && x.hi > -1.0 {
        lo = -0.5;
    }
    // At zero the value is exact; and numbers next to zero are slow.
    let beside = |end: f64, other: f64| {
        if end == 0.0 { Interval { lo: end, hi: end } } else { Interval { lo: end, hi: other }.widened(3) }
    };
    Interval { lo: beside(lo, lo).lo, hi: beside(hi, hi).hi }
}

/// The derivative of the same, `(1 - u) / (1 + u)²` with u = x²: it falls up to u = 3 and rises behind.
#[inline]
fn hump_slope(x: Interval) -> Interval {
    // What the rounding of x² leaves of 1 - u, the denominator being 1 at least.
    const SLACK: f64 = 1e-15;
    let square = x.square();
    let at = |u: f64| (1.0 - u) / ((1.0 + u) * (1.0 + u));
    let (first, last) = (at(square.lo), at(square.hi));
    let low = if square.lo < 3.0 && square.hi > 3.0 { -0.125 } else { f64::min(first, last) };
    Interval { lo: low - SLACK, hi: f64::max(first, last) + SLACK }
}

/// Sine over an interval of angles.
fn sine(x: Interval) -> Interval {
    const TURN: f64 = std::f64::consts::TAU;
    const QUARTER: f64 = std::f64::consts::FRAC_PI_2;
    if !x.lo.is_finite() || !x.hi.is_finite() || x.width() >= TURN || x.magnitude() > 1e9 {
        return Interval { lo: -1.0, hi: 1.0 };
    }
    let mut out = Interval::new(libm::sin(x.lo), libm::sin(x.hi)).widened(3);
    // A crest or trough whose place, give or take rounding, lies inside.
    let slack = 1e-6;
    let crest = |at: f64| {
        let k = libm::ceil((x.lo - slack - at) / TURN);
        at + k * TURN <= x.hi + slack
    };
    if crest(QUARTER) {
        out.hi = 1.0;
    }
    if crest(-QUARTER) {
        out.lo = -1.0;
    }
    out.meet(Interval { lo: -1.0, hi: 1.0 })
}

impl Real for Enclosure {
    #[inline]
    fn of(value: f64) -> Self {
        Self { value: Interval::point(value), slope: Interval::ZERO }
    }

    #[inline]
    fn square(self) -> Self {
        Self { value: self.value.square(), slope: self.value.times(2.0) * self.slope }
    }

    fn sqrt(self) -> Self {
        let root = |x: f64| if x > 0.0 { x.sqrt() } else { 0.0 };
        let mut value = Interval::new(root(self.value.lo), root(self.value.hi)).widened(1);
        value.lo = f64::max(value.lo, 0.0);
        let mut rate = Interval::point(0.5) / value;
        if self.value.lo < 0.0 {
            rate = rate.hull(Interval::ZERO);
        }
        Self { value, slope: rate * self.slope }
    }

    fn exp(self) -> Self {
        let grown = self.monotone(libm::exp, Interval::ZERO);
        let value = Interval { lo: f64::max(grown.value.lo, 0.0), hi: grown.value.hi };
        Self { value, slope: value * self.slope }
    }

    fn ln(self) -> Self {
        if self.value.lo <= 0.0 {
            return Self { value: Interval::ENTIRE, slope: Interval::ENTIRE };
        }
        self.monotone(libm::log, Interval::point(1.0) / self.value)
    }

    fn powf(self, exponent: f64) -> Self {
        let base = Interval { lo: f64::max(self.value.lo, 0.0), hi: f64::max(self.value.hi, 0.0) };
        let power = |x: f64, e: f64| if e == 0.0 { 1.0 } else { libm::pow(x, e) };
        let over = |e: f64| {
            let bounds = Interval::new(power(base.lo, e), power(base.hi, e)).widened(3);
            Interval { lo: f64::max(bounds.lo, 0.0), hi: bounds.hi }
        };
        let mut rate = over(exponent - 1.0) * Interval::point(exponent);
        if self.value.lo < 0.0 {
            rate = rate.hull(Interval::ZERO);
        }
        Self { value: over(exponent), slope: rate * self.slope }
    }

    fn sin(self) -> Self {
        let quarter = Interval::point(std::f64::consts::FRAC_PI_2);
        Self { value: sine(self.value), slope: sine(self.value + quarter) * self.slope }
    }

    fn cos(self) -> Self {
        let quarter = Interval::point(std::f64::consts::FRAC_PI_2);
        Self { value: sine(self.value + quarter), slope: -sine(self.value) * self.slope }
    }

    fn atan(self) -> Self {
        let one = Interval::point(1.0);
        self.monotone(libm::atan, one / (one + self.value.square()))
    }

    fn tanh(self) -> Self {
        let value = Interval::new(libm::tanh(self.value.lo), libm::tanh(self.value.hi)).widened(3);
        let rate = (Interval::point(1.0) - value.square()).meet(Interval { lo: 0.0, hi: 1.0 });
        Self { value, slope: rate * self.slope }
    }

    #[inline]
    fn kloss(self, factor: f64) -> Self {
        // Not so for what is no number either.
        if !(self.value.magnitude() < VAST && factor.is_finite()) {
            return self * factor / (self.square() + 1.0);
        }
        let value = hump(self.value).times(factor);
        Self { value, slope: hump_slope(self.value).times(factor) * self.slope }
    }

    fn abs(self) -> Self {
        self.by_sign(1.0, -1.0)
    }

    fn min(self, other: Self) -> Self {
        if self.value.hi < other.value.lo {
            return self;
        }
        if other.value.hi < self.value.lo {
            return other;
        }
        let value = Interval {
            lo: f64::min(self.value.lo, other.value.lo),
            hi: f64::min(self.value.hi, other.value.hi),
        };
        Self { value, slope: self.slope.hull(other.slope) }
    }

    fn max(self, other: Self) -> Self {
        -(-self).min(-other)
    }

    #[inline]
    fn by_sign(self, above: f64, below: f64) -> Self {
        if self.value.lo >= 0.0 {
            return self * above;
        }
        if self.value.hi < 0.0 {
            return self * below;
        }
        let part = |lo: f64, hi: f64| Self { value: Interval { lo, hi }, slope: self.slope };
        (part(0.0, self.value.hi) * above).hull(part(self.value.lo, 0.0) * below)
    }

    fn piecewise(self, breaks: &[f64], piece: impl Fn(usize, Self) -> Self) -> Self {
        let Interval { lo, hi } = self.value;
        let first = breaks.partition_point(|b| *b <= lo);
        // A range that only ends at a break belongs to the piece before it.
        let last = usize::max(first, breaks.partition_point(|b| *b < hi));
        let clipped = |index: usize| {
            let from = if index == first { lo } else { breaks[index - 1] };
            let to = if index == last { hi } else { breaks[index] };
            Self { value: Interval::new(from, to), slope: self.slope }
        };
        let mut out = piece(first, clipped(first));
        for index in first + 1..=last {
            out = out.hull(piece(index, clipped(index)));
        }
        out
    }

    fn on(self, curve: &dyn Curve) -> Self {
        curve.over(self)
    }
    fn drawn(draw: &dyn Draw, speed: Self, effort: Self) -> Drawn<Self> {
        draw.over(speed, effort)
    }
}
