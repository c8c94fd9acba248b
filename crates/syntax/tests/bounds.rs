//! The limits: one message each, time in step with the text, no stack overflow on any thread.

mod drawn;

use layshaft_diagnostics::Code;
use layshaft_syntax::{File, Problem, parse, show};

/// Parses and drops on a stack of the size a thread of a server may have.
fn on_small_stack(text: String) -> Vec<(Code, String)> {
    let thread = std::thread::Builder::new().stack_size(512 * 1024).spawn(move || {
        let file = parse(&text);
        drawn::problems(&file).into_iter().map(|problem| (problem.code, problem.message)).collect()
    });
    thread.expect("a thread").join().expect("no overflow")
}

fn codes(text: String) -> Vec<Code> {
    on_small_stack(text).into_iter().map(|problem| problem.0).collect()
}

fn only(file: &File) -> Problem {
    let mut problems = drawn::problems(file);
    assert_eq!(problems.len(), 1, "{problems:?}");
    problems.remove(0)
}

#[test]
fn a_file_above_the_limit_is_not_read() {
    let text = "let a = 1\n".repeat(1_000_001);
    let file = parse(&text);
    assert_eq!(only(&file).code, Code::TooLarge);
    assert!(file.items.is_empty());
    let file = parse(&text[..10_000_000]);
    assert!(drawn::problems(&file).is_empty(), "the limit itself is allowed");
    assert_eq!(file.items.len(), 1_000_000);
}

#[test]
fn nesting_is_limited() {
    let nested = |depth: usize| format!("let a = {}1{}\nlet b = 2", "(".repeat(depth), ")".repeat(depth));
    assert_eq!(codes(nested(128)), []);
    assert_eq!(codes(nested(129)), [Code::TooLarge]);
    assert_eq!(codes(nested(100_000)), [Code::TooLarge]);
    let file = parse(&nested(100_000));
    assert_eq!(show::item(&file.items[1].tree), "(let b ‹2›)");
}

#[test]
fn unclosed_brackets_stay_linear() {
    assert_eq!(codes(format!("let a = {}", "(".repeat(100_000))), [Code::TooLarge]);
    assert_eq!(codes("source s: t {".repeat(100_000)), [Code::TooLarge]);
    assert_eq!(codes(format!("let a = 1 {}", ")".repeat(100_000))).len(), 100_000);
    assert_eq!(codes("b {\n".repeat(100_000)), [Code::TooLarge]);
    let calls = codes(format!("let a = {}", "f(".repeat(100_000)));
    assert_eq!(calls, [Code::TooLarge]);
}

#[test]
fn one_open_block_a_declaration_costs_one_message_each() {
    let text = "source s: t {\n  x = 1\n".repeat(20_000);
    let found = codes(text);
    assert_eq!(found.len(), 20_000);
    assert!(found.iter().all(|&code| code == Code::UnclosedBracket));
}

#[test]
fn operators_of_an_expression_are_limited() {
    let sum = |terms: usize| format!("let a = 1{}\nlet b = 2", " + 1".repeat(terms - 1));
    assert_eq!(codes(sum(1_001)), []);
    assert_eq!(codes(sum(1_002)), [Code::TooLarge]);
    assert_eq!(codes(sum(200_000)), [Code::TooLarge]);
    let file = parse(&sum(200_000));
    assert_eq!(show::item_kind(&file.items[0].tree.kind), "(let a ?)");
    assert_eq!(show::item_kind(&file.items[1].tree.kind), "(let b ‹2›)");
}

