//! Drawn tests of what stands at the end of a line.

use layshaft_diagnostics::Span;

use super::{Categories, Hint, LONGEST, hints, merge_stale, tooltip};
use crate::fixture::Fixture;

const FAN: &str = "source motor: straight_line { stall_torque = 10 N·m; no_load_speed = 3000 rpm }
transmission reducer: gear {
    reduction = 4; efficiency = 90 %
}
load fan: quadratic { rated_torque = 12 N·m; rated_speed = 600 rpm }
drive d = motor -> reducer -> fan { direction = forward }
case weak { motor.stall_torque = each 8 N·m, 1 N·m }
let double = 2 * d.fan.speed
let plain_one = 3 m
require \"R1\" d.fan.speed >= 300 rpm
require \"R2\" d.fan.speed >= 500 rpm
show d.motor.power
";

fn all(fixture: &Fixture) -> Vec<Hint> {
    hints(&fixture.snapshot, fixture.file, Span::new(0, u32::MAX), Categories::default())
}

/// Each line with its hint behind two blanks, lines without hint left out; figure spaces as `_`.
fn drawn(fixture: &Fixture, hints: &[Hint]) -> String {
    let source = fixture.snapshot.file(fixture.file).expect("the file is there");
    let mut out = String::new();
    for hint in hints {
        let line = source.lines.line_of(hint.offset);
        let (start, _) = source.lines.range(line).expect("the line is there");
        let words: String = source.text[start as usize..hint.offset as usize].chars().take(12).collect();
        let old = if hint.stale { " (old)" } else { "" };
        out.push_str(&format!("{words} | {}{old}\n", hint.text.replace('\u{2007}', "_")));
    }
    out
}

#[test]
fn results_at_the_end_of_their_lines() {
    let fixture = Fixture::new(FAN);
    let found = drawn(&fixture, &all(&fixture));
    let expected = "\
source motor | 2.743 N·m · _2177 rpm
transmission | 9.875 N·m · 544.3 rpm
load fan: qu | 9.875 N·m · 544.3 rpm
drive d = mo | 544.3 rpm, runs up
let double = | _1089 rpm
require \"R1\" | fails in weak[1 N·m]
require \"R2\" | fails in weak[1 N·m]
show d.motor | 71.71 .. 625.4 W
";
    assert_eq!(found, expected);
    let categories = Categories { values: false, criteria: false, ..Categories::default() };
    let fewer = hints(&fixture.snapshot, fixture.file, Span::new(0, u32::MAX), categories);
    assert_eq!(fewer.len(), 5);
    for hint in all(&fixture) {
        assert!(hint.text.chars().count() <= LONGEST, "{}", hint.text);
        assert!(tooltip(&fixture.snapshot, &hint).is_some(), "{}", hint.text);
    }
}

#[test]
fn only_the_lines_asked_for() {
    let fixture = Fixture::new(&FAN.replace("let double", "<|let double = 2|> * d.fan.speed\nlet other"));
    let range = fixture.ranges[0].span;
    let found = hints(&fixture.snapshot, fixture.file, range, Categories::default());
    assert_eq!(found.iter().map(|hint| hint.key.as_str()).collect::<Vec<_>>(), ["let double"]);
}

#[test]
fn the_last_good_value_stays_while_a_line_is_typed() {
    let before = all(&Fixture::new(FAN));
    let typed = Fixture::new(&FAN.replace("let double = 2 * d.fan.speed", "let double = 2 * "));
    let merged = merge_stale(&typed.snapshot, typed.file, &before, all(&typed), Categories::default());
    let old: Vec<_> = merged.iter().filter(|hint| hint.stale).map(|hint| hint.key.as_str()).collect();
    assert_eq!(old, ["let double"]);
    // A line that is whole again, or gone, has no old value.
    let literal = Fixture::new(&FAN.replace("let double = 2 * d.fan.speed", "let double = 2 rpm"));
    let merged = merge_stale(&literal.snapshot, literal.file, &before, all(&literal), Categories::default());
    assert!(merged.iter().all(|hint| !hint.stale));
}

#[test]
fn parts_of_a_broken_drive_keep_their_values() {
    let before = all(&Fixture::new(FAN));
    let typed = Fixture::new(&FAN.replace("reduction = 4;", "reduction = ;"));
    let merged = merge_stale(&typed.snapshot, typed.file, &before, all(&typed), Categories::default());
    let old: Vec<_> = merged.iter().filter(|hint| hint.stale).map(|hint| hint.key.as_str()).collect();
    assert!(old.contains(&"drive d") && old.contains(&"part fan"), "{old:?}");
}
