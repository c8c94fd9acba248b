//! Values, kinds, names and tolerances, drawn.

mod common;

use common::{analysis, check, check_with, fixed};
use layshaft_semantics::quantity::Datum;

fn value(text: &str, name: &str) -> (f64, Option<(f64, f64)>) {
    let analysis = analysis(text);
    assert!(analysis.diagnostics.is_empty(), "{:#?}", analysis.diagnostics);
    let record = analysis.values.iter().find(|value| value.name == name).expect("the value");
    match &record.value {
        Some(Datum::Quantity(quantity)) => (quantity.si, quantity.limits),
        other => panic!("{other:?}"),
    }
}

#[test]
fn a_torque_is_no_energy() {
    check("let a: torque = 5 J   #! kind-mismatch: a torque is wanted here");
    assert_eq!(fixed("let a: torque = 5 J\n"), "let a: torque = 5 N·m\n");
    check("let a: rotational_speed = 50 Hz  #! kind-mismatch");
    check("let a = 5 N·m + 3 J  #! kind-mismatch");
}

#[test]
fn formulas_people_write_pass() {
    check(
        "let F = 200 N
let r = 0.2 m
let n = 1450 rpm
let T: torque = F * r
let P: power = T * n
let v: speed = n * r
let f = 50 Hz
let w: rotational_speed = 2 * pi * f
let m: force = 20 kg * standard_gravity",
    );
}

#[test]
fn one_mistake_one_message() {
    check(
        "let a = 5 foo  #! unknown-unit
let b: torque = a * 2
let c = b + 3 N·m",
    );
    check("let x = y + z  #! unknown-name: `y` | unknown-name: `z`");
}

#[test]
fn a_number_without_unit_is_asked_for_it() {
    check("let a: torque = 5  #! missing-unit: a torque is wanted here, and the number has no unit");
    check("let a: torque = 0");
    assert_eq!(fixed("let a: torque = 5\n"), "let a: torque = 5 N·m\n");
}

#[test]
fn min_to_the_minus_one_is_read_by_its_place() {
    let (n, _) = value("let n: rotational_speed = 1450 1/min\n", "n");
    assert!((n - 151.843_644_923_506_7).abs() < 1e-9, "{n}");
    check("let n: rotational_speed = 150 1/s   #! ambiguous-unit");
}

#[test]
fn cycles_show_their_path_once() {
    check(
        "let a = b   #! cycle: `a` depends on itself: a -> b -> c -> a
let b = c
let c = a
let d = a",
    );
}

#[test]
fn tolerances_spell_their_limits() {
    assert_eq!(value("let a = 220 ± 10 mm\n", "a"), (0.22, Some((0.21, 0.23))));
    let (_, limits) = value("let a = 100 V ± 10 %\n", "a");
    let (low, high) = limits.expect("limits");
    assert!((low - 90.0).abs() < 1e-9 && (high - 110.0).abs() < 1e-9);
    check("let a = 74 % ± 4 %  #! ambiguous-percent-tolerance");
    let (_, limits) = value("let a = 74 % ± 4 points\n", "a");
    let (low, high) = limits.expect("limits");
    assert!((low - 0.70).abs() < 1e-12 && (high - 0.78).abs() < 1e-12);
    assert_eq!(value("let a = 10 .. 20 N·m\n", "a"), (15.0, Some((10.0, 20.0))));
    check("let a = 20 N·m .. 10 N·m   #! contradiction");
    let (si, limits) = value("let a = -20 °C ± 5 K\n", "a");
    assert!((si - 253.15).abs() < 1e-9);
    assert!((limits.expect("limits").0 - 248.15).abs() < 1e-9);
}

#[test]
fn a_typed_conversion_factor_is_remarked() {
    check("let P = 4 kW\nlet T = 9550 * P / 1440 rpm  #! typed-factor");
    check("let m = 4 kg\nlet F = m * 9.81  #! typed-factor");
}

#[test]
fn a_unit_that_hides_a_name_is_told() {
    check("let g = 9.80665 m/s²\nlet F = 10 kg*g   #! unit-hides-name");
}

#[test]
fn doubled_names_are_told_at_the_second() {
    check("let a = 1 m\nlet a = 2 m   #! doubled-name");
}

#[test]
fn used_files_share_values_and_parts() {
    let parts = "let load = 5 kN\nlet bad = load + 1 m\n";
    check_with("use \"parts.shaft\"\nlet a: force = 2 * parts.load", &[("parts.shaft", "let load = 5 kN\n")]);
    check_with(
        "use \"parts.shaft\" as p\nlet a: force = p.lod   #! unknown-name",
        &[("parts.shaft", "let load = 5 kN\n")],
    );
    check("use \"gone.shaft\"   #! missing-file");
    check("use \"spec.shaft\"   #! cycle");
    let analysis = common::with_files("use \"parts.shaft\"\n", &[("parts.shaft", parts)]);
    assert_eq!(analysis.diagnostics.len(), 1, "a used file's own mistakes are told in it");
    assert_eq!(analysis.diagnostics[0].primary.place.file.0, 1);
}

#[test]
fn twenty_thousand_chained_values() {
    let mut text = String::from("let v0 = 1 m\n");
    for index in 1..20_000 {
        text.push_str(&format!("let v{index} = v{} + 1 m\n", index - 1));
    }
    // From the far end, so that every value is still unknown when it is asked for.
    let reversed: Vec<&str> = text.lines().rev().collect();
    let (si, _) = value(&(reversed.join("\n") + "\n"), "v19999");
    assert_eq!(si, 20_000.0);
}
