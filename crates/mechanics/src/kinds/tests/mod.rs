//! What every row promises, whatever the kind.

mod samples;
mod symbols;

use super::ROWS;
use crate::laws::checked;
use crate::registry::{Bounds, Field, KindRow, Need, ResultShape, Shape, common_fields};
use layshaft_units::kind;
use std::collections::{BTreeMap, BTreeSet};

fn each(mut check: impl FnMut(&KindRow)) {
    for row in ROWS {
        check(row);
    }
}

fn fields(row: &KindRow) -> impl Iterator<Item = &Field> {
    row.fields.iter().chain(common_fields(row.role))
}

/// A meaning: one line that says something, without a final point.
fn is_line(text: &str) -> bool {
    !text.trim().is_empty() && !text.contains('\n') && !text.ends_with('.') && !text.contains("  ")
}

#[test]
fn names_are_words_and_told_apart() {
    let mut seen = BTreeSet::new();
    each(|row| {
        assert!(seen.insert((row.role, row.name)), "{} twice", row.name);
        let mut names = BTreeSet::new();
        for field in fields(row) {
            assert!(names.insert(field.name), "{}.{} twice", row.name, field.name);
        }
        let mut results = BTreeSet::new();
        for result in row.results {
            assert!(results.insert(result.name), "{}.{} twice", row.name, result.name);
        }
        for name in names.iter().chain(&results).chain([&row.name]) {
            let word = |c: char| c.is_ascii_lowercase() || c.is_ascii_digit() || c == '_';
            assert!(name.chars().all(word) && name.starts_with(|c: char| c.is_ascii_lowercase()), "{name}");
        }
    });
}

#[test]
fn kinds_are_of_the_table() {
    let known = |name: &str, place: &str| assert!(kind(name).is_some(), "{place}: no kind {name}");
    each(|row| {
        for field in row.fields {
            match field.shape {
                Shape::Quantity(name) | Shape::OfRated(name) | Shape::Interval(name) => {
                    known(name, field.name)
                }
                Shape::Points(columns) => columns.iter().for_each(|column| known(column.kind, field.name)),
                _ => {}
            }
        }
        for result in row.results {
            if let ResultShape::Quantity(name) = result.shape {
                known(name, result.name);
            }
        }
    });
    for law in checked() {
        law.formula.symbols.iter().for_each(|(symbol, kind, _)| known(kind, symbol));
    }
}

#[test]
fn everything_says_what_it_means() {
    each(|row| {
        for text in [row.title, row.example] {
            assert!(!text.is_empty());
        }
        assert!(row.summary.ends_with('.') && !row.summary.contains("  "), "{}", row.summary);
        for caution in row.cautions {
            assert!(caution.ends_with('.') && !caution.contains("  "), "{caution}");
        }
        for field in fields(row) {
            assert!(is_line(field.meaning), "{}.{}: {}", row.name, field.name, field.meaning);
            if let Need::Default { why, .. } | Need::Where(why) = field.need {
                assert!(is_line(why), "{}.{}: {why}", row.name, field.name);
            }
            if let Shape::Choice(choices) = field.shape {
                assert!(choices.iter().all(|(word, meaning)| is_line(word) && is_line(meaning)));
            }
        }
        for result in row.results {
            assert!(is_line(result.meaning), "{}.{}: {}", row.name, result.name, result.meaning);
        }
    });
}

/// Whether every value of `inner` lies in `outer`.
fn within(inner: Bounds, outer: Bounds) -> bool {
    let low = inner.low > outer.low || (inner.low == outer.low && (outer.low_in || !inner.low_in));
    let high = inner.high < outer.high || (inner.high == outer.high && (outer.high_in || !inner.high_in));
    low && high
}

#[test]
fn plausible_lies_within_possible() {
    each(|row| {
        for field in row.fields {
            let place = format!("{}.{}", row.name, field.name);
            assert!(
                field.hard.low < field.hard.high && field.plausible.low < field.plausible.high,
                "{place}"
            );
            assert!(field.plausible == Bounds::ANY || within(field.plausible, field.hard), "{place}");
            if let Need::Default { si, .. } = field.need {
                assert!(field.hard.holds(si) && field.plausible.holds(si), "{place}: default {si}");
            }
            let measured = matches!(field.shape, Shape::Quantity(_) | Shape::OfRated(_) | Shape::Interval(_));
            assert!(!measured || field.plausible != Bounds::ANY, "{place}: no plausible range");
        }
    });
}

#[test]
fn formulas_are_checked_ones_and_share_their_symbols() {
    each(|row| {
        let mut symbols = BTreeMap::new();
        for formula in row.formulas {
            let same = |law: &&crate::laws::Checked| {
                law.formula.text == formula.text && law.formula.symbols == formula.symbols
            };
            assert!(checked().any(|law| same(&law)), "{}: `{}` has no kernel", row.name, formula.text);
            for (symbol, kind, meaning) in formula.symbols {
                let other = symbols.insert(*symbol, (*kind, *meaning));
                let clash = other.is_some_and(|(k, _)| k != *kind);
                assert!(!clash, "{}: {symbol} is a {kind} here and {other:?} there", row.name);
            }
        }
    });
}

#[test]
fn examples_declare_their_kind() {
    each(|row| {
        let role = format!("{:?}", row.role).to_lowercase();
        let declares = |line: &str| {
            line.starts_with(&format!("{role} ")) && line.contains(&format!(": {} {{", row.name))
        };
        assert!(row.example.lines().any(declares), "{}", row.example);
        assert_eq!(row.example.matches('{').count(), row.example.matches('}').count(), "{}", row.example);
    });
}

#[test]
fn what_can_hurt_says_so() {
    for name in [
        "hoist",
        "brake",
        "drum",
        "reeving",
        "servo",
        "vehicle",
        "incline",
        "flywheel",
        "freewheel",
        "worm",
        "screw",
        "planetary",
        "clutch",
        "fluid_coupling",
        "friction_pulley",
        "rack",
        "crank",
        "person",
        "conveyor",
        "work_stroke",
        "generator",
        "winder",
        "off_axis_mass",
        "fan",
        "pump",
        "propeller",
        "cutting",
    ] {
        let row = ROWS.iter().find(|row| row.name == name);
        assert!(row.is_some_and(|row| !row.cautions.is_empty()), "{name}");
    }
}
