//! The table of codes and its pages: every code is explained, and every page explains a code.

use std::collections::BTreeSet;

use layshaft_diagnostics::CODES;

use crate::tree::Tree;
use crate::{none, one};

/// Where the pages stand.
const PAGES: &str = "crates/diagnostics/pages";

fn complaints(tree: &Tree, codes: &[&str]) -> Vec<String> {
    let pages: BTreeSet<&str> = tree.below(PAGES).map(|(path, _)| path).collect();
    let mut out = Vec::new();
    for code in codes {
        let page = format!("{code}.md");
        let titled = |text: &str| text.starts_with(&format!("# {code}\n"));
        match tree.text(&format!("{PAGES}/{page}")) {
            None => out.push(format!("the code `{code}` has no page")),
            Some(text) if !titled(text) => out.push(format!("{PAGES}/{page} is not headed `# {code}`")),
            Some(_) => {}
        }
    }
    let orphans =
        pages.iter().filter(|page| page.strip_suffix(".md").is_none_or(|code| !codes.contains(&code)));
    out.extend(orphans.map(|page| format!("{PAGES}/{page} belongs to no code")));
    out
}

#[test]
fn every_code_has_its_page_and_every_page_its_code() {
    let codes: Vec<&str> = CODES.iter().map(|code| code.row().word).collect();
    none(&complaints(&Tree::of_the_repository(), &codes));
}

#[test]
fn codes_are_written_once_and_in_one_way() {
    let mut seen = BTreeSet::new();
    for word in CODES.iter().map(|code| code.row().word) {
        assert!(seen.insert(word), "`{word}` stands in the table twice");
        let plain =
            word.split('-').all(|part| !part.is_empty() && part.bytes().all(|b| b.is_ascii_lowercase()));
        assert!(plain, "`{word}` is not lower-case words joined by hyphens");
    }
}

#[test]
fn a_missing_or_orphan_page_is_seen() {
    let page = |name: &str| format!("{PAGES}/{name}.md");
    let (good, orphan) = (page("cycle"), page("circle"));
    none(&complaints(&Tree::sample(&[(&good, "# cycle\n")]), &["cycle"]));
    one(&complaints(&Tree::sample(&[(&good, "# cycle\n")]), &["cycle", "slips"]), "`slips` has no page");
    one(
        &complaints(&Tree::sample(&[(&good, "# cycle\n"), (&orphan, "")]), &["cycle"]),
        "circle.md belongs to no code",
    );
    one(&complaints(&Tree::sample(&[(&good, "# circle\n")]), &["cycle"]), "is not headed");
}
