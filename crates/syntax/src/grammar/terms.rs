//! The terminals: single tokens, names, numbers, units, texts.

use chumsky::prelude::*;
use layshaft_diagnostics::Span;

use super::{EmptyErr, Extra, In, Input, Parsed, Sort};
use crate::lexer::{name_text, string_text, unit_text};
use crate::token::{Token, TokenKind};
use crate::tree::{Name, Number, Path, Text, UnitText};

/// The kind of the next token, if there is one.
#[inline(always)]
pub(super) fn peek(inp: &mut In<'_, '_>) -> Option<TokenKind> {
    inp.peek_ref().map(|token| token.kind)
}

/// The kind of the token `ahead` of the next.
#[inline]
pub(super) fn peek_at(inp: &mut In<'_, '_>, ahead: usize) -> Option<TokenKind> {
    let at = position(inp) + ahead;
    inp.state().tokens.get(at).map(|token| token.kind)
}

/// The index of the next token.
#[inline(always)]
pub(super) fn position(inp: &In<'_, '_>) -> usize {
    *inp.cursor().inner()
}

/// The text of the next token.
#[inline]
pub(super) fn peek_text<'s>(inp: &mut In<'s, '_>) -> &'s str {
    let span = inp.peek_ref().map_or(Span::default(), |token| token.span);
    inp.state().shown(span)
}

#[inline]
pub(super) fn miss<T>(inp: &mut In<'_, '_>, kind: TokenKind) -> Parsed<T> {
    let at = position(inp);
    inp.state().miss(at, 1 << kind as u8, 0);
    Err(EmptyErr::default())
}

#[inline]
pub(super) fn miss_sort<T>(inp: &mut In<'_, '_>, sort: Sort) -> Parsed<T> {
    let at = position(inp);
    inp.state().miss(at, 0, sort as u32);
    Err(EmptyErr::default())
}

/// Takes the next token if it is of the kind.
#[inline(always)]
pub(super) fn take(inp: &mut In<'_, '_>, kind: TokenKind) -> Parsed<Span> {
    match inp.peek_ref() {
        Some(token) if token.kind == kind => {
            inp.skip();
            Ok(token.span)
        }
        _ => miss(inp, kind),
    }
}

/// Takes the next token if it is of the kind; says nothing otherwise.
#[inline(always)]
pub(super) fn maybe(inp: &mut In<'_, '_>, kind: TokenKind) -> Option<Span> {
    match inp.peek_ref() {
        Some(token) if token.kind == kind => {
            inp.skip();
            Some(token.span)
        }
        _ => None,
    }
}

/// A token of one kind.
pub(super) fn token<'s>(kind: TokenKind) -> impl Parser<'s, Input<'s>, Span, Extra<'s>> + Copy {
    custom(move |inp| take(inp, kind))
}

pub(super) fn take_name(inp: &mut In<'_, '_>) -> Parsed<Name> {
    match inp.peek_ref() {
        Some(&Token { kind: TokenKind::Name, span }) => {
            inp.skip();
            let text = name_text(inp.state().shown(span));
            Ok(Name { text, span })
        }
        _ => miss_sort(inp, Sort::Name),
    }
}

/// A name.
pub(super) fn name<'s>() -> impl Parser<'s, Input<'s>, Name, Extra<'s>> + Copy {
    custom(take_name)
}

pub(super) fn take_path(inp: &mut In<'_, '_>) -> Parsed<Path> {
    let first = take_name(inp)?;
    let mut span = first.span;
    let mut names = vec![first];
    while maybe(inp, TokenKind::Dot).is_some() {
        let next = take_name(inp)?;
        span = span.cover(next.span);
        names.push(next);
    }
    Ok(Path { names, span })
}

/// `a.b.c`
pub(super) fn path<'s>() -> impl Parser<'s, Input<'s>, Path, Extra<'s>> + Copy {
    custom(take_path)
}

pub(super) fn take_text(inp: &mut In<'_, '_>) -> Parsed<Text> {
    let span = take(inp, TokenKind::String)?;
    Ok(Text { value: string_text(inp.state().shown(span)), span })
}

/// A text between quotes.
pub(super) fn text<'s>() -> impl Parser<'s, Input<'s>, Text, Extra<'s>> + Copy {
    custom(take_text)
}

/// A number, with its sign where `signed` allows one.
pub(super) fn take_number(inp: &mut In<'_, '_>, signed: bool) -> Parsed<Number> {
    match inp.peek_ref() {
        Some(&Token { kind, span })
            if kind == TokenKind::Number || (signed && kind == TokenKind::SignedNumber) =>
        {
            inp.skip();
            Ok(number_of(inp.state().shown(span), span))
        }
        _ => miss(inp, TokenKind::Number),
    }
}

/// The number a token stands for. The lexer lets only numbers through that can be held.
pub(super) fn number_of(shown: &str, span: Span) -> Number {
    if shown.is_ascii() {
        return Number { value: shown.parse().unwrap_or(0.0), text: shown.into(), span };
    }
    // A minus sign outside ASCII.
    let text: String = shown.chars().map(|c| if c.is_ascii() { c } else { '-' }).collect();
    Number { value: text.parse().unwrap_or(0.0), text: text.into(), span }
}

/// A unit, where one stands.
pub(super) fn maybe_unit(inp: &mut In<'_, '_>) -> Option<UnitText> {
    let span = maybe(inp, TokenKind::Unit)?;
    Some(UnitText { text: unit_text(inp.state().shown(span)), span })
}

/// A unit.
pub(super) fn unit<'s>() -> impl Parser<'s, Input<'s>, UnitText, Extra<'s>> + Copy {
    custom(|inp| match maybe_unit(inp) {
        Some(unit) => Ok(unit),
        None => miss(inp, TokenKind::Unit),
    })
}
