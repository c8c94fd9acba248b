//! What one per cent more of a typed number does: a trial analysis of the text with that number changed. Asked for by
//! itself, so that a hover stays quick.

use std::sync::Arc;

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_mechanics::registry::Shape;
use layshaft_present::number::{decimals, percent};
use layshaft_present::shown::joined;
use layshaft_semantics::analysis::{Assumption, CriterionRecord, Measure, Verdict};
use layshaft_semantics::quantity::Datum;
use layshaft_semantics::{Analysis, Files, Memo, ReadError};
use layshaft_syntax::{ExprKind, ItemKind};

use crate::markup::{self, text};
use crate::{Snapshot, tree};

/// What moved.
#[derive(Clone, Debug, PartialEq)]
pub struct Sensitivity {
    /// The number that was changed.
    pub place: FileSpan,
    /// The clause of the criterion with the smallest margin.
    pub clause: String,
    /// Its margin: a ratio, or a difference in SI where `absolute`.
    pub before: f64,
    /// The same with one per cent more; none where it is not judged then.
    pub after: Option<f64>,
    /// Whether the margin is a difference.
    pub absolute: bool,
    /// Clauses that fail now and did not before.
    pub newly_failing: Vec<String>,
    /// The same in a sentence, as Markdown.
    pub markdown: String,
}

/// Files with one text laid over them.
struct Trial<'a> {
    path: &'a str,
    text: Arc<str>,
    files: &'a dyn Files,
}

impl Files for Trial<'_> {
    fn read(&self, path: &str) -> Result<Arc<str>, ReadError> {
        if path == self.path { Ok(Arc::clone(&self.text)) } else { self.files.read(path) }
    }

    fn interrupted(&self) -> bool {
        self.files.interrupted()
    }
}

/// Analyzes the spec with a text in place of a file's; none where there is no time left, or newer text has come.
pub type Trials<'a> = dyn FnMut(FileId, Arc<str>) -> Option<Analysis> + 'a;

/// Analyzes the spec with one text in place of a file's, for actions that name their effect.
#[must_use]
pub fn trial(
    snapshot: &Snapshot,
    files: &dyn Files,
    memo: &mut Memo,
    file: FileId,
    text: Arc<str>,
) -> Option<Analysis> {
    let spec = snapshot.file(FileId(0))?;
    let changed = snapshot.file(file)?;
    let over = Trial { path: &changed.path, text: Arc::clone(&text), files };
    let first = if file == FileId(0) { text } else { Arc::clone(&spec.text) };
    Some(layshaft_semantics::analyze_with(&spec.path, first, &over, memo))
}

/// How the tightest margin moves when the number at a place grows by one per cent; none where there is no such number,
/// where it is zero, or where no criterion has a margin.
#[must_use]
pub fn sensitivity(
    snapshot: &Snapshot,
    file: FileId,
    offset: u32,
    trials: &mut Trials<'_>,
) -> Option<Sensitivity> {
    let item = snapshot.item(file, offset)?;
    let here = offset.checked_sub(item.offset)?;
    let holding = tree::holding(&item.tree, here);
    let number = holding.iter().rev().find_map(|expr| match &expr.kind {
        ExprKind::Quantity { number, .. } if number.value != 0.0 => Some(number),
        _ => None,
    })?;
    let span = number.span.shifted(item.offset);
    let source = snapshot.file(file)?;
    let (head, tail) = (source.text.get(..span.start as usize)?, source.text.get(span.end as usize..)?);
    // Digits enough that the trial is one per cent and not a rounding of it; never an exponent.
    let more = format!("{head}{}{tail}", number.value * 1.01);
    compared(snapshot, FileSpan { file, span }, more.into(), trials)
}

/// The same for something that is assumed: a number with its basis, or a default of the tool, which is written into
/// its part for the trial.
#[must_use]
pub fn of_assumption(
    snapshot: &Snapshot,
    assumption: &Assumption,
    trials: &mut Trials<'_>,
) -> Option<Sensitivity> {
    if let Some(place) = assumption.place {
        return sensitivity(snapshot, place.file, place.span.start, trials);
    }
    let Some(Datum::Quantity(quantity)) = &assumption.value else { return None };
    let (part, field) = assumption.subject.rsplit_once('.')?;
    let record = snapshot.analysis.parts.iter().find(|one| one.name == part)?;
    let row = record.row?.fields.iter().find(|row| row.name == field)?;
    let Shape::Quantity(kind) = row.shape else { return None };
    let item = snapshot.item(record.place.file, record.place.span.start)?;
    let ItemKind::Part { block, .. } = &item.tree.kind else { return None };
    let unit = layshaft_units::kind(kind)?.si;
    if quantity.si == 0.0 || block.span.end < block.span.start + 2 {
        return None;
    }
    let at = (item.offset + block.span.start + 1) as usize;
    let source = snapshot.file(record.place.file)?;
    let (head, tail) = (source.text.get(..at)?, source.text.get(at..)?);
    let more = format!("{head} {field} = {} {unit}\n{tail}", quantity.si * 1.01);
    compared(snapshot, record.place, more.into(), trials)
}

