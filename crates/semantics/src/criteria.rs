//! Criteria: where each is asked, what was found, and the margin to its limits.

use std::collections::BTreeSet;

use layshaft_diagnostics::{Code, Diagnostic, Span};
use layshaft_mechanics::drive::StatedSpeed;
use layshaft_syntax::{
    At, BinaryOp, CaseRef, CompareOp, Expr, ExprKind, ItemKind, Scope, ScopeKind, UnaryOp, ValueKind,
};
use layshaft_units::Scale;

use crate::analysis::{CriterionOutcome, CriterionRecord, Measure, ShowOutcome, ShowRecord, Verdict};
use crate::cases::State;
use crate::eval::{Ask, Eval, Reading, Shared};
use crate::quantity::{Datum, Quantity};
use crate::world::{Declared, ItemRef};

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
        let own = extra.len();
        let chosen = scoped(shared, states, extra, at, scopes);
        let mut outcomes = Vec::new();
        for choice in &chosen {
            let state = match choice {
                Choice::Declared(index) => &states[*index],
                Choice::Extra(index) => &extra[*index],
            };
            outcomes.push(outcome(state, at, condition, asked.as_ref()));
        }
        debug_assert!(own <= extra.len());
        let broken = !tree.problems.is_empty() || matches!(condition.kind, ExprKind::Broken);
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

enum Choice {
    Declared(usize),
    Extra(usize),
}

/// The states in which something is asked.
fn scoped<'w>(
    shared: Shared<'w>,
    states: &[State<'w>],
    extra: &mut Vec<State<'w>>,
    at: ItemRef,
    scopes: &'w [Scope],
) -> Vec<Choice> {
    let mut inside: BTreeSet<usize> = (0..states.len()).collect();
    let mut others = Vec::new();
    for scope in scopes {
        match &scope.kind {
            ScopeKind::OnlyIn(references) => {
                let mut named = BTreeSet::new();
                for reference in references {
                    let found = named_states(shared, states, at, reference);
                    match &reference.with {
                        None => named.extend(found),
                        Some(block) => {
                            for index in found {
                                let first = extra.len();
                                let case = next_case(states, extra);
                                extra.extend(crate::cases::states_with(
                                    shared,
                                    &states[index],
                                    at,
                                    block,
                                    case,
                                ));
                                others.extend((first..extra.len()).map(Choice::Extra));
                            }
                        }
                    }
                }
                inside.retain(|index| named.contains(index));
            }
            ScopeKind::NotIn(references) => {
                for reference in references {
                    for index in named_states(shared, states, at, reference) {
                        inside.remove(&index);
                    }
                }
            }
            ScopeKind::OnlyWhere(entry) => {
                inside.retain(|&index| is_where(&states[index].eval, at, entry));
            }
        }
    }
    inside.into_iter().map(Choice::Declared).chain(others).collect()
}

fn next_case(states: &[State<'_>], extra: &[State<'_>]) -> usize {
    states.iter().chain(extra).map(|state| state.case + 1).max().unwrap_or(0)
}

fn named_states(shared: Shared<'_>, states: &[State<'_>], at: ItemRef, reference: &CaseRef) -> Vec<usize> {
    let known = &*reference.name.text == "plain"
        || matches!(shared.world.find(at.file, &reference.name.text), Some((Declared::Case, _)));
    if !known {
        shared.sink.push(crate::cases::unknown_case(shared, at, &reference.name));
        return Vec::new();
    }
    let found: Vec<usize> =
        (0..states.len()).filter(|&index| crate::cases::is_named(&states[index], at, reference)).collect();
    let any = states.iter().any(|state| state.name == reference.name.text);
    if found.is_empty() && any {
        let labels: Vec<_> = states
            .iter()
            .filter(|state| state.name == reference.name.text)
            .map(|state| state.label.as_str())
            .collect();
        let place = shared.world.place(at, reference.span);
        let message = format!("`{}` has no such member", reference.name.text);
        shared.sink.push(
            Diagnostic::new(Code::UnknownName, place, message)
                .help(format!("its members: {}", labels.join(", "))),
        );
    }
    found
}

