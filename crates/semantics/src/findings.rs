//! What a colleague would raise about the solved drives, told once for all cases.

use std::collections::BTreeMap;

use layshaft_diagnostics::{Code, Diagnostic};

use crate::cases::State;
use crate::eval::Shared;
use crate::world::ItemRef;

/// Reports the findings of every drive in every state; the same finding in several cases is one message.
pub(crate) fn report(shared: Shared<'_>, states: &[&State<'_>]) {
    let mut found: BTreeMap<(ItemRef, ItemRef, Code), (String, Vec<String>)> = BTreeMap::new();
    for state in states {
        if shared.files.interrupted() {
            return;
        }
        for drive in shared.drives.keys() {
            let solved = state.eval.solved(*drive);
            let Some(solution) = &solved.solution else { continue };
            for finding in solution.findings() {
                let Some(code) = Code::from_word(finding.code) else { continue };
                let part = finding.part.and_then(|part| solved.items.get(part)).copied().unwrap_or(*drive);
                let words = crate::say::note(&finding.note);
                let label = label(state);
                let entry = found.entry((*drive, part, code)).or_insert_with(|| (words, Vec::new()));
                if entry.1.last() != Some(&label) {
                    entry.1.push(label);
                }
            }
        }
    }
    for ((drive, part, code), (words, labels)) in found {
        // A part of a used file is remarked on where the drive is declared: that is the user's text.
        let owner = if part.file == 0 { part } else { drive };
        let Some(name) = shared.world.name(owner) else { continue };
        let place = shared.world.place(owner, name.span);
        let everywhere = labels.len() == states.len();
        let mut finding = Diagnostic::new(code, place, words);
        if !everywhere {
            let mut shown: Vec<_> = labels.iter().take(4).map(|label| format!("`{label}`")).collect();
            if labels.len() > shown.len() {
                shown.push(format!("and {} more", labels.len() - shown.len()));
            }
            finding = finding.note(format!("in {}", shown.join(", ")));
        }
        shared.sink.push(finding);
    }
}

pub(crate) fn label(state: &State<'_>) -> String {
    match &state.gear {
        Some(gear) => format!("{}, gear {gear}", state.label),
        None => state.label.clone(),
    }
}
