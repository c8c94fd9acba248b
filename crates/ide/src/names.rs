//! The names that the files of a snapshot declare, found once for a snapshot.

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_mechanics::registry::{self, Field, ResultRow, Role};
use layshaft_semantics::analysis::ValueRecord;
use layshaft_syntax::{ChainKind, Item, ItemKind, PartBase};

use crate::Snapshot;
use crate::hover::role_of;
use crate::links::beside;

/// What a name stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Declared {
    /// A `let`.
    Value,
    /// A part.
    Part(Role),
    /// A drive.
    Drive,
    /// A case.
    Case,
    /// The name of a used file, where it could be read.
    File(Option<FileId>),
}

/// A declared name.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Named {
    /// What it is.
    pub what: Declared,
    /// Where its name stands.
    pub place: FileSpan,
    /// The item that declares it, by its index in the file.
    pub item: u32,
    /// The record of a `let`, by its index in the analysis.
    pub record: Option<u32>,
}

/// The names of each file.
#[derive(Clone, Debug, Default)]
pub(crate) struct Names {
    /// Sorted by name.
    files: Vec<Vec<(Box<str>, Named)>>,
}

impl Names {
    /// The names of every file of a snapshot; of a doubled name the first counts.
    pub fn of(snapshot: &Snapshot) -> Self {
        let count = snapshot.analysis.files.len() as u32;
        Self { files: (0..count).map(|file| of_file(snapshot, FileId(file))).collect() }
    }

    /// Every name of a file, sorted.
    pub fn all(&self, file: FileId) -> impl ExactSizeIterator<Item = (&str, Named)> {
        let names = self.files.get(file.0 as usize).map_or(&[][..], Vec::as_slice);
        names.iter().map(|(name, named)| (&**name, *named))
    }

    /// What a name of a file stands for.
    pub fn find(&self, file: FileId, name: &str) -> Option<Named> {
        let names = self.files.get(file.0 as usize)?;
        let at = names.binary_search_by(|(known, _)| (**known).cmp(name)).ok()?;
        names.get(at).map(|(_, named)| *named)
    }

    /// Resolves the head of a path; how many names it took.
    pub fn head(&self, file: FileId, names: &[&str]) -> Option<(Named, usize)> {
        let found = self.find(file, names.first()?)?;
        let Declared::File(target) = found.what else { return Some((found, 1)) };
        let Some(second) = names.get(1) else { return Some((found, 1)) };
        let inner = self.find(target?, second)?;
        matches!(inner.what, Declared::Value | Declared::Part(_)).then_some((inner, 2))
    }
}

fn of_file(snapshot: &Snapshot, file: FileId) -> Vec<(Box<str>, Named)> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let mut names = Vec::with_capacity(source.tree.items.len());
    // Items and records stand in the order of the text.
    let mut records = snapshot.analysis.values.iter().zip(0..).peekable();
    for (index, item) in source.tree.items.iter().enumerate() {
        let (name, span, what) = match &item.tree.kind {
            ItemKind::Let { name, .. } => (name.text.clone(), name.span, Declared::Value),
            ItemKind::Part { name, role, .. } => {
                (name.text.clone(), name.span, Declared::Part(role_of(*role)))
            }
            ItemKind::Drive { name, .. } => (name.text.clone(), name.span, Declared::Drive),
            ItemKind::Case { name, .. } => (name.text.clone(), name.span, Declared::Case),
            ItemKind::Use { path, alias } => {
                let whole = beside(&source.path, &path.value);
                let target = whole
                    .and_then(|whole| snapshot.analysis.files.iter().position(|file| file.path == whole));
                let target = Declared::File(target.map(|at| FileId(at as u32)));
                match alias {
                    Some(alias) => (alias.text.clone(), alias.span, target),
                    None => (stem(&path.value).into(), path.span, target),
                }
            }
            _ => continue,
        };
        if !name.is_empty() {
            let place = FileSpan { file, span: span.shifted(item.offset) };
            while records.next_if(|(record, _)| record.place < place).is_some() {}
            let record = records.next_if(|(record, _)| record.place == place).map(|(_, at)| at);
            names.push((name, Named { what, place, item: index as u32, record }));
        }
    }
    names.sort_by(|(one, _), (other, _)| one.cmp(other));
    names.dedup_by(|(other, _), (first, _)| other == first);
    names
}

