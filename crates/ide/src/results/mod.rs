//! What a panel beside the text shows: the drive under the cursor, its cases, for one case and station the curves with
//! every operating point, all numbers as a table, and the verdicts with their margins. Plain data; texts of the author's
//! have their control characters written out and are not harmless for HTML.

mod cursor;
mod picture;
#[cfg(test)]
mod tests;

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_mechanics::registry::{self, ResultRow, Role};
use layshaft_present::escape;
use layshaft_present::sheet::{self, CriterionLine, Entry};
use layshaft_semantics::analysis::{DriveCase, DriveRecord, Verdict};

use crate::Snapshot;

pub use picture::{Axis, Picture, Point};

/// What is asked for. Where a name is not found, or none is given, the cursor decides.
#[derive(Clone, Copy, Debug, Default)]
pub struct Query<'a> {
    /// The drive by its name.
    pub drive: Option<&'a str>,
    /// The case by its label: `corner[360 V]`.
    pub case: Option<&'a str>,
    /// The gear, where the spec gives none and all are solved.
    pub gear: Option<&'a str>,
    /// The part whose shaft the curves are drawn at.
    pub station: Option<&'a str>,
}

/// Everything the panel shows.
#[derive(Clone, Debug, PartialEq)]
pub struct Results {
    /// The name of the drive.
    pub drive: String,
    /// The place of that name.
    pub place: FileSpan,
    /// `motor -> gear -> fan`
    pub chain: String,
    /// Whether the cursor stands on something of this drive.
    pub under_cursor: bool,
    /// The names of all drives of the spec.
    pub drives: Vec<String>,
    /// Every case and gear.
    pub cases: Vec<Case>,
    /// Index of the chosen one.
    pub case: usize,
    /// The parts of the drive.
    pub stations: Vec<Station>,
    /// Index of the chosen one; none where the drive has no parts that could be read.
    pub station: Option<usize>,
    /// The curves at that station.
    pub chart: Option<Picture>,
    /// Why there are none.
    pub no_chart: Option<String>,
    /// Every result that has an answer, the drive's own first.
    pub parts: Vec<Part>,
    /// The criteria that ask about the drive.
    pub criteria: Vec<Criterion>,
}

/// A case of the drive.
#[derive(Clone, Debug, PartialEq)]
pub struct Case {
    /// `plain`, `corner[360 V]`; without the gear.
    pub label: String,
    /// The gear, where the spec gives none.
    pub gear: Option<String>,
    /// What the case changes: `motor.on = no`.
    pub changes: Vec<String>,
    /// What becomes of the drive from rest, in words.
    pub outcome: String,
    /// Whether that is what a drive is for.
    pub moves: bool,
    /// Its own speed at the reached point.
    pub speed: Entry,
    /// The worst verdict of its criteria here; none where nothing is asked.
    pub verdict: Option<Verdict>,
}

/// A part at whose shaft the curves can be drawn.
#[derive(Clone, Debug, PartialEq)]
pub struct Station {
    /// Its name.
    pub part: String,
    /// Its role.
    pub role: &'static str,
    /// Its kind.
    pub kind: &'static str,
}

/// Results of a part, or of the drive itself.
#[derive(Clone, Debug, PartialEq)]
pub struct Part {
    /// Its name; empty for the drive itself.
    pub name: String,
    /// `input` for results at the input of a part with two sides.
    pub port: Option<&'static str>,
    /// Its results.
    pub results: Vec<Row>,
}

/// One line of the table of numbers.
#[derive(Clone, Debug, PartialEq)]
pub struct Row {
    /// Its name: `holding_reserve`.
    pub name: &'static str,
    /// What it is, one line.
    pub meaning: &'static str,
    /// The answer.
    pub entry: Entry,
}

