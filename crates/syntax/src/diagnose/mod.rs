//! From a token that fits nowhere to words: what was expected here, why, and what to write instead.
//!
//! The grammar knows where it stood and what it looked for; the rules here look at the tokens around the place and
//! recognise the slip that was made. The first rule that recognises one speaks; the last always does.

mod names;
mod numbers;
mod operators;
mod places;

use layshaft_diagnostics::{Code, Span};

use crate::grammar::{Ctx, Sort, Wanted};
use crate::token::{Token, TokenKind as K};
use crate::tree::Problem;

/// What was being read.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Place {
    /// An item that begins with no declaring word, or a short declaration.
    Item,
    /// Behind the end of an item.
    Rest,
    /// The name of a `let`.
    Name,
    /// The value of a `let`.
    Let,
    /// The head of a part.
    Part,
    /// The head of a drive.
    Drive,
    /// The head of a case.
    Case,
    /// A line of a block.
    Entry,
    /// A row of a table.
    Row,
    /// A condition.
    Condition,
    /// What stands behind a condition.
    Tail,
}

/// The tokens around a place.
struct View<'a, 's> {
    ctx: &'a Ctx<'s>,
    /// The first token of the part that is given up.
    start: usize,
    /// The token that fits nowhere; may be one past the last.
    at: usize,
    place: Place,
    wanted: Wanted,
}

impl<'s> View<'_, 's> {
    /// The token `by` behind the place, before it where negative. Stays within the item.
    fn token(&self, by: isize) -> Option<Token> {
        let at = self.at.checked_add_signed(by)?;
        self.ctx.tokens.get(at).copied()
    }

    fn kind(&self, by: isize) -> Option<K> {
        self.token(by).map(|token| token.kind)
    }

    fn is(&self, by: isize, kind: K) -> bool {
        self.kind(by) == Some(kind)
    }

    fn is_number(&self, by: isize) -> bool {
        matches!(self.kind(by), Some(K::Number | K::SignedNumber))
    }

    fn text(&self, by: isize) -> &'s str {
        self.token(by).map_or("", |token| self.ctx.shown(token.span))
    }

    fn span(&self, by: isize) -> Span {
        self.token(by).map_or_else(|| self.end(), |token| token.span)
    }

    /// From one token to another.
    fn spans(&self, from: isize, to: isize) -> Span {
        self.span(from).cover(self.span(to))
    }

    /// The gap before a token.
    fn gap(&self, by: isize) -> Span {
        Span::new(self.span(by - 1).end, self.span(by).start)
    }

    /// Whether a token touches the one before it.
    fn tight(&self, by: isize) -> bool {
        self.token(by).is_some()
            && self.token(by - 1).is_some_and(|before| before.span.end == self.span(by).start)
    }

    /// The end of the last token before the place.
    fn end(&self) -> Span {
        let before = self.at.checked_sub(1).and_then(|at| self.ctx.tokens.get(at));
        before.map_or(Span::default(), |token| Span::new(token.span.end, token.span.end))
    }

    /// Whether the part at hand ends at the place.
    fn ended(&self) -> bool {
        matches!(self.kind(0), None | Some(K::Newline | K::Semicolon | K::RightBrace))
    }

    /// The tokens of the part before the place.
    fn before(&self) -> &'s [Token] {
        self.ctx.tokens.get(self.start..self.at).unwrap_or(&[])
    }

    /// Whether the value at hand begins with a group of quantities.
    fn group_stands_first(&self) -> bool {
        self.before().iter().find(|token| matches!(token.kind, K::LeftParen | K::PairParen)).map(|t| t.kind)
            == Some(K::PairParen)
    }

    /// How a message shows what stands at the place.
    fn found(&self) -> String {
        match self.kind(0) {
            None | Some(K::Newline) => "the end of the line".into(),
            Some(K::String) => "a text in quotes".into(),
            Some(_) => format!("`{}`", clipped(self.text(0))),
        }
    }

    /// The place to point at: the token, or the end of what stands before it.
    fn here(&self) -> Span {
        match self.kind(0) {
            None | Some(K::Newline) => self.end(),
            Some(_) => self.span(0),
        }
    }

    /// Whether `path … =` begins at a token: the next entry.
    fn entry_begins(&self, by: isize) -> bool {
        let mut next = by;
        if !self.is(next, K::Name) {
            return false;
        }
        next += 1;
        while next < by + 40 && self.is(next, K::Dot) && self.is(next + 1, K::Name) {
            next += 2;
        }
        self.is(next, K::Equal)
    }

    fn syntax(&self, span: Span, message: impl Into<String>) -> Problem {
        Problem::new(Code::Syntax, span, message)
    }
}

