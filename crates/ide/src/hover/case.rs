//! A case: what it changes, and which criteria it governs.

use std::collections::BTreeSet;

use layshaft_diagnostics::FileSpan;
use layshaft_present::shown::shown;
use layshaft_semantics::analysis::Change;
use layshaft_semantics::index::Target;

use super::MOST;
use super::criterion::{more, verdict};
use super::field::plain_value;
use crate::markup::{Page, text};
use crate::{Snapshot, numbers};

pub(super) fn case(snapshot: &Snapshot, place: FileSpan) -> Option<String> {
    let states: Vec<_> = snapshot.states(place).collect();
    let (_, first) = states.first()?;
    let mut page = Page::default();
    let count = match states.len() {
        1 => String::new(),
        n => format!(", {n} combinations"),
    };
    page.paragraph(format!("**{}**, a case{count}", text(&first.name)));
    // One line for each thing changed, with all the values it takes.
    let mut rows: Vec<(FileSpan, Vec<String>)> = Vec::new();
    let mut seen: BTreeSet<(FileSpan, FileSpan)> = BTreeSet::new();
    for (_, state) in &states {
        for change in &state.changes {
            if !seen.insert((change.place, change.value_place)) {
                continue;
            }
            match rows.iter_mut().find(|(place, _)| *place == change.place) {
                Some((_, cells)) => cells[2].push_str(&format!(", {}", to(snapshot, change))),
                None => rows.push((change.place, row(snapshot, change))),
            }
        }
    }
    let mut rows: Vec<Vec<String>> = rows.into_iter().map(|(_, cells)| cells).collect();
    let known = rows.len();
    rows.truncate(MOST);
    page.table(&["changes", "plain", "to"], &rows);
    page.paragraph(more(known, rows.len()));
    let governs: Vec<String> = snapshot
        .analysis
        .criteria
        .iter()
        .filter_map(|criterion| {
            let outcome = criterion.outcomes.get(criterion.governing?)?;
            let here = states.iter().any(|(index, _)| *index == outcome.case);
            here.then(|| format!("{} ({})", text(&criterion.clause), verdict(outcome.verdict)))
        })
        .take(MOST)
        .collect();
    if !governs.is_empty() {
        page.paragraph(format!("Governs {}", governs.join(", ")));
    }
    Some(page.finish())
}

fn row(snapshot: &Snapshot, change: &Change) -> Vec<String> {
    let target = match &change.field {
        None => Target::Let(change.owner),
        Some(field) => Target::Field(change.owner, field.clone()),
    };
    let plain = match (numbers::plain_text(snapshot, &target), &change.field) {
        (Some(plain), _) => text(&plain),
        (None, Some(field)) => plain_value(snapshot, change.owner, field).unwrap_or_default(),
        (None, None) => String::new(),
    };
    vec![text(snapshot.text(change.place)), plain, to(snapshot, change)]
}

fn to(snapshot: &Snapshot, change: &Change) -> String {
    match &change.value {
        Some(datum) => text(shown(datum).text()),
        None => text(snapshot.text(change.value_place)),
    }
}