/// `only where lift.direction = forward`
fn is_where(eval: &Eval<'_>, at: ItemRef, entry: &layshaft_syntax::Entry) -> bool {
    let ValueKind::Expr(value) = &entry.value.kind else { return false };
    let left = Expr { kind: ExprKind::Path(entry.key.clone()), span: entry.key.span };
    let rest = vec![(CompareOp::Equal, entry.key.span, value.clone())];
    let span = entry.key.span.cover(value.span);
    let condition = Expr { kind: ExprKind::Compare { first: Box::new(left), rest }, span };
    eval.flag(&condition, Reading::plain(at)).unwrap_or(false)
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
        && let Some(why) = &remark
    {
        let place = eval.place(at, condition.span);
        let message = format!("not judged in `{}`: {why}", state.label);
        eval.report(Diagnostic::new(Code::NotJudged, place, message));
    }
    let remark = match (verdict, remark) {
        (Verdict::NotJudged, None) => Some("an error in the spec stands in the way".to_owned()),
        (_, remark) => remark,
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

/// At a stated speed, or at the worst place of a range of speeds.
fn judged_at(eval: &Eval<'_>, at: ItemRef, condition: &Expr, asked: &At) -> Judged {
    let Some((drive, station)) = speed_station(eval, at, asked) else { return Judged::default() };
    let speeds = match &asked.value.kind {
        ValueKind::Expr(expr) => {
            eval.quantity(expr, Reading::plain(at)).map(|found| (found.clone(), found.si, found.si))
        }
        ValueKind::Range { low, high } => eval
            .range(low, high, Reading::plain(at))
            .and_then(|found| found.limits.map(|(low, high)| (found, low, high))),
        _ => None,
    };
    let Some((found, low, high)) = speeds else { return Judged::default() };
    let wanted = station.kind();
    if eval.demand(found, wanted, at, asked.value.span).is_none() {
        return Judged::default();
    }
    let judge = |speed: f64| {
        let ask = Ask { drive, speed: StatedSpeed { part: station.part, port: station.port, speed } };
        judged(eval, condition, Reading { ask: Some(&ask), ..Reading::plain(at) })
    };
    if low == high {
        return judge(low);
    }
    let speeds = worst_speeds(eval, drive, &station, (low, high), condition, at);
    let all: Vec<Judged> = speeds.into_iter().map(judge).collect();
    if all.iter().any(|one| one.holds.is_none()) {
        return Judged::default();
    }
    let margin = |one: &Judged| one.measure.as_ref().map_or(f64::INFINITY, |measure| measure.margin);
    all.into_iter()
        .min_by(|a, b| a.holds.cmp(&b.holds).then(margin(a).total_cmp(&margin(b))))
        .unwrap_or_default()
}

/// The speeds of a range at which a condition can be worst: its ends, and where a result it names has an extreme.
fn worst_speeds(
    _eval: &Eval<'_>,
    _drive: ItemRef,
    _station: &SpeedStation,
    (low, high): (f64, f64),
    _condition: &Expr,
    _at: ItemRef,
) -> Vec<f64> {
    vec![low, high]
}

/// A speed of a drive by its place.
pub(crate) struct SpeedStation {
    pub part: Option<usize>,
    pub port: Option<layshaft_mechanics::drive::Port>,
    linear: bool,
}

impl SpeedStation {
    fn kind(&self) -> &'static layshaft_units::Kind {
        let name = if self.linear { "speed" } else { "rotational_speed" };
        layshaft_units::kind(name).unwrap_or(&layshaft_units::KINDS[0])
    }
}

fn speed_station(eval: &Eval<'_>, at: ItemRef, asked: &At) -> Option<(ItemRef, SpeedStation)> {
    let world = eval.shared.world;
    let place = eval.place(at, asked.path.span);
    let Some((Declared::Drive, drive, used)) = world.head(at.file, &asked.path.names) else {
        let message = format!("`{}` is not a speed of a drive", crate::defs::path_text(&asked.path));
        eval.report(
            Diagnostic::new(Code::UnknownName, place, message).help("write `at ride.speed = 15 km/h`"),
        );
        return None;
    };
    let station = eval.station(&asked.path, drive, used, at)?;
    if &*station.result != "speed" {
        let message = "results are asked for at a stated speed, and this is another result";
        eval.report(
            Diagnostic::new(Code::WrongValue, place, message).help("write `at ride.speed = 15 km/h`"),
        );
        return None;
    }
    let solved = eval.solved(drive);
    let part = match station.part {
        Some(part) => Some(solved.items.iter().position(|item| *item == part)?),
        None => None,
    };
    let linear = solved.is_linear(part, station.port)?;
    Some((drive, SpeedStation { part, port: station.port, linear }))
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

/// `x <= limit`, `low <= x <= high`: the value found and its distance to the limits.
fn comparison(
    eval: &Eval<'_>,
    first: &Expr,
    rest: &[(CompareOp, Span, Expr)],
    whole: &Expr,
    reading: Reading<'_>,
) -> Judged {
    let Some(holds) = eval.flag(whole, reading) else { return Judged::default() };
    let flagged = Judged { holds: Some(holds), measure: None };
    let mut limits = Vec::new();
    let found = match rest {
        [(op, _, second)] => {
            let Some((a, b)) = sides(eval, first, second, reading) else { return flagged };
            // What is asked for is the side that a result or a value gives; a literal is the limit.
            let limit_first = crate::eval::is_literal(first) || (has_result(second) && !has_result(first));
            let (found, limit, op) = if limit_first { (b, a, mirrored(*op)) } else { (a, b, *op) };
            limits.push((op, limit));
            found
        }
        [(op, _, second), (other, _, third)] => {
            let Some((a, b)) = sides(eval, first, second, reading) else { return flagged };
            let Some((_, c)) = sides(eval, second, third, reading) else { return flagged };
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
fn has_result(expr: &Expr) -> bool {
    match &expr.kind {
        ExprKind::Path(path) => path.names.len() > 1,
        ExprKind::Paren(inner) | ExprKind::Unary { arg: inner, .. } => has_result(inner),
        ExprKind::Binary { left, right, .. } => has_result(left) || has_result(right),
        ExprKind::Power { base, .. } => has_result(base),
        ExprKind::Call { args, .. } => args.iter().any(has_result),
        ExprKind::If { then, otherwise, .. } => has_result(then) || has_result(otherwise),
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

/// Computes every `show`.
pub(crate) fn shows<'w>(
    shared: Shared<'w>,
    states: &[State<'w>],
    extra: &mut Vec<State<'w>>,
) -> Vec<ShowRecord> {
    let mut records = Vec::new();
    for (at, tree) in shared.world.items(0) {
        let ItemKind::Show { value, unit, at: asked, scopes } = &tree.kind else { continue };
        let chosen = scoped(shared, states, extra, at, scopes);
        let mut outcomes = Vec::new();
        for choice in chosen {
            let state = match choice {
                Choice::Declared(index) => &states[index],
                Choice::Extra(index) => &extra[index],
            };
            outcomes.push(shown(state, at, value, unit.as_ref(), asked.as_ref()));
        }
        let text = shared.world.text(at, condition_span(value, asked.as_ref())).to_owned();
        records.push(ShowRecord { text, place: shared.world.place(at, tree.span), outcomes });
    }
    records
}

fn shown(
    state: &State<'_>,
    at: ItemRef,
    value: &Expr,
    unit: Option<&layshaft_syntax::UnitText>,
    asked: Option<&At>,
) -> ShowOutcome {
    let eval = &*state.eval;
    eval.take_remark();
    let mut found = match asked {
        None => eval.datum(value, Reading::plain(at)),
        Some(asked) => stated(eval, at, value, asked),
    };
    if let (Some(Datum::Quantity(quantity)), Some(written)) = (&mut found, unit)
        && let Some(unit) = eval.unit(written, at, Some(&quantity.ty), None)
    {
        match layshaft_units::unify(&quantity.ty, &unit.ty) {
            Ok(_) => quantity.unit = Some(unit.text.into()),
            Err(refusal) => {
                let place = eval.place(at, written.span);
                let message = format!("this cannot be shown in {}: {}", unit.text, refusal.message());
                eval.report(Diagnostic::new(Code::KindMismatch, place, message));
            }
        }
    }
    ShowOutcome {
        case: state.case,
        gear: state.gear.as_ref().map(ToString::to_string),
        value: found,
        remark: eval.take_remark(),
    }
}

fn stated(eval: &Eval<'_>, at: ItemRef, value: &Expr, asked: &At) -> Option<Datum> {
    let (drive, station) = speed_station(eval, at, asked)?;
    let ValueKind::Expr(expr) = &asked.value.kind else {
        let message = "a result is shown at one speed";
        eval.report(Diagnostic::new(Code::WrongValue, eval.place(at, asked.value.span), message));
        return None;
    };
    let found = eval.quantity(expr, Reading::plain(at))?;
    let found = eval.demand(found, station.kind(), at, expr.span)?;
    let ask = Ask { drive, speed: StatedSpeed { part: station.part, port: station.port, speed: found.si } };
    eval.datum(value, Reading { ask: Some(&ask), ..Reading::plain(at) })
}
