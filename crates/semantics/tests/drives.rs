//! Parts, drives, cases, criteria and accepted warnings, drawn.

mod common;

use common::{analysis, check, check_with};
use layshaft_semantics::analysis::Verdict;

/// A clean drive, for the tests to spoil: 25 N·m at rest, 3000 rpm without load, against 0.001 N·m/(rad/s)².
const PUMP: &str = "
source motor: straight_line { stall_torque = 25 N·m; no_load_speed = 3000 rpm; inertia = 0.004 kg·m² }
transmission belt: gear { reduction = 2; efficiency = 95 % }
load pump: quadratic { rated_torque = 8 N·m; rated_speed = 1200 rpm; inertia = 0.02 kg·m² }
drive pumping = motor -> belt -> pump { direction = forward }
";

fn with(text: &str) -> String {
    format!("{PUMP}{text}")
}

#[test]
fn the_pump_is_clean() {
    check(PUMP);
}

#[test]
fn unknown_fields_and_kinds_offer_what_is_near() {
    check("source m: dc_moter { }   #! unknown-name: no source of the kind `dc_moter`");
    check("load m: gear { }   #! unknown-name");
    check(
        "source m: straight_line { stal_torque = 25 N·m; no_load_speed = 3000 rpm }   #! unknown-field: `stal_torque`",
    );
    check("transmission g: gear { ratio = 4; efficiency = 95 % }  #! unknown-field: `ratio` is not a field");
}

#[test]
fn all_missing_fields_are_one_message() {
    check("transmission g: gear { reduction = 2 }   #! missing-field: `g` needs `efficiency`");
}

#[test]
fn values_out_of_range_say_the_range_and_the_slip() {
    check("transmission g: gear { reduction = 2; efficiency = 95 }   #! out-of-range: and this is 9500 %");
    let text = "transmission g: gear { reduction = 2; efficiency = 95 }\n";
    assert!(common::fixed(text).contains("efficiency = 95 %"), "{}", common::fixed(text));
    check("transmission g: gear { reduction = 0; efficiency = 95 % }   #! out-of-range");
    check("transmission g: gear { reduction = -2; efficiency = 95 % }   #! out-of-range");
    check("transmission g: gear { reduction = 2; efficiency = 105 % }   #! out-of-range");
}

#[test]
fn criteria_find_their_margin() {
    let text =
        with("require \"1\" pumping.speed >= 1000 rpm\nrequire \"2\" 900 rpm <= pumping.speed <= 1000 rpm\n");
    let analysis = analysis(&text);
    assert!(analysis.diagnostics.is_empty(), "{:#?}", analysis.diagnostics);
    assert_eq!(analysis.criteria[0].verdict, Verdict::Holds);
    assert_eq!(analysis.criteria[1].verdict, Verdict::Fails);
    let measure = |index: usize| {
        let criterion = &analysis.criteria[index];
        let outcome = &criterion.outcomes[criterion.governing.expect("an outcome")];
        outcome.measure.as_ref().expect("a measure").margin
    };
    assert!(measure(0) > 0.0 && measure(1) < 0.0);
    // One speed, two limits of 1000 rpm: the margins are mirrored.
    assert!((measure(0) + measure(1)).abs() < 1e-12);
    assert_eq!(analysis.verdict(), Some(Verdict::Fails));
}

#[test]
fn a_criterion_is_asked_in_every_case_unless_scoped() {
    let cases = "
case warm { motor.stall_torque = each 20 N·m, 22 N·m }
case sticky { pump.rated_torque = 9 N·m }
case both = warm with { belt.efficiency = 90 % }
require \"all\" pumping.starts
require \"in\" pumping.starts only in warm
require \"one\" pumping.starts only in warm[20 N·m]
require \"not\" pumping.starts not in warm, both
require \"where\" pumping.starts only where pumping.direction = reverse
require \"with\" pumping.starts only in plain with { belt.reduction = 3 }
";
    let analysis = analysis(&with(cases));
    let labels = |index: usize| -> Vec<&str> {
        let outcomes = &analysis.criteria[index].outcomes;
        outcomes.iter().map(|outcome| analysis.cases[outcome.case].label.as_str()).collect()
    };
    let warm = ["warm[20 N·m]", "warm[22 N·m]"];
    let both = ["both[20 N·m]", "both[22 N·m]"];
    assert_eq!(labels(0), [&["plain"][..], &warm, &["sticky"], &both].concat());
    assert_eq!(labels(1), warm);
    assert_eq!(labels(2), [warm[0]]);
    assert_eq!(labels(3), ["plain", "sticky"]);
    assert_eq!(labels(4), [""; 0]);
    assert_eq!(labels(5), ["plain with { belt.reduction = 3 }"]);
    let codes: Vec<_> = analysis.diagnostics.iter().map(|found| found.code.row().word).collect();
    assert_eq!(codes, ["never-judged"]);
}

