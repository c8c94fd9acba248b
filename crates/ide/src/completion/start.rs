//! Declarations, where an item begins.

use layshaft_mechanics::registry::Role;
use layshaft_syntax::DECLARATION_WORDS;

use super::Asked;
use super::menu::{CompletionKind, Menu};
use crate::names::Declared;

/// Among more names than this none is proposed for a drive.
const MOST: usize = 500;

/// Every word that declares something in this version of the language.
pub(super) fn declarations(asked: Asked<'_, '_>, menu: &mut Menu<'_>) {
    let said = &asked.snapshot.analysis;
    let rest = asked.cursor.rest_of_line();
    for word in DECLARATION_WORDS {
        let done = match word.word {
            "duty" | "vary" | "determine" => continue,
            "title" => said.title.is_some(),
            "revision" => said.revision.is_some(),
            "language" => true,
            _ => false,
        };
        let rank = if done { 5 } else { 0 };
        let snippets = menu.snippets && rest.is_empty();
        let entry = menu.add(rank, CompletionKind::Keyword, word.word);
        entry.note(word.meaning).about(format!("word:{}", word.word));
        if snippets {
            entry.form(form(asked, word.word));
        } else if rest.is_empty() {
            entry.insert(format!("{} ", word.word));
        }
    }
}

/// A declaration with places to be filled in.
fn form(asked: Asked<'_, '_>, word: &str) -> String {
    match word {
        "language" => "language ${1:1}".to_owned(),
        "title" | "revision" | "use" => format!("{word} \"$1\""),
        "let" => "let ${1:name} = $0".to_owned(),
        "supply" | "source" | "transmission" | "load" => format!("{word} ${{1:name}}: $0"),
        "drive" => {
            let source = first_of(asked, Role::Source).unwrap_or("source");
            let load = first_of(asked, Role::Load).unwrap_or("load");
            format!(
                "drive ${{1:name}} = ${{2:{source}}} -> ${{3:{load}}} {{ direction = ${{4|forward,reverse|}} }}"
            )
        }
        "case" => "case ${1:name} { $0 }".to_owned(),
        "require" => "require \"${1:clause}\" $0".to_owned(),
        "allow" => "allow ${1:code} because \"${2:reason}\"".to_owned(),
        _ => format!("{word} $0"),
    }
}

/// The first part of a role that the spec declares, by name.
fn first_of<'s>(asked: Asked<'s, '_>, role: Role) -> Option<&'s str> {
    let all = asked.snapshot.names().all(asked.file);
    if all.len() > MOST {
        return None;
    }
    all.filter(|(_, named)| named.what == Declared::Part(role))
        .min_by_key(|(_, named)| named.item)
        .map(|(name, _)| name)
}
