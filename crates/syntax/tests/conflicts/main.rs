//! The grammar of `grammar/layshaft.ebnf` has no conflict, and the check of it can fail.

mod ebnf;
mod lalr;
mod random;
mod sentences;

use std::sync::LazyLock;

use ebnf::Grammar;
use lalr::Automaton;
use layshaft_syntax::{DECLARATION_WORDS, RESERVED, parse};
use proptest::prelude::*;
use random::{Deriver, written};
use sentences::{line_at, sentence};

const GRAMMAR: &str = include_str!("../../../../grammar/layshaft.ebnf");

static AUTOMATON: LazyLock<Automaton> = LazyLock::new(|| automaton(GRAMMAR));

/// The declarations of one line that the specs hold.
static LINES: LazyLock<Vec<String>> = LazyLock::new(|| {
    let specs = specs();
    let lines = specs.iter().flat_map(|(_, text)| text.lines()).map(str::trim);
    let lines = lines.filter(|line| !line.is_empty() && !line.starts_with('#') && messages(line).is_empty());
    let lines: Vec<String> = lines.map(String::from).collect();
    assert!(lines.len() > 60, "only {} declarations stand on one line", lines.len());
    lines
});

fn automaton(text: &str) -> Automaton {
    Automaton::new(&Grammar::read(text).unwrap_or_else(|error| panic!("{error}")))
}

fn report(automaton: &Automaton) -> String {
    automaton.conflicts().iter().map(ToString::to_string).collect::<Vec<_>>().join("\n")
}

#[test]
fn no_spec_has_two_readings() {
    let automaton = automaton(GRAMMAR);
    assert!(automaton.conflicts().is_empty(), "{}", report(&automaton));
    assert!(automaton.size() > 200, "{} states: that cannot be the whole grammar", automaton.size());
}

/// Puts a spelling back that the language does not have, because it can be read in two ways.
#[track_caller]
fn has_conflict(from: &str, to: &str, token: &str) {
    assert_eq!(GRAMMAR.matches(from).count(), 1, "`{from}` is not (once) in the grammar");
    conflicts_in(&GRAMMAR.replace(from, to), token);
}

#[track_caller]
fn conflicts_in(grammar: &str, token: &str) {
    let automaton = automaton(grammar);
    let found = automaton.conflicts().iter().any(|conflict| conflict.token == token);
    assert!(found, "no conflict at {token}:\n{}", report(&automaton));
}

#[test]
fn series_and_joined_on_one_level() {
    let start = GRAMMAR.find("chain         =").unwrap();
    let end = GRAMMAR.find("station       =").unwrap();
    let level = "chain = chain , \"->\" , chain | chain , \"+\" , chain | station ;";
    conflicts_in(&[&GRAMMAR[..start], level, &GRAMMAR[end..]].concat(), "\"+\"");
}

#[test]
fn coverage_with_the_word_of_a_stated_speed() {
    has_conflict("[ \"confidence\" , quantity ]", "[ \"at\" , quantity ]", "\"at\"");
}

#[test]
fn tolerance_of_a_sum() {
    let from = "sum           = product , { ( \"+\" | \"-\" ) , product } ;";
    has_conflict(from, "sum = sum , ( \"+\" | \"-\" | \"±\" ) , sum | product ;", "\"±\"");
}

#[test]
fn expressions_as_cells_of_a_table() {
    has_conflict("row           = cell , { cell } ;", "row = sum , { sum } | cell ;", "\"-\"");
}

#[test]
fn a_basis_inside_an_expression() {
    has_conflict(
        "operand       = primary | negative ;",
        "operand = ( primary | negative ) , [ basis ] ;",
        "\"from\"",
    );
}

#[test]
fn several_groups_in_one_choice() {
    has_conflict(
        "choice        = condition | range | group |",
        "choice = condition | range | pairs |",
        "\",\"",
    );
}

#[test]
fn conditions_without_brackets_in_a_choice() {
    has_conflict(
        "choice        = condition |",
        "choice = \"csv\" , STRING , conditions | condition |",
        "\",\"",
    );
}

#[test]
fn a_choice_of_pairs_with_commas() {
    let from = "group | sum , \"at\" , sum | teeth |";
    has_conflict(from, "group | sum , \"at\" , sum , { \",\" , sum } | teeth |", "\",\"");
}

