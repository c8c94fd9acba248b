//! What can be written at a place, in a half-typed text too.
//!
//! The place is told from the tokens before it (`place.rs`), what it wants from the registry and the last analysis
//! (`wanted.rs`). Documentation is made for the one entry that a reader looks at ([`documentation`]).

mod fields;
mod files;
mod kinds;
mod members;
mod menu;
mod names;
mod operands;
pub(crate) mod place;
mod resolve;
mod start;
#[cfg(test)]
mod tests;
mod units;
mod value;
pub(crate) mod wanted;
mod words;

use layshaft_diagnostics::{FileId, Span};

use crate::Snapshot;
use crate::cursor::Cursor;

pub use files::{Folders, Listed, NoFolders};
use menu::Menu;
pub use menu::{Completion, CompletionKind};
use place::Place;
pub use resolve::{Documentation, documentation};

/// What the client can do with a list.
#[derive(Clone, Copy)]
pub struct Options<'f> {
    /// Whether an entry may hold places to be filled in.
    pub snippets: bool,
    /// Whether the list is asked for by a blank: then only where the choice is small.
    pub by_blank: bool,
    /// The files that can be named.
    pub folders: &'f dyn Folders,
}

/// A list of entries for one place.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Completions {
    /// What is replaced where the text behind the cursor stays.
    pub insert: Span,
    /// What is replaced where the word at the cursor is written anew.
    pub replace: Span,
    /// The entries, the best first.
    pub items: Vec<Completion>,
    /// Whether more would fit: the list is to be asked for again when a letter follows.
    pub incomplete: bool,
}

/// What can be written at a place; none where nothing can be offered.
#[must_use]
pub fn completions(
    snapshot: &Snapshot,
    file: FileId,
    offset: u32,
    options: Options<'_>,
) -> Option<Completions> {
    let cursor = Cursor::new(snapshot, file, offset)?;
    let place = place::place(snapshot, file, &cursor)?;
    if options.by_blank && !is_small(&place) {
        return None;
    }
    let typed = typed(&cursor, &place);
    let mut menu = Menu::new(cursor.slice(typed), options.snippets);
    let asked = Asked { snapshot, file, cursor: &cursor, options };
    fill(asked, &place, &mut menu);
    let incomplete = matches!(place, Place::Unit { .. });
    let (items, cut) = menu.finish();
    let end = if typed == cursor.word { cursor.word_end() } else { files::end_of(&cursor, &place, typed) };
    let replace = Span::new(typed.start, end.max(typed.end));
    (!items.is_empty()).then_some(Completions {
        insert: typed,
        replace,
        items,
        incomplete: incomplete || cut,
    })
}

/// What the entries of a list are made from.
#[derive(Clone, Copy)]
struct Asked<'s, 'c> {
    snapshot: &'s Snapshot,
    file: FileId,
    cursor: &'c Cursor<'s>,
    options: Options<'c>,
}

/// The text that an entry replaces.
fn typed(cursor: &Cursor<'_>, place: &Place<'_>) -> Span {
    match place {
        Place::Unit { typed, .. } | Place::Code(typed) => *typed,
        Place::Path { typed, .. } => files::name_of(cursor, *typed),
        _ => cursor.word,
    }
}

/// Whether so few entries fit that a list may show itself behind a blank.
fn is_small(place: &Place<'_>) -> bool {
    use layshaft_mechanics::registry::Shape;
    match place {
        Place::PartKind(_)
        | Place::QuantityKind
        | Place::Base(_)
        | Place::Chain { .. }
        | Place::Case
        | Place::CaseMember(_)
        | Place::Column(_)
        | Place::Code(_) => true,
        // `only in`, `only where`
        Place::Words(words) => words.first() == Some(&"in"),
        Place::Unit { wanted, .. } => !wanted.kinds.is_empty(),
        Place::Operand { wanted, first: true, .. } => {
            let shape = wanted.field.map(|field| field.shape);
            wanted.flag
                || !wanted.words.is_empty()
                || matches!(shape, Some(Shape::Choice(_) | Shape::Part(_) | Shape::Duty))
        }
        _ => false,
    }
}

fn fill(asked: Asked<'_, '_>, place: &Place<'_>, menu: &mut Menu<'_>) {
    match place {
        Place::Start => start::declarations(asked, menu),
        Place::PartKind(role) => kinds::part_kinds(asked, *role, menu),
        Place::QuantityKind => kinds::quantity_kinds(menu),
        Place::Base(role) => names::parts(asked, Some(*role), menu),
        Place::Key(owner) => fields::keys(asked, *owner, menu),
        Place::KeyMember(path) => members::keys(asked, path, menu),
        Place::Operand { wanted, flavor, first } => {
            operands::operands(asked, wanted, *flavor, *first, menu);
        }
        Place::Member { names, wanted } => members::members(asked, names, wanted, menu),
        Place::Unit { wanted, words, .. } => {
            units::units(asked, wanted, menu);
            words::words(words, 8, menu);
        }
        Place::Words(words) => words::words(words, 0, menu),
        Place::Chain { first } => names::chain(asked, *first, menu),
        Place::Case => names::cases(asked, menu),
        Place::CaseMember(name) => names::members_of_case(asked, name, menu),
        Place::Code(_) => words::codes(menu),
        Place::Column(columns) => units::columns(columns, menu),
        Place::Path { csv, typed } => files::files(asked, *csv, *typed, menu),
    }
}
