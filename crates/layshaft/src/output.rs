//! Standard output and error: colour, width, a reader that goes away, and the exit status.

use std::io::{self, BufWriter, IsTerminal, Write};
use std::process::ExitCode;

use layshaft_report::terminal::Style;

use crate::args::Color;

/// Columns where the output is no terminal: the same bytes wherever it runs.
const WIDTH: usize = 100;
/// Wider than this a table is hard to follow.
const WIDEST: usize = 140;

/// How the command ends; where several apply, the greatest counts.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Exit {
    /// All is well.
    Holds,
    /// A criterion fails; a spec would be formatted.
    Fails,
    /// A spec has errors or something is not judged.
    Errors,
    /// Wrong usage, or a file that cannot be read or written.
    Unusable,
    /// A mistake in the command itself.
    Internal,
}

impl From<Exit> for ExitCode {
    fn from(exit: Exit) -> Self {
        Self::from(match exit {
            Exit::Holds => 0,
            Exit::Fails => 1,
            Exit::Errors => 2,
            Exit::Unusable => 3,
            Exit::Internal => 70,
        })
    }
}

/// Where results and messages go.
pub struct Output {
    results: BufWriter<io::StdoutLock<'static>>,
    /// What went wrong in writing results; nothing more is written then.
    failed: Option<io::Error>,
    color: Color,
}

impl Output {
    /// Standard output and error.
    pub fn new(color: Color) -> Self {
        Self { results: BufWriter::new(io::stdout().lock()), failed: None, color }
    }

    /// Writes a result.
    pub fn result(&mut self, text: &str) {
        if self.failed.is_none()
            && let Err(error) = self.results.write_all(text.as_bytes())
        {
            self.failed = Some(error);
        }
    }

    /// Writes a message of the command itself, behind the results so far.
    pub fn message(&mut self, text: &str) {
        self.flush();
        // Nothing is left to be said where even the message cannot be written.
        let _ = writeln!(io::stderr().lock(), "layshaft: {}", layshaft_present::escape::terminal(text));
    }

    /// Whether the reader has gone, so that further work would be for nobody.
    pub fn is_closed(&self) -> bool {
        self.failed.is_some()
    }

    /// Colour as asked for.
    pub fn style(&self) -> Style {
        let color = match self.color {
            Color::Always => true,
            Color::Never => false,
            Color::Auto => io::stdout().is_terminal() && !says("NO_COLOR") && !is_dumb(),
        };
        Style { color }
    }

    /// Columns of the terminal, within what can be read.
    pub fn width(&self) -> usize {
        if !io::stdout().is_terminal() {
            return WIDTH;
        }
        terminal_size::terminal_size().map_or(WIDTH, |(width, _)| usize::from(width.0).clamp(20, WIDEST))
    }

    fn flush(&mut self) {
        if self.failed.is_none()
            && let Err(error) = self.results.flush()
        {
            self.failed = Some(error);
        }
    }

    /// Writes out what is left. A reader that went away early is no fault; a full disk is.
    pub fn finish(mut self) -> Exit {
        self.flush();
        match &self.failed {
            Some(error) if error.kind() != io::ErrorKind::BrokenPipe => {
                let text = format!("the output cannot be written: {error}");
                self.message(&text);
                Exit::Unusable
            }
            _ => Exit::Holds,
        }
    }
}

/// Whether a variable is set and not empty.
fn says(name: &str) -> bool {
    std::env::var_os(name).is_some_and(|value| !value.is_empty())
}

fn is_dumb() -> bool {
    std::env::var_os("TERM").is_some_and(|term| term == "dumb")
}
