//! A criterion: its verdict, the case that governs, what was found in every case.

use layshaft_present::sheet::{self, OutcomeLine};
use layshaft_present::shown::Shown;
use layshaft_semantics::analysis::Verdict;

use crate::Snapshot;
use crate::markup::{self, Page, text};

/// The page of a criterion with its first `most` cases and the governing one.
pub(crate) fn page(snapshot: &Snapshot, index: usize, most: usize) -> Option<String> {
    let line = sheet::criterion(&snapshot.analysis, index, snapshot.habits(), most)?;
    let known = snapshot.analysis.criteria.get(index)?.outcomes.len();
    let mut page = Page::default();
    page.paragraph(format!("**{}** {}", text(&line.clause), verdict(line.verdict)));
    if let Some(outcome) = line.governing.and_then(|at| line.outcomes.get(at)) {
        let found = outcome.found.as_ref().map(|found| format!("found {}, ", value(found)));
        let margin =
            outcome.margin.as_ref().map(|margin| format!("margin {}, ", markup::number(&margin.text)));
        page.paragraph(format!(
            "required {}; {}{}governed by {}",
            text(&line.required),
            found.unwrap_or_default(),
            margin.unwrap_or_default(),
            text(&outcome.label)
        ));
    } else {
        page.paragraph("It is asked in no case.");
    }
    page.paragraph(counts(line.failing, line.unjudged, known));
    let rows: Vec<Vec<String>> = line.outcomes.iter().map(row).collect();
    page.table(&["case", "found", "margin", "verdict", "remark"], &rows);
    page.paragraph(more(known, rows.len()));
    Some(page.finish())
}

fn row(outcome: &OutcomeLine) -> Vec<String> {
    vec![
        text(&outcome.label),
        outcome.found.as_ref().map(value).unwrap_or_default(),
        outcome.margin.as_ref().map(|margin| markup::number(&margin.text)).unwrap_or_default(),
        verdict(outcome.verdict).to_owned(),
        outcome.remark.as_deref().map(text).unwrap_or_default(),
    ]
}

/// A shown value, harmless.
pub(super) fn value(shown: &Shown) -> String {
    match shown {
        Shown::Number(number) => markup::number(&number.text),
        other => text(other.text()),
    }
}

/// A verdict in words.
pub(crate) const fn verdict(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Holds => "holds",
        Verdict::Fails => "fails",
        Verdict::NotJudged => "not judged",
    }
}

fn counts(failing: usize, unjudged: usize, of: usize) -> String {
    let part = |count: usize, word: &str| (count > 0).then(|| format!("{word} in {count} of {of} cases"));
    [part(failing, "fails"), part(unjudged, "not judged")]
        .into_iter()
        .flatten()
        .collect::<Vec<_>>()
        .join(", ")
}

/// What a list cut short leaves out.
pub(super) fn more(known: usize, listed: usize) -> String {
    match known.saturating_sub(listed) {
        0 => String::new(),
        left => format!("and {left} more; the result table has them all"),
    }
}
