//! What a change of the text does to the results, by comparison of two analyses.

use layshaft_diagnostics::{Code, Diagnostic, Severity};
use layshaft_present::escape;
use layshaft_present::number::{decimals, shortened};
use layshaft_present::sheet::{self, Entry};
use layshaft_present::shown::{Shown, shown};
use layshaft_semantics::Analysis;
use layshaft_semantics::analysis::{CriterionRecord, DriveCase, DriveRecord, Measure, ShowRecord, Verdict};
use layshaft_semantics::quantity::Datum;

use crate::Snapshot;
use crate::numbers::plain;

/// Parts of an effect that are told; the rest is counted.
const MOST: usize = 3;

/// What a change does.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Effect {
    /// Whether every value and result of before is there after, equal to the bit.
    pub unchanged: bool,
    /// Whether nothing is found that was not found before.
    pub nothing_new: bool,
    /// In words: `value unchanged`, `W2-1 fails, lift.speed 14.9 -> 15.2 m/min`.
    pub words: String,
}

/// The effect of a change, from the analysis of the changed text.
#[must_use]
pub fn effect(before: &Snapshot, after: &Analysis) -> Effect {
    let new = new_findings(&before.analysis, after);
    let unchanged = same_results(&before.analysis, after);
    let nothing_new = new.is_empty();
    let mut told: Vec<String> = new.iter().map(|code| format!("new finding: {}", code.row().word)).collect();
    let errors =
        |of: &Analysis| of.diagnostics.iter().filter(|found| found.severity == Severity::Error).count();
    let (had, left) = (errors(&before.analysis), errors(after));
    if unchanged {
        if told.is_empty() {
            told.push(match (had, left) {
                (1.., 0) => String::from("no error left"),
                _ => String::from("value unchanged"),
            });
        }
        return Effect { unchanged, nothing_new, words: listed(&told) };
    }
    told.extend(verdicts(&before.analysis, after));
    told.extend(drives(before, after));
    if told.is_empty() {
        told.extend(values(&before.analysis, after));
    }
    if left > 0 && left < had {
        told.push(format!("{left} of {had} errors left"));
    }
    if told.is_empty() {
        told.push(if left == 0 && had > 0 { "no error left" } else { "results change" }.to_owned());
    }
    Effect { unchanged, nothing_new, words: listed(&told) }
}

fn listed(told: &[String]) -> String {
    let mut words = told.iter().take(MOST).cloned().collect::<Vec<_>>().join(", ");
    if told.len() > MOST {
        words.push_str(&format!(" and {} more", told.len() - MOST));
    }
    escape::terminal(&words).into_owned()
}

/// Codes of which more findings are there than before.
fn new_findings(before: &Analysis, after: &Analysis) -> Vec<Code> {
    let count = |all: &[Diagnostic], code: Code| all.iter().filter(|found| found.code == code).count();
    let mut new: Vec<Code> = after.diagnostics.iter().map(|found| found.code).collect();
    new.sort_unstable();
    new.dedup();
    new.retain(|code| count(&after.diagnostics, *code) > count(&before.diagnostics, *code));
    new
}

/// Criteria whose verdict is another.
fn verdicts(before: &Analysis, after: &Analysis) -> Vec<String> {
    let other = |(old, new): (&CriterionRecord, &CriterionRecord)| {
        let name = new.clause.split(' ').next().unwrap_or("").to_owned();
        (old.clause == new.clause && old.verdict != new.verdict).then(|| match new.verdict {
            Verdict::Fails => format!("{name} fails"),
            Verdict::Holds => format!("{name} holds"),
            Verdict::NotJudged => format!("{name} is not judged"),
        })
    };
    let mut told: Vec<String> = before.criteria.iter().zip(&after.criteria).filter_map(other).collect();
    // What fails comes first.
    told.sort_by_key(|words| !words.ends_with("fails"));
    told
}

