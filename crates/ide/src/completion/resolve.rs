//! What a reader is told of the one entry that is looked at.

use layshaft_diagnostics::{Code, FileId, FileSpan};
use layshaft_mechanics::registry::{self, Role};
use layshaft_semantics::index::Target;
use layshaft_syntax::KEYWORDS;

use crate::Snapshot;
use crate::hover::{self, Options, hover};
use crate::numbers::plain_text;

/// What is told of an entry.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Documentation {
    /// One line, plain text: a value.
    pub detail: Option<String>,
    /// Markdown.
    pub markdown: String,
}

/// What is told of the subject of an entry; none where it says nothing, or is not of this snapshot.
#[must_use]
pub fn documentation(snapshot: &Snapshot, subject: &str) -> Option<Documentation> {
    let (what, of) = subject.split_once(':')?;
    let markdown = match what {
        "word" => word(of)?,
        "kind" => {
            let (role, name) = of.split_once(':')?;
            hover::part_kind(role_named(role)?, name)?
        }
        "quantity" => hover::quantity_kind(of)?,
        "field" => field(of)?,
        "setting" => told(registry::DRIVE_FIELDS.iter().find(|field| field.name == of)?),
        "unit" => hover::unit(of)?,
        "function" => hover::function(of)?,
        "constant" => hover::constant(of)?,
        "code" => Code::from_word(of)?.row().page.to_owned(),
        "name" => return named(snapshot, of),
        "result" => result(snapshot, of)?,
        _ => return None,
    };
    Some(Documentation { detail: None, markdown })
}

fn word(of: &str) -> Option<String> {
    let row = KEYWORDS.iter().find(|row| row.word == of)?;
    Some(format!("`{}`: {}", row.word, row.meaning))
}

fn role_named(word: &str) -> Option<Role> {
    match word {
        "supply" => Some(Role::Supply),
        "source" => Some(Role::Source),
        "transmission" => Some(Role::Transmission),
        "load" => Some(Role::Load),
        _ => None,
    }
}

fn field(of: &str) -> Option<String> {
    let mut words = of.split(':');
    let row = registry::row(role_named(words.next()?)?, words.next()?)?;
    let name = words.next()?;
    crate::names::fields_of(row).find(|field| field.name == name).map(told)
}

/// What the registry says of a field.
fn told(field: &registry::Field) -> String {
    format!("{}\n\n{}", field.meaning, hover::wants(field))
}

fn named(snapshot: &Snapshot, of: &str) -> Option<Documentation> {
    let place = declared(snapshot, of)?;
    let name = snapshot.reference(place.file, place.span.start)?;
    let detail = match &name.target {
        target @ Target::Let(_) => plain_text(snapshot, target),
        _ => None,
    };
    let told = hover(snapshot, place.file, place.span.start, Options::default())?;
    Some(Documentation { detail, markdown: told.markdown })
}

/// The declared name that `file:start:text` says, where it still stands there.
fn declared(snapshot: &Snapshot, of: &str) -> Option<FileSpan> {
    let mut words = of.splitn(3, ':');
    let (file, start, text) = (words.next()?.parse().ok()?, words.next()?.parse().ok()?, words.next()?);
    let name = snapshot.reference(FileId(file), start).filter(|name| name.declares)?;
    (snapshot.text(name.place) == text).then_some(name.place)
}

/// `speed:name:0:12:lift:name:0:40:hook`; nothing behind the drive for a result of its own.
fn result(snapshot: &Snapshot, of: &str) -> Option<String> {
    let mut words = of.split(":name:");
    let (name, drive) = (words.next()?, words.next()?);
    let part = match words.next() {
        Some(part) => Some(declared(snapshot, part)?),
        None => None,
    };
    hover::result_page(snapshot, declared(snapshot, drive.trim_end_matches(':'))?, part, None, name)
}
