//! The fixes that findings carry, and those of them that are certain.

use layshaft_diagnostics::{Code, Diagnostic, Edit, FileId, Span};

use super::{ActionKind, Claim, Offer, Place, applied, effect, take_out};
use crate::Snapshot;
use crate::sensitivity::Trials;

/// Every fix of the findings at a place.
pub(super) fn carried(place: &Place<'_>) -> Vec<Offer> {
    let mut offers = Vec::new();
    for (index, found) in place.findings() {
        let only = found.fixes.len() == 1;
        for fix in &found.fixes {
            if fix.edits.iter().any(|edit| edit.place.file != place.file) {
                continue;
            }
            offers.push(Offer {
                title: fix.title.clone(),
                kind: ActionKind::Fix,
                edits: fix.edits.clone(),
                mends: Some(index),
                preferred: only,
                claim: Claim::Unknown,
            });
        }
    }
    offers
}

/// The replacements of every fix in a file that is certain: the only one of its finding, and nothing but signs change,
/// or a line goes that does nothing. All of them together must leave no new finding and every result as it was;
/// empty otherwise.
#[must_use]
pub fn fix_all(snapshot: &Snapshot, file: FileId, trials: &mut Trials<'_>) -> Vec<Edit> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let whole = Span::new(0, source.text.len() as u32);
    let place = Place { snapshot, file, span: whole, item: None };
    let mut edits: Vec<Edit> = Vec::new();
    for (_, found) in place.findings() {
        let own = certain(&place, found);
        let clash = |edit: &Edit| {
            let apart = |other: &Edit| {
                edit.place.span.end < other.place.span.start || other.place.span.end < edit.place.span.start
            };
            !edits.iter().all(apart)
        };
        if !own.iter().any(clash) {
            edits.extend(own);
        }
    }
    if edits.is_empty() {
        return edits;
    }
    let known = !snapshot.analysis.has_errors();
    match trials(file, applied(&source.text, &edits).into()) {
        Some(after) => {
            let found = effect(snapshot, &after);
            let fewer = after.diagnostics.len() < snapshot.analysis.diagnostics.len();
            // Where errors stood in the way, results that were not there before are what a fix is for.
            let sound = if known { found.unchanged && found.nothing_new } else { fewer };
            if sound { edits } else { Vec::new() }
        }
        None => Vec::new(),
    }
}

/// The replacements that mend a finding beyond doubt.
fn certain(place: &Place<'_>, found: &Diagnostic) -> Vec<Edit> {
    if found.code == Code::UnusedAllow {
        return take_out::line(place.source(), found.primary.place);
    }
    let [fix] = found.fixes.as_slice() else { return Vec::new() };
    let calm = |edit: &Edit| {
        let old = place.snapshot.text(edit.place);
        edit.place.file == place.file && words(old).eq(words(&edit.text))
    };
    let sure = matches!(found.code, Code::BadText | Code::Syntax) && fix.edits.iter().all(calm);
    if sure { fix.edits.clone() } else { Vec::new() }
}

/// What carries the meaning of a text: its words, numbers, brackets and operators.
fn words(text: &str) -> impl Iterator<Item = char> {
    text.chars().filter(|c| c.is_alphanumeric() || "_(){}[]+-*/^·×<>=".contains(*c))
}
