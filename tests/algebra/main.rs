//! Formulas and slips of drive engineering, through the whole language: `let x: kind = formula`.

#[path = "../support/mod.rs"]
mod support;

use std::fmt::Write as _;

/// What became of a formula.
#[derive(Debug, PartialEq)]
enum Outcome {
    Fits,
    Refused,
    Warned,
    Other(String),
}

/// The names in a formula; what stands behind a number is a unit.
fn words(formula: &str) -> Vec<&str> {
    let mut words = Vec::new();
    let mut behind_number = false;
    for token in formula.split_whitespace() {
        let operator = token.chars().all(|c| "+-*/<>=".contains(c));
        if !behind_number || operator {
            words.extend(token.split(|c: char| !(c.is_alphanumeric() || c == '_')));
        }
        behind_number = token.trim_start_matches('(').parse::<f64>().is_ok();
    }
    words
}

/// A spec of the names a formula uses, and the formula where a kind is wanted.
fn spec(formula: &str, kind: &str, names: &[(&str, &str)]) -> String {
    let used = words(formula);
    let mut out = String::new();
    for (name, rest) in names.iter().filter(|(name, _)| used.contains(name)) {
        let _ = writeln!(out, "let {name}: {rest}");
    }
    let _ = writeln!(out, "let result: {kind} = {formula}");
    out
}

fn outcome(text: &str) -> Outcome {
    let analysis = support::analyze(text);
    let value =
        analysis.values.iter().find(|value| value.name == "result").and_then(|value| value.value.as_ref());
    match (support::codes(&analysis).as_slice(), value.is_some()) {
        ([], true) => Outcome::Fits,
        (["kind-mismatch" | "missing-unit" | "ambiguous-unit"], false) => Outcome::Refused,
        (["counts-turn-twice"], true) => Outcome::Warned,
        (_, has) => Outcome::Other(format!("{} (a value: {has})", support::lines(&analysis))),
    }
}

/// Runs a file and lists every line whose outcome is not the one written.
fn run(file: &str, least: [usize; 3]) {
    let text = support::text(&format!("algebra/{file}"));
    let mut names = Vec::new();
    let mut counts = [0; 3];
    let mut report = String::new();
    for line in text.lines().filter(|line| !line.starts_with('#') && !line.trim().is_empty()) {
        let (word, rest) = line.split_once(' ').expect("a word and what it is about");
        if word == "name" {
            names.push(rest.trim().split_once(": ").expect("a name and its kind"));
            continue;
        }
        let (formula, kind) = rest.rsplit_once("->").expect("a formula and the kind wanted");
        let (index, wanted) = match word {
            "fits" => (0, Outcome::Fits),
            "refused" => (1, Outcome::Refused),
            "warned" => (2, Outcome::Warned),
            other => panic!("unknown word `{other}`"),
        };
        counts[index] += 1;
        let text = spec(formula.trim(), kind.trim(), &names);
        let found = outcome(&text);
        if found != wanted {
            let _ = write!(report, "\n{line}\n    {found:?}");
        }
    }
    assert!(report.is_empty(), "{file}: {report}");
    let shrunk = counts.iter().zip(least).any(|(count, least)| *count < least);
    assert!(!shrunk, "{file} shrank to {counts:?}");
}

#[test]
fn first_formulas() {
    run("first.txt", [128, 55, 10]);
}

#[test]
fn more_formulas() {
    run("more.txt", [44, 24, 5]);
}
