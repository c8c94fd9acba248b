//! A number with its derivative: exact slopes of a law at a point.

use std::ops::{Add, Div, Mul, Neg, Sub};

use super::Real;
use crate::curve::Curve;
use crate::model::{Draw, Drawn};

/// A value and its derivative by the variable.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dual {
    /// The value.
    pub value: f64,
    /// The derivative.
    pub slope: f64,
}

impl Dual {
    /// The variable itself.
    #[must_use]
    #[inline]
    pub fn variable(value: f64) -> Self {
        Self { value, slope: 1.0 }
    }

    /// A function of one number by its value and derivative here.
    #[inline]
    fn chain(self, value: f64, rate: f64) -> Self {
        Self { value, slope: if self.slope == 0.0 { 0.0 } else { rate * self.slope } }
    }
}

impl Neg for Dual {
    type Output = Self;
    #[inline]
    fn neg(self) -> Self {
        Self { value: -self.value, slope: -self.slope }
    }
}

impl Add for Dual {
    type Output = Self;
    #[inline]
    fn add(self, other: Self) -> Self {
        Self { value: self.value + other.value, slope: self.slope + other.slope }
    }
}

impl Sub for Dual {
    type Output = Self;
    #[inline]
    fn sub(self, other: Self) -> Self {
        Self { value: self.value - other.value, slope: self.slope - other.slope }
    }
}

impl Mul for Dual {
    type Output = Self;
    #[inline]
    fn mul(self, other: Self) -> Self {
        Self { value: self.value * other.value, slope: self.slope * other.value + self.value * other.slope }
    }
}

impl Div for Dual {
    type Output = Self;
    #[inline]
    fn div(self, other: Self) -> Self {
        let value = self.value / other.value;
        Self { value, slope: (self.slope - value * other.slope) / other.value }
    }
}

impl Add<f64> for Dual {
    type Output = Self;
    #[inline]
    fn add(self, other: f64) -> Self {
        Self { value: self.value + other, slope: self.slope }
    }
}

impl Sub<f64> for Dual {
    type Output = Self;
    #[inline]
    fn sub(self, other: f64) -> Self {
        Self { value: self.value - other, slope: self.slope }
    }
}

impl Mul<f64> for Dual {
    type Output = Self;
    #[inline]
    fn mul(self, other: f64) -> Self {
        Self { value: self.value * other, slope: self.slope * other }
    }
}

impl Div<f64> for Dual {
    type Output = Self;
    #[inline]
    fn div(self, other: f64) -> Self {
        Self { value: self.value / other, slope: self.slope / other }
    }
}

impl Real for Dual {
    #[inline]
    fn of(value: f64) -> Self {
        Self { value, slope: 0.0 }
    }
    #[inline]
    fn square(self) -> Self {
        self * self
    }
    #[inline]
    fn sqrt(self) -> Self {
        if self.value > 0.0 {
            let root = self.value.sqrt();
            self.chain(root, 0.5 / root)
        } else {
            Self::of(0.0)
        }
    }
    fn exp(self) -> Self {
        let grown = libm::exp(self.value);
        self.chain(grown, grown)
    }
    fn ln(self) -> Self {
        self.chain(libm::log(self.value), 1.0 / self.value)
    }
    fn powf(self, exponent: f64) -> Self {
        let base = f64::max(self.value, 0.0);
        self.chain(libm::pow(base, exponent), exponent * libm::pow(base, exponent - 1.0))
    }
    fn sin(self) -> Self {
        self.chain(libm::sin(self.value), libm::cos(self.value))
    }
    fn cos(self) -> Self {
        self.chain(libm::cos(self.value), -libm::sin(self.value))
    }
    fn atan(self) -> Self {
        self.chain(libm::atan(self.value), 1.0 / (1.0 + self.value * self.value))
    }
    fn tanh(self) -> Self {
        let value = libm::tanh(self.value);
        self.chain(value, 1.0 - value * value)
    }
    #[inline]
    fn kloss(self, factor: f64) -> Self {
        let square = self.value * self.value;
        let below = square + 1.0;
        let rate = factor * (1.0 - square) / (below * below);
        Self { value: self.value * factor / below, slope: rate * self.slope }
    }
    #[inline]
    fn abs(self) -> Self {
        self.by_sign(1.0, -1.0)
    }
    #[inline]
    fn min(self, other: Self) -> Self {
        if other.value < self.value { other } else { self }
    }
    #[inline]
    fn max(self, other: Self) -> Self {
        if other.value > self.value { other } else { self }
    }
    #[inline]
    fn by_sign(self, above: f64, below: f64) -> Self {
        if self.value >= 0.0 { self * above } else { self * below }
    }
    fn piecewise(self, breaks: &[f64], piece: impl Fn(usize, Self) -> Self) -> Self {
        piece(breaks.partition_point(|b| *b <= self.value), self)
    }
    fn on(self, curve: &dyn Curve) -> Self {
        curve.dual(self)
    }
    fn drawn(draw: &dyn Draw, speed: Self, effort: Self) -> Drawn<Self> {
        draw.dual(speed, effort)
    }
}
