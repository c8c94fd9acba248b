//! The declarations of a file, and of all files by a part of their name.

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_mechanics::registry::Role;
use layshaft_syntax::{Entry, Item, ItemKind, PartBase, RoleWord};

use crate::Snapshot;

/// What a symbol is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum SymbolKind {
    /// A `use`.
    File,
    /// A `let`.
    Value,
    /// A supply.
    Supply,
    /// A source.
    Source,
    /// A transmission.
    Transmission,
    /// A load.
    Load,
    /// A field of a part.
    Field,
    /// A drive.
    Drive,
    /// A case.
    Case,
    /// A criterion.
    Criterion,
}

/// A declaration.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Symbol {
    /// Its name; the clause of a criterion.
    pub name: String,
    /// A few words beside it: the kind of a part, the value of a `let`.
    pub detail: String,
    /// What it is.
    pub kind: SymbolKind,
    /// The name.
    pub place: FileSpan,
    /// The whole declaration.
    pub whole: FileSpan,
    /// Fields of a part.
    pub children: Vec<Symbol>,
}

/// The declarations of a file in the order of the text.
#[must_use]
pub fn document_symbols(snapshot: &Snapshot, file: FileId) -> Vec<Symbol> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let symbols = source.tree.items.iter().filter_map(|item| symbol_of(snapshot, file, item));
    // A name half typed is empty, and a list cannot show it.
    symbols.filter(|symbol| !symbol.name.trim().is_empty()).collect()
}

fn symbol_of(snapshot: &Snapshot, file: FileId, item: &Item) -> Option<Symbol> {
    let place = |span: Span| FileSpan { file, span: span.shifted(item.offset) };
    let symbol = |name: &str, detail: String, kind, span| Symbol {
        name: name.to_owned(),
        detail,
        kind,
        place: place(span),
        whole: place(item.tree.span),
        children: Vec::new(),
    };
    let words = |span| snapshot.text(place(span)).to_owned();
    Some(match &item.tree.kind {
        ItemKind::Use { path, alias } => {
            let (name, span) = match alias {
                Some(alias) => (&*alias.text, alias.span),
                None => (&*path.value, path.span),
            };
            symbol(name, path.value.to_string(), SymbolKind::File, span)
        }
        ItemKind::Let { name, value, .. } => {
            symbol(&name.text, short(&words(value.span)), SymbolKind::Value, name.span)
        }
        ItemKind::Part { role, name, block, base, .. } => {
            let detail = match base {
                PartBase::Kind(kind) => kind.text.to_string(),
                PartBase::Variant(path) => format!("= {}", words(path.span)),
            };
            let field = |entry: &Entry| Symbol {
                whole: place(entry.span),
                ..symbol(
                    &words(entry.key.span),
                    short(&words(entry.value.span)),
                    SymbolKind::Field,
                    entry.key.span,
                )
            };
            let children = block.entries.iter().map(field).collect();
            Symbol { children, ..symbol(&name.text, detail, kind_of(*role), name.span) }
        }
        ItemKind::Drive { name, chain, .. } => {
            symbol(&name.text, short(&words(chain.span)), SymbolKind::Drive, name.span)
        }
        ItemKind::Case { name, .. } => symbol(&name.text, String::new(), SymbolKind::Case, name.span),
        ItemKind::Require { clause, condition, .. } => {
            symbol(&clause.value, short(&words(condition.span)), SymbolKind::Criterion, clause.span)
        }
        _ => return None,
    })
}

/// The declarations of all files whose name holds the letters of `query` in their order, case aside.
#[must_use]
pub fn workspace_symbols(snapshot: &Snapshot, query: &str) -> Vec<Symbol> {
    let files = 0..snapshot.analysis.files.len() as u32;
    files
        .flat_map(|file| document_symbols(snapshot, FileId(file)))
        .filter(|symbol| holds(&symbol.name, query))
        .collect()
}

/// Whether `name` holds the letters of `query` in order.
fn holds(name: &str, query: &str) -> bool {
    let mut letters = name.chars().flat_map(char::to_lowercase);
    query
        .chars()
        .flat_map(char::to_lowercase)
        .filter(|c| !c.is_whitespace())
        .all(|c| letters.any(|other| other == c))
}

fn kind_of(role: RoleWord) -> SymbolKind {
    match role {
        RoleWord::Supply => SymbolKind::Supply,
        RoleWord::Source => SymbolKind::Source,
        RoleWord::Transmission => SymbolKind::Transmission,
        RoleWord::Load => SymbolKind::Load,
    }
}

/// What a part of this role is.
pub(crate) const fn kind_of_role(role: Role) -> SymbolKind {
    match role {
        Role::Supply => SymbolKind::Supply,
        Role::Source => SymbolKind::Source,
        Role::Transmission => SymbolKind::Transmission,
        Role::Load => SymbolKind::Load,
    }
}

/// One line of at most forty characters.
fn short(words: &str) -> String {
    let line = words.lines().next().unwrap_or("");
    let cut = line.len() < words.len() || line.chars().count() > 40;
    let mut text: String = line.chars().take(40).collect();
    if cut {
        text.push('…');
    }
    text
}

#[cfg(test)]
mod tests {
    use super::{document_symbols, workspace_symbols};
    use crate::fixture::Fixture;

    #[test]
    fn every_declaration_in_order_with_its_fields() {
        let fixture = Fixture::new(
            "let a = 5 m\nsource m: straight_line { stall_torque = 5 N·m }\nrequire \"R1 a\" 1 < 2\n",
        );
        let symbols = document_symbols(&fixture.snapshot, fixture.file);
        let names: Vec<_> =
            symbols.iter().map(|symbol| (symbol.name.as_str(), symbol.detail.as_str())).collect();
        assert_eq!(names, [("a", "5 m"), ("m", "straight_line"), ("R1 a", "1 < 2")]);
        assert_eq!(symbols[1].children[0].name, "stall_torque");
    }

    #[test]
    fn letters_in_order_find_a_name() {
        let fixture = Fixture::new("let rated_load = 5 m\nlet other = 2 m\n");
        let found = workspace_symbols(&fixture.snapshot, "rLd");
        assert_eq!(found.len(), 1);
    }
}
