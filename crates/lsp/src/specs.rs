//! The specs that are open, analyzed: which text belongs to which, and what has to be done again.

use std::cell::RefCell;
use std::collections::{BTreeMap, BTreeSet};
use std::path::{Path, PathBuf};
use std::sync::Arc;
use std::time::{Duration, Instant};

use layshaft_ide::Snapshot;
use layshaft_ide::base::{Analysis, FileId, Files, Memo, NoFiles, ReadError};
use layshaft_ide::hints::Hint;
use layshaft_ide::sensitivity::trial;
use tower_lsp::lsp_types::Url;

use crate::disk::{Disk, Place, Stamp, below};
use crate::document::Document;
use crate::handlers::paint;
use crate::watch::Watch;

/// An open spec.
#[derive(Debug, Default)]
pub struct Spec {
    memo: Memo,
    /// The memo of trials, apart, so that a trial does not drop what the text itself still needs.
    trials: Memo,
    /// The analysis of the texts as they were; none before the first, and where the last one failed.
    pub snapshot: Option<Arc<Snapshot>>,
    /// Whether the analysis is that of the texts as they are.
    pub fresh: bool,
    /// Whether the spec's own text is all that changed.
    pub own_change: bool,
    /// How often in a row newer text has stopped its analysis.
    pub stopped: u32,
    /// How long the last analysis took.
    pub took: Duration,
    /// When its findings were last told.
    pub told: Option<Instant>,
    /// The last good hint of each declaration.
    pub hints: BTreeMap<String, Hint>,
    /// The semantic tokens that the client was last told.
    pub painted: paint::Kept,
    /// Every file that was asked for, found or not.
    pub reads: BTreeSet<PathBuf>,
}

/// Documents and specs.
pub struct Specs {
    disk: Box<dyn Disk>,
    watch: Watch,
    /// Every open document.
    pub documents: BTreeMap<Url, Document>,
    /// Every open spec.
    pub specs: BTreeMap<Url, Spec>,
    /// Specs whose findings are not told.
    pub untold: BTreeSet<Url>,
    /// The document that was touched last.
    pub latest: Option<Url>,
    /// The analysis before the newest, to be dropped when nobody waits.
    pub retired: Option<Arc<Snapshot>>,
    open_at: BTreeMap<PathBuf, Url>,
    cache: RefCell<BTreeMap<PathBuf, Kept>>,
}

/// So often in a row an analysis may be stopped by newer text before one runs to its end.
const MOST_STOPPED: u32 = 8;

/// A text as it was read from the disk.
type Kept = (Stamp, Result<Arc<str>, ReadError>);

impl Specs {
    /// None open.
    pub fn new(disk: Box<dyn Disk>, watch: Watch) -> Self {
        Self {
            disk,
            watch,
            documents: BTreeMap::new(),
            specs: BTreeMap::new(),
            untold: BTreeSet::new(),
            latest: None,
            retired: None,
            open_at: BTreeMap::new(),
            cache: RefCell::default(),
        }
    }

    /// The disk.
    pub fn disk(&self) -> &dyn Disk {
        &*self.disk
    }

    /// Opens a document, over one that is open under the same name.
    pub fn open(&mut self, uri: &Url, language: &str, version: i32, text: String) {
        self.close(uri);
        let is_spec = language == "layshaft" || uri.path().ends_with(".shaft");
        let place = file_path(uri).and_then(|path| self.disk.place(&path));
        if let Some(place) = &place {
            self.open_at.insert(place.whole(), uri.clone());
        }
        let whole = place.as_ref().map(Place::whole);
        self.documents.insert(uri.clone(), Document::new(version, text, place));
        if is_spec {
            self.specs.insert(uri.clone(), Spec::default());
        }
        self.touched(uri, whole.as_deref());
    }

    /// Closes a document; whether it was open.
    pub fn close(&mut self, uri: &Url) -> bool {
        let Some(document) = self.documents.remove(uri) else { return false };
        self.specs.remove(uri);
        self.untold.remove(uri);
        if let Some(place) = document.place {
            let whole = place.whole();
            self.open_at.remove(&whole);
            self.changed(&whole);
        }
        true
    }

