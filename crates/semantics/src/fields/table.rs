//! Curves: pairs, tables in the text, tables in CSV files.

use std::cell::RefCell;
use std::collections::BTreeMap;
use std::rc::Rc;

use layshaft_diagnostics::{Code, Diagnostic, FileSpan, Span};
use layshaft_mechanics::registry::{ColumnRow, Field};
use layshaft_mechanics::values::Table;
use layshaft_syntax::{Column, Csv, Expr, Pair, Points, ValueKind};
use layshaft_units::Unit;

use crate::defs::Given;
use crate::eval::{Eval, Reading};
use crate::world::ItemRef;

/// How many rows a CSV file may have.
pub(crate) const MOST_ROWS: usize = 1_000_000;

/// Conditions a table can be taken at, in the order they are tried.
const CONDITIONS: &[&str] = &[
    "voltage",
    "frequency",
    "temperature",
    "absolute_pressure",
    "gauge_pressure",
    "pressure",
    "rotational_speed",
    "length",
];

/// A CSV file's rows as read, shared by every case that uses it.
type Rows = Rc<Result<Vec<Vec<String>>, (Option<usize>, String)>>;

/// CSV files read so far, by path.
#[derive(Debug, Default)]
pub(crate) struct Tables {
    rows: RefCell<BTreeMap<String, Rows>>,
}

/// Reads a field of points.
pub(super) fn read(
    eval: &Eval<'_>,
    given: &Given<'_>,
    field: &'static Field,
    columns: &'static [ColumnRow],
) -> Option<Table> {
    let reader = Reader { eval, at: given.at, columns, place: eval.place(given.at, given.value.span) };
    let table = match &given.value.kind {
        ValueKind::Pairs(pairs) => reader.pairs(pairs)?,
        ValueKind::Points(points) => reader.points(points)?,
        ValueKind::Csv(csv) => reader.csv(csv)?,
        ValueKind::Missing => return None,
        _ => {
            let message = format!("`{}` is given by points", field.name);
            eval.report(Diagnostic::new(Code::WrongValue, reader.place, message).help(format!(
                "write {} or pairs such as `(1.2 N·m at 2850 rpm)`",
                super::shape::sample(field)
            )));
            return None;
        }
    };
    Some(table)
}

struct Reader<'a, 'w> {
    eval: &'a Eval<'w>,
    at: ItemRef,
    columns: &'static [ColumnRow],
    place: FileSpan,
}

