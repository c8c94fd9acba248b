//! Expressions. From the loosest to the tightest: `if`, `or`, `and`, `not`, comparisons, `+ -`, `* /`, unary `-`,
//! powers, `±` and `within`, operands.

use chumsky::prelude::*;
use layshaft_diagnostics::Span;

use super::compare::comparison;
use super::terms::{
    maybe, maybe_unit, miss, miss_sort, number_of, peek, peek_at, take, take_name, take_number, take_path,
};
use super::{Extra, In, Input, Parsed, Rule, Sort};
use crate::lexer::{string_text, superscript_text};
use crate::token::{Token, TokenKind as K};
use crate::tree::{BinaryOp, Expr, ExprKind, Name, Number, Path, ToleranceForm, UnaryOp};

/// The rules other rules build on.
#[derive(Clone)]
pub(super) struct Exprs<'s> {
    /// Anything: `if a then b else c`, comparisons, sums.
    pub(super) condition: Rule<'s, Expr>,
    /// No comparison: what stands on either side of `..`, `at`, `drives`.
    pub(super) sum: Rule<'s, Expr>,
}

/// Builds the rules of expressions.
pub(super) fn exprs<'s>() -> Exprs<'s> {
    let mut condition = Recursive::declare();
    let operand = operand(condition.clone()).boxed();
    let power = power(operand, condition.clone()).boxed();
    let product = custom(move |inp| {
        left_to_right(
            inp,
            |inp| unary(inp, &power),
            |kind| match kind {
                K::Star => Some(BinaryOp::Multiply),
                K::Slash => Some(BinaryOp::Divide),
                _ => None,
            },
        )
    });
    let sum = custom(move |inp| {
        if let Some(alone) = alone(inp, ends_sum) {
            return Ok(alone);
        }
        left_to_right(
            inp,
            |inp| inp.parse(&product),
            |kind| match kind {
                K::Plus => Some(BinaryOp::Add),
                K::Minus => Some(BinaryOp::Subtract),
                _ => None,
            },
        )
    })
    .boxed();
    let comparison = comparison(sum.clone());
    let negation = custom(move |inp| negation(inp, &comparison));
    let and = custom(move |inp| {
        left_to_right(inp, |inp| inp.parse(&negation), |kind| (kind == K::And).then_some(BinaryOp::And))
    });
    let or = custom(move |inp| {
        left_to_right(inp, |inp| inp.parse(&and), |kind| (kind == K::Or).then_some(BinaryOp::Or))
    })
    .boxed();
    condition.define(choice_of_two(condition.clone(), or).boxed());
    Exprs { condition: condition.boxed(), sum }
}

/// A number or a path alone, where nothing that joins it to more stands behind it: most values are that, and need no
/// way through all the ranks.
fn alone(inp: &mut In<'_, '_>, ends: impl Fn(K) -> bool) -> Option<Expr> {
    let first = peek(inp)?;
    let length = match (first, peek_at(inp, 1)) {
        (K::Number | K::SignedNumber, Some(K::Unit)) => 2,
        (K::Number | K::SignedNumber | K::Name, _) => 1,
        _ => return None,
    };
    if !peek_at(inp, length).is_none_or(ends) {
        return None;
    }
    if first != K::Name {
        return quantity(inp).ok();
    }
    let name = take_name(inp).ok()?;
    let span = name.span;
    Some(Expr { kind: ExprKind::Path(Path { names: vec![name], span }), span })
}

/// What ends any expression.
const fn ends_condition(kind: K) -> bool {
    matches!(kind, K::Newline | K::Semicolon | K::RightBrace | K::Comma | K::From | K::Measured | K::Assumed)
}

/// What ends a sum.
const fn ends_sum(kind: K) -> bool {
    ends_condition(kind)
        || matches!(
            kind,
            K::LessEqual | K::GreaterEqual | K::Less | K::Greater | K::RightParen | K::At | K::Only
        )
}

/// Operands with operators of one rank between, grouped from the left.
fn left_to_right<'s>(
    inp: &mut In<'s, '_>,
    mut operand: impl FnMut(&mut In<'s, '_>) -> Parsed<Expr>,
    operator: impl Fn(K) -> Option<BinaryOp>,
) -> Parsed<Expr> {
    let mut left = operand(inp)?;
    while let Some(&token) = inp.peek_ref() {
        let Some(op) = operator(token.kind) else { break };
        inp.skip();
        let right = operand(inp)?;
        let span = left.span.cover(right.span);
        let kind = ExprKind::Binary { op, op_span: token.span, left: Box::new(left), right: Box::new(right) };
        left = Expr { kind, span };
    }
    Ok(left)
}

