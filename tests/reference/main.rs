//! The reference pages of the kinds: each is what its registry row gives. `LAYSHAFT_BLESS=1` writes them anew.

#![allow(clippy::disallowed_methods, reason = "this test reads and writes the pages")]

#[path = "../support/mod.rs"]
mod support;

mod chart;
mod curves;
mod index;
mod page;

use std::collections::BTreeMap;
use std::fs;

use layshaft_mechanics::registry::{KindRow, rows};
use layshaft_present::sheet::role_word;

const FOLDER: &str = "../grammar/kinds";

/// The name of a kind's page without its ending; where two roles share a kind's name, with the role before it.
fn page_name(row: &KindRow) -> String {
    match rows().iter().filter(|other| other.name == row.name).count() {
        1 => row.name.to_string(),
        _ => format!("{}_{}", role_word(row.role), row.name),
    }
}

/// Every page and chart by its file name.
fn reference() -> BTreeMap<String, String> {
    let mut files = BTreeMap::new();
    for row in rows() {
        let name = page_name(row);
        let drawn = curves::of(row).and_then(|drawing| chart::svg(&drawing).map(|svg| (drawing, svg)));
        files.insert(format!("{name}.md"), page::page(row, &name, drawn.as_ref().map(|drawn| &drawn.0)));
        files.extend(drawn.map(|(_, svg)| (format!("{name}.svg"), svg)));
    }
    files.insert(String::from("README.md"), index::index());
    files
}

/// The files of the folder as they stand.
fn committed() -> BTreeMap<String, String> {
    let Ok(entries) = fs::read_dir(support::path(FOLDER)) else { return BTreeMap::new() };
    let names = entries
        .map(|entry| entry.expect("a folder can be listed").file_name().to_string_lossy().into_owned());
    names.map(|name| (name.clone(), support::text(&format!("{FOLDER}/{name}")))).collect()
}

fn bless(wanted: &BTreeMap<String, String>) {
    let folder = support::path(FOLDER);
    fs::create_dir_all(&folder).expect("the folder of the pages can be made");
    for name in committed().keys().filter(|name| !wanted.contains_key(*name)) {
        fs::remove_file(folder.join(name)).expect("a page can be taken away");
    }
    for (name, text) in wanted {
        fs::write(folder.join(name), text).expect("a page can be written");
    }
}

/// Pages that are missing, left over or otherwise than wanted.
fn differences(wanted: &BTreeMap<String, String>, found: &BTreeMap<String, String>) -> Vec<String> {
    let other =
        wanted.iter().filter(|(name, text)| found.get(*name) != Some(text)).map(|(name, _)| name.clone());
    let left_over = found.keys().filter(|name| !wanted.contains_key(*name)).cloned();
    other.chain(left_over).collect()
}

#[test]
fn pages_of_the_kinds_are_those_of_the_registry() {
    let wanted = reference();
    if std::env::var("LAYSHAFT_BLESS").is_ok_and(|value| value == "1") {
        bless(&wanted);
    }
    let wrong = differences(&wanted, &committed());
    assert!(wrong.is_empty(), "not as the registry says: {wrong:?}; look, then bless with LAYSHAFT_BLESS=1");
}

#[test]
fn a_page_that_differs_is_seen() {
    let page = |name: &str, text: &str| (String::from(name), String::from(text));
    let wanted = BTreeMap::from([page("a.md", "a"), page("b.md", "b")]);
    assert!(differences(&wanted, &wanted.clone()).is_empty());
    assert_eq!(
        differences(&wanted, &BTreeMap::from([page("a.md", "other"), page("c.md", "")])),
        ["a.md", "b.md", "c.md"]
    );
}

#[test]
fn kinds_with_a_curve_are_drawn() {
    for name in
        ["battery", "straight_line", "dc_motor", "induction_motor", "servo", "gear", "quadratic", "vehicle"]
    {
        let row = rows().iter().find(|row| row.name == name).expect("the kind is known");
        let svg = curves::of(row).and_then(|drawing| chart::svg(&drawing)).unwrap_or_default();
        assert!(svg.contains("<polyline"), "{name} has no chart");
    }
    let row = rows().iter().find(|row| row.name == "coupling").expect("the kind is known");
    assert!(curves::of(row).is_none(), "what passes everything on has nothing to show");
}
