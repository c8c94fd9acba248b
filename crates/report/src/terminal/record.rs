//! What stands behind the numbers: assumptions, values without basis, accepted warnings, laws, cautions.

use layshaft_present::escape::terminal;
use layshaft_present::sheet::{AssumptionLine, Sheet};

use super::style::Tone;
use super::{Options, paragraph};

pub(super) fn record(sheet: &Sheet, options: &Options) -> String {
    let mut out = String::new();
    let mut section = |head: &str, lines: Vec<String>| {
        if lines.is_empty() {
            return;
        }
        if !out.is_empty() {
            out.push('\n');
        }
        out.push_str(&options.style.paint(Tone::Strong, head));
        out.push('\n');
        for line in lines {
            out.push_str(&paragraph(&line, options.width, options.style, Tone::Plain));
        }
    };
    section("Assumed", assumptions(sheet));
    section("Without basis", joined(sheet.without_basis.iter().map(|name| terminal(name).into_owned())));
    section("Accepted warnings", accepted(sheet));
    section(
        "Laws",
        joined(sheet.laws.iter().map(|law| format!("{} {} (r{})", law.kind, law.name, law.revision))),
    );
    section("Mind", sheet.cautions.iter().map(ToString::to_string).collect());
    out
}

fn assumptions(sheet: &Sheet) -> Vec<String> {
    let same = |a: &AssumptionLine, b: &AssumptionLine| {
        a.by_tool == b.by_tool
            && a.reason == b.reason
            && a.value == b.value
            && field_of(&a.subject) == field_of(&b.subject)
    };
    // What is assumed of several parts alike is read once.
    let mut groups: Vec<(&AssumptionLine, Vec<String>)> = Vec::new();
    for assumption in &sheet.assumptions {
        let subject = terminal(&assumption.subject).into_owned();
        match groups.iter_mut().find(|(first, _)| same(first, assumption)) {
            Some((_, subjects)) => subjects.push(subject),
            None => groups.push((assumption, vec![subject])),
        }
    }
    let line = |(assumption, subjects): (&AssumptionLine, Vec<String>)| {
        let value = assumption
            .value
            .as_ref()
            .map_or_else(String::new, |value| format!(" = {}", terminal(value.text())));
        let by = if assumption.by_tool { "default" } else { "author" };
        format!("{}{value} ({by}: {})", subjects.join(", "), terminal(&assumption.reason))
    };
    groups.into_iter().map(line).collect()
}

/// The field of a subject: `inertia` of `reducer.inertia`.
fn field_of(subject: &str) -> &str {
    subject.rsplit('.').next().unwrap_or(subject)
}

fn accepted(sheet: &Sheet) -> Vec<String> {
    let line = |accepted: &layshaft_present::sheet::AcceptedLine| {
        format!(
            "[{}] {}, because {}",
            accepted.code,
            terminal(&accepted.message),
            terminal(&accepted.because)
        )
    };
    sheet.accepted.iter().map(line).collect()
}

/// One line for a list of names; none for an empty one.
fn joined(names: impl Iterator<Item = String>) -> Vec<String> {
    let names: Vec<String> = names.collect();
    if names.is_empty() { Vec::new() } else { vec![names.join(", ")] }
}