#[test]
fn a_count_without_a_sign() {
    // `2 motor` is no conflict of the grammar: it is one of the lexer, for which `motor` would be a unit.
    let from = "station       = [ NUMBER , times ] ,";
    let grammar = GRAMMAR.replace(from, "station = [ NUMBER , [ times ] ] ,");
    assert_ne!(grammar, GRAMMAR);
    assert!(automaton(&grammar).conflicts().is_empty());
}

#[test]
fn a_conflict_prints_both_readings() {
    let automaton = automaton("sum = sum , \"+\" , sum | NUMBER ; NUMBER = ? digits ? ;");
    let expected = "behind   sum \"+\" sum\nbefore   \"+\"\n  either sum = sum \"+\" sum •\n  either sum = sum • \"+\" sum\n";
    assert_eq!(report(&automaton), expected);
}

#[test]
fn two_rules_for_one_sentence() {
    let automaton = automaton("file = a | b ; a = NAME ; b = NAME ; NAME = ? letters ? ;");
    assert_eq!(automaton.conflicts().len(), 1, "{}", report(&automaton));
}

/// A word that is a name elsewhere is a word only where no name can stand, or, for the declaring words, where the
/// lexer tells them apart by what follows; so the lexer never has to guess.
#[test]
fn contextual_words_take_no_name_away() {
    let grammar = Grammar::read(GRAMMAR).unwrap();
    let automaton = Automaton::canonical(&grammar);
    for word in grammar.list("contextual").into_iter().filter(|word| *word != "allow") {
        let terminal = format!("\"{word}\"");
        assert!(automaton.terminals().contains(&terminal), "{word} is no word of the grammar");
        if let Some(way) = automaton.reads_both(&terminal, "NAME") {
            panic!("behind `{}` both the word `{word}` and a name can stand", way.join(" "));
        }
    }
}

#[test]
fn every_word_is_listed() {
    let grammar = Grammar::read(GRAMMAR).unwrap();
    let listed = [grammar.list("reserved"), grammar.list("contextual")].concat();
    for terminal in automaton(GRAMMAR).terminals() {
        let word = terminal.trim_matches('"');
        let is_word = terminal.starts_with('"') && word.chars().all(char::is_alphabetic);
        assert!(!is_word || listed.contains(&word), "{word} is neither reserved nor contextual");
    }
    for word in &listed {
        assert_eq!(listed.iter().filter(|other| *other == word).count(), 1, "{word} is listed twice");
    }
}

/// The words of the grammar are the words of the lexer.
#[test]
fn words_are_the_lexers() {
    let grammar = Grammar::read(GRAMMAR).unwrap();
    let mut reserved = grammar.list("reserved");
    let mut lexed: Vec<&str> = RESERVED.iter().map(|row| row.word).collect();
    reserved.sort_unstable();
    lexed.sort_unstable();
    assert_eq!(reserved, lexed);
    let contextual = grammar.list("contextual");
    for row in DECLARATION_WORDS.iter().filter(|row| !row.meaning.contains("later version")) {
        assert!(contextual.contains(&row.word), "{}", row.word);
    }
}

/// The specs and the examples of the reference, each with its name.
#[allow(clippy::disallowed_methods, reason = "a test reads the specs it is about")]
fn specs() -> Vec<(String, String)> {
    let root = std::path::Path::new(env!("CARGO_MANIFEST_DIR"));
    let mut specs = Vec::new();
    for folder in ["tests/data", "../../tests/specs"] {
        let Ok(entries) = std::fs::read_dir(root.join(folder)) else { continue };
        for path in entries.flatten().map(|entry| entry.path()) {
            if path.extension().is_some_and(|end| end == "shaft") {
                specs.push((path.display().to_string(), std::fs::read_to_string(&path).unwrap()));
            }
        }
    }
    let reference = include_str!("../../../../grammar/language.md");
    for (index, block) in reference.split("```shaft").skip(1).enumerate() {
        let body =
            block.split_once('\n').map_or("", |(_, body)| body.split("```").next().unwrap_or_default());
        specs.push((format!("example {} of grammar/language.md", index + 1), body.to_string()));
    }
    assert!(specs.len() > 15, "only {} specs found", specs.len());
    specs
}

/// The index of the token of a sentence that cannot stand there.
fn refused(automaton: &Automaton, text: &str) -> Option<usize> {
    let sentence = sentence(text);
    let terminals: Vec<Vec<String>> = sentence.iter().map(|(terminals, _)| terminals.clone()).collect();
    let at = automaton.accept(&terminals).err()?;
    Some(sentence.get(at).map_or(text.len(), |(_, at)| *at))
}