#[test]
fn signs_and_choices_are_operators_too() {
    assert_eq!(codes(format!("let a = {}1", "- ".repeat(100_000))), [Code::TooLarge]);
    assert_eq!(codes(format!("let a = {}x", "not ".repeat(100_000))), [Code::TooLarge]);
    assert_eq!(codes(format!("let a = {}2", "if x then 1 else ".repeat(100_000))), [Code::TooLarge]);
    assert_eq!(codes(format!("let a = {}2", "if x then 1 else ".repeat(900))), []);
    assert_eq!(codes(format!("require \"x\" {}x", "not ".repeat(100_000))), [Code::TooLarge]);
    assert_eq!(codes(format!("show {}x", "- ".repeat(100_000))), [Code::TooLarge]);
    assert_eq!(codes(format!("let a = ({}x)", "- (".repeat(100_000))), [Code::TooLarge]);
}

#[test]
fn each_entry_has_its_own_count() {
    let entry = format!("x = 1{};\n", " + 1".repeat(900));
    assert_eq!(codes(format!("source s: t {{\n{}}}", entry.repeat(20))), []);
    let values = "each 1".to_owned() + &", 1 + 1".repeat(5_000);
    assert_eq!(codes(format!("case c {{ a.b = {values} }}")), []);
}

#[test]
fn a_long_expression_in_a_block_costs_no_other_entry() {
    let long = " + 1".repeat(2_000);
    let file = parse(&format!("source s: t {{ x = 1; y = f(1{long}) * 2; z = 3\n w = 4 }}\nlet b = 2"));
    assert_eq!(only(&file).code, Code::TooLarge);
    let shown = show::item_kind(&file.items[0].tree.kind);
    assert_eq!(shown, "(source s :t (block (= x ‹1›) (= y ?) (= z ‹3›) (= w ‹4›)))");
}

#[test]
fn long_lists_and_chains_are_no_deeper_than_short_ones() {
    assert_eq!(codes(format!("drive d = a{}", " -> b".repeat(100_000))), []);
    assert_eq!(codes(format!("drive d = a{}", " + b".repeat(500))), []);
    assert_eq!(codes(format!("let a = x{}", ".y".repeat(100_000))), []);
    assert_eq!(codes(format!("let a = {}1", "1 at ".repeat(2))), [Code::Syntax]);
    assert_eq!(codes(format!("let a = 5 m{}", "·m".repeat(100_000))), []);
}

#[test]
fn ten_thousand_broken_lines_give_ten_thousand_messages() {
    let found = on_small_stack("let a = = 5\n".repeat(10_000));
    assert_eq!(found.len(), 10_000);
}

#[test]
fn characters_that_cannot_be_read_are_reported_once_a_run() {
    let found = on_small_stack("let a = 5\0\0\0\0 m\nlet b\u{7}\u{7} = 3\n# \u{202e}x\n\0\0".into());
    let codes: Vec<Code> = found.iter().map(|problem| problem.0).collect();
    assert_eq!(codes, [Code::BadText, Code::BadText, Code::WritingDirection, Code::BadText], "{found:?}");
}

#[test]
fn line_endings_and_a_byte_order_mark_change_nothing() {
    let spec = include_str!("data/bakery_trike.shaft");
    let plain = show::file(&parse(spec));
    assert_eq!(show::file(&parse(&spec.replace('\n', "\r\n"))), plain);
    assert_eq!(show::file(&parse(&spec.replace('\n', "\r"))), plain);
    assert_eq!(show::file(&parse(&format!("\u{feff}{spec}"))), plain);
}

#[test]
fn nothing_and_next_to_nothing_are_files_without_items() {
    for text in ["", "\n", "\r\r\n", "   ", "# only a comment", "# a\n\n# b\n", "\u{feff}"] {
        let file = parse(text);
        assert!(file.items.is_empty() && drawn::problems(&file).is_empty(), "{text:?}");
    }
}

#[test]
fn the_tree_of_a_deep_expression_is_dropped_on_a_small_stack() {
    let deep = format!("let a = {}1{}", "(1 + ".repeat(127), ")".repeat(127));
    assert_eq!(codes(deep), []);
    let left = format!("let a = 1{}", " - 1".repeat(1_000));
    assert_eq!(codes(left), []);
}