/// Drives whose own speed, else whose source's effort, is another in the plain spec.
fn drives(before: &Snapshot, after: &Analysis) -> Vec<String> {
    let one = |(old, new): (&DriveRecord, &DriveRecord)| {
        if old.name != new.name {
            return None;
        }
        let (old, new) = (plain(old)?, (new.name.as_str(), plain(new)?));
        moved(before, (old, new.1), new.0)
    };
    before.analysis.drives.iter().zip(&after.drives).filter_map(one).collect()
}

fn moved(before: &Snapshot, (old, new): (&DriveCase, &DriveCase), name: &str) -> Option<String> {
    if old.spec == new.spec && old.solution.is_some() == new.solution.is_some() {
        return None;
    }
    let entry = |case: &DriveCase, part: Option<usize>, result: &str| {
        let answer = case.solution.as_deref().map(|solution| solution.answer(part, None, result));
        answer.map_or(Entry::None, |answer| sheet::answer(answer, case, before.habits()))
    };
    let parts = new.spec.as_deref().map_or(&[][..], |spec| spec.parts.as_slice());
    let source = parts.iter().position(|part| part.row.role == layshaft_mechanics::registry::Role::Source);
    let mut asked: Vec<(String, Option<usize>, &str)> = vec![(format!("{name}.speed"), None, "speed")];
    if let Some(at) = source {
        for result in ["torque", "force", "power"] {
            asked.push((format!("{name}.{}.{result}", parts[at].name), Some(at), result));
        }
    }
    let told = |(label, part, result): &(String, Option<usize>, &str)| {
        step(label, &entry(old, *part, result), &entry(new, *part, result))
    };
    asked.iter().find_map(told)
}

/// `lift.speed 14.9 -> 15.2 m/min`; none where it is the same.
fn step(label: &str, old: &Entry, new: &Entry) -> Option<String> {
    match (old, new) {
        (Entry::Number(old), Entry::Number(new)) if old.si.to_bits() == new.si.to_bits() => None,
        (Entry::Number(old), Entry::Number(new)) if old.unit == new.unit && old.digits != new.digits => {
            let unit = if new.unit.is_empty() { String::new() } else { format!(" {}", new.unit) };
            Some(format!("{label} {} -> {}{unit}", shortened(&old.digits), shortened(&new.digits)))
        }
        (Entry::Number(old), Entry::Number(new)) if old.text != new.text => {
            Some(format!("{label} {} -> {}", old.text, new.text))
        }
        (Entry::Number(old), Entry::Number(new)) if old.si != 0.0 => {
            Some(format!("{label} by {} %", small(100.0 * (new.si / old.si - 1.0))))
        }
        (_, Entry::Number(new)) => Some(format!("{label} {}", new.text)),
        (Entry::Number(old), _) => Some(format!("{label} {} is lost", old.text)),
        _ => None,
    }
}

/// A share too small to be seen in the digits of a result.
fn small(percent: f64) -> String {
    if percent.abs() >= 0.001 { decimals(percent, 3) } else { format!("{percent:.0e}") }
}

/// Values and fields that come out otherwise.
fn values(before: &Analysis, after: &Analysis) -> Vec<String> {
    let differs = |name: &str, old: Option<&Datum>, new: Option<&Datum>| {
        if same(old, new) {
            return None;
        }
        let (old, new) = (old.map(shown), new.map(shown));
        Some(match (old, new) {
            (Some(old), Some(new)) if alike(&old, &new) => return None,
            (Some(old), Some(new)) => format!("{name} {} -> {}", old.text(), new.text()),
            (None, Some(new)) => format!("{name} {}", new.text()),
            (Some(_), None) => format!("{name} has no value"),
            (None, None) => return None,
        })
    };
    let lets = before.values.iter().filter_map(|old| {
        let new = after.values.iter().find(|new| new.name == old.name)?;
        differs(&old.name, old.value.as_ref(), new.value.as_ref())
    });
    let fields =
        before.parts.iter().filter_map(|old| Some((old, after.parts.iter().find(|p| p.name == old.name)?)));
    let fields = fields.flat_map(|(old, new)| {
        old.fields.iter().filter_map(|field| {
            let other = new.fields.iter().find(|other| other.name == field.name)?;
            let name = format!("{}.{}", old.name, field.name);
            differs(&name, field.value.as_ref(), other.value.as_ref())
        })
    });
    lets.chain(fields).collect()
}