#[test]
fn every_spec_is_a_sentence_of_the_grammar() {
    let automaton = automaton(GRAMMAR);
    for (name, text) in specs() {
        if let Some(at) = refused(&automaton, &text) {
            panic!("{name}: {:?} cannot stand in `{}`", text[at..].chars().next(), line_at(&text, at));
        }
    }
}

#[test]
fn what_is_no_sentence_is_refused() {
    let automaton = automaton(GRAMMAR);
    for text in [
        "let a = 2^3^2",
        "let a = -2^2",
        "let a = 5 m ± 1 m ± 1 m",
        "let a = b < c < d < e",
        "let a = 38 N m",
        "let a = 5 from \"x\" measured \"y\"",
        "drive d = 2 motor -> gear",
        "case a { x = 1, y = 2 }",
        "show a.b in A",
        "let low-battery = 3 V",
        "let a = 1,000 m",
        "let a = points (n [rpm]) { 1000 - 2 }",
        "require \"x\" a only b",
        "let a = (5 m",
    ] {
        assert!(refused(&automaton, text).is_some(), "accepted: {text}");
    }
}

/// What is wrong with a text.
fn messages(text: &str) -> Vec<String> {
    let file = parse(text);
    let inside = file.items.iter().flat_map(|item| &item.tree.problems);
    file.problems.iter().chain(inside).map(|problem| problem.message.clone()).collect()
}

/// A sentence at random, written as a spec, or none where the lexer cannot keep its tokens apart: `4 of value`
/// without a unit, `=` outside a condition, a tail with two of one kind.
fn random_spec(grammar: &Grammar, choices: Vec<u8>) -> Option<String> {
    let mut choices = choices.into_iter();
    let sentence = Deriver::new(grammar).sentence("item", 40, &mut choices);
    let text = written(&sentence, &mut choices.rev());
    let count = |word: &str| sentence.iter().filter(|terminal| *terminal == word).count();
    let once = ["\"at\"", "\"as\"", "\"probability\""].iter().all(|word| count(word) < 2);
    let again: Vec<String> =
        sentences::sentence(&text).into_iter().map(|(terminals, _)| terminals[0].clone()).collect();
    (once && again == sentence).then_some(text)
}

/// Put between the words of a declaration at random.
const SIGNS: &[&str] = &[
    "- ",
    "( ",
    ") ",
    "= ",
    ", ",
    "at ",
    "± ",
    "² ",
    "points ",
    "5 ",
    ".. ",
    "< ",
    "not ",
    "each ",
    "a ",
    "{ } ",
    "drives ",
    "if a then b else ",
    "[ 1 ] ",
    "with { } ",
    "only where a = ",
    "; ",
    "-> ",
    "* ",
    "from \"x\" ",
    "as ",
    "confidence 5 % ",
    "S1 ",
    "reduction 2 ",
    "rated ",
];

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    /// What the grammar derives, the parser reads.
    #[test]
    fn sentences_are_read(choices in prop::collection::vec(any::<u8>(), 1..200)) {
        let grammar = Grammar::read(&GRAMMAR.replace("COMPARE | \"=\" ;", "COMPARE ;")).unwrap();
        if let Some(text) = random_spec(&grammar, choices) {
            prop_assert_eq!(messages(&text), Vec::<String>::new(), "{}", text);
        }
    }

    /// What the parser reads without a word, the grammar derives.
    #[test]
    fn what_is_read_is_a_sentence(
        which in any::<prop::sample::Index>(),
        changes in prop::collection::vec((any::<prop::sample::Index>(), any::<prop::sample::Index>(), 0..4_u8), 1..4),
    ) {
        let mut tokens: Vec<&str> = which.get(&LINES).split_inclusive(' ').collect();
        for (from, to, change) in changes {
            let (from, to) = (from.index(tokens.len() + 1), to.index(tokens.len() + 1));
            match change {
                0 if from < tokens.len() => drop(tokens.remove(from)),
                1 if from < tokens.len() && to < tokens.len() => tokens.swap(from, to),
                2 if from < tokens.len() => tokens.insert(to, tokens[from]),
                _ => tokens.insert(to, SIGNS[from % SIGNS.len()]),
            }
        }
        let text = tokens.concat();
        if messages(&text).is_empty() {
            let at = refused(&AUTOMATON, &text);
            prop_assert!(at.is_none(), "read, but {:?} cannot stand there: {}", at, text);
        }
    }
}
