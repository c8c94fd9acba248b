//! Every source file begins by saying what it is.

use crate::tree::Tree;
use crate::{none, one};

fn complaints(tree: &Tree) -> Vec<String> {
    let said = |text: &str| {
        let first = text.lines().next().and_then(|line| line.strip_prefix("//! "));
        first.is_some_and(|words| words.trim().len() >= 8)
    };
    let bad = tree.rust().filter(|(_, text)| !said(text));
    bad.map(|(path, _)| format!("{path} does not begin with a `//!` line that says what it is")).collect()
}

#[test]
fn every_source_says_what_it_is() {
    none(&complaints(&Tree::of_the_repository()));
}

#[test]
fn a_missing_header_is_seen() {
    none(&complaints(&Tree::sample(&[("a.rs", "//! The wheel on the road.\n"), ("a.py", "x = 1\n")])));
    one(&complaints(&Tree::sample(&[("a.rs", "use std::fs;\n//! The wheel on the road.\n")])), "a.rs");
    one(&complaints(&Tree::sample(&[("b.rs", "//! \nfn f() {}\n")])), "b.rs");
    one(&complaints(&Tree::sample(&[("c.rs", "")])), "c.rs");
}
