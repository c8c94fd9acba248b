//! `layshaft check`: analyzes specs and prints what came of them.

use std::path::{Path, PathBuf};
use std::sync::Arc;

use layshaft_report::json::{Checked, document};
use layshaft_report::terminal::{Options, render};
use layshaft_semantics::analysis::Verdict;
use layshaft_semantics::files::ReadError;
use layshaft_semantics::{Analysis, analyze};

use crate::args::Format;
use crate::files::{self, Root};
use crate::inputs::{Input, STDIN, from_here, inputs, shown};
use crate::output::{Exit, Output};

/// An analysis with the paths to show for its files.
struct Spec {
    analysis: Analysis,
    names: Vec<String>,
}

/// Runs the command.
pub fn check(paths: &[PathBuf], format: Format, out: &mut Output) -> Exit {
    let (inputs, mut exit) = inputs(paths, out);
    let mut tally = Tally::default();
    let mut checked = Vec::new();
    let mut unread = Vec::new();
    for input in &inputs {
        if out.is_closed() {
            return exit;
        }
        match read(input) {
            Ok(spec) => {
                exit = exit.max(verdict(&spec.analysis));
                tally.count(&spec.analysis);
                match format {
                    Format::Text => show(&spec, checked_before(&tally), out),
                    Format::Json => checked.push(spec),
                }
            }
            Err((name, why)) => {
                let reason = files::reason(&why);
                out.message(&format!("{name} {reason}"));
                unread.push((name, reason));
                exit = Exit::Unusable;
            }
        }
    }
    match format {
        Format::Text => out.result(&tally.line()),
        Format::Json => {
            let specs: Vec<Checked<'_>> =
                checked.iter().map(|spec| Checked { analysis: &spec.analysis, names: &spec.names }).collect();
            out.result(&document(&specs, &unread));
        }
    }
    exit
}

fn checked_before(tally: &Tally) -> bool {
    tally.specs > 1
}

fn show(spec: &Spec, not_first: bool, out: &mut Output) {
    if not_first {
        out.result("\n");
    }
    let options = Options { style: out.style(), width: out.width(), names: spec.names.clone() };
    out.result(&render(&spec.analysis, &options));
}

/// Reads and analyzes; else the name to show and why not.
fn read(input: &Input) -> Result<Spec, (String, ReadError)> {
    match input {
        Input::Stdin => {
            let text = files::read_stdin().map_err(|why| (String::from("standard input"), why))?;
            let root = root(Path::new(".")).map_err(|why| (String::from("the current folder"), why))?;
            Ok(analyzed(STDIN, text, &root))
        }
        Input::File(path) => {
            let name = || shown(path);
            let text = files::read(path).map_err(|why| (name(), why))?;
            let folder =
                path.parent().filter(|folder| !folder.as_os_str().is_empty()).unwrap_or(Path::new("."));
            let root = root(folder).map_err(|why| (name(), why))?;
            let file = path.file_name().unwrap_or_default();
            // By its name alone where it has no path in Unicode.
            let own = root.below(folder, file).unwrap_or_else(|| file.to_string_lossy().into_owned());
            let mut spec = analyzed(&own, text, &root);
            if let Some(first) = spec.names.first_mut() {
                *first = name();
            }
            Ok(spec)
        }
    }
}

fn root(folder: &Path) -> Result<Root, ReadError> {
    Root::of(folder).map_err(|error| ReadError::Other(error.to_string()))
}

fn analyzed(path: &str, text: String, root: &Root) -> Spec {
    let analysis = analyze(path, Arc::from(text), root);
    let here = files::here();
    let name = |file: &layshaft_semantics::analysis::SourceFile| match file.path.as_str() {
        STDIN => String::from(STDIN),
        path => from_here(root, path, &here),
    };
    let names = analysis.files.iter().map(name).collect();
    Spec { analysis, names }
}

/// The exit status one spec asks for.
fn verdict(analysis: &Analysis) -> Exit {
    match analysis.verdict() {
        _ if analysis.has_errors() => Exit::Errors,
        _ if analysis.criteria.iter().any(|criterion| criterion.verdict == Verdict::NotJudged) => {
            Exit::Errors
        }
        Some(Verdict::Fails) => Exit::Fails,
        _ => Exit::Holds,
    }
}

/// How many specs came out how.
#[derive(Debug, Default)]
struct Tally {
    specs: usize,
    fail: usize,
    broken: usize,
}

impl Tally {
    fn count(&mut self, analysis: &Analysis) {
        self.specs += 1;
        match verdict(analysis) {
            Exit::Holds => {}
            Exit::Fails => self.fail += 1,
            _ => self.broken += 1,
        }
    }

    /// The last line where there are several specs; empty for one, whose own last line says it.
    fn line(&self) -> String {
        if self.specs < 2 {
            return String::new();
        }
        let hold = self.specs - self.fail - self.broken;
        let mut words = vec![format!("{hold} without a failure")];
        if self.fail > 0 {
            words.push(format!("{} with a criterion that fails", self.fail));
        }
        if self.broken > 0 {
            words.push(format!("{} with errors or something not judged", self.broken));
        }
        format!("\n{} specs: {}\n", self.specs, words.join(", "))
    }
}
