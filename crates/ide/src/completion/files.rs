//! Paths between the quotes of `use` and `csv`: what the folders below the root hold.

use layshaft_diagnostics::Span;

use super::Asked;
use super::menu::{CompletionKind, Menu};
use super::place::Place;
use crate::cursor::Cursor;
use crate::links::beside;

/// A file or folder.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Listed {
    /// Its name.
    pub name: String,
    /// Whether it is a folder.
    pub folder: bool,
}

/// The folders that a spec may read from.
pub trait Folders {
    /// What a folder below the root holds; the root itself is the empty path.
    fn list(&self, folder: &str) -> Vec<Listed>;
}

/// No folders: for a text that stands alone.
pub struct NoFolders;

impl Folders for NoFolders {
    fn list(&self, _: &str) -> Vec<Listed> {
        Vec::new()
    }
}

/// Endings of files with tables.
const TABLES: &[&str] = &[".csv", ".tsv", ".txt"];

/// The part of a path behind its last `/`.
pub(super) fn name_of(cursor: &Cursor<'_>, typed: Span) -> Span {
    let written = cursor.slice(typed);
    let behind = written.rfind('/').map_or(0, |at| at + 1);
    Span::new(typed.start + behind as u32, typed.end)
}

/// Where the text that an entry replaces ends: at the closing quote, else at the end of the word.
pub(super) fn end_of(cursor: &Cursor<'_>, place: &Place<'_>, typed: Span) -> u32 {
    let rest = cursor.text.get(typed.end as usize..).unwrap_or("");
    let line = rest.split(['\n', '\r']).next().unwrap_or("");
    match place {
        Place::Path { .. } => typed.end + line.find(['"', '/']).unwrap_or(0) as u32,
        Place::Unit { .. } => {
            let inside = |c: char| c.is_alphanumeric() || "·*/^²³⁻¹°%‰".contains(c);
            typed.end + line.find(|c| !inside(c)).unwrap_or(line.len()) as u32
        }
        Place::Code(_) => {
            let inside = |c: char| c.is_alphanumeric() || c == '-';
            typed.end + line.find(|c| !inside(c)).unwrap_or(line.len()) as u32
        }
        _ => typed.end,
    }
}

/// The files and folders beside what is typed of a path.
pub(super) fn files(asked: Asked<'_, '_>, csv: bool, typed: Span, menu: &mut Menu<'_>) {
    let Some(source) = asked.snapshot.file(asked.file) else { return };
    let written = asked.cursor.slice(typed);
    let above = written.rfind('/').map_or("", |at| &written[..=at]);
    // A name is put in the place of the one that is typed, so that the path has one.
    let Some(beside) = beside(&source.path, &format!("{above}x")) else { return };
    let folder = beside.rsplit_once('/').map_or("", |(folder, _)| folder);
    for listed in asked.options.folders.list(folder) {
        let Listed { name, folder: is_folder } = listed;
        let path = if folder.is_empty() { name.clone() } else { format!("{folder}/{name}") };
        let fits = if csv {
            TABLES.iter().any(|ending| name.ends_with(ending))
        } else {
            name.ends_with(".shaft") && path != source.path
        };
        if is_folder {
            menu.add(1, CompletionKind::Folder, &name).insert(format!("{name}/"));
        } else if fits {
            menu.add(0, CompletionKind::File, &name);
        }
    }
}
