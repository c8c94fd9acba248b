//! Broken files: every broken line gives its own message, and what stands around it is kept.

mod drawn;

use layshaft_syntax::{parse, show};

/// The problems as `line: code: marked text`, and the trees.
fn read(text: &str) -> (Vec<String>, String) {
    let file = parse(text);
    let found = drawn::problems(&file)
        .iter()
        .map(|problem| {
            let start = problem.span.start as usize;
            let line = text[..start].matches('\n').count() + 1;
            let marked = &text[start..problem.span.end as usize];
            format!("{line}: {}: {marked}", problem.code.row().word)
        })
        .collect();
    let trees = file.items.iter().map(|item| show::item_kind(&item.tree.kind) + "\n").collect();
    (found, trees)
}

#[test]
fn a_file_with_a_fault_in_every_declaration_gives_a_message_for_each() {
    let text = "\
title \"Mill hoist
let rated_load = 1,250 kg
let low-battery = 36 V
supply mains: mains { voltage = 400 V frequency = 50 Hz; accepts_return = yes }
source motor: dc_motor {
    supply = mains
    rated_power = ; rated_speed = 1440 rpm
    stall_torque = 38 N m
    poles == 4
    inertia = 0.019 kg·m²
}
transmission reducer gear { reduction = 41.2 }
load hook: hoist { mass = (rated_load + 60 kg; breakaway_ratio = 1.15 }
drive lift = motor -> -> hook { direction = forward }
case corner { mains.voltage = [360 V, 400 V]; hook.mass = 100 kg }
require \"R1\" lift.hook.speed >=
require \"R2\" lift.starts only corner
show lift.motor.torque
";
    let (found, trees) = read(text);
    assert_eq!(
        found,
        [
            "1: unclosed-bracket: \"",
            "2: bad-number: 1,250",
            "3: bad-name: low-battery",
            "4: syntax: frequency",
            "7: syntax: ;",
            "8: syntax: N m",
            "9: syntax: ==",
            "12: syntax: gear",
            "13: unclosed-bracket: (",
            "14: syntax: ->",
            "15: syntax: [",
            "16: syntax: ",
            "17: syntax: corner",
        ]
    );
    assert_eq!(
        trees,
        "\
(title \"Mill hoist\")
(let rated_load ?)
(let low_battery ‹36 V›)
(supply mains :mains (block (= voltage ?) (= accepts_return yes)))
(source motor :dc_motor (block (= supply mains) (= rated_power ?) (= rated_speed ‹1440 rpm›) (= stall_torque ?) \
(= inertia ‹0.019 kg·m²›)))
(transmission reducer :gear (block (= reduction ‹41.2›)))
(load hook :hoist (block (= mass [(+ rated_load ‹60 kg›)]) (= breakaway_ratio ‹1.15›)))
(drive lift ? (block (= direction forward)))
(case corner (block (= mains.voltage ?) (= hook.mass ‹100 kg›)))
(require \"R1\" ?)
(require \"R2\" lift.starts)
(show lift.motor.torque)
"
    );
}

/// Leaving out any one token of a line of a block costs no other line.
#[test]
fn a_token_less_in_one_entry_costs_no_other() {
    let line = "y = max(2 m, z.w) + 3 * (q - 1 m) from \"t\"";
    let tokens = layshaft_syntax::lex(line).tokens;
    for token in tokens {
        let mut broken = line.to_owned();
        broken.replace_range(token.span.start as usize..token.span.end as usize, "");
        let text = format!("source s: t {{\n  x = 1\n  {broken}\n  v = 2\n}}\nlet last = 3\n");
        let (found, trees) = read(&text);
        assert!(found.len() <= 1, "{broken}: {found:?}");
        assert!(trees.contains("(block (= x ‹1›) "), "{broken}: {trees}");
        assert!(trees.contains("(= v ‹2›)))\n(let last ‹3›)\n"), "{broken}: {trees}");
    }
}

/// Leaving out any one token of a spec costs at most the item it stands in.
#[test]
fn a_token_less_in_a_spec_costs_its_item_at_most() {
    let spec = include_str!("data/mill_hoist.shaft");
    let whole: Vec<String> = parse(spec).items.iter().map(|item| show::item(&item.tree)).collect();
    for token in layshaft_syntax::lex(spec).tokens {
        let mut broken = spec.to_owned();
        broken.replace_range(token.span.start as usize..token.span.end as usize, "");
        let file = parse(&broken);
        let kept = file.items.iter().filter(|item| whole.contains(&show::item(&item.tree))).count();
        let removed = &spec[token.span.start as usize..token.span.end as usize];
        // A line end or a brace that goes touches two items.
        let most = if removed == "\n" || removed == "}" { 2 } else { 1 };
        assert!(kept + most >= whole.len(), "without `{removed}` at {}: {kept}", token.span.start);
        let problems = drawn::problems(&file);
        assert!(problems.len() <= 2, "without `{removed}` at {}: {problems:#?}", token.span.start);
    }
}

#[test]
fn a_header_without_its_brace_keeps_its_entries() {
    let (found, trees) = read("source m: t\n  a = 1\n  b = 2\n}\nlet c = 3\n");
    assert_eq!(found, ["1: unclosed-bracket: "]);
    assert_eq!(trees, "(source m :t (block (= a ‹1›) (= b ‹2›)))\n(let c ‹3›)\n");
}

#[test]
fn a_lost_closing_brace_is_one_message_and_ends_at_the_next_declaration() {
    let text =
        "source m: t {\n  a = 1\n  curve = points (s, t) {\n    1 2\n\nload h: u {\n  b = 2\n}\nlet c = 3\n";
    let (found, trees) = read(text);
    assert_eq!(found, ["1: unclosed-bracket: {", "3: unclosed-bracket: {"]);
    assert_eq!(
        trees,
        "(source m :t (block (= a ‹1›) (= curve (points s t [1 2]))))\n(load h :u (block (= b ‹2›)))\n(let c ‹3›)\n"
    );
}

#[test]
fn two_faults_of_one_block_are_two_messages() {
    let (found, trees) = read("case c {\n  a.b = 1,5 V\n  c.d = 2 V\n  e.f = -2^2\n  g.h = 3 V\n}\n");
    assert_eq!(found, ["2: bad-number: 1,5", "4: syntax: -2^2"]);
    assert_eq!(trees, "(case c (block (= a.b ?) (= c.d ‹2 V›) (= e.f ?) (= g.h ‹3 V›)))\n");
}

#[test]
fn what_the_lexer_reported_is_not_reported_again() {
    for line in ["1_000 kg", "½ m", "5′ + 2", "$", "a $ b", "'x'", "1e999 m", "6°30′", "T₀ + 1"] {
        let (found, _) = read(&format!("let a = {line}\n"));
        assert_eq!(found.len(), 1, "{line}: {found:?}");
    }
}
