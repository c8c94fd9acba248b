//! Results the author asks to see.

use layshaft_diagnostics::{Code, Diagnostic};
use layshaft_syntax::{At, Expr, ItemKind};

use super::scope::{Choice, scoped};
use super::stated::stated;
use crate::analysis::{ShowOutcome, ShowRecord};
use crate::cases::State;
use crate::eval::{Reading, Shared};
use crate::quantity::Datum;
use crate::world::ItemRef;

/// Computes every `show`.
pub(crate) fn shows<'w>(
    shared: Shared<'w>,
    states: &[State<'w>],
    extra: &mut Vec<State<'w>>,
) -> Vec<ShowRecord> {
    let mut records = Vec::new();
    for (at, tree) in shared.world.items(0) {
        let ItemKind::Show { value, unit, at: asked, scopes } = &tree.kind else { continue };
        let chosen = scoped(shared, states, extra, at, scopes).unwrap_or_default();
        let mut outcomes = Vec::new();
        for choice in chosen {
            let state = match choice {
                Choice::Declared(index) => &states[index],
                Choice::Extra(index) => &extra[index],
            };
            outcomes.push(shown(state, at, value, unit.as_ref(), asked.as_ref()));
        }
        let text = shared.world.text(at, super::condition_span(value, asked.as_ref())).to_owned();
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
            Ok(_) => quantity.unit = Some(std::sync::Arc::clone(&unit.spelling)),
            Err(refusal) => {
                let place = eval.place(at, written.span);
                let message = format!("this cannot be shown in {}: {}", unit.text, refusal.message());
                eval.report(Diagnostic::new(Code::KindMismatch, place, message));
            }
        }
    }
    let found = found.and_then(Datum::known);
    ShowOutcome {
        case: state.case,
        gear: state.gear.as_ref().map(ToString::to_string),
        value: found,
        remark: eval.take_remark().map(|remark| remark.why),
    }
}
