//! Where the lists of words stand in the grammars and in the files of editors: each between two texts of its file.
//!
//! `LAYSHAFT_BLESS=1 cargo test -p layshaft-tests --test tidy word_lists` writes them anew.

use crate::lists::{Form, KNOWN_VALUES, Words};
use crate::tree::{Tree, root};
use crate::{none, one};

/// One list of one file.
struct Spot {
    file: &'static str,
    before: &'static str,
    after: &'static str,
    words: Words,
    form: Form,
}

/// Alternatives of a regular expression of most editors.
const REGEX: Form = Form::Regex("(?:", "|", ")");

const fn spot(
    file: &'static str,
    words: Words,
    form: Form,
    before: &'static str,
    after: &'static str,
) -> Spot {
    Spot { file, before, after, words, form }
}

const TEXTMATE: &str = "grammar/layshaft.tmLanguage.json";

const GRAMMAR: &str = "grammar/tree-sitter/grammar.js";
const SCANNER: &str = "grammar/tree-sitter/src/scanner.c";
const HIGHLIGHTS: &str = "grammar/tree-sitter/queries/highlights.scm";
/// Strings of C, parted by commas.
const C_WORDS: Form = Form::Lines("\"", ",", "    ");
/// Strings of a tree-sitter query.
const QUERY: Form = Form::Lines("\"", "", "    ");

static SPOTS: &[Spot] = &[
    spot(
        TEXTMATE,
        Words::DeclaringPlainly,
        REGEX,
        "\"title, use and the like\",\n          \"match\": \"^\\\\s*(",
        r")\\b",
    ),
    spot(
        TEXTMATE,
        Words::Kinds,
        REGEX,
        r"|load)[ \\t]+([\\p{L}_][\\p{L}\\p{M}\\p{Nd}_]*)(?:[ \\t]*(:)(?:[ \\t]*(?:\\b(",
        r")\\b|",
    ),
    spot(
        TEXTMATE,
        Words::Quantities,
        REGEX,
        r"(let)[ \\t]+([\\p{L}_][\\p{L}\\p{M}\\p{Nd}_]*)(?:[ \\t]*(:)(?:[ \\t]*(?:\\b(",
        r")\\b|",
    ),
    spot(
        TEXTMATE,
        Words::Logic,
        REGEX,
        "\"keyword.operator.word.shaft\",\n          \"match\": \"(?<![\\\\p{L}\\\\p{Nd}_.])(?:",
        ")(?!",
    ),
    spot(
        TEXTMATE,
        Words::Constants,
        REGEX,
        "\"constant.language.shaft\",\n          \"match\": \"(?<![\\\\p{L}\\\\p{Nd}_.])(?:",
        ")(?!",
    ),
    spot(
        TEXTMATE,
        Words::Clauses,
        REGEX,
        "\"keyword.control.shaft\",\n          \"match\": \"(?<![\\\\p{L}\\\\p{Nd}_.])(?:",
        ")(?!",
    ),
    spot(
        TEXTMATE,
        Words::KnownValues,
        REGEX,
        "\"support.constant.shaft\",\n          \"match\": \"(?<![\\\\p{L}\\\\p{Nd}_.])(?:",
        ")(?!",
    ),
    spot(
        TEXTMATE,
        Words::Functions,
        REGEX,
        "\"support.function.shaft\",\n      \"match\": \"(?<![\\\\p{L}\\\\p{Nd}_.])(?:",
        ")(?=",
    ),
    spot(TEXTMATE, Words::Reserved, REGEX, r"1/)?(?!(?:", r")(?![\\p{L}"),
    spot(
        TEXTMATE,
        Words::Units,
        REGEX,
        "\"keyword.other.unit.shaft\",\n          \"match\": \"(?<![\\\\p{L}_])(?:",
        ")(?!",
    ),
    spot(GRAMMAR, Words::Reserved, Form::Lines("\"", ",", "      "), "global: (_) => [", ",\n    ],"),
    spot(SCANNER, Words::Reserved, C_WORDS, "RESERVED[] = {", ", NULL,"),
    spot(SCANNER, Words::Closing, C_WORDS, "DECLARING[] = {", ", NULL,"),
    spot(SCANNER, Words::OddUnits, C_WORDS, "ODD_UNITS[] = {", ", NULL,"),
    spot(HIGHLIGHTS, Words::Kinds, QUERY, "(kind) @type\n  (#any-of? @type", "))"),
    spot(HIGHLIGHTS, Words::Quantities, QUERY, "(quantity_kind) @type\n  (#any-of? @type", "))"),
    spot(HIGHLIGHTS, Words::Functions, QUERY, "(#any-of? @function.builtin", "))"),
    spot(HIGHLIGHTS, Words::KnownValues, QUERY, "(#any-of? @constant.builtin", "))"),
];

/// Where a list begins and ends in its file.
fn place(text: &str, spot: &Spot) -> Option<(usize, usize)> {
    let start = text.find(spot.before)? + spot.before.len();
    let end = start + text[start..].find(spot.after)?;
    Some((start, end))
}

fn complaints(tree: &Tree, spots: &[Spot]) -> Vec<String> {
    spots.iter().filter_map(|spot| complaint(tree, spot)).collect()
}

fn complaint(tree: &Tree, spot: &Spot) -> Option<String> {
    let (file, words) = (spot.file, spot.words);
    let Some(text) = tree.text(file) else { return Some(format!("{file} is not there")) };
    let Some((start, end)) = place(text, spot) else {
        return Some(format!("{file} has no list of {words:?} behind `{}`", spot.before));
    };
    let wrong = text[start..end] != words.written(spot.form);
    wrong.then(|| format!("{file}: the list of {words:?} differs from the code; LAYSHAFT_BLESS=1 writes it"))
}

/// Writes the lists of all files anew.
fn bless(spots: &[Spot]) {
    for spot in spots {
        let path = root().join(spot.file);
        let Ok(mut text) = std::fs::read_to_string(&path) else { continue };
        if let Some((start, end)) = place(&text, spot) {
            text.replace_range(start..end, &spot.words.written(spot.form));
            std::fs::write(&path, text).expect("a file of the repository can be written");
        }
    }
}

#[test]
fn word_lists_are_those_of_the_code() {
    if std::env::var("LAYSHAFT_BLESS").is_ok_and(|value| value == "1") {
        bless(SPOTS);
    }
    none(&complaints(&Tree::of_the_repository(), SPOTS));
}

#[test]
fn a_list_that_differs_is_seen() {
    let form = Form::Lines("", "", "  \\ ");
    let spots = [spot("a.vim", Words::Logic, form, "keyword logic", "\n\n")];
    let good = "keyword logic\n  \\ and or not if then else\n\n";
    none(&complaints(&Tree::sample(&[("a.vim", good)]), &spots));
    one(&complaints(&Tree::sample(&[("a.vim", &good.replace(" or", ""))]), &spots), "list of Logic differs");
    one(&complaints(&Tree::sample(&[("a.vim", "keyword words\n")]), &spots), "no list of Logic");
    one(&complaints(&Tree::sample(&[]), &spots), "a.vim is not there");
}

#[test]
fn every_spec_knows_the_known_values() {
    for name in KNOWN_VALUES {
        let text = format!("let a = 2 * {name}\n");
        let files = layshaft_semantics::MemoryFiles::default();
        let analysis = layshaft_semantics::analyze("a.shaft", text.as_str().into(), &files);
        assert!(analysis.diagnostics.is_empty(), "{name}");
    }
}
