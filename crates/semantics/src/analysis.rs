//! What an analysis holds: everything a renderer or an editor shows, and nothing that has to be computed again.

use std::sync::Arc;

use layshaft_diagnostics::{Diagnostic, FileId, FileSpan, LineIndex};
use layshaft_mechanics::drive::DriveSpec;
use layshaft_mechanics::fault::Fault;
use layshaft_mechanics::registry::{KindRow, Role};
use layshaft_mechanics::solve::Solution;

use crate::quantity::Datum;

/// A text of an analysis.
#[derive(Clone, Debug)]
pub struct SourceFile {
    /// Path relative to the root, `/` between names; `-` for standard input.
    pub path: String,
    /// The text.
    pub text: Arc<str>,
    /// Its lines.
    pub lines: Arc<LineIndex>,
    /// Its tree.
    pub tree: Arc<layshaft_syntax::File>,
}

/// The analysis of one spec and the files it uses.
#[derive(Clone, Debug, Default)]
pub struct Analysis {
    /// The spec itself first, then the files it uses.
    pub files: Vec<SourceFile>,
    /// `title "…"`
    pub title: Option<String>,
    /// `revision "…"`
    pub revision: Option<String>,
    /// Every finding that is not accepted, by file and place.
    pub diagnostics: Vec<Diagnostic>,
    /// Every `let` of the spec, in the order of the text.
    pub values: Vec<ValueRecord>,
    /// Every part of the spec and of the files it uses.
    pub parts: Vec<PartRecord>,
    /// `plain` first, then every case with its members, in the order of the text.
    pub cases: Vec<CaseRecord>,
    /// Every drive.
    pub drives: Vec<DriveRecord>,
    /// Every criterion.
    pub criteria: Vec<CriterionRecord>,
    /// Every `show`.
    pub shows: Vec<ShowRecord>,
    /// What the tool or the author assumed.
    pub assumptions: Vec<Assumption>,
    /// Names of values that say nothing of where they come from.
    pub without_basis: Vec<(String, FileSpan)>,
    /// Warnings accepted with a reason.
    pub accepted: Vec<Accepted>,
}

