//! What is asked: `require` and `show`, at which speed and in which cases.

use chumsky::prelude::*;

use super::expr::{Exprs, quantity};
use super::recover::{broken_condition, broken_tail};
use super::terms::{
    maybe, miss, miss_sort, peek, peek_at, position, take, take_name, take_path, text, token, unit,
};
use super::value::{choice, span_since, speeds};
use super::{Extra, In, Input, Parsed, Rule, Sort};
use crate::token::TokenKind as K;
use crate::tree::{At, Block, CaseRef, Entry, Expr, ItemKind, Scope, ScopeKind, UnitText, Value};

/// Behind the condition, in any order.
#[derive(Default)]
struct Tail {
    unit: Option<UnitText>,
    at: Option<At>,
    probability: Option<Expr>,
    scopes: Vec<Scope>,
}

/// One part of a tail.
enum Part {
    Unit(UnitText),
    At(At),
    Probability(Expr),
    Scope(Scope),
}

/// `require "clause" condition …`
pub(super) fn require<'s>(exprs: &Exprs<'s>, block: Rule<'s, Block>) -> Rule<'s, ItemKind> {
    text()
        .then(condition(exprs))
        .then(tail(exprs, block, false))
        .map(|((clause, condition), tail)| ItemKind::Require {
            clause,
            condition,
            at: tail.at,
            probability: tail.probability,
            scopes: tail.scopes,
        })
        .boxed()
}

/// `show value as unit …`
pub(super) fn show<'s>(exprs: &Exprs<'s>, block: Rule<'s, Block>) -> Rule<'s, ItemKind> {
    condition(exprs)
        .then(tail(exprs, block, true))
        .map(|(value, tail)| ItemKind::Show { value, unit: tail.unit, at: tail.at, scopes: tail.scopes })
        .boxed()
}

/// A condition, in which `=` compares.
fn condition<'s>(exprs: &Exprs<'s>) -> impl Parser<'s, Input<'s>, Expr, Extra<'s>> + Clone + use<'s> {
    let condition = exprs.condition.clone();
    custom(move |inp: &mut In<'s, '_>| {
        inp.state().equal_compares = true;
        let parsed = inp.parse(&condition);
        inp.state().equal_compares = false;
        let parsed = parsed?;
        if ends_condition(inp) { Ok(parsed) } else { miss_sort(inp, Sort::Scope) }
    })
    .recover_with(via_parser(custom(broken_condition)))
}

/// Whether the next token begins the tail or there is none.
pub(super) fn ends_condition(inp: &mut In<'_, '_>) -> bool {
    match peek(inp) {
        None | Some(K::At | K::Only | K::Probability | K::As) => true,
        Some(K::Not) => peek_at(inp, 1) == Some(K::In),
        _ => false,
    }
}

fn tail<'s>(
    exprs: &Exprs<'s>,
    block: Rule<'s, Block>,
    show: bool,
) -> impl Parser<'s, Input<'s>, Tail, Extra<'s>> + Clone + use<'s> {
    let at = at(exprs);
    let scope = scope(exprs, block);
    let unit = token(K::As).ignore_then(unit());
    let part = custom(move |inp| {
        let part = match peek(inp) {
            Some(K::As) if show => Part::Unit(inp.parse(unit)?),
            Some(K::At) => Part::At(inp.parse(&at)?),
            Some(K::Probability) if !show => {
                inp.skip();
                Part::Probability(quantity(inp)?)
            }
            Some(K::Only | K::Not) => Part::Scope(inp.parse(&scope)?),
            _ => return miss_sort(inp, Sort::Scope),
        };
        if ends_condition(inp) { Ok(part) } else { miss_sort(inp, Sort::Scope) }
    })
    .map(Some)
    .recover_with(via_parser(custom(broken_tail).map(|()| None)));
    custom(move |inp| {
        let mut tail = Tail::default();
        while peek(inp).is_some() {
            let start = position(inp);
            match inp.parse(&part)? {
                Some(Part::Unit(unit)) if tail.unit.is_none() => tail.unit = Some(unit),
                Some(Part::At(at)) if tail.at.is_none() => tail.at = Some(at),
                Some(Part::Probability(share)) if tail.probability.is_none() => {
                    tail.probability = Some(share)
                }
                Some(Part::Scope(scope)) => tail.scopes.push(scope),
                Some(_) => super::recover::said_twice(inp, start),
                None => {}
            }
        }
        Ok(tail)
    })
}

/// `at ride.speed = 15 km/h`
fn at<'s>(exprs: &Exprs<'s>) -> impl Parser<'s, Input<'s>, At, Extra<'s>> + Clone + use<'s> {
    let speeds = speeds(exprs);
    custom(move |inp| {
        let start = take(inp, K::At)?;
        let path = take_path(inp)?;
        take(inp, K::Equal)?;
        let value = inp.parse(&speeds)?;
        let span = start.cover(value.span);
        Ok(At { path, value, span })
    })
}

/// `only in …`, `not in …`, `only where …`
fn scope<'s>(
    exprs: &Exprs<'s>,
    block: Rule<'s, Block>,
) -> impl Parser<'s, Input<'s>, Scope, Extra<'s>> + Clone + use<'s> {
    let case = case_ref(exprs, block);
    let cases = case.separated_by(token(K::Comma)).at_least(1).collect::<Vec<_>>().boxed();
    let speeds = speeds(exprs).boxed();
    custom(move |inp| {
        let start = position(inp);
        let only = maybe(inp, K::Only).is_some();
        let kind = match (only, peek(inp)) {
            (true, Some(K::In)) => {
                inp.skip();
                ScopeKind::OnlyIn(inp.parse(&cases)?)
            }
            (true, Some(K::Where)) => {
                inp.skip();
                ScopeKind::OnlyWhere(where_entry(inp, &speeds)?)
            }
            (true, _) => {
                let _: Parsed<()> = miss(inp, K::In);
                return miss(inp, K::Where);
            }
            (false, _) => {
                take(inp, K::Not)?;
                take(inp, K::In)?;
                ScopeKind::NotIn(inp.parse(&cases)?)
            }
        };
        Ok(Scope { kind, span: span_since(inp, start) })
    })
}

/// `lift.direction = forward`
fn where_entry<'s>(inp: &mut In<'s, '_>, value: &Rule<'s, Value>) -> Parsed<Entry> {
    let key = take_path(inp)?;
    if maybe(inp, K::EqualEqual).is_none() {
        take(inp, K::Equal)?;
    }
    let value = inp.parse(value)?;
    let span = key.span.cover(value.span);
    Ok(Entry { docs: Vec::new(), key, member: None, value, span })
}

/// `ramp`, `ramp[1]`, `corner[360 V, reverse]`, `plain with { … }`
fn case_ref<'s>(
    exprs: &Exprs<'s>,
    block: Rule<'s, Block>,
) -> impl Parser<'s, Input<'s>, CaseRef, Extra<'s>> + Clone + use<'s> {
    let members = choice(exprs)
        .separated_by(token(K::Comma))
        .at_least(1)
        .collect::<Vec<_>>()
        .delimited_by(token(K::LeftSquare), token(K::RightSquare))
        .boxed();
    custom(move |inp| {
        let start = position(inp);
        let name = take_name(inp)?;
        let members = if peek(inp) == Some(K::LeftSquare) { inp.parse(&members)? } else { Vec::new() };
        let with = if maybe(inp, K::With).is_some() { Some(inp.parse(&block)?) } else { None };
        Ok(CaseRef { name, members, with, span: span_since(inp, start) })
    })
}
