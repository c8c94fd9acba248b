//! Drawn tests: what a line raises stands behind it.
//!
//! `#! code` behind a line says that the line raises exactly that finding, `#! code: words` that its message holds the
//! words too; several are separated by `|`. A line without raises nothing.

#![allow(dead_code, reason = "each test file uses its part")]

use std::collections::BTreeMap;
use std::sync::Arc;

use layshaft_semantics::{Analysis, MemoryFiles, analyze};

/// Analyzes a text that uses no other file.
pub fn analysis(text: &str) -> Analysis {
    with_files(text, &[])
}

/// Analyzes a text with the files it uses beside it.
pub fn with_files(text: &str, files: &[(&str, &str)]) -> Analysis {
    let texts = files.iter().map(|(path, text)| ((*path).to_owned(), Arc::from(*text))).collect();
    analyze("spec.shaft", Arc::from(text), &MemoryFiles { texts })
}

/// Checks a drawn text.
pub fn check(drawn: &str) {
    check_with(drawn, &[]);
}

/// Checks a drawn text with files beside it.
pub fn check_with(drawn: &str, files: &[(&str, &str)]) {
    let mut wanted: BTreeMap<u32, Vec<&str>> = BTreeMap::new();
    let mut text = String::new();
    for (line, drawn) in drawn.lines().enumerate() {
        let (code, marks) = drawn.split_once("#!").unwrap_or((drawn, ""));
        text.push_str(code.trim_end());
        text.push('\n');
        let marks = marks.split('|').map(str::trim).filter(|mark| !mark.is_empty());
        for mark in marks {
            wanted.entry(line as u32).or_default().push(mark);
        }
    }
    let analysis = with_files(&text, files);
    let mut found: BTreeMap<u32, Vec<(String, String)>> = BTreeMap::new();
    for finding in &analysis.diagnostics {
        let place = finding.primary.place;
        let file = analysis.file(place.file).expect("a finding lies in a file");
        assert_eq!(file.path, "spec.shaft", "{finding:#?}");
        let line = file.lines.line_of(place.span.start);
        found.entry(line).or_default().push((finding.code.row().word.to_owned(), finding.message.clone()));
    }
    for line in 0..text.lines().count() as u32 {
        let wanted = wanted.remove(&line).unwrap_or_default();
        let found = found.remove(&line).unwrap_or_default();
        let fits = wanted.len() == found.len()
            && wanted.iter().zip(&found).all(|(wanted, (code, message))| match wanted.split_once(':') {
                Some((word, words)) => word.trim() == code && message.contains(words.trim()),
                None => wanted == code,
            });
        let shown = text.lines().nth(line as usize).unwrap_or("");
        assert!(fits, "line {}: `{shown}`\n wanted {wanted:?}\n found {found:#?}", line + 1);
    }
    assert!(found.is_empty(), "past the end: {found:#?}");
}

/// Applies the first fix of the only finding and gives the new text.
pub fn fixed(text: &str) -> String {
    let analysis = analysis(text);
    assert_eq!(analysis.diagnostics.len(), 1, "{:#?}", analysis.diagnostics);
    let fix = analysis.diagnostics[0].fixes.first().expect("a fix");
    let mut edits = fix.edits.clone();
    edits.sort_by_key(|edit| std::cmp::Reverse(edit.place));
    let mut text = text.to_owned();
    for edit in edits {
        text.replace_range(edit.place.span.start as usize..edit.place.span.end as usize, &edit.text);
    }
    text
}
