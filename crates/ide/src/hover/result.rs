//! A result: what it comes to in every case, which criterion it decides, and how it came about.

use layshaft_diagnostics::FileSpan;
use layshaft_mechanics::registry::{self, ResultRow};
use layshaft_present::derivation::{self, Line};
use layshaft_present::sheet::{self, Entry};
use layshaft_present::shown::shown;
use layshaft_semantics::analysis::{DriveCase, DriveRecord};
use layshaft_semantics::index::Target;

use super::MOST;
use super::criterion::more;
use super::drive::listed;
use super::part::{cell, remark};
use crate::Snapshot;
use crate::markup::{self, Page, code, text};
use crate::numbers::{entry, port_of};

pub(crate) fn result(
    snapshot: &Snapshot,
    drive: FileSpan,
    part: Option<FileSpan>,
    port: Option<&str>,
    name: &str,
) -> Option<String> {
    let (_, record) = snapshot.drive(drive)?;
    let row = row_of(snapshot, part, name)?;
    let mut page = Page::default();
    let of = part.and_then(|part| snapshot.part(part)).map(|part| format!("{}\\.", text(&part.name)));
    let port_text = port.map(|port| format!("{}\\.", text(port))).unwrap_or_default();
    let path = format!("{}\\.{}{port_text}{}", text(&record.name), of.unwrap_or_default(), text(name));
    page.paragraph(format!("**{path}**: {}", row.meaning));
    let rows: Vec<Vec<String>> = record
        .cases
        .iter()
        .take(MOST)
        .map(|case| {
            let label = sheet::case_label(&snapshot.analysis, case.case, case.gear.as_deref());
            let found = entry(snapshot, case, part, port, &[name]);
            let shown = match &found {
                Entry::Unbounded(_) => "unbounded".to_owned(),
                Entry::None => "not solved".to_owned(),
                found => cell(found),
            };
            vec![text(&label), shown, remark(std::slice::from_ref(&found))]
        })
        .collect();
    page.table(&["case", row.name, "remark"], &rows);
    page.paragraph(more(record.cases.len(), rows.len()));
    let asking: Vec<usize> = snapshot
        .criteria_of(drive)
        .iter()
        .copied()
        .filter(|index| {
            let criterion = snapshot.analysis.criteria.get(*index);
            criterion.is_some_and(|criterion| asks(snapshot, criterion.condition_place, drive, part, name))
        })
        .collect();
    page.list(&listed(snapshot, &asking));
    came_about(snapshot, &mut page, record, part, port, name);
    Some(page.finish())
}

/// Whether a condition holds this result.
fn asks(
    snapshot: &Snapshot,
    condition: FileSpan,
    drive: FileSpan,
    part: Option<FileSpan>,
    name: &str,
) -> bool {
    snapshot.names_in(condition).iter().any(|found| {
        matches!(&found.target, Target::Result { drive: Some(of), part: at, name: asked, .. }
            if *of == drive && *at == part && asked == name)
    })
}

/// The row of a result of a drive or of a part.
pub(crate) fn row_of(snapshot: &Snapshot, part: Option<FileSpan>, name: &str) -> Option<&'static ResultRow> {
    match part {
        None => registry::DRIVE_RESULTS.iter().find(|row| row.name == name),
        Some(part) => {
            let part = snapshot.part(part)?;
            let own = part.row.map_or(&[][..], |row| row.results);
            own.iter().chain(registry::common_results(part.role)).find(|row| row.name == name)
        }
    }
}

/// The derivation in the first case that has one, `plain` where it can be.
fn came_about(
    snapshot: &Snapshot,
    page: &mut Page,
    drive: &DriveRecord,
    part: Option<FileSpan>,
    port: Option<&str>,
    name: &str,
) {
    let found = drive.cases.iter().take(MOST).find_map(|case| {
        let lines = derived(snapshot, case, part, port, name);
        (!lines.is_empty()).then_some((case, lines))
    });
    let Some((case, lines)) = found else { return };
    let label = sheet::case_label(&snapshot.analysis, case.case, case.gear.as_deref());
    page.paragraph(format!("How it came about in {}", text(&label)));
    page.list(&lines.iter().map(spelled).collect::<Vec<_>>());
}

/// The formulas behind a result in one case.
pub(crate) fn derived(
    snapshot: &Snapshot,
    case: &DriveCase,
    part: Option<FileSpan>,
    port: Option<&str>,
    name: &str,
) -> Vec<Line> {
    let (Some(spec), Some(solution)) = (case.spec.as_deref(), case.solution.as_deref()) else {
        return Vec::new();
    };
    let at = match part {
        Some(place) => match case.parts.iter().position(|known| *known == place) {
            Some(at) => Some(at),
            None => return Vec::new(),
        },
        None => None,
    };
    derivation::lines(&solution.derivation(at, port_of(port), name), spec, snapshot.habits())
}

/// A formula, its numbers, its source, in one line.
pub(crate) fn spelled(line: &Line) -> String {
    let mut words = String::new();
    if let Some(part) = &line.part {
        words.push_str(&format!("{}: ", text(part)));
    }
    words.push_str(&format!("{} = {}", code(line.name), code(line.formula)));
    match &line.numbers {
        Some(numbers) => words.push_str(&format!(" = {}", markup::number(numbers))),
        None => {
            let one = |(name, meaning, number): &(&'static str, &'static str, String)| {
                format!("{} {} ({meaning})", code(name), markup::number(number))
            };
            words.push_str(&format!(" with {}", line.symbols.iter().map(one).collect::<Vec<_>>().join(", ")));
        }
    }
    if let Some(result) = &line.result {
        words.push_str(&format!(" = {}", markup::number(result)));
    }
    words.push_str(&format!(" — {}; holds: {}; r{}", line.source, line.validity, line.revision));
    words
}

/// A result known from a part's fields alone: `motor.rated_torque`.
pub(super) fn known(snapshot: &Snapshot, part: FileSpan, name: &str) -> Option<String> {
    let record = snapshot.part(part)?;
    let row = row_of(snapshot, Some(part), name)?;
    let mut page = Page::default();
    let value = record.given.iter().find(|(known, _)| *known == name);
    let value = value.map_or("known only in a drive".to_owned(), |(_, datum)| {
        format!("= {}", markup::number(shown(datum).text()))
    });
    page.paragraph(format!("**{}\\.{}** {value}: {}", text(&record.name), text(name), row.meaning));
    let formulas = record.row.map_or(&[][..], |row| row.formulas);
    let laws: Vec<String> = formulas
        .iter()
        .filter(|formula| formula.name == name)
        .map(|formula| {
            format!(
                "{} = {} — {}; r{}",
                code(formula.name),
                code(formula.text),
                formula.source,
                formula.revision
            )
        })
        .collect();
    page.list(&laws);
    Some(page.finish())
}
