//! Slips with names.

use layshaft_diagnostics::Code;

use super::{Place, View};
use crate::grammar::Sort;
use crate::token::{Token, TokenKind as K};
use crate::tree::Problem;
use crate::words::word_kind;

pub(super) fn rules(view: &View<'_, '_>) -> Option<Problem> {
    several_words(view).or_else(|| reserved(view)).or_else(|| quoted(view)).or_else(|| number(view))
}

/// Whether a name is set at the place, not used.
const fn names_something(place: Place) -> bool {
    matches!(place, Place::Name | Place::Part | Place::Drive | Place::Case | Place::Entry)
}

/// `low-battery`, `low battery`
fn several_words(view: &View<'_, '_>) -> Option<Problem> {
    if !names_something(view.place) || view.at <= view.start {
        return None;
    }
    let tokens = view.ctx.tokens.get(view.start..)?;
    let mut length = 1;
    if tokens.first()?.kind != K::Name {
        return None;
    }
    loop {
        match (tokens.get(length).map(|t| t.kind), tokens.get(length + 1).map(|t| t.kind)) {
            (Some(K::Minus), Some(K::Name | K::Number)) => length += 2,
            (Some(K::Name), _) => length += 1,
            _ => break,
        }
    }
    let run = &tokens[..length];
    let behind = tokens.get(length).map(|token| token.kind);
    let set = matches!(behind, Some(K::Equal | K::Colon | K::LeftBrace));
    if length < 2 || view.at >= view.start + length || !set || entry_is_missed(view, run) {
        return None;
    }
    // `source motor dc_motor {`: a colon is missing, not a low line.
    if view.place == Place::Part && behind == Some(K::LeftBrace) && !run.iter().any(|t| t.kind == K::Minus) {
        return None;
    }
    let words: Vec<&str> =
        run.iter().filter(|t| t.kind != K::Minus).map(|t| view.ctx.shown(t.span)).collect();
    let joined = words.join("_");
    let span = run.first()?.span.cover(run.last()?.span);
    let problem = Problem::new(Code::BadName, span, "a name is one word: its parts are joined by `_`");
    Some(problem.fix(format!("write `{joined}`"), span, joined))
}

/// Two lines run together are no name: the second begins behind a line end only.
fn entry_is_missed(view: &View<'_, '_>, run: &[Token]) -> bool {
    view.place == Place::Entry && run.iter().any(|token| token.kind == K::Newline)
}

/// A word of the language where a name is wanted.
fn reserved(view: &View<'_, '_>) -> Option<Problem> {
    let kind = view.kind(0)?;
    if !view.wanted.sort(Sort::Name) || view.wanted.sort(Sort::Operand) || !kind.is_reserved() {
        return None;
    }
    let word = view.text(0);
    let message = format!("`{word}` is a word of the language and cannot be a name");
    let problem = Problem::new(Code::BadName, view.span(0), message);
    let sets =
        names_something(view.place) && matches!(view.kind(1), Some(K::Equal | K::Colon | K::LeftBrace));
    let single = word.strip_suffix('s').filter(|_| kind == K::Points);
    Some(match single {
        Some(single) => problem.fix(format!("write `{single}`"), view.span(0), single),
        None if sets => problem.fix(format!("write `{word}_`"), view.span(0), format!("{word}_")),
        None => problem,
    })
}

/// `let "x" = 5`
fn quoted(view: &View<'_, '_>) -> Option<Problem> {
    let wanted = view.wanted.sort(Sort::Name) && !view.wanted.sort(Sort::Operand);
    if !view.is(0, K::String) || !wanted || !names_something(view.place) {
        return None;
    }
    let inner = view.text(0).trim_matches('"');
    let problem = Problem::new(Code::BadName, view.span(0), "a name stands without quotes");
    let is_name = inner.chars().all(|c| c.is_alphanumeric() || c == '_')
        && inner.chars().next().is_some_and(char::is_alphabetic)
        && !word_kind(inner).is_some_and(K::is_reserved);
    Some(if is_name { problem.fix(format!("write `{inner}`"), view.span(0), inner) } else { problem })
}

/// `let 2nd_gear = …`
fn number(view: &View<'_, '_>) -> Option<Problem> {
    let wanted = view.wanted.sort(Sort::Name) && !view.wanted.sort(Sort::Operand);
    if !view.is(0, K::Number) || !wanted || view.at != view.start || !names_something(view.place) {
        return None;
    }
    let tight = view.tight(1) && matches!(view.kind(1), Some(K::Name | K::Unit));
    let span = if tight { view.spans(0, 1) } else { view.span(0) };
    Some(Problem::new(Code::BadName, span, "a name begins with a letter"))
}
