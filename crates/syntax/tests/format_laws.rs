//! The laws of the formatter, over the specs of the project and random changes of them: twice is once, nothing is
//! lost, comments stay where they are, the tree is the same, what is broken is not touched.

#[path = "conflicts/ebnf.rs"]
#[allow(dead_code, reason = "one of its doors is not used here")]
mod ebnf;
#[path = "conflicts/random.rs"]
mod random;

use std::fmt::Write as _;

use layshaft_syntax::format::format as tidy;
use layshaft_syntax::{File, Lexed, TokenKind, lex, parse};
use proptest::prelude::*;

/// Every spec there is.
#[allow(clippy::disallowed_methods, reason = "a test reads the specs it is about")]
fn corpus() -> Vec<String> {
    let root = std::path::Path::new(env!("CARGO_MANIFEST_DIR"));
    let mut texts = Vec::new();
    for folder in ["tests/data", "../../tests/specs"] {
        let Ok(entries) = std::fs::read_dir(root.join(folder)) else { continue };
        let mut paths: Vec<_> = entries.flatten().map(|entry| entry.path()).collect();
        paths.sort();
        for path in paths.iter().filter(|path| path.extension().is_some_and(|end| end == "shaft")) {
            texts.push(std::fs::read_to_string(path).unwrap());
        }
    }
    // A spec with a syntax error belongs to no corpus of good ones; other tests say that it has one.
    texts.retain(|text| problems(&parse(text)) == 0);
    assert!(texts.len() >= 3);
    texts
}

fn problems(file: &File) -> usize {
    file.problems.len() + file.items.iter().map(|item| item.tree.problems.len()).sum::<usize>()
}

/// What the tokens say, whatever their spelling: an own folding, so that it can disagree with the formatter's.
/// Comments stand between, so that their places are compared too.
fn said(text: &str) -> String {
    let Lexed { tokens, comments, .. } = lex(text);
    let mut out = String::new();
    let mut next = comments.iter().peekable();
    for token in
        tokens.iter().filter(|token| !matches!(token.kind, TokenKind::Newline | TokenKind::Semicolon))
    {
        while let Some(comment) = next.next_if(|comment| comment.span.start < token.span.start) {
            let body = &text[comment.span.start as usize..comment.span.end as usize];
            write!(out, "\n{}\n", body.trim_end()).unwrap();
        }
        let body = &text[token.span.start as usize..token.span.end as usize];
        if token.kind == TokenKind::String {
            out.push_str(body.trim_matches(['"', '“', '”', '„']));
        } else {
            out.extend(body.chars().flat_map(folded));
        }
        if token.kind != TokenKind::Caret {
            out.push(' ');
        }
    }
    for comment in next {
        let body = &text[comment.span.start as usize..comment.span.end as usize];
        write!(out, "\n{}\n", body.trim_end()).unwrap();
    }
    out
}

fn folded(c: char) -> Vec<char> {
    match c {
        // A power is a power, raised or not.
        '^' => vec![],
        '⁰' => vec!['0'],
        '¹' => vec!['1'],
        '²' => vec!['2'],
        '³' => vec!['3'],
        '⁴'..='⁹' => vec![char::from(b'4' + (c as u32 - '⁴' as u32) as u8)],
        '⁻' | '−' | '–' | '—' | '\u{2010}' | '\u{2011}' => vec!['-'],
        '·' | '\u{387}' | '⋅' | '∙' | '•' | '×' => vec!['*'],
        '÷' => vec!['/'],
        '±' => vec!['+', '/', '-'],
        '→' | '⟶' => vec!['-', '>'],
        '…' => vec!['.', '.'],
        '≤' => vec!['<', '='],
        '≥' => vec!['>', '='],
        '≠' => vec!['!', '='],
        'º' | '˚' => vec!['°'],
        '℃' => vec!['°', 'C'],
        '℉' => vec!['°', 'F'],
        'µ' => vec!['μ'],
        '\u{2126}' => vec!['Ω'],
        _ => vec![c],
    }
}

