//! Criteria: where each is asked, what was found, and the margin to its limits.

mod measure;
mod scope;
mod show;
mod stated;

pub(crate) use show::shows;

use measure::comparison;
use scope::{Choice, scoped};
use stated::judged_at;

use layshaft_diagnostics::{Code, Diagnostic, Span};
use layshaft_syntax::{At, BinaryOp, Expr, ExprKind, ItemKind, UnaryOp};

use crate::analysis::{CriterionOutcome, CriterionRecord, Measure, Verdict};
use crate::cases::State;
use crate::eval::{Eval, Reading, Remark, Shared};
use crate::world::ItemRef;

/// Judges every criterion. States that only a scope names (`plain with { … }`) are added to `extra`.
pub(crate) fn judge<'w>(
    shared: Shared<'w>,
    states: &[State<'w>],
    extra: &mut Vec<State<'w>>,
) -> Vec<CriterionRecord> {
    let mut records = Vec::new();
    for (at, tree) in shared.world.items(0) {
        let ItemKind::Require { clause, condition, at: asked, scopes, probability } = &tree.kind else {
            continue;
        };
        if let Some(probability) = probability {
            states.first().map(|state| state.eval.quantity(probability, Reading::plain(at)));
        }
        let chosen = scoped(shared, states, extra, at, scopes);
        let mut outcomes = Vec::new();
        for choice in chosen.iter().flatten() {
            let state = match choice {
                Choice::Declared(index) => &states[*index],
                Choice::Extra(index) => &extra[*index],
            };
            outcomes.push(outcome(state, at, condition, asked.as_ref()));
        }
        let broken =
            chosen.is_none() || !tree.problems.is_empty() || matches!(condition.kind, ExprKind::Broken);
        if outcomes.is_empty() && !broken {
            never(shared, at, clause.span);
        }
        let governing = governing(&outcomes);
        let verdict = match governing {
            Some(index) => outcomes[index].verdict,
            None => Verdict::NotJudged,
        };
        records.push(CriterionRecord {
            clause: clause.value.to_string(),
            condition: shared.world.text(at, condition_span(condition, asked.as_ref())).to_owned(),
            place: shared.world.place(at, tree.span),
            condition_place: shared.world.place(at, condition.span),
            outcomes,
            governing,
            verdict,
        });
    }
    records
}

fn condition_span(condition: &Expr, asked: Option<&At>) -> Span {
    asked.map_or(condition.span, |asked| condition.span.cover(asked.span))
}

fn never(shared: Shared<'_>, at: ItemRef, span: Span) {
    let message = "this criterion is asked in no case, so nothing judges it";
    shared.sink.push(
        Diagnostic::new(Code::NeverJudged, shared.world.place(at, span), message)
            .help("mend its scope (`only in …`, `not in …`, `only where …`)"),
    );
}

/// The first failing with the smallest margin, else one not judged, else the smallest margin.
fn governing(outcomes: &[CriterionOutcome]) -> Option<usize> {
    let margin = |outcome: &CriterionOutcome| outcome.measure.as_ref().map_or(f64::INFINITY, |m| m.margin);
    (0..outcomes.len()).min_by(|&a, &b| {
        let (a, b) = (&outcomes[a], &outcomes[b]);
        a.verdict.cmp(&b.verdict).then(margin(a).total_cmp(&margin(b)))
    })
}

fn outcome(state: &State<'_>, at: ItemRef, condition: &Expr, asked: Option<&At>) -> CriterionOutcome {
    let eval = &*state.eval;
    eval.take_remark();
    let judged = match asked {
        None => judged(eval, condition, Reading::plain(at)),
        Some(asked) => judged_at(eval, at, condition, asked),
    };
    let remark = eval.take_remark();
    let verdict = match judged.holds {
        Some(true) => Verdict::Holds,
        Some(false) => Verdict::Fails,
        None => Verdict::NotJudged,
    };
    if verdict == Verdict::NotJudged
        && let Some(Remark { why, reported: false }) = &remark
    {
        let place = eval.place(at, condition.span);
        let message = format!("not judged in `{}`: {why}", state.label);
        eval.report(Diagnostic::new(Code::NotJudged, place, message));
    }
    let remark = match (verdict, remark) {
        (Verdict::NotJudged, None) => Some("an error in the spec stands in the way".to_owned()),
        (_, remark) => remark.map(|remark| remark.why),
    };
    CriterionOutcome {
        case: state.case,
        gear: state.gear.as_ref().map(ToString::to_string),
        verdict,
        measure: judged.measure,
        remark,
    }
}

/// What a condition came to.
#[derive(Default)]
struct Judged {
    holds: Option<bool>,
    measure: Option<Measure>,
}

fn judged(eval: &Eval<'_>, condition: &Expr, reading: Reading<'_>) -> Judged {
    match &condition.kind {
        ExprKind::Paren(inner) => judged(eval, inner, reading),
        ExprKind::Binary { op: BinaryOp::And, left, right, .. } => {
            let (a, b) = (judged(eval, left, reading), judged(eval, right, reading));
            let holds = match (a.holds, b.holds) {
                (Some(false), _) | (_, Some(false)) => Some(false),
                (Some(true), Some(true)) => Some(true),
                _ => None,
            };
            Judged { holds, measure: lesser(a, b) }
        }
        ExprKind::Binary { op: BinaryOp::Or, left, right, .. } => {
            let (a, b) = (judged(eval, left, reading), judged(eval, right, reading));
            match (a.holds, b.holds) {
                (Some(true), _) => a,
                (_, Some(true)) => b,
                (Some(false), Some(false)) => Judged { holds: Some(false), measure: lesser(a, b) },
                _ => Judged::default(),
            }
        }
        ExprKind::Unary { op: UnaryOp::Not, arg } => {
            Judged { holds: eval.flag(arg, reading).map(|flag| !flag), measure: None }
        }
        ExprKind::Compare { first, rest } => comparison(eval, first, rest, condition, reading),
        _ => Judged { holds: eval.flag(condition, reading), measure: None },
    }
}

/// The measure with the smaller margin.
fn lesser(a: Judged, b: Judged) -> Option<Measure> {
    match (a.measure, b.measure) {
        (Some(a), Some(b)) => Some(if b.margin < a.margin { b } else { a }),
        (a, b) => a.or(b),
    }
}
