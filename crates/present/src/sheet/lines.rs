//! The lines of a sheet, as plain data.

use layshaft_semantics::analysis::Verdict;

use crate::shown::{Number, Shown};

/// The sheet of one spec.
#[derive(Clone, Debug, PartialEq, Default)]
pub struct Sheet {
    /// `title "…"`
    pub title: Option<String>,
    /// `revision "…"`
    pub revision: Option<String>,
    /// Every case, `plain` first.
    pub cases: Vec<CaseLine>,
    /// Every drive.
    pub drives: Vec<DriveSheet>,
    /// Every criterion.
    pub criteria: Vec<CriterionLine>,
    /// Every `show`.
    pub shows: Vec<ShowLine>,
    /// Every `let`.
    pub values: Vec<ValueLine>,
    /// Every part.
    pub parts: Vec<PartLine>,
    /// What the tool or the author assumed.
    pub assumptions: Vec<AssumptionLine>,
    /// Names of values that say nothing of where they come from.
    pub without_basis: Vec<String>,
    /// Warnings accepted with a reason.
    pub accepted: Vec<AcceptedLine>,
    /// Laws behind the results, with their revision.
    pub laws: Vec<LawLine>,
    /// What a reader must mind where a drive can hurt someone.
    pub cautions: Vec<&'static str>,
    /// The verdict over all criteria; none without criteria.
    pub verdict: Option<Verdict>,
}

/// A case.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct CaseLine {
    /// `corner[360 V, reverse]`
    pub label: String,
    /// The declared name.
    pub name: String,
    /// What it changes: path and value as text.
    pub overrides: Vec<(String, String)>,
}

/// A drive.
#[derive(Clone, Debug, PartialEq)]
pub struct DriveSheet {
    /// Its name.
    pub name: String,
    /// `motor -> gear -> fan`
    pub chain: String,
    /// Its `##` lines.
    pub docs: Vec<String>,
    /// The units of the columns, by what stands in them.
    pub units: DriveUnits,
    /// One for each case and gear.
    pub rows: Vec<DriveRow>,
}

/// The units of a drive's table.
#[derive(Clone, Debug, PartialEq, Eq, Default)]
pub struct DriveUnits {
    /// The drive's own speed, that of its load.
    pub speed: String,
    /// Speed of the sources.
    pub source_speed: String,
    /// Torque or force of the sources.
    pub effort: String,
    /// Power of the sources.
    pub power: String,
    /// Current of the sources.
    pub current: String,
}

/// A drive in one case and gear.
#[derive(Clone, Debug, PartialEq)]
pub struct DriveRow {
    /// Index in [`Sheet::cases`].
    pub case: usize,
    /// Label of the case.
    pub label: String,
    /// The gear, where the spec gives none and all are solved.
    pub gear: Option<String>,
    /// Whether the solver had an answer.
    pub solved: bool,
    /// What becomes of the drive from rest, in words: `runs up`, `stalls`.
    pub outcome: String,
    /// Whether that is what a drive is for.
    pub moves: bool,
    /// The drive's own speed at the reached point.
    pub speed: Entry,
    /// What bounds the drive there: `torque`, `current`, `supply`, `governor`, `braking`.
    pub limited_by: Entry,
    /// Each source.
    pub sources: Vec<SourceRow>,
    /// All operating points, slowest first.
    pub points: Vec<PointRow>,
    /// Every result that has an answer, part by part, the drive itself first (empty name).
    pub results: Vec<PartResults>,
    /// Why the drive could not be solved.
    pub faults: Vec<String>,
    /// Names of criteria for which this row is the governing case.
    pub governs: Vec<String>,
}

/// A source in a row.
#[derive(Clone, Debug, PartialEq)]
pub struct SourceRow {
    /// Its name.
    pub part: String,
    /// How many equal ones run side by side.
    pub count: u32,
    /// Its speed.
    pub speed: Entry,
    /// Torque or force of one.
    pub effort: Entry,
    /// Power of one.
    pub power: Entry,
    /// The most power one can give along its curve.
    pub peak_power: Entry,
    /// Power over that.
    pub power_share: Entry,
    /// Current of one.
    pub current: Entry,
    /// `motoring`, `braking` …
    pub mode: Entry,
}

/// An operating point.
#[derive(Clone, Debug, PartialEq)]
pub struct PointRow {
    /// The drive's own speed there.
    pub speed: Number,
    /// `stable`, `unstable`, `marginal`
    pub stability: &'static str,
    /// `motoring`, `braking` …
    pub mode: &'static str,
    /// Whether it is the one reached from rest.
    pub reached: bool,
}