/// A criterion of the drive.
#[derive(Clone, Debug, PartialEq)]
pub struct Criterion {
    /// The place of its item.
    pub place: FileSpan,
    /// The criterion with the outcomes of the chosen case, and its governing one.
    pub line: CriterionLine,
    /// Indices in the outcomes of `line` that are of the chosen case and gear.
    pub here: Vec<usize>,
}

/// What a panel shows at a place of a text; none where the spec has no drive.
#[must_use]
pub fn results(snapshot: &Snapshot, file: FileId, offset: u32, query: Query<'_>) -> Option<Results> {
    let pointed = cursor::pointed(snapshot, file, offset);
    let drives = &snapshot.analysis.drives;
    let named = query.drive.and_then(|name| drives.iter().position(|drive| drive.name == name));
    let index = named.or(pointed.drive).or_else(|| (!drives.is_empty()).then_some(0))?;
    let record = drives.get(index)?;
    let chosen = chosen(snapshot, record, &pointed, query);
    let case = record.cases.get(chosen);
    let stations = case.map(stations).unwrap_or_default();
    let station = case.and_then(|case| station(case, &stations, &pointed, query));
    let (chart, no_chart) = match case {
        Some(case) => picture::picture(snapshot, case, station),
        None => (None, None),
    };
    Some(Results {
        drive: plain(&record.name),
        place: record.place,
        chain: plain(
            &record.cases.iter().map(sheet::chain).find(|chain| !chain.is_empty()).unwrap_or_default(),
        ),
        under_cursor: pointed.drive == Some(index),
        drives: drives.iter().map(|drive| plain(&drive.name)).collect(),
        cases: cases(snapshot, record),
        case: chosen,
        station,
        stations,
        chart,
        no_chart,
        parts: case.map(|case| parts(snapshot, case)).unwrap_or_default(),
        criteria: case.map(|case| criteria(snapshot, record.place, case)).unwrap_or_default(),
    })
}

/// The drive that a place is about, by name and the place of that name; the first where it is about none.
#[must_use]
pub fn drive_at(snapshot: &Snapshot, file: FileId, offset: u32) -> Option<(String, FileSpan)> {
    let drives = &snapshot.analysis.drives;
    let record = drives.get(cursor::pointed(snapshot, file, offset).drive.unwrap_or(0))?;
    Some((record.name.clone(), record.place))
}

/// The word of a verdict for programs: `holds`, `fails`, `not_judged`.
#[must_use]
pub const fn verdict_word(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Holds => "holds",
        Verdict::Fails => "fails",
        Verdict::NotJudged => "not_judged",
    }
}

/// A text of the author's without control characters.
fn plain(text: &str) -> String {
    escape::terminal(text).into_owned()
}

fn chosen(snapshot: &Snapshot, record: &DriveRecord, at: &cursor::Pointed, query: Query<'_>) -> usize {
    let label = |case: &DriveCase| snapshot.analysis.cases.get(case.case).map(|case| case.label.as_str());
    let gear = |case: &DriveCase| query.gear.is_none() || case.gear.as_deref() == query.gear;
    let named = query
        .case
        .and_then(|name| record.cases.iter().position(|case| label(case) == Some(name) && gear(case)));
    let pointed = || {
        let state = at.case?;
        record.cases.iter().position(|case| case.case == state && gear(case))
    };
    let plain = || record.cases.iter().position(|case| case.case == 0 && gear(case));
    named.or_else(pointed).or_else(plain).unwrap_or(0)
}

fn stations(case: &DriveCase) -> Vec<Station> {
    let parts = case.spec.as_deref().map_or(&[][..], |spec| spec.parts.as_slice());
    let station = |part: &layshaft_mechanics::drive::PartSpec| Station {
        part: plain(&part.name),
        role: sheet::role_word(part.row.role),
        kind: part.row.name,
    };
    parts.iter().map(station).collect()
}

