//! `layshaft kinds`: what a part can be, and what is asked of each.

use layshaft_mechanics::registry::{self, Field, Formula, KindRow, ResultRow, Role};
use layshaft_present::kind;
use layshaft_present::sheet::role_word;
use layshaft_report::terminal::{Align, Cell, Column, Grid, Style, Tone, wrap};

use crate::output::{Exit, Output};

const ROLES: [Role; 4] = [Role::Supply, Role::Source, Role::Transmission, Role::Load];

/// Runs the command.
pub fn kinds(name: Option<&str>, out: &mut Output) -> Exit {
    let Some(name) = name else {
        out.result(&list(out));
        return Exit::Holds;
    };
    let found: Vec<&KindRow> = registry::rows().iter().copied().filter(|row| row.name == name).collect();
    if found.is_empty() {
        let hint = match layshaft_units::closest(name, registry::rows().iter().map(|row| row.name)) {
            Some(close) => format!("did you mean `{close}`?"),
            None => String::from("`layshaft kinds` lists all"),
        };
        out.message(&format!("there is no kind of part `{name}`; {hint}"));
        return Exit::Unusable;
    }
    let pages: Vec<String> = found.iter().map(|row| page(row, out)).collect();
    out.result(&pages.join("\n"));
    Exit::Holds
}

fn column(head: &str) -> Column {
    Column { head: vec![head.into()], align: Align::Text }
}

fn list(out: &Output) -> String {
    let mut text = String::new();
    for role in ROLES {
        let rows = registry::rows().iter().filter(|row| row.role == role);
        let grid = Grid {
            columns: vec![column(role_word(role)), column("")],
            rows: rows.map(|row| vec![Cell::plain(row.name), Cell::plain(row.title)]).collect(),
        };
        if !grid.rows.is_empty() {
            text.push_str(&grid.render(out.width(), out.style()));
            text.push('\n');
        }
    }
    text.push_str("`layshaft kinds NAME` shows the fields, results, formulas and an example of one.\n");
    text
}

fn page(row: &KindRow, out: &Output) -> String {
    let (width, style) = (out.width(), out.style());
    let head = |text: &str| format!("\n{}\n", style.paint(Tone::Strong, text));
    let mut page =
        format!("{} ({}): {}\n", style.paint(Tone::Strong, row.name), role_word(row.role), row.title);
    page.push_str(&lines(row.summary, width));
    page.push_str(&head("Fields"));
    let fields = row.fields.iter().chain(registry::common_fields(row.role));
    fields.for_each(|field| page.push_str(&field_text(field, width, style)));
    page.push_str(&head("Results"));
    let results = registry::common_results(row.role).iter().chain(row.results);
    page.push_str(&result_table(results).render(width, style));
    if !row.formulas.is_empty() {
        page.push_str(&head("Formulas"));
        row.formulas.iter().for_each(|formula| page.push_str(&formula_text(formula, width)));
    }
    if !row.cautions.is_empty() {
        page.push_str(&head("Mind"));
        row.cautions.iter().for_each(|caution| page.push_str(&lines(caution, width)));
    }
    page.push_str(&head("Example"));
    page.push_str(&example(row));
    page
}

/// The example as a declaration; one that brings its own supply is a declaration already.
fn example(row: &KindRow) -> String {
    if row.example.starts_with('{') {
        return format!("  {} part: {} {}\n", role_word(row.role), row.name, row.example);
    }
    row.example.lines().map(|line| format!("  {line}\n")).collect()
}

/// A paragraph with an indent.
fn lines(text: &str, width: usize) -> String {
    wrap(text, width.saturating_sub(2).max(20)).iter().map(|line| format!("  {line}\n")).collect()
}

/// A field: what stands there, whether it is needed, its range; below it, what it means.
fn field_text(field: &Field, width: usize, style: Style) -> String {
    let facts = [kind::shape(field), kind::need(field).to_string(), kind::range(field)];
    let facts: Vec<String> = facts.into_iter().filter(|fact| !fact.is_empty()).collect();
    let meaning = match kind::reason(field) {
        Some(reason) => format!("{}; {reason}", field.meaning),
        None => field.meaning.to_string(),
    };
    let mut text = format!("  {}: {}\n", style.paint(Tone::Strong, field.name), facts.join(", "));
    for line in wrap(&meaning, width.saturating_sub(6).max(20)) {
        text.push_str(&format!("      {line}\n"));
    }
    text
}

fn result_table<'r>(results: impl Iterator<Item = &'r ResultRow>) -> Grid {
    let row = |result: &ResultRow| {
        [result.name.to_string(), kind::result_shape(result), result.meaning.to_string()]
            .map(Cell::plain)
            .to_vec()
    };
    Grid {
        columns: ["result", "what it is", "meaning"].into_iter().map(column).collect(),
        rows: results.map(row).collect(),
    }
}

fn formula_text(formula: &Formula, width: usize) -> String {
    let mut text = format!("  {} = {}\n", formula.name, formula.text);
    for (symbol, kind, meaning) in formula.symbols {
        text.push_str(&format!("    {symbol}: {meaning} ({kind})\n"));
    }
    let about =
        format!("valid for {}; source: {}; revision {}", formula.validity, formula.source, formula.revision);
    for line in wrap(&about, width.saturating_sub(4).max(20)) {
        text.push_str(&format!("    {line}\n"));
    }
    text
}
