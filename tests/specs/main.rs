//! The worked specs: hand values beside them, what the command prints, and no message but the expected ones.
//!
//! `NAME.hand.toml` holds values reckoned from the laws without the tool. `NAME.out` is what `layshaft check` prints;
//! `LAYSHAFT_BLESS=1` writes it anew.

#![allow(clippy::disallowed_methods, reason = "this test reads and blesses its own folder")]

#[path = "../support/mod.rs"]
mod support;

use std::fmt::Write as _;

use layshaft_report::terminal::{Options, Style, render};
use layshaft_semantics::Analysis;
use layshaft_semantics::quantity::Datum;
use toml::Value;

fn analyze(name: &str, text: &str) -> Analysis {
    layshaft_semantics::analyze(&format!("{name}.shaft"), text.into(), &support::spec_files())
}

/// The names of the specs, without their ending.
fn specs() -> Vec<String> {
    let names = support::names("specs", ".shaft");
    names.iter().filter_map(|name| name.strip_suffix(".shaft").map(str::to_owned)).collect()
}

/// What is wrong with the values of one spec.
fn judge(name: &str) -> Vec<String> {
    let text = support::text(&format!("specs/{name}.shaft"));
    let hand: toml::Table =
        support::text(&format!("specs/{name}.hand.toml")).parse().expect("hand values can be read");
    let values: Vec<&toml::Table> =
        hand["value"].as_array().into_iter().flatten().filter_map(Value::as_table).collect();
    assert!(values.len() >= 5, "{name} has only {} hand values", values.len());
    let word =
        |value: &toml::Table, key: &str| value.get(key).and_then(Value::as_str).unwrap_or("").to_owned();
    let asks: Vec<String> = values.iter().map(|value| word(value, "ask")).collect();
    let own = analyze(name, &text).shows.len();
    let analysis = analyze(name, &support::asking(&text, asks.iter().map(String::as_str)));
    let mut wrong = Vec::new();
    for (index, value) in values.iter().enumerate() {
        let (ask, case) = (&asks[index], word(value, "case"));
        let number = |key: &str| value.get(key).and_then(Value::as_float).expect("a value and how near");
        let (wanted, near) = (number("value"), number("rel"));
        assert!(word(value, "how").len() > 8, "{name}: {ask} does not say how it was reckoned");
        match support::answer(&analysis, own + index, &case) {
            Ok(Datum::Quantity(found)) => {
                let found = found.si / support::factor(&word(value, "unit"));
                let off = (found / wanted - 1.0).abs();
                if off.is_nan() || off > near {
                    wrong.push(format!("{ask} in {case}: {found}, by hand {wanted}, off by {off:.1e}"));
                }
            }
            other => wrong.push(format!("{ask} in {case}: {other:?}")),
        }
    }
    wrong
}

#[test]
fn hand_values() {
    let mut report = String::new();
    for name in specs() {
        for line in judge(&name) {
            let _ = write!(report, "\n{name}: {line}");
        }
    }
    assert!(report.is_empty(), "{report}");
}

#[test]
fn printed_as_before() {
    let bless = std::env::var("LAYSHAFT_BLESS").is_ok_and(|value| value == "1");
    let mut changed = Vec::new();
    for name in specs() {
        let analysis = analyze(&name, &support::text(&format!("specs/{name}.shaft")));
        let options = Options { style: Style { color: false }, width: 100, names: Vec::new() };
        let printed = render(&analysis, &options);
        let file = support::path(&format!("specs/{name}.out"));
        if bless {
            std::fs::write(&file, &printed).expect("the folder can be written");
        } else if std::fs::read_to_string(&file).ok().as_deref() != Some(printed.as_str()) {
            changed.push(name);
        }
    }
    assert!(
        changed.is_empty(),
        "printed otherwise than {changed:?}.out say; look, then bless with LAYSHAFT_BLESS=1"
    );
}

/// Criteria that fail on purpose, by the number at their beginning.
const FAILING: &[(&str, &[&str])] = &[
    ("bakery-trike", &["T1-6", "T1-7"]),
    ("bar-lathe", &[]),
    ("barge-winch", &["S1-2"]),
    ("canal-ferry", &[]),
    ("glaze-mixer", &["P4-2"]),
    ("gravel-conveyor", &[]),
    ("indexing-drum", &["F7-1"]),
    ("irrigation-pump", &[]),
    ("kiln-fan", &["K2-4"]),
    ("lathe-spindle", &[]),
    ("lift-table", &[]),
    ("mill-hoist", &[]),
    ("mill-turbine", &[]),
    ("river-ferry", &[]),
    ("stamping-press", &["P7-2"]),
    ("tunnel-trolley", &[]),
    ("twin-tumbler", &[]),
    ("wind-charger", &["H8-3"]),
];

#[test]
fn the_right_criteria_fail_and_none_is_left_open() {
    use layshaft_semantics::analysis::Verdict;
    assert_eq!(FAILING.iter().map(|(name, _)| *name).collect::<Vec<_>>(), specs());
    for (name, failing) in FAILING {
        let analysis = analyze(name, &support::text(&format!("specs/{name}.shaft")));
        assert!(analysis.diagnostics.is_empty(), "{name}: {}", support::lines(&analysis));
        let failed: Vec<&str> = analysis
            .criteria
            .iter()
            .filter(|criterion| criterion.verdict != Verdict::Holds)
            .map(|criterion| criterion.clause.split(' ').next().unwrap_or_default())
            .collect();
        assert_eq!(failed, *failing, "{name}");
    }
}

#[test]
fn specs_are_written_in_the_one_form() {
    for name in specs() {
        let text = support::text(&format!("specs/{name}.shaft"));
        assert_eq!(
            layshaft_syntax::format::format(&text).text,
            text,
            "{name} is not as `layshaft fmt` writes it"
        );
    }
}
