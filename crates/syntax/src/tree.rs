//! The tree of a spec.
//!
//! Every span inside an [`ItemTree`] is relative to the start of its item, so a tree depends on the text of its
//! item alone and can be shared between two states of a file (and kept in a memo by that text).

use std::sync::Arc;

use layshaft_diagnostics::{Code, Span};

/// A whole file: its items in the order of the text.
#[derive(Clone, Debug, Default)]
pub struct File {
    /// The items.
    pub items: Vec<Item>,
    /// What is wrong with the text outside every item (encoding, size, unreadable characters), file offsets.
    pub problems: Vec<Problem>,
    /// The documentation of the file itself: the `##` block above `title` or followed by a blank line.
    pub docs: Vec<Text>,
}

/// One item where it stands.
#[derive(Clone, Debug)]
pub struct Item {
    /// Offset of the item's first byte in the file.
    pub offset: u32,
    /// The item's tree; equal for equal item texts.
    pub tree: Arc<ItemTree>,
}

/// The tree of one item, independent of its place.
#[derive(Clone, Debug)]
pub struct ItemTree {
    /// The bytes of the item that mean something, from its first word (its `##` lines excluded) to its last.
    pub span: Span,
    /// Its `##` lines.
    pub docs: Vec<Text>,
    /// What it declares; `Broken` where not even that could be read.
    pub kind: ItemKind,
    /// What is wrong in it.
    pub problems: Vec<Problem>,
}

/// A finding of the lexer or the grammar.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Problem {
    /// The code of the finding.
    pub code: Code,
    /// Where, relative to the item (or to the file for a problem of the file).
    pub span: Span,
    /// What is wrong.
    pub message: String,
    /// A second place and its words, such as the bracket that was opened.
    pub related: Option<(Span, String)>,
    /// What to write instead, in words.
    pub help: Option<String>,
    /// Offers to mend it: a title and replacements.
    pub fixes: Vec<(String, Vec<(Span, String)>)>,
}

/// A name as written, in normal form C. An empty one stands where a name is missing, which was reported: nothing is
/// to be said of it again.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Name {
    /// The name.
    pub text: Box<str>,
    /// Where.
    pub span: Span,
}

/// A text between quotes (or of a `##` line), its escapes resolved.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Text {
    /// The text.
    pub value: Box<str>,
    /// Where, the quotes included.
    pub span: Span,
}

/// `a.b.c`
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Path {
    /// At least one name.
    pub names: Vec<Name>,
    /// From the first to the last name.
    pub span: Span,
}

/// What an item declares.
#[derive(Clone, Debug)]
#[allow(clippy::large_enum_variant, reason = "items live behind an Arc, one each")]
pub enum ItemKind {
    /// `language 1`
    Language(Number),
    /// `title "…"`
    Title(Text),
    /// `revision "…"`
    Revision(Text),
    /// `use "path" as name`
    Use {
        /// The path as written.
        path: Text,
        /// The name its declarations are reached by; the file's stem without one.
        alias: Option<Name>,
    },
    /// `let name: kind = value`
    Let {
        /// The name.
        name: Name,
        /// The kind it is settled to.
        kind: Option<Name>,
        /// The value.
        value: Value,
    },
    /// `source name: kind { … }` or `source name = base with { … }`
    Part {
        /// The word of the declaration.
        role: RoleWord,
        /// Its place.
        role_span: Span,
        /// The name.
        name: Name,
        /// Kind or base.
        base: PartBase,
        /// The fields.
        block: Block,
    },
    /// `drive name = chain { … }`
    Drive {
        /// The name.
        name: Name,
        /// The parts from the sources to the loads.
        chain: Chain,
        /// The settings.
        block: Option<Block>,
    },
    /// `case name { … }`, `case name = a + b with { … }`
    Case {
        /// The name.
        name: Name,
        /// The cases it is composed of.
        bases: Vec<Name>,
        /// What it overrides; every key is a path of at least two names.
        block: Option<Block>,
    },
    /// `require "clause" condition …`
    Require {
        /// The clause it stands for.
        clause: Text,
        /// The condition.
        condition: Expr,
        /// `at ride.speed = 15 km/h`, `at ride.speed = 10 km/h .. 20 km/h`
        at: Option<At>,
        /// `probability 95 %`
        probability: Option<Expr>,
        /// `only in …`, `not in …`, `only where …`
        scopes: Vec<Scope>,
    },
    /// `show value as unit`
    Show {
        /// What is shown.
        value: Expr,
        /// In which unit.
        unit: Option<UnitText>,
        /// At a stated speed.
        at: Option<At>,
        /// In which cases.
        scopes: Vec<Scope>,
    },
    /// `allow code because "reason"`
    Allow(Allow),
    /// Words of a later language: `duty`, `vary`, `determine`, kept so that they are named in the message.
    Later(Name),
    /// Not readable; the problems say why.
    Broken,
}