/// `if a then b else c`, or what is no choice. `=` compares in the condition.
fn choice_of_two<'s>(
    condition: impl Parser<'s, Input<'s>, Expr, Extra<'s>> + Clone + 's,
    or: Rule<'s, Expr>,
) -> impl Parser<'s, Input<'s>, Expr, Extra<'s>> + Clone {
    custom(move |inp| {
        if let Some(alone) = alone(inp, ends_condition) {
            return Ok(alone);
        }
        let Some(start) = maybe(inp, K::If) else { return inp.parse(&or) };
        let before = std::mem::replace(&mut inp.state().equal_compares, true);
        let test = inp.parse(&condition);
        inp.state().equal_compares = before;
        let test = test?;
        take(inp, K::Then)?;
        let then = inp.parse(&condition)?;
        take(inp, K::Else)?;
        let otherwise = inp.parse(&condition)?;
        let span = start.cover(otherwise.span);
        let (condition, then, otherwise) = (Box::new(test), Box::new(then), Box::new(otherwise));
        Ok(Expr { kind: ExprKind::If { condition, then, otherwise }, span })
    })
}

/// `not not a`. Signs are collected first, so that their number costs no depth here.
fn negation<'s>(inp: &mut In<'s, '_>, inner: &impl Parser<'s, Input<'s>, Expr, Extra<'s>>) -> Parsed<Expr> {
    if peek(inp) != Some(K::Not) {
        return inp.parse(inner);
    }
    let mut signs = Vec::new();
    while let Some(span) = maybe(inp, K::Not) {
        signs.push(span);
    }
    let inner = inp.parse(inner)?;
    Ok(signed(signs, UnaryOp::Not, inner))
}

/// `- - a`
fn unary<'s>(inp: &mut In<'s, '_>, power: &Rule<'s, Expr>) -> Parsed<Expr> {
    if peek(inp) != Some(K::Minus) {
        return inp.parse(power);
    }
    let mut signs = Vec::new();
    while let Some(span) = maybe(inp, K::Minus) {
        signs.push(span);
    }
    let inner = inp.parse(power)?;
    Ok(signed(signs, UnaryOp::Minus, inner))
}

fn signed(signs: Vec<Span>, op: UnaryOp, inner: Expr) -> Expr {
    signs.into_iter().rev().fold(inner, |inner, sign| Expr {
        span: sign.cover(inner.span),
        kind: ExprKind::Unary { op, arg: Box::new(inner) },
    })
}

/// An operand with its tolerance and its power. A number with a sign takes no power: `-2^2` is refused, and so is
/// a power of a power.
fn power<'s>(
    operand: Rule<'s, Expr>,
    condition: impl Parser<'s, Input<'s>, Expr, Extra<'s>> + Clone + 's,
) -> impl Parser<'s, Input<'s>, Expr, Extra<'s>> + Clone {
    custom(move |inp| {
        let start = peek(inp);
        let value = inp.parse(&operand)?;
        let base = match peek(inp) {
            Some(K::PlusMinus) => tolerance(inp, value, &operand)?,
            Some(K::Within) => within(inp, value, &operand)?,
            _ => value,
        };
        let kind = peek(inp);
        if start == Some(K::SignedNumber) || !matches!(kind, Some(K::Caret | K::Superscript)) {
            let at = super::terms::position(inp);
            inp.state().miss(at, 0, Sort::Operator as u32);
            return Ok(base);
        }
        let exponent =
            if kind == Some(K::Superscript) { superscript(inp)? } else { exponent(inp, &condition)? };
        let span = base.span.cover(exponent.span);
        Ok(Expr { kind: ExprKind::Power { base: Box::new(base), exponent: Box::new(exponent) }, span })
    })
}

/// `²`, `⁻¹`
fn superscript(inp: &mut In<'_, '_>) -> Parsed<Expr> {
    let span = take(inp, K::Superscript)?;
    let text = superscript_text(inp.state().shown(span));
    let Ok(value) = text.parse::<f64>() else { return miss(inp, K::Number) };
    let number = Number { value, text: text.into(), span };
    Ok(Expr { kind: ExprKind::Quantity { number, unit: None }, span })
}

/// `^2`, `^-1`, `^n`, `^(1/2)`
fn exponent<'s>(
    inp: &mut In<'s, '_>,
    condition: &impl Parser<'s, Input<'s>, Expr, Extra<'s>>,
) -> Parsed<Expr> {
    take(inp, K::Caret)?;
    match peek(inp) {
        Some(K::Number | K::SignedNumber) => {
            let number = take_number(inp, true)?;
            let span = number.span;
            Ok(Expr { kind: ExprKind::Quantity { number, unit: None }, span })
        }
        Some(K::Name) => {
            let path = take_path(inp)?;
            Ok(Expr { span: path.span, kind: ExprKind::Path(path) })
        }
        Some(K::LeftParen) => paren(inp, condition),
        Some(K::Bad) => take(inp, K::Bad).map(|span| Expr { kind: ExprKind::Broken, span }),
        _ => miss_sort(inp, Sort::Operand),
    }
}

