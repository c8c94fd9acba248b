//! The shape of `check/1`: fields are only ever added, never renamed, retyped or taken away.

use serde::Serialize;

/// The whole output of one run.
#[derive(Debug, Serialize)]
pub struct Document {
    /// `check/1`
    pub schema: &'static str,
    /// Who wrote it.
    pub tool: Tool,
    /// Every spec that was read, in the order of their paths.
    pub specs: Vec<Spec>,
    /// Files that could not be read.
    pub unread: Vec<Unread>,
}

/// Who wrote it.
#[derive(Debug, Serialize)]
pub struct Tool {
    /// `layshaft`
    pub name: &'static str,
    /// Its version.
    pub version: &'static str,
}

/// A file that could not be read.
#[derive(Debug, Serialize)]
pub struct Unread {
    /// Its path.
    pub path: String,
    /// Why.
    pub reason: String,
}

/// One spec.
#[derive(Debug, Serialize)]
pub struct Spec {
    pub path: String,
    pub title: Option<String>,
    pub revision: Option<String>,
    pub verdict: &'static str,
    pub errors: usize,
    pub warnings: usize,
    pub files: Vec<String>,
    pub findings: Vec<Finding>,
    pub values: Vec<NamedValue>,
    pub parts: Vec<Part>,
    pub cases: Vec<Case>,
    pub drives: Vec<Drive>,
    pub criteria: Vec<Criterion>,
    pub shows: Vec<Show>,
    pub assumptions: Vec<Assumption>,
    pub without_basis: Vec<String>,
    pub accepted: Vec<Accepted>,
    pub laws: Vec<Law>,
    pub cautions: Vec<&'static str>,
}

#[derive(Debug, Serialize)]
pub struct Place {
    pub file: String,
    pub line: u32,
    pub column: u32,
    pub end_line: u32,
    pub end_column: u32,
    pub start: u32,
    pub end: u32,
}

#[derive(Debug, Serialize)]
pub struct Label {
    pub place: Option<Place>,
    pub text: String,
}

#[derive(Debug, Serialize)]
pub struct Finding {
    pub code: &'static str,
    pub severity: &'static str,
    pub message: String,
    pub place: Option<Place>,
    pub label: String,
    pub related: Vec<Label>,
    pub notes: Vec<String>,
    pub help: Option<String>,
    pub fixes: Vec<Fix>,
}

#[derive(Debug, Serialize)]
pub struct Fix {
    pub title: String,
    pub edits: Vec<Edit>,
}

#[derive(Debug, Serialize)]
pub struct Edit {
    pub place: Option<Place>,
    pub text: String,
}

/// A value: `type` says which of the other fields are there; `shown` always is.
#[derive(Debug, Default, Serialize)]
pub struct Value {
    /// `number`, `flag`, `word`, `text`, `unbounded`, `absent`.
    #[serde(rename = "type")]
    pub kind_of: &'static str,
    /// As a reader sees it.
    pub shown: String,
    /// SI value.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub si: Option<f64>,
    /// Kind of quantity.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub kind: Option<&'static str>,
    /// The unit it is shown in; empty for a plain number.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub unit: Option<String>,
    /// The value in that unit.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub value: Option<f64>,
    /// Lower limit of a tolerance, SI.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub low_si: Option<f64>,
    /// Upper limit of a tolerance, SI.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub high_si: Option<f64>,
    /// Taken outside the range in which a curve was measured.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub outside_data: Option<bool>,
    /// From data taken at other conditions and scaled.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub scaled_data: Option<bool>,
    /// Yes or no.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub flag: Option<bool>,
    /// Why there is none.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub reason: Option<String>,
}

#[derive(Debug, Serialize)]
pub struct NamedValue {
    pub name: String,
    pub value: Option<Value>,
    pub basis: Option<Basis>,
}

#[derive(Debug, Serialize)]
pub struct Basis {
    pub word: &'static str,
    pub text: String,
}

#[derive(Debug, Serialize)]
pub struct Part {
    pub name: String,
    pub role: &'static str,
    pub kind: Option<&'static str>,
    pub fields: Vec<NamedValue>,
    pub given: Vec<NamedValue>,
}

#[derive(Debug, Serialize)]
pub struct Case {
    pub label: String,
    pub name: String,
    pub overrides: Vec<Override>,
}

#[derive(Debug, Serialize)]
pub struct Override {
    pub path: String,
    pub value: String,
}

#[derive(Debug, Serialize)]
pub struct Drive {
    pub name: String,
    pub chain: String,
    pub cases: Vec<DriveCase>,
}

#[derive(Debug, Serialize)]
pub struct DriveCase {
    pub case: String,
    pub gear: Option<String>,
    pub solved: bool,
    pub outcome: String,
    pub speed: Option<Value>,
    pub limited_by: Option<Value>,
    pub sources: Vec<Source>,
    pub operating_points: Vec<OperatingPoint>,
    pub results: Vec<Results>,
    pub faults: Vec<String>,
    pub governs: Vec<String>,
}

#[derive(Debug, Serialize)]
pub struct Source {
    pub part: String,
    pub count: u32,
    pub speed: Option<Value>,
    pub effort: Option<Value>,
    pub power: Option<Value>,
    pub peak_power: Option<Value>,
    pub power_share: Option<Value>,
    pub current: Option<Value>,
    pub mode: Option<Value>,
}

#[derive(Debug, Serialize)]
pub struct OperatingPoint {
    pub speed: Value,
    pub stability: &'static str,
    pub mode: &'static str,
    pub reached: bool,
}

#[derive(Debug, Serialize)]
pub struct Results {
    pub part: Option<String>,
    pub port: Option<&'static str>,
    pub results: Vec<NamedResult>,
}

#[derive(Debug, Serialize)]
pub struct NamedResult {
    pub name: &'static str,
    pub value: Value,
}

#[derive(Debug, Serialize)]
pub struct Criterion {
    pub clause: String,
    pub condition: String,
    pub required: String,
    pub verdict: &'static str,
    pub governing: Option<usize>,
    pub outcomes: Vec<Outcome>,
}

#[derive(Debug, Serialize)]
pub struct Outcome {
    pub case: String,
    pub gear: Option<String>,
    pub verdict: &'static str,
    pub found: Option<Value>,
    pub low: Option<Value>,
    pub high: Option<Value>,
    pub margin: Option<Margin>,
    pub remark: Option<String>,
}

#[derive(Debug, Serialize)]
pub struct Margin {
    pub value: f64,
    pub absolute: bool,
    pub shown: String,
}

#[derive(Debug, Serialize)]
pub struct Show {
    pub text: String,
    pub outcomes: Vec<ShowOutcome>,
}

#[derive(Debug, Serialize)]
pub struct ShowOutcome {
    pub case: String,
    pub gear: Option<String>,
    pub value: Option<Value>,
    pub remark: Option<String>,
}

#[derive(Debug, Serialize)]
pub struct Assumption {
    pub subject: String,
    pub value: Option<Value>,
    pub reason: String,
    pub by: &'static str,
}

#[derive(Debug, Serialize)]
pub struct Accepted {
    pub code: &'static str,
    pub message: String,
    pub because: String,
}

#[derive(Debug, Serialize)]
pub struct Law {
    pub kind: &'static str,
    pub name: &'static str,
    pub revision: u32,
}
