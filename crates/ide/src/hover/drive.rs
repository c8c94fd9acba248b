//! A drive: what becomes of it in every case, where it runs, all operating points, and how its criteria stand.

use layshaft_diagnostics::FileSpan;
use layshaft_present::sheet::{self, DriveRow, DriveSheet};

use super::criterion::{more, verdict};
use super::part::{cell, effort_word, remark};
use super::value::docs;
use super::{MOST, Options, chart};
use crate::Snapshot;
use crate::markup::{self, Page, names, text};
use crate::numbers::plain;

pub(super) fn drive(snapshot: &Snapshot, place: FileSpan, options: Options) -> Option<String> {
    let (index, record) = snapshot.drive(place)?;
    let sheet = sheet::drive(&snapshot.analysis, index, snapshot.habits(), MOST)?;
    let mut page = Page::default();
    page.paragraph(format!("**{}** = {}", text(&sheet.name), names(&sheet.chain)));
    page.paragraph(docs(&record.docs));
    rows(&mut page, &sheet);
    page.paragraph(more(record.cases.len(), sheet.rows.len()));
    points(&mut page, &sheet, 2 * MOST);
    page.list(&judged(snapshot, place));
    if options.charts
        && let Some(case) = plain(record)
    {
        page.paragraph(chart::image(snapshot, case, None));
    }
    Some(page.finish())
}

/// One line a case; of several sources the first, the others are told at their own names.
pub(crate) fn rows(page: &mut Page, sheet: &DriveSheet) {
    let rows: Vec<Vec<String>> = sheet.rows.iter().map(row).collect();
    let efforts = sheet.rows.iter().filter_map(|row| row.sources.first()).map(|source| &source.effort);
    let effort = effort_word(efforts);
    let head = ["case", "from rest", "speed", "source", effort, "power", "of peak", "limited by", "remark"];
    page.table(&head, &rows);
    let faults: Vec<String> =
        sheet.rows.iter().flat_map(|row| &row.faults).map(|fault| text(fault)).collect();
    let mut told: Vec<String> = Vec::new();
    for fault in faults {
        if !told.contains(&fault) {
            told.push(fault);
        }
    }
    page.list(&told);
}

fn row(row: &DriveRow) -> Vec<String> {
    let mut cells = vec![text(&row.label), row.outcome.clone(), cell(&row.speed)];
    match row.sources.first() {
        Some(source) => {
            cells.extend([&source.speed, &source.effort, &source.power, &source.power_share].map(cell));
        }
        None => cells.extend(std::iter::repeat_n(String::new(), 4)),
    }
    cells.push(cell(&row.limited_by));
    cells.push(remark(std::slice::from_ref(&row.speed)));
    cells
}

/// Operating points beyond the reached one, and its stability.
pub(crate) fn points(page: &mut Page, sheet: &DriveSheet, most: usize) {
    let mut rows = Vec::new();
    for row in &sheet.rows {
        for point in &row.points {
            let reached = if point.reached { "reached from rest" } else { "" };
            rows.push(vec![
                text(&row.label),
                markup::number(&point.speed.text),
                point.stability.to_owned(),
                point.mode.replace('_', " "),
                reached.to_owned(),
            ]);
        }
    }
    let known = rows.len();
    rows.truncate(most);
    page.table(&["operating points", "speed", "stability", "mode", ""], &rows);
    page.paragraph(more(known, rows.len()));
}

fn judged(snapshot: &Snapshot, drive: FileSpan) -> Vec<String> {
    let criteria = snapshot.criteria_of(drive);
    listed(snapshot, criteria)
}

/// Criteria with their verdicts and governing cases, the first ones.
pub(super) fn listed(snapshot: &Snapshot, criteria: &[usize]) -> Vec<String> {
    let line = |index: &usize| {
        let criterion = snapshot.analysis.criteria.get(*index)?;
        let outcome = criterion.governing.and_then(|at| criterion.outcomes.get(at));
        let place = outcome
            .map(|outcome| sheet::case_label(&snapshot.analysis, outcome.case, outcome.gear.as_deref()));
        let place = place.map(|label| format!(", governed by {}", text(&label))).unwrap_or_default();
        Some(format!("{}: {}{place}", text(&criterion.clause), verdict(criterion.verdict)))
    };
    let mut lines: Vec<String> = criteria.iter().take(MOST).filter_map(line).collect();
    let left = criteria.len().saturating_sub(lines.len());
    if left > 0 {
        lines.push(format!("and {left} more criteria"));
    }
    lines
}
