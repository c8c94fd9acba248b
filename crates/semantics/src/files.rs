//! The door through which texts come in; this crate opens no file itself.

use std::sync::Arc;

/// Why a file could not be had.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum ReadError {
    /// Nothing is there.
    Missing,
    /// It lies outside the folder that a spec may read from.
    Outside,
    /// It is larger than the limit in bytes.
    TooLarge(u64),
    /// Not UTF-8; the offset of the first bad byte.
    NotText(usize),
    /// The system's own words.
    Other(String),
}

/// Hands out texts by their path, relative to the root, with `/` between names.
///
/// Implementations keep to the root: no `..`, no absolute path, no link out of it.
pub trait Files {
    /// The text of a file.
    ///
    /// # Errors
    /// Says why there is none.
    fn read(&self, path: &str) -> Result<Arc<str>, ReadError>;

    /// Whether nobody wants the analysis any more. It is asked between drives and cases; from then on nothing is solved,
    /// and what comes out is good for nothing: whoever says so here must throw it away.
    fn interrupted(&self) -> bool {
        false
    }
}

/// No files at all: a spec from standard input or an unsaved document.
#[derive(Clone, Copy, Debug, Default)]
pub struct NoFiles;

impl Files for NoFiles {
    fn read(&self, _path: &str) -> Result<Arc<str>, ReadError> {
        Err(ReadError::Missing)
    }
}

/// Files in memory, for tests and for editors.
#[derive(Clone, Debug, Default)]
pub struct MemoryFiles {
    /// Path and text.
    pub texts: std::collections::BTreeMap<String, Arc<str>>,
}

impl Files for MemoryFiles {
    fn read(&self, path: &str) -> Result<Arc<str>, ReadError> {
        self.texts.get(path).cloned().ok_or(ReadError::Missing)
    }
}
