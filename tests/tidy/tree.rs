//! The files of the repository as one map, so that a check can be fed a made-up one.

use std::collections::BTreeMap;
use std::fs;
use std::path::{Path, PathBuf};

/// Paths from the top of the repository, `/` between names, with their text.
pub struct Tree {
    files: BTreeMap<String, String>,
}

impl Tree {
    /// The files of this repository, without what `.gitignore` leaves out. Files that are not text are in it with
    /// an empty one.
    pub fn of_the_repository() -> Self {
        let root = root();
        let ignored = fs::read_to_string(root.join(".gitignore")).expect("the repository has a .gitignore");
        let ignored: Vec<&str> = ignored.lines().map(str::trim).filter(|line| !line.is_empty()).collect();
        let mut files = BTreeMap::new();
        collect(&root, "", &ignored, &mut files);
        Self { files }
    }

    /// A made-up repository.
    pub fn sample(files: &[(&str, &str)]) -> Self {
        let owned = |(path, text): &(&str, &str)| (String::from(*path), String::from(*text));
        Self { files: files.iter().map(owned).collect() }
    }

    /// Every file.
    pub fn files(&self) -> impl Iterator<Item = (&str, &str)> {
        self.files.iter().map(|(path, text)| (path.as_str(), text.as_str()))
    }

    /// Every Rust source.
    pub fn rust(&self) -> impl Iterator<Item = (&str, &str)> {
        self.files().filter(|(path, _)| path.ends_with(".rs"))
    }

    /// The text of a file.
    pub fn text(&self, path: &str) -> Option<&str> {
        self.files.get(path).map(String::as_str)
    }

    /// Whether a file or a folder of this path is there.
    pub fn has(&self, path: &str) -> bool {
        let path = path.trim_end_matches('/');
        self.files.contains_key(path) || self.below(path).next().is_some()
    }

    /// The files below a folder, their paths from there.
    pub fn below<'a>(&'a self, folder: &'a str) -> impl Iterator<Item = (&'a str, &'a str)> {
        let inside = move |path: &'a str| path.strip_prefix(folder)?.strip_prefix('/');
        self.files().filter_map(move |(path, text)| Some((inside(path)?, text)))
    }
}

/// The top of the repository.
pub fn root() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).parent().expect("the tests stand in a folder of it").to_path_buf()
}

fn collect(folder: &Path, prefix: &str, ignored: &[&str], files: &mut BTreeMap<String, String>) {
    for entry in fs::read_dir(folder).expect("a folder of the repository can be listed") {
        let entry = entry.expect("a folder of the repository can be listed");
        let name = entry.file_name().into_string().expect("names are Unicode");
        let path = format!("{prefix}{name}");
        if path == ".git" || is_ignored(&path, &name, ignored) {
            continue;
        }
        if entry.file_type().expect("its type is known").is_dir() {
            collect(&entry.path(), &format!("{path}/"), ignored, files);
        } else {
            let bytes = fs::read(entry.path()).expect("a file of the repository can be read");
            files.insert(path, String::from_utf8(bytes).unwrap_or_default());
        }
    }
}

/// The part of the rules of `.gitignore` that this repository uses: `/path`, `name`, `*.ending`.
fn is_ignored(path: &str, name: &str, ignored: &[&str]) -> bool {
    ignored.iter().any(|rule| match (rule.strip_prefix('/'), rule.strip_prefix('*')) {
        (Some(from_top), _) => path == from_top.trim_end_matches('/'),
        (_, Some(ending)) => name.ends_with(ending),
        _ => name == rule.trim_end_matches('/'),
    })
}

#[test]
fn what_git_ignores_is_left_out() {
    let rules = ["/target", "node_modules", "*.snap.new"];
    assert!(is_ignored("target", "target", &rules));
    assert!(!is_ignored("crates/target", "target", &rules));
    assert!(is_ignored("editors/x/node_modules", "node_modules", &rules));
    assert!(is_ignored("tests/a.snap.new", "a.snap.new", &rules));
    assert!(!is_ignored("tests/a.snap", "a.snap", &rules));
}

#[test]
fn folders_count_as_there() {
    let tree = Tree::sample(&[("crates/units/src/lib.rs", "")]);
    assert!(tree.has("crates/units") && tree.has("crates/units/") && tree.has("crates/units/src/lib.rs"));
    assert!(!tree.has("crates/unit") && !tree.has("crates/units/src/lib"));
}
