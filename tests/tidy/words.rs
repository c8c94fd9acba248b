//! The words of the written grammar against the words of the lexer.

use std::collections::BTreeSet;

use layshaft_syntax::{DECLARATION_WORDS, KEYWORDS, RESERVED, Word};

use crate::tree::Tree;
use crate::{none, one};

/// What the tables of the lexer say.
struct Tables<'a> {
    all: BTreeSet<&'a str>,
    reserved: BTreeSet<&'a str>,
    declaring: BTreeSet<&'a str>,
}

impl Tables<'static> {
    fn of_the_lexer() -> Self {
        let set = |rows: &[Word]| rows.iter().map(|row| row.word).collect();
        // The lexer knows some words ahead of the grammar, so that no spec takes them as names.
        let now =
            DECLARATION_WORDS.iter().filter(|row| !row.meaning.contains("a later version of the language"));
        Self { all: set(KEYWORDS), reserved: set(RESERVED), declaring: now.map(|row| row.word).collect() }
    }
}

fn complaints(grammar: &str, tables: &Tables<'_>) -> Vec<String> {
    let (rules, comments) = apart(grammar);
    let quoted: BTreeSet<&str> = quoted(&rules).into_iter().filter(|text| is_word(text)).collect();
    let listed = |name: &str| -> BTreeSet<&str> {
        let list = rules.split(&format!("{name} ")).nth(1).and_then(|rest| rest.split('?').nth(1));
        list.unwrap_or_default().split_whitespace().collect()
    };
    let (reserved, contextual) = (listed("\nreserved"), listed("\ncontextual"));
    let mut out = Vec::new();
    let mut say = |words: Vec<&&str>, what: &str| {
        out.extend(words.into_iter().map(|word| format!("`{word}` {what}")));
    };
    say(quoted.difference(&tables.all).collect(), "is a word of the grammar and not of the lexer");
    say(
        tables.reserved.difference(&quoted).collect(),
        "is reserved by the lexer and in no rule of the grammar",
    );
    say(
        tables.declaring.difference(&quoted).collect(),
        "declares for the lexer and in no rule of the grammar",
    );
    say(
        reserved.symmetric_difference(&tables.reserved).collect(),
        "is not reserved in both grammar and lexer",
    );
    say(contextual.difference(&tables.all).collect(), "is a word at its place for the grammar alone");
    say(tables.declaring.difference(&contextual).collect(), "is missing from the words at their place");
    if comments.is_empty() {
        out.push(String::from("the grammar has lost its comments"));
    }
    out
}

/// The grammar without its comments, and the comments.
fn apart(grammar: &str) -> (String, String) {
    let (mut rules, mut comments) = (String::new(), String::new());
    let mut rest = grammar;
    while let Some((before, after)) = rest.split_once("(*") {
        let (comment, after) = after.split_once("*)").unwrap_or((after, ""));
        rules.push_str(before);
        comments.push_str(comment);
        rest = after;
    }
    rules.push_str(rest);
    (rules, comments)
}

/// What stands between quotes; quotes inside `? … ?` are prose.
fn quoted(rules: &str) -> Vec<&str> {
    let formal = rules.split('?').step_by(2);
    formal.flat_map(|part| part.split('"').skip(1).step_by(2)).collect()
}

fn is_word(text: &str) -> bool {
    !text.is_empty() && text.bytes().all(|byte| byte.is_ascii_lowercase() || byte == b'_')
}

#[test]
fn grammar_and_lexer_have_the_same_words() {
    let tree = Tree::of_the_repository();
    let grammar = tree.text("grammar/layshaft.ebnf").expect("the grammar is written down");
    none(&complaints(grammar, &Tables::of_the_lexer()));
}

/// Words of the lexer that fuzzing does not know.
fn unknown_to_fuzzing<'a>(dictionary: &str, all: &BTreeSet<&'a str>) -> Vec<&'a str> {
    let listed: BTreeSet<&str> = dictionary.lines().map(|line| line.trim_matches('"')).collect();
    all.iter().filter(|word| !listed.contains(*word)).copied().collect()
}

#[test]
fn fuzzing_knows_every_word() {
    let tree = Tree::of_the_repository();
    let dictionary = tree.text("tests/fuzz/words.dict").expect("fuzzing has its words");
    assert_eq!(unknown_to_fuzzing(dictionary, &Tables::of_the_lexer().all), [""; 0]);
    assert_eq!(unknown_to_fuzzing("# words\n\"let\"\n", &BTreeSet::from(["let", "show"])), ["show"]);
}

#[test]
fn a_word_on_one_side_only_is_seen() {
    let grammar = "(* words *) let = \"let\" , NAME , \"=\" , x , \"as\" , NAME ;\n\
                   reserved = ? as ? ;\ncontextual = ? let ? ;\n";
    let tables = |all: &[&'static str], reserved: &[&'static str], declaring: &[&'static str]| Tables {
        all: all.iter().copied().collect(),
        reserved: reserved.iter().copied().collect(),
        declaring: declaring.iter().copied().collect(),
    };
    none(&complaints(grammar, &tables(&["let", "as"], &["as"], &["let"])));
    let more = grammar.replace("\"let\" ,", "\"let\" , \"mut\" ,");
    one(&complaints(&more, &tables(&["let", "as"], &["as"], &["let"])), "`mut` is a word of the grammar");
    let changed = grammar.replace("? as ?", "? as of ?");
    one(&complaints(&changed, &tables(&["let", "as"], &["as"], &["let"])), "`of` is not reserved in both");
    let seen = complaints(grammar, &tables(&["let", "as", "show"], &["as"], &["let", "show"]));
    assert_eq!(seen.len(), 2, "{seen:#?}");
}
