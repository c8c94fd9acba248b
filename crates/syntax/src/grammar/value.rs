//! What can stand as a value: expressions, ranges, pairs, lists of cases, tables, teeth, ratios, duties; and where
//! it comes from.

use chumsky::prelude::*;
use layshaft_diagnostics::Span;

use super::expr::{Exprs, quantity};
use super::table::{csv, points};
use super::terms::{maybe, miss, peek, peek_at, peek_text, position, take, take_name, take_text};
use super::{Extra, In, Input, Parsed, Rule, Sort};
use crate::token::TokenKind as K;
use crate::tree::{Basis, BasisWord, BinaryOp, Expr, ExprKind, Pair, UnaryOp, Value, ValueKind};

/// A value with its basis.
pub(super) fn value<'s>(exprs: &Exprs<'s>) -> Rule<'s, Value> {
    let choice = choice(exprs);
    let points = points(exprs).boxed();
    let csv = csv(exprs).boxed();
    let exprs = exprs.clone();
    custom(move |inp| {
        let start = position(inp);
        let kind = match peek(inp) {
            Some(K::Each) => each(inp, &choice)?,
            Some(K::Points) => ValueKind::Points(inp.parse(&points)?),
            Some(K::Csv) => ValueKind::Csv(inp.parse(&csv)?),
            Some(K::Absent) => {
                inp.skip();
                ValueKind::Absent
            }
            Some(K::PairParen) => {
                let mut pairs = vec![group(inp, &exprs)?];
                while maybe(inp, K::Comma).is_some() {
                    pairs.push(group(inp, &exprs)?);
                }
                ValueKind::Pairs(pairs)
            }
            _ => plain(inp, &exprs, true)?,
        };
        let span = span_since(inp, start);
        let basis = basis(inp)?;
        Ok(Value { kind, basis, span })
    })
    .boxed()
}

/// One of several cases: behind `each` and between the brackets of a case's name.
pub(super) fn choice<'s>(exprs: &Exprs<'s>) -> Rule<'s, Value> {
    let exprs = exprs.clone();
    custom(move |inp| {
        let start = position(inp);
        let kind = match peek(inp) {
            Some(K::PairParen) => ValueKind::Pairs(vec![group(inp, &exprs)?]),
            _ => plain(inp, &exprs, false)?,
        };
        Ok(Value { kind, basis: None, span: span_since(inp, start) })
    })
    .boxed()
}

/// The span of the tokens taken since `start`.
pub(super) fn span_since(inp: &mut In<'_, '_>, start: usize) -> Span {
    let end = position(inp);
    let tokens = inp.state().tokens;
    match (tokens.get(start), end.checked_sub(1).and_then(|last| tokens.get(last))) {
        (Some(first), Some(last)) if start < end => first.span.cover(last.span),
        _ => inp.state().place_before(start),
    }
}

/// `each a, b, c`
fn each<'s>(inp: &mut In<'s, '_>, choice: &Rule<'s, Value>) -> Parsed<ValueKind> {
    take(inp, K::Each)?;
    let mut values = vec![inp.parse(choice)?];
    while maybe(inp, K::Comma).is_some() {
        values.push(inp.parse(choice)?);
    }
    Ok(ValueKind::Each(values))
}

/// `(1.2 N·m at 2850 rpm, 13.0 A)`
fn group<'s>(inp: &mut In<'s, '_>, exprs: &Exprs<'s>) -> Parsed<Pair> {
    let open = take(inp, K::PairParen)?;
    let first = inp.parse(&exprs.sum)?;
    if maybe(inp, K::At).is_none() {
        take(inp, K::Comma)?;
    }
    let mut values = vec![first, inp.parse(&exprs.sum)?];
    while maybe(inp, K::Comma).is_some() {
        values.push(inp.parse(&exprs.sum)?);
    }
    let close = take(inp, K::RightParen)?;
    Ok(Pair { values, span: open.cover(close) })
}

