//! `layshaft lsp`: serves an editor, with the disk of the command.

use std::path::{Path, PathBuf};
use std::sync::Arc;

use layshaft_lsp::disk::{Disk, Place, Stamp};
use layshaft_semantics::files::{Files, ReadError};

use crate::files::{self, Root};
use crate::output::Exit;

/// Runs the command.
pub fn lsp() -> Exit {
    match layshaft_lsp::serve(Box::new(OnDisk)) {
        Ok(0) => Exit::Holds,
        Ok(_) => Exit::Fails,
        Err(error) => {
            eprintln!("layshaft: the server cannot be started: {error}");
            Exit::Internal
        }
    }
}

struct OnDisk;

impl Disk for OnDisk {
    fn place(&self, file: &Path) -> Option<Place> {
        let folder = file.parent()?;
        let root = Root::of(folder).ok()?;
        let path = root.below(folder, file.file_name()?)?;
        Some(Place { root: root.folder().to_path_buf(), path })
    }

    fn read(&self, root: &Path, path: &str) -> Result<Arc<str>, ReadError> {
        Root::at(root).read(path)
    }

    fn stamp(&self, root: &Path, path: &str) -> Option<Stamp> {
        files::stamp(&root.join(path))
    }

    fn specs(&self, folder: &Path) -> Vec<PathBuf> {
        files::specs_below(folder).unwrap_or_default()
    }

    fn list(&self, root: &Path, folder: &str) -> Vec<(String, bool)> {
        Root::at(root).list(folder).unwrap_or_default()
    }

    fn runs(&self, process: u32) -> Option<bool> {
        files::runs(process)
    }
}
