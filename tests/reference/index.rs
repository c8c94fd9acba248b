//! The page of all kinds: what there is, and what parts of a role and drives have in common.

use std::fmt::Write as _;

use layshaft_mechanics::registry::{DRIVE_FIELDS, DRIVE_RESULTS, Role, common_fields, common_results, rows};
use layshaft_present::sheet::role_word;

use crate::page::{fields, results};
use crate::page_name;

const ROLES: [Role; 4] = [Role::Supply, Role::Source, Role::Transmission, Role::Load];

/// The page as Markdown.
pub fn index() -> String {
    let mut out = String::from(
        "# The kinds of parts\n\nOne page for each kind: meaning, fields, results, formulas with their sources, cautions, an \
         example that runs.\nThe pages are written from the registry of the code; `layshaft kinds NAME` shows the same in the \
         terminal.\n",
    );
    for role in ROLES {
        let word = role_word(role);
        let _ = write!(out, "\n## {word}\n\n| kind | what it is |\n| --- | --- |\n");
        for row in rows().iter().filter(|row| row.role == role) {
            let _ = writeln!(out, "| [`{}`]({}.md) | {} |", row.name, page_name(row), row.title);
        }
        if !common_fields(role).is_empty() {
            let _ = write!(out, "\nFields of every {word}:\n\n");
            fields(common_fields(role).iter(), &mut out);
        }
        let _ = write!(out, "\nResults of every {word}:\n\n");
        results(common_results(role).iter(), &mut out);
    }
    out.push_str("\n## drive\n\nSettings, in the block of a drive:\n\n");
    fields(DRIVE_FIELDS.iter(), &mut out);
    out.push_str("\nResults of a drive:\n\n");
    results(DRIVE_RESULTS.iter(), &mut out);
    out
}
