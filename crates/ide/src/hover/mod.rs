//! What a reader is told about the word under the cursor, in Markdown: value, kind, derivation, basis; for parts, drives
//! and results what they come to in every case.
//!
//! Texts of specs are untrusted: they reach the Markdown through `crate::markup::text` alone.

mod case;
mod chart;
mod criterion;
mod drive;
mod field;
mod kinds;
mod literal;
mod part;
mod result;
#[cfg(test)]
mod tests;
mod value;
mod words;

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_semantics::index::{Reference, Target};
use layshaft_syntax::{Item, ItemKind};

use crate::Snapshot;

pub(crate) use criterion::{page as criterion_page, verdict};
pub(crate) use drive::{points as drive_points, rows as drive_rows};
pub(crate) use field::{entries, key, wants};
pub(crate) use kinds::{part_kind, quantity_kind};
pub(crate) use literal::recorded;
pub(crate) use result::result as result_page;
pub(crate) use result::row_of;
pub(crate) use words::{constant, function, role_of, unit};

/// Cases listed in a hover; the result table has them all.
pub(crate) const MOST: usize = 16;

/// What the client wants.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Options {
    /// Whether a small chart may follow the text, as an image in the Markdown.
    pub charts: bool,
}

/// A hover.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Hover {
    /// The words it is about.
    pub place: FileSpan,
    /// What is told.
    pub markdown: String,
}

/// What is told about a place.
#[must_use]
pub fn hover(snapshot: &Snapshot, file: FileId, offset: u32, options: Options) -> Option<Hover> {
    let item = snapshot.item(file, offset);
    if let Some(name) = snapshot.reference(file, offset)
        && let Some(markdown) = named(snapshot, name, item, options)
    {
        return Some(Hover { place: name.place, markdown });
    }
    let item = item?;
    let here = offset.checked_sub(item.offset)?;
    let (span, markdown) = literal::literal(snapshot, file, item, here)
        .or_else(|| clause(snapshot, file, item, here))
        .or_else(|| words::keyword(snapshot, file, item, here))?;
    Some(Hover { place: FileSpan { file, span: span.shifted(item.offset) }, markdown })
}

fn named(snapshot: &Snapshot, name: &Reference, item: Option<&Item>, options: Options) -> Option<String> {
    match &name.target {
        Target::Let(place) => value::value(snapshot, *place),
        Target::Part(place) => part::part(snapshot, *place, options),
        Target::Drive(place) => drive::drive(snapshot, *place, options),
        Target::Case(place) => case::case(snapshot, *place),
        Target::Plain => Some("`plain`: the spec without case".to_owned()),
        Target::Field(owner, field) => field::field(snapshot, *owner, field),
        Target::Result { drive: Some(drive), part, port, name } => {
            result::result(snapshot, *drive, *part, port.as_deref(), name)
        }
        Target::Result { drive: None, part, name, .. } => result::known(snapshot, (*part)?, name),
        Target::PartKind(role, word) => part_kind(*role, word),
        Target::QuantityKind(word) => quantity_kind(word),
        Target::Constant(word) => words::constant(word),
        Target::Function(word) => words::function(word),
        Target::Word(word) => words::choice(snapshot, name, item?, word),
        Target::Code(word) => Some(layshaft_diagnostics::Code::from_word(word)?.row().page.to_owned()),
        Target::File(_, file) => words::file(snapshot, (*file)?),
        Target::Path(path) => words::path(snapshot, name.place.file, path),
    }
}

/// The criterion whose clause, or whose first word, is under the cursor.
fn clause(snapshot: &Snapshot, file: FileId, item: &Item, here: u32) -> Option<(Span, String)> {
    let ItemKind::Require { clause, .. } = &item.tree.kind else { return None };
    let word = Span::new(item.tree.span.start, item.tree.span.start + "require".len() as u32);
    let span = [clause.span, word].into_iter().find(|span| span.touches(here))?;
    let place = FileSpan { file, span: item.tree.span.shifted(item.offset) };
    let criteria = &snapshot.analysis.criteria;
    let index = criteria.binary_search_by(|criterion| criterion.place.cmp(&place)).ok()?;
    Some((span, criterion::page(snapshot, index, MOST)?))
}
