//! What a comparison found, and how far it lies from its limits.

use layshaft_diagnostics::Span;
use layshaft_syntax::{CompareOp, Expr, ExprKind};
use layshaft_units::Scale;

use super::Judged;
use crate::analysis::Measure;
use crate::eval::{Eval, Reading};
use crate::quantity::{Datum, Quantity};

/// `x <= limit`, `low <= x <= high`: the value found and its distance to the limits.
pub(super) fn comparison(
    eval: &Eval<'_>,
    first: &Expr,
    rest: &[(CompareOp, Span, Expr)],
    whole: &Expr,
    reading: Reading<'_>,
) -> Judged {
    eval.watch_comparisons();
    let holds = eval.flag(whole, reading);
    let compared = eval.watched_comparisons();
    let Some(holds) = holds else { return Judged::default() };
    let sides = |left: &Expr, right: &Expr| {
        let known = compared.iter().find(|one| one.is(reading.at, left, right));
        known.map(|one| one.sides.clone()).or_else(|| sides(eval, left, right, reading))
    };
    let flagged = Judged { holds: Some(holds), measure: None };
    let mut limits = Vec::new();
    let found = match rest {
        [(op, _, second)] => {
            let Some((a, b)) = sides(first, second) else { return flagged };
            // What is asked for is the side that a result or a value gives; a literal is the limit.
            let limit_first = crate::eval::is_literal(first) || (has_result(second) && !has_result(first));
            let (found, limit, op) = if limit_first { (b, a, mirrored(*op)) } else { (a, b, *op) };
            limits.push((op, limit));
            found
        }
        [(op, _, second), (other, _, third)] => {
            let Some((a, b)) = sides(first, second) else { return flagged };
            let Some((_, c)) = sides(second, third) else { return flagged };
            limits.push((mirrored(*op), a));
            limits.push((*other, c));
            b
        }
        _ => return flagged,
    };
    Judged { holds: Some(holds), measure: measure(found, limits) }
}

fn sides(eval: &Eval<'_>, left: &Expr, right: &Expr, reading: Reading<'_>) -> Option<(Quantity, Quantity)> {
    if crate::eval::compare_words(eval, left, right, reading) != Some(None) {
        return None;
    }
    eval.operands(left, right, reading)
}

/// Whether an expression names a field or result.
pub(super) fn has_result(expr: &Expr) -> bool {
    match &expr.kind {
        ExprKind::Path(path) => path.names.len() > 1,
        ExprKind::Paren(inner) | ExprKind::Unary { arg: inner, .. } => has_result(inner),
        ExprKind::Binary { left, right, .. } => has_result(left) || has_result(right),
        ExprKind::Power { base, exponent } => has_result(base) || has_result(exponent),
        ExprKind::Call { args, .. } => args.iter().any(has_result),
        ExprKind::If { condition, then, otherwise } => {
            has_result(condition) || has_result(then) || has_result(otherwise)
        }
        ExprKind::Compare { first, rest } => {
            has_result(first) || rest.iter().any(|(_, _, side)| has_result(side))
        }
        _ => false,
    }
}

fn mirrored(op: CompareOp) -> CompareOp {
    match op {
        CompareOp::Less => CompareOp::Greater,
        CompareOp::LessEqual => CompareOp::GreaterEqual,
        CompareOp::Greater => CompareOp::Less,
        CompareOp::GreaterEqual => CompareOp::LessEqual,
        same => same,
    }
}

fn measure(found: Quantity, limits: Vec<(CompareOp, Quantity)>) -> Option<Measure> {
    let mut low = None;
    let mut high = None;
    let mut smallest: Option<(f64, bool)> = None;
    for (op, limit) in limits {
        let upper = match op {
            CompareOp::Less | CompareOp::LessEqual => true,
            CompareOp::Greater | CompareOp::GreaterEqual => false,
            CompareOp::Equal | CompareOp::NotEqual => return None,
        };
        let difference = if upper { limit.si - found.si } else { found.si - limit.si };
        let absolute = limit.si == 0.0 || limit.ty.scale == Scale::Level;
        let margin = if absolute { difference } else { difference / limit.si.abs() };
        if smallest.is_none_or(|(known, _)| margin < known) {
            smallest = Some((margin, absolute));
        }
        *(if upper { &mut high } else { &mut low }) = Some(Datum::Quantity(limit));
    }
    let (margin, absolute) = smallest?;
    // Beyond every limit there is no number to show; the remark says so.
    if !margin.is_finite() {
        return None;
    }
    Some(Measure { found: Datum::Quantity(found), low, high, margin, absolute })
}
