//! `layshaft new`: a commented spec to begin with.

use std::path::{Path, PathBuf};

use crate::files::{self, SPEC_ENDING};
use crate::inputs::shown;
use crate::output::{Exit, Output};

/// The spec that is written, `NAME` standing for its title.
const STARTER: &str = include_str!("starter.shaft");

/// Runs the command.
pub fn new(name: &Path, out: &mut Output) -> Exit {
    let path = with_ending(name);
    let Some(stem) = path.file_stem().and_then(|stem| stem.to_str()).filter(|stem| !stem.is_empty()) else {
        out.message(&format!("{} cannot be the name of a spec", name.display()));
        return Exit::Unusable;
    };
    if stem.contains(['"', '\\', '\n']) || stem.chars().any(layshaft_present::escape::is_hostile) {
        out.message("a name with quotes, backslashes or control characters cannot be the title of a spec");
        return Exit::Unusable;
    }
    let shown_path = shown(&path);
    match files::create(&path, &STARTER.replace("NAME", stem)) {
        Ok(()) => {
            let shown_path = layshaft_present::escape::terminal(&shown_path);
            out.result(&format!(
                "{shown_path} written; `layshaft check {shown_path}` solves and judges it\n"
            ));
            Exit::Holds
        }
        Err(error) if error.kind() == std::io::ErrorKind::AlreadyExists => {
            out.message(&format!("{shown_path} is already there and stays as it is; choose another name"));
            Exit::Unusable
        }
        Err(error) => {
            out.message(&format!("{shown_path} cannot be written: {error}"));
            Exit::Unusable
        }
    }
}

/// `pump` becomes `pump.shaft`; `pump.v2` becomes `pump.v2.shaft`.
fn with_ending(name: &Path) -> PathBuf {
    if name.extension().is_some_and(|ending| ending == SPEC_ENDING) {
        return name.to_path_buf();
    }
    let mut path = name.as_os_str().to_owned();
    path.push(".");
    path.push(SPEC_ENDING);
    PathBuf::from(path)
}
