//! The words of the language as lists, in the forms that grammars and editors want them.

use std::collections::{BTreeMap, BTreeSet};

use layshaft_mechanics::registry;
use layshaft_syntax::{DECLARATION_WORDS, RESERVED};
use layshaft_units::{Function, KINDS, Prefixes, unit_rows};

/// Words that stand for a value.
const CONSTANTS: &[&str] = &["true", "false", "yes", "no", "absent", "rated"];
/// Words that join conditions.
const LOGIC: &[&str] = &["and", "or", "not", "if", "then", "else"];
/// Values every spec knows; that each is one, a test asks of the language itself.
pub const KNOWN_VALUES: &[&str] = &["pi", "standard_gravity"];

/// Declaring words that most grammars have a rule of their own for, as something is named behind them.
const WITH_A_NAME: &[&str] =
    &["let", "supply", "source", "transmission", "load", "drive", "case", "show", "allow"];

/// How a list is written, with the marks it needs.
#[derive(Clone, Debug)]
pub enum Form {
    /// Alternatives of a regular expression: group, bar, end of group.
    Regex([String; 3]),
    /// Words between marks, with this behind each but the last, in lines that begin with this.
    Lines([String; 3]),
}

/// Columns a written line has at most.
const WIDTH: usize = 110;

/// The words of a list of this name, in the order of the code.
pub fn words(name: &str) -> Option<Vec<&'static str>> {
    let reserved = |wanted: fn(&&str) -> bool| RESERVED.iter().map(|row| row.word).filter(wanted).collect();
    // The lexer knows some words ahead of the grammar.
    let later = "a later version of the language";
    let now = || DECLARATION_WORDS.iter().filter(|row| !row.meaning.contains(later)).map(|row| row.word);
    let mut seen = BTreeSet::new();
    Some(match name {
        "declaring" => now().collect(),
        // Without those that name something.
        "declaring plainly" => now().filter(|word| !WITH_A_NAME.contains(word)).collect(),
        // Those that end whatever is open before them.
        "closing" => now().filter(|word| *word != "allow").collect(),
        "reserved" => reserved(|_| true),
        "logic" => reserved(|word| LOGIC.contains(word)),
        "constants" => reserved(|word| CONSTANTS.contains(word)),
        "clauses" => reserved(|word| !LOGIC.contains(word) && !CONSTANTS.contains(word)),
        "functions" => Function::names().collect(),
        "known values" => KNOWN_VALUES.to_vec(),
        "kinds" => registry::rows().iter().map(|row| row.name).filter(|name| seen.insert(*name)).collect(),
        "quantities" => KINDS.iter().map(|kind| kind.name).collect(),
        "odd units" => odd_units(),
        _ => return None,
    })
}

/// Unit symbols of more than letters.
fn odd_units() -> Vec<&'static str> {
    let odd = |symbol: &&str| symbol.contains(|c: char| c == '_' || c.is_ascii_digit());
    let symbols = unit_rows().iter().flat_map(|row| std::iter::once(&row.symbol).chain(row.also));
    symbols.copied().filter(odd).collect()
}

/// A list as it stands in a file.
pub fn written(name: &str, form: &Form) -> Option<String> {
    match form {
        Form::Regex([open, bar, close]) if name == "units" => Some(units(open, bar, close)),
        Form::Regex([_, bar, _]) => Some(words(name)?.join(bar)),
        Form::Lines([mark, between, start]) => Some(lines(&words(name)?, mark, between, start)),
    }
}

fn lines(words: &[&str], mark: &str, between: &str, start: &str) -> String {
    let mut out = String::new();
    let mut column = WIDTH;
    for (at, word) in words.iter().enumerate() {
        let word = format!("{mark}{word}{mark}{}", if at + 1 < words.len() { between } else { "" });
        let length = word.chars().count() + 1;
        if column + length > WIDTH {
            out.push('\n');
            out.push_str(start);
            column = start.chars().count();
        } else {
            out.push(' ');
        }
        column += length;
        out.push_str(&word);
    }
    out
}

/// Symbols that take the same prefixes stand behind one group of them. A longer symbol comes before a shorter one
/// that it begins with, since the first alternative that fits is taken.
fn units(open: &str, bar: &str, close: &str) -> String {
    let mut groups: BTreeMap<Vec<String>, Vec<&str>> = BTreeMap::new();
    for row in unit_rows() {
        let prefixes = match row.prefixes {
            Prefixes::None => Vec::new(),
            Prefixes::All => ["T", "G", "M", "k", "h", "da", "d", "c", "m", "μ", "µ", "u", "n", "p"]
                .map(String::from)
                .to_vec(),
            Prefixes::Only(list) => list.iter().flat_map(spellings).collect(),
        };
        // A sign of its own in some regular expressions.
        let written = |symbol: &'static str| if symbol == "%" { "[%]" } else { symbol };
        let symbols = std::iter::once(row.symbol).chain(row.also.iter().copied()).map(written);
        groups.entry(prefixes).or_default().extend(symbols);
    }
    let group = |words: &[&str]| format!("{open}{}{close}", words.join(bar));
    let mut out = Vec::new();
    for (prefixes, mut symbols) in groups {
        symbols.sort_by_key(|symbol| std::cmp::Reverse(symbol.len()));
        if prefixes.is_empty() {
            out.push(symbols.join(bar));
        } else {
            let prefixes: Vec<&str> = prefixes.iter().map(String::as_str).collect();
            out.push(format!("{}?{}", group(&prefixes), group(&symbols)));
        }
    }
    out.join(bar)
}

/// A prefix as it may be typed: micro has two characters that look alike, and the letter u.
fn spellings(prefix: &&str) -> Vec<String> {
    let all: &[&str] = if *prefix == "μ" { &["μ", "µ", "u"] } else { &[prefix] };
    all.iter().map(|text| (*text).to_owned()).collect()
}
