//! Words of the language that may follow, and codes behind `allow`.

use layshaft_diagnostics::{CODES, Severity};
use layshaft_syntax::KEYWORDS;

use super::menu::{CompletionKind, Menu};

/// Words that may stand at the cursor.
pub(super) fn words(words: &[&'static str], rank: u8, menu: &mut Menu<'_>) {
    for word in words {
        let snippets = menu.snippets;
        let entry = menu.add(rank, CompletionKind::Keyword, word);
        let first = word.split(' ').next().unwrap_or(word);
        let asked = if *word == "only where" { "where" } else { first };
        let meaning = match *word {
            "only in" => "asked in these cases only",
            "not in" => "asked in all other cases",
            "of value" => "the tolerance is a share of the value",
            "points" => "the tolerance is in percentage points",
            _ => KEYWORDS.iter().find(|row| row.word == asked).map_or("", |row| row.meaning),
        };
        entry.note(meaning).about(format!("word:{asked}"));
        match *word {
            "from" | "measured" | "assumed" | "because" if snippets => {
                entry.form(format!("{word} \"$1\""));
            }
            "with" if snippets => {
                entry.form("with { $0 }");
            }
            "confidence" | "probability" if snippets => {
                entry.form(format!("{word} ${{1:95}} %"));
            }
            "of value" | "points" => {}
            _ => {
                entry.insert(format!("{word} "));
            }
        }
    }
}

/// Codes, those first that can be allowed.
pub(super) fn codes(menu: &mut Menu<'_>) {
    for code in CODES {
        let row = code.row();
        if row.severity == Severity::Warning {
            menu.add(0, CompletionKind::Code, row.word).note(row.summary).about(format!("code:{}", row.word));
        }
    }
}
