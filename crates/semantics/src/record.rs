//! The record: values, parts, cases and drives as a reader or an editor wants them.

use std::collections::BTreeSet;

use layshaft_diagnostics::{Code, Diagnostic};
use layshaft_syntax::{
    Basis, BasisWord, BinaryOp, Expr, ExprKind, ItemKind, Text, UnaryOp, Value, ValueKind,
};

use crate::analysis::{
    Analysis, Assumption, CaseRecord, Change, DriveCase, DriveRecord, FieldRecord, PartRecord, ValueRecord,
};
use crate::cases::State;
use crate::defs::Given;
use crate::eval::{Shared, Slot};
use crate::world::ItemRef;

/// Title, revision and language.
pub(crate) fn identity(shared: Shared<'_>, analysis: &mut Analysis) {
    let mut seen: Vec<&str> = Vec::new();
    for (at, tree) in shared.world.items(0) {
        let word = match &tree.kind {
            ItemKind::Title(text) => {
                analysis.title.get_or_insert_with(|| text.value.to_string());
                "title"
            }
            ItemKind::Revision(text) => {
                analysis.revision.get_or_insert_with(|| text.value.to_string());
                "revision"
            }
            ItemKind::Language(number) => {
                if number.value != 1.0 {
                    let message =
                        format!("language {} is not known to this release; it reads language 1", number.text);
                    let place = shared.world.place(at, number.span);
                    shared.sink.push(Diagnostic::new(Code::WrongValue, place, message));
                }
                "language"
            }
            _ => continue,
        };
        if seen.contains(&word) {
            let message = format!("a spec has one `{word}`");
            shared.sink.push(Diagnostic::new(Code::DoubledName, shared.world.place(at, tree.span), message));
        }
        seen.push(word);
    }
}

/// Computes every value, field and drive in every state, so that mistakes in what no criterion asks for are told too.
pub(crate) fn check_everything(states: &[State<'_>]) {
    for state in states {
        let eval = &state.eval;
        let shared = eval.shared;
        for file in 0..shared.world.files.len() as u32 {
            for (at, tree) in shared.world.items(file) {
                if matches!(tree.kind, ItemKind::Let { .. }) {
                    eval.let_value(at);
                }
            }
        }
        for at in shared.parts.keys() {
            eval.built(*at);
        }
        for at in shared.drives.keys() {
            eval.solved(*at);
        }
    }
}

/// Fills the record.
pub(crate) fn record(shared: Shared<'_>, states: &[&State<'_>], analysis: &mut Analysis) {
    let Some(plain) = states.first() else { return };
    values(shared, plain, analysis);
    parts(shared, plain, analysis);
    cases(shared, states, analysis);
    drives(shared, states, analysis);
    assumptions(shared, plain, analysis);
}

fn docs(texts: &[Text]) -> Vec<String> {
    texts.iter().map(|text| text.value.to_string()).collect()
}

fn basis(basis: Option<&Basis>) -> Option<(&'static str, String)> {
    let basis = basis?;
    let word = match basis.word {
        BasisWord::From => "from",
        BasisWord::Measured => "measured",
        BasisWord::Assumed => "assumed",
    };
    Some((word, basis.text.value.to_string()))
}

fn values(shared: Shared<'_>, plain: &State<'_>, analysis: &mut Analysis) {
    for file in 0..shared.world.files.len() as u32 {
        for (at, tree) in shared.world.items(file) {
            let ItemKind::Let { name, value, .. } = &tree.kind else { continue };
            let place = shared.world.place(at, name.span);
            analysis.values.push(ValueRecord {
                name: qualified(shared, at, &name.text),
                place,
                value_place: shared.world.place(at, value.span),
                value: plain.eval.let_value(at),
                basis: basis(value.basis.as_ref()),
                docs: docs(&tree.docs),
            });
            if file == 0 && value.basis.is_none() && is_bare(value) {
                analysis.without_basis.push((name.text.to_string(), place));
            }
        }
    }
}

/// The name of a declaration with the alias of its file before it.
fn qualified(shared: Shared<'_>, at: ItemRef, name: &str) -> String {
    if at.file == 0 {
        return name.to_owned();
    }
    let alias = shared.world.scopes[0]
        .names
        .iter()
        .find(|(_, (declared, _))| *declared == crate::world::Declared::File(Some(at.file)));
    match alias {
        Some((alias, _)) => format!("{alias}.{name}"),
        None => name.to_owned(),
    }
}

/// Whether a value stands for itself: numbers typed here, not names of other values.
fn is_bare(value: &Value) -> bool {
    match &value.kind {
        ValueKind::Expr(expr) => bare_expr(expr),
        ValueKind::Range { low, high } => bare_expr(low) && bare_expr(high),
        ValueKind::Pairs(_) | ValueKind::Points(_) | ValueKind::Csv(_) => true,
        _ => false,
    }
}

fn bare_expr(expr: &Expr) -> bool {
    match &expr.kind {
        ExprKind::Quantity { .. } => true,
        ExprKind::Paren(inner) | ExprKind::Unary { op: UnaryOp::Minus, arg: inner } => bare_expr(inner),
        ExprKind::Tolerance { value, .. } | ExprKind::Within { value, .. } => bare_expr(value),
        ExprKind::Binary { op: BinaryOp::Multiply, left, right, .. } => {
            matches!(left.kind, ExprKind::Rated) && bare_expr(right)
                || matches!(right.kind, ExprKind::Rated) && bare_expr(left)
        }
        _ => false,
    }
}