/// The laws that hold for every text.
fn laws(text: &str) -> Result<(), TestCaseError> {
    let formatted = tidy(text);
    prop_assert_eq!(&tidy(&formatted.text).text, &formatted.text, "twice is not once");
    prop_assert_eq!(said(&formatted.text), said(text), "something else is said");
    let mut rest = formatted.text.as_str();
    for span in &formatted.skipped {
        let kept = &text[span.start as usize..span.end as usize];
        let at = rest.find(kept);
        prop_assert!(at.is_some(), "broken text was touched: {}", kept);
        rest = &rest[at.unwrap_or(0) + kept.len()..];
    }
    let file = parse(text);
    for item in &file.items {
        let span = item.tree.span.shifted(item.offset);
        // A stray brace may be owed by an item before it, and is reported there.
        let tokens = lex(&text[span.start as usize..span.end as usize]).tokens;
        let braces = |kind| tokens.iter().filter(|token| token.kind == kind).count();
        let stray = braces(TokenKind::LeftBrace) != braces(TokenKind::RightBrace);
        if item.tree.problems.is_empty() && !stray {
            let shown = &text[span.start as usize..span.end as usize];
            prop_assert!(!formatted.skipped.contains(&span), "a good item was left as it is: {}", shown);
        }
    }
    let (tree, before) = (shape(&parse(&formatted.text)), shape(&file));
    let first = tree.lines().zip(before.lines()).find(|(one, other)| one != other);
    prop_assert!(tree == before, "another tree: {:#?}", first);
    Ok(())
}

/// The tree without places, one spelling for every sign.
fn shape(file: &File) -> String {
    let mut out = format!("{:?}\n", file.docs);
    for item in &file.items {
        writeln!(out, "{:?}", item.tree).unwrap();
    }
    let mut bare = String::new();
    let mut rest = out.as_str();
    while let Some(at) = rest.find("Span {") {
        bare.extend(rest[..at].chars().flat_map(folded));
        rest = rest[at..].split_once('}').map_or("", |(_, rest)| rest);
    }
    bare.extend(rest.chars().flat_map(folded));
    bare
}

#[test]
fn laws_hold_for_the_corpus() {
    for text in corpus() {
        laws(&text).unwrap();
        assert_eq!(tidy(&text).skipped, [], "no item of a good spec is left as it is");
        let width = tidy(&text).text.lines().filter(|line| !line.contains(['#', '"'])).map(str::len).max();
        assert!(width.unwrap_or(0) <= 110 + 30, "{width:?}");
    }
}

/// Texts that are put into a spec at random.
const SNIPPETS: &[&str] = &[
    "\n",
    "\n\n\n",
    " ",
    "\t",
    "\r\n",
    "\r",
    "\u{a0}",
    "\u{200b}",
    "\u{feff}",
    "#",
    "# note\n",
    "## doc\n",
    "{",
    "}",
    "(",
    ")",
    "[",
    "]",
    ";",
    ",",
    "=",
    ":",
    ".",
    "->",
    "+",
    "-",
    "*",
    "/",
    "^",
    "^2",
    "²",
    "^-1",
    "±",
    "+/-",
    "..",
    "\"",
    "“x”",
    "5 m",
    "-5",
    "- 5",
    "5 m ^ 2",
    "let a = 1\n",
    "\ncase b { x.y = each 1, 2 }\n",
    "points (n [rpm]) {\n 1 2\n 10 -3.5\n}",
    " at 3 m",
    " only in a",
    " not in b[1]",
    "each ",
    "if a then b else c",
    "not ",
    " and ",
    " from \"x\"",
    "\n from \"x\"",
    "\n-> c",
    "é",
    "1e999",
    "%",
    "N*m",
    " ≤ ",
    "max(1 m,\n 2 m)",
    " with { a.b = 1; c.d = 2 }",
    "gear 1 = teeth 42 drives 18\n",
    "absent",
    "5 µm",
    "\\",
];

#[derive(Clone, Debug)]
enum Edit {
    Insert(usize, usize),
    Delete(usize, usize),
    Copy(usize, usize, usize),
}

fn edits() -> impl Strategy<Value = Vec<Edit>> {
    let place = 0..1_000_000_usize;
    let edit = prop_oneof![
        4 => (place.clone(), 0..SNIPPETS.len()).prop_map(|(at, which)| Edit::Insert(at, which)),
        2 => (place.clone(), 1..20_usize).prop_map(|(at, length)| Edit::Delete(at, length)),
        1 => (place.clone(), place, 1..200_usize).prop_map(|(from, to, length)| Edit::Copy(from, to, length)),
    ];
    prop::collection::vec(edit, 1..8)
}

