//! The table of a drive: every case a row, every source a line.

use layshaft_present::escape::terminal;
use layshaft_present::sheet::{DriveRow, DriveSheet, Entry, SourceRow};

use super::grid::{Align, Cell, Column, Grid};
use super::style::Tone;
use super::{Options, name_of_clause, paragraph};

/// The drive, its table, and what is to be said of its operating points.
pub(super) fn drive(drive: &DriveSheet, options: &Options) -> String {
    let style = options.style;
    let name = style.paint(Tone::Strong, &terminal(&drive.name));
    if !drive.rows.iter().any(|row| row.solved) {
        return format!("{name} is not solved in any case; the findings say why\n");
    }
    let mut out = format!("{name} = {}\n", terminal(&drive.chain));
    if drive.rows.iter().flat_map(|row| &row.sources).any(|source| source.count > 1) {
        out.push_str(
            &style.paint(Tone::Faint, "  of equal sources side by side, the numbers are those of each"),
        );
        out.push('\n');
    }
    // What a case governs stands in the table of criteria too: it goes first where the terminal is narrow.
    let full = table(drive, true);
    let grid = if full.fits(options.width) { full } else { table(drive, false) };
    out.push_str(&grid.render(options.width, style));
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

fn table(drive: &DriveSheet, governs: bool) -> Grid {
    let columns: Vec<Source> = columns(drive, governs);
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

fn columns(drive: &DriveSheet, governs: bool) -> Vec<Source> {
    let text = |head: &str, cell| Source { head: [head.into(), String::new()], align: Align::Text, cell };
    let number = |head: &str, unit: &str, cell| Source {
        head: [head.into(), unit.into()],
        align: Align::Number,
        cell,
    };
    let any = |test: fn(&SourceRow) -> bool| drive.rows.iter().flat_map(|row| &row.sources).any(test);
    let several = drive.rows.iter().any(|row| row.sources.len() > 1);
    let units = &drive.units;
    let linear = matches!(units.effort.as_str(), "N" | "kN" | "MN" | "lbf" | "kgf");
    let mut columns = vec![
        text("case", |row, _, first| at_first(first, || terminal(&row.label).into_owned())),
        text("from rest", |row, _, first| Cell {
            tone: if row.moves { Tone::Plain } else { Tone::Warn },
            ..at_first(first, || outcome(row))
        }),
        number(
            "speed",
            &units.speed,
            |row, _, first| {
                if first { entry(Some(&row.speed)) } else { Cell::plain("") }
            },
        ),
    ];
    if several {
        columns.push(text("source", |_, source, _| Cell::plain(source.map_or_else(String::new, name))));
    }
    let speed = if several { "at" } else { "source" };
    columns.push(number(speed, &units.source_speed, |_, source, _| entry(source.map(|s| &s.speed))));
    let effort = if linear { "force" } else { "torque" };
    columns.push(number(effort, &units.effort, |_, source, _| entry(source.map(|s| &s.effort))));
    columns.push(number("power", &units.power, |_, source, _| entry(source.map(|s| &s.power))));
    columns.push(number("peak", &units.power, |_, source, _| entry(source.map(|s| &s.peak_power))));
    columns.push(number("of peak", "%", |_, source, _| entry(source.map(|s| &s.power_share))));
    if any(|source| matches!(source.current, Entry::Number(_))) {
        columns.push(number("current", &units.current, |_, source, _| entry(source.map(|s| &s.current))));
    }
    if governs && drive.rows.iter().any(|row| !row.governs.is_empty()) {
        columns.push(text("governs", |row, _, first| {
            let clauses = || row.governs.iter().map(|clause| name_of_clause(clause)).collect::<Vec<_>>();
            at_first(first, || clauses().join(", "))
        }));
    }
    columns
}

/// A cell that stands only on the first line of a case.
fn at_first(first: bool, text: impl Fn() -> String) -> Cell {
    Cell::plain(if first { text() } else { String::new() })
}

/// What becomes of the drive, how power flows where that is not from the source, what bounds it, and on what data.
fn outcome(row: &DriveRow) -> String {
    let mut words = vec![row.outcome.clone()];
    if let [source] = row.sources.as_slice() {
        words.extend(mode(source).map(String::from));
    }
    if matches!(row.limited_by.text(), "current" | "supply" | "governor") {
        words.push(format!("by {}", row.limited_by.text()));
    }
    words.extend(row.sources.iter().flat_map(marks).fold(Vec::new(), |mut seen, mark| {
        if !seen.contains(&mark) {
            seen.push(mark);
        }
        seen
    }));
    words.join(", ")
}

/// The mode of a source where it says something.
fn mode(source: &SourceRow) -> Option<&str> {
    match source.mode.text() {
        "" | "motoring" | "standstill" | "driven_back" => None,
        other => Some(other),
    }
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
    let count = if source.count > 1 { format!(" (each of {})", source.count) } else { String::new() };
    let mode = mode(source).map_or_else(String::new, |mode| format!(", {mode}"));
    format!("{name}{count}{mode}")
}

/// What is to be known of a source's numbers.
fn marks(source: &SourceRow) -> Vec<String> {
    let numbers = [&source.speed, &source.effort, &source.power, &source.current];
    let marked = |test: fn(&layshaft_mechanics::solution::Marks) -> bool| {
        numbers.iter().any(|entry| matches!(entry, Entry::Number(number) if test(&number.marks)))
    };
    let mut words = Vec::new();
    if marked(|marks| marks.outside) {
        words.push(String::from("outside data"));
    }
    if marked(|marks| marks.scaled) {
        words.push(String::from("scaled data"));
    }
    words
}

/// The operating points that the drive does not come to, where it has any.
fn points(drive: &DriveSheet, options: &Options) -> String {
    let column = |head: &str, unit: &str, align| Column { head: vec![head.into(), unit.into()], align };
    let mut grid = Grid {
        columns: vec![
            column("further operating points", "", Align::Text),
            column("speed", &drive.units.speed, Align::Number),
            column("", "", Align::Text),
        ],
        rows: Vec::new(),
    };
    for row in &drive.rows {
        for (at, point) in row.points.iter().filter(|point| !point.reached).enumerate() {
            grid.rows.push(vec![
                at_first(at == 0, || terminal(&row.label).into_owned()),
                Cell::plain(&point.speed.digits),
                Cell::plain(format!("{}, {}", point.stability, point.mode.replace('_', " "))),
            ]);
        }
    }
    if grid.rows.is_empty() {
        String::new()
    } else {
        format!("\n{}", grid.render(options.width, options.style))
    }
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
