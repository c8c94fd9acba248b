//! What a checker asks of the record: inputs with their basis, assumptions apart, laws, cautions, what was accepted.

use std::collections::BTreeSet;

use layshaft_mechanics::registry::Role;
use layshaft_semantics::Analysis;
use layshaft_semantics::quantity::{Datum, Quantity};

use super::{AcceptedLine, AssumptionLine, CaseLine, LawLine, PartLine, ValueLine};
use crate::shown::shown;
use crate::unit::{Habits, kind_of};
use layshaft_units::kind;

/// Said wherever a drive has results, for a drive can hurt someone.
const ALWAYS: &str = "The numbers are as good as the data behind them and replace neither a test nor the judgement \
     of a licensed engineer; local codes for the machine come first.";
/// Said where a load can fall or roll.
const OVERHAULING: &str = "This drive lifts, lowers or holds a load: brakes, ropes, overspeed guards and the people \
     near them are subject to local lifting codes and to licensed practice. A motor, a worm or a screw is not a brake.";

/// Kinds of load that fall or roll when nothing holds them.
const FALLING: &[&str] = &["hoist", "incline", "vehicle", "winder"];

/// The units an author uses: limits of criteria first, then `show … as`.
///
/// Only speeds have units of one size that two trades choose differently; of the rest the prefix follows the size.
pub(super) fn habits(analysis: &Analysis) -> Habits {
    let mut habits = Habits::default();
    let measures =
        analysis.criteria.iter().flat_map(|criterion| &criterion.outcomes).filter_map(|o| o.measure.as_ref());
    let measured = measures.flat_map(|measure| {
        [measure.high.as_ref(), measure.low.as_ref(), Some(&measure.found)].into_iter().flatten()
    });
    let shown =
        analysis.shows.iter().flat_map(|show| &show.outcomes).filter_map(|outcome| outcome.value.as_ref());
    let speeds = ["speed", "rotational_speed"].map(|name| kind(name).map(|kind| (kind.name, kind.ty().dim)));
    let mut open: Vec<_> = speeds.into_iter().flatten().collect();
    for datum in measured.chain(shown) {
        let Datum::Quantity(Quantity { ty, unit: Some(unit), .. }) = datum else { continue };
        // A look at the dimension spares the search of the table for nearly every value.
        if open.iter().all(|(_, dim)| *dim != ty.dim) {
            continue;
        }
        let Some(of) = kind_of(ty) else { continue };
        if let Some(at) = open.iter().position(|(name, _)| *name == of.name) {
            habits.note(of.name, unit);
            open.remove(at);
        }
        if open.is_empty() {
            break;
        }
    }
    habits
}

pub(super) fn cases(analysis: &Analysis) -> Vec<CaseLine> {
    let line = |case: &layshaft_semantics::analysis::CaseRecord| CaseLine {
        label: case.label.clone(),
        name: case.name.clone(),
        overrides: case.overrides.clone(),
    };
    analysis.cases.iter().map(line).collect()
}

pub(super) fn values(analysis: &Analysis) -> Vec<ValueLine> {
    let line = |value: &layshaft_semantics::analysis::ValueRecord| ValueLine {
        name: value.name.clone(),
        value: value.value.as_ref().map(shown),
        basis: value.basis.clone(),
    };
    analysis.values.iter().map(line).collect()
}

pub(super) fn parts(analysis: &Analysis) -> Vec<PartLine> {
    let field = |field: &layshaft_semantics::analysis::FieldRecord| ValueLine {
        name: field.name.clone(),
        value: field.value.as_ref().map(shown),
        basis: field.basis.clone(),
    };
    let line = |part: &layshaft_semantics::analysis::PartRecord| PartLine {
        name: part.name.clone(),
        role: role_word(part.role),
        kind: part.row.map(|row| row.name),
        fields: part.fields.iter().map(field).collect(),
        given: part.given.iter().map(|(name, datum)| (*name, shown(datum))).collect(),
    };
    analysis.parts.iter().map(line).collect()
}

/// The word that declares a part.
pub const fn role_word(role: Role) -> &'static str {
    match role {
        Role::Supply => "supply",
        Role::Source => "source",
        Role::Transmission => "transmission",
        Role::Load => "load",
    }
}

pub(super) fn assumptions(analysis: &Analysis) -> Vec<AssumptionLine> {
    let line = |assumption: &layshaft_semantics::analysis::Assumption| AssumptionLine {
        subject: assumption.subject.clone(),
        value: assumption.value.as_ref().map(shown),
        reason: assumption.reason.clone(),
        by_tool: assumption.by_tool,
    };
    analysis.assumptions.iter().map(line).collect()
}

pub(super) fn accepted(analysis: &Analysis) -> Vec<AcceptedLine> {
    let line = |accepted: &layshaft_semantics::analysis::Accepted| AcceptedLine {
        code: accepted.diagnostic.code.row().word,
        message: accepted.diagnostic.message.clone(),
        because: accepted.because.clone(),
    };
    analysis.accepted.iter().map(line).collect()
}

/// Laws of the kinds that stand in a solved drive.
pub(super) fn laws(analysis: &Analysis) -> Vec<LawLine> {
    let mut laws = BTreeSet::new();
    for part in specs(analysis).flat_map(|spec| &spec.parts) {
        for formula in part.row.formulas {
            laws.insert(LawLine { kind: part.row.name, name: formula.name, revision: formula.revision });
        }
    }
    laws.into_iter().collect()
}

/// Cautions of the kinds that are used, each once; none for a spec without a solved drive.
pub(super) fn cautions(analysis: &Analysis) -> Vec<&'static str> {
    let mut found: Vec<&'static str> = Vec::new();
    let mut falls = false;
    for part in specs(analysis).flat_map(|spec| &spec.parts) {
        falls |= part.row.role == Role::Load && FALLING.contains(&part.row.name);
        for caution in part.row.cautions {
            if !found.contains(caution) {
                found.push(caution);
            }
        }
    }
    if specs(analysis).next().is_none() {
        return found;
    }
    if falls {
        found.insert(0, OVERHAULING);
    }
    found.push(ALWAYS);
    found
}

fn specs(analysis: &Analysis) -> impl Iterator<Item = &layshaft_mechanics::drive::DriveSpec> {
    analysis.drives.iter().flat_map(|drive| &drive.cases).filter_map(|case| case.spec.as_deref())
}