/// Results of a part in one case.
#[derive(Clone, Debug, PartialEq)]
pub struct PartResults {
    /// The part; empty for the drive itself.
    pub part: String,
    /// `input` for results at the input of a part with two sides; none at its usual side, which is its output.
    pub port: Option<&'static str>,
    /// Name and answer.
    pub results: Vec<(&'static str, Entry)>,
}

/// An answer of the solver.
#[derive(Clone, Debug, PartialEq)]
pub enum Entry {
    /// A number, with its marks.
    Number(Box<Number>),
    /// Yes or no.
    Flag(bool),
    /// A word.
    Word(&'static str),
    /// It grows above every limit: why.
    Unbounded(String),
    /// There is none here: why.
    Absent(String),
    /// No such result.
    None,
}

impl Entry {
    /// The number alone, or the word; empty where there is none.
    #[must_use]
    pub fn digits(&self) -> &str {
        match self {
            Self::Number(number) => &number.digits,
            Self::Flag(flag) => crate::shown::yes_or_no(*flag),
            Self::Word(word) => word,
            Self::Unbounded(_) => "unbounded",
            Self::Absent(_) | Self::None => "",
        }
    }

    /// The number with its unit, or the word.
    #[must_use]
    pub fn text(&self) -> &str {
        match self {
            Self::Number(number) => &number.text,
            other => other.digits(),
        }
    }
}

/// A criterion.
#[derive(Clone, Debug, PartialEq)]
pub struct CriterionLine {
    /// Its clause.
    pub clause: String,
    /// Its condition as written.
    pub condition: String,
    /// `14 m/min .. 17 m/min`, `at most 40 mm`; the condition where nothing is measured.
    pub required: String,
    /// The verdict over all cases.
    pub verdict: Verdict,
    /// Index of the governing outcome in `outcomes`.
    pub governing: Option<usize>,
    /// One for each case in which it is asked.
    pub outcomes: Vec<OutcomeLine>,
    /// How many outcomes fail.
    pub failing: usize,
    /// How many are not judged.
    pub unjudged: usize,
}

/// A criterion in one case.
#[derive(Clone, Debug, PartialEq)]
pub struct OutcomeLine {
    /// Index in [`Sheet::cases`].
    pub case: usize,
    /// Label of the case, with the gear where the spec gives none.
    pub label: String,
    /// The gear, where the spec gives none.
    pub gear: Option<String>,
    /// Holds, fails, not judged.
    pub verdict: Verdict,
    /// The value found, with digits enough to tell it from the limit.
    pub found: Option<Shown>,
    /// The lower limit.
    pub low: Option<Shown>,
    /// The upper limit.
    pub high: Option<Shown>,
    /// The margin.
    pub margin: Option<Margin>,
    /// A remark, or why it is not judged.
    pub remark: Option<String>,
}

/// A margin.
#[derive(Clone, Debug, PartialEq)]
pub struct Margin {
    /// A ratio, or a difference in the SI unit of the value.
    pub value: f64,
    /// Whether it is a difference.
    pub absolute: bool,
    /// `6.43 %`, `-12 K`
    pub text: String,
}

/// A `show`.
#[derive(Clone, Debug, PartialEq)]
pub struct ShowLine {
    /// The expression as written.
    pub text: String,
    /// One for each case.
    pub outcomes: Vec<ShowOutcomeLine>,
}

/// A shown result in one case.
#[derive(Clone, Debug, PartialEq)]
pub struct ShowOutcomeLine {
    /// Index in [`Sheet::cases`].
    pub case: usize,
    /// Label of the case, with the gear where the spec gives none.
    pub label: String,
    /// The gear, where the spec gives none.
    pub gear: Option<String>,
    /// The value.
    pub value: Option<Shown>,
    /// Why there is none, or a mark.
    pub remark: Option<String>,
}

/// A `let`.
#[derive(Clone, Debug, PartialEq)]
pub struct ValueLine {
    /// Its name.
    pub name: String,
    /// Its value in the plain spec.
    pub value: Option<Shown>,
    /// Word and text of its basis.
    pub basis: Option<(&'static str, String)>,
}

/// A part.
#[derive(Clone, Debug, PartialEq)]
pub struct PartLine {
    /// Its name.
    pub name: String,
    /// `source`
    pub role: &'static str,
    /// `dc_motor`; none where no such kind exists.
    pub kind: Option<&'static str>,
    /// Its fields as given.
    pub fields: Vec<ValueLine>,
    /// Results known from the fields alone.
    pub given: Vec<(&'static str, Shown)>,
}

/// Something taken without proof.
#[derive(Clone, Debug, PartialEq)]
pub struct AssumptionLine {
    /// Of what.
    pub subject: String,
    /// The value.
    pub value: Option<Shown>,
    /// Why.
    pub reason: String,
    /// Whether the tool took it.
    pub by_tool: bool,
}

/// A warning accepted with `allow`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct AcceptedLine {
    /// The code.
    pub code: &'static str,
    /// Its message.
    pub message: String,
    /// The reason given.
    pub because: String,
}

/// A law behind the results.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct LawLine {
    /// The kind whose law it is.
    pub kind: &'static str,
    /// What it gives.
    pub name: &'static str,
    /// Its revision.
    pub revision: u32,
}
