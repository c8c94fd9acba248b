//! Tables: `points (speed [rpm], torque [N·m]) at 36 V { … }` and `csv "file" (…)`.

use chumsky::prelude::*;
use layshaft_diagnostics::Span;

use super::expr::Exprs;
use super::recover::broken_row;
use super::terms::{
    maybe, miss, miss_sort, number_of, peek, position, take, take_name, take_text, token, unit,
};
use super::{Extra, In, Input, Parsed, Sort};
use crate::token::{Token, TokenKind as K};
use crate::tree::{Column, Csv, Expr, Points, Text};

/// `points (speed [rpm], torque [N·m]) at 36 V { … }`
pub(super) fn points<'s>(
    exprs: &Exprs<'s>,
) -> impl Parser<'s, Input<'s>, Points, Extra<'s>> + Clone + use<'s> {
    token(K::Points)
        .ignore_then(head())
        .then(conditions(exprs))
        .then(rows())
        .map(|((columns, at), (rows, span))| Points { columns, at, rows, span })
}

/// `csv "file" (n as speed [rpm], Md as torque [N·m]) at 36 V`
pub(super) fn csv<'s>(exprs: &Exprs<'s>) -> impl Parser<'s, Input<'s>, Csv, Extra<'s>> + Clone + use<'s> {
    let path = custom(take_text);
    let head = custom(|inp| match peek(inp) {
        Some(K::LeftParen | K::PairParen) => Ok(()),
        _ => miss(inp, K::LeftParen),
    })
    .rewind()
    .ignore_then(head())
    .or_not();
    token(K::Csv).ignore_then(path).then(head).then(conditions(exprs)).map(|((path, columns), at)| Csv {
        path,
        columns: columns.unwrap_or_default(),
        at,
    })
}

/// `(speed [rpm], torque [N·m])`
fn head<'s>() -> impl Parser<'s, Input<'s>, Vec<Column>, Extra<'s>> + Clone {
    column()
        .separated_by(token(K::Comma))
        .at_least(1)
        .collect()
        .delimited_by(token(K::LeftParen), token(K::RightParen))
        .boxed()
}

/// `speed [rpm]`, `n as speed [rpm]`, `"n (1/min)" as speed [rpm]`
fn column<'s>() -> impl Parser<'s, Input<'s>, Column, Extra<'s>> + Clone {
    let unit = unit().delimited_by(token(K::LeftSquare), token(K::RightSquare)).or_not();
    let names = custom(|inp| {
        if peek(inp) == Some(K::String) {
            let heading = take_text(inp)?;
            take(inp, K::As)?;
            return Ok((Some(heading), take_name(inp)?));
        }
        let first = take_name(inp)?;
        if maybe(inp, K::As).is_none() {
            return Ok((None, first));
        }
        let heading = Text { value: first.text, span: first.span };
        Ok((Some(heading), take_name(inp)?))
    });
    names.then(unit).map(|((heading, name), unit)| Column { heading, name, unit })
}

/// `at 36 V, 20 °C`
fn conditions<'s>(exprs: &Exprs<'s>) -> impl Parser<'s, Input<'s>, Vec<Expr>, Extra<'s>> + Clone + use<'s> {
    let list = exprs.sum.clone().separated_by(token(K::Comma)).at_least(1).collect::<Vec<_>>();
    token(K::At).ignore_then(list).or_not().map(Option::unwrap_or_default)
}

type Rows = (Vec<Vec<(f64, Span)>>, Span);

/// The rows; a broken one is left out with a message.
fn rows<'s>() -> impl Parser<'s, Input<'s>, Rows, Extra<'s>> + Clone {
    let row = custom(row).map(Some).recover_with(via_parser(custom(broken_row).map(|()| None)));
    custom(move |inp| {
        let open = take(inp, K::LeftBrace)?;
        let mut rows = Vec::new();
        loop {
            while maybe(inp, K::Newline).is_some() || maybe(inp, K::Semicolon).is_some() {}
            match peek(inp) {
                None | Some(K::RightBrace) => break,
                _ => rows.extend(inp.parse(row)?),
            }
        }
        let close = take(inp, K::RightBrace)?;
        Ok((rows, open.cover(close)))
    })
}

/// Signed numbers parted by blanks, a minus tight to its number.
fn row(inp: &mut In<'_, '_>) -> Parsed<Vec<(f64, Span)>> {
    let mut cells = Vec::new();
    loop {
        match inp.peek_ref() {
            Some(&Token { kind: K::Number | K::SignedNumber, span }) => {
                inp.skip();
                cells.push((number_of(inp.state().shown(span), span).value, span));
            }
            Some(&Token { kind: K::Minus, span }) => cells.push(negative_cell(inp, span)?),
            Some(&Token { kind: K::Bad, .. }) => inp.skip(),
            None | Some(&Token { kind: K::Newline | K::Semicolon | K::RightBrace, .. }) => return Ok(cells),
            _ => return miss_sort(inp, Sort::Cell),
        }
    }
}

/// `-2` behind another number: the minus stands behind a blank and tight before its digits.
fn negative_cell(inp: &mut In<'_, '_>, minus: Span) -> Parsed<(f64, Span)> {
    let at = position(inp);
    let tokens = inp.state().tokens;
    let loose_before =
        at.checked_sub(1).and_then(|at| tokens.get(at)).is_none_or(|t| t.span.end < minus.start);
    match tokens.get(at + 1) {
        Some(&Token { kind: K::Number, span }) if span.start == minus.end && loose_before => {
            inp.skip();
            inp.skip();
            let value = number_of(inp.state().shown(span), span).value;
            Ok((-value, minus.cover(span)))
        }
        _ => miss_sort(inp, Sort::Cell),
    }
}
