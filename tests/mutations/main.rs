//! Specs of the project with tokens taken out, doubled, swapped and broken: the laws of reading, writing and
//! analysis hold for whatever comes out.

#[path = "../support/mod.rs"]
mod support;

use layshaft_tests::laws;
use proptest::prelude::*;

/// One change to a text; places are shares of its length, so that any of them fits any text.
#[derive(Clone, Debug)]
enum Change {
    Delete(f64),
    Double(f64),
    Swap(f64, f64),
    Insert(f64, char),
    Cut(f64),
    Replace(f64, &'static str),
}

/// Words that mean something, to be put where they do not belong.
const WORDS: &[&str] = &[
    "{",
    "}",
    "(",
    ")",
    "->",
    "=",
    "..",
    "±",
    "each",
    "at",
    "0",
    "-1",
    "1e308",
    "85",
    "%",
    "rpm",
    "J",
    "°C",
    "absent",
    "rated",
    "with",
    "only in plain",
    "if",
    "then",
    "drives",
    "points",
    "\"",
    ";",
    "\n",
    "no",
    "2 *",
    "sqrt(",
    "/ 0",
    "^ 2",
    "S3 40 %",
];

fn change() -> impl Strategy<Value = Change> {
    let at = || 0.0..1.0f64;
    prop_oneof![
        4 => at().prop_map(Change::Delete),
        2 => at().prop_map(Change::Double),
        2 => (at(), at()).prop_map(|(a, b)| Change::Swap(a, b)),
        2 => (at(), any::<char>()).prop_map(|(at, c)| Change::Insert(at, c)),
        1 => at().prop_map(Change::Cut),
        4 => (at(), prop::sample::select(WORDS)).prop_map(|(at, word)| Change::Replace(at, word)),
    ]
}

/// The ranges of the tokens of a text, and the one at a share of them.
fn token(text: &str, at: f64) -> Option<std::ops::Range<usize>> {
    let tokens = layshaft_syntax::lex(text).tokens;
    let token = tokens.get((at * tokens.len() as f64) as usize)?;
    Some(token.span.start as usize..token.span.end as usize)
}

fn apply(text: &str, change: &Change) -> String {
    let mut out = text.to_owned();
    match change {
        Change::Delete(at) => {
            if let Some(range) = token(text, *at) {
                out.replace_range(range, "");
            }
        }
        Change::Double(at) => {
            if let Some(range) = token(text, *at) {
                out.insert_str(range.end, &format!(" {}", &text[range]));
            }
        }
        Change::Swap(a, b) => {
            if let (Some(a), Some(b)) = (token(text, a.min(*b)), token(text, a.max(*b)))
                && a.end <= b.start
            {
                out.replace_range(b.clone(), &text[a.clone()]);
                out.replace_range(a, &text[b]);
            }
        }
        Change::Insert(at, c) => {
            let place = text.char_indices().nth((at * text.chars().count() as f64) as usize);
            out.insert(place.map_or(text.len(), |(at, _)| at), *c);
        }
        Change::Cut(at) => {
            let place = text.char_indices().nth((at * text.chars().count() as f64) as usize);
            out.truncate(place.map_or(text.len(), |(at, _)| at));
        }
        Change::Replace(at, word) => {
            if let Some(range) = token(text, *at) {
                out.replace_range(range, word);
            }
        }
    }
    out
}

/// Small specs first: a broken law shows best on them.
fn corpus() -> Vec<String> {
    let mut texts: Vec<String> = support::names("specs", ".shaft")
        .iter()
        .map(|name| support::text(&format!("specs/{name}")))
        .collect();
    let slips = support::text("slips/slips.txt");
    texts.extend(slips.split("\n=== ").skip(1).filter_map(|slip| Some(slip.split_once('\n')?.1.to_owned())));
    texts.sort_by_key(String::len);
    texts
}

fn mutant() -> impl Strategy<Value = String> {
    let texts = prop::sample::select(corpus());
    (texts, prop::collection::vec(change(), 1..5))
        .prop_map(|(text, changes)| changes.iter().fold(text, |text, change| apply(&text, change)))
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(150))]

    #[test]
    fn reading_and_writing_hold(text in mutant()) {
        laws::parse(&text);
        laws::format(&text);
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(60))]

    #[test]
    fn analysis_holds(text in mutant()) {
        laws::analyze(&text);
    }

    #[test]
    fn keystrokes_change_nothing_but_what_they_change(texts in prop::collection::vec(mutant(), 2..5)) {
        let mut memo = layshaft_semantics::Memo::default();
        let files = support::spec_files();
        for text in &texts {
            let kept = layshaft_semantics::analyze_with("a.shaft", text.as_str().into(), &files, &mut memo);
            let fresh = layshaft_semantics::analyze("a.shaft", text.as_str().into(), &files);
            prop_assert_eq!(format!("{kept:?}"), format!("{fresh:?}"));
        }
    }
}
