//! Recovery: each broken part ends at the next border its rule knows, with one message.

use layshaft_diagnostics::{Code, Span};

use super::block::{Line, key, some_name};
use super::require::ends_condition;
use super::terms::{maybe, peek, peek_at, peek_text, position, take_path};
use super::value::span_since;
use super::{Ctx, In, Parsed};
use crate::diagnose::{self, Place};
use crate::token::TokenKind as K;
use crate::tree::{
    Chain, ChainKind, Entry, Expr, ExprKind, ItemKind, Name, PartBase, Problem, Value, ValueKind,
};
use crate::words::{DECLARATION_WORDS, word_kind};

impl Ctx<'_> {
    /// One message for the tokens from `start` up to `stop`, unless something among them was reported already.
    fn fail(&mut self, start: usize, stop: usize, place: Place) {
        let at = self.missed.clamp(start, stop.max(start));
        let from = self.tokens.get(start).map_or(0, |token| token.span.start);
        let to = match stop.checked_sub(1).and_then(|last| self.tokens.get(last)) {
            Some(last) if stop > start => last.span.end,
            _ => from,
        };
        let known = |problem: &Problem| problem.span.start <= to && problem.span.end >= from;
        let unreadable = self.tokens.get(start..stop).unwrap_or(&[]).iter().any(|token| token.kind == K::Bad);
        if unreadable || self.reported.iter().any(known) {
            return;
        }
        let problem = diagnose::problem(self, start, at, place);
        self.problems.push(problem);
    }
}

/// Passes over tokens, brackets whole, up to a border; at least one.
fn skip_to(inp: &mut In<'_, '_>, border: impl Fn(&mut In<'_, '_>, K) -> bool) {
    let mut depth = 0_usize;
    while let Some(kind) = peek(inp) {
        match kind {
            _ if depth == 0 && border(inp, kind) => return,
            K::LeftParen | K::PairParen | K::LeftSquare | K::LeftBrace => depth += 1,
            K::RightParen | K::RightSquare | K::RightBrace => depth = depth.saturating_sub(1),
            _ => {}
        }
        inp.skip();
    }
}

const fn ends_entry(kind: K) -> bool {
    matches!(kind, K::Newline | K::Semicolon | K::RightBrace)
}

/// A line of a block that cannot be read: its key is kept where it has one.
pub(super) fn broken_entry(inp: &mut In<'_, '_>) -> Parsed<Line> {
    let start = position(inp);
    let before = inp.save();
    let missed = (inp.state().missed, inp.state().wanted);
    let head = key(inp).ok().filter(|(_, member)| {
        // `x: 5` and `x 5`: only the sign is wrong.
        let meant = member.is_some() || peek(inp) == Some(K::Colon);
        maybe(inp, K::Equal).is_some() || meant
    });
    // Looking for the key again must not change what was missed.
    (inp.state().missed, inp.state().wanted) = missed;
    let behind_key = position(inp);
    if head.is_none() {
        inp.rewind(before);
    }
    skip_to(inp, |_, kind| ends_entry(kind));
    let stop = position(inp);
    if stop == start {
        inp.skip();
    }
    inp.state().fail(start, stop, Place::Entry);
    let Some((key, member)) = head else { return Ok(Line::Nothing) };
    let value = missing_value(inp, behind_key);
    let span = span_since(inp, start);
    let docs = super::block::docs_above(inp.state(), span.start);
    Ok(Line::Entry(Entry { docs, key, member, value, span }))
}

fn missing_value(inp: &mut In<'_, '_>, start: usize) -> Value {
    Value { kind: ValueKind::Missing, basis: None, span: span_since(inp, start) }
}

/// A row of a table that cannot be read.
pub(super) fn broken_row(inp: &mut In<'_, '_>) -> Parsed<()> {
    let start = position(inp);
    skip_to(inp, |_, kind| ends_entry(kind));
    let stop = position(inp);
    if stop == start {
        inp.skip();
    }
    inp.state().fail(start, stop, Place::Row);
    Ok(())
}

/// A condition that cannot be read, up to the words behind it.
pub(super) fn broken_condition(inp: &mut In<'_, '_>) -> Parsed<Expr> {
    let start = position(inp);
    skip_to(inp, |inp, _| ends_condition(inp));
    let stop = position(inp);
    inp.state().fail(start, stop, Place::Condition);
    Ok(Expr { kind: ExprKind::Broken, span: span_since(inp, start) })
}

/// A word behind a condition with something unreadable, up to the next such word.
pub(super) fn broken_tail(inp: &mut In<'_, '_>) -> Parsed<()> {
    let start = position(inp);
    inp.skip();
    skip_to(inp, |inp, _| ends_condition(inp));
    let stop = position(inp);
    inp.state().fail(start, stop, Place::Tail);
    Ok(())
}

/// `at … at …`, `as … as …`
pub(super) fn said_twice(inp: &mut In<'_, '_>, start: usize) {
    let ctx = inp.state();
    let Some(word) = ctx.tokens.get(start).map(|token| token.span) else { return };
    let message = format!("`{}` is said twice", ctx.shown(word));
    ctx.problems.push(Problem::new(Code::Syntax, word, message));
}

/// A value that cannot be read, up to the end of its item.
pub(super) fn broken_value(inp: &mut In<'_, '_>) -> Parsed<Value> {
    let start = position(inp);
    skip_to(inp, |_, _| false);
    let stop = position(inp);
    // Without `=` the whole `let` was reported.
    let set =
        start.checked_sub(1).and_then(|at| inp.state().tokens.get(at)).is_some_and(|t| t.kind == K::Equal);
    if set {
        inp.state().fail(start, stop, Place::Let);
    }
    Ok(missing_value(inp, start))
}

