//! Curves in CSV files.

use std::rc::Rc;

use layshaft_diagnostics::{Code, Diagnostic, FileSpan};
use layshaft_mechanics::values::Table;
use layshaft_syntax::Csv;

use super::table::{Heads, MOST_ROWS, Reader, Rows, to_si};

impl Reader<'_, '_> {
    pub(super) fn csv(&self, csv: &Csv) -> Option<Table> {
        let place = self.span(csv.path.span);
        let from = &self.eval.shared.world.files[self.at.file as usize].path;
        let path = match crate::load::beside(from, &csv.path.value) {
            Ok(path) => path,
            // An empty path has been said by the reader.
            Err(_) if csv.path.value.is_empty() => return None,
            Err(why) => {
                self.eval.report(Diagnostic::new(Code::MissingFile, place, why));
                return None;
            }
        };
        let rows = self.rows(&path, place)?;
        let rows = match &*rows {
            Ok(rows) => rows,
            Err(Unread::TooLong) => {
                let message = format!("`{path}` has more than {MOST_ROWS} rows");
                let help = "keep the rows that shape the curve: straight lines stand between them";
                self.eval.report(Diagnostic::new(Code::TooLarge, place, message).help(help));
                return None;
            }
            Err(Unread::Row(line)) => {
                let row = line.map(|line| format!(", line {line}")).unwrap_or_default();
                let why = "the row cannot be read as comma-separated values";
                self.eval.report(self.refuse(place, format!("`{path}`{row}: {why}")));
                return None;
            }
        };
        let (heads, from) = self.csv_heads(csv, rows, &path, place)?;
        let mut table = self.empty(&heads, &csv.at)?;
        let mut places = Vec::new();
        for Row { line, cells: row } in rows.iter().skip(1) {
            if row.iter().all(|cell| cell.trim().is_empty()) {
                continue;
            }
            let named = format!("`{path}`, line {line}");
            let wide = rows.first().map_or(0, |head| head.cells.len());
            if row.iter().skip(wide).any(|cell| !cell.trim().is_empty()) {
                let message = format!("{named}: {} cells under {wide} headings", row.len());
                self.eval
                    .report(self.refuse(place, message).help(
                        "the decimal sign is the point; a decimal comma makes two cells of one number",
                    ));
                return None;
            }
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
    fn csv_heads(&self, csv: &Csv, rows: &[Row], path: &str, place: FileSpan) -> Option<(Heads, Vec<usize>)> {
        let Some(Row { cells: first, .. }) = rows.first() else {
            self.eval.report(self.refuse(place, format!("`{path}` is empty")));
            return None;
        };
        if csv.columns.is_empty() {
            let wanted: Vec<_> = self
                .columns
                .iter()
                .filter(|row| !row.optional)
                .map(|row| format!("heading as {}", crate::say::column(row)))
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

/// A cell short enough for a message, its control characters taken out.
fn clipped(cell: &str) -> String {
    let clean: String = cell.chars().filter(|c| !c.is_control()).take(40).collect();
    if clean.len() < cell.len() { format!("{clean}…") } else { clean }
}

/// A row of a file.
#[derive(Debug)]
pub(super) struct Row {
    /// Its line, counted from 1; comments and blank lines count.
    line: u64,
    /// Its cells.
    cells: Vec<String>,
}

/// Why the rows of a file could not be had.
#[derive(Debug)]
pub(super) enum Unread {
    /// More than [`MOST_ROWS`].
    TooLong,
    /// A row that is none, by its line where that is known.
    Row(Option<usize>),
}

/// Counts lines as records are read from front to back.
struct Lines<'a> {
    text: &'a str,
    byte: usize,
    line: u64,
}

impl Lines<'_> {
    /// The line of the record that begins at or behind `byte`: the reader counts blank lines and comments to it.
    fn at(&mut self, byte: usize) -> u64 {
        let bytes = self.text.as_bytes();
        let passed = bytes.get(self.byte..byte.min(bytes.len())).unwrap_or(&[]);
        self.line += passed.iter().filter(|byte| **byte == b'\n').count() as u64;
        self.byte = byte.min(bytes.len());
        while let Some(rest) = self.text.get(self.byte..) {
            let line = rest.split_inclusive('\n').next().unwrap_or("");
            let skipped = line.ends_with('\n') && (line.trim().is_empty() || line.starts_with('#'));
            if !skipped {
                break;
            }
            self.byte += line.len();
            self.line += 1;
        }
        self.line
    }
}

/// The separator is the one the line of headings has most of: comma, semicolon or tab.
fn parse_csv(text: &str) -> Result<Vec<Row>, Unread> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    let first = text.lines().find(|line| !line.starts_with('#') && !line.is_empty()).unwrap_or("");
    let count = |mark: char| first.matches(mark).count();
    let delimiter = [',', ';', '\t'].into_iter().max_by_key(|mark| count(*mark)).unwrap_or(',');
    let mut reader = csv::ReaderBuilder::new()
        .has_headers(false)
        .flexible(true)
        .delimiter(delimiter as u8)
        .comment(Some(b'#'))
        .from_reader(text.as_bytes());
    let mut rows = Vec::new();
    let mut lines = Lines { text, byte: 0, line: 1 };
    for record in reader.records() {
        if rows.len() > MOST_ROWS {
            return Err(Unread::TooLong);
        }
        match record {
            Ok(record) => rows.push(Row {
                line: lines.at(record.position().map_or(0, |position| position.byte() as usize)),
                cells: record.iter().map(str::to_owned).collect(),
            }),
            Err(error) => {
                let line = error.position().map(|position| position.line() as usize);
                return Err(Unread::Row(line));
            }
        }
    }
    Ok(rows)
}
