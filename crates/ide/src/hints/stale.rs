//! The last good value while a line is being typed: view state of the editor's session, never of an analysis.

use std::collections::{BTreeMap, BTreeSet};

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_syntax::{Item, ItemKind};

use super::{Categories, Hint, category, key, line, line_end};
use crate::Snapshot;

/// The hints to show: those of now, and for a declaration that stands in the text and has no value now the last one it
/// had, marked as old. `previous` is what was shown before, `now` what [`super::hints`] gives for the whole file.
#[must_use]
pub fn merge_stale(
    snapshot: &Snapshot,
    file: FileId,
    previous: &[Hint],
    now: Vec<Hint>,
    categories: Categories,
) -> Vec<Hint> {
    let Some(source) = snapshot.file(file) else { return now };
    let known: BTreeSet<&str> = now.iter().map(|hint| hint.key.as_str()).collect();
    let lacking: BTreeMap<&str, &Hint> = previous
        .iter()
        .map(|hint| (hint.key.as_str(), hint))
        .filter(|(name, _)| !name.is_empty() && !known.contains(name))
        .collect();
    let mut kept: BTreeMap<String, Hint> = BTreeMap::new();
    if !lacking.is_empty() {
        let waits = parts_wait(snapshot);
        for item in &source.tree.items {
            if !category(&item.tree.kind).is_some_and(|category| categories.has(category)) {
                continue;
            }
            // A line that is whole and simply has no hint any more (a value became a literal) keeps none.
            if item.tree.problems.is_empty() && !lacks_value(snapshot, file, item, waits) {
                continue;
            }
            let name = key(item);
            let Some(old) = lacking.get(name.as_str()) else { continue };
            let offset = line_end(source, line::first_line(item));
            let hint = Hint { offset, target: None, stale: true, ..(*old).clone() };
            kept.entry(name).or_insert(hint);
        }
    }
    let mut all = now;
    all.extend(kept.into_values());
    all.sort_by_key(|hint| hint.offset);
    all
}

/// Whether a drive could not be lowered in any case: it names no parts then, and they wait for it.
fn parts_wait(snapshot: &Snapshot) -> bool {
    snapshot.analysis.drives.iter().any(|drive| drive.cases.iter().all(|case| case.spec.is_none()))
}

/// Whether what a line declares has no value for now.
fn lacks_value(snapshot: &Snapshot, file: FileId, item: &Item, waits: bool) -> bool {
    let place = |span: Span| FileSpan { file, span: span.shifted(item.offset) };
    match &item.tree.kind {
        ItemKind::Let { name, .. } => {
            snapshot.value(place(name.span)).is_none_or(|value| value.value.is_none())
        }
        ItemKind::Part { name, .. } if waits => {
            let mut drives = snapshot.drives_with(place(name.span));
            !drives.any(|(_, drive)| drive.cases.iter().any(|case| case.solution.is_some()))
        }
        ItemKind::Drive { name, .. } => snapshot
            .drive(place(name.span))
            .is_none_or(|(_, drive)| drive.cases.iter().all(|case| case.solution.is_none())),
        _ => false,
    }
}