#[test]
fn an_overrides_own_path_is_the_plain_value() {
    let text = with(
        "let spare = 1.25\ncase more { motor.stall_torque = spare * motor.stall_torque }\nshow motor.stall_torque as N·m\n",
    );
    let analysis = analysis(&text);
    assert!(analysis.diagnostics.is_empty(), "{:#?}", analysis.diagnostics);
    let shown: Vec<String> =
        analysis.shows[0].outcomes.iter().map(|one| format!("{:?}", one.value)).collect();
    assert!(shown[0].contains("si: 25.0") && shown[1].contains("si: 31.25"), "{shown:?}");
}

#[test]
fn cases_name_what_exists() {
    check(&with("case a { moter.stall_torque = 1 N·m }   #! unknown-name: nothing here is called `moter`"));
    check(&with("case a { motor.stall = 1 N·m }   #! unknown-field"));
    check(&with("case a { }   #! bad-case"));
    check(&with("case a = b   #! unknown-name: there is no case `b`"));
    check(&with("require \"1\" pumping.starts only in hot   #! unknown-name"));
}

#[test]
fn results_by_their_names_only() {
    check(&with("require \"1\" pumping.sped > 1000 rpm   #! unknown-name: a drive has no result `sped`"));
    check(&with("require \"1\" pumping.gear.torque > 1 N·m   #! unknown-name: no part `gear`"));
    check(&with("require \"1\" pumping.motor.torque > 1 J   #! kind-mismatch"));
    check(&with("require \"1\" pumping.motor.torque > 1   #! missing-unit"));
    check(&with("require \"1\" motor.torque > 1 N·m   #! unknown-field: known only in a drive"));
}

#[test]
fn a_mistake_in_a_part_leaves_its_criteria_silent() {
    let text = with("require \"1\" pumping.starts\n").replace("= 25 N·m", "= 25 N·mm/s");
    let analysis = analysis(&text);
    assert_eq!(analysis.diagnostics.len(), 1, "{:#?}", analysis.diagnostics);
    assert_eq!(analysis.criteria[0].verdict, Verdict::NotJudged);
}

#[test]
fn chains_fit_or_say_why_not() {
    check(
        &PUMP
            .replace("motor -> belt", "moter -> belt")
            .replace("{ direction = forward }", "  #! unknown-name"),
    );
    check(&with("drive again = motor -> belt   #! bad-chain"));
    check(&with("drive again = pump -> motor   #! bad-chain"));
}

#[test]
fn variants_inherit_and_take_away() {
    check(&with(
        "source big = motor with { stall_torque = 30 N·m; inertia = absent }\nshow big.stall_torque",
    ));
    check(&with("source big = moto with { stall_torque = 30 N·m }   #! unknown-name"));
    check("source a = b with { }\nsource b = a with { }   #! cycle: a -> b");
    check(&with("source big = motor with { peak_power = absent }   #! wrong-value"));
}

#[test]
fn supplies_and_parts_of_used_files() {
    let parts = "source m: straight_line { stall_torque = 25 N·m; no_load_speed = 3000 rpm }\n";
    check_with(
        "use \"parts.shaft\"
load pump: quadratic { rated_torque = 8 N·m; rated_speed = 1200 rpm }
drive d = parts.m -> pump
require \"1\" d.parts.m.torque <= 20 N·m
case weak { parts.m.stall_torque = 20 N·m }",
        &[("parts.shaft", parts)],
    );
}

#[test]
fn allowed_warnings_are_kept_with_their_reason() {
    let text = with(
        "let P = 4 kW\nlet T = 9550 * P / 1440 rpm\nallow typed-factor because \"as the handbook prints it\"\n",
    );
    let analysis = analysis(&text);
    assert!(analysis.diagnostics.is_empty(), "{:#?}", analysis.diagnostics);
    assert_eq!(analysis.accepted.len(), 1);
    check(&with("allow typed-factor because \"none\"   #! unused-allow"));
    check(&with("allow typed-factor because \"none\"\nlet a = 5 kgg   #! unknown-unit"));
    check(&with("allow kind-mismatch because \"no\"   #! bad-allow"));
    check(&with("allow typed-fctor because \"no\"   #! bad-allow"));
}

