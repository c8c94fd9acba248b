//! Intervals with outward rounding: the true result of an operation on any two members lies inside.

use std::ops::{Add, Div, Mul, Neg, Sub};

/// All numbers from `lo` to `hi`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Interval {
    /// Lower end.
    pub lo: f64,
    /// Upper end.
    pub hi: f64,
}

/// More than half a unit in the last place, as a share: taken off a rounded result it gives a lower neighbour at
/// least, whatever the rounding.
const BEYOND: f64 = 1.2e-16;
/// The same for results near zero.
const TINY: f64 = f64::from_bits(1);

/// The least magnitude at which a share of it is no smaller than what rounding can take.
const PLAIN: f64 = 1e-280;

/// Whether a result is neither near zero nor beyond all numbers: then a share of it is all there is to step over.
#[inline]
fn plain(size: f64) -> bool {
    (PLAIN..=f64::MAX).contains(&size)
}

/// A lower bound just below a rounded result; open where the result is no number.
#[inline]
fn down(value: f64) -> f64 {
    let size = value.abs();
    let step = size * BEYOND;
    if plain(size) { value - step } else { f64::max(value - (step + TINY), f64::NEG_INFINITY) }
}

/// An upper bound just above a rounded result; open where the result is no number.
#[inline]
fn up(value: f64) -> f64 {
    let size = value.abs();
    let step = size * BEYOND;
    if plain(size) { value + step } else { f64::min(value + (step + TINY), f64::INFINITY) }
}

impl Interval {
    /// Every number.
    pub const ENTIRE: Self = Self { lo: f64::NEG_INFINITY, hi: f64::INFINITY };
    /// Zero alone.
    pub const ZERO: Self = Self { lo: 0.0, hi: 0.0 };

    /// From `lo` to `hi`; the ends are put in order, and an end that is not a number opens the interval.
    #[must_use]
    #[inline]
    pub fn new(lo: f64, hi: f64) -> Self {
        if lo.is_nan() || hi.is_nan() {
            Self::ENTIRE
        } else if lo <= hi {
            Self { lo, hi }
        } else {
            Self { lo: hi, hi: lo }
        }
    }

    /// One number.
    #[must_use]
    #[inline]
    pub fn point(value: f64) -> Self {
        Self::new(value, value)
    }

    /// The smallest interval that holds both.
    #[must_use]
    #[inline]
    pub fn hull(self, other: Self) -> Self {
        Self { lo: f64::min(self.lo, other.lo), hi: f64::max(self.hi, other.hi) }
    }

    /// What both hold; `self` where they hold nothing in common.
    #[must_use]
    #[inline]
    pub fn meet(self, other: Self) -> Self {
        let (lo, hi) = (f64::max(self.lo, other.lo), f64::min(self.hi, other.hi));
        if lo <= hi { Self { lo, hi } } else { self }
    }

    /// Whether a number is inside.
    #[must_use]
    #[inline]
    pub fn holds(self, value: f64) -> bool {
        self.lo <= value && value <= self.hi
    }

    /// The middle, always inside.
    #[must_use]
    #[inline]
    pub fn mid(self) -> f64 {
        let mid = 0.5 * self.lo + 0.5 * self.hi;
        if mid.is_finite() { mid.clamp(self.lo, self.hi) } else { 0.0 }
    }

    /// `hi - lo`.
    #[must_use]
    #[inline]
    pub fn width(self) -> f64 {
        self.hi - self.lo
    }

    /// The greatest magnitude inside.
    #[must_use]
    #[inline]
    pub fn magnitude(self) -> f64 {
        f64::max(self.lo.abs(), self.hi.abs())
    }

    /// Wider by `ulps` units in the last place on both sides: for functions that are not rounded correctly.
    #[must_use]
    pub(crate) fn widened(self, ulps: u32) -> Self {
        let mut out = self;
        for _ in 0..ulps {
            out = Self { lo: down(out.lo), hi: up(out.hi) };
        }
        out
    }

    /// Times itself.
    #[must_use]
    #[inline]
    pub fn square(self) -> Self {
        let (least, most) = if self.lo >= 0.0 {
            (self.lo, self.hi)
        } else if self.hi <= 0.0 {
            (self.hi, self.lo)
        } else {
            (0.0, f64::max(-self.lo, self.hi))
        };
        let low = least * least;
        // Numbers next to zero are slow.
        Self { lo: if low == 0.0 { low } else { f64::max(down(low), 0.0) }, hi: up(most * most) }
    }
}

