//! Whatever the text: no panic, places inside the text and on the borders of characters, and a memo changes nothing.

mod drawn;

use layshaft_syntax::{Memo, TokenKind, lex, parse, parse_with, show};
use proptest::prelude::*;

const SPECS: [&str; 2] = [include_str!("data/mill_hoist.shaft"), include_str!("data/bakery_trike.shaft")];

/// Pieces of the language and of what people write by mistake.
const PIECES: &[&str] = &[
    "let ",
    "source ",
    "supply ",
    "load ",
    "drive ",
    "case ",
    "require ",
    "show ",
    "allow ",
    "use ",
    "title ",
    "duty ",
    "vary ",
    "transmission ",
    "language ",
    "revision ",
    "a",
    "b.c",
    "gear 1",
    "motor",
    "in",
    "of",
    "value",
    "5",
    "-5",
    "1.5",
    "1e999",
    "1_000",
    "1,000",
    ".5",
    "5.",
    "0x1F",
    " m",
    " N·m",
    " kg*m^2",
    " %",
    " °C",
    "′",
    "½",
    "\"x\"",
    "\"",
    "'",
    "“x”",
    "\"a\\b\"",
    " = ",
    ": ",
    "; ",
    ", ",
    ".",
    "..",
    "->",
    "→",
    "(",
    ")",
    "[",
    "]",
    "{",
    "}",
    "+",
    "-",
    "−",
    "*",
    "×",
    "/",
    "^",
    "²",
    "⁻¹",
    "±",
    "<",
    "<=",
    "≥",
    "==",
    "!=",
    "=>",
    "!",
    "&&",
    "\n",
    "\r\n",
    "\r",
    "\n\n",
    "  ",
    "\t",
    "#",
    "## doc",
    "# c\n",
    " from ",
    " measured ",
    " assumed ",
    " at ",
    " as ",
    " with ",
    " within ",
    " only ",
    " in ",
    " where ",
    " not ",
    " and ",
    " or ",
    "if ",
    " then ",
    " else ",
    "each ",
    "points ",
    "csv ",
    "absent",
    "rated",
    " drives ",
    " because ",
    " confidence ",
    " probability ",
    "yes",
    "no",
    "S3 40 %",
    "reduction 2",
    "part-limit",
    "\u{200b}",
    "\u{202e}",
    "\u{feff}",
    "\0",
    "\u{7}",
    "日本",
    "é",
    "e\u{301}",
    "T₀",
    "𝄞",
    "$",
];

fn soup() -> impl Strategy<Value = String> {
    prop::collection::vec(prop::sample::select(PIECES), 0..60).prop_map(|pieces| pieces.concat())
}

/// Whole and half declarations with all that may stand between two of them.
fn heap() -> impl Strategy<Value = String> {
    const ITEMS: &[&str] = &[
        "let a = 1",
        "let b =",
        "let c = (1",
        "let d = \"x",
        "source s: t { x = 1",
        "source s: t",
        "x = 5",
        "case c { a.b = 1 }",
        "require \"r\" a > 2",
        "only in b",
        "allow a-b because \"c\"",
        "duty d { }",
        "title \"t\"",
        "$",
        "-5",
        "show x as",
        "let e = points (a [m",
        "use \"u\" as",
    ];
    const BETWEEN: &[&str] = &[
        "\n",
        "\n\n",
        ";",
        " ",
        "\n}\n",
        "}",
        ")",
        "]",
        "\n## doc\n",
        "\n# c\n",
        "\n+",
        "\n{",
        ",\n",
        "\u{200b}\n",
        "\r",
    ];
    prop::collection::vec((prop::sample::select(ITEMS), prop::sample::select(BETWEEN)), 1..8)
        .prop_map(|parts| parts.iter().flat_map(|(item, between)| [*item, *between]).collect())
}

/// A spec with pieces cut out, doubled and put in.
fn mutated() -> impl Strategy<Value = String> {
    let edit = (any::<prop::sample::Index>(), 0..40usize, prop::sample::select(PIECES));
    (prop::sample::select(&SPECS[..]), prop::collection::vec(edit, 1..6)).prop_map(|(spec, edits)| {
        let mut chars: Vec<char> = spec.chars().collect();
        for (place, length, piece) in edits {
            let from = place.index(chars.len() + 1);
            let to = (from + length).min(chars.len());
            chars.splice(from..to, piece.chars());
        }
        chars.into_iter().collect()
    })
}