/// The named part, else the one under the cursor, else the first source.
fn station(case: &DriveCase, stations: &[Station], at: &cursor::Pointed, query: Query<'_>) -> Option<usize> {
    let named = query.station.and_then(|name| stations.iter().position(|station| station.part == name));
    let in_chain =
        |at: &usize| case.solution.as_deref().is_none_or(|of| of.motion(Some(*at), None).is_some());
    let pointed =
        || at.part.and_then(|place| case.parts.iter().position(|known| *known == place)).filter(in_chain);
    let source = || stations.iter().position(|station| station.role == sheet::role_word(Role::Source));
    named.or_else(pointed).or_else(source).or_else(|| (!stations.is_empty()).then_some(0))
}

fn cases(snapshot: &Snapshot, record: &DriveRecord) -> Vec<Case> {
    let habits = snapshot.habits();
    let criteria = snapshot.criteria_of(record.place);
    let line = |case: &DriveCase| {
        let of = snapshot.analysis.cases.get(case.case);
        let told = case.solution.as_deref();
        let speed = told.map_or(Entry::None, |solution| {
            sheet::answer(solution.answer(None, None, "speed"), case, habits)
        });
        let unit = match &speed {
            Entry::Number(number) => number.unit.as_str(),
            _ => "",
        };
        let (outcome, moves) =
            told.map_or((String::from("not solved"), false), |solution| sheet::outcome(solution, unit));
        let verdicts = criteria.iter().filter_map(|at| snapshot.analysis.criteria.get(*at));
        let verdicts = verdicts.flat_map(|criterion| &criterion.outcomes);
        let here =
            verdicts.filter(|outcome| outcome.case == case.case && same_gear(&outcome.gear, &case.gear));
        Case {
            label: of.map_or_else(String::new, |of| plain(&of.label)),
            gear: case.gear.as_deref().map(plain),
            changes: of.map_or_else(Vec::new, |of| {
                of.overrides.iter().map(|(path, value)| plain(&format!("{path} = {value}"))).collect()
            }),
            outcome,
            moves,
            speed,
            verdict: here.map(|outcome| outcome.verdict).min(),
        }
    };
    record.cases.iter().map(line).collect()
}

/// Whether an outcome is of this gear; one without a gear is of all.
fn same_gear(outcome: &Option<String>, gear: &Option<String>) -> bool {
    outcome.is_none() || outcome == gear
}

fn parts(snapshot: &Snapshot, case: &DriveCase) -> Vec<Part> {
    let spec = case.spec.as_deref();
    let of = |part: sheet::PartResults| {
        let row =
            spec.and_then(|spec| spec.parts.iter().find(|known| known.name == part.part)).map(|of| of.row);
        let known: Vec<&'static ResultRow> = match row {
            Some(row) => registry::common_results(row.role).iter().chain(row.results).collect(),
            None => registry::DRIVE_RESULTS.iter().collect(),
        };
        let meaning = |name: &str| known.iter().find(|row| row.name == name).map_or("", |row| row.meaning);
        let line = |(name, entry): (&'static str, Entry)| Row { name, meaning: meaning(name), entry };
        Part {
            name: plain(&part.part),
            port: part.port,
            results: part.results.into_iter().map(line).collect(),
        }
    };
    sheet::results(case, snapshot.habits()).into_iter().map(of).collect()
}

fn criteria(snapshot: &Snapshot, drive: FileSpan, case: &DriveCase) -> Vec<Criterion> {
    let of = |index: &usize| {
        let record = snapshot.analysis.criteria.get(*index)?;
        let mut line = sheet::criterion(&snapshot.analysis, *index, snapshot.habits(), usize::MAX)?;
        line.clause = plain(&line.clause);
        line.condition = plain(&line.condition);
        let here = |at: &usize| {
            let outcome = &line.outcomes[*at];
            outcome.case == case.case && same_gear(&outcome.gear, &case.gear)
        };
        let here = (0..line.outcomes.len()).filter(here).collect();
        Some(Criterion { place: record.place, line, here })
    };
    snapshot.criteria_of(drive).iter().filter_map(of).collect()
}
