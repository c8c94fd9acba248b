//! Drawn tests: an action by the beginning of its title, and the text after it.

use std::sync::Arc;

use layshaft_diagnostics::{FileId, Span};
use layshaft_semantics::{Memo, NoFiles};

use super::{Action, actions, applied, fix_all};
use crate::fixture::Fixture;
use crate::sensitivity::trial;

fn offered(drawn: &str) -> (Fixture, Vec<Action>) {
    let fixture = Fixture::new(drawn);
    let span = match fixture.ranges.first() {
        Some(range) => range.span,
        None => Span::new(fixture.offset, fixture.offset),
    };
    let snapshot = fixture.snapshot.clone();
    let mut memo = Memo::default();
    let mut trials = |file: FileId, text: Arc<str>| trial(&snapshot, &NoFiles, &mut memo, file, text);
    let found = actions(&fixture.snapshot, fixture.file, span, &mut trials);
    (fixture, found)
}

fn titles(drawn: &str) -> Vec<String> {
    offered(drawn).1.into_iter().map(|action| action.title).collect()
}

/// The text after the action whose title begins so, and its whole title.
fn taken(drawn: &str, title: &str) -> (String, String) {
    let (fixture, found) = offered(drawn);
    let titles: Vec<&str> = found.iter().map(|action| action.title.as_str()).collect();
    let Some(action) = found.iter().find(|action| action.title.starts_with(title)) else {
        panic!("no `{title}` among {titles:#?}")
    };
    let text = fixture.snapshot.file(fixture.file).map_or("", |file| &file.text);
    (applied(text, &action.edits), action.title.clone())
}

fn check(drawn: &str, title: &str, expected: &str) {
    let (text, whole) = taken(drawn, title);
    assert_eq!(text, expected, "{whole}");
}

const DRIVE: &str = "source m: straight_line { stall_torque = 10 N·m; no_load_speed = 3000 rpm }
load fan: quadratic { rated_torque = 5 N·m; rated_speed = 1500 rpm }
drive d = m -> fan
require \"R1 quick\" d.speed >= 1400 rpm
";

#[test]
fn a_fix_says_what_it_does() {
    let drawn = DRIVE.replace("10 N·m", "10 ft·$0lb");
    let (text, title) = taken(&drawn, "write `ft·lbf`");
    assert!(text.contains("stall_torque = 10 ft·lbf;"), "{text}");
    assert!(title.contains("R1 holds") && title.contains("d.speed 16"), "{title}");
}

#[test]
fn a_number_in_another_unit() {
    check("let a = $05.5 kW\n", "write `5500 W` (value unchanged)", "let a = 5500 W\n");
    check(
        "let a: rotational_speed = 90$00 1/min\n",
        "write `900 rpm`",
        "let a: rotational_speed = 900 rpm\n",
    );
    check("let t = 2$00 °C ± 2 K\n", "write `293.15 K`", "let t = 293.15 K ± 2 K\n");
    // The width alone, and a number without unit, stay.
    let only_names = |drawn: &str| titles(drawn).iter().all(|title| !title.starts_with("write"));
    assert!(only_names("let a = 5 kW ± 0$0.1 kW\n"));
    assert!(only_names("let a = $05\n"));
}

#[test]
fn a_number_gets_a_name_and_takes_its_basis_along() {
    check(
        "## A motor.\nsource m: straight_line { stall_torque = 1$00 N·m  from \"sheet 4\"; no_load_speed = 3000 rpm }\n",
        "name this number `m_stall_torque` (value unchanged)",
        "let m_stall_torque = 10 N·m  from \"sheet 4\"\n## A motor.\nsource m: straight_line { stall_torque = m_stall_torque; no_load_speed = 3000 rpm }\n",
    );
    check("let a = 3 * $02 kW\n", "name this number `a_part`", "let a_part = 2 kW\nlet a = 3 * a_part\n");
    assert!(titles("let a = $02 kW\n").iter().all(|title| !title.starts_with("name")));
    let taken_name = "let m_stall_torque = 1 m\nsource m: straight_line { stall_torque = 1$00 N·m; no_load_speed = 3000 rpm }\n";
    assert!(titles(taken_name).iter().any(|title| title.starts_with("name this number `m_stall_torque_2`")));
}

#[test]
fn missing_fields_are_left_to_be_filled_and_told() {
    let drawn = "source <|m|>: induction_motor {\n    rated_power = 4 kW\n}\n";
    let (text, title) = taken(drawn, "add `");
    assert!(title.ends_with("(to be filled in)"), "{title}");
    let line = text.lines().find(|line| line.trim_start().starts_with("rated_speed =")).expect("its line");
    assert!(line.contains("# rpm"), "{line}");
    // No number was invented, and every line asks for one.
    assert!(!line.split('#').next().is_some_and(|value| value.contains(|c: char| c.is_ascii_digit())));
    let after = Fixture::new(&text);
    let asks = after.snapshot.analysis.diagnostics.iter().filter(|found| found.code.row().word == "syntax");
    let lines = text.lines().filter(|line| line.contains("=  #")).count();
    assert_eq!(asks.count(), lines, "{:#?}", after.snapshot.analysis.diagnostics);
    let one_line = taken("source <|m|>: straight_line { stall_torque = 1 N·m }\n", "add `no_load_speed`").0;
    assert!(
        one_line.starts_with("source m: straight_line { stall_torque = 1 N·m\n    no_load_speed =  #"),
        "{one_line}"
    );
    assert!(one_line.ends_with("\n}\n"), "{one_line}");
}

