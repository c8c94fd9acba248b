//! Words that must not stand in the repository: paths of somebody's machine, registry hosts, work put off.

use crate::tree::Tree;
use crate::{none, one};

/// Written in pieces, so that this file does not complain of itself: a part of the text, and why it is unwanted.
const UNWANTED: &[(&[&str], &str)] = &[
    (&["/wo", "rk/"], "a path of somebody's machine"),
    (&["/tm", "p/"], "a path of somebody's machine"),
    (&["/ho", "me/"], "a path of somebody's machine"),
    (&["/ro", "ot/"], "a path of somebody's machine"),
    (&["../sh", "ared"], "a path outside the repository"),
    (&["crates", ".io"], "a registry host"),
    (&["pypi", ".org"], "a registry host"),
    (&["npmjs", ".com"], "a registry host"),
    (&["npmjs", ".org"], "a registry host"),
    (&["debian", ".org"], "a registry host"),
    (&["to", "do!("], "work put off"),
    (&["unimple", "mented!("], "work put off"),
    (&["#[ig", "nore"], "a test that does not run"),
    (&["FIX", "ME"], "work put off"),
];

/// Lock files name the registry by their format.
const LOCKS: &[&str] = &["Cargo.lock", "package-lock.json"];

fn complaints(tree: &Tree) -> Vec<String> {
    let unwanted: Vec<(String, &str)> = UNWANTED.iter().map(|(parts, why)| (parts.concat(), *why)).collect();
    let mut out = Vec::new();
    for (path, text) in tree.files() {
        if LOCKS.iter().any(|lock| path.rsplit('/').next() == Some(lock)) {
            continue;
        }
        for (line, words) in text.lines().enumerate() {
            let found = unwanted.iter().filter(|(part, _)| words.contains(part.as_str()));
            out.extend(found.map(|(part, why)| format!("{path}:{} has `{part}`, {why}", line + 1)));
        }
    }
    out
}

#[test]
fn no_unwanted_words() {
    none(&complaints(&Tree::of_the_repository()));
}

#[test]
fn every_unwanted_word_is_seen() {
    for (parts, why) in UNWANTED {
        let text = format!("first line\nsee {}x\n", parts.concat());
        one(
            &complaints(&Tree::sample(&[("a.md", &text)])),
            &format!("a.md:2 has `{}`, {why}", parts.concat()),
        );
        none(&complaints(&Tree::sample(&[("tests/Cargo.lock", &text)])));
    }
    none(&complaints(&Tree::sample(&[("a.md", "the work of a template, at home\n")])));
}