impl Interval {
    /// Times one number.
    #[must_use]
    #[inline]
    pub(crate) fn times(self, factor: f64) -> Self {
        if factor == 1.0 {
            return self;
        }
        let (lo, hi) = if factor >= 0.0 { (self.lo, self.hi) } else { (self.hi, self.lo) };
        Self { lo: product(lo, factor).0, hi: product(hi, factor).1 }
    }
}

impl Neg for Interval {
    type Output = Self;
    #[inline]
    fn neg(self) -> Self {
        Self { lo: -self.hi, hi: -self.lo }
    }
}

impl Add for Interval {
    type Output = Self;
    #[inline]
    fn add(self, other: Self) -> Self {
        let (lo, hi) = (self.lo + other.lo, self.hi + other.hi);
        // A sum that rounds to zero is zero.
        Self { lo: if lo == 0.0 { lo } else { down(lo) }, hi: if hi == 0.0 { hi } else { up(hi) } }
    }
}

impl Sub for Interval {
    type Output = Self;
    #[inline]
    fn sub(self, other: Self) -> Self {
        self + -other
    }
}

/// A product of ends: zero times an open end is zero, since the end itself is never reached.
#[inline]
fn product(a: f64, b: f64) -> (f64, f64) {
    if a == 0.0 || b == 0.0 {
        return (0.0, 0.0);
    }
    let exact = a * b;
    (down(exact), up(exact))
}

impl Mul for Interval {
    type Output = Self;
    #[inline]
    fn mul(self, other: Self) -> Self {
        if self.lo >= 0.0 && other.lo >= 0.0 {
            return Self { lo: product(self.lo, other.lo).0, hi: product(self.hi, other.hi).1 };
        }
        if self.hi <= 0.0 && other.lo >= 0.0 {
            return Self { lo: product(self.lo, other.hi).0, hi: product(self.hi, other.lo).1 };
        }
        if self.lo >= 0.0 && other.hi <= 0.0 {
            return Self { lo: product(self.hi, other.lo).0, hi: product(self.lo, other.hi).1 };
        }
        let ends = [
            product(self.lo, other.lo),
            product(self.lo, other.hi),
            product(self.hi, other.lo),
            product(self.hi, other.hi),
        ];
        let mut out = Self { lo: ends[0].0, hi: ends[0].1 };
        for (lo, hi) in &ends[1..] {
            out = Self { lo: f64::min(out.lo, *lo), hi: f64::max(out.hi, *hi) };
        }
        out
    }
}

impl Div for Interval {
    type Output = Self;
    #[inline]
    fn div(self, other: Self) -> Self {
        if other.lo > 0.0 {
            let lo = if self.lo >= 0.0 { self.lo / other.hi } else { self.lo / other.lo };
            let hi = if self.hi >= 0.0 { self.hi / other.lo } else { self.hi / other.hi };
            return Self {
                lo: if lo == 0.0 && self.lo == 0.0 { 0.0 } else { down(lo) },
                hi: if hi == 0.0 && self.hi == 0.0 { 0.0 } else { up(hi) },
            };
        }
        if other.hi < 0.0 {
            return -self / -other;
        }
        quotient_over_zero(self, other)
    }
}

/// A quotient whose divisor holds zero: half open where the divisor only touches it.
fn quotient_over_zero(dividend: Interval, divisor: Interval) -> Interval {
    let positive = divisor.lo == 0.0 && divisor.hi > 0.0;
    let negative = divisor.hi == 0.0 && divisor.lo < 0.0;
    let inverse = if positive {
        Interval { lo: down(1.0 / divisor.hi), hi: f64::INFINITY }
    } else if negative {
        Interval { lo: f64::NEG_INFINITY, hi: up(1.0 / divisor.lo) }
    } else {
        return Interval::ENTIRE;
    };
    // At a divisor of exactly zero nothing is defined; a dividend that holds zero may then be anything.
    if dividend.lo <= 0.0 && dividend.hi >= 0.0 { Interval::ENTIRE } else { dividend * inverse }
}
