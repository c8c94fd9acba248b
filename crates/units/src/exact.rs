//! Exact conversion factors: a fraction of whole numbers times a power of π, rounded once, at the end.

use std::f64::consts::PI;

/// Beyond this the arithmetic gives up and the factor is multiplied out in floating point.
const LIMIT: u128 = 1 << 120;

/// Bits of a whole number that a double holds.
const MANTISSA: u32 = 53;

/// A factor `num / den · π^pi`.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Exact {
    num: u128,
    den: u128,
    pi: i32,
}

const fn common(mut a: u128, mut b: u128) -> u128 {
    // Nearly all factors are whole or the inverse of whole; division of long numbers is slow.
    if a == 1 || b == 1 {
        return 1;
    }
    while b != 0 {
        (a, b) = (b, a % b);
    }
    a
}

impl Exact {
    pub(crate) const ONE: Exact = Exact::new(1, 1);

    /// `num / den`, for the table; `den` is not 0.
    pub(crate) const fn new(num: u128, den: u128) -> Exact {
        let divisor = common(num, den);
        Exact { num: num / divisor, den: den / divisor, pi: 0 }
    }

    /// `10^exponent`.
    pub(crate) const fn power_of_ten(exponent: i32) -> Exact {
        let power = 10_u128.pow(exponent.unsigned_abs());
        if exponent < 0 { Exact::new(1, power) } else { Exact::new(power, 1) }
    }

    /// `num / den · π`.
    pub(crate) const fn of_pi(num: u128, den: u128) -> Exact {
        Exact { pi: 1, ..Exact::new(num, den) }
    }

    /// The product of two rows of the table, worked out while compiling.
    pub(crate) const fn times(self, other: Exact) -> Exact {
        Exact { pi: self.pi + other.pi, ..Exact::new(self.num * other.num, self.den * other.den) }
    }

    /// The quotient of two rows of the table, worked out while compiling.
    pub(crate) const fn over(self, other: Exact) -> Exact {
        self.times(Exact { num: other.den, den: other.num, pi: -other.pi })
    }

    /// The product, unless its whole numbers grow beyond bounds.
    pub(crate) fn product(self, other: Exact) -> Option<Exact> {
        // Across, so that the numbers stay small.
        let (left, right) = (common(self.num, other.den), common(other.num, self.den));
        let num = (self.num / left).checked_mul(other.num / right)?;
        let den = (self.den / right).checked_mul(other.den / left)?;
        (num < LIMIT && den < LIMIT).then_some(Exact { num, den, pi: self.pi.checked_add(other.pi)? })
    }

    /// The whole power, unless its whole numbers grow beyond bounds.
    pub(crate) fn power(self, exponent: i32) -> Option<Exact> {
        if exponent == 1 {
            return Some(self);
        }
        let base = if exponent < 0 {
            Exact { num: self.den, den: self.num, pi: self.pi.checked_neg()? }
        } else {
            self
        };
        (0..exponent.unsigned_abs()).try_fold(Exact::ONE, |power, _| power.product(base))
    }

    /// The nearest double; exact to the last bit if no π takes part.
    pub(crate) fn value(self) -> f64 {
        if self.pi == 0 {
            return quotient(self.num, self.den);
        }
        let turns = (0..self.pi.unsigned_abs()).fold(1.0, |power, _| power * PI);
        if self.num >> MANTISSA != 0 || self.den >> MANTISSA != 0 {
            let plain = quotient(self.num, self.den);
            return if self.pi > 0 { plain * turns } else { plain / turns };
        }
        let (num, den) = (self.num as f64, self.den as f64);
        if self.pi > 0 { num * turns / den } else { num / (den * turns) }
    }
}

/// `num / den`, rounded once. Both are below [`LIMIT`].
fn quotient(num: u128, den: u128) -> f64 {
    if num >> MANTISSA == 0 && den >> MANTISSA == 0 {
        return num as f64 / den as f64;
    }
    let (mut whole, mut rest) = (num / den, num % den);
    let mut scale = 1.0;
    // Long division in binary until the quotient has more bits than a double, the last standing for the rest.
    while whole >> (MANTISSA + 3) == 0 {
        rest *= 2;
        whole = whole * 2 + u128::from(rest >= den);
        rest %= den;
        scale *= 0.5;
    }
    (whole | u128::from(rest != 0)) as f64 * scale
}

#[cfg(test)]
mod tests {
    use super::{Exact, quotient};

    #[test]
    fn rounds_once() {
        assert_eq!(quotient(1, 3), 1.0 / 3.0);
        assert_eq!(Exact::new(37_284_993_579_113_511, 50_000_000_000_000).value(), 745.699_871_582_270_2);
        assert_eq!(Exact::new(8_896_443_230_521, 1_290_320_000).value(), 6_894.757_293_168_362);
        // One third of a number too long for a double, from exact arithmetic.
        assert_eq!(quotient((1 << 100) + 1, 3), 422_550_200_076_076_467_165_567_735_125.3);
    }

    #[test]
    fn gives_up_instead_of_overflowing() {
        assert_eq!(Exact::power_of_ten(12).power(4), None);
        assert_eq!(Exact::power_of_ten(12).power(-4), None);
        assert_eq!(Exact::power_of_ten(12).power(2), Some(Exact::power_of_ten(24)));
    }
}
