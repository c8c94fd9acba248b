//! Texts that are empty, strange, huge or deep.

use crate::support::{self, lines};
use crate::{gives, within};

const FAN: &str = "load fan: quadratic { rated_torque = 14 N·m; rated_speed = 900 rpm }\n";

#[test]
fn nothing_at_all() {
    gives("", &[]);
    gives("\n\n  \n", &[]);
    gives("# only a comment\n## and one for nobody\n", &[]);
}

#[test]
fn zero_bytes_and_other_controls() {
    gives("let a = 2 m\0\n", &["bad-text"]);
    gives("let a = 2 m\u{7}\n", &["bad-text"]);
    let analysis = within(20, "\0\0\0\0");
    assert!(!analysis.diagnostics.is_empty());
    assert!(support::codes(&analysis).iter().all(|code| *code == "bad-text"), "{}", lines(&analysis));
}

#[test]
fn byte_order_mark_and_windows_lines() {
    gives(&format!("\u{feff}{FAN}"), &[]);
    gives(&FAN.replace('\n', "\r\n"), &[]);
    let two = "let a = 2 m\r\nlet b: time = a\r\n";
    gives(two, &["kind-mismatch"]);
}

#[test]
fn a_text_that_turns_the_direction_of_writing() {
    let analysis = within(20, "let a = 2 m # \u{202e}m 3 = b tel\n");
    assert_eq!(support::codes(&analysis), ["writing-direction"], "{}", lines(&analysis));
}

#[test]
fn ten_megabytes() {
    let line = "let a_value_of_this_spec = 12.5 m  from \"a drawing\"\n";
    let text: String = line.repeat(11_000_000 / line.len());
    let analysis = within(60, &text);
    assert!(support::codes(&analysis).contains(&"too-large"), "{} messages", analysis.diagnostics.len());
    let one = format!("let a = \"{}\"\n", "x".repeat(10_500_000));
    assert!(support::codes(&within(60, &one)).contains(&"too-large"));
}

#[test]
fn ten_thousand_mistakes() {
    let text: String = (0..10_000).map(|n| format!("let a{n}: torque = {n} J + 1 s\n")).collect();
    let analysis = within(60, &text);
    assert_eq!(analysis.diagnostics.len(), 10_000);
    let broken: String = (0..10_000).map(|n| format!("let b{n} = = {n}\n")).collect();
    assert_eq!(within(60, &broken).diagnostics.len(), 10_000);
}

#[test]
fn brackets_a_hundred_thousand_deep() {
    for (open, close) in [("(", ")"), ("{", "}"), ("[", "]")] {
        let deep = 100_000;
        let closed = format!("let a = {}1{}\n", open.repeat(deep), close.repeat(deep));
        assert!(!within(60, &closed).diagnostics.is_empty());
        let unclosed = format!("let a = {}1\nlet b = 2 m\n", open.repeat(deep));
        let analysis = within(60, &unclosed);
        assert!(!analysis.diagnostics.is_empty());
        assert!(analysis.diagnostics.len() < 200, "{} messages for one slip", analysis.diagnostics.len());
        assert!(
            analysis.values.iter().any(|value| value.name == "b" && value.value.is_some()),
            "the rest is read"
        );
    }
    gives(&format!("let a = {}1{}\n", "(".repeat(100_000), ")".repeat(100_000)), &["too-large"]);
}

#[test]
fn chains_and_signs_that_never_end() {
    for (one, end) in [("-", "1"), ("not ", "yes"), ("if yes then 1 else ", "2"), ("2^", "2")] {
        let text = format!("let a = {}{end}\n", one.repeat(100_000));
        assert!(!within(60, &text).diagnostics.is_empty(), "{one}");
    }
    let chain: String = format!("drive d = {}a\n", "a -> ".repeat(100_000));
    assert!(!within(60, &chain).diagnostics.is_empty());
    let dots = format!("let a = {}b\n", "b.".repeat(100_000));
    assert!(!within(60, &dots).diagnostics.is_empty());
}

#[test]
fn a_sum_of_two_hundred_thousand_terms() {
    let text = format!("let a = {}1 m\n", "1 m + ".repeat(200_000));
    let analysis = within(60, &text);
    assert_eq!(support::codes(&analysis), ["too-large"], "{}", lines(&analysis));
}

#[test]
fn twenty_thousand_values_that_rest_on_one_another() {
    let chained = |order: &mut dyn Iterator<Item = u32>| -> String {
        order
            .map(|n| {
                format!("let v{n} = {}\n", if n == 0 { "1 m".into() } else { format!("v{} + 1 m", n - 1) })
            })
            .collect()
    };
    for text in [chained(&mut (0..20_000)), chained(&mut (0..20_000).rev())] {
        let analysis = within(60, &text);
        assert!(
            analysis.diagnostics.is_empty(),
            "{} messages: {}",
            analysis.diagnostics.len(),
            lines(&analysis)
        );
        assert!(analysis.values.iter().all(|value| value.value.is_some()));
    }
    let ring: String = (0..20_000).map(|n| format!("let r{n} = r{} + 1 m\n", (n + 1) % 20_000)).collect();
    let analysis = within(60, &ring);
    assert_eq!(support::codes(&analysis), ["cycle"]);
}

#[test]
fn a_spec_that_uses_itself() {
    let own = "use \"spec.shaft\" as own\nlet a = 2 m\n";
    let files = support::files(&[("spec.shaft", own)]);
    let analysis = layshaft_semantics::analyze("spec.shaft", own.into(), &files);
    assert_eq!(support::codes(&analysis), ["cycle"], "{}", lines(&analysis));
    let one = "use \"b.shaft\"\nlet a = b.x\n";
    let files = support::files(&[("spec.shaft", one), ("b.shaft", "use \"spec.shaft\"\nlet x = spec.a\n")]);
    let analysis = layshaft_semantics::analyze("spec.shaft", one.into(), &files);
    assert!(support::codes(&analysis).iter().all(|code| *code == "cycle"), "{}", lines(&analysis));
    assert!(!analysis.diagnostics.is_empty());
}

#[test]
fn a_thousand_cases_and_one() {
    let values = |count: usize| (0..count).map(|n| format!("{} N·m", n + 1)).collect::<Vec<_>>().join(", ");
    let text = |a: usize, b: usize| {
        format!(
            "{FAN}let x = 1 m\ncase many {{ fan.rated_torque = each {}; fan.rated_speed = each {} }}\n",
            values(a),
            speeds(b)
        )
    };
    let analysis = within(60, &text(100, 100));
    assert_eq!(support::codes(&analysis), ["too-large"], "{}", lines(&analysis));
    assert!(within(60, &text(30, 30)).diagnostics.is_empty());
}

fn speeds(count: usize) -> String {
    (0..count).map(|n| format!("{} rpm", 100 + n)).collect::<Vec<_>>().join(", ")
}
