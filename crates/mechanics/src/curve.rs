//! Curves over speed: a law written once for all numbers, and the same as an object.

use crate::scalar::{Dual, Enclosure, Real};

/// A law of one variable, usually an effort over a speed.
///
/// It must answer for every finite argument, below zero too, and be continuous but for the places it names.
pub trait Law: Send + Sync {
    /// The law at a number of any kind.
    fn eval<R: Real>(&self, x: R) -> R;

    /// Places where the value jumps; exactly the breaks at which pieces do not meet.
    fn jumps(&self) -> Vec<f64> {
        Vec::new()
    }

    /// Places where the slope jumps: only to integrate faster, may be left out.
    fn kinks(&self) -> Vec<f64> {
        Vec::new()
    }
}

/// A law as an object.
pub trait Curve: Send + Sync {
    /// The value at a point.
    fn at(&self, x: f64) -> f64;
    /// Bounds over a range.
    fn over(&self, x: Enclosure) -> Enclosure;
    /// Value and slope at a point.
    fn dual(&self, x: Dual) -> Dual;
    /// Places where the value jumps.
    fn jumps(&self) -> Vec<f64>;
    /// Places where the slope jumps.
    fn kinks(&self) -> Vec<f64>;
}

impl<L: Law> Curve for L {
    fn at(&self, x: f64) -> f64 {
        self.eval(x)
    }
    fn over(&self, x: Enclosure) -> Enclosure {
        self.eval(x)
    }
    fn dual(&self, x: Dual) -> Dual {
        self.eval(x)
    }
    fn jumps(&self) -> Vec<f64> {
        Law::jumps(self)
    }
    fn kinks(&self) -> Vec<f64> {
        Law::kinks(self)
    }
}

/// The same value everywhere.
#[derive(Clone, Copy, Debug)]
pub struct Constant(pub f64);

impl Law for Constant {
    fn eval<R: Real>(&self, _: R) -> R {
        R::of(self.0)
    }
}

/// A straight line: `at_zero + slope * x`.
#[derive(Clone, Copy, Debug)]
pub struct Line {
    /// Value at 0.
    pub at_zero: f64,
    /// Rise per unit.
    pub slope: f64,
}

impl Law for Line {
    fn eval<R: Real>(&self, x: R) -> R {
        x * self.slope + self.at_zero
    }
}
