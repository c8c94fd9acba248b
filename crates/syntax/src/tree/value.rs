//! Values: what can stand behind `=`, and where it comes from.

use layshaft_diagnostics::Span;

use super::{Expr, Name, Text, UnitText};

/// A value with its basis.
#[derive(Clone, Debug)]
pub struct Value {
    /// What stands there.
    pub kind: ValueKind,
    /// `from "…"`, `measured "…"`, `assumed "…"`
    pub basis: Option<Basis>,
    /// The value without its basis.
    pub span: Span,
}

/// Where a value comes from.
#[derive(Clone, Debug)]
pub struct Basis {
    /// The word.
    pub word: BasisWord,
    /// What follows it.
    pub text: Text,
    /// Word and text.
    pub span: Span,
}

/// The word of a basis.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum BasisWord {
    /// `from`: a document.
    From,
    /// `measured`: a measurement.
    Measured,
    /// `assumed`: nobody knows better yet.
    Assumed,
}

/// What can stand as a value.
#[derive(Clone, Debug)]
pub enum ValueKind {
    /// An expression.
    Expr(Expr),
    /// `lo .. hi`; `unit` of a bare low end is taken from the high end by the resolver.
    Range {
        /// The low end.
        low: Expr,
        /// The high end.
        high: Expr,
    },
    /// `each a, b, c`: in a case.
    Each(Vec<Value>),
    /// `(1.2 N·m at 2850 rpm, 13.0 A), (…)` or one group without brackets: `5.6 kW at 980 rpm`.
    Pairs(Vec<Pair>),
    /// `points (speed [rpm], torque [N·m]) at 36 V { … }`
    Points(Points),
    /// `csv "file" (n as speed [rpm], Md as torque [N·m]) at 36 V`
    Csv(Csv),
    /// `42 drives 18`
    Teeth {
        /// Teeth (or diameter) of the driving wheel.
        driver: Expr,
        /// Teeth (or diameter) of the driven wheel.
        driven: Expr,
    },
    /// `reduction 14.5`, `increase 2`: the value of a named gear.
    Ratio {
        /// `reduction` or `increase`.
        word: Name,
        /// The number.
        value: Expr,
    },
    /// `S3 40 %`, `S1`, `S2 30 min`
    Duty {
        /// `S1` … `S10`.
        word: Name,
        /// The number behind it.
        value: Option<Expr>,
    },
    /// `absent`: takes a field away in a variant.
    Absent,
    /// Nothing readable; a problem says why.
    Missing,
}

/// Quantities that belong together: `1.2 N·m at 2850 rpm, 13.0 A`.
#[derive(Clone, Debug)]
pub struct Pair {
    /// The quantities, in order; the second is the one behind `at`.
    pub values: Vec<Expr>,
    /// The whole.
    pub span: Span,
}

/// A column of a table.
#[derive(Clone, Debug)]
pub struct Column {
    /// The heading in a CSV file (`n as speed`), else the same as `name`.
    pub heading: Option<Text>,
    /// What the column is.
    pub name: Name,
    /// Its unit; none for plain numbers.
    pub unit: Option<UnitText>,
}

/// A table in the text.
#[derive(Clone, Debug)]
pub struct Points {
    /// The columns.
    pub columns: Vec<Column>,
    /// The conditions it was taken in: `at 36 V, 20 °C`.
    pub at: Vec<Expr>,
    /// The rows: signed numbers with their places.
    pub rows: Vec<Vec<(f64, Span)>>,
    /// The rows' braces.
    pub span: Span,
}

/// A table in a file.
#[derive(Clone, Debug)]
pub struct Csv {
    /// The path as written.
    pub path: Text,
    /// The columns; empty: the file's headings are taken as they are.
    pub columns: Vec<Column>,
    /// The conditions it was taken in.
    pub at: Vec<Expr>,
}
