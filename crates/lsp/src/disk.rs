//! The disk as the server needs it. The command brings it along, so that both read by the same rules.

use std::path::{Path, PathBuf};
use std::sync::Arc;

use layshaft_ide::base::ReadError;

/// Where a file stands: its root, and its path below it.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Place {
    /// The folder that the spec may read from, no links in it.
    pub root: PathBuf,
    /// Path below the root, `/` between names.
    pub path: String,
}

impl Place {
    /// The whole path.
    #[must_use]
    pub fn whole(&self) -> PathBuf {
        below(&self.root, &self.path)
    }
}

/// A path below a root, `.` left out.
#[must_use]
pub fn below(root: &Path, path: &str) -> PathBuf {
    let mut whole = root.to_path_buf();
    whole.extend(path.split('/').filter(|name| !name.is_empty() && *name != "."));
    whole
}

/// Changes when a file does: its length and time of change.
pub type Stamp = (u64, u128);

/// Files and folders, by the rules of the command.
pub trait Disk: Send {
    /// Where a file stands; none where its folder cannot be reached.
    fn place(&self, file: &Path) -> Option<Place>;

    /// The text of a file below a root.
    ///
    /// # Errors
    /// Says why there is none.
    fn read(&self, root: &Path, path: &str) -> Result<Arc<str>, ReadError>;

    /// Tells whether a file is still the one that was read; none where there is none.
    fn stamp(&self, root: &Path, path: &str) -> Option<Stamp>;

    /// The specs below a folder, sorted.
    fn specs(&self, folder: &Path) -> Vec<PathBuf>;

    /// What a folder below a root holds, sorted: each name, and whether it is a folder.
    fn list(&self, root: &Path, folder: &str) -> Vec<(String, bool)>;

    /// Whether a process runs; none where that cannot be told.
    fn runs(&self, process: u32) -> Option<bool>;
}
