//! The examples of the language reference are read without a word and stand in the formatter's form.

use layshaft_syntax::format::format;
use layshaft_syntax::{DECLARATION_WORDS, RESERVED, parse};

const REFERENCE: &str = include_str!("../../../grammar/language.md");

/// The `shaft` examples, each with the line it begins on.
fn examples() -> Vec<(usize, String)> {
    let mut examples: Vec<(usize, String)> = Vec::new();
    let mut inside = false;
    for (index, line) in REFERENCE.lines().enumerate() {
        if inside && line == "```" {
            inside = false;
        } else if inside {
            if let Some((_, text)) = examples.last_mut() {
                text.push_str(line);
                text.push('\n');
            }
        } else if line.starts_with("```shaft") {
            assert!(matches!(line, "```shaft" | "```shaft fragment"), "line {}: {line}", index + 1);
            inside = true;
            examples.push((index + 2, String::new()));
        }
    }
    assert!(!inside && examples.len() > 10, "{} examples", examples.len());
    examples
}

#[test]
fn examples_are_read_without_a_word() {
    for (line, text) in examples() {
        let file = parse(&text);
        let inside = file.items.iter().flat_map(|item| &item.tree.problems);
        let messages: Vec<&str> =
            file.problems.iter().chain(inside).map(|problem| &*problem.message).collect();
        assert!(messages.is_empty(), "example on line {line}: {messages:?}\n{text}");
        assert!(!file.items.is_empty(), "example on line {line} declares nothing");
    }
}

#[test]
fn examples_stand_in_the_formatters_form() {
    for (line, text) in examples() {
        assert_eq!(format(&text).text, text, "example on line {line}");
    }
}

#[test]
fn the_reference_names_every_word() {
    for word in RESERVED.iter().map(|row| row.word) {
        assert!(REFERENCE.contains(&format!("`{word}`")), "reserved word {word}");
    }
    for row in DECLARATION_WORDS.iter().filter(|row| !row.meaning.contains("later version")) {
        let (cell, with) = (format!("`{}`", row.word), format!("`{} ", row.word));
        assert!(REFERENCE.contains(&cell) || REFERENCE.contains(&with), "declaring word {}", row.word);
    }
}
