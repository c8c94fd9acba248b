//! What stands above a drive: where it runs, and how its criteria stand. The hover and the result table say it too.

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_present::escape;
use layshaft_present::sheet;
use layshaft_semantics::analysis::Verdict;

use crate::Snapshot;

/// What a lens is about.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LensKind {
    /// The operating point in the plain spec: leads to the result table.
    OperatingPoint,
    /// The criteria that ask about the drive.
    Verdicts,
}

/// A line above a drive.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Lens {
    /// The name of the drive.
    pub place: FileSpan,
    /// Plain text, control characters written out.
    pub text: String,
    /// What it is about.
    pub kind: LensKind,
}

/// The lenses of a file, in the order of the text.
#[must_use]
pub fn lenses(snapshot: &Snapshot, file: FileId) -> Vec<Lens> {
    let mut found = Vec::new();
    for (index, drive) in snapshot.analysis.drives.iter().enumerate() {
        if drive.place.file != file {
            continue;
        }
        let mut push = |text: Option<String>, kind| {
            if let Some(text) = text {
                found.push(Lens { place: drive.place, text: escape::terminal(&text).into_owned(), kind });
            }
        };
        push(point(snapshot, index), LensKind::OperatingPoint);
        push(verdicts(snapshot, drive.place), LensKind::Verdicts);
    }
    found
}

/// `14.90 m/min, runs up · motor 1447 rpm, 23.55 N·m, 3.569 kW, 36.9 % of peak`
fn point(snapshot: &Snapshot, index: usize) -> Option<String> {
    let sheet = sheet::drive(&snapshot.analysis, index, snapshot.habits(), 1)?;
    let row = sheet.rows.first().filter(|row| row.case == 0)?;
    if !row.solved {
        return Some("not solved".to_owned());
    }
    let mut parts: Vec<String> = Vec::new();
    let head = [row.speed.text(), &row.outcome];
    parts.push(head.into_iter().filter(|text| !text.is_empty()).collect::<Vec<_>>().join(", "));
    for source in &row.sources {
        let share = source.power_share.text();
        let share = if share.is_empty() { String::new() } else { format!("{share} of peak") };
        let told = [source.speed.text(), source.effort.text(), source.power.text(), &share];
        let told: Vec<&str> = told.into_iter().filter(|text| !text.is_empty()).collect();
        if !told.is_empty() {
            parts.push(format!("{} {}", source.part, told.join(", ")));
        }
    }
    Some(parts.join(" · "))
}

/// `6 criteria hold`, `2 of 7 criteria fail: T1-6, T1-7`
fn verdicts(snapshot: &Snapshot, drive: FileSpan) -> Option<String> {
    let criteria: Vec<_> = snapshot
        .criteria_of(drive)
        .iter()
        .filter_map(|index| snapshot.analysis.criteria.get(*index))
        .collect();
    let of = |verdict: Verdict| -> Vec<&str> {
        let those = criteria.iter().filter(|criterion| criterion.verdict == verdict);
        those.map(|criterion| criterion.clause.split(' ').next().unwrap_or("")).collect()
    };
    let (fails, unjudged) = (of(Verdict::Fails), of(Verdict::NotJudged));
    let all = criteria.len();
    let listed = |clauses: &[&str]| {
        let more = if clauses.len() > 4 { format!(" and {} more", clauses.len() - 4) } else { String::new() };
        format!("{}{more}", clauses.iter().take(4).copied().collect::<Vec<_>>().join(", "))
    };
    Some(match (all, fails.len(), unjudged.len()) {
        (0, ..) => return None,
        (1, 0, 0) => "its criterion holds".to_owned(),
        (_, 0, 0) => format!("{all} criteria hold"),
        (_, 0, n) => format!("{n} of {all} criteria not judged: {}", listed(&unjudged)),
        (_, n, 0) => format!("{n} of {all} criteria fail: {}", listed(&fails)),
        (_, n, m) => {
            format!("{n} of {all} criteria fail: {}; {m} not judged: {}", listed(&fails), listed(&unjudged))
        }
    })
}

#[cfg(test)]
mod tests {
    use super::lenses;
    use crate::fixture::Fixture;

    #[test]
    fn point_and_verdicts_above_each_drive() {
        let fixture = Fixture::new(
            "source m: straight_line { stall_torque = 10 N·m; no_load_speed = 3000 rpm }
load fan: quadratic { rated_torque = 5 N·m; rated_speed = 1500 rpm }
drive <|d|> = m -> fan
require \"R1 a\" d.speed >= 1000 rpm
require \"R2 b\" d.speed >= 2000 rpm
",
        );
        let found = lenses(&fixture.snapshot, fixture.file);
        let texts: Vec<&str> = found.iter().map(|lens| lens.text.as_str()).collect();
        assert_eq!(
            texts,
            ["1500 rpm, runs up · m 1500 rpm, 5.000 N·m, 785.4 W, 100 % of peak", "1 of 2 criteria fail: R2"]
        );
        assert!(found.iter().all(|lens| lens.place == fixture.ranges[0]));
    }
}