/// The name a file is reached by where it is given none.
fn stem(path: &str) -> &str {
    let name = path.rsplit(['/', '\\']).next().unwrap_or(path);
    name.rsplit_once('.').map_or(name, |(stem, _)| stem)
}

impl Named {
    /// What the analysis has of a `let`.
    pub fn value(self, snapshot: &Snapshot) -> Option<&ValueRecord> {
        snapshot.analysis.values.get(self.record? as usize)
    }

    /// The item that declares the name.
    pub fn item(self, snapshot: &Snapshot) -> Option<&Item> {
        snapshot.file(self.place.file)?.tree.items.get(self.item as usize)
    }
}

/// The row of a part's kind, through what it is a variant of.
pub(crate) fn row_of_part(snapshot: &Snapshot, part: Named) -> Option<&'static registry::KindRow> {
    if let Some(record) = snapshot.part(part.place)
        && record.row.is_some()
    {
        return record.row;
    }
    // A part of a broken item has no record.
    let mut part = part;
    for _ in 0..16 {
        let ItemKind::Part { role, base, .. } = &part.item(snapshot)?.tree.kind else { return None };
        match base {
            PartBase::Kind(kind) => return registry::row(role_of(*role), &kind.text),
            PartBase::Variant(path) => {
                let names: Vec<&str> = path.names.iter().map(|name| &*name.text).collect();
                let (base, used) = snapshot.names().head(part.place.file, &names)?;
                if used < names.len() {
                    return None;
                }
                part = base;
            }
        }
    }
    None
}

/// The fields of a part of a kind, in the order of the row.
pub(crate) fn fields_of(row: &'static registry::KindRow) -> impl Iterator<Item = &'static Field> {
    row.fields.iter().chain(registry::common_fields(row.role))
}

/// What can be asked of a part of a kind in a drive.
pub(crate) fn results_of(row: &'static registry::KindRow) -> impl Iterator<Item = &'static ResultRow> {
    row.results.iter().chain(registry::common_results(row.role))
}

/// The parts of a drive, supplies behind them: the names as they are written in a path, and what they stand for.
pub(crate) fn parts_of_drive(snapshot: &Snapshot, drive: Named) -> Vec<(String, Named)> {
    let mut found: Vec<(String, Named)> = Vec::new();
    let Some(item) = drive.item(snapshot) else { return found };
    let ItemKind::Drive { chain, .. } = &item.tree.kind else { return found };
    let mut add = |written: String, named: Named| {
        if found.iter().all(|(_, known)| known.place != named.place) {
            found.push((written, named));
        }
    };
    let mut todo = vec![chain];
    while let Some(next) = todo.pop() {
        match &next.kind {
            ChainKind::Part { path, .. } => {
                let names: Vec<&str> = path.names.iter().map(|name| &*name.text).collect();
                if let Some((named, used)) = snapshot.names().head(drive.place.file, &names)
                    && used == names.len()
                    && matches!(named.what, Declared::Part(_))
                {
                    add(names.join("."), named);
                }
            }
            ChainKind::Times { inner, .. } => todo.push(inner),
            ChainKind::Series(parts) | ChainKind::Joined(parts) => todo.extend(parts.iter().rev()),
            ChainKind::Broken => {}
        }
    }
    let links: Vec<(String, Named)> =
        found.iter().flat_map(|(_, part)| links_of(snapshot, *part, drive.place.file)).collect();
    for (written, named) in links {
        if found.iter().all(|(_, known)| known.place != named.place) {
            found.push((written, named));
        }
    }
    found
}

/// The supplies that a part names.
fn links_of(snapshot: &Snapshot, part: Named, from: FileId) -> Vec<(String, Named)> {
    let Some(record) = snapshot.part(part.place) else { return Vec::new() };
    let linked = record.fields.iter().filter(|field| {
        let row = record.row.and_then(|row| row.fields.iter().find(|row| row.name == field.name));
        row.is_some_and(|row| matches!(row.shape, registry::Shape::Part(_)))
    });
    linked
        .filter_map(|field| {
            let names: Vec<&str> = snapshot.text(field.value_place).split('.').map(str::trim).collect();
            let (named, used) = snapshot.names().head(field.value_place.file, &names)?;
            let own = field.value_place.file == from;
            (used == names.len() && own).then(|| (names.join("."), named))
        })
        .collect()
}
