//! Numbers, units and values that cannot be meant.

use crate::{gives, support, within};

#[test]
fn numbers_beyond_all_bounds() {
    for text in ["1e999", "1e999 m", "-1e999 m", "1e308 km"] {
        let analysis = within(20, &format!("let a = {text}\n"));
        assert!(!analysis.diagnostics.is_empty(), "{text}");
        assert!(analysis.values.iter().all(|value| value.value.is_none()), "{text} has a value");
    }
    for text in ["1e300 * 1e300", "1 / 0", "0 / 0", "sqrt(-1)", "ln(0)", "(-8)^(1/3)", "asin(2)", "exp(1e6)"]
    {
        let analysis = within(20, &format!("let a = {text}\n"));
        assert_eq!(analysis.diagnostics.len(), 1, "{text}: {}", support::lines(&analysis));
        assert!(analysis.values.iter().all(|value| value.value.is_none()), "{text} has a value");
    }
    gives("let a = 1e-999 m\n", &[]);
}

#[test]
fn numbers_of_other_languages() {
    for text in [
        "0x", "0x1F", "1_000", "1,000", ".5", "5.", "1.2.3", "1e", "1e+", "½", "0b1", "١٢", "∞", "NaN",
        "1'000",
    ] {
        let analysis = within(20, &format!("let a = {text}\nlet b = 2 m\n"));
        assert!(!analysis.diagnostics.is_empty(), "`{text}` is taken");
        assert!(analysis.diagnostics.len() <= 2, "`{text}`: {}", support::lines(&analysis));
        assert!(analysis.values.iter().any(|value| value.name == "b" && value.value.is_some()), "`{text}`");
    }
}

#[test]
fn soup_of_units() {
    for unit in [
        "kg·", "·m", "m//s", "m/s/s", "N··m", "m^^2", "m^", "kg*-m", "m^999", "m²²", "(m", "m)", "N·m·(",
        "µ", "°°C", "%%", "kkm", "xyz",
    ] {
        let analysis = within(20, &format!("let a = 3 {unit}\nlet b = 2 m\n"));
        assert!(!analysis.diagnostics.is_empty(), "`3 {unit}` is taken");
        assert!(analysis.diagnostics.len() <= 3, "`3 {unit}`: {}", support::lines(&analysis));
        assert!(analysis.values.iter().any(|value| value.name == "b" && value.value.is_some()), "`3 {unit}`");
    }
    let long = format!("let a = 3 {}\n", vec!["m"; 20_000].join("·"));
    assert!(!within(20, &long).diagnostics.is_empty());
}

#[test]
fn ratios_of_nothing_and_less() {
    for field in [
        "reduction = 0",
        "reduction = -2",
        "increase = 0",
        "teeth = 0 drives 40",
        "teeth = 20 drives 0",
        "teeth = -20 drives 40",
    ] {
        gives(&format!("transmission g: gear {{ {field}; efficiency = 95 % }}\n"), &["out-of-range"]);
    }
    gives("transmission g: gear { reduction = 0 rpm; efficiency = 95 % }\n", &["kind-mismatch"]);
}

#[test]
fn efficiencies_that_are_none() {
    for value in ["0 %", "0", "-5 %", "85", "100.1 %", "850 %"] {
        gives(
            &format!("transmission g: gear {{ reduction = 2; efficiency = {value} }}\n"),
            &["out-of-range"],
        );
    }
    let meant = within(20, "transmission g: gear { reduction = 2; efficiency = 85 }\n");
    let fix = meant.diagnostics[0].fixes.first().expect("85 was meant as 85 %");
    assert_eq!(fix.edits[0].text, "85 %");
}

const RUN: &str = "
source motor: straight_line { stall_torque = 12 N·m; no_load_speed = 3000 rpm; inertia = MOTOR; braking = none }
load fan: quadratic { rated_torque = 6 N·m; rated_speed = 1400 rpm; inertia = FAN }
drive bench = motor -> fan { direction = forward }
require \"up\" bench.run_up_time <= 5 s
";

#[test]
fn inertia_of_nothing() {
    let none = within(20, &RUN.replace("MOTOR", "0 kg·m²").replace("FAN", "0 kg·m²"));
    assert!(!none.diagnostics.is_empty(), "an inertia of 0 is worth a word");
    assert!(none.diagnostics.len() <= 3, "{}", support::lines(&none));
    let negative = RUN.replace("MOTOR", "-1 kg·m²").replace("FAN", "1 kg·m²");
    gives(&negative, &["out-of-range"]);
    let missing = RUN.replace(" inertia = MOTOR;", "").replace("; inertia = FAN", "");
    let missing = within(20, &missing);
    assert!(
        support::codes(&missing).iter().all(|code| *code == "missing-field"),
        "{}",
        support::lines(&missing)
    );
    assert!(!missing.diagnostics.is_empty());
}