/// Whether two values differ in no digit that is shown.
fn alike(old: &Shown, new: &Shown) -> bool {
    match (old, new) {
        (Shown::Number(old), Shown::Number(new)) => {
            old.unit == new.unit && shortened(&old.digits) == shortened(&new.digits)
        }
        (old, new) => old == new,
    }
}

/// Whether every value and result of `before` is in `after`, equal to the bit. What is new in `after` does not count.
#[must_use]
pub fn same_results(before: &Analysis, after: &Analysis) -> bool {
    let lets = before.values.iter().all(|old| {
        let new = after.values.iter().find(|new| new.name == old.name);
        new.is_some_and(|new| same(old.value.as_ref(), new.value.as_ref()))
    });
    let parts = before.parts.iter().all(|old| {
        let Some(new) = after.parts.iter().find(|new| new.name == old.name) else { return false };
        old.fields.len() == new.fields.len()
            && old.fields.iter().all(|field| {
                let other = new.fields.iter().find(|other| other.name == field.name);
                other.is_some_and(|other| same(field.value.as_ref(), other.value.as_ref()))
            })
            && old.given.len() == new.given.len()
            && old.given.iter().zip(&new.given).all(|(a, b)| a.0 == b.0 && same(Some(&a.1), Some(&b.1)))
    });
    lets && parts
        && before.cases.len() == after.cases.len()
        && before.cases.iter().zip(&after.cases).all(|(old, new)| old.label == new.label)
        && all(&before.drives, &after.drives, same_drive)
        && all(&before.criteria, &after.criteria, same_criterion)
        && all(&before.shows, &after.shows, same_show)
}

fn all<T>(before: &[T], after: &[T], same: impl Fn(&T, &T) -> bool) -> bool {
    before.len() == after.len() && before.iter().zip(after).all(|(old, new)| same(old, new))
}

/// The same question has the same answer, to the bit.
fn same_drive(old: &DriveRecord, new: &DriveRecord) -> bool {
    let case = |old: &DriveCase, new: &DriveCase| {
        old.gear == new.gear && old.spec == new.spec && old.solution.is_some() == new.solution.is_some()
    };
    old.name == new.name && all(&old.cases, &new.cases, case)
}

fn same_criterion(old: &CriterionRecord, new: &CriterionRecord) -> bool {
    let measure = |old: &Measure, new: &Measure| {
        same(Some(&old.found), Some(&new.found))
            && same(old.low.as_ref(), new.low.as_ref())
            && same(old.high.as_ref(), new.high.as_ref())
            && old.margin.to_bits() == new.margin.to_bits()
    };
    old.clause == new.clause
        && old.verdict == new.verdict
        && old.governing == new.governing
        && all(&old.outcomes, &new.outcomes, |old, new| {
            old.verdict == new.verdict
                && match (&old.measure, &new.measure) {
                    (Some(old), Some(new)) => measure(old, new),
                    (None, None) => true,
                    _ => false,
                }
        })
}

fn same_show(old: &ShowRecord, new: &ShowRecord) -> bool {
    all(&old.outcomes, &new.outcomes, |old, new| same(old.value.as_ref(), new.value.as_ref()))
}

/// Whether two values are equal to the bit, whatever unit they were written in.
fn same(old: Option<&Datum>, new: Option<&Datum>) -> bool {
    match (old, new) {
        (Some(Datum::Quantity(old)), Some(Datum::Quantity(new))) => {
            let bits = |limits: Option<(f64, f64)>| limits.map(|(low, high)| (low.to_bits(), high.to_bits()));
            old.si.to_bits() == new.si.to_bits() && bits(old.limits) == bits(new.limits) && old.ty == new.ty
        }
        (old, new) => old == new,
    }
}