/// A text short enough for a message.
fn clipped(text: &str) -> String {
    let mut chars = text.chars();
    let head: String = chars.by_ref().take(40).collect();
    if chars.next().is_some() { format!("{head}…") } else { head }
}

/// The message for a place.
pub(crate) fn problem(ctx: &Ctx<'_>, start: usize, at: usize, place: Place) -> Problem {
    let view = View { ctx, start, at, place, wanted: ctx.wanted };
    places::run_together(&view)
        .or_else(|| numbers::rules(&view))
        .or_else(|| names::rules(&view))
        .or_else(|| operators::rules(&view))
        .or_else(|| places::rules(&view))
        .unwrap_or_else(|| generic(&view))
}

/// What was looked for, in words.
fn generic(view: &View<'_, '_>) -> Problem {
    let expected = expected(view);
    let found = view.found();
    let message = if expected.is_empty() || view.wanted.sort(Sort::End) {
        format!("{found} does not belong here")
    } else {
        format!("{} is expected here, not {found}", expected.join(" or "))
    };
    view.syntax(view.here(), message)
}

fn expected(view: &View<'_, '_>) -> Vec<String> {
    let wanted = view.wanted;
    let mut out: Vec<String> = Vec::new();
    if wanted.sort(Sort::Operand) {
        out.push("a value".into());
    }
    if wanted.sort(Sort::Name) && !wanted.sort(Sort::Operand) {
        out.push("a name".into());
    }
    if wanted.sort(Sort::Cell) {
        out.push("a number".into());
    }
    if wanted.sort(Sort::Scope) {
        out.push("`at`, `only in`, `not in` or `only where`".into());
    }
    for kind in LISTED {
        if wanted.kind(*kind) {
            out.push(kind.describe().into());
        }
    }
    out.truncate(4);
    out
}

/// The kinds of tokens that a message lists.
const LISTED: &[K] = &[
    K::Number,
    K::Unit,
    K::String,
    K::In,
    K::Where,
    K::Then,
    K::Else,
    K::With,
    K::Because,
    K::Drives,
    K::ValueWord,
    K::As,
    K::Equal,
    K::Colon,
    K::DotDot,
    K::LeftBrace,
    K::LeftParen,
    K::RightParen,
    K::RightSquare,
    K::Comma,
];

/// Whether one or two letters changed, left out, put in or swapped make `word` of `text`: one in words of four and
/// more letters, two in words of eight and more.
pub(crate) fn is_near(text: &str, word: &str) -> bool {
    let allowed = match word.len() {
        0..=3 => 0,
        4..=7 => 1,
        _ => 2,
    };
    text != word && text.is_ascii() && distance(text.as_bytes(), word.as_bytes(), allowed) <= allowed
}

/// Letters changed, left out, put in or swapped with their neighbour; anything above `limit` is `limit + 1`.
fn distance(a: &[u8], b: &[u8], limit: usize) -> usize {
    if a.len().abs_diff(b.len()) > limit {
        return limit + 1;
    }
    let mut rows = vec![vec![0; b.len() + 1]; a.len() + 1];
    for (i, row) in rows.iter_mut().enumerate() {
        row[0] = i;
    }
    for (j, cell) in rows[0].iter_mut().enumerate() {
        *cell = j;
    }
    for i in 1..=a.len() {
        for j in 1..=b.len() {
            let cost = usize::from(a[i - 1] != b[j - 1]);
            let mut best = (rows[i - 1][j] + 1).min(rows[i][j - 1] + 1).min(rows[i - 1][j - 1] + cost);
            if i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1] {
                best = best.min(rows[i - 2][j - 2] + 1);
            }
            rows[i][j] = best;
        }
    }
    rows[a.len()][b.len()]
}