/// A value as written and as it came out.
#[derive(Clone, Debug)]
pub struct ValueRecord {
    /// Its name.
    pub name: String,
    /// The name's place.
    pub place: FileSpan,
    /// The value's place.
    pub value_place: FileSpan,
    /// The value in the plain spec; `None` where it could not be had (a finding says why).
    pub value: Option<Datum>,
    /// The basis: the word (`from`, `measured`, `assumed`) and its text.
    pub basis: Option<(&'static str, String)>,
    /// Its `##` lines.
    pub docs: Vec<String>,
}

/// A part.
#[derive(Clone, Debug)]
pub struct PartRecord {
    /// Its name, with the alias of its file before it where it is not of the spec itself.
    pub name: String,
    /// Its role.
    pub role: Role,
    /// Its row, where the kind is known.
    pub row: Option<&'static KindRow>,
    /// The name's place.
    pub place: FileSpan,
    /// Its fields as given, inherited ones included.
    pub fields: Vec<FieldRecord>,
    /// Results known from the fields alone: `rated_torque`.
    pub given: Vec<(&'static str, Datum)>,
    /// Its `##` lines.
    pub docs: Vec<String>,
}

/// A field of a part.
#[derive(Clone, Debug)]
pub struct FieldRecord {
    /// Its name.
    pub name: String,
    /// The key's place.
    pub place: FileSpan,
    /// The value's place.
    pub value_place: FileSpan,
    /// The value where it is a single one.
    pub value: Option<Datum>,
    /// The basis.
    pub basis: Option<(&'static str, String)>,
}

/// A case, one for each combination of `each`.
#[derive(Clone, Debug)]
pub struct CaseRecord {
    /// `plain`, `hill`, `corner[360 V, reverse]`.
    pub label: String,
    /// The declared name without members.
    pub name: String,
    /// Where it is declared; the whole spec for `plain`.
    pub place: FileSpan,
    /// What it changes: path and value as text.
    pub overrides: Vec<(String, String)>,
    /// The same with places and values.
    pub changes: Vec<Change>,
}

/// What a case lays over one value, field or setting.
#[derive(Clone, Debug)]
pub struct Change {
    /// The place of the name of the value, part or drive.
    pub owner: FileSpan,
    /// The field or setting; none for a `let`.
    pub field: Option<String>,
    /// The key's place.
    pub place: FileSpan,
    /// The value's place.
    pub value_place: FileSpan,
    /// What it comes to, where it is a single value.
    pub value: Option<Datum>,
}

/// A drive with its solution in every case.
#[derive(Clone, Debug)]
pub struct DriveRecord {
    /// Its name.
    pub name: String,
    /// The name's place.
    pub place: FileSpan,
    /// One for each case of [`Analysis::cases`], in that order (more than one for a case where no gear is given).
    pub cases: Vec<DriveCase>,
    /// Its `##` lines.
    pub docs: Vec<String>,
}

/// A drive in one case.
#[derive(Clone, Debug)]
pub struct DriveCase {
    /// Index in [`Analysis::cases`].
    pub case: usize,
    /// The gear, where the spec gives none and all are solved.
    pub gear: Option<String>,
    /// What the solver was asked; `None` where the spec has errors that stand in the way.
    pub spec: Option<Arc<DriveSpec>>,
    /// What it answered.
    pub solution: Option<Arc<Solution>>,
    /// Why it could not answer.
    pub faults: Vec<Fault>,
    /// The place of the name of each part of `spec`, in its order.
    pub parts: Vec<FileSpan>,
}

/// What became of a criterion.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Verdict {
    /// It does not hold.
    Fails,
    /// It could not be judged.
    NotJudged,
    /// It holds.
    Holds,
}

/// A criterion.
#[derive(Clone, Debug)]
pub struct CriterionRecord {
    /// Its clause: `H3-1 hook speed`.
    pub clause: String,
    /// Its condition as written.
    pub condition: String,
    /// The item's place.
    pub place: FileSpan,
    /// The condition's place.
    pub condition_place: FileSpan,
    /// One for each case in which it is asked.
    pub outcomes: Vec<CriterionOutcome>,
    /// The outcome that decides: the first failing with the smallest margin, else one not judged, else the smallest margin.
    pub governing: Option<usize>,
    /// The verdict over all cases; not judged when asked nowhere.
    pub verdict: Verdict,
}

/// A criterion in one case.
#[derive(Clone, Debug)]
pub struct CriterionOutcome {
    /// Index in [`Analysis::cases`].
    pub case: usize,
    /// The gear, where the spec gives none.
    pub gear: Option<String>,
    /// Holds, fails, not judged.
    pub verdict: Verdict,
    /// Value found and limits asked for, of the comparison that decides.
    pub measure: Option<Measure>,
    /// Why it is not judged, or a place or mark worth saying beside the value.
    pub remark: Option<String>,
}

/// Found and required.
#[derive(Clone, Debug)]
pub struct Measure {
    /// The value found.
    pub found: Datum,
    /// The lower limit.
    pub low: Option<Datum>,
    /// The upper limit.
    pub high: Option<Datum>,
    /// (limit − value)/|limit|, mirrored for a lower limit, the smaller side if two-sided; a ratio. For levels and a
    /// limit of 0 the difference in SI, see `absolute`.
    pub margin: f64,
    /// Whether `margin` is a difference (in the value's SI unit) and not a ratio.
    pub absolute: bool,
}

/// A result the author asked to see.
#[derive(Clone, Debug)]
pub struct ShowRecord {
    /// The expression as written.
    pub text: String,
    /// The item's place.
    pub place: FileSpan,
    /// One for each case.
    pub outcomes: Vec<ShowOutcome>,
}

/// A shown result in one case.
#[derive(Clone, Debug)]
pub struct ShowOutcome {
    /// Index in [`Analysis::cases`].
    pub case: usize,
    /// The gear, where the spec gives none.
    pub gear: Option<String>,
    /// The value, in the unit asked for.
    pub value: Option<Datum>,
    /// Why there is none, or a mark.
    pub remark: Option<String>,
}

/// Something taken without proof.
#[derive(Clone, Debug)]
pub struct Assumption {
    /// Of what: `motor.winding_temperature`.
    pub subject: String,
    /// The value.
    pub value: Option<Datum>,
    /// Why, in the author's words or the registry's.
    pub reason: String,
    /// Whether the tool took it (a default of the registry) or the author (`assumed "…"`).
    pub by_tool: bool,
    /// Where, if it is written.
    pub place: Option<FileSpan>,
}

/// A warning accepted with `allow`.
#[derive(Clone, Debug)]
pub struct Accepted {
    /// The warning.
    pub diagnostic: Diagnostic,
    /// The reason given.
    pub because: String,
    /// The place of the `allow`.
    pub place: FileSpan,
}

impl Analysis {
    /// A file of the analysis.
    #[must_use]
    pub fn file(&self, id: FileId) -> Option<&SourceFile> {
        self.files.get(id.0 as usize)
    }

    /// The verdict over all criteria: fails before not judged before holds; `None` without criteria.
    #[must_use]
    pub fn verdict(&self) -> Option<Verdict> {
        self.criteria.iter().map(|criterion| criterion.verdict).min()
    }

    /// Whether any finding is an error.
    #[must_use]
    pub fn has_errors(&self) -> bool {
        use layshaft_diagnostics::Severity;
        self.diagnostics.iter().any(|finding| finding.severity == Severity::Error)
    }
}
