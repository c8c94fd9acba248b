//! `layshaft explain`: the page of a code.

use layshaft_diagnostics::{CODES, Code, Severity};
use layshaft_report::terminal::{Align, Cell, Column, Grid};

use crate::output::{Exit, Output};

/// Runs the command.
pub fn explain(code: Option<&str>, out: &mut Output) -> Exit {
    let Some(word) = code else {
        out.result(&list(out));
        return Exit::Holds;
    };
    // As it may be copied from a message.
    let bare = word.trim_start_matches('[').trim_end_matches(']');
    if let Some(code) = Code::from_word(bare) {
        out.result(code.row().page);
        return Exit::Holds;
    }
    let words = CODES.iter().map(|code| code.row().word);
    let hint = match layshaft_units::closest(bare, words) {
        Some(close) => format!("did you mean `{close}`?"),
        None => String::from("`layshaft explain` lists all"),
    };
    out.message(&format!("there is no code `{bare}`; {hint}"));
    Exit::Unusable
}

fn list(out: &Output) -> String {
    let column = |head: &str| Column { head: vec![head.into()], align: Align::Text };
    let row = |code: &Code| {
        let row = code.row();
        let severity = match row.severity {
            Severity::Error => "error",
            Severity::Warning => "warning",
            Severity::Hint => "hint",
        };
        vec![Cell::plain(row.word), Cell::plain(severity), Cell::plain(row.summary)]
    };
    let grid = Grid {
        columns: vec![column("code"), column("severity"), column("what it says")],
        rows: CODES.iter().map(row).collect(),
    };
    grid.render(out.width(), out.style())
}
