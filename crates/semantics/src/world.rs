//! The texts of an analysis: the spec, the files it uses, and what each of them declares.

use std::collections::BTreeMap;
use std::sync::Arc;

use layshaft_diagnostics::{FileId, FileSpan, LineIndex, Span};
use layshaft_syntax::{Item, ItemKind, ItemTree};

use crate::analysis::SourceFile;

/// An item by its place in the world. Ordered as the texts are.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub(crate) struct ItemRef {
    pub file: u32,
    pub item: u32,
}

/// What a name of a file stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Declared {
    Let,
    Part,
    Drive,
    Case,
    /// The alias of a used file; none if it could not be read.
    File(Option<u32>),
}

/// The names of one file.
#[derive(Debug, Default)]
pub(crate) struct Scope {
    pub names: BTreeMap<Box<str>, (Declared, ItemRef)>,
}

/// All texts and scopes.
#[derive(Debug, Default)]
pub(crate) struct World {
    pub files: Vec<SourceFile>,
    pub scopes: Vec<Scope>,
}

impl World {
    /// The world of texts already loaded, their scopes filled again; of a doubled name the first counts.
    pub fn of_files(files: &[SourceFile]) -> Self {
        let mut world = Self { files: files.to_vec(), scopes: Vec::new() };
        for file in 0..files.len() as u32 {
            let mut scope = Scope::default();
            for (at, tree) in world.items(file) {
                let declared = match &tree.kind {
                    ItemKind::Let { name, .. } => (name.text.clone(), Declared::Let),
                    ItemKind::Part { name, .. } => (name.text.clone(), Declared::Part),
                    ItemKind::Drive { name, .. } => (name.text.clone(), Declared::Drive),
                    ItemKind::Case { name, .. } => (name.text.clone(), Declared::Case),
                    ItemKind::Use { path, alias } => {
                        let target = crate::load::beside(&files[file as usize].path, &path.value)
                            .ok()
                            .and_then(|full| files.iter().position(|file| file.path == full))
                            .map(|index| index as u32);
                        let stem = || crate::load::stem(&path.value).into();
                        let name = alias.as_ref().map_or_else(stem, |alias| alias.text.clone());
                        (name, Declared::File(target))
                    }
                    _ => continue,
                };
                scope.names.entry(declared.0).or_insert((declared.1, at));
            }
            world.scopes.push(scope);
        }
        world
    }

    /// Takes up a text; its scope is filled by the caller.
    pub fn push(&mut self, path: String, text: Arc<str>, tree: Arc<layshaft_syntax::File>) -> u32 {
        let lines = Arc::new(LineIndex::new(&text));
        self.files.push(SourceFile { path, text, lines, tree });
        self.scopes.push(Scope::default());
        (self.files.len() - 1) as u32
    }

    /// An item where it stands.
    pub fn item(&self, at: ItemRef) -> &Item {
        &self.files[at.file as usize].tree.items[at.item as usize]
    }

    /// The tree of an item.
    pub fn tree(&self, at: ItemRef) -> &ItemTree {
        &self.item(at).tree
    }

    /// From a span in an item to a place in its file.
    pub fn place(&self, at: ItemRef, span: Span) -> FileSpan {
        FileSpan { file: FileId(at.file), span: span.shifted(self.item(at).offset) }
    }

    /// The words of an item that a span covers.
    pub fn text(&self, at: ItemRef, span: Span) -> &str {
        let FileSpan { span, .. } = self.place(at, span);
        self.files[at.file as usize].text.get(span.start as usize..span.end as usize).unwrap_or("")
    }

    /// Every item of a file, with its reference.
    pub fn items(&self, file: u32) -> impl Iterator<Item = (ItemRef, &ItemTree)> {
        let items = &self.files[file as usize].tree.items;
        items.iter().enumerate().map(move |(item, at)| (ItemRef { file, item: item as u32 }, &*at.tree))
    }

    /// What a name of a file stands for.
    pub fn find(&self, file: u32, name: &str) -> Option<(Declared, ItemRef)> {
        self.scopes.get(file as usize)?.names.get(name).copied()
    }

    /// Resolves the head of a path: the declaration and how many names it took.
    ///
    /// `motor.torque` in a file that declares `motor` takes one name, `parts.motor.torque` two. Drives and cases of a
    /// used file are not reached.
    pub fn head(&self, file: u32, names: &[layshaft_syntax::Name]) -> Option<(Declared, ItemRef, usize)> {
        let (declared, at) = self.find(file, &names.first()?.text)?;
        let Declared::File(target) = declared else { return Some((declared, at, 1)) };
        let (inner, at) = self.find(target?, &names.get(1)?.text)?;
        matches!(inner, Declared::Let | Declared::Part).then_some((inner, at, 2))
    }

    /// The name an item declares, with its span.
    pub fn name(&self, at: ItemRef) -> Option<&layshaft_syntax::Name> {
        match &self.tree(at).kind {
            ItemKind::Let { name, .. }
            | ItemKind::Part { name, .. }
            | ItemKind::Drive { name, .. }
            | ItemKind::Case { name, .. } => Some(name),
            ItemKind::Use { alias, .. } => alias.as_ref(),
            _ => None,
        }
    }
}