    /// The text of an open document changed.
    pub fn edited(&mut self, uri: &Url) {
        let whole = self.documents.get(uri).and_then(|document| document.place.as_ref()).map(Place::whole);
        self.touched(uri, whole.as_deref());
    }

    fn touched(&mut self, uri: &Url, whole: Option<&Path>) {
        if let Some(whole) = whole {
            self.changed(whole);
        }
        if let Some(spec) = self.specs.get_mut(uri) {
            spec.own_change = spec.fresh || spec.snapshot.is_none();
            spec.fresh = false;
            self.untold.insert(uri.clone());
            self.latest = Some(uri.clone());
        }
    }

    /// A file changed: every spec that asked for it has to be analyzed again.
    pub fn changed(&mut self, whole: &Path) {
        for (uri, spec) in &mut self.specs {
            if spec.reads.contains(whole) {
                spec.fresh = false;
                spec.own_change = false;
                self.untold.insert(uri.clone());
            }
        }
    }

    /// Everything has to be placed and analyzed again: a root came or went.
    pub fn placed_anew(&mut self) {
        self.open_at.clear();
        for (uri, document) in &mut self.documents {
            document.place = file_path(uri).and_then(|path| self.disk.place(&path));
            if let Some(place) = &document.place {
                self.open_at.insert(place.whole(), uri.clone());
            }
        }
        for (uri, spec) in &mut self.specs {
            spec.fresh = false;
            spec.own_change = false;
            self.untold.insert(uri.clone());
        }
    }

    /// The files that were read from the disk and are not what they were. For clients that do not watch files.
    pub fn look_again(&mut self) {
        let kept = self.cache.borrow();
        let gone = |(whole, (stamp, _)): (&PathBuf, &Kept)| {
            let (folder, name) = (whole.parent()?, whole.file_name()?.to_str()?);
            (self.disk.stamp(folder, name) != Some(*stamp)).then(|| whole.clone())
        };
        let changed: Vec<PathBuf> = kept.iter().filter_map(gone).collect();
        drop(kept);
        for whole in changed {
            self.changed(&whole);
        }
    }

    /// The analysis of a spec as it is now; none where it is not open, its analysis failed, or was stopped.
    pub fn snapshot(&mut self, uri: &Url) -> Option<Arc<Snapshot>> {
        let document = self.documents.get(uri)?;
        let spec = self.specs.get_mut(uri)?;
        if spec.fresh {
            return spec.snapshot.clone();
        }
        // Should the analysis panic, it is not tried again before the next change.
        spec.fresh = true;
        // Taking an analysis apart takes time: whoever waits for the new one does not wait for that.
        self.retired = spec.snapshot.take();
        let mut memo = std::mem::take(&mut spec.memo);
        let text = document.text();
        let begun = crate::core::now();
        // Who types without a pause sees results now and then all the same.
        self.watch.begin(uri, spec.stopped < MOST_STOPPED);
        let (snapshot, reads) = match &document.place {
            Some(place) => {
                let files = Overlay {
                    specs: (&self.documents, &self.open_at),
                    disk: &*self.disk,
                    cache: &self.cache,
                    root: &place.root,
                    watch: &self.watch,
                    reads: RefCell::default(),
                };
                let snapshot = Snapshot::new(&place.path, text, &files, &mut memo);
                (snapshot, files.reads.into_inner())
            }
            None => (Snapshot::new(&alone(uri), text, &Alone(&self.watch), &mut memo), BTreeSet::new()),
        };
        spec.memo = memo;
        spec.reads.extend(reads.iter().cloned());
        if self.watch.end() {
            spec.stopped += 1;
            spec.fresh = false;
            return None;
        }
        spec.stopped = 0;
        spec.reads = reads;
        spec.took = begun.elapsed();
        spec.snapshot = Some(Arc::new(snapshot));
        spec.snapshot.clone()
    }

    /// Whether a file is open.
    pub fn is_open(&self, whole: &Path) -> bool {
        self.open_at.contains_key(whole)
    }

    /// The names of a spec that is not open; none where it cannot be read.
    pub fn names(&self, place: &Place) -> Option<Snapshot> {
        let files = Overlay {
            specs: (&self.documents, &self.open_at),
            disk: &*self.disk,
            cache: &self.cache,
            root: &place.root,
            watch: &self.watch,
            reads: RefCell::default(),
        };
        let text = files.read(&place.path).ok()?;
        Some(Snapshot::read(&place.path, text, &files))
    }