/// The tightest margin before, and in the trial.
fn compared(
    snapshot: &Snapshot,
    place: FileSpan,
    more: Arc<str>,
    trials: &mut Trials<'_>,
) -> Option<Sensitivity> {
    let (index, tightest, measure) = tightest(&snapshot.analysis)?;
    let after = trials(place.file, more)?;
    let same = after.criteria.get(index).filter(|criterion| criterion.clause == tightest.clause)?;
    let moved = governing(same).map(|measure| measure.margin);
    let newly_failing: Vec<String> = snapshot
        .analysis
        .criteria
        .iter()
        .zip(&after.criteria)
        .filter(|(before, after)| before.verdict != Verdict::Fails && after.verdict == Verdict::Fails)
        .map(|(_, after)| after.clause.clone())
        .collect();
    let markdown = sentence(&tightest.clause, measure, moved, &newly_failing);
    Some(Sensitivity {
        place,
        clause: tightest.clause.clone(),
        before: measure.margin,
        after: moved,
        absolute: measure.absolute,
        newly_failing,
        markdown,
    })
}

fn governing(criterion: &CriterionRecord) -> Option<&Measure> {
    criterion.outcomes.get(criterion.governing?)?.measure.as_ref()
}

/// The criterion with the smallest margin; ratios before differences, which cannot be compared with them.
fn tightest(analysis: &Analysis) -> Option<(usize, &CriterionRecord, &Measure)> {
    let measured =
        analysis.criteria.iter().enumerate().filter_map(|(index, one)| Some((index, one, governing(one)?)));
    let finite = measured.filter(|(.., measure)| measure.margin.is_finite());
    finite.min_by(|(.., a), (.., b)| a.absolute.cmp(&b.absolute).then(a.margin.total_cmp(&b.margin)))
}

fn sentence(clause: &str, measure: &Measure, after: Option<f64>, failing: &[String]) -> String {
    let unit = match &measure.found {
        Datum::Quantity(quantity) => quantity.ty.si_unit(),
        _ => String::new(),
    };
    let write = |margin: f64| match measure.absolute {
        true => markup::number(&joined(&layshaft_present::number::digits(margin, 3), &unit)),
        false => format!("{} %", percent(margin)),
    };
    let mut words = format!("Per 1 % more, the tightest margin ({}) ", text(clause));
    match after {
        Some(after) if after == measure.margin => words.push_str(&format!("stays at {}", write(after))),
        Some(after) => {
            words.push_str(&format!("moves from {} to {}", write(measure.margin), write(after)));
            if !measure.absolute {
                words.push_str(&format!(" ({} points)", decimals((after - measure.margin) * 100.0, 2)));
            }
        }
        None => words.push_str("is not judged any more"),
    }
    if !failing.is_empty() {
        let clauses: Vec<String> = failing.iter().take(5).map(|clause| text(clause)).collect();
        words.push_str(&format!("; fails then: {}", clauses.join(", ")));
    }
    words
}

#[cfg(test)]
mod tests {
    use std::sync::Arc;

    use layshaft_diagnostics::FileId;
    use layshaft_semantics::{Memo, NoFiles};

    use super::{sensitivity, trial};
    use crate::fixture::Fixture;

    const SPEC: &str = "let limit = 10 N·m
let found = 9.9 N·m
let still = 3 m
require \"R1 near\" found <= limit
require \"R2 far\" found <= 100 N·m
";

    fn told(drawn: &str) -> Option<(f64, Option<f64>, String)> {
        let fixture = Fixture::new(drawn);
        let mut memo = Memo::default();
        let mut trials =
            |file: FileId, text: Arc<str>| trial(&fixture.snapshot, &NoFiles, &mut memo, file, text);
        let found = sensitivity(&fixture.snapshot, fixture.file, fixture.offset, &mut trials)?;
        Some((found.before, found.after, found.markdown))
    }

    #[test]
    fn the_tightest_margin_moves() {
        let (before, after, words) = told(&SPEC.replace("limit = 10", "limit = 1$00")).expect("a number");
        assert!((before - 0.01).abs() < 1e-12);
        assert!(after.is_some_and(|after| (after - 0.2 / 10.1).abs() < 1e-12));
        assert_eq!(
            words,
            "Per 1 % more, the tightest margin (R1 near) moves from 1.00 % to 1.98 % (0.98 points)"
        );
    }

    #[test]
    fn what_fails_then_is_named_and_what_does_not_matter_stays() {
        let near = SPEC.replace("9.9 N·m", "9.9$05 N·m");
        assert!(told(&near).is_some_and(|(.., words)| words.ends_with("; fails then: R1 near")));
        let still = SPEC.replace("3 m", "3$0 m");
        assert!(told(&still).is_some_and(|(.., words)| words.contains("stays at 1.00 %")));
        assert_eq!(told("let a = $05 m\n"), None);
    }
}