fn parts(shared: Shared<'_>, plain: &State<'_>, analysis: &mut Analysis) {
    for (at, part) in shared.parts {
        let mut fields = Vec::new();
        for (slot, given) in &part.fields {
            let name = crate::defs::slot_text(slot);
            let place = shared.world.place(given.at, given.entry.key.span);
            let known = part.field(&slot.0).is_some();
            let value = if known { plain.eval.field(*at, slot) } else { None };
            let value = match value {
                Some(_) => value,
                None => crate::fields::rated_value(&plain.eval, *at, slot),
            };
            if given.at.file == 0 && given.at == *at && given.value.basis.is_none() && is_bare(given.value) {
                analysis.without_basis.push((format!("{}.{name}", part.name.text), place));
            }
            fields.push(FieldRecord {
                name,
                place,
                value_place: shared.world.place(given.at, given.value.span),
                value,
                basis: basis(given.value.basis.as_ref()),
            });
        }
        fields.sort_by_key(|field| (field.place.file != layshaft_diagnostics::FileId(at.file), field.place));
        let given = plain.eval.built(*at).map(|built| built.given.clone()).unwrap_or_default();
        analysis.parts.push(PartRecord {
            name: qualified(shared, *at, &part.name.text),
            role: part.role,
            row: part.row,
            place: shared.world.place(*at, part.name.span),
            fields,
            given,
            docs: docs(&shared.world.tree(*at).docs),
        });
    }
}

fn cases(shared: Shared<'_>, states: &[&State<'_>], analysis: &mut Analysis) {
    for state in states {
        if state.case < analysis.cases.len() {
            continue;
        }
        let overrides = state
            .eval
            .overlay
            .values()
            .map(|given| {
                let key = shared.world.text(given.at, given.entry.key.span).to_owned();
                (key, shared.world.text(given.at, given.value.span).to_owned())
            })
            .collect();
        analysis.cases.push(CaseRecord {
            label: state.label.clone(),
            name: state.name.to_string(),
            place: state.place,
            overrides,
            changes: changes(shared, state),
        });
    }
}

fn changes(shared: Shared<'_>, state: &State<'_>) -> Vec<Change> {
    let world = shared.world;
    let change = |(slot, given): (&Slot, &Given<'_>)| {
        let (item, field, value) = match slot {
            Slot::Let(item) => (*item, None, state.eval.let_value(*item)),
            Slot::Field(item, name) => {
                (*item, Some(crate::defs::slot_text(name)), state.eval.field(*item, name))
            }
        };
        Some(Change {
            owner: world.place(item, world.name(item)?.span),
            field,
            place: world.place(given.at, given.entry.key.span),
            value_place: world.place(given.at, given.value.span),
            value,
        })
    };
    state.eval.overlay.iter().filter_map(change).collect()
}

fn drives(shared: Shared<'_>, states: &[&State<'_>], analysis: &mut Analysis) {
    for (at, def) in shared.drives {
        let mut cases = Vec::new();
        for state in states {
            let solved = state.eval.solved(*at);
            cases.push(DriveCase {
                case: state.case,
                gear: state.gear.as_ref().map(ToString::to_string),
                spec: solved.drive.as_ref().map(|drive| std::sync::Arc::clone(&drive.spec)),
                solution: solved.solution.clone(),
                faults: solved.faults.clone(),
                parts: solved.items.iter().map(|item| name_place(shared, *item)).collect(),
            });
        }
        analysis.drives.push(DriveRecord {
            name: def.name.text.to_string(),
            place: shared.world.place(*at, def.name.span),
            cases,
            docs: docs(&shared.world.tree(*at).docs),
        });
    }
}

fn name_place(shared: Shared<'_>, item: ItemRef) -> layshaft_diagnostics::FileSpan {
    let span = shared.world.name(item).map_or_else(layshaft_diagnostics::Span::default, |name| name.span);
    shared.world.place(item, span)
}

fn assumptions(shared: Shared<'_>, plain: &State<'_>, analysis: &mut Analysis) {
    for value in &analysis.values {
        if let Some(("assumed", why)) = &value.basis {
            analysis.assumptions.push(Assumption {
                subject: value.name.clone(),
                value: value.value.clone(),
                reason: why.clone(),
                by_tool: false,
                place: Some(value.value_place),
            });
        }
    }
    for part in &analysis.parts {
        for field in &part.fields {
            if let Some(("assumed", why)) = &field.basis {
                analysis.assumptions.push(Assumption {
                    subject: format!("{}.{}", part.name, field.name),
                    value: field.value.clone(),
                    reason: why.clone(),
                    by_tool: false,
                    place: Some(field.value_place),
                });
            }
        }
    }
    let used: BTreeSet<ItemRef> =
        shared.drives.keys().flat_map(|at| plain.eval.solved(*at).items.clone()).collect();
    for at in used {
        let (Some(part), Some(built)) = (shared.parts.get(&at), plain.eval.built(at)) else { continue };
        for field in &built.defaults {
            let layshaft_mechanics::registry::Need::Default { si, why } = field.need else { continue };
            analysis.assumptions.push(Assumption {
                subject: format!("{}.{}", qualified(shared, at, &part.name.text), field.name),
                value: crate::fields::of_default(field, si),
                reason: why.to_owned(),
                by_tool: true,
                place: None,
            });
        }
    }
}
