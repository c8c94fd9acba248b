//! The pages run: every code's wrong example gives that code and no other, its right example gives nothing; the
//! example of every kind is accepted as it stands; the reference's specs are read.

#[path = "../support/mod.rs"]
mod support;

use std::fmt::Write as _;

use layshaft_diagnostics::CODES;
use layshaft_mechanics::registry;
use layshaft_semantics::{Analysis, MemoryFiles};

/// What the pages may `use` and read.
fn files() -> MemoryFiles {
    support::files(&[
        ("parts/motors.shaft", "let workshop_voltage = 400 V\n"),
        ("curves/motor.csv", "n,Md\n0,9.6\n1200,7.1\n2400,0.2\n"),
    ])
}

fn analyze(text: &str) -> Analysis {
    layshaft_semantics::analyze("page.shaft", text.into(), &files())
}

/// The fenced blocks of a page whose info string begins with `shaft`, with what stands behind it.
fn blocks(page: &str) -> Vec<(String, String)> {
    let mut found = Vec::new();
    let mut open: Option<(String, String)> = None;
    for line in page.lines() {
        match (&mut open, line.strip_prefix("```")) {
            (None, Some(info)) => open = Some((info.trim().to_owned(), String::new())),
            (Some(_), Some(_)) => found.extend(open.take()),
            (Some((_, text)), None) => {
                text.push_str(line);
                text.push('\n');
            }
            (None, None) => {}
        }
    }
    let shaft = |(info, text): (String, String)| {
        let rest = info.strip_prefix("shaft")?;
        Some((rest.trim().to_owned(), text))
    };
    found.into_iter().filter_map(shaft).collect()
}

/// What is wrong with the page of a code.
fn judge(code: &str, page: &str) -> Vec<String> {
    let blocks = blocks(page);
    let mut wrong = Vec::new();
    for word in ["wrong", "right"] {
        if !blocks.iter().any(|(info, _)| info == word) {
            wrong.push(format!("no ```shaft {word} example"));
        }
    }
    for (info, text) in &blocks {
        let analysis = analyze(text);
        let codes = support::codes(&analysis);
        let good = match info.as_str() {
            "wrong" => !codes.is_empty() && codes.iter().all(|found| *found == code),
            "right" => codes.is_empty(),
            _ => false,
        };
        if !good {
            wrong.push(format!("the {info} example gives: {}", support::lines(&analysis)));
        }
    }
    wrong
}

#[test]
fn every_code_fires_on_its_wrong_example_alone() {
    let mut report = String::new();
    for code in CODES {
        let row = code.row();
        for line in judge(row.word, row.page) {
            let _ = write!(report, "\n{}: {line}", row.word);
        }
    }
    assert!(report.is_empty(), "{report}");
}

#[test]
fn a_page_that_is_wrong_is_seen() {
    let page = "```shaft wrong\nlet a = 2 m\n```\n```shaft right\nlet a = 2 m + 3 s\n```\n";
    assert_eq!(judge("kind-mismatch", page).len(), 2);
    assert_eq!(judge("kind-mismatch", "").len(), 2);
}

#[test]
fn every_example_of_a_kind_is_accepted() {
    let mut report = String::new();
    for row in registry::rows() {
        let analysis = analyze(row.example);
        let part = analysis.parts.iter().find(|part| part.row.is_some_and(|known| known.name == row.name));
        if part.is_none() {
            let _ = write!(report, "\n{}: the example does not declare it", row.name);
        }
        if !analysis.diagnostics.is_empty() {
            let _ = write!(report, "\n{}: {}", row.name, support::lines(&analysis));
        }
    }
    assert!(report.is_empty(), "{report}");
}

#[test]
fn the_reference_runs() {
    let mut ran = 0;
    let mut report = String::new();
    let pages = ["../grammar", "../grammar/kinds"].into_iter().flat_map(|folder| {
        support::names(folder, ".md").into_iter().map(move |name| format!("{folder}/{name}"))
    });
    for name in pages {
        for (info, text) in blocks(&support::text(&name)) {
            let analysis = analyze(&text);
            let bad = match info.as_str() {
                "" => !analysis.diagnostics.is_empty(),
                // A fragment leaves declarations out, but it is read without a flaw.
                "fragment" => {
                    let unread =
                        ["syntax", "bad-text", "bad-number", "bad-name", "unclosed-bracket", "unknown-unit"];
                    support::codes(&analysis).iter().any(|code| unread.contains(code))
                }
                _ => true,
            };
            ran += 1;
            if bad {
                let _ = write!(report, "\n{name} `{info}`:\n{text}{}\n", support::lines(&analysis));
            }
        }
    }
    assert!(report.is_empty(), "{report}");
    assert!(ran >= 10, "only {ran} examples");
}