#[test]
fn a_warning_is_accepted_for_a_reason_to_be_given() {
    let drawn = "transmission reducer: gear {\n    reduction = 2.5\n    efficiency = <|8 %|>\n}\n";
    let (text, title) = taken(drawn, "accept `implausible` here");
    assert!(text.ends_with("efficiency = 8 %\n    allow implausible because \"\"\n}\n"), "{text}");
    assert!(title.ends_with("(value unchanged once the reason is given)"), "{title}");
    // Until it is given, its place is told.
    let open = Fixture::new(&text);
    let told: Vec<&str> =
        open.snapshot.analysis.diagnostics.iter().map(|found| found.code.row().word).collect();
    assert!(told.contains(&"syntax"), "{told:?}");
    let one_line =
        taken("transmission reducer: gear { reduction = 2.5; efficiency = <|8 %|> }\n", "accept `").0;
    assert!(one_line.contains("8 %\n    allow implausible because \"\"\n}"), "{one_line}");
    assert!(titles("let a = <|4 m + 3 kg|>\n").iter().all(|title| !title.starts_with("accept")));
}

#[test]
fn a_value_without_basis_becomes_an_assumed_one() {
    check("let a = 4$000 kg\n", "say that this is assumed", "let a = 400 kg  assumed \"\"\n");
    assert!(titles("let a = 4$00 kg  from \"order\"\n").iter().all(|title| !title.starts_with("say")));
    assert!(titles("let b = 1 m\nlet a = $0b\n").iter().all(|title| !title.starts_with("say")));
}

#[test]
fn of_power_speed_and_torque_each_can_be_recomputed() {
    let drawn = "source m: induction_motor {
    rated_power = 3 kW; rated_speed = 1450 rpm; rated_voltage = 400 V; rated_frequency = 50 Hz
    locked_rotor_torque = 2 × rated; breakdown_torque = 2.8 × rated
    rated_torque = 25 N·m  from \"plate\"
}
";
    let whole = drawn.replace("rated_power = 3 kW", "rated_power = <|3 kW|>");
    let found = titles(&whole);
    let of =
        |name: &str| found.iter().filter(|title| title.starts_with(&format!("recompute `{name}`"))).count();
    assert_eq!([of("rated_power"), of("rated_speed"), of("rated_torque")], [1, 1, 1], "{found:#?}");
    // 3 kW / (1450 · 2π/60 rad/s) = 19.757 N·m
    let (text, title) = taken(&whole, "recompute `rated_torque`");
    assert!(title.starts_with("recompute `rated_torque`: 25 -> 19.76 N·m"), "{title}");
    // 3 kW at 25 N·m would be 1146 rpm, which no motor of four poles at 50 Hz is rated for.
    let slow = found.iter().find(|title| title.starts_with("recompute `rated_speed`: 1450 -> 1146 rpm"));
    assert!(slow.is_some_and(|title| title.contains("does not settle it")), "{found:#?}");
    assert!(
        text.contains("rated_torque = 19.76 N·m  assumed \"from rated_power and rated_speed\"\n"),
        "{text}"
    );
    let clean = Fixture::new(&text);
    assert!(!clean.snapshot.analysis.has_errors(), "{:#?}", clean.snapshot.analysis.diagnostics);
    let less = taken(&whole, "take `rated_torque` out").0;
    assert!(!less.contains("rated_torque"), "{less}");
}

#[test]
fn what_does_nothing_is_taken_out() {
    check(
        "let a = 4 kg\n<|allow overspeed because \"x\"|>\nlet b = 2 m\n",
        "take the `allow` out (value unchanged)",
        "let a = 4 kg\nlet b = 2 m\n",
    );
}

#[test]
fn only_what_is_certain_is_mended_everywhere() {
    let all = |drawn: &str| {
        let fixture = Fixture::new(drawn);
        let snapshot = fixture.snapshot.clone();
        let mut memo = Memo::default();
        let mut trials = |file: FileId, text: Arc<str>| trial(&snapshot, &NoFiles, &mut memo, file, text);
        let edits = fix_all(&fixture.snapshot, fixture.file, &mut trials);
        applied(snapshot.file(fixture.file).map_or("", |file| &file.text), &edits)
    };
    assert_eq!(all("let a = 4 kg\nallow overspeed because \"x\"\n"), "let a = 4 kg\n");
    assert_eq!(all("title 'Mill'\nlet a = 4 kg\n"), "title \"Mill\"\nlet a = 4 kg\n");
    // Which unit is meant, or which name, only the author knows.
    for doubtful in ["let a = 4 ft·lb\n", "let load = 4 kg\nlet b = laod * 2\n"] {
        assert_eq!(all(doubtful), doubtful);
    }
}
