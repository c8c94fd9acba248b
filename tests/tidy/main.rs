//! Tidy: what the house promises about itself, checked.
//!
//! Each check is a function from the text of the repository to a list of complaints. It runs on the repository, which
//! must give none, and on a bad sample, which must give one: a check that cannot fail is no check.

#![allow(clippy::disallowed_methods, reason = "this test reads the repository itself")]

mod arrows;
mod code_map;
mod codes;
mod forbidden;
mod headers;
mod layout;
mod list_places;
mod lists;
mod readme;
mod sizes;
mod tree;
mod words;

use tree::Tree;

/// Fails with every complaint, one a line.
#[track_caller]
fn none(complaints: &[String]) {
    assert!(complaints.is_empty(), "{} complaints:\n{}", complaints.len(), complaints.join("\n"));
}

/// Fails unless there is exactly one complaint and it says `words`.
#[track_caller]
fn one(complaints: &[String], words: &str) {
    assert!(
        complaints.len() == 1 && complaints[0].contains(words),
        "wanted one complaint with `{words}`, got: {complaints:#?}"
    );
}

#[test]
fn the_repository_is_read() {
    let tree = Tree::of_the_repository();
    assert!(tree.rust().count() > 50, "only {} source files found", tree.rust().count());
    for path in ["Cargo.toml", "README.md", "DEVELOPERS.md", "tests/tidy/main.rs", "grammar/layshaft.ebnf"] {
        assert!(tree.text(path).is_some(), "{path} was not found");
    }
}
