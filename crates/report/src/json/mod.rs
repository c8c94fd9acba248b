//! The output for programs: one JSON document a run, schema `check/1` (`schema/check-1.json`).
//!
//! Within `check/1` it only grows: a reader takes the fields it knows and passes over the others.

mod model;
mod value;

use layshaft_diagnostics::{Diagnostic, Severity};
use layshaft_present::escape::is_hostile;
use layshaft_present::sheet::{
    CriterionLine, Detail, DriveRow, DriveSheet, OutcomeLine, PartLine, SourceRow, ValueLine, sheet,
};
use layshaft_semantics::Analysis;
use layshaft_semantics::analysis::Verdict;

pub use model::Value;
pub use value::{entry, number, shown};

use model::{
    Accepted, Assumption, Basis, Case, Criterion, Document, Drive, DriveCase, Edit, Finding, Fix, Label, Law,
    Margin, NamedResult, NamedValue, OperatingPoint, Outcome, Override, Part, Results, Show, ShowOutcome,
    Source, Spec, Tool, Unread,
};

/// The name of the schema.
pub const SCHEMA: &str = "check/1";
/// The schema itself, JSON Schema 2020-12.
pub const SCHEMA_TEXT: &str = include_str!("../../schema/check-1.json");

/// A spec to be written, with the path to show for each of its files.
#[derive(Clone, Copy, Debug)]
pub struct Checked<'a> {
    /// Its analysis.
    pub analysis: &'a Analysis,
    /// The paths to show; those of the analysis where one is missing.
    pub names: &'a [String],
}

/// The document of a run. `unread` are files that could not be read, and why.
#[must_use]
pub fn document(specs: &[Checked<'_>], unread: &[(String, String)]) -> String {
    let document = Document {
        schema: SCHEMA,
        tool: Tool { name: "layshaft", version: env!("CARGO_PKG_VERSION") },
        specs: specs.iter().map(|checked| spec(*checked)).collect(),
        unread: unread
            .iter()
            .map(|(path, reason)| Unread { path: path.clone(), reason: reason.clone() })
            .collect(),
    };
    // Only a map with keys that are no texts cannot be written, and the model has none.
    let mut text = harmless(serde_json::to_string_pretty(&document).unwrap_or_default());
    text.push('\n');
    text
}

/// JSON escapes only the oldest control characters; the others that steer a terminal or turn text stand, if
/// anywhere, inside strings, and are escaped as well.
fn harmless(text: String) -> String {
    let bad = |c: char| is_hostile(c) && c != '\n';
    if !text.chars().any(bad) {
        return text;
    }
    let mut out = String::with_capacity(text.len() + 64);
    for c in text.chars() {
        if bad(c) {
            let mut units = [0; 2];
            for unit in c.encode_utf16(&mut units) {
                out.push_str(&format!("\\u{unit:04x}"));
            }
        } else {
            out.push(c);
        }
    }
    out
}

const fn verdict(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Holds => "holds",
        Verdict::Fails => "fails",
        Verdict::NotJudged => "not_judged",
    }
}

fn spec(checked: Checked<'_>) -> Spec {
    let Checked { analysis, names } = checked;
    let sheet = sheet(analysis, Detail::Everything);
    let count = |severity| analysis.diagnostics.iter().filter(|finding| finding.severity == severity).count();
    let files: Vec<String> = analysis
        .files
        .iter()
        .enumerate()
        .map(|(at, file)| names.get(at).unwrap_or(&file.path).clone())
        .collect();
    Spec {
        path: files.first().cloned().unwrap_or_default(),
        title: sheet.title,
        revision: sheet.revision,
        verdict: sheet.verdict.map_or("no_criteria", verdict),
        errors: count(Severity::Error),
        warnings: count(Severity::Warning),
        files,
        findings: analysis.diagnostics.iter().map(|found| finding(checked, found)).collect(),
        values: sheet.values.iter().map(named).collect(),
        parts: sheet.parts.iter().map(part).collect(),
        cases: sheet.cases.iter().map(case).collect(),
        drives: sheet.drives.iter().map(|of| drive(of, &sheet.cases)).collect(),
        criteria: sheet.criteria.iter().map(|of| criterion(of, &sheet.cases)).collect(),
        shows: sheet.shows.iter().map(|of| show(of, &sheet.cases)).collect(),
        assumptions: sheet.assumptions.iter().map(assumption).collect(),
        without_basis: sheet.without_basis,
        accepted: sheet.accepted.iter().map(accepted).collect(),
        laws: sheet
            .laws
            .iter()
            .map(|law| Law { kind: law.kind, name: law.name, revision: law.revision })
            .collect(),
        cautions: sheet.cautions,
    }
}

fn finding(checked: Checked<'_>, found: &Diagnostic) -> Finding {
    let place = |at| value::place(checked.analysis, checked.names, at);
    Finding {
        code: found.code.row().word,
        severity: match found.severity {
            Severity::Error => "error",
            Severity::Warning => "warning",
            Severity::Hint => "hint",
        },
        message: found.message.clone(),
        place: place(found.primary.place),
        label: found.primary.text.clone(),
        related: found
            .related
            .iter()
            .map(|l| Label { place: place(l.place), text: l.text.clone() })
            .collect(),
        notes: found.notes.clone(),
        help: found.help.clone(),
        fixes: found
            .fixes
            .iter()
            .map(|fix| Fix {
                title: fix.title.clone(),
                edits: fix
                    .edits
                    .iter()
                    .map(|e| Edit { place: place(e.place), text: e.text.clone() })
                    .collect(),
            })
            .collect(),
    }
}

