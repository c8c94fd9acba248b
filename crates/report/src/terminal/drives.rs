//! The table of a drive: every case a row, every source a line.

use layshaft_present::escape::terminal;
use layshaft_present::sheet::{DriveRow, DriveSheet, Entry, SourceRow};

use super::grid::{Align, Cell, Column, Grid};
use super::style::Tone;
use super::{Options, name_of_clause, paragraph};

/// The drive, its table, and what is to be said of its operating points.
pub(super) fn drive(drive: &DriveSheet, options: &Options) -> String {
    let style = options.style;
    let mut out =
        format!("{} = {}\n", style.paint(Tone::Strong, &terminal(&drive.name)), terminal(&drive.chain));
    out.push_str(&table(drive).render(options.width, style));
    out.push_str(&points(drive, options));
    out.push_str(&unbounded(drive, options));
    out
}

/// What a column of the table is made of.
struct Source {
    head: [String; 2],
    align: Align,
    cell: fn(&DriveRow, Option<&SourceRow>, first: bool) -> Cell,
}

fn table(drive: &DriveSheet) -> Grid {
    let columns: Vec<Source> = columns(drive);
    let mut grid = Grid::default();
    for row in &drive.rows {
        let sources: Vec<Option<&SourceRow>> =
            if row.sources.is_empty() { vec![None] } else { row.sources.iter().map(Some).collect() };
        for (at, source) in sources.into_iter().enumerate() {
            grid.rows.push(columns.iter().map(|column| (column.cell)(row, source, at == 0)).collect());
        }
    }
    grid.columns =
        columns.into_iter().map(|column| Column { head: column.head.into(), align: column.align }).collect();
    grid
}

fn columns(drive: &DriveSheet) -> Vec<Source> {
    let text = |head: &str, cell| Source { head: [head.into(), String::new()], align: Align::Text, cell };
    let number = |head: &str, unit: &str, cell| Source {
        head: [head.into(), unit.into()],
        align: Align::Number,
        cell,
    };
    let any = |test: fn(&SourceRow) -> bool| drive.rows.iter().flat_map(|row| &row.sources).any(test);
    let units = &drive.units;
    let effort =
        if matches!(units.effort.as_str(), "N" | "kN" | "MN" | "lbf" | "kgf") { "force" } else { "torque" };
    let mut columns = vec![
        text("case", |row, _, first| {
            Cell::plain(if first { terminal(&row.label).into_owned() } else { String::new() })
        }),
        text("from rest", |row, _, first| match first {
            true => {
                Cell { text: row.outcome.clone(), tone: if row.moves { Tone::Plain } else { Tone::Warn } }
            }
            false => Cell::plain(""),
        }),
        number(
            "speed",
            &units.speed,
            |row, _, first| if first { entry(Some(&row.speed)) } else { Cell::plain("") },
        ),
    ];
    if drive.rows.iter().any(|row| row.sources.len() > 1) || any(|source| source.count > 1) {
        columns.push(text("source", |_, source, _| Cell::plain(source.map_or_else(String::new, name))));
    }
    columns.push(number("at source", &units.source_speed, |_, source, _| entry(source.map(|s| &s.speed))));
    columns.push(number(effort, &units.effort, |_, source, _| entry(source.map(|s| &s.effort))));
    columns.push(number("power", &units.power, |_, source, _| entry(source.map(|s| &s.power))));
    columns.push(number("peak", &units.power, |_, source, _| entry(source.map(|s| &s.peak_power))));
    columns.push(number("of peak", "%", |_, source, _| entry(source.map(|s| &s.power_share))));
    if any(|source| matches!(source.current, Entry::Number(_))) {
        columns.push(number("current", &units.current, |_, source, _| entry(source.map(|s| &s.current))));
    }
    if any(|source| source.mode != Entry::Word("motoring") && !source.mode.text().is_empty()) {
        columns.push(text("mode", |_, source, _| Cell::plain(source.map_or("", |s| s.mode.text()))));
    }
    if drive.rows.iter().any(|row| !matches!(row.limited_by.text(), "" | "torque" | "force")) {
        columns.push(text("limited by", |row, _, first| {
            Cell::plain(if first { row.limited_by.text() } else { "" })
        }));
    }
    if any(|source| !marks(source).is_empty()) {
        columns.push(text("data", |_, source, _| Cell {
            text: source.map_or_else(String::new, marks),
            tone: Tone::Warn,
        }));
    }
    if drive.rows.iter().any(|row| !row.governs.is_empty()) {
        columns.push(text("governs", |row, _, first| {
            let clauses: Vec<String> = row.governs.iter().map(|clause| name_of_clause(clause)).collect();
            Cell::plain(if first { clauses.join(", ") } else { String::new() })
        }));
    }
    columns
}

fn entry(entry: Option<&Entry>) -> Cell {
    match entry {
        None | Some(Entry::None) => Cell::plain(""),
        Some(Entry::Absent(_)) => Cell { text: String::from("-"), tone: Tone::Faint },
        Some(Entry::Unbounded(_)) => Cell { text: String::from("unbounded"), tone: Tone::Bad },
        Some(entry) => Cell::plain(entry.digits()),
    }
}

fn name(source: &SourceRow) -> String {
    let name = terminal(&source.part);
    if source.count > 1 { format!("{name} (each of {})", source.count) } else { name.into_owned() }
}

/// What is to be known of a source's numbers.
fn marks(source: &SourceRow) -> String {
    let numbers = [&source.speed, &source.effort, &source.power, &source.current];
    let marked = |test: fn(&layshaft_mechanics::solution::Marks) -> bool| {
        numbers.iter().any(|entry| matches!(entry, Entry::Number(number) if test(&number.marks)))
    };
    let mut words = Vec::new();
    if marked(|marks| marks.outside) {
        words.push("outside");
    }
    if marked(|marks| marks.scaled) {
        words.push("scaled");
    }
    words.join(", ")
}

/// All operating points of the cases that have more than one, or one that is not stable.
fn points(drive: &DriveSheet, options: &Options) -> String {
    let mut out = String::new();
    for row in &drive.rows {
        if row.points.len() < 2 && row.points.iter().all(|point| point.stability == "stable") {
            continue;
        }
        let words = |point: &layshaft_present::sheet::PointRow| {
            let reached = if point.reached { ", reached" } else { "" };
            let mode = if point.mode == "motoring" { String::new() } else { format!(", {}", point.mode) };
            format!("{} {}{mode}{reached}", point.speed.text, point.stability)
        };
        let list: Vec<String> = row.points.iter().map(words).collect();
        let text = format!("operating points in {}: {}", terminal(&row.label), list.join("; "));
        out.push_str(&paragraph(&text, options.width, options.style, Tone::Plain));
    }
    out
}

/// Why a speed has no bound.
fn unbounded(drive: &DriveSheet, options: &Options) -> String {
    let mut out = String::new();
    for row in &drive.rows {
        if let Entry::Unbounded(why) = &row.speed {
            let text = format!("{}: {why}", terminal(&row.label));
            out.push_str(&paragraph(&text, options.width, options.style, Tone::Bad));
        }
    }
    out
}
