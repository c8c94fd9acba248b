//! Comparisons: one, or two that point the same way (`3 m/s <= v <= 4 m/s`).

use chumsky::prelude::*;

use super::terms::miss_sort;
use super::{Extra, In, Input, Rule, Sort};
use crate::token::TokenKind as K;
use crate::tree::{CompareOp, Expr, ExprKind};

pub(super) fn comparison<'s>(sum: Rule<'s, Expr>) -> impl Parser<'s, Input<'s>, Expr, Extra<'s>> + Clone {
    custom(move |inp| {
        let first = inp.parse(&sum)?;
        let mut rest = Vec::new();
        let mut span = first.span;
        while let Some(op) = operator(inp) {
            if !rest.last().is_none_or(|(before, _, _): &(CompareOp, _, Expr)| same_way(*before, op))
                || rest.len() == 2
            {
                return miss_sort(inp, Sort::End);
            }
            let Some(&token) = inp.peek_ref() else { break };
            inp.skip();
            let operand = inp.parse(&sum)?;
            span = span.cover(operand.span);
            rest.push((op, token.span, operand));
        }
        if rest.is_empty() {
            return Ok(first);
        }
        Ok(Expr { kind: ExprKind::Compare { first: Box::new(first), rest }, span })
    })
}

fn operator(inp: &mut In<'_, '_>) -> Option<CompareOp> {
    Some(match inp.peek_ref()?.kind {
        K::Less => CompareOp::Less,
        K::LessEqual => CompareOp::LessEqual,
        K::Greater => CompareOp::Greater,
        K::GreaterEqual => CompareOp::GreaterEqual,
        K::EqualEqual => CompareOp::Equal,
        K::NotEqual => CompareOp::NotEqual,
        K::Equal if inp.state().equal_compares => CompareOp::Equal,
        _ => return None,
    })
}

/// Whether two comparisons make a band.
const fn same_way(first: CompareOp, second: CompareOp) -> bool {
    use CompareOp as C;
    match first {
        C::Less | C::LessEqual => matches!(second, C::Less | C::LessEqual),
        C::Greater | C::GreaterEqual => matches!(second, C::Greater | C::GreaterEqual),
        C::Equal | C::NotEqual => false,
    }
}
