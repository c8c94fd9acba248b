//! Results at the end of the line: short, of stable width, and nothing that the hover and the command do not say too.

mod figure;
mod line;
mod stale;
#[cfg(test)]
mod tests;

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_syntax::{Item, ItemKind};

use crate::Snapshot;

pub use stale::merge_stale;

/// The longest hint, in characters.
pub const LONGEST: usize = 25;

/// What a hint is about; each can be switched off.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Category {
    /// A computed `let`.
    Values,
    /// A source, transmission or load at its reached point.
    Parts,
    /// A drive, and what `show` asks for.
    Drives,
    /// A criterion.
    Criteria,
}

/// Which hints are wanted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Categories {
    /// Computed values.
    pub values: bool,
    /// Parts.
    pub parts: bool,
    /// Drives and shown results.
    pub drives: bool,
    /// Criteria.
    pub criteria: bool,
}

impl Default for Categories {
    fn default() -> Self {
        Self { values: true, parts: true, drives: true, criteria: true }
    }
}

impl Categories {
    const fn has(self, category: Category) -> bool {
        match category {
            Category::Values => self.values,
            Category::Parts => self.parts,
            Category::Drives => self.drives,
            Category::Criteria => self.criteria,
        }
    }
}

/// A hint at the end of a line.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Hint {
    /// The end of the line, its comment and blanks included, in the file.
    pub offset: u32,
    /// At most [`LONGEST`] characters.
    pub text: String,
    /// The name it is about, where the hover is that [`tooltip`] gives.
    pub target: Option<FileSpan>,
    /// What it is about.
    pub category: Category,
    /// What it belongs to, by declared path: `let total`, `require H3-1`.
    pub key: String,
    /// Whether it is from before the line was touched.
    pub stale: bool,
}

/// What is told at a hint, as Markdown: the hover of what it is about. Made when it is asked for, not with the hint.
#[must_use]
pub fn tooltip(snapshot: &Snapshot, hint: &Hint) -> Option<String> {
    let target = hint.target?;
    let hover =
        crate::hover::hover(snapshot, target.file, target.span.start, crate::hover::Options::default())?;
    Some(hover.markdown)
}

/// The hints of the lines that touch a range, in the order of the text.
#[must_use]
pub fn hints(snapshot: &Snapshot, file: FileId, range: Span, categories: Categories) -> Vec<Hint> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let items = &source.tree.items;
    let first = items.partition_point(|item| item.tree.span.end + item.offset < range.start);
    let mut found = Vec::new();
    for item in &items[first..] {
        let span = item.tree.span.shifted(item.offset);
        if span.start > range.end {
            break;
        }
        let Some(category) = category(&item.tree.kind).filter(|category| categories.has(*category)) else {
            continue;
        };
        if let Some((text, target)) = line::told(snapshot, file, item).filter(|(text, _)| !text.is_empty()) {
            let offset = line_end(source, line::first_line(item));
            let target = target.map(|span| FileSpan { file, span: span.shifted(item.offset) });
            let (key, text) = (key(item), layshaft_present::escape::terminal(&text).into_owned());
            found.push(Hint { offset, text, target, category, key, stale: false });
        }
    }
    found
}

const fn category(kind: &ItemKind) -> Option<Category> {
    match kind {
        ItemKind::Let { .. } => Some(Category::Values),
        ItemKind::Part { .. } => Some(Category::Parts),
        ItemKind::Drive { .. } | ItemKind::Show { .. } => Some(Category::Drives),
        ItemKind::Require { .. } => Some(Category::Criteria),
        _ => None,
    }
}

/// The declared path of an item: what stays the same while its line is typed.
pub(crate) fn key(item: &Item) -> String {
    match &item.tree.kind {
        ItemKind::Let { name, .. } => format!("let {}", name.text),
        ItemKind::Part { name, .. } => format!("part {}", name.text),
        ItemKind::Drive { name, .. } => format!("drive {}", name.text),
        ItemKind::Require { clause, .. } => format!("require {}", clause.value),
        _ => String::new(),
    }
}

/// The end of the line that holds an offset, without its line ending.
fn line_end(source: &layshaft_semantics::analysis::SourceFile, offset: u32) -> u32 {
    let Some((start, end)) = source.lines.range(source.lines.line_of(offset)) else { return offset };
    let line = source.text.get(start as usize..end as usize).unwrap_or("");
    start + line.trim_end_matches(['\r', '\n']).len() as u32
}
