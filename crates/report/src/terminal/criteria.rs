//! The tables of criteria and of what the author asked to see.

use layshaft_present::escape::terminal;
use layshaft_present::sheet::{CriterionLine, OutcomeLine, Sheet, ShowLine};
use layshaft_semantics::analysis::Verdict;

use super::grid::{Align, Cell, Column, Grid};
use super::style::Tone;
use super::{Options, name_of_clause, paragraph};

/// The word for a verdict and its tone.
pub(super) const fn verdict(verdict: Verdict) -> (&'static str, Tone) {
    match verdict {
        Verdict::Holds => ("holds", Tone::Good),
        Verdict::Fails => ("fails", Tone::Bad),
        Verdict::NotJudged => ("not judged", Tone::Warn),
    }
}

pub(super) fn criteria(sheet: &Sheet, options: &Options) -> String {
    if sheet.criteria.is_empty() {
        return String::new();
    }
    let cases = sheet.cases.len() > 1 || sheet.criteria.iter().any(|criterion| criterion.outcomes.len() > 1);
    let mut grid = Grid { columns: columns(cases), rows: Vec::new() };
    for criterion in &sheet.criteria {
        grid.rows.push(row(criterion, cases));
    }
    let mut out = options.style.paint(Tone::Strong, "Criteria");
    out.push('\n');
    out.push_str(&grid.render(options.width, options.style));
    for criterion in &sheet.criteria {
        out.push_str(&remarks(criterion, options));
    }
    out
}

fn columns(cases: bool) -> Vec<Column> {
    let column = |head: &str, align| Column { head: vec![head.into()], align };
    let mut columns = vec![
        column("criterion", Align::Text),
        column("required", Align::Text),
        column("found", Align::Text),
        column("margin", Align::Text),
    ];
    if cases {
        columns.push(column("governing case", Align::Text));
    }
    columns.push(column("verdict", Align::Text));
    columns
}

fn row(criterion: &CriterionLine, cases: bool) -> Vec<Cell> {
    let outcome = governing(criterion);
    let found = outcome.and_then(|outcome| outcome.found.as_ref());
    let (word, tone) = verdict(criterion.verdict);
    let mut cells = vec![
        Cell::plain(terminal(&criterion.clause)),
        Cell::plain(terminal(&criterion.required)),
        Cell::plain(found.map_or_else(String::new, |found| terminal(found.text()).into_owned())),
        Cell::plain(outcome.and_then(|outcome| outcome.margin.as_ref()).map_or("", |margin| &margin.text)),
    ];
    if cases {
        cells.push(Cell::plain(
            outcome.map_or_else(String::new, |outcome| terminal(&outcome.label).into_owned()),
        ));
    }
    cells.push(Cell { text: word.to_string(), tone });
    cells
}

fn governing(criterion: &CriterionLine) -> Option<&OutcomeLine> {
    criterion.governing.and_then(|at| criterion.outcomes.get(at))
}

/// The remark of the governing case, and the other cases in which the criterion fails or is not judged.
fn remarks(criterion: &CriterionLine, options: &Options) -> String {
    let name = name_of_clause(&criterion.clause);
    let mut out = String::new();
    let mut say = |text: String| out.push_str(&paragraph(&text, options.width, options.style, Tone::Plain));
    if let Some(remark) = governing(criterion).and_then(|outcome| outcome.remark.as_deref()) {
        say(format!("{name}: {}", terminal(remark)));
    }
    for (word, wanted) in [("fails", Verdict::Fails), ("is not judged", Verdict::NotJudged)] {
        let others = others(criterion, wanted);
        if !others.is_empty() {
            let also = if criterion.verdict == wanted { " also" } else { "" };
            say(format!("{name} {word}{also} in {}", others.join(", ")));
        }
    }
    out
}

/// The other cases with this verdict; where none is judged for one and the same reason, that reason is enough.
fn others(criterion: &CriterionLine, wanted: Verdict) -> Vec<String> {
    let same =
        |outcome: &OutcomeLine| outcome.remark == governing(criterion).and_then(|of| of.remark.clone());
    let all = criterion.outcomes.iter().all(|outcome| outcome.verdict == Verdict::NotJudged && same(outcome));
    if wanted == Verdict::NotJudged && all {
        return Vec::new();
    }
    let other = |(at, outcome): (usize, &OutcomeLine)| {
        let other = outcome.verdict == wanted && criterion.governing != Some(at);
        other.then(|| terminal(&outcome.label).into_owned())
    };
    criterion.outcomes.iter().enumerate().filter_map(other).collect()
}

pub(super) fn shows(shows: &[ShowLine], options: &Options) -> String {
    if shows.is_empty() {
        return String::new();
    }
    let column = |head: &str, align| Column { head: vec![head.into()], align };
    let mut grid = Grid {
        columns: vec![
            column("shown", Align::Text),
            column("case", Align::Text),
            column("value", Align::Text),
        ],
        rows: Vec::new(),
    };
    for show in shows {
        for (at, outcome) in show.outcomes.iter().enumerate() {
            let remark = outcome.remark.as_deref().map(terminal);
            let value = outcome.value.as_ref().map(|value| terminal(value.text()).into_owned());
            let value = match (value, remark) {
                (Some(value), Some(remark)) => format!("{value} ({remark})"),
                (Some(value), None) => value,
                (None, remark) => format!("none: {}", remark.as_deref().unwrap_or("see the findings")),
            };
            grid.rows.push(vec![
                Cell::plain(if at == 0 { terminal(&show.text).into_owned() } else { String::new() }),
                Cell::plain(terminal(&outcome.label)),
                Cell::plain(value),
            ]);
        }
    }
    grid.render(options.width, options.style)
}