/// The columns of a table, each with the registry's row and the unit its cells are in.
type Heads = Vec<(&'static ColumnRow, Option<Unit>)>;

impl Reader<'_, '_> {
    fn refuse(&self, place: FileSpan, message: String) -> Diagnostic {
        Diagnostic::new(Code::BadTable, place, message)
    }

    fn span(&self, span: Span) -> FileSpan {
        self.eval.place(self.at, span)
    }

    /// `(1.2 N·m at 2850 rpm, 13.0 A)`: each quantity goes to the column of its kind.
    fn pairs(&self, pairs: &[Pair]) -> Option<Table> {
        let mut table = Table::default();
        let mut rows: Vec<BTreeMap<&'static str, f64>> = Vec::new();
        for pair in pairs {
            let mut row = BTreeMap::new();
            for expr in &pair.values {
                let found = self.eval.quantity(expr, Reading::plain(self.at))?;
                let fits = |column: &&ColumnRow| {
                    !row.contains_key(column.name)
                        && layshaft_units::kind(column.kind)
                            .is_some_and(|kind| layshaft_units::demand(&found.ty, kind).is_ok())
                };
                let Some(column) = self.columns.iter().find(fits) else {
                    let wanted: Vec<_> = self.columns.iter().map(|column| column.name).collect();
                    let message = format!("{} does not fit: {}", found.ty.describe(), wanted.join(", "));
                    self.eval.report(Diagnostic::new(Code::KindMismatch, self.span(expr.span), message));
                    return None;
                };
                row.insert(column.name, found.si);
            }
            let missing =
                self.columns.iter().find(|column| !column.optional && !row.contains_key(column.name));
            if let Some(column) = missing {
                let message = format!("this point has no {}", column.name);
                self.eval.report(
                    self.refuse(self.span(pair.span), message)
                        .help("a point is written `(1.2 N·m at 2850 rpm, 13.0 A)`"),
                );
                return None;
            }
            rows.push(row);
        }
        let first = rows.first()?.clone();
        for (index, row) in rows.iter().enumerate() {
            if row.len() != first.len() {
                let message = "this point gives other quantities than the first".to_owned();
                self.eval.report(self.refuse(self.span(pairs[index].span), message));
                return None;
            }
        }
        for column in self.columns.iter().filter(|column| first.contains_key(column.name)) {
            let values = rows.iter().filter_map(|row| row.get(column.name).copied()).collect();
            table.columns.push((column.name, values));
        }
        // Pairs may come in any order of their own; the law sorts what it needs.
        Some(table)
    }

    fn points(&self, points: &Points) -> Option<Table> {
        let heads = self.heads(&points.columns)?;
        let mut table = self.empty(&heads, &points.at)?;
        let mut places = Vec::new();
        for row in &points.rows {
            let place = row
                .iter()
                .map(|(_, span)| *span)
                .reduce(Span::cover)
                .map_or(self.place, |span| self.span(span));
            if row.len() != heads.len() {
                let message =
                    format!("this row has {} and the head {}", cells(row.len()), cells(heads.len()));
                self.eval.report(
                    self.refuse(place, message)
                        .help("a row holds one number for each column, blanks between"),
                );
                return None;
            }
            for (index, (value, _)) in row.iter().enumerate() {
                table.columns[index].1.push(to_si(&heads[index], *value));
            }
            places.push((place, "this row".to_owned()));
        }
        self.sorted(table, &places)
    }

    fn heads(&self, columns: &[Column]) -> Option<Heads> {
        let mut heads = Heads::new();
        for column in columns {
            let place = self.span(column.name.span);
            let Some(row) = self.columns.iter().find(|row| *row.name == *column.name.text) else {
                let names: Vec<_> = self.columns.iter().map(|row| row.name).collect();
                let message = format!("there is no column `{}` here", column.name.text);
                let found = self.refuse(place, message);
                self.eval.report(match layshaft_units::closest(&column.name.text, names.iter().copied()) {
                    Some(close) => found.fix(format!("write `{close}`"), place, close),
                    None => found.help(format!("columns: {}", names.join(", "))),
                });
                return None;
            };
            if heads.iter().any(|(known, _)| known.name == row.name) {
                self.eval.report(self.refuse(place, format!("the column `{}` is given twice", row.name)));
                return None;
            }
            heads.push((row, self.head_unit(column, row)?));
        }
        for row in self.columns.iter().filter(|row| !row.optional) {
            if !heads.iter().any(|(known, _)| known.name == row.name) {
                let message = format!("the table has no column `{}`", row.name);
                self.eval.report(self.refuse(self.place, message));
                return None;
            }
        }
        Some(heads)
    }

    /// The unit of a column, of the kind the column wants.
    fn head_unit(&self, column: &Column, row: &ColumnRow) -> Option<Option<Unit>> {
        let kind = layshaft_units::kind(row.kind)?;
        let Some(written) = &column.unit else {
            if kind.ty().is_plain_number() {
                return Some(None);
            }
            let place = self.span(column.name.span);
            let message = format!("the column `{}` has no unit", row.name);
            let offer = format!("{} [{}]", row.name, kind.unit);
            self.eval.report(Diagnostic::new(Code::MissingUnit, place, message).fix(
                format!("write `{offer}`"),
                place,
                offer.clone(),
            ));
            return None;
        };
        let unit = self.eval.unit(written, self.at, Some(&kind.ty()), None)?;
        if let Err(refusal) = layshaft_units::demand(&unit.ty, kind) {
            let message = format!("the column `{}` is in {}: {}", row.name, unit.text, refusal.message());
            self.eval.report(Diagnostic::new(Code::KindMismatch, self.span(written.span), message));
            return None;
        }
        Some(Some(unit))
    }

    fn empty(&self, heads: &Heads, conditions: &[Expr]) -> Option<Table> {
        let columns = heads.iter().map(|(row, _)| (row.name, Vec::new())).collect();
        let mut at = Vec::new();
        for expr in conditions {
            let found = self.eval.quantity(expr, Reading::plain(self.at))?;
            let kind = CONDITIONS.iter().find(|name| {
                layshaft_units::kind(name).is_some_and(|kind| layshaft_units::demand(&found.ty, kind).is_ok())
            });
            let Some(kind) = kind else {
                let message = format!("{} is no condition a curve is measured at", found.ty.describe());
                self.eval.report(Diagnostic::new(Code::KindMismatch, self.span(expr.span), message));
                return None;
            };
            at.push((*kind, found.si));
        }
        Some(Table { columns, at })
    }

    /// The first column rises from row to row; a curve has one value at each speed.
    fn sorted(&self, table: Table, places: &[(FileSpan, String)]) -> Option<Table> {
        let by = self.columns.first()?.name;
        let xs = table.column(by)?;
        if xs.len() < 2 {
            self.eval.report(self.refuse(self.place, "a curve needs two points at least".to_owned()));
            return None;
        }
        for (index, pair) in xs.windows(2).enumerate() {
            if pair[0] < pair[1] {
                continue;
            }
            let (place, row) = &places[index + 1];
            let message = if pair[0] == pair[1] {
                format!("{row} gives a second value at the same {by}")
            } else {
                format!("{row} goes back in {by}")
            };
            self.eval.report(
                self.refuse(*place, message).help(format!("sort the rows by rising {by}, one row for each")),
            );
            return None;
        }
        Some(table)
    }

    fn csv(&self, csv: &Csv) -> Option<Table> {
        let place = self.span(csv.path.span);
        let from = &self.eval.shared.world.files[self.at.file as usize].path;
        let path = match crate::load::beside(from, &csv.path.value) {
            Ok(path) => path,
            Err(why) => {
                self.eval.report(Diagnostic::new(Code::MissingFile, place, why));
                return None;
            }
        };
        let rows = self.rows(&path, place)?;
        let rows = match &*rows {
            Ok(rows) => rows,
            Err((line, why)) => {
                let row = line.map(|line| format!(", line {line}")).unwrap_or_default();
                self.eval.report(self.refuse(place, format!("`{path}`{row}: {why}")));
                return None;
            }
        };
        let (heads, from) = self.csv_heads(csv, rows, &path, place)?;
        let mut table = self.empty(&heads, &csv.at)?;
        let mut places = Vec::new();
        for (line, row) in rows.iter().enumerate().skip(1) {
            if row.iter().all(|cell| cell.trim().is_empty()) {
                continue;
            }
            let named = format!("`{path}`, line {}", line + 1);
            for (index, head) in heads.iter().enumerate() {
                let cell = row.get(from[index]).map_or("", |cell| cell.trim());
                let value = self.cell(cell, &named, head.0.name, place)?;
                table.columns[index].1.push(to_si(head, value));
            }
            places.push((place, named));
        }
        self.sorted(table, &places)
    }

    fn cell(&self, cell: &str, named: &str, column: &str, place: FileSpan) -> Option<f64> {
        let wrong = match cell.parse::<f64>() {
            Ok(value) if value.is_finite() => return Some(value),
            _ if cell.is_empty() => format!("{named}: the cell of `{column}` is empty"),
            _ if cell.contains(',') => {
                format!("{named}: `{}` has a comma; the decimal sign is the point", clipped(cell))
            }
            _ => format!("{named}: `{}` is not a number", clipped(cell)),
        };
        self.eval.report(self.refuse(place, wrong).help("mend the file, or leave the row out of it"));
        None
    }

    /// The rows of a file, read once.
    fn rows(&self, path: &str, place: FileSpan) -> Option<Rows> {
        if let Some(rows) = self.eval.shared.tables.rows.borrow().get(path) {
            return Some(Rc::clone(rows));
        }
        let text = match self.eval.shared.files.read(path) {
            Ok(text) => text,
            Err(why) => {
                self.eval.report(crate::load::unreadable(place, path, &why));
                return None;
            }
        };
        let rows = Rc::new(parse_csv(&text));
        self.eval.shared.tables.rows.borrow_mut().insert(path.to_owned(), Rc::clone(&rows));
        Some(rows)
    }

    /// The columns wanted and where each stands in the file.
    fn csv_heads(
        &self,
        csv: &Csv,
        rows: &[Vec<String>],
        path: &str,
        place: FileSpan,
    ) -> Option<(Heads, Vec<usize>)> {
        let Some(first) = rows.first() else {
            self.eval.report(self.refuse(place, format!("`{path}` is empty")));
            return None;
        };
        if csv.columns.is_empty() {
            let wanted: Vec<_> = self
                .columns
                .iter()
                .filter(|row| !row.optional)
                .map(|row| {
                    let unit = layshaft_units::kind(row.kind).map_or("", |kind| kind.unit);
                    format!("heading as {} [{unit}]", row.name)
                })
                .collect();
            let message = "say which column of the file is what, and in which unit".to_owned();
            self.eval.report(
                self.refuse(place, message).help(format!("write `csv \"{path}\" ({})`", wanted.join(", "))),
            );
            return None;
        }
        let heads = self.heads(&csv.columns)?;
        let mut from = Vec::new();
        for column in &csv.columns {
            let (heading, span) = match &column.heading {
                Some(heading) => (&*heading.value, heading.span),
                None => (&*column.name.text, column.name.span),
            };
            let at: Vec<usize> = (0..first.len()).filter(|index| first[*index].trim() == heading).collect();
            let place = self.span(span);
            match at[..] {
                [index] => from.push(index),
                [] => {
                    let names: Vec<_> = first.iter().map(|name| clipped(name.trim())).collect();
                    let message = format!("`{path}` has no column headed `{heading}`");
                    self.eval.report(
                        self.refuse(place, message).help(format!("its headings: {}", names.join(", "))),
                    );
                    return None;
                }
                _ => {
                    let message = format!("`{path}` has several columns headed `{heading}`");
                    self.eval.report(self.refuse(place, message));
                    return None;
                }
            }
        }
        Some((heads, from))
    }
}

fn to_si(head: &(&'static ColumnRow, Option<Unit>), value: f64) -> f64 {
    head.1.as_ref().map_or(value, |unit| unit.to_si(value))
}

fn cells(count: usize) -> String {
    if count == 1 { "1 cell".to_owned() } else { format!("{count} cells") }
}

/// A cell short enough for a message, its control characters taken out.
fn clipped(cell: &str) -> String {
    let clean: String = cell.chars().filter(|c| !c.is_control()).take(40).collect();
    if clean.len() < cell.len() { format!("{clean}…") } else { clean }
}

/// The separator is the one the first line has most of: comma, semicolon or tab.
fn parse_csv(text: &str) -> Result<Vec<Vec<String>>, (Option<usize>, String)> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    let first = text.lines().next().unwrap_or("");
    let count = |mark: char| first.matches(mark).count();
    let delimiter = [',', ';', '\t'].into_iter().max_by_key(|mark| count(*mark)).unwrap_or(',');
    let mut reader = csv::ReaderBuilder::new()
        .has_headers(false)
        .flexible(true)
        .delimiter(delimiter as u8)
        .comment(Some(b'#'))
        .from_reader(text.as_bytes());
    let mut rows = Vec::new();
    for record in reader.records() {
        if rows.len() > MOST_ROWS {
            return Err((None, format!("more than {MOST_ROWS} rows")));
        }
        match record {
            Ok(record) => rows.push(record.iter().map(str::to_owned).collect()),
            Err(error) => {
                let line = error.position().map(|position| position.line() as usize);
                return Err((line, "the row cannot be read as comma-separated values".to_owned()));
            }
        }
    }
    Ok(rows)
}
