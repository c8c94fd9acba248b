//! The grammar, in `chumsky`, over the balanced tokens of one item.
//!
//! Failures carry nothing through the parser (`EmptyErr`): the state of the parse remembers the furthest token that
//! fitted nowhere and what was looked for there, which costs a comparison a miss. A broken part is recovered at the
//! next border that its rule knows (line end, `;`, brace, the next word of a `require`), and gives one message.

mod block;
mod chain;
mod compare;
mod expr;
mod item;
mod recover;
mod require;
mod table;
mod terms;
mod value;

use chumsky::error::EmptyErr;
use chumsky::input::{Checkpoint, Cursor, InputRef};
use chumsky::inspector::Inspector;
use chumsky::prelude::*;
use layshaft_diagnostics::Span;

use crate::token::{Comment, Token, TokenKind};
use crate::tree::{ItemKind, Problem};

pub(crate) use block::doc_text;
pub(crate) use item::item;

/// What the grammar reads.
pub(crate) type Input<'s> = &'s [Token];
/// How it reports and what it remembers.
pub(crate) type Extra<'s> = extra::Full<EmptyErr, Ctx<'s>, ()>;
/// The place of a parse.
type In<'s, 'p> = InputRef<'s, 'p, Input<'s>, Extra<'s>>;
/// A rule behind a pointer.
type Rule<'s, T> = Boxed<'s, 's, Input<'s>, T, Extra<'s>>;
/// The rule of an item.
pub(crate) type ItemRule<'s> = Rule<'s, ItemKind>;
type Parsed<T> = Result<T, EmptyErr>;

/// What can be looked for besides a certain token; bits of [`Wanted::sorts`].
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[repr(u32)]
pub(crate) enum Sort {
    /// Anything an expression begins with.
    Operand = 1,
    /// Anything that joins two operands.
    Operator = 2,
    /// What ends the part at hand.
    End = 4,
    /// `at`, `..`, `from` and the like behind a complete value.
    Suffix = 8,
    /// A name of the spec.
    Name = 16,
    /// A cell of a table.
    Cell = 32,
    /// A word that gives a scope: `only`, `not in`.
    Scope = 64,
}

/// What would have fitted at a place.
#[derive(Clone, Copy, Debug, Default)]
pub(crate) struct Wanted {
    /// One bit a kind of token.
    pub(crate) kinds: u128,
    /// Bits of [`Sort`].
    pub(crate) sorts: u32,
}

impl Wanted {
    pub(crate) fn sort(self, sort: Sort) -> bool {
        self.sorts & sort as u32 != 0
    }

    pub(crate) fn kind(self, kind: TokenKind) -> bool {
        self.kinds & (1 << kind as u8) != 0
    }
}

/// What one parse of an item knows and remembers.
pub(crate) struct Ctx<'s> {
    /// The text of the item; all spans of its tokens are relative to it.
    pub(crate) text: &'s str,
    /// The tokens of the item.
    pub(crate) tokens: &'s [Token],
    /// The `##` lines inside the item.
    pub(crate) docs: Vec<Comment>,
    /// Places that were reported before the grammar ran.
    pub(crate) reported: Vec<Problem>,
    /// The furthest token that fitted nowhere.
    pub(crate) missed: usize,
    /// What would have fitted there.
    pub(crate) wanted: Wanted,
    /// What the grammar found wrong.
    pub(crate) problems: Vec<Problem>,
    /// Whether `=` compares here, as in a condition.
    pub(crate) equal_compares: bool,
}

impl<'s> Ctx<'s> {
    pub(crate) fn new(
        text: &'s str,
        tokens: &'s [Token],
        docs: Vec<Comment>,
        reported: Vec<Problem>,
    ) -> Self {
        Self {
            text,
            tokens,
            docs,
            reported,
            missed: 0,
            wanted: Wanted::default(),
            problems: Vec::new(),
            equal_compares: false,
        }
    }

    /// Notes that the token at `at` did not fit.
    #[inline]
    fn miss(&mut self, at: usize, kinds: u128, sorts: u32) {
        if at > self.missed {
            self.missed = at;
            self.wanted = Wanted { kinds, sorts };
        } else if at == self.missed {
            self.wanted.kinds |= kinds;
            self.wanted.sorts |= sorts;
        }
    }

    /// The text of a span.
    pub(crate) fn shown(&self, span: Span) -> &'s str {
        self.text.get(span.start as usize..span.end as usize).unwrap_or("")
    }

    /// Where the token before `at` ends: the place of something that is missing.
    fn place_before(&self, at: usize) -> Span {
        let end = at.checked_sub(1).and_then(|at| self.tokens.get(at)).map_or(0, |token| token.span.end);
        Span::new(end, end)
    }
}

/// Problems found on a way that is given up are taken back with it.
impl<'s> Inspector<'s, Input<'s>> for Ctx<'s> {
    type Checkpoint = (usize, bool);

    #[inline(always)]
    fn on_token(&mut self, _: &Token) {}

    #[inline(always)]
    fn on_save<'parse>(&self, _: &Cursor<'s, 'parse, Input<'s>>) -> Self::Checkpoint {
        (self.problems.len(), self.equal_compares)
    }

    #[inline(always)]
    fn on_rewind<'parse>(&mut self, marker: &Checkpoint<'s, 'parse, Input<'s>, Self::Checkpoint>) {
        let (problems, equal_compares) = *marker.inspector();
        self.problems.truncate(problems);
        self.equal_compares = equal_compares;
    }
}
