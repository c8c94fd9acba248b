//! `layshaft units`: what may stand behind a number.

use layshaft_present::number::written;
use layshaft_present::shown::joined;
use layshaft_report::terminal::{Align, Cell, Column, Grid, Tone};
use layshaft_units::{KINDS, Kind, Prefixes, UnitRow, kind, parse_unit, unit_rows};

use crate::output::{Exit, Output};

/// Runs the command.
pub fn units(name: Option<&str>, out: &mut Output) -> Exit {
    let Some(name) = name else {
        out.result(&all(out));
        return Exit::Holds;
    };
    if let Some(kind) = kind(name) {
        out.result(&of_kind(kind, out));
        return Exit::Holds;
    }
    let hint = match layshaft_units::closest(name, KINDS.iter().map(|kind| kind.name)) {
        Some(close) => format!("did you mean `{close}`?"),
        None => String::from("`layshaft units` lists all"),
    };
    out.message(&format!("there is no kind of quantity `{name}`; {hint}"));
    Exit::Unusable
}

fn column(head: &str) -> Column {
    Column { head: vec![head.into()], align: Align::Text }
}

/// Every kind with its units, then every symbol.
fn all(out: &Output) -> String {
    let kinds = Grid {
        columns: vec![column("kind of quantity"), column("units it is usually given in"), column("meaning")],
        rows: KINDS
            .iter()
            .map(|kind| {
                let units: Vec<&str> = kind.units.iter().copied().filter(|unit| !unit.is_empty()).collect();
                vec![Cell::plain(kind.name), Cell::plain(units.join(", ")), Cell::plain(kind.meaning)]
            })
            .collect(),
    };
    let symbols = Grid {
        columns: vec![column("symbol"), column("also written"), column("prefixes"), column("name")],
        rows: unit_rows()
            .iter()
            .map(|row| {
                let also = Cell::plain(row.also.join(", "));
                vec![Cell::plain(row.symbol), also, Cell::plain(prefixes(row)), Cell::plain(row.name)]
            })
            .collect(),
    };
    let (width, style) = (out.width(), out.style());
    let head = style.paint(Tone::Strong, "Kinds of quantity");
    let second = style.paint(Tone::Strong, "Units");
    format!("{head}\n{}\n{second}\n{}", kinds.render(width, style), symbols.render(width, style))
}

fn prefixes(row: &UnitRow) -> String {
    match row.prefixes {
        Prefixes::None => String::new(),
        Prefixes::All => String::from("all"),
        Prefixes::Only(list) => list.join(", "),
    }
}

/// The units of a kind, each with its size in SI.
fn of_kind(kind: &Kind, out: &Output) -> String {
    let size = |unit: &str| match parse_unit(unit) {
        Ok(parsed) if parsed.offset != 0.0 => {
            format!("0 {unit} = {}", joined(&written(parsed.to_si(0.0)), kind.si))
        }
        Ok(parsed) => format!("1 {unit} = {}", joined(&exact(parsed.factor), kind.si)),
        Err(_) => String::new(),
    };
    let rows = kind.units.iter().filter(|unit| !unit.is_empty());
    let grid = Grid {
        columns: vec![column("unit"), column("size")],
        rows: rows.map(|unit| vec![Cell::plain(*unit), Cell::plain(size(unit))]).collect(),
    };
    let (width, style) = (out.width(), out.style());
    let head = format!("{}: {}\n", style.paint(Tone::Strong, kind.name), kind.meaning);
    if grid.rows.is_empty() {
        format!("{head}  a number without a unit\n")
    } else {
        head + &grid.render(width, style)
    }
}

/// A factor with every digit it has.
fn exact(factor: f64) -> String {
    if (1e-4..1e7).contains(&factor) { factor.to_string() } else { format!("{factor:e}") }
}
