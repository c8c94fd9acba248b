//! Drives: in every case what becomes of them from rest, where they run, what their sources give there.

use layshaft_mechanics::drive::{Chain, DriveSpec, Port};
use layshaft_mechanics::fault::Fault;
use layshaft_mechanics::registry::{self, ResultRow, Role};
use layshaft_mechanics::solution::Answer;
use layshaft_mechanics::solve::Solution;
use layshaft_semantics::Analysis;
use layshaft_semantics::analysis::{DriveCase, DriveRecord};

use super::{CriterionLine, Detail, DriveRow, DriveSheet, DriveUnits, Entry, PartResults, SourceRow, label};
use crate::note;
use crate::number::DIGITS;
use crate::shown::Number;
use crate::unit::Habits;

pub(super) fn drives(
    analysis: &Analysis,
    criteria: &[CriterionLine],
    habits: &Habits,
    detail: Detail,
) -> Vec<DriveSheet> {
    analysis.drives.iter().map(|drive| sheet_of(analysis, drive, criteria, habits, detail)).collect()
}

/// The sheet of one drive.
pub(super) fn sheet_of(
    analysis: &Analysis,
    drive: &DriveRecord,
    criteria: &[CriterionLine],
    habits: &Habits,
    detail: Detail,
) -> DriveSheet {
    let units = units(drive, habits);
    let row = |case: &DriveCase| {
        let mut row = Row { case, units: &units, habits, detail }.build();
        row.label = label(analysis, case.case, case.gear.as_deref());
        row.governs = governs(criteria, case);
        row
    };
    DriveSheet {
        name: drive.name.clone(),
        chain: drive.cases.iter().find_map(|case| case.spec.as_deref()).map_or_else(String::new, chain_text),
        docs: drive.docs.clone(),
        rows: drive.cases.iter().map(row).collect(),
        units,
    }
}

/// Clauses whose governing outcome is this case; the beginning up to the first blank is enough to know them.
fn governs(criteria: &[CriterionLine], case: &DriveCase) -> Vec<String> {
    let here = |criterion: &&CriterionLine| {
        let outcome = criterion.governing.and_then(|at| criterion.outcomes.get(at));
        outcome.is_some_and(|outcome| outcome.case == case.case && outcome.gear == case.gear)
    };
    criteria.iter().filter(here).map(|criterion| criterion.clause.clone()).collect()
}

/// `2 * motor -> gear`, with brackets only where they are needed.
fn chain_text(spec: &DriveSpec) -> String {
    fn write(chain: &Chain, spec: &DriveSpec, inside: bool, out: &mut String) {
        match chain {
            Chain::Part { index, count } => {
                if *count > 1 {
                    out.push_str(&format!("{count} * "));
                }
                out.push_str(spec.parts.get(*index).map_or("?", |part| part.name.as_str()));
            }
            Chain::Series(parts) => {
                let brackets = inside && parts.len() > 1;
                out.push_str(if brackets { "(" } else { "" });
                join(parts, " -> ", spec, out);
                out.push_str(if brackets { ")" } else { "" });
            }
            Chain::Joined(parts) => join(parts, " + ", spec, out),
        }
    }
    fn join(parts: &[Chain], sign: &str, spec: &DriveSpec, out: &mut String) {
        for (at, part) in parts.iter().enumerate() {
            out.push_str(if at > 0 { sign } else { "" });
            write(part, spec, sign == " + ", out);
        }
    }
    let mut out = String::new();
    write(&spec.chain, spec, false, &mut out);
    out
}

/// How many equal parts stand side by side at each place.
fn counts(chain: &Chain, found: &mut Vec<(usize, u32)>) {
    match chain {
        Chain::Part { index, count } => found.push((*index, *count)),
        Chain::Series(parts) | Chain::Joined(parts) => parts.iter().for_each(|part| counts(part, found)),
    }
}

/// Indices of the sources of a drive.
fn sources(spec: &DriveSpec) -> impl Iterator<Item = usize> {
    spec.parts.iter().enumerate().filter(|(_, part)| part.row.role == Role::Source).map(|(at, _)| at)
}

/// One unit a column, chosen by its largest number.
fn units(drive: &DriveRecord, habits: &Habits) -> DriveUnits {
    let solved =
        || drive.cases.iter().filter_map(|case| Some((case.spec.as_deref()?, case.solution.as_deref()?)));
    let unit = |answers: Vec<Answer>| {
        let mut kind = None;
        let mut values = Vec::new();
        for answer in answers {
            if let Answer::Quantity { si, kind: of, .. } = answer {
                kind = kind.or(Some(of));
                values.push(si);
            }
        }
        kind.map(|kind| habits.unit(kind, values)).unwrap_or_default()
    };
    let of_drive = |name: &str| solved().map(|(_, solution)| solution.answer(None, None, name)).collect();
    let of_sources = |names: &[&str]| {
        let answers = solved().flat_map(|(spec, solution)| {
            sources(spec).map(move |at| first(solution, Some(at), names)).collect::<Vec<_>>()
        });
        answers.collect()
    };
    DriveUnits {
        speed: unit(of_drive("speed")),
        source_speed: unit(of_sources(&["speed"])),
        effort: unit(of_sources(EFFORT)),
        power: unit([of_sources(&["power"]), of_sources(&["peak_power"])].concat()),
        current: unit(of_sources(&["current"])),
    }
}

/// Torque on rotary, force on linear motion.
const EFFORT: &[&str] = &["torque", "force"];

