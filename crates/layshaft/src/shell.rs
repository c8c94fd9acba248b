//! Completions and the man page, made from the command line's own declaration.

use clap::CommandFactory;

use crate::args::Args;
use crate::output::{Exit, Output};

/// Prints completions for a shell.
pub fn completions(shell: clap_complete::Shell, out: &mut Output) -> Exit {
    let mut bytes = Vec::new();
    clap_complete::generate(shell, &mut Args::command(), "layshaft", &mut bytes);
    out.result(&String::from_utf8_lossy(&bytes));
    Exit::Holds
}

/// Prints the man page of the command, or of one of its subcommands.
pub fn man(name: Option<&str>, out: &mut Output) -> Exit {
    let mut command = Args::command();
    command.build();
    let page = match name {
        None => Some(command),
        Some(name) => command.find_subcommand(name).cloned(),
    };
    let Some(page) = page else {
        out.message(&format!(
            "there is no command `{}`; `layshaft help` lists all",
            name.unwrap_or_default()
        ));
        return Exit::Unusable;
    };
    let mut bytes = Vec::new();
    if let Err(error) = clap_mangen::Man::new(page).render(&mut bytes) {
        out.message(&format!("the man page cannot be made: {error}"));
        return Exit::Unusable;
    }
    out.result(&String::from_utf8_lossy(&bytes));
    Exit::Holds
}
