//! Kinds of parts behind `source name:`, kinds of quantities behind `let name:`.

use layshaft_mechanics::registry::{self, KindRow, Need, Role};
use layshaft_present::sheet::role_word;
use layshaft_units::KINDS;

use super::Asked;
use super::fields::form_of;
use super::menu::{CompletionKind, Menu};

/// The kinds of a role, each by its word alone and with its required fields.
pub(super) fn part_kinds(asked: Asked<'_, '_>, role: Role, menu: &mut Menu<'_>) {
    let blank = behind_colon(asked);
    let whole = menu.snippets && asked.cursor.rest_of_line().is_empty();
    for row in registry::rows().iter().filter(|row| row.role == role) {
        let subject = format!("kind:{}:{}", role_word(role), row.name);
        let entry = menu.add(0, CompletionKind::PartKind, row.name);
        entry.insert(format!("{blank}{}", row.name)).note(row.title).about(&subject);
        if whole {
            let entry = menu.add(1, CompletionKind::Form, &format!("{} {{ … }}", row.name));
            entry
                .form(format!("{blank}{}", block(asked, row)))
                .note("with the fields it needs")
                .about(subject);
            entry.filter = Some(row.name.to_owned());
        }
    }
}

/// A blank, where none stands behind the colon yet.
fn behind_colon(asked: Asked<'_, '_>) -> &'static str {
    let before = asked.cursor.text.get(..asked.cursor.word.start as usize).unwrap_or("");
    if before.ends_with(':') { " " } else { "" }
}

/// A kind with the fields that must be given, places to be filled in.
fn block(asked: Asked<'_, '_>, row: &'static KindRow) -> String {
    let mut place = 0;
    let required = row.fields.iter().filter(|field| field.need == Need::Required);
    let lines: Vec<String> =
        required.map(|field| format!("    {}\n", form_of(asked, field, &mut place))).collect();
    if lines.is_empty() {
        return format!("{} {{ $0 }}", row.name);
    }
    format!("{} {{\n{}    $0\n}}", row.name, lines.concat())
}

/// Every kind of quantity.
pub(super) fn quantity_kinds(menu: &mut Menu<'_>) {
    for kind in KINDS {
        let note = if kind.unit.is_empty() { String::new() } else { kind.units.join(", ") };
        menu.add(0, CompletionKind::QuantityKind, kind.name)
            .note(note)
            .about(format!("quantity:{}", kind.name));
    }
}
