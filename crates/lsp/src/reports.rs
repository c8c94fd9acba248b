//! The findings of every file, as last told. Several specs may have found the same in a file that they use; it is told
//! once.

use std::collections::{BTreeMap, BTreeSet};

use tower_lsp::lsp_types::{Diagnostic, Url};

/// What a spec found, by file.
pub type Found = BTreeMap<Url, Vec<Diagnostic>>;

/// The findings of every file.
#[derive(Debug, Default)]
pub struct Reports {
    specs: BTreeMap<Url, Found>,
    files: BTreeMap<Url, File>,
    next: u64,
}

#[derive(Debug, Default)]
struct File {
    specs: BTreeSet<Url>,
    items: Vec<Diagnostic>,
    id: u64,
}

impl Reports {
    /// Takes what a spec found in place of what it found before. Gives the files whose findings are others now.
    pub fn take(&mut self, spec: &Url, found: Found) -> Vec<Url> {
        let before = self.specs.insert(spec.clone(), found).unwrap_or_default();
        self.changed(spec, before)
    }

    /// Forgets what a spec found.
    pub fn forget(&mut self, spec: &Url) -> Vec<Url> {
        let before = self.specs.remove(spec).unwrap_or_default();
        self.changed(spec, before)
    }

    fn changed(&mut self, spec: &Url, before: Found) -> Vec<Url> {
        let empty = Found::new();
        let now = self.specs.get(spec).unwrap_or(&empty);
        let mut all: BTreeSet<Url> = before.into_keys().collect();
        all.extend(now.keys().cloned());
        let mut changed = Vec::new();
        for uri in all {
            let file = self.files.entry(uri.clone()).or_default();
            if now.contains_key(&uri) {
                file.specs.insert(spec.clone());
            } else {
                file.specs.remove(spec);
            }
            let items = together(&self.specs, &uri, &file.specs);
            if items != file.items || file.id == 0 {
                self.next += 1;
                file.id = self.next;
                file.items = items;
                changed.push(uri.clone());
            }
        }
        changed
    }

    /// The findings of a file, with a number that is another when they are others.
    pub fn of(&self, uri: &Url) -> (&[Diagnostic], u64) {
        self.files.get(uri).map_or((&[], 0), |file| (&file.items, file.id))
    }

    /// The files that a spec found something in or looked at.
    pub fn files_of(&self, spec: &Url) -> impl Iterator<Item = &Url> {
        self.specs.get(spec).into_iter().flat_map(Found::keys)
    }

    /// Every file that was looked at.
    pub fn files(&self) -> impl Iterator<Item = &Url> {
        self.files.keys()
    }
}

/// What several specs found in one file, each finding once, by place.
fn together(specs: &BTreeMap<Url, Found>, uri: &Url, by: &BTreeSet<Url>) -> Vec<Diagnostic> {
    let lists: Vec<&Vec<Diagnostic>> =
        by.iter().filter_map(|spec| specs.get(spec)).filter_map(|found| found.get(uri)).collect();
    let [first, rest @ ..] = lists.as_slice() else { return Vec::new() };
    let mut items = (*first).clone();
    for found in rest.iter().flat_map(|list| list.iter()) {
        let same = |one: &Diagnostic| {
            one.range == found.range && one.code == found.code && one.message == found.message
        };
        if !items.iter().any(same) {
            items.push(found.clone());
        }
    }
    items.sort_by_key(|one| (one.range.start, one.range.end));
    items
}
