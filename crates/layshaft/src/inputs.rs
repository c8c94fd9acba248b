//! The specs that a command line means, in a fixed order, with the paths to show for them.

use std::path::{Component, Path, PathBuf};

use crate::files::{self, Root};
use crate::output::{Exit, Output};

/// One text to work on.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Input {
    /// A file, by the path to open.
    File(PathBuf),
    /// Standard input.
    Stdin,
}

/// The name of standard input.
pub const STDIN: &str = "-";

/// Finds the specs: a file is taken as it is, a folder is searched. Sorted by path, none twice. What is not there
/// is said at once.
pub fn inputs(paths: &[PathBuf], out: &mut Output) -> (Vec<Input>, Exit) {
    let mut found = Vec::new();
    let mut exit = Exit::Holds;
    for path in paths {
        if path.as_os_str() == STDIN {
            found.push(Input::Stdin);
        } else if files::is_folder(path) {
            match files::specs_below(path) {
                Ok(specs) if specs.is_empty() => {
                    out.message(&format!("there is no .shaft file below {}", path.display()));
                    exit = Exit::Unusable;
                }
                Ok(specs) => found.extend(specs.into_iter().map(|spec| Input::File(plain(&spec)))),
                Err(error) => {
                    out.message(&format!("{} cannot be searched: {error}", path.display()));
                    exit = Exit::Unusable;
                }
            }
        } else {
            found.push(Input::File(plain(path)));
        }
    }
    found.sort();
    found.dedup();
    (found, exit)
}

/// Without `.` at its beginning.
fn plain(path: &Path) -> PathBuf {
    path.components().filter(|part| *part != Component::CurDir).collect()
}

/// A path as it is shown: `/` between names.
pub fn shown(path: &Path) -> String {
    let text = path.to_string_lossy();
    if std::path::MAIN_SEPARATOR == '\\' { text.replace('\\', "/") } else { text.into_owned() }
}

/// A file below a root as it is shown from `here`: relative where both have a beginning in common.
pub fn from_here(root: &Root, path: &str, here: &Path) -> String {
    let target = root.folder().join(path);
    let common = target.components().zip(here.components()).take_while(|(a, b)| a == b).count();
    if common == 0 {
        return shown(&target);
    }
    let up = here.components().skip(common).map(|_| Component::ParentDir);
    let relative: PathBuf = up.chain(target.components().skip(common)).collect();
    shown(&relative)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn paths_are_shown_plainly() {
        assert_eq!(plain(Path::new("./a/./b.shaft")), Path::new("a/b.shaft"));
        assert_eq!(shown(Path::new("a/b.shaft")), "a/b.shaft");
    }
}
