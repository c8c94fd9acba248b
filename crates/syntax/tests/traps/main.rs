//! The traps of the grammar: for each, what is understood and which message is given, drawn.
//!
//! `⏎` stands for a line end. Behind a text come its trees, then its problems with the text each one marks, its help
//! and the text that each of its fixes gives (`(n left)`: how many problems that text still has).

#[path = "../drawn/mod.rs"]
mod drawn;

mod asked;
mod lines;
mod names;
mod numbers;
mod units;

/// Compares what each text gives with what is drawn under it, four blanks in.
#[track_caller]
fn check(drawing: &str) {
    let mut expected: Vec<(&str, String)> = Vec::new();
    for line in drawing.lines().filter(|line| !line.is_empty()) {
        match (line.strip_prefix("    "), expected.last_mut()) {
            (Some(part), Some((_, drawn))) => drawn.extend([part, "\n"]),
            _ => expected.push((line, String::new())),
        }
    }
    assert!(!expected.is_empty());
    for (text, expected) in expected {
        let found = drawn::drawn(&drawn::written(text));
        assert_eq!(found, expected, "\n--- for: {text}\n--- found:\n{found}");
    }
}
