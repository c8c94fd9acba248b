//! Words of the language: keywords, functions, constants, choices; and the files a spec uses.

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_mechanics::registry::{self, Shape};
use layshaft_present::number::written;
use layshaft_present::shown::joined;
use layshaft_present::unit::kind_of;
use layshaft_semantics::index::Reference;
use layshaft_syntax::{Item, ItemKind, KEYWORDS, RoleWord, TokenKind};
use layshaft_units::Function;

use super::field::entries;
use crate::Snapshot;
use crate::links::beside;
use crate::markup::{Page, code, number, text};

/// An item longer than this is not cut into words again for a hover.
const LONGEST: u32 = 20_000;

/// The meaning of a keyword.
pub(super) fn keyword(snapshot: &Snapshot, file: FileId, item: &Item, here: u32) -> Option<(Span, String)> {
    let span = item.tree.span;
    if span.end - span.start > LONGEST || here < span.start {
        return None;
    }
    let words = snapshot.text(FileSpan { file, span: span.shifted(item.offset) });
    let lexed = layshaft_syntax::lex(words);
    let at = here - span.start;
    let silent = [TokenKind::String, TokenKind::Number];
    let mut tokens = lexed.tokens.iter().filter(|token| !silent.contains(&token.kind));
    let token = tokens.find(|token| token.span.touches(at))?;
    let word = words.get(token.span.start as usize..token.span.end as usize)?;
    let shown = Span::new(token.span.start + span.start, token.span.end + span.start);
    if token.kind == TokenKind::Unit {
        return Some((shown, unit(word)?));
    }
    let row = KEYWORDS.iter().find(|row| row.word == word)?;
    Some((shown, format!("{}: {}", code(row.word), row.meaning)))
}

/// A unit by itself, in the head of a table or behind `as`: its kind and its size in SI.
pub(crate) fn unit(word: &str) -> Option<String> {
    let unit = layshaft_units::parse_unit(word).ok()?;
    let kind = kind_of(&unit.ty).map_or_else(|| number(&unit.ty.describe()), |kind| kind.title.to_owned());
    let si = joined(&written(unit.to_si(1.0)), &unit.ty.si_unit());
    Some(format!("**{0}**, a unit ({kind}): 1 {0} = {1}", number(&unit.text), number(&si)))
}

/// A function, with its arguments.
pub(crate) fn function(word: &str) -> Option<String> {
    let function = Function::from_name(word)?;
    Some(format!("{}: {} (takes {})", code(function.name()), function.meaning(), function.arity_text()))
}

/// A constant of the language.
pub(crate) fn constant(word: &str) -> Option<String> {
    match word {
        "pi" => Some("`pi` = 3.14159…: half a turn over one radian".to_owned()),
        "standard_gravity" => Some(
            "`standard_gravity` = 9.80665 m/s², exact by definition (3rd CGPM, 1901; ISO 80000-3)".to_owned(),
        ),
        _ => None,
    }
}

/// What words of results mean, beside the choices of fields.
const RESULTS: &[(&str, &str)] = &[
    ("motoring", "the source drives"),
    ("braking", "the load drives, the source brakes"),
    ("standstill", "at rest"),
    ("driven_back", "the load turns the drive against the direction asked for"),
    ("freewheeling", "the load drives and no source takes part"),
    ("off", "switched off with `on = no`"),
    ("input", "the side of a part toward the sources"),
    ("output", "the side of a part toward the loads"),
];

/// A word of a choice: by the field of its line, else by what it means in a result.
pub(super) fn choice(snapshot: &Snapshot, name: &Reference, item: &Item, word: &str) -> Option<String> {
    let here = name.place.span.start.checked_sub(item.offset)?;
    let entry = entries(item).iter().find(|entry| entry.span.touches(here));
    let meaning = entry.and_then(|entry| entry.key.names.last()).and_then(|field| {
        let own = row_of(item).map_or(&[][..], |row| row.fields);
        let all = registry::rows().iter().flat_map(|row| row.fields);
        let fields = own.iter().chain(registry::DRIVE_FIELDS).chain(all);
        fields.filter(|row| *row.name == *field.text).find_map(|row| match row.shape {
            Shape::Choice(words) => words.iter().find(|(known, _)| *known == word),
            _ => None,
        })
    });
    let (known, meaning) = meaning.or_else(|| RESULTS.iter().find(|(known, _)| *known == word))?;
    debug_assert_eq!(snapshot.text(name.place), word);
    Some(format!("{}: {meaning}", code(known)))
}

fn row_of(item: &Item) -> Option<&'static registry::KindRow> {
    let ItemKind::Part { role, base: layshaft_syntax::PartBase::Kind(kind), .. } = &item.tree.kind else {
        return None;
    };
    registry::row(role_of(*role), &kind.text)
}

/// The role a word declares.
pub(crate) const fn role_of(word: RoleWord) -> registry::Role {
    match word {
        RoleWord::Supply => registry::Role::Supply,
        RoleWord::Source => registry::Role::Source,
        RoleWord::Transmission => registry::Role::Transmission,
        RoleWord::Load => registry::Role::Load,
    }
}

/// A used file: where it is and what it declares.
pub(super) fn file(snapshot: &Snapshot, file: FileId) -> Option<String> {
    let source = snapshot.file(file)?;
    let names = source.tree.items.iter().filter_map(|item| match &item.tree.kind {
        ItemKind::Let { name, .. } | ItemKind::Part { name, .. } => Some(text(&name.text)),
        _ => None,
    });
    let names: Vec<String> = names.collect();
    let mut page = Page::default();
    page.paragraph(format!("**{}**", text(&source.path)));
    let docs: Vec<String> = source.tree.docs.iter().map(|doc| text(&doc.value)).collect();
    page.paragraph(docs.join(" "));
    let listed = names.iter().take(40).cloned().collect::<Vec<_>>().join(", ");
    page.paragraph(match names.len() {
        0 => "It declares no value and no part.".to_owned(),
        n if n > 40 => format!("Declares {listed} and {} more", n - 40),
        _ => format!("Declares {listed}"),
    });
    Some(page.finish())
}

/// A path in quotes: the used file, or the table.
pub(super) fn path(snapshot: &Snapshot, from: FileId, path: &str) -> Option<String> {
    let full = beside(&snapshot.file(from)?.path, path)?;
    match snapshot.analysis.files.iter().position(|file| file.path == full) {
        Some(at) => file(snapshot, FileId(at as u32)),
        None => Some(format!("**{}**", text(&full))),
    }
}
