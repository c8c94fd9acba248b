//! A part: its kind, what it does in every drive and case, its cautions, and a small chart for clients that ask for it.

use layshaft_diagnostics::FileSpan;
use layshaft_mechanics::model::Motion;
use layshaft_mechanics::registry::Role;
use layshaft_mechanics::solution::Answer;
use layshaft_present::number::{DIGITS, digits, percent, shortened};
use layshaft_present::sheet::{self, Entry};
use layshaft_present::shown::shown;
use layshaft_semantics::analysis::{DriveCase, DriveRecord, PartRecord};
use layshaft_semantics::quantity::Datum;

use super::criterion::more;
use super::value::docs;
use super::{MOST, Options, chart};
use crate::Snapshot;
use crate::markup::{self, Page, code, text};
use crate::numbers::{answer, entry, plain, port_of};

/// Drives shown in the hover of a part that takes part in several.
const DRIVES: usize = 3;

pub(super) fn part(snapshot: &Snapshot, place: FileSpan, options: Options) -> Option<String> {
    let record = snapshot.part(place)?;
    let mut page = Page::default();
    let kind = record.row.map_or("of an unknown kind", |row| row.title);
    page.paragraph(format!("**{}**, {kind} ({})", text(&record.name), sheet::role_word(record.role)));
    page.paragraph(docs(&record.docs));
    let drives: Vec<(usize, &DriveRecord)> = snapshot.drives_with(place).collect();
    page.paragraph(ratio(record, drives.first().map(|(_, drive)| *drive), place));
    page.paragraph(given(record));
    for (_, drive) in drives.iter().take(DRIVES) {
        table(snapshot, &mut page, drive, record, place);
    }
    if drives.is_empty() {
        page.paragraph("It takes part in no drive.");
    }
    if let Some(row) = record.row {
        let cautions: Vec<String> = row.cautions.iter().map(|caution| (*caution).to_owned()).collect();
        page.list(&cautions);
    }
    if options.charts
        && record.role != Role::Supply
        && let Some((_, drive)) = drives.first()
        && let Some(case) = plain(drive)
    {
        page.paragraph(chart::image(snapshot, case, Some(place)));
    }
    Some(page.finish())
}

/// Results known from the fields alone.
fn given(record: &PartRecord) -> String {
    let one = |(name, datum): &(&'static str, Datum)| {
        format!("{} = {}", code(name), markup::number(shown(datum).text()))
    };
    record.given.iter().map(one).collect::<Vec<_>>().join(", ")
}

/// `slower ×41.2, torque ×41.2 · 94 % = ×38.73`
fn ratio(record: &PartRecord, drive: Option<&DriveRecord>, place: FileSpan) -> String {
    if record.role != Role::Transmission {
        return String::new();
    }
    let number = |name: &str| {
        record.given.iter().find(|(known, _)| *known == name).and_then(|(_, datum)| match datum {
            Datum::Quantity(quantity) => Some(quantity.si),
            _ => None,
        })
    };
    let field = |name: &str| {
        record.fields.iter().find(|field| field.name == name).and_then(|field| match &field.value {
            Some(Datum::Quantity(quantity)) => Some(quantity.si),
            _ => None,
        })
    };
    let efficiency = field("efficiency").or_else(|| number("efficiency"));
    if let Some(reduction) = number("reduction").or_else(|| running(drive, place)) {
        return spelled(reduction, efficiency);
    }
    travel(drive, place, efficiency)
}

fn spelled(reduction: f64, efficiency: Option<f64>) -> String {
    let write = |value: f64| shortened(&digits(value, DIGITS));
    let (speed, torque, sign, times) = if reduction >= 1.0 {
        ("slower", reduction, "×", reduction)
    } else {
        ("faster", 1.0 / reduction, "÷", reduction)
    };
    let with = efficiency.map(|eta| format!(" · {} % = ×{}", percent(eta), write(times * eta)));
    if reduction == 1.0 && efficiency.is_none() {
        return String::new();
    }
    let size = write(torque);
    format!("{speed} ×{size}, torque {sign}{size}{}", with.unwrap_or_default())
}

/// Speeds of both sides in the plain spec.
fn speeds(drive: Option<&DriveRecord>, place: FileSpan) -> Option<[(f64, Motion); 2]> {
    let case = plain(drive?)?;
    let side = |port: &str| {
        let Answer::Quantity { si, .. } = answer(case, Some(place), Some(port), "speed") else { return None };
        let at = case.parts.iter().position(|known| *known == place);
        let motion = case.solution.as_deref()?.motion(at, port_of(Some(port)))?;
        (si > 0.0).then_some((si, motion))
    };
    Some([side("input")?, side("output")?])
}

/// The reduction of a part that turns on both sides, from its speeds, slip included.
fn running(drive: Option<&DriveRecord>, place: FileSpan) -> Option<f64> {
    match speeds(drive, place)? {
        [(input, Motion::Rotary), (output, Motion::Rotary)] if (input / output - 1.0).abs() > 1e-9 => {
            Some(input / output)
        }
        _ => None,
    }
}

