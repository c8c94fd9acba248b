//! The command line: declared once; help, completions and the man page come from here.

use std::path::PathBuf;

use clap::{Parser, Subcommand, ValueEnum};

/// Unit-checked specs for powertrains: operating points, peak power, margins and verdicts
///
/// A spec (a .shaft file) names a source, what stands between, a load, and the criteria the drive has to meet.
/// `layshaft check` solves it in every case and says whether each criterion holds.
#[derive(Debug, Parser)]
#[command(name = "layshaft", version, max_term_width = 100, arg_required_else_help = true)]
#[command(after_help = "Begin with `layshaft new NAME`, then `layshaft check NAME.shaft`.")]
pub struct Args {
    /// When to use colour; `auto` means on a terminal, unless NO_COLOR is set
    #[arg(long, value_name = "WHEN", default_value = "auto", global = true)]
    pub color: Color,
    /// What to do
    #[command(subcommand)]
    pub command: Command,
}

/// When to use colour.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum Color {
    /// On a terminal, unless NO_COLOR is set
    Auto,
    /// Always
    Always,
    /// Never
    Never,
}

/// How results are written.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum Format {
    /// Tables and findings for a reader
    Text,
    /// One JSON document, schema check/1
    Json,
}

/// What to do.
#[derive(Debug, Subcommand)]
pub enum Command {
    /// Solve specs in every case and judge their criteria
    ///
    /// Prints for each spec the operating points of every drive in every case, what is assumed, the criteria with
    /// their margins and governing cases, and the findings with what to write instead.
    #[command(after_help = CHECK_EXIT)]
    Check {
        /// Specs, or folders that are searched for .shaft files; `-` is standard input
        #[arg(value_name = "PATH", default_value = ".")]
        paths: Vec<PathBuf>,
        /// How results are written
        #[arg(long, default_value = "text")]
        format: Format,
    },
    /// Write specs in their one form
    ///
    /// An item with a syntax error stays as it is. A file is replaced whole or not at all.
    #[command(after_help = FMT_EXIT)]
    Fmt {
        /// Specs, or folders that are searched for .shaft files; `-` takes standard input to standard output
        #[arg(value_name = "PATH", default_value = ".")]
        paths: Vec<PathBuf>,
        /// Change nothing; name the files that would change
        #[arg(long)]
        check: bool,
    },
    /// Explain a code, with a wrong and a right example; without a code, list all
    Explain {
        /// The code, as it stands in brackets before a message: kind-mismatch
        code: Option<String>,
    },
    /// List the units; with a kind of quantity, those it is usually given in
    Units {
        /// A kind of quantity: torque, rotational_speed
        kind: Option<String>,
    },
    /// List the kinds of parts; with a name, its fields, results, formulas and an example
    Kinds {
        /// A kind of part: induction_motor, gear, hoist
        name: Option<String>,
    },
    /// Write a commented spec to begin with; never over a file that is there
    New {
        /// Name of the spec; `.shaft` is added where it is missing
        name: PathBuf,
    },
    /// Serve an editor over standard input and output, by the Language Server Protocol
    Lsp {
        /// Standard input and output, as without it; some editors add it
        #[arg(long)]
        stdio: bool,
    },
    /// Print completions for a shell
    Completions {
        /// The shell
        shell: clap_complete::Shell,
    },
    /// Print the man page of the command, or of one of its subcommands
    Man {
        /// A subcommand: check
        command: Option<String>,
    },
}

const CHECK_EXIT: &str = "Exit status:\n  \
    0  every criterion holds\n  \
    1  a criterion fails\n  \
    2  a spec has errors, or something is not judged\n  \
    3  wrong usage, or a file that cannot be read\n\
    Where several apply, the highest counts.";

const FMT_EXIT: &str = "Exit status:\n  \
    0  every spec is in its form\n  \
    1  with --check: a spec would change\n  \
    2  a spec has items with syntax errors, which were left as they are\n  \
    3  wrong usage, or a file that cannot be read or written\n\
    Where several apply, the highest counts.";

#[cfg(test)]
mod tests {
    use clap::CommandFactory;

    #[test]
    fn the_command_line_is_sound() {
        super::Args::command().debug_assert();
    }
}