fn named(line: &ValueLine) -> NamedValue {
    NamedValue {
        name: line.name.clone(),
        value: line.value.as_ref().map(value::shown),
        basis: line.basis.as_ref().map(|(word, text)| Basis { word, text: text.clone() }),
    }
}

fn part(line: &PartLine) -> Part {
    let given = |(name, of): &(&'static str, layshaft_present::shown::Shown)| NamedValue {
        name: (*name).to_string(),
        value: Some(value::shown(of)),
        basis: None,
    };
    Part {
        name: line.name.clone(),
        role: line.role,
        kind: line.kind,
        fields: line.fields.iter().map(named).collect(),
        given: line.given.iter().map(given).collect(),
    }
}

fn case(line: &layshaft_present::sheet::CaseLine) -> Case {
    let change = |(path, value): &(String, String)| Override { path: path.clone(), value: value.clone() };
    Case {
        label: line.label.clone(),
        name: line.name.clone(),
        overrides: line.overrides.iter().map(change).collect(),
    }
}

type Cases = [layshaft_present::sheet::CaseLine];

/// The label of a case alone; the gear stands in a field of its own.
fn label(cases: &Cases, at: usize) -> String {
    cases.get(at).map_or_else(String::new, |case| case.label.clone())
}

fn drive(sheet: &DriveSheet, cases: &Cases) -> Drive {
    Drive {
        name: sheet.name.clone(),
        chain: sheet.chain.clone(),
        cases: sheet.rows.iter().map(|row| drive_case(row, cases)).collect(),
    }
}

fn drive_case(row: &DriveRow, cases: &Cases) -> DriveCase {
    let point = |point: &layshaft_present::sheet::PointRow| OperatingPoint {
        speed: value::number(&point.speed),
        stability: point.stability,
        mode: point.mode,
        reached: point.reached,
    };
    let results = |of: &layshaft_present::sheet::PartResults| Results {
        part: (!of.part.is_empty()).then(|| of.part.clone()),
        port: of.port,
        results: of
            .results
            .iter()
            .filter_map(|(name, entry)| Some(NamedResult { name, value: value::entry(entry)? }))
            .collect(),
    };
    DriveCase {
        case: label(cases, row.case),
        gear: row.gear.clone(),
        solved: row.solved,
        outcome: row.outcome.clone(),
        speed: value::entry(&row.speed),
        limited_by: value::entry(&row.limited_by),
        sources: row.sources.iter().map(source).collect(),
        operating_points: row.points.iter().map(point).collect(),
        results: row.results.iter().map(results).collect(),
        faults: row.faults.clone(),
        governs: row.governs.clone(),
    }
}

fn source(row: &SourceRow) -> Source {
    Source {
        part: row.part.clone(),
        count: row.count,
        speed: value::entry(&row.speed),
        effort: value::entry(&row.effort),
        power: value::entry(&row.power),
        peak_power: value::entry(&row.peak_power),
        power_share: value::entry(&row.power_share),
        current: value::entry(&row.current),
        mode: value::entry(&row.mode),
    }
}

fn criterion(line: &CriterionLine, cases: &Cases) -> Criterion {
    let outcome = |of: &OutcomeLine| Outcome {
        case: label(cases, of.case),
        gear: of.gear.clone(),
        verdict: verdict(of.verdict),
        found: of.found.as_ref().map(value::shown),
        low: of.low.as_ref().map(value::shown),
        high: of.high.as_ref().map(value::shown),
        margin: of.margin.as_ref().filter(|margin| margin.value.is_finite()).map(|margin| Margin {
            value: margin.value,
            absolute: margin.absolute,
            shown: margin.text.clone(),
        }),
        remark: of.remark.clone(),
    };
    Criterion {
        clause: line.clause.clone(),
        condition: line.condition.clone(),
        required: line.required.clone(),
        verdict: verdict(line.verdict),
        governing: line.governing,
        outcomes: line.outcomes.iter().map(outcome).collect(),
    }
}

fn show(line: &layshaft_present::sheet::ShowLine, cases: &Cases) -> Show {
    let outcome = |of: &layshaft_present::sheet::ShowOutcomeLine| ShowOutcome {
        case: label(cases, of.case),
        gear: of.gear.clone(),
        value: of.value.as_ref().map(value::shown),
        remark: of.remark.clone(),
    };
    Show { text: line.text.clone(), outcomes: line.outcomes.iter().map(outcome).collect() }
}

fn assumption(line: &layshaft_present::sheet::AssumptionLine) -> Assumption {
    Assumption {
        subject: line.subject.clone(),
        value: line.value.as_ref().map(value::shown),
        reason: line.reason.clone(),
        by: if line.by_tool { "tool" } else { "author" },
    }
}

fn accepted(line: &layshaft_present::sheet::AcceptedLine) -> Accepted {
    Accepted { code: line.code, message: line.message.clone(), because: line.because.clone() }
}