/// An expression and what may stand behind it. A pair without brackets may go on behind a comma where `commas`
/// allows it, as no list is open.
fn plain<'s>(inp: &mut In<'s, '_>, exprs: &Exprs<'s>, commas: bool) -> Parsed<ValueKind> {
    if peek(inp) == Some(K::Name)
        && let Some(kind) = named_number(inp, exprs)?
    {
        return Ok(kind);
    }
    let first = inp.parse(&exprs.condition)?;
    match peek(inp) {
        Some(K::DotDot | K::At | K::Drives) if !is_sum(&first) => not_at_end(inp),
        Some(K::DotDot) => {
            inp.skip();
            let high = inp.parse(&exprs.sum)?;
            Ok(ValueKind::Range { low: first, high })
        }
        Some(K::At) => {
            inp.skip();
            let mut span = first.span;
            let mut values = vec![first, inp.parse(&exprs.sum)?];
            while commas && maybe(inp, K::Comma).is_some() {
                values.push(inp.parse(&exprs.sum)?);
            }
            if let Some(last) = values.last() {
                span = span.cover(last.span);
            }
            Ok(ValueKind::Pairs(vec![Pair { values, span }]))
        }
        Some(K::Drives) => {
            inp.skip();
            let driven = inp.parse(&exprs.sum)?;
            Ok(ValueKind::Teeth { driver: first, driven })
        }
        _ => {
            let at = position(inp);
            inp.state().miss(at, 0, Sort::Suffix as u32);
            Ok(ValueKind::Expr(first))
        }
    }
}

/// Whether an expression may stand on the left of `..`, `at` and `drives`, as it may on the right.
const fn is_sum(expr: &Expr) -> bool {
    use BinaryOp as B;
    !matches!(
        expr.kind,
        ExprKind::If { .. }
            | ExprKind::Compare { .. }
            | ExprKind::Unary { op: UnaryOp::Not, .. }
            | ExprKind::Binary { op: B::And | B::Or, .. }
    )
}

/// `reduction 14.5`, `increase 2`, `teeth 42 drives 18`, `S3 40 %`, `S1`
fn named_number<'s>(inp: &mut In<'s, '_>, exprs: &Exprs<'s>) -> Parsed<Option<ValueKind>> {
    let behind = peek_at(inp, 1);
    let text = peek_text(inp);
    let number = matches!(behind, Some(K::Number | K::SignedNumber));
    match text {
        "reduction" | "increase" if number || matches!(behind, Some(K::Name | K::Bad)) => {
            let word = take_name(inp)?;
            let value = inp.parse(&exprs.sum)?;
            Ok(Some(ValueKind::Ratio { word, value }))
        }
        "teeth" if number || behind == Some(K::Name) => {
            inp.skip();
            let driver = inp.parse(&exprs.sum)?;
            take(inp, K::Drives)?;
            let driven = inp.parse(&exprs.sum)?;
            Ok(Some(ValueKind::Teeth { driver, driven }))
        }
        _ if is_duty(text) && (number || behind.is_none_or(ends_value)) => {
            let word = take_name(inp)?;
            let value = if number { Some(quantity(inp)?) } else { None };
            Ok(Some(ValueKind::Duty { word, value }))
        }
        _ => Ok(None),
    }
}

/// `S1` … `S10`
fn is_duty(text: &str) -> bool {
    matches!(text, "S1" | "S2" | "S3" | "S4" | "S5" | "S6" | "S7" | "S8" | "S9" | "S10")
}

const fn ends_value(kind: K) -> bool {
    matches!(
        kind,
        K::Newline
            | K::Semicolon
            | K::RightBrace
            | K::RightSquare
            | K::Comma
            | K::From
            | K::Measured
            | K::Assumed
    )
}

/// `from "…"`, `measured "…"`, `assumed "…"`
fn basis(inp: &mut In<'_, '_>) -> Parsed<Option<Basis>> {
    let Some(&token) = inp.peek_ref() else { return Ok(None) };
    let word = match token.kind {
        K::From => BasisWord::From,
        K::Measured => BasisWord::Measured,
        K::Assumed => BasisWord::Assumed,
        _ => {
            let at = position(inp);
            inp.state().miss(at, 0, Sort::Suffix as u32);
            return Ok(None);
        }
    };
    inp.skip();
    let text = take_text(inp)?;
    let span = token.span.cover(text.span);
    Ok(Some(Basis { word, text, span }))
}

/// `15 km/h`, `15 km/h .. 25 km/h`: the speeds a criterion is asked at.
pub(super) fn speeds<'s>(
    exprs: &Exprs<'s>,
) -> impl Parser<'s, Input<'s>, Value, Extra<'s>> + Clone + use<'s> {
    let sum = exprs.sum.clone();
    let range = custom(|inp| take(inp, K::DotDot)).ignore_then(sum.clone()).or_not();
    sum.then(range).map(|(low, high): (Expr, Option<Expr>)| match high {
        Some(high) => {
            Value { span: low.span.cover(high.span), kind: ValueKind::Range { low, high }, basis: None }
        }
        None => Value { span: low.span, kind: ValueKind::Expr(low), basis: None },
    })
}

/// Fails at the next token, as nothing may follow here.
pub(super) fn not_at_end<T>(inp: &mut In<'_, '_>) -> Parsed<T> {
    let at = position(inp);
    inp.state().miss(at, 0, Sort::End as u32);
    miss(inp, K::Newline)
}
