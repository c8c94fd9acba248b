//! Laws of the analysis: it ends, it says where, and what it remembers changes nothing.

use std::sync::Arc;

use layshaft_diagnostics::Diagnostic;
use layshaft_mechanics::registry;
use layshaft_semantics::analysis::DriveCase;
use layshaft_semantics::{Analysis, Memo, MemoryFiles};

use super::{debug, reading::without_a_line};

/// A part to `use` and a table to read, for texts that ask for files.
const PART: &str = "let shaft_power = 2 kW\nsource motor: straight_line { stall_torque = 20 N·m; no_load_speed = 1500 rpm }\n";
const TABLE: &str = "n,Md\n0,12.5\n500,11\n1000,7.5\n1500,0\n";

/// Analyzes any text.
///
/// # Panics
/// A law is broken.
pub fn analyze(text: &str) {
    with_files(text, &files(TABLE));
}

/// Reads any text as a table of a source.
///
/// # Panics
/// A law is broken.
pub fn csv(table: &str) {
    const SPEC: &str = "source motor: measured_curve { curve = csv \"t.csv\" (n as speed [rpm], Md as torque [N·m]); \
                        braking = none }\nload fan: quadratic { rated_torque = 8 N·m; rated_speed = 900 rpm }\n\
                        drive d = motor -> fan\nrequire \"R1\" d.speed >= 1 rpm\n";
    with_files(SPEC, &files(table));
}

fn files(table: &str) -> MemoryFiles {
    let text = |path: &str, text: &str| (String::from(path), Arc::from(text));
    MemoryFiles { texts: [text("parts.shaft", PART), text("t.csv", table)].into() }
}

fn with_files(text: &str, files: &MemoryFiles) {
    let fresh = |text: &str| layshaft_semantics::analyze("a.shaft", Arc::from(text), files);
    let analysis = fresh(text);
    places(&analysis);
    numbers(&analysis);
    let mut memo = Memo::default();
    let kept = |text: &str, memo: &mut Memo| {
        layshaft_semantics::analyze_with("a.shaft", Arc::from(text), files, memo)
    };
    let _ = kept(&without_a_line(text), &mut memo);
    debug::same(&answers(&kept(text, &mut memo)), &answers(&analysis), "the memo changes what is answered");
    let other = with_another_number(text);
    debug::same(&answers(&kept(&other, &mut memo)), &answers(&fresh(&other)), "so does one number");
    debug::same(&answers(&kept(text, &mut memo)), &answers(&analysis), "so does the way back");
    bounded(text, files, &memo);
    debug::same(&answers(&fresh(text)), &answers(&analysis), "the same text gives two answers");
}

/// What is remembered is what the newest text asks for, and nothing of those before it.
fn bounded(text: &str, files: &MemoryFiles, memo: &Memo) {
    let mut new = Memo::default();
    let _ = layshaft_semantics::analyze_with("a.shaft", Arc::from(text), files, &mut new);
    assert_eq!(memo.solved(), new.solved(), "the memo keeps more or less than one text needs");
}

/// The text with the digit in its middle exchanged: an edit of one number, as a rule.
fn with_another_number(text: &str) -> String {
    let digits: Vec<usize> =
        text.bytes().enumerate().filter(|(_, c)| c.is_ascii_digit()).map(|d| d.0).collect();
    let Some(&at) = digits.get(digits.len() / 2) else { return text.to_owned() };
    let other = if text.as_bytes()[at] == b'7' { "8" } else { "7" };
    [&text[..at], other, &text[at + 1..]].concat()
}

/// Everything that is answered, to the bit: numbers are written so that they are read back the same.
fn answers(analysis: &Analysis) -> String {
    let Analysis {
        diagnostics, values, parts, cases, drives, criteria, shows, assumptions, accepted, ..
    } = analysis;
    let asked: String = drives.iter().flat_map(|drive| &drive.cases).map(asked).collect();
    format!(
        "{diagnostics:?}{values:?}{parts:?}{cases:?}{drives:?}{criteria:?}{shows:?}{assumptions:?}{accepted:?}{asked}"
    )
}

/// Every result of a drive and of the parts in it.
fn asked(case: &DriveCase) -> String {
    let (Some(solution), Some(spec)) = (&case.solution, &case.spec) else { return String::new() };
    let mut out = format!("{:?}{:?}", solution.outcome(), solution.findings());
    let mut ask = |part, name| out.push_str(&format!("{:?}", solution.answer(part, None, name)));
    registry::DRIVE_RESULTS.iter().for_each(|row| ask(None, row.name));
    for (index, part) in spec.parts.iter().enumerate() {
        let results = part.row.results.iter().chain(registry::common_results(part.row.role));
        results.for_each(|row| ask(Some(index), row.name));
    }
    out
}

/// Every finding stands at whole characters of a file of the analysis, and says something.
fn places(analysis: &Analysis) {
    let check = |finding: &Diagnostic| {
        assert!(!finding.message.trim().is_empty(), "a finding says nothing");
        let edits = finding.fixes.iter().flat_map(|fix| &fix.edits).map(|edit| edit.place);
        let labels = finding.related.iter().chain([&finding.primary]).map(|label| label.place);
        for place in labels.chain(edits) {
            let file = analysis.file(place.file).expect("a finding stands in a file of the analysis");
            let range = place.span.start as usize..place.span.end as usize;
            assert!(file.text.get(range).is_some(), "{finding:?} stands outside its file");
        }
    };
    analysis.diagnostics.iter().for_each(check);
    analysis.accepted.iter().for_each(|accepted| check(&accepted.diagnostic));
}

/// No number that is none is answered.
fn numbers(analysis: &Analysis) {
    let Analysis { values, criteria, shows, assumptions, .. } = analysis;
    let form = debug::unquoted(&format!("{values:?}{criteria:?}{shows:?}{assumptions:?}"));
    for none in ["NaN", ": inf", ": -inf", "(inf", "(-inf"] {
        assert!(!form.contains(none), "`{none}` is answered");
    }
}
