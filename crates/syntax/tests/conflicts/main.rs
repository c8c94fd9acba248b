//! The grammar of `grammar/layshaft.ebnf` has no conflict, and the check of it can fail.

mod ebnf;
mod lalr;

use ebnf::Grammar;
use lalr::Automaton;

const GRAMMAR: &str = include_str!("../../../../grammar/layshaft.ebnf");

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
    let from = "group | sum , \"at\" , sum | named_number ;";
    has_conflict(from, "group | sum , \"at\" , sum , { \",\" , sum } | named_number ;", "\",\"");
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
