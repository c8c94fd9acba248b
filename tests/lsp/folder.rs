//! Files of a test's own.

#![allow(clippy::disallowed_methods, reason = "these tests write files of their own")]

use std::fs;
use std::path::PathBuf;

/// A folder of its own for a test.
pub struct Folder(PathBuf);

impl Folder {
    /// An empty folder.
    pub fn new(name: &str) -> Self {
        let path = std::env::temp_dir().join(format!("layshaft-lsp-{name}-{}", std::process::id()));
        let _ = fs::remove_dir_all(&path);
        fs::create_dir_all(&path).expect("a folder for the test");
        Self(fs::canonicalize(path).expect("it is there"))
    }

    /// Writes a file; its name for the server.
    pub fn write(&self, name: &str, text: &str) -> String {
        let path = self.0.join(name);
        if let Some(folder) = path.parent() {
            fs::create_dir_all(folder).expect("a folder for the test");
        }
        fs::write(path, text).expect("a file for the test");
        self.uri(name)
    }

    /// Takes a file away.
    pub fn remove(&self, name: &str) {
        fs::remove_file(self.0.join(name)).expect("it was written");
    }

    /// The name of a file for the server.
    pub fn uri(&self, name: &str) -> String {
        format!("file://{}/{name}", self.0.display())
    }
}

impl Drop for Folder {
    fn drop(&mut self) {
        let _ = fs::remove_dir_all(&self.0);
    }
}
