//! A value of the language: a quantity with its type, its limits and the unit it was written in; or a flag, a word, a text.

use std::sync::Arc;

use layshaft_units::Type;

/// A number with its kind.
#[derive(Clone, Debug, PartialEq)]
pub struct Quantity {
    /// SI value: finite in every analysis; infinite for a result that grows above every limit. Within the evaluation
    /// alone, not a number for a value that is unknown though its kind is known.
    pub si: f64,
    /// Dimension, angle state, tag and scale.
    pub ty: Type,
    /// Limits from a tolerance or a range, SI, low first.
    pub limits: Option<(f64, f64)>,
    /// Whether it was written as a range, `50 rpm .. 90 rpm`: its middle is then nobody's value.
    pub is_range: bool,
    /// The confidence the limits were stated with, as a ratio.
    pub confidence: Option<f64>,
    /// The unit it was written in or is best shown in, canonical spelling.
    pub unit: Option<Arc<str>>,
}

impl Quantity {
    /// A quantity of a known kind whose value is not to be had; the reason has been reported.
    pub(crate) fn unknown(ty: Type) -> Self {
        Self { si: f64::NAN, ty, limits: None, is_range: false, confidence: None, unit: None }
    }

    /// Whether there is a value.
    pub(crate) fn is_known(&self) -> bool {
        !self.si.is_nan()
    }
}

/// A value.
#[derive(Clone, Debug, PartialEq)]
pub enum Datum {
    /// A quantity or plain number.
    Quantity(Quantity),
    /// Yes or no.
    Flag(bool),
    /// A choice: `reverse`, `motoring`.
    Word(Box<str>),
    /// A text.
    Text(Box<str>),
}

impl Datum {
    /// The value, unless only its kind is known.
    pub(crate) fn known(self) -> Option<Self> {
        match self {
            Self::Quantity(quantity) if !quantity.is_known() => None,
            datum => Some(datum),
        }
    }
}
