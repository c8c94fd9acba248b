//! Every name of the texts with what it stands for: what an editor asks when it goes to a definition, lists references
//! or renames.
//!
//! The index is made from the trees and scopes alone; it holds for specs that cannot be evaluated.

mod walk;

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_mechanics::registry::Role;

use crate::analysis::Analysis;
use crate::world::World;

/// What a name stands for. A declaration is known by the place of its name.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Target {
    /// A `let`.
    Let(FileSpan),
    /// A supply, source, transmission or load.
    Part(FileSpan),
    /// A drive.
    Drive(FileSpan),
    /// A case.
    Case(FileSpan),
    /// The spec without case.
    Plain,
    /// A used file, by its index; none if it could not be read. The place is that of its alias or path.
    File(FileSpan, Option<FileId>),
    /// A field of a part, a setting of a drive: the owner's place and the field's name, with the member of a named gear.
    Field(FileSpan, String),
    /// A result of a drive or of a part in it.
    Result {
        /// The drive; none for a result known from a part's fields alone.
        drive: Option<FileSpan>,
        /// The part; none for a result of the drive itself.
        part: Option<FileSpan>,
        /// `input`, `output` or none.
        port: Option<String>,
        /// The result's name.
        name: String,
    },
    /// The kind of a part: role and word.
    PartKind(Role, String),
    /// A kind of quantity.
    QuantityKind(String),
    /// A built-in constant.
    Constant(String),
    /// A built-in function.
    Function(String),
    /// A word of a choice, a gear, a duty.
    Word(String),
    /// A code of a finding.
    Code(String),
    /// A path to a file in quotes.
    Path(String),
}

/// A name in the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Reference {
    /// Where it stands.
    pub place: FileSpan,
    /// What it stands for.
    pub target: Target,
    /// Whether this is the declaration itself, or the line that gives a field its value.
    pub declares: bool,
}

/// All names of the texts of an analysis, by place.
#[derive(Clone, Debug, Default)]
pub struct Index {
    /// By file and place; no two overlap.
    pub references: Vec<Reference>,
}

impl Index {
    /// The index of the texts of an analysis.
    #[must_use]
    pub fn of(analysis: &Analysis) -> Self {
        let world = World::of_files(&analysis.files);
        let mut references = walk::walk(&world);
        references.sort_by_key(|reference| reference.place);
        Self { references }
    }

    /// The name at a place, an offset directly behind it included.
    #[must_use]
    pub fn at(&self, file: FileId, offset: u32) -> Option<&Reference> {
        let from = self
            .references
            .partition_point(|reference| (reference.place.file, reference.place.span.end) < (file, offset));
        self.references[from..]
            .iter()
            .take_while(|reference| reference.place.file == file && reference.place.span.start <= offset)
            .find(|reference| reference.place.span.touches(offset))
    }

    /// Every place that stands for the same.
    pub fn of_target<'a>(&'a self, target: &'a Target) -> impl Iterator<Item = &'a Reference> {
        self.references.iter().filter(move |reference| reference.target == *target)
    }
}
