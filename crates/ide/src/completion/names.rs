//! Names of the spec where a name is wanted: parts of a chain, cases, what a case can change.

use std::collections::BTreeMap;

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_mechanics::registry::Role;
use layshaft_present::sheet::role_word;

use super::Asked;
use super::menu::{CompletionKind, Menu};
use crate::names::{Declared, Named, row_of_part};

/// What [`super::documentation`] is asked for of a name.
pub(super) fn about(asked: Asked<'_, '_>, named: Named) -> String {
    let place = named.place;
    format!("name:{}:{}:{}", place.file.0, place.span.start, asked.snapshot.text(place))
}

/// An entry for a name, with what it is.
pub(super) fn name(asked: Asked<'_, '_>, name: &str, named: Named, rank: u8, menu: &mut Menu<'_>) {
    let (kind, note): (_, &'static str) = match named.what {
        Declared::Value => (CompletionKind::Value, ""),
        Declared::Part(role) => {
            let row = row_of_part(asked.snapshot, named);
            (CompletionKind::Part, row.map_or(role_word(role), |row| row.name))
        }
        Declared::Drive => (CompletionKind::Drive, "drive"),
        Declared::Case => (CompletionKind::Case, "case"),
        Declared::File(_) => (CompletionKind::File, "used file"),
    };
    menu.add(rank, kind, name).note(note).about(about(asked, named));
}

/// Whether a name is declared by the item at the cursor: nothing is made from itself.
pub(super) fn of_own_item(asked: Asked<'_, '_>, named: Named) -> bool {
    let item = named.item(asked.snapshot).map(|item| item.offset);
    named.place.file == asked.file && item.is_some() && item == asked.cursor.item.map(|item| item.offset)
}

/// Entries for the best of the names of a file, by their ranks.
fn all(asked: Asked<'_, '_>, file: FileId, rank: impl Fn(&str, Named) -> Option<u8>, menu: &mut Menu<'_>) {
    for (rank, text, named) in menu.best(asked.snapshot.names().all(file), rank) {
        name(asked, text, named, rank, menu);
    }
}

/// Parts, of a role where one is wanted, and the files that may hold some.
pub(super) fn parts(asked: Asked<'_, '_>, role: Option<Role>, menu: &mut Menu<'_>) {
    let rank = |_: &str, named: Named| match named.what {
        _ if of_own_item(asked, named) => None,
        Declared::Part(own) if role.is_none_or(|role| role == own) => Some(0),
        Declared::File(_) => Some(1),
        _ => None,
    };
    all(asked, asked.file, rank, menu);
}

/// Parts of a chain: sources where it begins, what they drive behind an arrow; those that stand in it already last.
pub(super) fn chain(asked: Asked<'_, '_>, first: bool, menu: &mut Menu<'_>) {
    let used: Vec<&str> = asked.cursor.tokens.iter().map(|token| asked.cursor.text_of(token)).collect();
    let rank = |text: &str, named: Named| {
        let rank = match named.what {
            Declared::Part(Role::Source) => u8::from(!first) * 2,
            Declared::Part(Role::Transmission) => 1,
            Declared::Part(Role::Load) => 1 + u8::from(first),
            Declared::File(_) => 3,
            _ => return None,
        };
        Some(if used.contains(&text) { 4 } else { rank })
    };
    all(asked, asked.file, rank, menu);
}

/// Cases, `plain` among them.
pub(super) fn cases(asked: Asked<'_, '_>, menu: &mut Menu<'_>) {
    let mut states: BTreeMap<FileSpan, (usize, usize)> = BTreeMap::new();
    for (index, state) in asked.snapshot.analysis.cases.iter().enumerate() {
        states.entry(state.place).or_insert((index, 0)).1 += 1;
    }
    let rank =
        |_: &str, named: Named| (named.what == Declared::Case && !of_own_item(asked, named)).then_some(0);
    for (rank, text, named) in menu.best(asked.snapshot.names().all(asked.file), rank) {
        let note = match states.get(&named.place) {
            Some((at, 1)) => {
                let one = asked.snapshot.analysis.cases.get(*at);
                let changes = one.map_or(&[][..], |one| &one.overrides);
                let changes = changes.iter().take(3).map(|(path, value)| format!("{path} = {value}"));
                changes.collect::<Vec<_>>().join("; ")
            }
            Some((_, many)) => format!("{many} combinations"),
            None => "case".to_owned(),
        };
        menu.add(rank, CompletionKind::Case, text).note(note).about(about(asked, named));
    }
    menu.add(1, CompletionKind::Case, "plain").note("the spec without case").about("word:plain");
}

/// The combinations of a case with `each`.
pub(super) fn members_of_case(asked: Asked<'_, '_>, case: &str, menu: &mut Menu<'_>) {
    let Some(named) = asked.snapshot.names().find(asked.file, case) else { return };
    for (_, state) in asked.snapshot.states(named.place) {
        let inner = state.label.split_once('[').and_then(|(_, inner)| inner.strip_suffix(']'));
        if let Some(inner) = inner {
            menu.add(0, CompletionKind::Word, inner).note(state.label.clone());
        }
    }
}

/// What a case can change: fields of parts, settings of drives, values.
pub(super) fn overridable(asked: Asked<'_, '_>, menu: &mut Menu<'_>) {
    let rank = |_: &str, named: Named| match named.what {
        Declared::Part(_) | Declared::Drive => Some(0),
        Declared::Value => Some(1),
        Declared::File(_) => Some(2),
        Declared::Case => None,
    };
    all(asked, asked.file, rank, menu);
}

/// The values and parts of a used file.
pub(super) fn of_file(asked: Asked<'_, '_>, file: FileId, menu: &mut Menu<'_>) {
    let rank = |_: &str, named: Named| matches!(named.what, Declared::Value | Declared::Part(_)).then_some(0);
    all(asked, file, rank, menu);
}
