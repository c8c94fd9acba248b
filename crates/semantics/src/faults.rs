//! Turns what a law or the solver reports into findings at the places of the text.

use layshaft_diagnostics::{Code, Diagnostic, FileSpan};
use layshaft_mechanics::fault::{Fault, FaultKind};

use crate::eval::Eval;
use crate::world::ItemRef;

/// Reports a fault of the part (or drive) `at`.
pub(crate) fn report(eval: &Eval<'_>, at: ItemRef, fault: &Fault) {
    if let Some(found) = cook(eval, at, fault) {
        eval.report(found);
    }
}

/// The finding for a fault; none where the part has no name to point at.
pub(crate) fn cook(eval: &Eval<'_>, at: ItemRef, fault: &Fault) -> Option<Diagnostic> {
    let name = eval.shared.world.name(at)?;
    let whole = eval.place(at, name.span);
    let own = &name.text;
    Some(match &fault.kind {
        FaultKind::Missing { any_of, why } => {
            let groups: Vec<String> = any_of
                .iter()
                .map(|group| group.iter().map(|field| format!("`{field}`")).collect::<Vec<_>>().join(" and "))
                .collect();
            let message = format!("`{own}` needs {}", groups.join(", or "));
            Diagnostic::new(Code::MissingField, whole, message)
                .note(crate::say::note(why))
                .fields(any_of.clone())
        }
        FaultKind::Contradiction { fields, how } => {
            let mut places =
                fields.iter().filter_map(|field| field_place(eval, at, field).map(|at| (*field, at)));
            let (_, primary) = places.next().unwrap_or(("", whole));
            let mut found = Diagnostic::new(Code::Contradiction, primary, crate::say::note(how))
                .fields(vec![fields.clone()]);
            for (field, place) in places {
                found = found.related(place, format!("`{field}` takes part"));
            }
            found
        }
        FaultKind::Value { field, why } => {
            let place = field_place(eval, at, field).unwrap_or(whole);
            Diagnostic::new(Code::WrongValue, place, crate::say::note(why))
        }
        FaultKind::BrakingUnknown { field } => {
            let message = format!("the load drives here, and `{own}` does not say `{field}`");
            Diagnostic::new(Code::BrakingUnknown, whole, message)
                .note("how a drive brakes has no default: whether power can flow back decides what holds the load")
                .help(format!("add `{field} = …` to `{own}`"))
                .fields(vec![vec![field]])
        }
        FaultKind::Chain { how } => Diagnostic::new(Code::BadChain, whole, crate::say::note(how)),
        FaultKind::Unsettled { how } => Diagnostic::new(Code::NotJudged, whole, crate::say::note(how)),
    })
}

/// Where a field of a part is given in this state.
pub(crate) fn field_place(eval: &Eval<'_>, at: ItemRef, field: &str) -> Option<FileSpan> {
    let given = eval.given(at, &(field.into(), None))?;
    Some(eval.place(given.at, given.value.span))
}
