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

/// A law of the size of the speed that opposes motion in either direction.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Against<L>(pub L);

impl<L: Law> Law for Against<L> {
    fn eval<R: Real>(&self, x: R) -> R {
        x.piecewise(&[0.0], |piece, x| if piece == 0 { -self.0.eval(-x) } else { self.0.eval(x) })
    }

    fn jumps(&self) -> Vec<f64> {
        let at_rest: f64 = self.0.eval(0.0);
        let middle = if at_rest == 0.0 { None } else { Some(0.0) };
        mirrored(self.0.jumps(), middle)
    }

    fn kinks(&self) -> Vec<f64> {
        mirrored(self.0.kinks(), Some(0.0))
    }
}

/// Places above zero on both sides of it, rising.
fn mirrored(mut places: Vec<f64>, middle: Option<f64>) -> Vec<f64> {
    places.retain(|x| *x > 0.0);
    places.iter().rev().map(|x| -x).chain(middle).chain(places.iter().copied()).collect()
}

/// A single whole power of the variable: `coefficient * x^power`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Monomial {
    /// The factor.
    pub coefficient: f64,
    /// 0 to 3 and beyond.
    pub power: u8,
}

impl Monomial {
    /// The one that passes through a point away from zero.
    #[must_use]
    pub fn through(power: u8, x: f64, y: f64) -> Self {
        Self { coefficient: y / libm::pow(x, f64::from(power)), power }
    }
}

impl Law for Monomial {
    fn eval<R: Real>(&self, x: R) -> R {
        let mut out = R::of(self.coefficient);
        for _ in 0..self.power / 2 {
            out = out * x.square();
        }
        if self.power % 2 == 1 { out * x } else { out }
    }
}

/// A law times a constant.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scaled<L>(pub L, pub f64);

impl<L: Law> Law for Scaled<L> {
    fn eval<R: Real>(&self, x: R) -> R {
        self.0.eval(x) * self.1
    }

    fn jumps(&self) -> Vec<f64> {
        self.0.jumps()
    }

    fn kinks(&self) -> Vec<f64> {
        self.0.kinks()
    }
}

/// A law times its variable and a constant: the power of an effort over the speed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PowerOf<L>(pub L, pub f64);

impl<L: Law> Law for PowerOf<L> {
    fn eval<R: Real>(&self, x: R) -> R {
        self.0.eval(x) * x * self.1
    }

    fn jumps(&self) -> Vec<f64> {
        self.0.jumps()
    }

    fn kinks(&self) -> Vec<f64> {
        self.0.kinks()
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
