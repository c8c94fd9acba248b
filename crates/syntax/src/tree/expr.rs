//! Expressions: quantities, paths, operators.

use layshaft_diagnostics::Span;

use super::{Name, Path};

/// A number as written, its sign included.
#[derive(Clone, Debug, PartialEq)]
pub struct Number {
    /// Its value.
    pub value: f64,
    /// As written, sign included, without unit.
    pub text: Box<str>,
    /// Where, without unit.
    pub span: Span,
}

/// A unit as written (after folding to one spelling of signs: `·`, `^`, `µ` …).
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct UnitText {
    /// The text handed to `layshaft_units::parse_unit`.
    pub text: Box<str>,
    /// Where.
    pub span: Span,
}

/// An expression.
#[derive(Clone, Debug)]
pub struct Expr {
    /// What it is.
    pub kind: ExprKind,
    /// Where.
    pub span: Span,
}

/// The forms of an expression.
#[derive(Clone, Debug)]
pub enum ExprKind {
    /// `15 km/h`, `4`, `-20 °C`
    Quantity {
        /// The number.
        number: Number,
        /// Its unit.
        unit: Option<UnitText>,
    },
    /// `"text"`
    Text(Box<str>),
    /// `yes`, `true`, `no`, `false`
    Flag(bool),
    /// A name, field or result; a choice such as `reverse` too.
    Path(Path),
    /// `max(a, b)`
    Call {
        /// The function.
        function: Name,
        /// The arguments.
        args: Vec<Expr>,
    },
    /// `-a`, `not a`
    Unary {
        /// The operator.
        op: UnaryOp,
        /// The operand.
        arg: Box<Expr>,
    },
    /// `a + b`, `a and b`
    Binary {
        /// The operator.
        op: BinaryOp,
        /// Where it stands.
        op_span: Span,
        /// Left.
        left: Box<Expr>,
        /// Right.
        right: Box<Expr>,
    },
    /// `a ^ b`, `a²`
    Power {
        /// The base.
        base: Box<Expr>,
        /// The exponent (for `²` a number).
        exponent: Box<Expr>,
    },
    /// `a < b`, `a <= b <= c`
    Compare {
        /// The first operand.
        first: Box<Expr>,
        /// One or two operators with what follows each.
        rest: Vec<(CompareOp, Span, Expr)>,
    },
    /// `if a then b else c`
    If {
        /// The condition.
        condition: Box<Expr>,
        /// Taken where it holds.
        then: Box<Expr>,
        /// Taken where not.
        otherwise: Box<Expr>,
    },
    /// `x ± t`, `x ± 4 points`, `x ± 4 % of value`, `x ± t confidence 95 %`
    Tolerance {
        /// The value.
        value: Box<Expr>,
        /// The tolerance.
        tolerance: Box<Expr>,
        /// How it is meant.
        form: ToleranceForm,
        /// `confidence 95 %`
        confidence: Option<Box<Expr>>,
    },
    /// `x within lo .. hi`
    Within {
        /// The value.
        value: Box<Expr>,
        /// The low end.
        low: Box<Expr>,
        /// The high end.
        high: Box<Expr>,
    },
    /// `rated` in `2.3 × rated`
    Rated,
    /// `( … )`
    Paren(Box<Expr>),
    /// Not readable; a problem says why.
    Broken,
}

/// How a tolerance is meant.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ToleranceForm {
    /// As its unit says.
    Plain,
    /// `± 4 points` of a percentage.
    Points,
    /// `± 4 % of value`
    OfValue,
}

/// An operator with one operand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum UnaryOp {
    /// `-`
    Minus,
    /// `not`
    Not,
}

/// An operator with two operands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum BinaryOp {
    /// `+`
    Add,
    /// `-`
    Subtract,
    /// `*`, `×`, `·`
    Multiply,
    /// `/`
    Divide,
    /// `and`
    And,
    /// `or`
    Or,
}

/// A comparison.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum CompareOp {
    /// `<`
    Less,
    /// `<=`
    LessEqual,
    /// `>`
    Greater,
    /// `>=`
    GreaterEqual,
    /// `==`, and `=` in a condition
    Equal,
    /// `!=`
    NotEqual,
}
