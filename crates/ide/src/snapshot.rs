//! An analysis with the index of its names: what every feature works on.

use std::sync::Arc;

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_semantics::analysis::SourceFile;
use layshaft_semantics::index::{Index, Reference, Target};
use layshaft_semantics::{Analysis, Files, Memo};

/// One state of a spec and the files it uses. Immutable; a later state is another snapshot.
#[derive(Clone, Debug)]
pub struct Snapshot {
    /// What the command would print of the same text.
    pub analysis: Arc<Analysis>,
    /// Every name with what it stands for.
    pub index: Arc<Index>,
}

/// The spec itself; the files it uses come behind it.
pub const SPEC: FileId = FileId(0);

impl Snapshot {
    /// Analyzes a text; `path` is relative to the root that `files` reads from.
    #[must_use]
    pub fn new(path: &str, text: Arc<str>, files: &dyn Files, memo: &mut Memo) -> Self {
        let analysis = layshaft_semantics::analyze_with(path, text, files, memo);
        let index = Index::of(&analysis);
        Self { analysis: Arc::new(analysis), index: Arc::new(index) }
    }

    /// A file of the snapshot.
    #[must_use]
    pub fn file(&self, file: FileId) -> Option<&SourceFile> {
        self.analysis.file(file)
    }

    /// The words at a place.
    #[must_use]
    pub fn text(&self, place: FileSpan) -> &str {
        let file = self.analysis.file(place.file);
        file.and_then(|file| file.text.get(place.span.start as usize..place.span.end as usize)).unwrap_or("")
    }

    /// The name at a place.
    #[must_use]
    pub fn reference(&self, file: FileId, offset: u32) -> Option<&Reference> {
        self.index.at(file, offset)
    }

    /// Where the thing a name stands for is declared; none for what is built in.
    #[must_use]
    pub fn declaration(&self, target: &Target) -> Option<FileSpan> {
        match target {
            Target::Let(place) | Target::Part(place) | Target::Drive(place) | Target::Case(place) => {
                Some(*place)
            }
            Target::File(_, Some(file)) => Some(FileSpan { file: *file, span: Span::default() }),
            Target::File(place, None) => Some(*place),
            Target::Field(..) => {
                let mut same = self.index.of_target(target);
                same.find(|reference| reference.declares).map(|reference| reference.place)
            }
            Target::Result { drive, part, .. } => part.or(*drive),
            _ => None,
        }
    }
}
