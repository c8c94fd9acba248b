//! In which states something is asked: `only in`, `not in`, `only where`.

use std::collections::BTreeSet;

use layshaft_diagnostics::{Code, Diagnostic};
use layshaft_syntax::{CaseRef, CompareOp, Expr, ExprKind, Scope, ScopeKind, ValueKind};

use crate::cases::State;
use crate::eval::{Eval, Reading, Shared};
use crate::world::{Declared, ItemRef};

/// A state by its place in one of two lists.
pub(super) enum Choice {
    Declared(usize),
    Extra(usize),
}

/// The states in which something is asked; none where a scope is wrong, which has been reported.
pub(super) fn scoped<'w>(
    shared: Shared<'w>,
    states: &[State<'w>],
    extra: &mut Vec<State<'w>>,
    at: ItemRef,
    scopes: &'w [Scope],
) -> Option<Vec<Choice>> {
    let mut sound = true;
    let mut inside: BTreeSet<usize> = (0..states.len()).collect();
    let mut others = Vec::new();
    for scope in scopes {
        match &scope.kind {
            ScopeKind::OnlyIn(references) => {
                let mut named = BTreeSet::new();
                for reference in references {
                    let found = named_states(shared, states, at, reference);
                    sound &= !found.is_empty();
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
                    let found = named_states(shared, states, at, reference);
                    sound &= !found.is_empty();
                    for index in found {
                        inside.remove(&index);
                    }
                }
            }
            ScopeKind::OnlyWhere(entry) => {
                inside.retain(|&index| is_where(&states[index].eval, at, entry));
            }
        }
    }
    sound.then(|| inside.into_iter().map(Choice::Declared).chain(others).collect())
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
