//! Whole specs on a terminal: blocks, order, width, harmlessness.

use std::sync::Arc;

use layshaft_present::escape::is_hostile;
use layshaft_report::terminal::{Options, Style, render, width};
use layshaft_semantics::{NoFiles, analyze};

fn on_terminal(text: &str, columns: usize, color: bool) -> String {
    let analysis = analyze("a.shaft", Arc::from(text), &NoFiles);
    render(&analysis, &Options { style: Style { color }, width: columns, names: Vec::new() })
}

const SPEC: &str = "title \"Fan\"\n\
                    source motor: straight_line { stall_torque = 10 N·m; no_load_speed = 1200 rpm }\n\
                    load fan: constant { torque = 5 N·m }\n\
                    drive run = motor -> fan { direction = forward }\n\
                    case heavy { fan.torque = each 6 N·m, 11 N·m }\n\
                    require \"A-1 speed\" run.speed >= 500 rpm\n\
                    require \"A-2 starts\" run.starts\n\
                    show run.motor.power\n";

#[test]
fn a_reader_finds_points_criteria_and_verdict_in_that_order() {
    let out = on_terminal(SPEC, 100, false);
    let squeezed = |text: &str| text.split(' ').filter(|word| !word.is_empty()).collect::<Vec<_>>().join(" ");
    let mut rest = squeezed(&out);
    for words in [
        "Fan\na.shaft\n\nrun = motor -> fan\n",
        "  case             from rest  speed  source  torque  power   peak  of peak  governs\n",
        "  plain            runs up    600.0   600.0",
        "  heavy[6 N·m]     runs up    480.0   480.0",
        "  heavy[11 N·m]    stalls     0",
        "A-1, A-2\n",
        "  shown            case           value\n",
        "\nWithout basis\n",
        "\nMind\n",
        "\nCriteria\n",
        "  A-1 speed   at least 500 rpm  0 rpm      -100 %  heavy[11 N·m]   fails\n",
        "A-1 fails also in heavy[6 N·m]\n",
        "\na.shaft: 2 of 2 criteria fail",
    ] {
        let want = squeezed(words);
        let at = rest.find(&want).unwrap_or_else(|| panic!("no {want:?} in\n{rest}"));
        rest = rest[at + want.len()..].to_string();
    }
    assert!(out.ends_with('\n') && !out.contains("\n\n\n"), "{out}");
    assert!(out.lines().all(|line| line == line.trim_end()), "{out}");
}

#[test]
fn no_line_is_wider_than_the_terminal_where_words_allow_it() {
    for columns in [60, 80, 100, 140] {
        let out = on_terminal(SPEC, columns, false);
        let widest = out.lines().map(width).max().unwrap_or(0);
        assert!(widest <= columns, "{columns}: {out}");
    }
}

#[test]
fn colour_marks_words_and_changes_none() {
    let colored = on_terminal(SPEC, 100, true);
    let mut plain = String::new();
    let mut rest = colored.as_str();
    while let Some((before, behind)) = rest.split_once('\u{1b}') {
        plain.push_str(before);
        rest = behind.split_once('m').map_or("", |(_, behind)| behind);
    }
    plain.push_str(rest);
    let trimmed: Vec<&str> = plain.lines().map(str::trim_end).collect();
    assert_eq!(trimmed, on_terminal(SPEC, 100, false).lines().collect::<Vec<_>>());
    assert!(colored.contains("\u{1b}[1;31mfails\u{1b}[0m"));
}

#[test]
fn the_same_spec_gives_the_same_bytes() {
    assert_eq!(on_terminal(SPEC, 100, true), on_terminal(SPEC, 100, true));
}

#[test]
fn hostile_words_of_a_spec_are_shown_harmlessly() {
    let bad = "\u{1b}[31m\u{202e}\u{9b}";
    let text = format!(
        "title \"{bad}\"\nlet a = 1 kg  assumed \"{bad}\"\nrequire \"{bad}\" 1 kg <= 2 kg\nlet b = \"{bad}\n"
    );
    let out = on_terminal(&text, 100, false);
    assert!(!out.chars().any(|c| is_hostile(c) && c != '\n'), "{out:?}");
}