/// `1000 rpm here is 14.14 m/min`, where one side turns and the other runs straight.
fn travel(drive: Option<&DriveRecord>, place: FileSpan, efficiency: Option<f64>) -> String {
    const RPM: f64 = std::f64::consts::PI / 30.0;
    match speeds(drive, place) {
        Some([(input, Motion::Rotary), (output, Motion::Linear)]) => {
            let travel = shortened(&digits(output / input * RPM * 60.0, DIGITS));
            format!("1 rpm at its input is {travel} m/min at its output")
        }
        Some([(input, Motion::Linear), (output, Motion::Linear)]) if input != output => {
            spelled(input / output, efficiency).replace("torque", "force")
        }
        _ => String::new(),
    }
}

fn table(snapshot: &Snapshot, page: &mut Page, drive: &DriveRecord, record: &PartRecord, place: FileSpan) {
    page.paragraph(format!("In {}", text(&drive.name)));
    let asked: Vec<(String, Vec<Entry>, bool)> = drive
        .cases
        .iter()
        .take(MOST)
        .map(|case| {
            let label = sheet::case_label(&snapshot.analysis, case.case, case.gear.as_deref());
            (text(&label), entries(snapshot, case, record.role, place), case.solution.is_some())
        })
        .collect();
    let mut remarks: Vec<String> = asked
        .iter()
        .map(|(_, entries, solved)| if *solved { remark(entries) } else { "not solved".to_owned() })
        .collect();
    // What is true of every line is said once.
    let shared = remarks.first().filter(|first| remarks.iter().all(|other| other == *first)).cloned();
    if shared.is_some() {
        remarks.iter_mut().for_each(String::clear);
    }
    let rows: Vec<Vec<String>> = asked
        .iter()
        .zip(remarks)
        .map(|((label, entries, _), remark)| {
            let cells = entries.iter().map(cell);
            [label.clone()].into_iter().chain(cells).chain([remark]).collect()
        })
        .collect();
    let side = |at: usize| effort_word(asked.iter().filter_map(move |(_, entries, _)| entries.get(at)));
    let head: Vec<String> = match record.role {
        Role::Supply => ["voltage", "current", "power"].map(str::to_owned).to_vec(),
        Role::Source => ["speed", side(1), "power", "of peak", "mode", "current"].map(str::to_owned).to_vec(),
        Role::Transmission => vec![
            "speed in".to_owned(),
            format!("{} in", side(1)),
            "speed out".to_owned(),
            format!("{} out", side(3)),
            "power".to_owned(),
        ],
        Role::Load => ["speed", side(1), "power"].map(str::to_owned).to_vec(),
    };
    let head: Vec<&str> =
        ["case"].into_iter().chain(head.iter().map(String::as_str)).chain(["remark"]).collect();
    page.table(&head, &rows);
    page.paragraph(shared.unwrap_or_default());
    page.paragraph(more(drive.cases.len(), rows.len()));
}

/// What the effort of a column is called: by the first answer that is a number.
pub(super) fn effort_word<'a>(mut entries: impl Iterator<Item = &'a Entry>) -> &'static str {
    let kind = entries.find_map(|entry| match entry {
        Entry::Number(number) => number.kind,
        _ => None,
    });
    if kind == Some("force") { "force" } else { "torque" }
}

const EFFORT: &[&str] = &["torque", "force"];

fn entries(snapshot: &Snapshot, case: &DriveCase, role: Role, place: FileSpan) -> Vec<Entry> {
    let ask = |port: Option<&str>, names: &[&str]| entry(snapshot, case, Some(place), port, names);
    match role {
        Role::Supply => vec![ask(None, &["voltage"]), ask(None, &["current"]), ask(None, &["power"])],
        Role::Source => {
            let current = match ask(None, &["current"]) {
                // That no current is known of a motor without electrical data is no news in every line.
                Entry::Absent(_) => Entry::None,
                known => known,
            };
            let rest = [&["speed"][..], EFFORT, &["power"], &["power_share"], &["mode"]];
            rest.into_iter().map(|names| ask(None, names)).chain([current]).collect()
        }
        Role::Transmission => vec![
            ask(Some("input"), &["speed"]),
            ask(Some("input"), EFFORT),
            ask(Some("output"), &["speed"]),
            ask(Some("output"), EFFORT),
            ask(None, &["power"]),
        ],
        Role::Load => vec![ask(None, &["speed"]), ask(None, EFFORT), ask(None, &["power"])],
    }
}

/// An answer, harmless.
pub(super) fn cell(entry: &Entry) -> String {
    match entry {
        Entry::Word(word) => word.replace('_', " "),
        other => markup::number(other.text()),
    }
}

/// What must be known of the numbers of a row.
pub(super) fn remark(entries: &[Entry]) -> String {
    let mut words: Vec<String> = Vec::new();
    let mut say = |word: &str| {
        if !words.iter().any(|known| known == word) {
            words.push(word.to_owned());
        }
    };
    for entry in entries {
        match entry {
            Entry::Number(number) => {
                if number.marks.outside {
                    say("outside the measured range");
                }
                if number.marks.scaled {
                    say("scaled data");
                }
            }
            Entry::Absent(why) | Entry::Unbounded(why) => say(&text(why)),
            _ => {}
        }
    }
    words.truncate(2);
    words.join("; ")
}