/// `± 5 %`, `± 4 points`, `± 4 % of value`, `± 1 mm confidence 95 %`
fn tolerance<'s>(inp: &mut In<'s, '_>, value: Expr, operand: &Rule<'s, Expr>) -> Parsed<Expr> {
    take(inp, K::PlusMinus)?;
    let tolerance = inp.parse(operand)?;
    let mut span = value.span.cover(tolerance.span);
    let mut form = ToleranceForm::Plain;
    if let Some(word) = maybe(inp, K::Points) {
        form = ToleranceForm::Points;
        span = span.cover(word);
    } else if maybe(inp, K::Of).is_some() {
        form = ToleranceForm::OfValue;
        span = span.cover(take(inp, K::ValueWord)?);
    }
    let mut confidence = None;
    if maybe(inp, K::Confidence).is_some() {
        let share = quantity(inp)?;
        span = span.cover(share.span);
        confidence = Some(Box::new(share));
    }
    let (value, tolerance) = (Box::new(value), Box::new(tolerance));
    Ok(Expr { kind: ExprKind::Tolerance { value, tolerance, form, confidence }, span })
}

/// `within 9.9 mm .. 10.2 mm`
fn within<'s>(inp: &mut In<'s, '_>, value: Expr, operand: &Rule<'s, Expr>) -> Parsed<Expr> {
    take(inp, K::Within)?;
    let low = inp.parse(operand)?;
    take(inp, K::DotDot)?;
    let high = inp.parse(operand)?;
    let span = value.span.cover(high.span);
    let (value, low, high) = (Box::new(value), Box::new(low), Box::new(high));
    Ok(Expr { kind: ExprKind::Within { value, low, high }, span })
}

/// A number with its unit.
pub(super) fn quantity(inp: &mut In<'_, '_>) -> Parsed<Expr> {
    let number = take_number(inp, true)?;
    let unit = maybe_unit(inp);
    let span = unit.as_ref().map_or(number.span, |unit| number.span.cover(unit.span));
    Ok(Expr { kind: ExprKind::Quantity { number, unit }, span })
}

/// The smallest parts of an expression.
fn operand<'s>(
    condition: impl Parser<'s, Input<'s>, Expr, Extra<'s>> + Clone + 's,
) -> impl Parser<'s, Input<'s>, Expr, Extra<'s>> + Clone {
    custom(move |inp| {
        let Some(&Token { kind, span }) = inp.peek_ref() else { return miss_sort(inp, Sort::Operand) };
        let simple = match kind {
            K::Number | K::SignedNumber => {
                inp.skip();
                let number = number_of(inp.state().shown(span), span);
                let unit = maybe_unit(inp);
                let span = unit.as_ref().map_or(span, |unit| span.cover(unit.span));
                return Ok(Expr { kind: ExprKind::Quantity { number, unit }, span });
            }
            K::Name => return path_or_call(inp, &condition),
            K::LeftParen => return paren(inp, &condition),
            K::Yes | K::True => ExprKind::Flag(true),
            K::No | K::False => ExprKind::Flag(false),
            K::Rated => ExprKind::Rated,
            K::String => ExprKind::Text(string_text(inp.state().shown(span))),
            K::Bad => {
                inp.skip();
                // `1_000 m`: the unit belongs to what could not be read.
                let unit = maybe(inp, K::Unit).unwrap_or(span);
                return Ok(Expr { kind: ExprKind::Broken, span: span.cover(unit) });
            }
            _ => return miss_sort(inp, Sort::Operand),
        };
        inp.skip();
        Ok(Expr { kind: simple, span })
    })
}

fn paren<'s>(inp: &mut In<'s, '_>, condition: &impl Parser<'s, Input<'s>, Expr, Extra<'s>>) -> Parsed<Expr> {
    let open = take(inp, K::LeftParen)?;
    let inner = inp.parse(condition)?;
    let close = take(inp, K::RightParen)?;
    Ok(Expr { kind: ExprKind::Paren(Box::new(inner)), span: open.cover(close) })
}

/// A path, or a call where `(` stands behind a single name.
fn path_or_call<'s>(
    inp: &mut In<'s, '_>,
    condition: &impl Parser<'s, Input<'s>, Expr, Extra<'s>>,
) -> Parsed<Expr> {
    match peek_at(inp, 1) {
        Some(K::LeftParen) => {
            let function = take_name(inp)?;
            call(inp, function, condition)
        }
        Some(K::Dot) => {
            let path = take_path(inp)?;
            Ok(Expr { span: path.span, kind: ExprKind::Path(path) })
        }
        _ => {
            let name = take_name(inp)?;
            let span = name.span;
            Ok(Expr { kind: ExprKind::Path(Path { names: vec![name], span }), span })
        }
    }
}

fn call<'s>(
    inp: &mut In<'s, '_>,
    function: Name,
    condition: &impl Parser<'s, Input<'s>, Expr, Extra<'s>>,
) -> Parsed<Expr> {
    take(inp, K::LeftParen)?;
    let mut args = Vec::new();
    if peek(inp) != Some(K::RightParen) {
        args.push(inp.parse(condition)?);
        while maybe(inp, K::Comma).is_some() {
            args.push(inp.parse(condition)?);
        }
    }
    let close = take(inp, K::RightParen)?;
    let span = function.span.cover(close);
    Ok(Expr { kind: ExprKind::Call { function, args }, span })
}
