//! What a reader of an analysis is shown, as plain data: terminal, JSON and editors write the same sheet.
//!
//! Texts of the author's (names, titles, clauses, reasons) are as they were written: each exit makes them harmless
//! in its own way ([`crate::escape`]).

mod criteria;
mod drives;
mod lines;
mod outcome;
mod record;

pub use lines::*;
pub use record::role_word;

use layshaft_mechanics::solution::Answer;
use layshaft_mechanics::solve::Solution;
use layshaft_semantics::Analysis;
use layshaft_semantics::analysis::{DriveCase, DriveRecord};

use crate::unit::Habits;

/// How much of the answers is written out.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Detail {
    /// What a table shows.
    Tables,
    /// Every result of every part too.
    Everything,
}

/// The sheet of an analysis.
#[must_use]
pub fn sheet(analysis: &Analysis, detail: Detail) -> Sheet {
    let habits = record::habits(analysis);
    let criteria = criteria::criteria(analysis, &habits);
    Sheet {
        title: analysis.title.clone(),
        revision: analysis.revision.clone(),
        cases: record::cases(analysis),
        drives: drives::drives(analysis, &criteria, &habits, detail),
        shows: criteria::shows(analysis, &habits),
        values: record::values(analysis),
        parts: record::parts(analysis),
        assumptions: record::assumptions(analysis),
        without_basis: analysis.without_basis.iter().map(|(name, _)| name.clone()).collect(),
        accepted: record::accepted(analysis),
        laws: record::laws(analysis),
        cautions: record::cautions(analysis),
        verdict: analysis.verdict(),
        criteria,
    }
}

/// `corner[360 V]`, with the gear where the spec gives none.
fn label(analysis: &Analysis, case: usize, gear: Option<&str>) -> String {
    let case = analysis.cases.get(case).map_or("?", |case| case.label.as_str());
    match gear {
        Some(gear) => format!("{case}, gear {gear}"),
        None => case.to_string(),
    }
}

/// The sheet of one drive with its first `most` rows, without what they govern; none where there is no such drive.
#[must_use]
pub fn drive(analysis: &Analysis, index: usize, habits: &Habits, most: usize) -> Option<DriveSheet> {
    let record = analysis.drives.get(index)?;
    let few = DriveRecord {
        name: record.name.clone(),
        place: record.place,
        cases: record.cases.iter().take(most).cloned().collect(),
        docs: record.docs.clone(),
    };
    Some(drives::sheet_of(analysis, &few, &[], habits, Detail::Tables))
}

/// Every result of a drive in one case that has an answer, part by part, the drive itself first.
#[must_use]
pub fn results(case: &DriveCase, habits: &Habits) -> Vec<PartResults> {
    drives::results(case, habits)
}

/// The operating points of a solved drive, slowest first; speeds in `unit`, the usual one where that is empty.
#[must_use]
pub fn operating_points(solution: &Solution, unit: &str) -> Vec<PointRow> {
    outcome::points(solution, unit)
}

/// The parts of a drive as they are written: `2 * motor -> gear`.
#[must_use]
pub fn chain(case: &DriveCase) -> String {
    case.spec.as_deref().map_or_else(String::new, drives::chain_text)
}

/// One criterion with its first `most` outcomes and the governing one; none where there is no such criterion.
#[must_use]
pub fn criterion(analysis: &Analysis, index: usize, habits: &Habits, most: usize) -> Option<CriterionLine> {
    Some(criteria::line(analysis, analysis.criteria.get(index)?, habits, most))
}

/// One `show` with its first `most` outcomes; none where there is no such `show`.
#[must_use]
pub fn show(analysis: &Analysis, index: usize, habits: &Habits, most: usize) -> Option<ShowLine> {
    Some(criteria::show_line(analysis, analysis.shows.get(index)?, habits, most))
}

/// An answer of a solved drive as it is shown, in the unit the author uses for its kind.
#[must_use]
pub fn answer(answer: Answer, case: &DriveCase, habits: &Habits) -> Entry {
    let unit = match &answer {
        Answer::Quantity { si, kind, .. } => habits.unit(kind, [*si]),
        _ => String::new(),
    };
    drives::entry(answer, &unit, case, habits)
}

/// What becomes of a solved drive from rest, in words, and whether it comes to run the way it is asked to; speeds in
/// `unit`, the usual one where that is empty.
#[must_use]
pub fn outcome(solution: &Solution, unit: &str) -> (String, bool) {
    outcome::words(solution, unit)
}

/// The label of a case, with the gear where the spec gives none: `corner[360 V], gear 2`.
#[must_use]
pub fn case_label(analysis: &Analysis, case: usize, gear: Option<&str>) -> String {
    label(analysis, case, gear)
}

/// The habits of an author, for callers that write notes of their own.
#[must_use]
pub fn habits(analysis: &Analysis) -> Habits {
    record::habits(analysis)
}
