//! Specs that stand on the disk and are not open: read for their names alone, nothing is evaluated.

use std::collections::BTreeSet;
use std::path::PathBuf;
use std::sync::Arc;

use layshaft_ide::Snapshot;
use tower_lsp::lsp_types::Url;

use crate::disk::Place;
use crate::specs::{Specs, file_path};

/// The most that are looked at: more than any project has, and few enough to be read while somebody waits.
const MOST: usize = 2000;
/// The file that marks a root.
const ROOT_MARK: &str = "layshaft.toml";

/// A closed spec, its names read.
pub struct Closed {
    /// Its name in the client's words.
    pub uri: Url,
    /// Its root, and its path below it.
    pub place: Place,
    /// Its texts and names.
    pub snapshot: Arc<Snapshot>,
}

impl Specs {
    /// The closed specs below the open folders, and below marked roots of open documents, in the order of their paths.
    pub fn closed(&self, folders: &[Url]) -> Vec<Closed> {
        let marked =
            |place: &Place| self.disk().stamp(&place.root, ROOT_MARK).is_some().then(|| place.root.clone());
        let of_documents = self.documents.values().filter_map(|document| marked(document.place.as_ref()?));
        let tops: BTreeSet<PathBuf> = folders.iter().filter_map(file_path).chain(of_documents).collect();
        let mut seen: BTreeSet<PathBuf> = BTreeSet::new();
        let mut found = Vec::new();
        for path in tops.iter().flat_map(|top| self.disk().specs(top)) {
            if found.len() >= MOST {
                break;
            }
            let Some(place) = self.disk().place(&path) else { continue };
            if self.is_open(&place.whole()) || !seen.insert(place.whole()) {
                continue;
            }
            let Ok(uri) = Url::from_file_path(place.whole()) else { continue };
            if let Some(snapshot) = self.names(&place) {
                found.push(Closed { uri, place, snapshot: Arc::new(snapshot) });
            }
        }
        found
    }
}
