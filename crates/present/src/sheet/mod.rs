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

use layshaft_semantics::Analysis;

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

/// The habits of an author, for callers that write notes of their own.
#[must_use]
pub fn habits(analysis: &Analysis) -> Habits {
    record::habits(analysis)
}
