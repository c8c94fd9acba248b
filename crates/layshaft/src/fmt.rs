//! `layshaft fmt`: writes specs in their one form.

use std::path::{Path, PathBuf};

use layshaft_diagnostics::LineIndex;
use layshaft_syntax::format::{Formatted, format};

use crate::files;
use crate::inputs::{Input, inputs, shown};
use crate::output::{Exit, Output};

/// Runs the command.
pub fn fmt(paths: &[PathBuf], check: bool, out: &mut Output) -> Exit {
    let (inputs, mut exit) = inputs(paths, out);
    for input in &inputs {
        exit = exit.max(match input {
            Input::Stdin => stdin(check, out),
            Input::File(path) => file(path, check, out),
        });
    }
    exit
}

fn stdin(check: bool, out: &mut Output) -> Exit {
    let text = match files::read_stdin() {
        Ok(text) => text,
        Err(why) => {
            out.message(&format!("standard input {}", files::reason(&why)));
            return Exit::Unusable;
        }
    };
    let formatted = format(&text);
    let left = skipped("standard input", &text, &formatted, out);
    if !check {
        out.result(&formatted.text);
        return left;
    }
    if formatted.text == text { left } else { left.max(Exit::Fails) }
}

fn file(path: &Path, check: bool, out: &mut Output) -> Exit {
    let name = shown(path);
    let text = match files::read(path) {
        Ok(text) => text,
        Err(why) => {
            out.message(&format!("{name} {}", files::reason(&why)));
            return Exit::Unusable;
        }
    };
    let formatted = format(&text);
    let left = skipped(&name, &text, &formatted, out);
    if formatted.text == text {
        return left;
    }
    let name = layshaft_present::escape::terminal(&name).into_owned();
    if check {
        out.result(&format!("{name} would change\n"));
        return left.max(Exit::Fails);
    }
    match files::replace(path, &formatted.text) {
        Ok(()) => {
            out.result(&format!("{name} formatted\n"));
            left
        }
        Err(error) => {
            out.message(&format!("{name} is left as it was: {error}"));
            Exit::Unusable
        }
    }
}

/// Says which items were left as they are.
fn skipped(name: &str, text: &str, formatted: &Formatted, out: &mut Output) -> Exit {
    if formatted.skipped.is_empty() {
        return Exit::Holds;
    }
    let lines = LineIndex::new(text);
    let at: Vec<String> =
        formatted.skipped.iter().take(10).map(|span| lines.human(text, span.start).0.to_string()).collect();
    let more = if formatted.skipped.len() > at.len() { ", …" } else { "" };
    out.message(&format!(
        "{name}: left as it is where the syntax is wrong, at line {}{more}; `layshaft check` says why",
        at.join(", ")
    ));
    Exit::Errors
}
