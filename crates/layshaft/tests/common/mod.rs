//! Runs the real command in a folder of its own.

#![allow(clippy::disallowed_methods, reason = "tests of the command prepare files")]
#![allow(dead_code, reason = "each test uses what it needs")]

use std::ffi::OsStr;
use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Output, Stdio};
use std::sync::atomic::{AtomicU32, Ordering};

/// A folder that goes away with its test.
pub struct Folder(PathBuf);

static NEXT: AtomicU32 = AtomicU32::new(0);

impl Folder {
    pub fn new() -> Self {
        let name = format!("layshaft-test-{}-{}", std::process::id(), NEXT.fetch_add(1, Ordering::Relaxed));
        let path = std::env::temp_dir().join(name);
        std::fs::create_dir_all(&path).expect("a folder for the test");
        Self(std::fs::canonicalize(path).expect("its real path"))
    }

    pub fn path(&self) -> &Path {
        &self.0
    }

    /// Writes a file, with the folders above it.
    pub fn file(&self, name: &str, text: impl AsRef<[u8]>) -> PathBuf {
        let path = self.0.join(name);
        std::fs::create_dir_all(path.parent().expect("a parent")).expect("folders");
        std::fs::write(&path, text).expect("a file");
        path
    }

    pub fn read(&self, name: &str) -> String {
        std::fs::read_to_string(self.0.join(name)).expect("a text")
    }

    /// Names in the folder.
    pub fn names(&self) -> Vec<String> {
        let entries = std::fs::read_dir(&self.0).expect("a folder");
        let mut names: Vec<String> = entries
            .map(|entry| entry.expect("an entry").file_name().to_string_lossy().into_owned())
            .collect();
        names.sort();
        names
    }

    /// Runs `layshaft` here.
    pub fn run<S: AsRef<OsStr>>(&self, args: impl IntoIterator<Item = S>) -> Ran {
        self.run_with(args, b"", &[])
    }

    /// Runs `layshaft` here with a standard input and variables.
    pub fn run_with<S: AsRef<OsStr>>(
        &self,
        args: impl IntoIterator<Item = S>,
        input: &[u8],
        variables: &[(&str, &str)],
    ) -> Ran {
        let mut command = Command::new(env!("CARGO_BIN_EXE_layshaft"));
        command.args(args).current_dir(&self.0).env_remove("NO_COLOR");
        command.envs(variables.iter().copied());
        command.stdin(Stdio::piped()).stdout(Stdio::piped()).stderr(Stdio::piped());
        let mut child = command.spawn().expect("the command runs");
        // The command may end without reading its input.
        let _ = child.stdin.take().expect("its input").write_all(input);
        Ran::new(&child.wait_with_output().expect("its output"))
    }
}

impl Drop for Folder {
    fn drop(&mut self) {
        let _ = std::fs::remove_dir_all(&self.0);
    }
}

/// What came out.
#[derive(Debug)]
pub struct Ran {
    pub code: Option<i32>,
    pub out: String,
    pub err: String,
}

impl Ran {
    pub fn new(output: &Output) -> Self {
        Self {
            code: output.status.code(),
            out: String::from_utf8(output.stdout.clone()).expect("UTF-8 on standard output"),
            err: String::from_utf8(output.stderr.clone()).expect("UTF-8 on standard error"),
        }
    }
}

/// Whether a text may go to a terminal: no control character but line ends, no turned or hidden text.
pub fn is_harmless(text: &str) -> bool {
    let bad = |c: char| {
        (c.is_control() && c != '\n')
            || matches!(c, '\u{200b}' | '\u{200e}' | '\u{200f}' | '\u{2028}'..='\u{202e}' | '\u{2066}'..='\u{2069}' | '\u{feff}')
    };
    !text.chars().any(bad)
}

/// A drive with a criterion that asks for `least` as a speed; it runs at 600 rpm.
pub fn spec(least: &str) -> String {
    format!(
        "title \"Fan\"\n\
         source motor: straight_line {{ stall_torque = 10 N·m; no_load_speed = 1200 rpm }}\n\
         load fan: constant {{ torque = 5 N·m }}\n\
         drive run = motor -> fan {{ direction = forward }}\n\
         require \"1 speed\" run.speed >= {least}\n"
    )
}
