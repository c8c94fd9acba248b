//! The last good value while a line is being typed: view state of the editor's session, never of an analysis.

use std::collections::BTreeSet;

use layshaft_diagnostics::FileId;

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
    let mut kept: Vec<Hint> = Vec::new();
    let lacking: Vec<&Hint> =
        previous.iter().filter(|hint| !hint.key.is_empty() && !known.contains(hint.key.as_str())).collect();
    if !lacking.is_empty() {
        for item in &source.tree.items {
            if !category(&item.tree.kind).is_some_and(|category| categories.has(category)) {
                continue;
            }
            let name = key(item);
            let Some(old) = lacking.iter().find(|hint| hint.key == name) else { continue };
            // A line that is whole and simply has no hint any more (a value became a literal) keeps none.
            let broken = !item.tree.problems.is_empty() || lacks_value(snapshot, file, item);
            if !broken || kept.iter().any(|hint| hint.key == name) {
                continue;
            }
            let offset = line_end(source, line::first_line(item));
            kept.push(Hint { offset, target: None, stale: true, ..(*old).clone() });
        }
    }
    let mut all = now;
    all.extend(kept);
    all.sort_by_key(|hint| hint.offset);
    all
}

/// Whether what a line declares has no value for now.
fn lacks_value(snapshot: &Snapshot, file: FileId, item: &layshaft_syntax::Item) -> bool {
    use layshaft_syntax::ItemKind;
    let place = |span: layshaft_diagnostics::Span| layshaft_diagnostics::FileSpan {
        file,
        span: span.shifted(item.offset),
    };
    match &item.tree.kind {
        ItemKind::Let { name, .. } => {
            snapshot.value(place(name.span)).is_none_or(|value| value.value.is_none())
        }
        ItemKind::Part { name, .. } => {
            let mut drives = snapshot.drives_with(place(name.span));
            let solved = drives.any(|(_, drive)| drive.cases.iter().any(|case| case.solution.is_some()));
            // A drive that cannot be lowered names no parts: its parts wait for it.
            !solved
                && snapshot.analysis.drives.iter().any(|drive| drive.cases.iter().all(|c| c.spec.is_none()))
        }
        ItemKind::Drive { name, .. } => snapshot
            .drive(place(name.span))
            .is_none_or(|(_, drive)| drive.cases.iter().all(|case| case.solution.is_none())),
        _ => false,
    }
}
