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
    let asked: Vec<Option<Asked<'_>>> = drive.cases.iter().map(Asked::new).collect();
    let units = units(&asked, habits);
    let row = |(case, asked): (&DriveCase, &Option<Asked<'_>>)| {
        let mut row = Row { case, units: &units, habits, detail }.build(asked.as_ref());
        row.label = label(analysis, case.case, case.gear.as_deref());
        row.governs = governs(criteria, case);
        row
    };
    DriveSheet {
        name: drive.name.clone(),
        chain: drive.cases.iter().find_map(|case| case.spec.as_deref()).map_or_else(String::new, chain_text),
        docs: drive.docs.clone(),
        rows: drive.cases.iter().zip(&asked).map(row).collect(),
        units,
    }
}

/// Every result of a drive in one case that has an answer.
pub(super) fn results(case: &DriveCase, habits: &Habits) -> Vec<PartResults> {
    let Some((spec, solution)) = case.spec.as_deref().zip(case.solution.as_deref()) else {
        return Vec::new();
    };
    let units = DriveUnits::default();
    Row { case, units: &units, habits, detail: Detail::Everything }.everything(spec, solution)
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
pub(super) fn chain_text(spec: &DriveSpec) -> String {
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

/// What the table asks of a solved drive, asked once: an answer may cost a search of a whole curve.
struct Asked<'a> {
    spec: &'a DriveSpec,
    solution: &'a Solution,
    speed: Answer,
    sources: Vec<AskedSource>,
}

struct AskedSource {
    part: usize,
    speed: Answer,
    effort: Answer,
    power: Answer,
    peak_power: Answer,
    power_share: Answer,
    current: Answer,
}

impl<'a> Asked<'a> {
    fn new(case: &'a DriveCase) -> Option<Self> {
        let (spec, solution) = case.spec.as_deref().zip(case.solution.as_deref())?;
        let source = |part: usize| {
            let ask = |name: &str| solution.answer(Some(part), None, name);
            let torque = ask("torque");
            AskedSource {
                part,
                speed: ask("speed"),
                effort: if torque == Answer::NoSuch { ask("force") } else { torque },
                power: ask("power"),
                peak_power: ask("peak_power"),
                power_share: ask("power_share"),
                current: ask("current"),
            }
        };
        let sources = sources(spec).map(source).collect();
        Some(Self { spec, solution, speed: solution.answer(None, None, "speed"), sources })
    }
}

/// One unit a column, chosen by its largest number.
fn units(asked: &[Option<Asked<'_>>], habits: &Habits) -> DriveUnits {
    let solved = || asked.iter().flatten();
    let sources = || solved().flat_map(|asked| &asked.sources);
    DriveUnits {
        speed: unit(solved().map(|asked| &asked.speed), habits),
        source_speed: unit(sources().map(|source| &source.speed), habits),
        effort: unit(sources().map(|source| &source.effort), habits),
        power: unit(sources().flat_map(|source| [&source.power, &source.peak_power]), habits),
        current: unit(sources().map(|source| &source.current), habits),
    }
}

/// The unit for the numbers among answers of one kind.
fn unit<'a>(answers: impl Iterator<Item = &'a Answer>, habits: &Habits) -> String {
    let mut kind = None;
    let mut values = Vec::new();
    for answer in answers {
        if let Answer::Quantity { si, kind: of, .. } = answer {
            kind = kind.or(Some(*of));
            values.push(*si);
        }
    }
    kind.map(|kind| habits.unit(kind, values)).unwrap_or_default()
}

struct Row<'a> {
    case: &'a DriveCase,
    units: &'a DriveUnits,
    habits: &'a Habits,
    detail: Detail,
}

impl Row<'_> {
    fn build(&self, asked: Option<&Asked<'_>>) -> DriveRow {
        let unit = &self.units.speed;
        let (outcome, moves) = match asked {
            Some(asked) => super::outcome::words(asked.solution, unit),
            None => (String::from("not solved"), false),
        };
        let limited_by = asked.map_or(Answer::NoSuch, |of| of.solution.answer(None, None, "limited_by"));
        DriveRow {
            case: self.case.case,
            label: String::new(),
            gear: self.case.gear.clone(),
            solved: asked.is_some(),
            outcome,
            moves,
            speed: asked.map_or(Entry::None, |of| self.entry(of.speed.clone(), unit)),
            limited_by: self.entry(limited_by, ""),
            sources: asked.map_or_else(Vec::new, |of| self.sources(of)),
            points: asked.map_or_else(Vec::new, |of| super::outcome::points(of.solution, unit)),
            results: match (asked, self.detail) {
                (Some(of), Detail::Everything) => self.everything(of.spec, of.solution),
                _ => Vec::new(),
            },
            faults: self.sentences(&self.case.faults),
            governs: Vec::new(),
        }
    }

    fn sources(&self, asked: &Asked<'_>) -> Vec<SourceRow> {
        let mut known = Vec::new();
        counts(&asked.spec.chain, &mut known);
        let units = self.units;
        let row = |source: &AskedSource| SourceRow {
            part: asked.spec.parts[source.part].name.clone(),
            count: known.iter().find(|(index, _)| *index == source.part).map_or(1, |(_, count)| *count),
            speed: self.entry(source.speed.clone(), &units.source_speed),
            effort: self.entry(source.effort.clone(), &units.effort),
            power: self.entry(source.power.clone(), &units.power),
            peak_power: self.entry(source.peak_power.clone(), &units.power),
            power_share: self.entry(source.power_share.clone(), "%"),
            current: self.entry(source.current.clone(), &units.current),
            mode: self.entry(asked.solution.answer(Some(source.part), None, "mode"), ""),
        };
        asked.sources.iter().map(row).collect()
    }

    /// Every result of the drive and of every part: at the usual side of each, and at the input of what has two.
    fn everything(&self, spec: &DriveSpec, solution: &Solution) -> Vec<PartResults> {
        let mut all = vec![PartResults {
            part: String::new(),
            port: None,
            results: self.answers(solution, None, None, registry::DRIVE_RESULTS.iter()),
        }];
        for (at, part) in spec.parts.iter().enumerate() {
            let common = registry::common_results(part.row.role).iter();
            let results = self.answers(solution, Some(at), None, common.clone().chain(part.row.results));
            all.push(PartResults { part: part.name.clone(), port: None, results });
            if part.row.role == Role::Transmission {
                let results = self.answers(solution, Some(at), Some(Port::Input), common);
                all.push(PartResults { part: part.name.clone(), port: Some("input"), results });
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
