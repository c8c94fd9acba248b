//! The words of the language, each with its meaning: the lexer, completion, the grammars and the reference take
//! them from here.

use crate::token::TokenKind;

/// A word of the language.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Word {
    /// As it is written.
    pub word: &'static str,
    /// What it means, in one line.
    pub meaning: &'static str,
}

macro_rules! words {
    (
        declarations { $($decl:literal $decl_kind:ident $decl_meaning:literal;)* }
        reserved { $($res:literal $res_kind:ident $res_meaning:literal;)* }
        places { $($place:literal $place_meaning:literal;)* }
    ) => {
        /// The words that declare: words only as the first of a line and before a name, a text or a number, names
        /// elsewhere (`load = 5 N` in a block is a field).
        pub const DECLARATION_WORDS: &[Word] = &[$(Word { word: $decl, meaning: $decl_meaning }),*];
        /// Words that are never a name and never a unit.
        pub const RESERVED: &[Word] = &[$(Word { word: $res, meaning: $res_meaning }),*];
        /// Words with a meaning at their place only, where no name of the spec can stand.
        pub const PLACE_WORDS: &[Word] = &[$(Word { word: $place, meaning: $place_meaning }),*];
        /// Every word of the language: declarations, reserved words, words at their place.
        pub const KEYWORDS: &[Word] = &[
            $(Word { word: $decl, meaning: $decl_meaning },)*
            $(Word { word: $res, meaning: $res_meaning },)*
            $(Word { word: $place, meaning: $place_meaning },)*
        ];
        /// Declaring and reserved words with the kind of their token.
        const KINDS: &[(&str, TokenKind)] = &[
            $(($decl, TokenKind::$decl_kind),)*
            $(($res, TokenKind::$res_kind),)*
        ];
    };
}

words! {
    declarations {
        "language" Language "the language version the spec is written in";
        "title" Title "what the spec is about, for the record";
        "revision" Revision "the state of the spec, for the record";
        "use" Use "parts and values of another file";
        "let" Let "a named value";
        "supply" Supply "what feeds sources: mains, battery, dc bus";
        "source" Source "a power plant: motor, engine, person";
        "transmission" Transmission "what changes speed and torque between two shafts, or holds or frees one";
        "load" Load "what the driven machine demands, and its inertia";
        "drive" Drive "a chain of parts from the sources to the loads";
        "case" Case "a state of the machine: fields that differ from the plain spec";
        "require" Require "a criterion with its clause, checked in plain and in every case";
        "show" Show "a result to print";
        "allow" Allow "accepts a warning, with the reason";
        "duty" DutyWord "steps of load, speed and rest (a later version of the language)";
        "vary" Vary "a study over fields (a later version of the language)";
        "determine" Determine "the value of a field that meets all criteria (a later version of the language)";
    }
    reserved {
        "and" And "both conditions hold";
        "or" Or "one of the conditions holds";
        "not" Not "the condition does not hold; `not in` leaves cases out";
        "if" If "chooses between two values";
        "then" Then "the value where the condition holds";
        "else" Else "the value where it does not";
        "true" True "the flag is set";
        "false" False "the flag is not set";
        "yes" Yes "the flag is set";
        "no" No "the flag is not set";
        "as" As "the unit a result is shown in, or the name something is reached by";
        "at" At "the quantity or speed that belongs to a value";
        "with" With "the same with some fields changed";
        "within" Within "limits of a value";
        "only" Only "asked in some cases only";
        "because" Because "the reason of an `allow`";
        "from" From "the document a value comes from";
        "measured" Measured "the measurement a value comes from";
        "assumed" Assumed "nobody knows the value better yet";
        "confidence" Confidence "the share of all pieces inside a tolerance";
        "probability" Probability "the probability a criterion must hold with";
        "points" Points "a table of measured or published points; percentage points behind `±`";
        "csv" Csv "a table in a file";
        "each" Each "a case for every value";
        "absent" Absent "takes a field away in a variant";
        "rated" Rated "the rated value: `2.3 × rated`";
        "drives" Drives "teeth or diameters of a pair: `42 drives 18`";
    }
    places {
        "in" "behind `only` and `not`: the cases that follow";
        "where" "behind `only`: the field that must have a value";
        "of" "in `± 4 % of value`";
        "value" "in `± 4 % of value`";
        "reduction" "the ratio of a named gear: speed falls by it";
        "increase" "the ratio of a named gear: speed rises by it";
        "teeth" "the teeth of a named gear: `teeth 42 drives 18`";
        "gear" "a named gear: `gear 1 = reduction 14.5`";
        "plain" "the spec without case";
    }
}

/// Where the words of each first letter begin in `SORTED`; the last entry is its length.
const STARTS: [u8; 27] = starts();
/// `KINDS` by first letter, so that most names are told from words by a look at one or two rows.
const SORTED: [(&str, TokenKind); KINDS.len()] = sorted();

const fn sorted() -> [(&'static str, TokenKind); KINDS.len()] {
    let mut out = [("", TokenKind::Name); KINDS.len()];
    let (mut letter, mut filled) = (b'a', 0);
    while letter <= b'z' {
        let mut row = 0;
        while row < KINDS.len() {
            if KINDS[row].0.as_bytes()[0] == letter {
                out[filled] = KINDS[row];
                filled += 1;
            }
            row += 1;
        }
        letter += 1;
    }
    out
}

const fn starts() -> [u8; 27] {
    let mut out = [0; 27];
    let mut row = 0;
    while row < KINDS.len() {
        let mut letter = (KINDS[row].0.as_bytes()[0] - b'a') as usize + 1;
        while letter <= 26 {
            out[letter] += 1;
            letter += 1;
        }
        row += 1;
    }
    out
}

/// The kind of a declaring or reserved word, whatever its place.
pub(crate) fn word_kind(word: &str) -> Option<TokenKind> {
    let first = *word.as_bytes().first()?;
    if !first.is_ascii_lowercase() {
        return None;
    }
    let letter = usize::from(first - b'a');
    let rows = &SORTED[usize::from(STARTS[letter])..usize::from(STARTS[letter + 1])];
    rows.iter().find(|row| row.0 == word).map(|row| row.1)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_word_of_the_tables_is_found_and_no_other() {
        for &(word, kind) in KINDS {
            assert_eq!(word_kind(word), Some(kind), "{word}");
        }
        for word in ["", "x", "motor", "And", "ands", "an", "ω", "in", "gear", "zz", "a"] {
            assert_eq!(word_kind(word), None, "{word}");
        }
    }

    #[test]
    fn no_word_stands_in_two_tables() {
        let mut words: Vec<_> = KEYWORDS.iter().map(|row| row.word).collect();
        words.sort_unstable();
        let before = words.len();
        words.dedup();
        assert_eq!(words.len(), before);
        assert!(KEYWORDS.iter().all(|row| !row.meaning.is_empty()));
    }
}