    /// Trial analyses of an open spec with another text in place of one of its files; none is begun after `until`.
    pub fn trials<'a>(
        &'a mut self,
        uri: &'a Url,
        snapshot: &'a Snapshot,
        until: Instant,
    ) -> impl FnMut(FileId, Arc<str>) -> Option<Analysis> + 'a {
        move |file, text| {
            if crate::core::now() >= until {
                return None;
            }
            let document = self.documents.get(uri)?;
            let memo = &mut self.specs.get_mut(uri)?.trials;
            self.watch.begin(uri, true);
            let found = match &document.place {
                Some(place) => {
                    let files = Overlay {
                        specs: (&self.documents, &self.open_at),
                        disk: &*self.disk,
                        cache: &self.cache,
                        root: &place.root,
                        watch: &self.watch,
                        reads: RefCell::default(),
                    };
                    trial(snapshot, &files, memo, file, text)
                }
                None => trial(snapshot, &Alone(&self.watch), memo, file, text),
            };
            if self.watch.end() { None } else { found }
        }
    }

    /// The name of a file of an open spec in the client's words.
    pub fn uri_of(&self, spec: &Url, snapshot: &Snapshot, file: FileId) -> Option<Url> {
        let root = self.documents.get(spec).and_then(|document| document.place.as_ref()).map(|of| &*of.root);
        self.uri_below(spec, root, snapshot, file)
    }

    /// The name of a file of a spec below a root in the client's words.
    pub fn uri_below(
        &self,
        spec: &Url,
        root: Option<&Path>,
        snapshot: &Snapshot,
        file: FileId,
    ) -> Option<Url> {
        if file == FileId(0) {
            return Some(spec.clone());
        }
        self.uri_at(&below(root?, &snapshot.file(file)?.path))
    }

    /// The name of a path in the client's words.
    pub fn uri_at(&self, whole: &Path) -> Option<Url> {
        self.open_at.get(whole).cloned().or_else(|| Url::from_file_path(whole).ok())
    }
}

/// The path of a document on the disk.
pub fn file_path(uri: &Url) -> Option<PathBuf> {
    (uri.scheme() == "file").then(|| uri.to_file_path().ok()).flatten()
}

/// The name of a document that has no place on the disk.
fn alone(uri: &Url) -> String {
    let name = uri.path().rsplit('/').next().unwrap_or_default();
    if name.is_empty() { String::from("-") } else { name.to_owned() }
}

/// A document that stands alone.
struct Alone<'a>(&'a Watch);

impl Files for Alone<'_> {
    fn read(&self, path: &str) -> Result<Arc<str>, ReadError> {
        NoFiles.read(path)
    }

    fn interrupted(&self) -> bool {
        self.0.stopped()
    }
}

/// The disk below a root, open documents laid over it.
struct Overlay<'a> {
    specs: (&'a BTreeMap<Url, Document>, &'a BTreeMap<PathBuf, Url>),
    disk: &'a dyn Disk,
    cache: &'a RefCell<BTreeMap<PathBuf, Kept>>,
    root: &'a Path,
    watch: &'a Watch,
    reads: RefCell<BTreeSet<PathBuf>>,
}

impl Files for Overlay<'_> {
    fn read(&self, path: &str) -> Result<Arc<str>, ReadError> {
        let whole = below(self.root, path);
        self.reads.borrow_mut().insert(whole.clone());
        let (documents, open_at) = self.specs;
        if let Some(document) = open_at.get(&whole).and_then(|uri| documents.get(uri)) {
            return Ok(document.text());
        }
        let stamp = self.disk.stamp(self.root, path);
        let mut cache = self.cache.borrow_mut();
        if let (Some(stamp), Some((kept, text))) = (stamp, cache.get(&whole))
            && *kept == stamp
        {
            return text.clone();
        }
        let text = self.disk.read(self.root, path);
        match stamp {
            Some(stamp) => cache.insert(whole, (stamp, text.clone())),
            None => cache.remove(&whole),
        };
        text
    }
    fn interrupted(&self) -> bool {
        self.watch.stopped()
    }
}