/// The name that was meant by `low-battery` or `low battery`, or an empty one.
fn meant_name(inp: &mut In<'_, '_>) -> Name {
    let Some(first) = some_name(inp) else {
        let at = position(inp);
        return Name { text: "".into(), span: inp.state().place_before(at) };
    };
    let mut text = String::from(first.text);
    let mut span = first.span;
    loop {
        let next = match peek(inp) {
            Some(K::Minus) if peek_at(inp, 1) == Some(K::Name) => 1,
            Some(K::Name) => 0,
            _ => break,
        };
        for _ in 0..next {
            inp.skip();
        }
        let Some(part) = some_name(inp) else { break };
        text.push('_');
        text.push_str(&part.text);
        span = span.cover(part.span);
    }
    Name { text: text.into(), span }
}

/// The head of a `let`, up to its `=`.
pub(super) fn broken_let(inp: &mut In<'_, '_>) -> Parsed<Name> {
    let start = position(inp);
    let name = meant_name(inp);
    skip_to(inp, |_, kind| kind == K::Equal);
    maybe(inp, K::Equal);
    let stop = position(inp);
    inp.state().fail(start, stop, Place::Name);
    Ok(name)
}

/// The head of a part, up to its block.
pub(super) fn broken_part(inp: &mut In<'_, '_>) -> Parsed<(Name, PartBase)> {
    let start = position(inp);
    // `source motor dc_motor {`: the colon is missing.
    let colonless = peek_at(inp, 1) == Some(K::Name) && matches!(peek_at(inp, 2), None | Some(K::LeftBrace));
    let name = if colonless { some_name(inp).unwrap_or_else(|| nameless(inp)) } else { meant_name(inp) };
    let base = match peek(inp) {
        Some(K::Name) if colonless => some_name(inp).map(PartBase::Kind),
        Some(K::Equal) => {
            inp.skip();
            take_path(inp).ok().map(PartBase::Variant)
        }
        Some(K::Colon) => {
            inp.skip();
            some_name(inp).map(PartBase::Kind)
        }
        _ => None,
    };
    let base = base.unwrap_or_else(|| PartBase::Kind(nameless(inp)));
    to_block(inp, start, Place::Part);
    Ok((name, base))
}

fn nameless(inp: &mut In<'_, '_>) -> Name {
    let at = position(inp);
    Name { text: "".into(), span: inp.state().place_before(at) }
}

/// Passes over what stands before a block, with a message.
fn to_block(inp: &mut In<'_, '_>, start: usize, place: Place) {
    skip_to(inp, |_, kind| kind == K::LeftBrace);
    let stop = position(inp);
    inp.state().fail(start, stop, place);
}

/// The head of a drive, up to its block.
pub(super) fn broken_chain(inp: &mut In<'_, '_>) -> Parsed<(Name, Chain)> {
    let start = position(inp);
    let name = meant_name(inp);
    maybe(inp, K::Equal);
    let first = position(inp);
    to_block(inp, start, Place::Drive);
    let span = span_since(inp, first);
    Ok((name, Chain { kind: ChainKind::Broken, span }))
}

/// The head of a case, up to its block.
pub(super) fn broken_case(inp: &mut In<'_, '_>) -> Parsed<(Name, Vec<Name>)> {
    let start = position(inp);
    let name = meant_name(inp);
    let mut bases = Vec::new();
    if maybe(inp, K::Equal).is_some() {
        bases.extend(some_name(inp));
        while maybe(inp, K::Plus).is_some() {
            bases.extend(some_name(inp));
        }
    }
    to_block(inp, start, Place::Case);
    Ok((name, bases))
}

/// An item that cannot be read at all.
pub(super) fn broken_start(inp: &mut In<'_, '_>) -> Parsed<ItemKind> {
    let start = position(inp);
    let known = misspelt(inp).is_some();
    skip_to(inp, |_, _| false);
    let stop = position(inp);
    if !known {
        inp.state().fail(start, stop, Place::Item);
    }
    Ok(ItemKind::Broken)
}

/// Something behind the end of an item.
pub(super) fn broken_rest(inp: &mut In<'_, '_>) -> Parsed<()> {
    let start = position(inp);
    skip_to(inp, |_, _| false);
    let stop = position(inp);
    if inp.state().problems.is_empty() {
        inp.state().fail(start, stop, Place::Rest);
    }
    Ok(())
}

/// A first word that is one letter or two away from a declaring word and stands where one would: it is reported and
/// read as that word, so that what it declares is known.
pub(super) fn misspelt(inp: &mut In<'_, '_>) -> Option<K> {
    if peek(inp) != Some(K::Name) || !matches!(peek_at(inp, 1), Some(K::Name | K::String)) {
        return None;
    }
    let text = peek_text(inp);
    let word = DECLARATION_WORDS.iter().map(|row| row.word).find(|word| diagnose::is_near(text, word))?;
    let span = inp.peek_ref().map_or(Span::default(), |token| token.span);
    let problem = Problem::new(Code::Syntax, span, format!("`{text}` declares nothing"))
        .help(format!("`{word}` may be meant"))
        .fix(format!("write `{word}`"), span, word);
    inp.state().problems.push(problem);
    word_kind(word)
}
