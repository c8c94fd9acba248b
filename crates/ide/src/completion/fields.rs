//! The keys of a block: fields still missing, those first that must be given.

use std::collections::BTreeSet;

use layshaft_mechanics::registry::{self, Field, Need, Role, Shape};
use layshaft_present::sheet::role_word;
use layshaft_present::unit::usual_unit;
use layshaft_syntax::TokenKind as K;
use layshaft_units::kind;

use super::Asked;
use super::menu::{CompletionKind, Menu};
use super::place::Owner;
use crate::cursor::is_name;
use crate::hover::entries;
use crate::names::{Declared, fields_of};

/// The keys that can begin at the cursor.
pub(super) fn keys(asked: Asked<'_, '_>, owner: Owner, menu: &mut Menu<'_>) {
    let given = given(asked);
    match owner {
        Owner::Part { row, variant } => {
            for field in fields_of(row).filter(|field| missing(field, &given)) {
                let rank = if variant { 1 } else { rank(field) };
                let subject = format!("field:{}:{}:{}", role_word(row.role), row.name, field.name);
                key(asked, field, rank, subject, menu);
            }
        }
        Owner::Drive => {
            for field in registry::DRIVE_FIELDS.iter().filter(|field| missing(field, &given)) {
                key(asked, field, 1, format!("setting:{}", field.name), menu);
            }
        }
        Owner::Paths => super::names::overridable(asked, menu),
    }
    if menu.snippets {
        let entry = menu.add(9, CompletionKind::Keyword, "allow");
        entry.form("allow ${1:code} because \"${2:reason}\"").note("accepts a warning, with the reason");
    } else {
        menu.add(9, CompletionKind::Keyword, "allow")
            .insert("allow ")
            .note("accepts a warning, with the reason");
    }
}

/// A key with the value that it wants.
pub(super) fn key(
    asked: Asked<'_, '_>,
    field: &'static Field,
    rank: u8,
    subject: String,
    menu: &mut Menu<'_>,
) {
    let bare = asked.cursor.rest_of_line().starts_with('=');
    let snippets = menu.snippets;
    let entry = menu.add(rank, CompletionKind::Field, field.name);
    entry.note(note(field)).about(subject);
    if bare {
        return;
    }
    if snippets {
        entry.form(form_of(asked, field, &mut 0));
    } else if field.shape == Shape::Gears && names_gears(field) {
        entry.insert("gear ");
    } else {
        entry.insert(format!("{} = ", field.name));
    }
}

/// Whether the gears of the field are named: those of a gearbox, not the one that a drive engages.
fn names_gears(field: &'static Field) -> bool {
    registry::DRIVE_FIELDS.iter().all(|setting| !std::ptr::eq(setting, field))
}

/// The names that the block gives already, that at the cursor aside.
fn given<'s>(asked: Asked<'s, '_>) -> BTreeSet<&'s str> {
    let cursor = asked.cursor;
    let here = cursor.offset as u32;
    let mut given = BTreeSet::new();
    if let Some(item) = cursor.item {
        let own = entries(item).iter().filter(|entry| {
            let span = entry.key.span.shifted(item.offset);
            // A key without a name of its own stands where the cursor is.
            !span.touches(here) || span.start == span.end
        });
        given.extend(own.filter_map(|entry| entry.key.names.last()).map(|name| &*name.text));
    }
    for pair in cursor.tokens.windows(2) {
        if is_name(pair[0].kind) && pair[1].kind == K::Equal {
            given.insert(cursor.text_of(&pair[0]));
        }
    }
    given
}

fn missing(field: &Field, given: &BTreeSet<&str>) -> bool {
    field.shape == Shape::Gears || !given.contains(field.name)
}

const fn rank(field: &Field) -> u8 {
    match field.need {
        Need::Required => 0,
        Need::OneOf => 1,
        Need::Where(_) => 2,
        Need::Default { .. } => 3,
        Need::Optional => 4,
    }
}

/// Kind and unit of a field, and whether it must be given, in a few words.
fn note(field: &Field) -> String {
    let shape = match field.shape {
        Shape::Quantity(name) | Shape::OfRated(name) | Shape::Interval(name) => {
            let unit = usual_unit(name, []);
            if unit.is_empty() { kind(name).map_or(name, |kind| kind.title).to_owned() } else { unit }
        }
        Shape::Choice(words) => words.iter().map(|(word, _)| *word).collect::<Vec<_>>().join(", "),
        Shape::Flag => "yes, no".to_owned(),
        Shape::Part(role) => role_word(role).to_owned(),
        Shape::Points(_) => "points".to_owned(),
        Shape::Ratio { diameters: false } => "teeth".to_owned(),
        Shape::Ratio { diameters: true } => "diameters".to_owned(),
        Shape::Gears => "gears".to_owned(),
        Shape::Duty => "duty type".to_owned(),
    };
    match field.need {
        Need::Required => format!("{shape} · required"),
        Need::OneOf => format!("{shape} · one of several"),
        _ => shape,
    }
}

/// A line of a block with places to be filled in; `place` counts them.
pub(super) fn form_of(asked: Asked<'_, '_>, field: &'static Field, place: &mut u32) -> String {
    let mut next = || {
        *place += 1;
        *place
    };
    let one = next();
    let name = field.name;
    match field.shape {
        Shape::Quantity(kind) | Shape::OfRated(kind) => format!("{name} = ${{{one}}}{}", behind(kind)),
        Shape::Interval(kind) => {
            let unit = behind(kind);
            format!("{name} = ${{{one}}}{unit} .. ${{{}}}{unit}", next())
        }
        Shape::Choice(words) => {
            let words: Vec<&str> = words.iter().map(|(word, _)| *word).collect();
            format!("{name} = ${{{one}|{}|}}", words.join(","))
        }
        Shape::Flag => format!("{name} = ${{{one}|yes,no|}}"),
        Shape::Part(role) => format!("{name} = {}", part(asked, role, one)),
        Shape::Points(columns) => {
            let wanted = columns.iter().filter(|column| !column.optional || columns.len() <= 2);
            let heads: Vec<String> = wanted.map(layshaft_semantics::say::column).collect();
            format!("{name} = points ({}) {{\n    ${{{one}}}\n}}", heads.join(", "))
        }
        Shape::Ratio { diameters: false } => format!("{name} = ${{{one}}} drives ${{{}}}", next()),
        Shape::Ratio { diameters: true } => format!("{name} = ${{{one}}} mm drives ${{{}}} mm", next()),
        Shape::Gears if names_gears(field) => {
            format!("gear ${{{one}:1}} = ${{{}|reduction,increase|}} ${{{}}}", next(), next())
        }
        Shape::Gears => format!("{name} = ${{{one}}}"),
        Shape::Duty => format!("{name} = ${{{one}:S1}}"),
    }
}

/// The usual unit of a kind as it stands behind a number.
fn behind(kind: &'static str) -> String {
    let unit = usual_unit(kind, []);
    if unit.is_empty() { unit } else { format!(" {unit}") }
}

/// The parts of a role to choose from.
fn part(asked: Asked<'_, '_>, role: Role, place: u32) -> String {
    let all = asked.snapshot.names().all(asked.file);
    let fitting = all.filter(|(_, named)| named.what == Declared::Part(role)).map(|(name, _)| name);
    let names: Vec<&str> = fitting.take(20).collect();
    match names.as_slice() {
        [] => format!("${{{place}:{}}}", role_word(role)),
        names => format!("${{{place}|{}|}}", names.join(",")),
    }
}
