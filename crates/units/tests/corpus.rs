//! The corpora: formulas that must pass, slips that must be refused, turns counted twice that must be warned of.

mod support;

use support::{Outcome, judge};

/// Reads a corpus and lists every line whose outcome is not the one written.
fn wrong_lines(corpus: &str) -> (Vec<String>, [usize; 3]) {
    let mut names: Vec<(&str, &str)> = Vec::new();
    let mut wrong = Vec::new();
    let mut counts = [0; 3];
    for line in corpus.lines().filter(|line| !line.starts_with('#') && !line.trim().is_empty()) {
        let (word, rest) = line.split_once(' ').unwrap_or((line, ""));
        let rest = rest.trim();
        if word == "name" {
            names.extend(rest.split_once(' '));
            continue;
        }
        let (formula, wanted) = rest.rsplit_once("->").unwrap_or_else(|| panic!("no place in `{line}`"));
        let outcome = judge(formula.trim(), wanted.trim(), &names);
        let (index, right) = match word {
            "fits" => (0, outcome == Outcome::Fits),
            "refused" => (1, matches!(outcome, Outcome::Refused(_))),
            "warned" => (2, matches!(outcome, Outcome::Warned(_))),
            other => panic!("unknown word `{other}`"),
        };
        counts[index] += 1;
        if !right {
            wrong.push(format!("{line}\n    {outcome:?}"));
        }
    }
    (wrong, counts)
}

fn check(corpus: &str, least: [usize; 3]) {
    let (wrong, counts) = wrong_lines(corpus);
    assert!(wrong.is_empty(), "{} wrong:\n{}", wrong.len(), wrong.join("\n"));
    for (count, least) in counts.into_iter().zip(least) {
        assert!(count >= least, "the corpus shrank: {counts:?}");
    }
}

#[test]
fn first_corpus() {
    check(include_str!("corpus/first.txt"), [128, 55, 10]);
}

#[test]
fn second_corpus() {
    check(include_str!("corpus/second.txt"), [150, 90, 20]);
}
