//! The seeds of the fuzz targets, what fuzzing found, and every spec of the project, against the laws.

#![allow(clippy::disallowed_methods, reason = "this test reads the seeds")]

use std::fs;
use std::path::{Path, PathBuf};

use layshaft_tests::laws;

/// The files right below a folder of the repository that end so, in order.
fn files(folder: &str, ending: &str) -> Vec<PathBuf> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("..").join(folder);
    let entries = fs::read_dir(&folder).unwrap_or_else(|error| panic!("{}: {error}", folder.display()));
    let mut paths: Vec<PathBuf> =
        entries.map(|entry| entry.expect("a folder can be listed").path()).collect();
    paths.retain(|path| path.is_file() && path.to_string_lossy().ends_with(ending));
    paths.sort();
    assert!(!paths.is_empty(), "{} has no file that ends in `{ending}`", folder.display());
    paths
}

/// Every text of a folder; the name of the file is said where a law is broken.
fn each(folder: &str, ending: &str, law: impl Fn(&str) + std::panic::RefUnwindSafe) {
    for path in files(folder, ending) {
        let text = String::from_utf8_lossy(&fs::read(&path).expect("a seed can be read")).into_owned();
        let kept = std::panic::catch_unwind(|| law(&text));
        assert!(kept.is_ok(), "{} breaks the law", path.display());
    }
}

/// Where specs stand, good ones and broken ones.
const SPECS: &[(&str, &str)] = &[
    ("tests/fuzz/corpus/parse", ""),
    ("tests/fuzz/corpus/format", ""),
    ("tests/fuzz/corpus/analyze", ""),
    ("tests/specs", ".shaft"),
    ("crates/syntax/tests/data", ".shaft"),
];

#[test]
fn every_spec_is_read() {
    SPECS.iter().for_each(|(folder, ending)| each(folder, ending, laws::parse));
}

#[test]
fn every_spec_is_formatted() {
    SPECS.iter().for_each(|(folder, ending)| each(folder, ending, laws::format));
}

#[test]
fn every_spec_is_analyzed() {
    SPECS.iter().for_each(|(folder, ending)| each(folder, ending, laws::analyze));
}

#[test]
fn every_table_is_read() {
    each("tests/fuzz/corpus/csv", "", laws::csv);
}
