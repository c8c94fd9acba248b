//! Drives: `a -> b -> c`, `2 * motor -> …`, `(engine -> pto) + (motor -> belt) -> shaft`. `+` joins on one shaft
//! and binds tighter than `->`.

use chumsky::prelude::*;
use layshaft_diagnostics::Span;

use super::terms::{maybe, miss_sort, number_of, path, peek, position, take, token};
use super::{Extra, In, Input, Parsed, Rule, Sort};
use crate::token::{Token, TokenKind as K};
use crate::tree::{Chain, ChainKind};

/// More of one part than this is a slip.
const MOST: f64 = 1e6;

pub(super) fn chain<'s>() -> Rule<'s, Chain> {
    recursive(|chain| {
        let joined = station(chain)
            .separated_by(token(K::Plus))
            .at_least(1)
            .collect::<Vec<_>>()
            .map(|parts| together(parts, ChainKind::Joined));
        joined
            .separated_by(token(K::Arrow))
            .at_least(1)
            .collect::<Vec<_>>()
            .map(|parts| together(parts, ChainKind::Series))
            .boxed()
    })
    .boxed()
}

/// One part alone is itself.
fn together(mut parts: Vec<Chain>, form: impl Fn(Vec<Chain>) -> ChainKind) -> Chain {
    let span = match (parts.first(), parts.last()) {
        (Some(first), Some(last)) => first.span.cover(last.span),
        _ => Span::default(),
    };
    match parts.len() {
        1 => parts.swap_remove(0),
        _ => Chain { kind: form(parts), span },
    }
}

/// `motor`, `parts.motor`, `2 * motor`, `(a -> b)`
fn station<'s>(
    chain: impl Parser<'s, Input<'s>, Chain, Extra<'s>> + Clone + 's,
) -> impl Parser<'s, Input<'s>, Chain, Extra<'s>> + Clone {
    let path = path();
    custom(move |inp: &mut In<'s, '_>| {
        let start = inp.peek_ref().map_or(Span::default(), |token| token.span);
        let count = count(inp)?;
        match peek(inp) {
            Some(K::LeftParen) => {
                let open = take(inp, K::LeftParen)?;
                let inner = inp.parse(&chain)?;
                let close = take(inp, K::RightParen)?;
                let span = start.cover(close);
                Ok(match count {
                    Some(count) => Chain { kind: ChainKind::Times { count, inner: Box::new(inner) }, span },
                    None => Chain { kind: inner.kind, span: open.cover(close) },
                })
            }
            Some(K::Bad) => {
                inp.skip();
                Ok(Chain { kind: ChainKind::Broken, span: start })
            }
            _ => {
                let path = inp.parse(path)?;
                let span = start.cover(path.span);
                Ok(Chain { kind: ChainKind::Part { count: count.unwrap_or(1), path }, span })
            }
        }
    })
}

/// `2 *`
fn count(inp: &mut In<'_, '_>) -> Parsed<Option<u32>> {
    let Some(&Token { kind: K::Number, span }) = inp.peek_ref() else { return Ok(None) };
    let value = number_of(inp.state().shown(span), span).value;
    if !(1.0..=MOST).contains(&value) || value.fract() != 0.0 {
        return miss_sort(inp, Sort::Name);
    }
    inp.skip();
    if maybe(inp, K::Star).is_none() {
        let at = position(inp);
        inp.state().miss(at, 1 << K::Star as u8, 0);
        return Err(chumsky::error::EmptyErr::default());
    }
    Ok(Some(value as u32))
}
