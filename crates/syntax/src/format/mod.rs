//! The formatter: one way to write a spec.
//!
//! It works on tokens and comments, so that nothing can be lost: every token that means something and every comment
//! is written again, in its order. An item with a syntax error is copied byte for byte. What was written is taken
//! apart again and compared with what was read; should they differ, the item stays as it was.

mod atoms;
mod layout;
mod measure;
mod rows;
mod spell;

use layshaft_diagnostics::{Severity, Span};

use crate::cut::{MOST_BYTES, cut};
use crate::token::{Comment, Token, TokenKind};
use crate::tree::Item;
use atoms::{Atom, atoms};
use layout::line_ends;

/// A text in its one form.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Formatted {
    /// The text.
    pub text: String,
    /// Where items stand that were left as they are, in the text that was handed in.
    pub skipped: Vec<Span>,
}

/// A part of the text, as it was and as it is to be.
struct Piece {
    span: Span,
    text: String,
    skipped: bool,
}

/// Writes a spec in its one form: signs, blanks, lines and tables. Numbers, units and words stay the writer's. An
/// item that has a syntax error stays as it is.
#[must_use]
pub fn format(text: &str) -> Formatted {
    let pieces = pieces(text);
    let skipped = pieces.iter().filter(|piece| piece.skipped).map(|piece| piece.span).collect();
    Formatted { text: pieces.into_iter().map(|piece| piece.text).collect(), skipped }
}

/// The replacements that bring the items touched by `range` into their one form, in the order of the text; none
/// overlap. The rest of the text is not looked at.
#[must_use]
pub fn format_range(text: &str, range: Span) -> Vec<(Span, String)> {
    let touched = |piece: &Piece| piece.span.start <= range.end && range.start <= piece.span.end;
    let differs = |piece: &Piece| text.get(bytes(piece.span)) != Some(&piece.text);
    let pieces = pieces(text).into_iter().filter(|piece| !piece.skipped && touched(piece) && differs(piece));
    pieces.map(|piece| (piece.span, piece.text)).collect()
}

/// Takes the text apart into items and what stands between them; together they are the whole text.
fn pieces(text: &str) -> Vec<Piece> {
    if text.len() > MOST_BYTES {
        return vec![Piece { span: Span::new(0, text.len() as u32), text: text.to_string(), skipped: true }];
    }
    let lexed = crate::lex(text);
    let (raw, comments) = (lexed.tokens.clone(), lexed.comments.clone());
    let cut = cut(text, lexed);
    let file = crate::parse(text);
    let mut pieces: Vec<Piece> = Vec::new();
    let mut at = 0;
    for (index, item) in cut.items.iter().enumerate() {
        let span = Span::new(item.first.max(at), item.end.max(at));
        let after = pieces.last().map(|item| item.skipped);
        pieces.push(between(text, Span::new(at, span.start), &comments, after, false));
        let tokens = cut.tokens.get(item.tokens.clone()).unwrap_or_default();
        // A stray brace is no token of the item, though it stands in it.
        let whole = spoken(within(&raw, span, |token| token.span)) == spoken(tokens);
        let sound = whole && file.items.get(index).is_some_and(is_sound);
        let written = if sound { write(text, span, tokens, &comments) } else { None };
        let skipped = written.is_none();
        pieces.push(Piece { span, text: written.unwrap_or_else(|| slice(text, span).to_string()), skipped });
        at = span.end;
    }
    let after = pieces.last().map(|item| item.skipped);
    pieces.push(between(text, Span::new(at, text.len() as u32), &comments, after, true));
    pieces
}

/// How many tokens say something.
fn spoken(tokens: &[Token]) -> usize {
    tokens.iter().filter(|token| !matches!(token.kind, TokenKind::Newline | TokenKind::Semicolon)).count()
}

/// Whether an item has no syntax error.
fn is_sound(item: &Item) -> bool {
    item.tree.problems.iter().all(|problem| problem.code.row().severity != Severity::Error)
}

/// An item in its one form, or none where that would not say the same.
fn write(text: &str, span: Span, tokens: &[Token], comments: &[Comment]) -> Option<String> {
    let comments = within(comments, span, |comment| comment.span);
    let before = atoms(text, tokens, comments)?;
    let written = layout::lay_out(text, comments, &before);
    if written == slice(text, span) {
        return Some(written);
    }
    let lexed = crate::lex(&written);
    let written_comments = lexed.comments.clone();
    let again = cut(&written, lexed);
    let after = atoms(&written, &again.tokens, &written_comments)?;
    let body = |text, comment: &Comment| slice(text, comment.span).trim_end().to_string();
    let same_comments = comments.iter().map(|comment| body(text, comment));
    let same_comments = same_comments.eq(written_comments.iter().map(|comment| body(&written, comment)));
    (same_comments && again.items.len() == 1 && same(&before, &after)).then_some(written)
}

/// Whether two lists of atoms say the same.
fn same(one: &[Atom<'_>], other: &[Atom<'_>]) -> bool {
    let beside_brace = |index: usize| {
        one[index].kind == TokenKind::RightBrace || (index > 0 && one[index - 1].kind == TokenKind::LeftBrace)
    };
    let equal = |(index, (one, other)): (usize, (&Atom<'_>, &Atom<'_>))| {
        one.kind == other.kind
            && one.text == other.text
            && one.comments == other.comments
            && (one.separated == other.separated || beside_brace(index))
    };
    one.len() == other.len() && one.iter().zip(other).enumerate().all(equal)
}

/// What stands between two items: comments and empty lines. `after` says whether an item stands before it and was
/// left as it is.
fn between(text: &str, span: Span, comments: &[Comment], after: Option<bool>, last: bool) -> Piece {
    let comments = within(comments, span, |comment| comment.span);
    // A mark of the encoding at the very start stays.
    let mark = if span.start == 0 && text.starts_with('\u{feff}') { "\u{feff}" } else { "" };
    let mut out = String::from(mark);
    let mut at = span.start + mark.len() as u32;
    let mut begun = after.is_some();
    let mut readable = true;
    let lines = |from: u32, to: u32| line_ends(slice(text, Span::new(from, to)));
    for comment in comments {
        readable &= is_blank(slice(text, Span::new(at, comment.span.start)));
        if !comment.own_line && after == Some(true) {
            out.push_str(slice(text, Span::new(at, comment.span.start)));
        } else if !comment.own_line {
            out.push_str("  ");
        } else if begun {
            out.push_str(if lines(at, comment.span.start) > 1 { "\n\n" } else { "\n" });
        }
        out.push_str(slice(text, comment.span).trim_end());
        begun = true;
        at = comment.span.end;
    }
    readable &= is_blank(slice(text, Span::new(at, span.end)));
    if begun {
        let empty = !last && lines(at, span.end) > 1;
        out.push_str(if empty { "\n\n" } else { "\n" });
    }
    if !readable {
        out = slice(text, span).to_string();
    }
    Piece { span, text: out, skipped: false }
}

/// Whether nothing stands there that could be lost.
fn is_blank(text: &str) -> bool {
    text.chars().all(char::is_whitespace)
}

/// The part of a sorted list that lies within a span.
fn within<T>(list: &[T], span: Span, place: impl Fn(&T) -> Span) -> &[T] {
    let begin = list.partition_point(|one| place(one).start < span.start);
    let end = list.partition_point(|one| place(one).start < span.end);
    &list[begin..end.max(begin)]
}

fn slice(text: &str, span: Span) -> &str {
    text.get(bytes(span)).unwrap_or_default()
}

fn bytes(span: Span) -> std::ops::Range<usize> {
    span.start as usize..span.end as usize
}
