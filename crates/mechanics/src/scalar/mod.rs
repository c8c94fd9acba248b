//! The numbers a law is evaluated in: plain `f64`, an [`Enclosure`] that bounds a law over a whole range, or a
//! [`Dual`] that carries a derivative.
//!
//! A law is written once, generic over [`Real`]. What must stay true: an enclosure contains the value and the
//! slope of the law at every point of the range it stands for, whatever the rounding. That is what lets the
//! solver say "no operating point here" and mean it.

mod dual;
mod enclosure;
mod interval;

use std::fmt::Debug;
use std::ops::{Add, Div, Mul, Neg, Sub};

use crate::curve::Curve;
use crate::model::{Draw, Drawn};

pub use dual::Dual;
pub use enclosure::Enclosure;
pub use interval::Interval;

/// A number in which laws are evaluated.
///
/// Kinks and cases are written with [`min`](Real::min), [`max`](Real::max), [`abs`](Real::abs),
/// [`by_sign`](Real::by_sign) and [`piecewise`](Real::piecewise), never with an `if` on a value: an enclosure has
/// to take all branches its range overlaps.
pub trait Real:
    Copy
    + Debug
    + Add<Output = Self>
    + Sub<Output = Self>
    + Mul<Output = Self>
    + Div<Output = Self>
    + Neg<Output = Self>
    + Add<f64, Output = Self>
    + Sub<f64, Output = Self>
    + Mul<f64, Output = Self>
    + Div<f64, Output = Self>
{
    /// A constant.
    fn of(value: f64) -> Self;
    /// Its square; tighter than `x * x` in an enclosure.
    fn square(self) -> Self;
    /// Square root; 0 for arguments below 0.
    fn sqrt(self) -> Self;
    /// e to this power.
    fn exp(self) -> Self;
    /// Natural logarithm; the argument must be above 0.
    fn ln(self) -> Self;
    /// This number, which must not be below 0, to a constant power.
    fn powf(self, exponent: f64) -> Self;
    /// Sine of an angle in rad.
    fn sin(self) -> Self;
    /// Cosine of an angle in rad.
    fn cos(self) -> Self;
    /// Arc tangent in rad.
    fn atan(self) -> Self;
    /// Hyperbolic tangent.
    fn tanh(self) -> Self;
    /// `factor * self / (self² + 1)`, the curve of Kloss's formula; bounded without slack in an enclosure, where the
    /// quotient written out takes numerator and denominator for strangers.
    #[inline]
    fn kloss(self, factor: f64) -> Self {
        self * factor / (self.square() + 1.0)
    }
    /// Magnitude.
    fn abs(self) -> Self;
    /// The smaller of two.
    fn min(self, other: Self) -> Self;
    /// The greater of two.
    fn max(self, other: Self) -> Self;
    /// `self * above` where it is not below 0, `self * below` where it is: losses by the direction of power.
    fn by_sign(self, above: f64, below: f64) -> Self;
    /// Piece `0` below `breaks[0]`, piece `i` from `breaks[i - 1]` on, the last from the last break on. `breaks`
    /// rises. Where the pieces do not meet, the law must name the break in [`Law::jumps`](crate::curve::Law::jumps).
    fn piecewise(self, breaks: &[f64], piece: impl Fn(usize, Self) -> Self) -> Self;
    /// A curve at this number.
    fn on(self, curve: &dyn Curve) -> Self;
    /// What a machine draws at a speed and an effort.
    fn drawn(draw: &dyn Draw, speed: Self, effort: Self) -> Drawn<Self>;
}

impl Real for f64 {
    #[inline]
    fn of(value: f64) -> Self {
        value
    }
    #[inline]
    fn square(self) -> Self {
        self * self
    }
    #[inline]
    fn sqrt(self) -> Self {
        if self > 0.0 { f64::sqrt(self) } else { 0.0 }
    }
    fn exp(self) -> Self {
        libm::exp(self)
    }
    fn ln(self) -> Self {
        libm::log(self)
    }
    fn powf(self, exponent: f64) -> Self {
        libm::pow(f64::max(self, 0.0), exponent)
    }
    fn sin(self) -> Self {
        libm::sin(self)
    }
    fn cos(self) -> Self {
        libm::cos(self)
    }
    fn atan(self) -> Self {
        libm::atan(self)
    }
    fn tanh(self) -> Self {
        libm::tanh(self)
    }
    #[inline]
    fn abs(self) -> Self {
        f64::abs(self)
    }
    #[inline]
    fn min(self, other: Self) -> Self {
        f64::min(self, other)
    }
    #[inline]
    fn max(self, other: Self) -> Self {
        f64::max(self, other)
    }
    #[inline]
    fn by_sign(self, above: f64, below: f64) -> Self {
        if self >= 0.0 { self * above } else { self * below }
    }
    fn piecewise(self, breaks: &[f64], piece: impl Fn(usize, Self) -> Self) -> Self {
        piece(breaks.partition_point(|b| *b <= self), self)
    }
    fn on(self, curve: &dyn Curve) -> Self {
        curve.at(self)
    }
    fn drawn(draw: &dyn Draw, speed: Self, effort: Self) -> Drawn<Self> {
        draw.at(speed, effort)
    }
}

#[cfg(test)]
mod tests;
