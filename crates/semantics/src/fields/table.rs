//! Curves: pairs, tables in the text, tables in CSV files.

use std::cell::RefCell;
use std::collections::BTreeMap;
use std::rc::Rc;

use layshaft_diagnostics::{Code, Diagnostic, FileSpan, Span};
use layshaft_mechanics::registry::{ColumnRow, Field};
use layshaft_mechanics::values::Table;
use layshaft_syntax::{Column, Expr, Pair, Points, ValueKind};
use layshaft_units::Unit;

use crate::defs::Given;
use crate::eval::{Eval, Reading};
use crate::quantity::Quantity;
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
pub(super) type Rows = Rc<Result<Vec<super::csv_file::Row>, super::csv_file::Unread>>;

/// CSV files read so far, by path.
#[derive(Debug, Default)]
pub(crate) struct Tables {
    pub(super) rows: RefCell<BTreeMap<String, Rows>>,
}

/// Reads a field of points.
pub(super) fn read(
    eval: &Eval<'_>,
    given: &Given<'_>,
    field: &'static Field,
    columns: &'static [ColumnRow],
) -> Option<Table> {
    // A row that cannot be read has been reported; a curve without it would be another curve.
    let problems = &eval.shared.world.tree(given.at).problems;
    let within = given.value.span;
    if problems.iter().any(|problem| within.touches(problem.span.start)) {
        return None;
    }
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
                super::words::sample(field)
            )));
            return None;
        }
    };
    Some(table)
}

pub(super) struct Reader<'a, 'w> {
    pub(super) eval: &'a Eval<'w>,
    pub(super) at: ItemRef,
    pub(super) columns: &'static [ColumnRow],
    place: FileSpan,
}

/// The columns of a table, each with the registry's row and the unit its cells are in.
pub(super) type Heads = Vec<(&'static ColumnRow, Option<Unit>)>;

impl Reader<'_, '_> {
    pub(super) fn refuse(&self, place: FileSpan, message: String) -> Diagnostic {
        Diagnostic::new(Code::BadTable, place, message)
    }

    pub(super) fn span(&self, span: Span) -> FileSpan {
        self.eval.place(self.at, span)
    }

    /// `(1.2 N·m at 2850 rpm, 13.0 A)`: each quantity goes to the column of its kind.
    fn pairs(&self, pairs: &[Pair]) -> Option<Table> {
        let mut table = Table::default();
        let mut rows: Vec<BTreeMap<&'static str, f64>> = Vec::new();
        for pair in pairs {
            let mut row = BTreeMap::new();
            for expr in &pair.values {
                let found = self.eval.quantity(expr, Reading::plain(self.at)).filter(Quantity::is_known)?;
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

    pub(super) fn heads(&self, columns: &[Column]) -> Option<Heads> {
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
        Some(Some((**unit).clone()))
    }

    pub(super) fn empty(&self, heads: &Heads, conditions: &[Expr]) -> Option<Table> {
        let columns = heads.iter().map(|(row, _)| (row.name, Vec::new())).collect();
        let mut at = Vec::new();
        for expr in conditions {
            let found = self.eval.quantity(expr, Reading::plain(self.at)).filter(Quantity::is_known)?;
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
    pub(super) fn sorted(&self, table: Table, places: &[(FileSpan, String)]) -> Option<Table> {
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
}

pub(super) fn to_si(head: &(&'static ColumnRow, Option<Unit>), value: f64) -> f64 {
    head.1.as_ref().map_or(value, |unit| unit.to_si(value))
}

fn cells(count: usize) -> String {
    if count == 1 { "1 cell".to_owned() } else { format!("{count} cells") }
}
