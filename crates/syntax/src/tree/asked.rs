//! Drives, and what is asked of them: at which speed, in which cases.

use layshaft_diagnostics::Span;

use super::{Block, Entry, Name, Path, Value};

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
