//! An analysis on a terminal: drives, criteria, what stands behind them, findings, and the verdict as the last line.

mod criteria;
mod drives;
mod findings;
mod grid;
mod record;
mod sources;
mod style;

use layshaft_diagnostics::Severity;
use layshaft_present::escape::terminal;
use layshaft_present::sheet::{Detail, Sheet, sheet};
use layshaft_semantics::Analysis;
use layshaft_semantics::analysis::Verdict;

pub use findings::findings;
pub use grid::{Align, Cell, Column, Grid, wrap};
pub use style::{Style, Tone, width};

/// How a terminal is written to.
#[derive(Clone, Debug)]
pub struct Options {
    /// Colour or none.
    pub style: Style,
    /// Columns to stay within where that is possible.
    pub width: usize,
    /// The path to show for each file of the analysis; its own where one is missing.
    pub names: Vec<String>,
}

/// The whole of an analysis.
#[must_use]
pub fn render(analysis: &Analysis, options: &Options) -> String {
    let sheet = sheet(analysis, Detail::Tables);
    let mut blocks = vec![heading(analysis, &sheet, options)];
    blocks.extend(sheet.drives.iter().map(|drive| drives::drive(drive, options)));
    blocks.push(criteria::shows(&sheet.shows, options));
    blocks.push(record::record(&sheet, options));
    blocks.push(criteria::criteria(&sheet, options));
    blocks.push(findings(analysis, &options.names, options.style));
    blocks.push(summary(analysis, &sheet, options));
    blocks.retain(|block| !block.is_empty());
    let mut out = String::new();
    for block in blocks {
        if !out.is_empty() && !out.ends_with("\n\n") {
            out.push('\n');
        }
        out.push_str(&block);
    }
    out
}

fn heading(analysis: &Analysis, sheet: &Sheet, options: &Options) -> String {
    let mut out = String::new();
    if let Some(title) = &sheet.title {
        out.push_str(&options.style.paint(Tone::Strong, &terminal(title)));
        if let Some(revision) = &sheet.revision {
            out.push_str(&format!(", revision {}", terminal(revision)));
        }
        out.push('\n');
    }
    out.push_str(&options.style.paint(Tone::Faint, &name(analysis, options)));
    out.push('\n');
    out
}

/// The path of the spec as it is shown.
fn name(analysis: &Analysis, options: &Options) -> String {
    let own = analysis.files.first().map(|file| file.path.as_str());
    match options.names.first().map(String::as_str).or(own).unwrap_or("?") {
        "-" => String::from("standard input"),
        name => terminal(name).into_owned(),
    }
}

/// The last line: the verdict, and how many findings there are.
fn summary(analysis: &Analysis, sheet: &Sheet, options: &Options) -> String {
    let count = |severity| analysis.diagnostics.iter().filter(|finding| finding.severity == severity).count();
    let of = |verdict| sheet.criteria.iter().filter(|criterion| criterion.verdict == verdict).count();
    let (total, failing, unjudged) = (sheet.criteria.len(), of(Verdict::Fails), of(Verdict::NotJudged));
    let verb = |count: usize, one: &'static str, many: &'static str| if count == 1 { one } else { many };
    let (verdict, tone) = match (total, failing, unjudged) {
        (0, ..) => (String::from("no criteria"), Tone::Warn),
        (1, 0, 0) => (String::from("the criterion holds"), Tone::Good),
        (_, 0, 0) => (format!("all {total} criteria hold"), Tone::Good),
        (_, 0, n) => (format!("{n} of {total} criteria {} not judged", verb(n, "is", "are")), Tone::Warn),
        (_, n, 0) => (format!("{n} of {total} criteria {}", verb(n, "fails", "fail")), Tone::Bad),
        (_, n, m) => {
            (format!("{n} of {total} criteria {}, {m} not judged", verb(n, "fails", "fail")), Tone::Bad)
        }
    };
    let mut line = format!("{}: {}", name(analysis, options), options.style.paint(tone, &verdict));
    let kinds = [(Severity::Error, "error", Tone::Bad), (Severity::Warning, "warning", Tone::Warn)];
    for (severity, word, tone) in kinds {
        let count = count(severity);
        if count > 0 {
            let words = format!("{count} {word}{}", if count == 1 { "" } else { "s" });
            line.push_str(&format!(", {}", options.style.paint(tone, &words)));
        }
    }
    line.push('\n');
    line
}

/// A clause by its number where it begins with one: `H3-1 hook speed` is `H3-1`.
fn name_of_clause(clause: &str) -> String {
    let first = clause.split(' ').next().unwrap_or(clause);
    let numbered = first.chars().any(|c| c.is_ascii_digit());
    terminal(if numbered { first } else { clause }).into_owned()
}

/// A sentence with an indent, wrapped.
fn paragraph(text: &str, limit: usize, style: Style, tone: Tone) -> String {
    let lines = wrap(text, limit.saturating_sub(4).max(20));
    let line = |(at, line): (usize, &String)| {
        format!("{}{}\n", if at == 0 { "  " } else { "    " }, style.paint(tone, line))
    };
    lines.iter().enumerate().map(line).collect()
}