#[test]
fn a_thousand_cases_and_no_more() {
    let each: Vec<String> = (1..=40).map(|n| format!("{n} N·m")).collect();
    let each = each.join(", ");
    check(&with(&format!(
        "case many {{ motor.stall_torque = each {each}; pump.inertia = each 1 kg·m², 2 kg·m² }}"
    )));
    check(&with(&format!(
        "case many {{ motor.stall_torque = each {each}\n belt.max_output_torque = each {each}   #! too-large\n}}"
    )));
}

#[test]
fn results_over_a_range_of_speeds_are_judged_at_their_worst() {
    // The line gives 25 N·m at rest and none at 3000 rpm; the load asks 8 N·m at 1200 rpm of the pump, by the square.
    let text = with(
        "require \"1\" pumping.motor.torque <= 2 N·m at pumping.speed = 300 rpm .. 900 rpm
require \"2\" pumping.motor.torque <= 2 N·m at pumping.speed = 300 rpm
require \"3\" pumping.motor.torque <= 50 N·m at pumping.speed = 300 rpm .. 2000 rpm   #! not-judged
require \"4\" 2 * pumping.motor.torque <= 50 N·m at pumping.speed = 300 rpm .. 600 rpm   #! wrong-value
require \"5\" pumping.motor.torque <= 50 N·m at pumping.power = 300 W   #! wrong-value
",
    );
    check(&text);
    let undrawn: String =
        text.lines().map(|line| line.split("#!").next().unwrap_or("").to_owned() + "\n").collect();
    let analysis = analysis(&undrawn);
    let verdicts: Vec<_> = analysis.criteria.iter().map(|criterion| criterion.verdict).collect();
    assert_eq!(verdicts[..3], [Verdict::Fails, Verdict::Holds, Verdict::NotJudged]);
    // At 900 rpm: 8 N·m × (900/1200)² / 2 / 0.95.
    let measure = analysis.criteria[0].outcomes[0].measure.as_ref().expect("a measure");
    assert!((measure.margin - (2.0 - 4.5 / 1.9) / 2.0).abs() < 1e-9, "{measure:?}");
}

#[test]
fn the_kind_of_a_value_outlives_the_value() {
    // The supply is misspelled, so nothing is solved; the limit without a unit is a mistake of its own.
    check(
        "supply pack: battery { open_circuit_voltage = 36 V; resistance = 50 mΩ }
source motor: dc_motor { supply = pak; torque_constant = 0.11 N·m/A; resistance = 0.2 ohm }   #! unknown-name
load w: constant { torque = 2 N·m }
drive d = motor -> w
require \"1\" d.motor.current <= 20   #! missing-unit
require \"2\" d.motor.current <= 20 A",
    );
    check("let a: torque = 5 foo  #! unknown-unit\nlet b = a + 3 s  #! kind-mismatch\nlet c = a + 3 N·m");
    check(&with(
        "require \"1\" pumping.motor.speed >= 1450 min-1   #! kind-mismatch: this reads as min less 1",
    ));
}

#[test]
fn multiples_of_a_rated_value_are_values() {
    check(
        "source s: servo { rated_torque = 4 N·m; rated_speed = 3000 rpm; max_speed = 4000 rpm; peak_torque = 3 × rated; braking = into_resistor; inertia = 0.001 kg·m² }
let t: torque = s.peak_torque
let e: energy = s.peak_torque   #! kind-mismatch",
    );
}

#[test]
fn rows_of_a_csv_file_are_told_by_their_line() {
    let csv = "# measured in May\n\nn;M\n0;9\n\n100;six\n300;14\n";
    check_with(
        "load mixer: measured_curve { curve = csv \"m.csv\" (n as speed [rpm], M as torque [N·m]) }   #! bad-table: `m.csv`, line 6: `six` is not a number",
        &[("m.csv", csv)],
    );
}

#[test]
fn what_follows_from_a_broken_field_is_not_called_missing() {
    check(
        "supply grid: mains { voltage = 400 V; frequency = 50 Hz }
source m: induction_motor { supply = grid; rated_power = 4 kw; rated_speed = 1440 rpm; rated_voltage = 400 V; rated_frequency = 50 Hz; poles = 4; locked_rotor_torque = 2 × rated; breakdown_torque = 2.5 × rated }  #! unknown-unit
load fan: quadratic { rated_torque = 14 N·m; rated_speed = 1400 rpm }
drive d = m -> fan { direction = forward }
require \"loading\" d.m.torque <= m.rated_torque",
    );
}

#[test]
fn a_curve_with_a_row_that_cannot_be_read_is_not_called_short() {
    check(
        "source m: measured_curve { curve = points (speed [rpm], torque [N·m]) { 800 60; 1200, 72 #! syntax
} }",
    );
}