/// `allow code because "reason"`
#[derive(Clone, Debug)]
pub struct Allow {
    /// The code, its hyphens included.
    pub code: Name,
    /// The reason.
    pub because: Text,
    /// The whole.
    pub span: Span,
}

/// The word that declares a part.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum RoleWord {
    /// `supply`
    Supply,
    /// `source`
    Source,
    /// `transmission`
    Transmission,
    /// `load`
    Load,
}

/// What a part is made of.
#[derive(Clone, Debug)]
pub enum PartBase {
    /// `: kind`
    Kind(Name),
    /// `= base with`
    Variant(Path),
}

/// `{ … }`
#[derive(Clone, Debug, Default)]
pub struct Block {
    /// The entries that could be read.
    pub entries: Vec<Entry>,
    /// `allow` lines inside.
    pub allows: Vec<Allow>,
    /// Braces included.
    pub span: Span,
}

/// `path = value`, or `gear 1 = reduction 14.5`
#[derive(Clone, Debug)]
pub struct Entry {
    /// `##` lines above.
    pub docs: Vec<Text>,
    /// The key. `gear 1` has the path `gear` and the member `1`.
    pub key: Path,
    /// The `1` of `gear 1`, the name in `gear low`.
    pub member: Option<Name>,
    /// The value; `Missing` where the line is half typed.
    pub value: Value,
    /// The whole.
    pub span: Span,
}

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

/// A chain or tree of parts.
#[derive(Clone, Debug)]
pub struct Chain {
    /// What it is.
    pub kind: ChainKind,
    /// Where.
    pub span: Span,
}

/// The forms of a chain.
#[derive(Clone, Debug)]
pub enum ChainKind {
    /// A part, several times with `2 * motor`.
    Part {
        /// How many; 1 without a count.
        count: u32,
        /// The part, `parts.motor` for one of a used file.
        path: Path,
    },
    /// `2 * (motor -> gear)`
    Times {
        /// How many.
        count: u32,
        /// Of what.
        inner: Box<Chain>,
    },
    /// `a -> b -> c`
    Series(Vec<Chain>),
    /// `a + b`: on one shaft at one speed.
    Joined(Vec<Chain>),
    /// Not readable.
    Broken,
}

/// `at ride.speed = 15 km/h`
#[derive(Clone, Debug)]
pub struct At {
    /// Which speed.
    pub path: Path,
    /// One value or a range.
    pub value: Value,
    /// From `at` on.
    pub span: Span,
}

/// In which cases something is asked.
#[derive(Clone, Debug)]
pub struct Scope {
    /// How.
    pub kind: ScopeKind,
    /// The whole.
    pub span: Span,
}

/// The forms of a scope.
#[derive(Clone, Debug)]
#[allow(clippy::large_enum_variant, reason = "few stand in a spec, and each is read once")]
pub enum ScopeKind {
    /// `only in a, b`
    OnlyIn(Vec<CaseRef>),
    /// `not in a, b`
    NotIn(Vec<CaseRef>),
    /// `only where lift.direction = forward`
    OnlyWhere(Entry),
}

/// A case by name: `ramp`, `ramp[1]`, `corner[360 V, reverse]`, `plain with { … }`.
#[derive(Clone, Debug)]
pub struct CaseRef {
    /// The name; `plain` is the spec without case.
    pub name: Name,
    /// The members between brackets; each an expression, compared with the values of `each`.
    pub members: Vec<Value>,
    /// `with { … }`: the same with some more changed.
    pub with: Option<Block>,
    /// The whole.
    pub span: Span,
}

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
