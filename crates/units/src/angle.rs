//! The angle state: how many radians a value may count, as a number, an interval, or left open.

use crate::dimension::scaled;

/// How many radians a value counts, in sixths. A torque counts −1 (newton metres per radian of turning make
/// the work), a rotational speed 1, an energy and a frequency 0; a length does not say.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Angle {
    /// Nothing says: a length may or may not stand for a length per radian.
    Free,
    /// From the first to the second number of sixths. Both are equal but where π leaves open whether it counts
    /// a turn.
    Range(i16, i16),
}

impl Angle {
    /// Exactly this many sixths.
    pub const fn exactly(sixths: i16) -> Angle {
        Angle::Range(sixths, sixths)
    }

    /// True if the state allows this many sixths.
    pub fn allows(self, sixths: i16) -> bool {
        match self {
            Angle::Free => true,
            Angle::Range(low, high) => low <= sixths && sixths <= high,
        }
    }

    /// The state of a product; `None` beyond the range of the type.
    pub(crate) fn plus(self, other: Angle) -> Option<Angle> {
        match (self, other) {
            (Angle::Range(a, b), Angle::Range(c, d)) => {
                Some(Angle::Range(a.checked_add(c)?, b.checked_add(d)?))
            }
            _ => Some(Angle::Free),
        }
    }

    /// The state of the power `num / den`; `None` if it is no whole number of sixths or beyond the range.
    pub(crate) fn times(self, num: i32, den: i32) -> Option<Angle> {
        match self {
            Angle::Free => Some(Angle::Free),
            Angle::Range(low, high) => {
                let (a, b) = (scaled(low, num, den)?, scaled(high, num, den)?);
                Some(Angle::Range(a.min(b), a.max(b)))
            }
        }
    }

    /// What both states allow; `None` if nothing.
    pub(crate) fn meet(self, other: Angle) -> Option<Angle> {
        match (self, other) {
            (Angle::Free, state) | (state, Angle::Free) => Some(state),
            (Angle::Range(a, b), Angle::Range(c, d)) => {
                let (low, high) = (a.max(c), b.min(d));
                (low <= high).then_some(Angle::Range(low, high))
            }
        }
    }
}