/// The place in a text that a number stands for.
fn place(text: &str, number: usize) -> usize {
    let at = number % (text.len() + 1);
    (at..=text.len()).find(|&at| text.is_char_boundary(at)).unwrap_or(0)
}

fn edited(mut text: String, edits: &[Edit]) -> String {
    for edit in edits {
        match *edit {
            Edit::Insert(at, which) => text.insert_str(place(&text, at), SNIPPETS[which]),
            Edit::Delete(at, length) => {
                let begin = place(&text, at);
                let end = place(&text, (begin + length).min(text.len()));
                text.replace_range(begin..end.max(begin), "");
            }
            Edit::Copy(from, to, length) => {
                let begin = place(&text, from);
                let end = place(&text, (begin + length).min(text.len())).max(begin);
                let copy = text[begin..end].to_string();
                let to = place(&text, to);
                text.insert_str(to, &copy);
            }
        }
    }
    text
}

/// The same spec in another writer's hand: other blanks, other spellings of signs.
fn shaken(text: &str, choices: &[u8]) -> String {
    let lexed = lex(text);
    let mut choices = choices.iter().copied().cycle();
    let mut choose = move |count: usize| usize::from(choices.next().unwrap_or(0)) % count;
    let mut out = String::new();
    let mut at = 0;
    for token in &lexed.tokens {
        let (start, end) = (token.span.start as usize, token.span.end as usize);
        let gap = &text[at..start];
        match gap.contains(['#', '\n']) || gap.is_empty() {
            true => out.push_str(gap),
            false => out.push_str([" ", "  ", "\t", "\u{a0}", " \u{2009} "][choose(5)]),
        }
        let spelled = &text[start..end];
        match token.kind {
            TokenKind::Star => out.push_str(["*", "·", "×", "•"][choose(4)]),
            TokenKind::PlusMinus => out.push_str(["±", "+/-"][choose(2)]),
            TokenKind::Arrow => out.push_str(["->", "→"][choose(2)]),
            TokenKind::DotDot => out.push_str(["..", "…"][choose(2)]),
            TokenKind::LessEqual => out.push_str(["<=", "≤"][choose(2)]),
            TokenKind::GreaterEqual => out.push_str([">=", "≥"][choose(2)]),
            TokenKind::Comma | TokenKind::RightParen => out.extend([["", " "][choose(2)], spelled]),
            TokenKind::Equal | TokenKind::LeftParen => out.extend([spelled, ["", "  "][choose(2)]]),
            TokenKind::Unit => {
                let spelled = spelled.replace('·', ["·", "*", "⋅"][choose(3)]);
                out.push_str(
                    &spelled.replace('²', ["²", "^2"][choose(2)]).replace('³', ["³", "^3"][choose(2)]),
                );
            }
            _ => out.push_str(spelled),
        }
        at = end;
    }
    out.push_str(&text[at..]);
    out
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn laws_hold_for_edited_specs(which in any::<prop::sample::Index>(), edits in edits()) {
        let text = edited(which.get(&corpus()).clone(), &edits);
        laws(&text)?;
    }

    #[test]
    fn laws_hold_for_heaps_of_snippets(heap in prop::collection::vec(0..SNIPPETS.len(), 0..60)) {
        let text: String = heap.iter().map(|&which| SNIPPETS[which]).collect();
        laws(&text)?;
    }

    #[test]
    fn laws_hold_for_sentences_of_the_grammar(choices in prop::collection::vec(any::<u8>(), 1..400)) {
        let grammar = ebnf::Grammar::read(include_str!("../../../grammar/layshaft.ebnf")).unwrap();
        let mut choices = choices.into_iter();
        let sentence = random::Deriver::new(&grammar).sentence("item", 60, &mut choices);
        let text = random::written(&sentence, &mut choices.rev());
        laws(&text)?;
    }

    #[test]
    fn one_form_whatever_the_hand(which in any::<prop::sample::Index>(), choices in prop::collection::vec(any::<u8>(), 1..99)) {
        let text = which.get(&corpus()).clone();
        let other = shaken(&text, &choices);
        prop_assert_eq!(tidy(&other).text, tidy(&text).text);
    }
}
