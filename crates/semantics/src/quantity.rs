//! A value of the language: a quantity with its type, its limits and the unit it was written in; or a flag, a word, a text.

use layshaft_units::Type;

/// A number with its kind.
#[derive(Clone, Debug, PartialEq)]
pub struct Quantity {
    /// SI value, always finite.
    pub si: f64,
    /// Dimension, angle state, tag and scale.
    pub ty: Type,
    /// Limits from a tolerance or a range, SI, low first.
    pub limits: Option<(f64, f64)>,
    /// The confidence the limits were stated with, as a ratio.
    pub confidence: Option<f64>,
    /// The unit it was written in or is best shown in, canonical spelling.
    pub unit: Option<Box<str>>,
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
