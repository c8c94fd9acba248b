//! Laws of the reader: every place it speaks of is in the text, and what it remembers changes nothing.

use layshaft_syntax::{File, Memo};

use super::debug;

/// Reads any text.
///
/// # Panics
/// A law is broken.
pub fn parse(text: &str) {
    tokens(text);
    let file = layshaft_syntax::parse(text);
    places(text, &file);
    let mut memo = Memo::default();
    for state in [text, &without_a_line(text), text] {
        let (fresh, kept) = (layshaft_syntax::parse(state), layshaft_syntax::parse_with(state, &mut memo));
        debug::same(&format!("{kept:?}"), &format!("{fresh:?}"), "the memo changes what is read");
    }
}

/// Tokens stand in the text, one behind the other.
fn tokens(text: &str) {
    let lexed = layshaft_syntax::lex(text);
    let mut last = 0;
    for token in &lexed.tokens {
        assert!(token.span.start >= last, "a token stands before the end of the one before it");
        inside(text, token.span.start as usize, token.span.end as usize);
        last = token.span.end;
    }
    for comment in &lexed.comments {
        inside(text, comment.span.start as usize, comment.span.end as usize);
    }
}

/// Items stand in the order of the text; every place of a tree or a finding is a range of whole characters.
fn places(text: &str, file: &File) {
    let mut last = 0;
    for item in &file.items {
        let offset = item.offset as usize;
        assert!(offset >= last, "an item begins at {offset}, the one before it ends at {last}");
        for (start, end) in debug::spans(&format!("{:?}", item.tree)) {
            inside(text, offset + start, offset + end);
        }
        last = offset + item.tree.span.end as usize;
    }
    let problems = file.items.iter().flat_map(|item| &item.tree.problems).chain(&file.problems);
    for problem in problems {
        assert!(!problem.message.trim().is_empty(), "a finding says nothing");
    }
    for (start, end) in debug::spans(&format!("{:?} {:?}", file.problems, file.docs)) {
        inside(text, start, end);
    }
}

fn inside(text: &str, start: usize, end: usize) {
    assert!(start <= end && end <= text.len(), "{start}..{end} is no range of {} bytes", text.len());
    let whole = text.is_char_boundary(start) && text.is_char_boundary(end);
    assert!(whole, "{start}..{end} cuts a character");
}

/// The text without the line in its middle.
pub fn without_a_line(text: &str) -> String {
    let lines: Vec<&str> = text.split_inclusive('\n').collect();
    let middle = lines.len() / 2;
    [&lines[..middle], lines.get(middle + 1..).unwrap_or_default()].concat().concat()
}
