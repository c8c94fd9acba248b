//! The page of one kind.

use std::fmt::Write as _;

use layshaft_mechanics::registry::{
    ColumnRow, Field, Formula, KindRow, ResultRow, Shape, common_fields, common_results,
};
use layshaft_present::kind;
use layshaft_present::sheet::role_word;

use crate::curves::Drawing;

/// Columns of a line of prose.
const WIDTH: usize = 118;

/// The page as Markdown.
pub fn page(row: &KindRow, name: &str, drawing: Option<&Drawing>) -> String {
    let role = role_word(row.role);
    let mut out = format!("# `{}`: {}\n\nA {role}. ", row.name, row.title);
    prose(row.summary, "", &mut out);
    out.push_str("\n## Example\n\n```shaft\n");
    out.push_str(layshaft_syntax::format::format(row.example).text.trim_end());
    out.push_str("\n```\n");
    if let Some(drawing) = drawing {
        let (up, across) = (drawing.up.1, drawing.across.1);
        let names: Vec<&str> = drawing.lines.iter().map(|line| line.name).collect();
        let _ = writeln!(out, "\n![{up} over {across} of the example: {}]({name}.svg)", names.join(", "));
    }
    out.push_str("\n## Fields\n\n");
    fields(row.fields.iter().chain(common_fields(row.role)), &mut out);
    out.push_str("\n## Results\n\n");
    results(row.results.iter(), &mut out);
    let _ = writeln!(
        out,
        "{}What every {role} answers, such as {}, stands on [the page of all kinds](README.md#{role}).",
        if row.results.is_empty() { "" } else { "\n" },
        common_results(row.role)
            .iter()
            .take(3)
            .map(|result| format!("`{}`", result.name))
            .collect::<Vec<_>>()
            .join(", "),
    );
    if !row.formulas.is_empty() {
        out.push_str("\n## Formulas\n");
        row.formulas.iter().for_each(|law| formula(law, &mut out));
    }
    if !row.cautions.is_empty() {
        out.push_str("\n## Mind\n\n");
        row.cautions.iter().for_each(|caution| prose(&format!("- {caution}"), "  ", &mut out));
    }
    out
}

/// Text in lines of at most [`WIDTH`] columns; all but the first begin with `indent`.
fn prose(text: &str, indent: &str, out: &mut String) {
    // What stands in the line already counts.
    let mut column = out.len() - out.rfind('\n').map_or(0, |end| end + 1);
    for word in text.split_whitespace() {
        let length = word.chars().count();
        if column > 0 && column + length + 1 > WIDTH {
            out.push('\n');
            out.push_str(indent);
            column = indent.len();
        } else if column > 0 && !out.ends_with(' ') {
            out.push(' ');
            column += 1;
        }
        out.push_str(word);
        column += length;
    }
    out.push('\n');
}

/// Text that stands in a cell of a table.
fn cell(text: &str) -> String {
    text.replace('|', "\\|")
}

pub fn fields<'f>(fields: impl Iterator<Item = &'f Field>, out: &mut String) {
    out.push_str(
        "| field | what stands there | units | given | range | meaning |\n| --- | --- | --- | --- | --- | --- |\n",
    );
    for field in fields {
        let meaning = match kind::reason(field) {
            Some(reason) => format!("{}; {reason}", field.meaning),
            None => field.meaning.to_string(),
        };
        let (shape, need, range) = (kind::shape(field), kind::need(field), kind::range(field));
        let (shape, units, meaning) = (cell(&shape), units(field), cell(&meaning));
        let _ = writeln!(out, "| `{}` | {shape} | {units} | {need} | {range} | {meaning} |", field.name);
    }
}

/// The units a field is usually given in.
fn units(field: &Field) -> String {
    let of = |kind: &str, most: usize| -> Vec<&'static str> {
        let known = layshaft_units::kind(kind).map_or(&[][..], |kind| kind.units);
        known.iter().copied().filter(|unit| !unit.is_empty()).take(most).collect()
    };
    match field.shape {
        Shape::Quantity(kind) | Shape::OfRated(kind) | Shape::Interval(kind) => of(kind, 3).join(", "),
        Shape::Ratio { diameters: true } => of("length", 3).join(", "),
        Shape::Points(columns) => {
            let column =
                |column: &ColumnRow| of(column.kind, 1).first().map_or("plain", |unit| unit).to_string();
            columns.iter().map(column).collect::<Vec<_>>().join("; ")
        }
        _ => String::new(),
    }
}

pub fn results<'r>(results: impl Iterator<Item = &'r ResultRow>, out: &mut String) {
    let mut results = results.peekable();
    if results.peek().is_none() {
        return;
    }
    out.push_str("| result | what it is | meaning |\n| --- | --- | --- |\n");
    for result in results {
        let shape = kind::result_shape(result);
        let _ = writeln!(out, "| `{}` | {} | {} |", result.name, cell(&shape), cell(result.meaning));
    }
}

fn formula(law: &Formula, out: &mut String) {
    let _ = write!(out, "\n```text\n{} = {}\n```\n\n", law.name, law.text);
    out.push_str("| symbol | kind | meaning |\n| --- | --- | --- |\n");
    for (symbol, kind, meaning) in law.symbols {
        let _ = writeln!(out, "| `{symbol}` | {kind} | {} |", cell(meaning));
    }
    out.push('\n');
    prose(
        &format!("Validity: {}. Source: {}. Revision {}.", law.validity, law.source, law.revision),
        "",
        out,
    );
}
