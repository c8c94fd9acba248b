//! An analysis with the index of its names: what every feature works on.

use std::collections::BTreeMap;
use std::sync::{Arc, LazyLock, OnceLock};

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_present::sheet;
use layshaft_present::unit::Habits;
use layshaft_semantics::analysis::{CaseRecord, DriveRecord, PartRecord, SourceFile, ValueRecord};
use layshaft_semantics::index::{Index, Reference, Target};
use layshaft_semantics::{Analysis, Files, Memo};
use layshaft_syntax::Item;

use crate::names::Names;

/// One state of a spec and the files it uses. Immutable; a later state is another snapshot.
#[derive(Clone, Debug)]
pub struct Snapshot {
    /// What the command would print of the same text.
    pub analysis: Arc<Analysis>,
    /// Every name with what it stands for, gathered at the first question: an edit does not wait for it.
    pub index: Arc<LazyLock<Index, MakeIndex>>,
    habits: Arc<OnceLock<Habits>>,
    criteria: Arc<OnceLock<ByName>>,
    drives: Arc<OnceLock<ByName>>,
    names: Arc<OnceLock<Names>>,
}

/// Gathers the names of an analysis.
type MakeIndex = Box<dyn FnOnce() -> Index + Send>;

/// Indices of criteria or drives under the place of a name.
type ByName = BTreeMap<FileSpan, Vec<usize>>;

/// The spec itself; the files it uses come behind it.
pub const SPEC: FileId = FileId(0);

impl Snapshot {
    /// Analyzes a text; `path` is relative to the root that `files` reads from.
    #[must_use]
    pub fn new(path: &str, text: Arc<str>, files: &dyn Files, memo: &mut Memo) -> Self {
        Self::of(layshaft_semantics::analyze_with(path, text, files, memo))
    }

    /// The names of a text alone: nothing is evaluated, and nothing is found wrong.
    #[must_use]
    pub fn read(path: &str, text: Arc<str>, files: &dyn Files) -> Self {
        Self::of(layshaft_semantics::read(path, text, files, &mut Memo::default()))
    }

    fn of(analysis: Analysis) -> Self {
        let analysis = Arc::new(analysis);
        let of = Arc::clone(&analysis);
        let index: MakeIndex = Box::new(move || Index::of(&of));
        Self {
            analysis,
            index: Arc::new(LazyLock::new(index)),
            habits: Arc::default(),
            criteria: Arc::default(),
            drives: Arc::default(),
            names: Arc::default(),
        }
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

    /// The units the author uses, made at the first question.
    #[must_use]
    pub fn habits(&self) -> &Habits {
        self.habits.get_or_init(|| sheet::habits(&self.analysis))
    }

    /// The names of each file, found at the first question.
    pub(crate) fn names(&self) -> &Names {
        self.names.get_or_init(|| Names::of(self))
    }

    /// The criteria that ask about a drive, by index; found for all drives at the first question.
    pub(crate) fn criteria_of(&self, drive: FileSpan) -> &[usize] {
        let found = self.criteria.get_or_init(|| {
            let mut found = ByName::new();
            for (index, criterion) in self.analysis.criteria.iter().enumerate() {
                for name in self.names_in(criterion.condition_place) {
                    let Target::Drive(drive) = name.target else { continue };
                    let of = found.entry(drive).or_default();
                    if of.last() != Some(&index) {
                        of.push(index);
                    }
                }
            }
            found
        });
        found.get(&drive).map_or(&[], Vec::as_slice)
    }

    /// The item at a place, directly behind it included.
    pub(crate) fn item(&self, file: FileId, offset: u32) -> Option<&Item> {
        let items = &self.file(file)?.tree.items;
        let behind = items.partition_point(|item| item.tree.span.start + item.offset <= offset);
        let item = items.get(behind.checked_sub(1)?)?;
        item.tree.span.shifted(item.offset).touches(offset).then_some(item)
    }

    /// The names that stand in a place.
    pub(crate) fn names_in(&self, place: FileSpan) -> &[Reference] {
        let all = &self.index.references;
        let from = all.partition_point(|name| (name.place.file, name.place.span.start) < start(place));
        let to = all.partition_point(|name| {
            (name.place.file, name.place.span.start) < (place.file, place.span.end.max(place.span.start))
        });
        all.get(from..to).unwrap_or(&[])
    }

    /// A `let` by the place of its name.
    pub(crate) fn value(&self, name: FileSpan) -> Option<&ValueRecord> {
        let values = &self.analysis.values;
        values.get(values.binary_search_by(|value| value.place.cmp(&name)).ok()?)
    }

    /// A part by the place of its name.
    pub(crate) fn part(&self, name: FileSpan) -> Option<&PartRecord> {
        let parts = &self.analysis.parts;
        parts.get(parts.binary_search_by(|part| part.place.cmp(&name)).ok()?)
    }

    /// A drive by the place of its name.
    pub(crate) fn drive(&self, name: FileSpan) -> Option<(usize, &DriveRecord)> {
        let drives = &self.analysis.drives;
        let at = drives.binary_search_by(|drive| drive.place.cmp(&name)).ok()?;
        Some((at, drives.get(at)?))
    }

    /// The drives a part takes part in, with their index; found for all parts at the first question.
    pub(crate) fn drives_with(&self, part: FileSpan) -> impl Iterator<Item = (usize, &DriveRecord)> {
        let found = self.drives.get_or_init(|| {
            let mut found = ByName::new();
            for (index, drive) in self.analysis.drives.iter().enumerate() {
                for part in drive.cases.iter().flat_map(|case| &case.parts) {
                    let of = found.entry(*part).or_default();
                    if of.last() != Some(&index) {
                        of.push(index);
                    }
                }
            }
            found
        });
        let indices = found.get(&part).map_or(&[][..], Vec::as_slice);
        indices.iter().filter_map(|index| Some((*index, self.analysis.drives.get(*index)?)))
    }

    /// The states of a case: one for each combination of `each`.
    pub(crate) fn states(&self, name: FileSpan) -> impl Iterator<Item = (usize, &CaseRecord)> {
        self.analysis.cases.iter().enumerate().filter(move |(_, case)| case.place == name)
    }
}

const fn start(place: FileSpan) -> (FileId, u32) {
    (place.file, place.span.start)
}