/// The first of these results that the part has.
fn first(solution: &Solution, part: Option<usize>, names: &[&str]) -> Answer {
    let mut answers = names.iter().map(|name| solution.answer(part, None, name));
    answers.find(|answer| *answer != Answer::NoSuch).unwrap_or(Answer::NoSuch)
}

struct Row<'a> {
    case: &'a DriveCase,
    units: &'a DriveUnits,
    habits: &'a Habits,
    detail: Detail,
}

impl Row<'_> {
    fn build(&self) -> DriveRow {
        let solved = self.case.spec.as_deref().zip(self.case.solution.as_deref());
        let (outcome, moves) = match solved {
            Some((_, solution)) => super::outcome::words(solution, &self.units.speed),
            None => (String::from("not solved"), false),
        };
        DriveRow {
            case: self.case.case,
            label: String::new(),
            gear: self.case.gear.clone(),
            solved: solved.is_some(),
            outcome,
            moves,
            speed: solved
                .map_or(Entry::None, |(_, of)| self.entry(of.answer(None, None, "speed"), &self.units.speed)),
            limited_by: solved
                .map_or(Entry::None, |(_, of)| self.entry(of.answer(None, None, "limited_by"), "")),
            sources: solved.map_or_else(Vec::new, |(spec, of)| self.sources(spec, of)),
            points: solved.map_or_else(Vec::new, |(_, of)| super::outcome::points(of, &self.units.speed)),
            results: match (solved, self.detail) {
                (Some((spec, of)), Detail::Everything) => self.everything(spec, of),
                _ => Vec::new(),
            },
            faults: self.sentences(&self.case.faults),
            governs: Vec::new(),
        }
    }

    fn sources(&self, spec: &DriveSpec, solution: &Solution) -> Vec<SourceRow> {
        let mut known = Vec::new();
        counts(&spec.chain, &mut known);
        let row = |at: usize| {
            let ask = |names: &[&str], unit: &str| self.entry(first(solution, Some(at), names), unit);
            SourceRow {
                part: spec.parts[at].name.clone(),
                count: known.iter().find(|(index, _)| *index == at).map_or(1, |(_, count)| *count),
                speed: ask(&["speed"], &self.units.source_speed),
                effort: ask(EFFORT, &self.units.effort),
                power: ask(&["power"], &self.units.power),
                peak_power: ask(&["peak_power"], &self.units.power),
                power_share: ask(&["power_share"], "%"),
                current: ask(&["current"], &self.units.current),
                mode: ask(&["mode"], ""),
            }
        };
        sources(spec).map(row).collect()
    }

    /// Every result of the drive and of every part, at the part itself and at both its sides.
    fn everything(&self, spec: &DriveSpec, solution: &Solution) -> Vec<PartResults> {
        let mut all = vec![PartResults {
            part: String::new(),
            port: None,
            results: self.answers(solution, None, None, registry::DRIVE_RESULTS.iter()),
        }];
        for (at, part) in spec.parts.iter().enumerate() {
            let rows = || registry::common_results(part.row.role).iter().chain(part.row.results);
            let mut push = |port: Option<Port>, word| {
                let results = self.answers(solution, Some(at), port, rows());
                all.push(PartResults { part: part.name.clone(), port: word, results });
            };
            push(None, None);
            if part.row.role == Role::Transmission {
                push(Some(Port::Input), Some("input"));
                push(Some(Port::Output), Some("output"));
            }
        }
        all.retain(|part| !part.results.is_empty());
        all
    }

    fn answers<'r>(
        &self,
        solution: &Solution,
        part: Option<usize>,
        port: Option<Port>,
        rows: impl Iterator<Item = &'r ResultRow>,
    ) -> Vec<(&'static str, Entry)> {
        let answer = |row: &ResultRow| {
            let answer = solution.answer(part, port, row.name);
            let unit = match &answer {
                Answer::Quantity { si, kind, .. } => self.habits.unit(kind, [*si]),
                _ => String::new(),
            };
            (row.name, self.entry(answer, &unit))
        };
        rows.map(answer).filter(|(_, entry)| *entry != Entry::None).collect()
    }

    fn entry(&self, answer: Answer, unit: &str) -> Entry {
        entry(answer, unit, self.case, self.habits)
    }

    fn sentences(&self, faults: &[Fault]) -> Vec<String> {
        sentences(faults, self.case, self.habits)
    }
}

/// An answer as it is shown, a number in `unit`.
pub(super) fn entry(answer: Answer, unit: &str, case: &DriveCase, habits: &Habits) -> Entry {
    match answer {
        Answer::Quantity { si, kind, marks } if si.is_finite() => {
            Entry::Number(Box::new(Number::computed(si, kind, unit, DIGITS).marked(marks)))
        }
        Answer::Quantity { .. } => Entry::Absent(String::from("not a finite number")),
        Answer::Flag(flag) => Entry::Flag(flag),
        Answer::Word(word) => Entry::Word(word),
        Answer::Unbounded(why) => Entry::Unbounded(note::fill(&why, habits)),
        Answer::Absent(why) => Entry::Absent(note::fill(&why, habits)),
        Answer::Refused(faults) => Entry::Absent(sentences(&faults, case, habits).join("; ")),
        Answer::NoSuch => Entry::None,
    }
}

/// Why something could not be had, a sentence each.
fn sentences(faults: &[Fault], case: &DriveCase, habits: &Habits) -> Vec<String> {
    let name = |part: Option<usize>| {
        let parts = &case.spec.as_deref()?.parts;
        parts.get(part?).map(|part| part.name.as_str())
    };
    faults.iter().map(|fault| note::fault(fault, name(fault.part), habits)).collect()
}
