//! Bad input: whatever is handed in, there is an answer, with words, in bounded time.

#[path = "../support/mod.rs"]
mod support;

mod command;
mod numbers;
mod tables;
mod texts;

use std::time::Duration;

use layshaft_semantics::Analysis;

/// Analyzes and holds the time against a bound that only a wrong order of growth passes.
#[track_caller]
#[allow(clippy::disallowed_methods, reason = "the bound is the point of these tests")]
pub fn within(seconds: u64, text: &str) -> Analysis {
    let start = std::time::Instant::now();
    let analysis = support::analyze(text);
    let taken = start.elapsed();
    assert!(taken < Duration::from_secs(seconds), "{} bytes took {taken:?}", text.len());
    analysis
}

/// Fails unless these are the codes of the messages.
#[track_caller]
pub fn gives(text: &str, codes: &[&str]) {
    let analysis = within(20, text);
    assert_eq!(support::codes(&analysis), codes, "{}", support::lines(&analysis));
}
