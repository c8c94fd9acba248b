//! Checks against the outside: what books, papers and closed forms give, asked through the language.
//!
//! Every file holds checks: a spec, its source, what is asked of it, the value, its unit and how near it must come.
//! Where a check lists `points`, these are all the operating points of a drive, each with its stability. What the
//! language cannot say stands under `not_sayable`, with the reason.

#[path = "../support/mod.rs"]
mod support;

use layshaft_mechanics::solution::Stability;
use layshaft_semantics::Analysis;
use layshaft_semantics::quantity::Datum;
use toml::Value;

fn checks(file: &str, key: &str) -> Vec<toml::Table> {
    let text = support::text(&format!("published/{file}"));
    let table: toml::Table = text.parse().unwrap_or_else(|error| panic!("{file}: {error}"));
    let list = table.get(key).and_then(Value::as_array).cloned().unwrap_or_default();
    list.into_iter().filter_map(|value| value.as_table().cloned()).collect()
}

fn text<'a>(table: &'a toml::Table, key: &str) -> &'a str {
    table.get(key).and_then(Value::as_str).unwrap_or_default()
}

fn number(table: &toml::Table, key: &str) -> Option<f64> {
    table.get(key).and_then(Value::as_float)
}

fn list(table: &toml::Table, key: &str) -> Vec<toml::Table> {
    let list = table.get(key).and_then(Value::as_array).cloned().unwrap_or_default();
    list.into_iter().filter_map(|value| value.as_table().cloned()).collect()
}

/// What is wrong with the answer to one question.
fn compare(analysis: &Analysis, index: usize, expect: &toml::Table) -> Option<String> {
    let case = expect.get("case").and_then(Value::as_str).unwrap_or("plain");
    let ask = text(expect, "ask");
    let found = match support::answer(analysis, index, case) {
        Ok(found) => found,
        Err(why) => return Some(format!("{ask} in {case}: {why}")),
    };
    if let Some(wanted) = expect.get("flag").and_then(Value::as_bool) {
        return (found != Datum::Flag(wanted)).then(|| format!("{ask} in {case}: {found:?}, not {wanted}"));
    }
    let (Datum::Quantity(found), Some(wanted), Some(near)) =
        (&found, number(expect, "value"), number(expect, "rel"))
    else {
        return Some(format!("{ask} in {case}: {found:?}"));
    };
    let found = found.si / support::factor(text(expect, "unit"));
    let off = ((found - wanted) / wanted).abs();
    let right = off <= near;
    (!right).then(|| format!("{ask} in {case}: {found}, not {wanted}: off by {off:.1e}, {near:.0e} allowed"))
}

/// What is wrong with the operating points of a drive.
fn compare_points(analysis: &Analysis, wanted: &[toml::Table]) -> Vec<String> {
    let Some(first) = wanted.first() else { return Vec::new() };
    let drive = analysis.drives.iter().find(|drive| drive.name == text(first, "drive"));
    let solution = drive.and_then(|drive| drive.cases.first()).and_then(|case| case.solution.as_ref());
    let Some(solution) = solution else { return vec!["the drive has no solution".to_owned()] };
    let found = solution.points();
    if found.len() != wanted.len() {
        return vec![format!("{} operating points, not {}: {found:?}", found.len(), wanted.len())];
    }
    let mut wrong = Vec::new();
    for (point, wanted) in found.iter().zip(wanted) {
        let speed = point.source_speed;
        let value = number(wanted, "speed").unwrap_or(f64::NAN);
        let off = (speed / support::factor(text(wanted, "unit")) / value - 1.0).abs();
        let right = off <= number(wanted, "rel").unwrap_or(0.0);
        let word = match point.stability {
            Stability::Stable => "stable",
            Stability::Unstable => "unstable",
            Stability::Marginal => "marginal",
        };
        if !right || word != text(wanted, "stability") {
            wrong.push(format!(
                "a point at {speed} rad/s, {word}, where {wanted:?} is wanted (off by {off:.1e})"
            ));
        }
    }
    wrong
}

/// What is wrong with one check.
fn judge(check: &toml::Table) -> Vec<String> {
    let (expects, points) = (list(check, "expect"), list(check, "points"));
    if text(check, "source").is_empty() || (expects.is_empty() && points.is_empty()) {
        return vec!["a check names its source and what it expects".to_owned()];
    }
    let spec = support::asking(text(check, "spec"), expects.iter().map(|expect| text(expect, "ask")));
    let analysis = support::analyze(&spec);
    let mut wrong: Vec<String> =
        analysis.diagnostics.iter().map(|found| support::line(&analysis, found)).collect();
    wrong.extend(expects.iter().enumerate().filter_map(|(at, expect)| compare(&analysis, at, expect)));
    wrong.extend(compare_points(&analysis, &points));
    wrong
}

fn run(file: &str) {
    let checks = checks(file, "check");
    assert!(!checks.is_empty(), "{file} holds no check");
    let mut report = String::new();
    for check in &checks {
        for line in judge(check) {
            report.push_str(&format!("\n{}\n    {line}", text(check, "name")));
        }
    }
    assert!(report.is_empty(), "{file}: {report}");
}

#[test]
fn straight_lines() {
    run("lines.toml");
}

#[test]
fn people() {
    run("people.toml");
}

#[test]
fn operating_points() {
    run("points.toml");
}

#[test]
fn induction_machines() {
    run("induction.toml");
}

#[test]
fn engines_turbines_and_fluids() {
    run("sources.toml");
}

#[test]
fn transmissions() {
    run("transmissions.toml");
}

#[test]
fn ratios() {
    run("ratios.toml");
}

#[test]
fn loads_and_run_up() {
    run("loads.toml");
}

#[test]
fn what_cannot_be_said_has_a_reason() {
    for file in support::names("published", ".toml") {
        for entry in checks(&file, "not_sayable") {
            assert!(!text(&entry, "name").is_empty() && text(&entry, "why").len() > 20, "{file}: {entry:?}");
        }
    }
}

#[test]
fn a_wrong_value_is_seen() {
    let mut check = checks("lines.toml", "check").remove(0);
    let off = "[[expect]]\nask = \"bench.motor.speed\"\nvalue = 301.0\nunit = \"rpm\"\nrel = 1e-3\n";
    let off: toml::Table = off.parse().expect("it is a table");
    check.insert("expect".to_owned(), off["expect"].clone());
    assert_eq!(judge(&check).len(), 1);
}
