//! A value as a reader sees it, with everything a machine wants beside it.

use layshaft_mechanics::solution::Marks;
use layshaft_semantics::quantity::{Datum, Quantity};

use crate::number;
use crate::unit::{convert, kind_of, of_difference, usual_unit};

/// A number as it is shown.
#[derive(Clone, Debug, PartialEq)]
pub struct Number {
    /// SI value.
    pub si: f64,
    /// Kind of `layshaft_units::KINDS`, where one names it.
    pub kind: Option<&'static str>,
    /// The unit it is shown in; empty for a plain number.
    pub unit: String,
    /// The value in that unit.
    pub value: f64,
    /// The number alone: `14.90`.
    pub digits: String,
    /// Number and unit, with its limits where it has some: `14.90 m/min`, `12 ± 0.5 N·m`.
    pub text: String,
    /// Limits of a tolerance or a range, SI, low first.
    pub limits: Option<(f64, f64)>,
    /// What a reader must know of it.
    pub marks: Marks,
}

impl Number {
    /// An SI value of a kind in a unit, with `significant` digits.
    #[must_use]
    pub fn computed(si: f64, kind: &'static str, unit: &str, significant: usize) -> Self {
        let value = convert(si, unit);
        let digits = if unit == "%" { number::percent(si) } else { number::digits(value, significant) };
        let text = joined(&digits, unit);
        Self {
            si,
            kind: Some(kind),
            unit: unit.into(),
            value,
            digits,
            text,
            limits: None,
            marks: Marks::default(),
        }
    }

    /// The same with marks.
    #[must_use]
    pub fn marked(mut self, marks: Marks) -> Self {
        self.marks = marks;
        self
    }
}

/// A value as it is shown.
#[derive(Clone, Debug, PartialEq)]
pub enum Shown {
    /// A number.
    Number(Box<Number>),
    /// Yes or no.
    Flag(bool),
    /// A choice.
    Word(String),
    /// A text of the author's; not harmless yet.
    Text(String),
}

impl Shown {
    /// The text; one of the author's is not harmless yet.
    #[must_use]
    pub fn text(&self) -> &str {
        match self {
            Self::Number(number) => &number.text,
            Self::Flag(flag) => yes_or_no(*flag),
            Self::Word(word) => word,
            Self::Text(text) => text,
        }
    }
}

/// The language's own words for a flag.
#[must_use]
pub const fn yes_or_no(flag: bool) -> &'static str {
    if flag { "yes" } else { "no" }
}

/// A value of the spec as it is shown: in the unit it was written in, with the digits it was written with.
#[must_use]
pub fn shown(datum: &Datum) -> Shown {
    match datum {
        Datum::Quantity(quantity) => Shown::Number(Box::new(quantity_number(quantity, None))),
        Datum::Flag(flag) => Shown::Flag(*flag),
        Datum::Word(word) => Shown::Word(word.to_string()),
        Datum::Text(text) => Shown::Text(text.to_string()),
    }
}

/// A result as it is shown, with `significant` digits, in its own unit, else in `unit`, else in the usual one.
#[must_use]
pub fn result(datum: &Datum, unit: Option<&str>, significant: usize) -> Shown {
    match datum {
        Datum::Quantity(quantity) => {
            let unit = quantity.unit.as_deref().or(unit).map(str::to_owned);
            let quantity = Quantity { unit: unit.map(Into::into), ..quantity.clone() };
            Shown::Number(Box::new(quantity_number(&quantity, Some(significant))))
        }
        other => shown(other),
    }
}

/// The unit a quantity is shown in.
#[must_use]
pub fn unit_of(quantity: &Quantity) -> String {
    if let Some(unit) = &quantity.unit {
        return unit.to_string();
    }
    match kind_of(&quantity.ty) {
        Some(kind) => usual_unit(kind.name, [quantity.si]),
        None => quantity.ty.si_unit(),
    }
}

fn quantity_number(quantity: &Quantity, significant: Option<usize>) -> Number {
    let unit = unit_of(quantity);
    let write = |value: f64| match significant {
        Some(_) if unit == "%" => number::percent(value / 100.0),
        Some(n) => number::digits(value, n),
        None => number::written(value),
    };
    let value = convert(quantity.si, &unit);
    let digits = write(value);
    let text = match quantity.limits {
        Some(limits) if quantity.is_range => range(limits, &unit),
        Some(limits) => with_limits(&digits, value, limits, &unit),
        None => joined(&digits, &unit),
    };
    Number {
        si: quantity.si,
        kind: kind_of(&quantity.ty).map(|kind| kind.name),
        unit,
        value,
        digits,
        text,
        limits: quantity.limits,
        marks: Marks::default(),
    }
}

/// `50 rpm .. 90 rpm`
fn range((low, high): (f64, f64), unit: &str) -> String {
    let end = |si: f64| joined(&number::written(convert(si, unit)), unit);
    format!("{} .. {}", end(low), end(high))
}

/// `12 ± 0.5 N·m`, `74 % ± 4 points`, `12 (11 .. 14) N·m` where the limits are not equally far.
fn with_limits(digits: &str, value: f64, limits: (f64, f64), unit: &str) -> String {
    let (low, high) = (convert(limits.0, unit), convert(limits.1, unit));
    let (below, above) = (value - low, high - value);
    let span = (high - low).abs();
    if span == 0.0 {
        return joined(digits, unit);
    }
    if (below - above).abs() > 1e-9 * span.max(value.abs()) {
        let range = format!("({} .. {})", number::written(low), number::written(high));
        return joined(&format!("{digits} {range}"), unit);
    }
    let half = number::written(span / 2.0);
    match unit {
        "%" | "‰" => format!("{digits} {unit} ± {half} points"),
        "°C" | "°F" => format!("{digits} {unit} ± {half} {}", of_difference(unit)),
        _ => joined(&format!("{digits} ± {half}"), unit),
    }
}

/// Number and unit.
#[must_use]
pub fn joined(digits: &str, unit: &str) -> String {
    if unit.is_empty() { digits.to_string() } else { format!("{digits} {unit}") }
}