/// Everything that must hold of any text.
fn holds(text: &str) {
    let file = parse(text);
    let inside = |span: layshaft_diagnostics::Span| {
        assert!(span.start <= span.end, "{span:?} in {text:?}");
        assert!(text.get(span.start as usize..span.end as usize).is_some(), "{span:?} in {text:?}");
    };
    for problem in drawn::problems(&file) {
        inside(problem.span);
        if let Some((span, _)) = &problem.related {
            inside(*span);
        }
        for (_, edits) in &problem.fixes {
            edits.iter().for_each(|edit| inside(edit.0));
            let mut places: Vec<_> = edits.iter().map(|edit| edit.0).collect();
            places.sort_by_key(|span| span.start);
            assert!(places.windows(2).all(|pair| pair[0].end <= pair[1].start), "edits overlap in {text:?}");
        }
        assert!(!problem.message.is_empty());
    }
    let mut before = 0;
    for item in &file.items {
        assert!(item.offset >= before, "items in the order of the text");
        inside(item.tree.span.shifted(item.offset));
        before = item.offset;
    }
    let lexed = lex(text);
    let mut end = 0;
    for token in &lexed.tokens {
        inside(token.span);
        assert!(token.span.start >= end, "tokens do not overlap");
        end = token.span.end;
    }
    lexed.comments.iter().for_each(|comment| inside(comment.span));
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 1000, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_characters_parse(text in "\\PC{0,80}") {
        holds(&text);
    }

    #[test]
    fn any_pieces_parse(text in soup()) {
        holds(&text);
    }

    #[test]
    fn mutated_specs_parse(text in mutated()) {
        holds(&text);
    }

    #[test]
    fn a_memo_changes_nothing(texts in prop::collection::vec(prop_oneof![mutated(), soup()], 1..5)) {
        let mut memo = Memo::default();
        for text in &texts {
            let kept = parse_with(text, &mut memo);
            let fresh = parse(text);
            // Not `assert_eq`: the trees are long, the text says enough.
            prop_assert!(format!("{kept:?}") == format!("{fresh:?}"), "{}", text);
        }
    }

    /// Items of the same text among other neighbours: their trees depend on nothing but their text.
    #[test]
    fn a_memo_knows_items_among_other_neighbours(texts in prop::collection::vec(heap(), 2..6)) {
        let mut memo = Memo::default();
        for text in &texts {
            let kept = parse_with(text, &mut memo);
            let fresh = parse(text);
            prop_assert!(format!("{kept:?}") == format!("{fresh:?}"), "{:?}", texts);
        }
    }

    #[test]
    fn a_broken_item_leaves_the_items_of_other_lines_whole(text in soup()) {
        let text = text.replace(['{', '('], " ");
        let spec = format!("let first = 1 kg\n{text}\nlet last = 2 kg\n");
        let file = parse(&spec);
        let shown: Vec<String> = file.items.iter().map(|item| show::item_kind(&item.tree.kind)).collect();
        prop_assert_eq!(shown.last().map(String::as_str), Some("(let last ‹2 kg›)"), "{}", spec);
        prop_assert!(shown[0].starts_with("(let first "), "{}", spec);
    }
}

#[test]
fn an_unchanged_item_keeps_its_tree() {
    let mut memo = Memo::default();
    let first = parse_with(SPECS[0], &mut memo);
    let edited = SPECS[0].replacen("60 kg", "61 kg", 1);
    let second = parse_with(&edited, &mut memo);
    let same =
        first.items.iter().zip(&second.items).filter(|(a, b)| std::sync::Arc::ptr_eq(&a.tree, &b.tree));
    assert_eq!(same.count(), first.items.len() - 1);
}

#[test]
fn a_moved_item_keeps_its_tree() {
    let mut memo = Memo::default();
    let first = parse_with("let a = 1\nlet b = 2\nlet c = 3\n", &mut memo);
    let second = parse_with("let c = 3\nlet b = 2\nlet a = 1\n", &mut memo);
    assert!(std::sync::Arc::ptr_eq(&first.items[0].tree, &second.items[2].tree));
    assert!(std::sync::Arc::ptr_eq(&first.items[2].tree, &second.items[0].tree));
}

#[test]
fn both_specs_of_the_design_parse_without_a_problem() {
    for (spec, items) in [(SPECS[0], 19), (SPECS[1], 22)] {
        let file = parse(spec);
        assert_eq!(drawn::problems(&file), []);
        assert_eq!(file.items.len(), items);
        assert!(lex(spec).tokens.iter().all(|token| token.kind != TokenKind::Bad));
    }
}
