//! The command. It alone reads the command line, touches files (with [`files`]) and writes to standard output.

mod args;
mod check;
mod explain;
mod files;
mod fmt;
mod inputs;
mod kinds;
mod lsp;
mod new;
mod output;
mod shell;
mod units;

use std::process::ExitCode;

use clap::Parser;

use args::{Args, Command};
use output::{Exit, Output};

/// Room for the deepest spec that the language allows; the system hands it out as it is used.
const STACK: usize = 256 << 20;

fn main() -> ExitCode {
    std::panic::set_hook(Box::new(|panic| {
        eprintln!("layshaft: internal error: {panic}");
        eprintln!(
            "This is a mistake in layshaft, not in your spec. Please report it with the spec that shows it."
        );
    }));
    // A thread of its own, for its stack: an expression within the limits of the language nests deeply, and the stack
    // a system gives the first thread differs. What a panic carries says nothing that the hook has not said.
    match std::thread::Builder::new().stack_size(STACK).spawn(run) {
        Ok(thread) => thread.join().unwrap_or(Exit::Internal).into(),
        Err(_) => std::panic::catch_unwind(run).unwrap_or(Exit::Internal).into(),
    }
}

fn run() -> Exit {
    let args = match Args::try_parse() {
        Ok(args) => args,
        Err(error) => {
            // Nothing is left to be said where even the message cannot be written.
            let _ = error.print();
            return if error.use_stderr() { Exit::Unusable } else { Exit::Holds };
        }
    };
    if matches!(args.command, Command::Lsp { .. }) {
        // Before an output is made: that keeps standard output to itself.
        return lsp::lsp();
    }
    let mut out = Output::new(args.color);
    let exit = match args.command {
        Command::Check { paths, format } => check::check(&paths, format, &mut out),
        Command::Fmt { paths, check } => fmt::fmt(&paths, check, &mut out),
        Command::Explain { code } => explain::explain(code.as_deref(), &mut out),
        Command::Units { kind } => units::units(kind.as_deref(), &mut out),
        Command::Kinds { name } => kinds::kinds(name.as_deref(), &mut out),
        Command::New { name } => new::new(&name, &mut out),
        Command::Lsp { .. } => return lsp::lsp(),
        Command::Completions { shell } => shell::completions(shell, &mut out),
        Command::Man { command } => shell::man(command.as_deref(), &mut out),
    };
    exit.max(out.finish())
}
