//! The top level of the repository: what a newcomer sees first is a short, fixed list.

use std::collections::BTreeSet;

use crate::tree::Tree;
use crate::{none, one};

/// What may stand at the top, beside names that begin with a dot.
const TOP: &[&str] = &[
    "Cargo.toml",
    "Cargo.lock",
    "README.md",
    "DEVELOPERS.md",
    "LICENSE",
    "crates",
    "editors",
    "grammar",
    "tests",
];
/// Those that must stand there.
const NEEDED: &[&str] =
    &["Cargo.toml", "Cargo.lock", "README.md", "DEVELOPERS.md", "LICENSE", "crates", "grammar", "tests"];

fn complaints(tree: &Tree) -> Vec<String> {
    let top: BTreeSet<&str> = tree.files().filter_map(|(path, _)| path.split('/').next()).collect();
    let strange = top.iter().filter(|name| !name.starts_with('.') && !TOP.contains(*name));
    let missing = NEEDED.iter().filter(|name| !top.contains(*name));
    let strange = strange.map(|name| format!("`{name}` does not belong at the top level"));
    strange.chain(missing.map(|name| format!("`{name}` is missing from the top level"))).collect()
}

#[test]
fn the_top_level_is_the_agreed_list() {
    none(&complaints(&Tree::of_the_repository()));
}

#[test]
fn a_stray_or_missing_file_at_the_top_is_seen() {
    let mut files: Vec<(&str, &str)> = NEEDED.iter().map(|name| (*name, "")).collect();
    files.push((".gitignore", ""));
    none(&complaints(&Tree::sample(&files)));
    files.push(("notes/today.md", ""));
    one(&complaints(&Tree::sample(&files)), "`notes` does not belong");
    files.pop();
    files.retain(|file| file.0 != "LICENSE");
    one(&complaints(&Tree::sample(&files)), "`LICENSE` is missing");
}
