//! What is put in order while typing: the item that a `}` or a new line finishes, and the indentation of a new line.
//!
//! The edits are as small as they can be and never reach across the cursor, so that it stays where it was meant.

use layshaft_diagnostics::{FileId, Span};
use layshaft_syntax::format::format_range;

use crate::Snapshot;
use crate::cursor::{Cursor, depth};

/// Blanks of one step of indentation, as the formatter writes it.
const STEP: usize = 4;

/// The edits that follow a `}` or a line end typed right before a place.
#[must_use]
pub fn on_type(snapshot: &Snapshot, file: FileId, offset: u32, typed: char) -> Vec<(Span, String)> {
    match typed {
        '}' => finished(snapshot, file, offset),
        '\n' => {
            let mut edits = finished_above(snapshot, file, offset);
            edits.extend(indentation(snapshot, file, offset));
            edits
        }
        _ => Vec::new(),
    }
}

/// The item that ends at the place, in its one form.
fn finished(snapshot: &Snapshot, file: FileId, offset: u32) -> Vec<(Span, String)> {
    let Some(item) = snapshot.item(file, offset) else { return Vec::new() };
    let span = item.tree.span.shifted(item.offset);
    if span.end != offset {
        return Vec::new();
    }
    formatted(snapshot, file, span, offset)
}

/// The item that the line above ends.
fn finished_above(snapshot: &Snapshot, file: FileId, offset: u32) -> Vec<(Span, String)> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let Some(line) = line_start(&source.text, offset as usize) else { return Vec::new() };
    let items = &source.tree.items;
    let behind = items.partition_point(|item| (item.offset as usize) < line);
    let Some(item) = behind.checked_sub(1).and_then(|at| items.get(at)) else { return Vec::new() };
    let span = item.tree.span.shifted(item.offset);
    let between = source.text.get(span.end as usize..line).unwrap_or("x");
    let directly = between.matches('\n').count() <= 1 && between.trim_start_matches([' ', '\t']).len() <= 2;
    if span.end as usize > line || !directly {
        return Vec::new();
    }
    formatted(snapshot, file, span, line as u32)
}

/// The start of the line that a place is in.
fn line_start(text: &str, offset: usize) -> Option<usize> {
    let before = text.get(..offset)?;
    Some(before.rfind(['\n', '\r']).map_or(0, |at| at + 1))
}

/// The smallest edits that bring an item into its form, all of them before a place.
fn formatted(snapshot: &Snapshot, file: FileId, span: Span, limit: u32) -> Vec<(Span, String)> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let edits = format_range(&source.text, span);
    let small = edits.into_iter().flat_map(|(span, new)| {
        let old = source.text.get(span.start as usize..span.end as usize).unwrap_or("");
        changes(old, &new, span.start)
    });
    small.filter(|(span, _)| span.end <= limit).collect()
}

/// What differs between two texts that mostly differ in blanks: runs of blanks one by one, the rest as a whole.
fn changes(old: &str, new: &str, base: u32) -> Vec<(Span, String)> {
    let mut edits = Vec::new();
    let (mut i, mut j) = (0, 0);
    loop {
        let (one, other) = (old[i..].chars().next(), new[j..].chars().next());
        match (one, other) {
            (Some(a), Some(b)) if a == b && !a.is_whitespace() => {
                i += a.len_utf8();
                j += b.len_utf8();
            }
            (None, None) => return edits,
            (a, b) if a.is_some_and(char::is_whitespace) || b.is_some_and(char::is_whitespace) => {
                let (from, to) = (blanks(&old[i..]), blanks(&new[j..]));
                if old[i..i + from] != new[j..j + to] {
                    edits.push((spanned(base, i, i + from), new[j..j + to].to_owned()));
                }
                i += from;
                j += to;
            }
            _ => {
                let same = common_end(&old[i..], &new[j..]);
                let (end, new_end) = (old.len() - same, new.len() - same);
                edits.push((spanned(base, i, end), new[j..new_end].to_owned()));
                return edits;
            }
        }
    }
}

fn blanks(text: &str) -> usize {
    text.len() - text.trim_start().len()
}

fn spanned(base: u32, from: usize, to: usize) -> Span {
    Span::new(base + from as u32, base + to as u32)
}

/// How many bytes of whole characters two texts end with alike.
fn common_end(one: &str, other: &str) -> usize {
    let pairs = one.chars().rev().zip(other.chars().rev());
    pairs.take_while(|(a, b)| a == b).map(|(a, _)| a.len_utf8()).sum()
}

/// The blanks before the cursor on a new line: one step for each brace that is open.
fn indentation(snapshot: &Snapshot, file: FileId, offset: u32) -> Option<(Span, String)> {
    let cursor = Cursor::new(snapshot, file, offset)?;
    let line = line_start(cursor.text, cursor.offset)?;
    let before = cursor.text.get(line..cursor.offset)?;
    if !before.trim_start_matches([' ', '\t']).is_empty() || cursor.quoted.is_some() {
        return None;
    }
    let rest = cursor.text.get(cursor.offset..)?;
    let closes = rest.trim_start_matches([' ', '\t']).starts_with('}');
    let (braces, continued) = depth(&cursor.tokens);
    let steps = braces.saturating_sub(usize::from(closes)) + usize::from(continued && !closes);
    let wanted = " ".repeat(steps * STEP);
    (before != wanted).then(|| (Span::new(line as u32, cursor.offset as u32), wanted))
}

#[cfg(test)]
mod tests {
    use super::{changes, on_type};
    use crate::fixture::Fixture;

    /// The text with the edits done.
    fn check(drawn: &str, typed: char, expected: &str) {
        let fixture = Fixture::new(drawn);
        let mut edits = on_type(&fixture.snapshot, fixture.file, fixture.offset, typed);
        edits.sort_by_key(|(span, _)| span.start);
        let mut text = fixture.snapshot.analysis.files[0].text.to_string();
        for (span, new) in edits.into_iter().rev() {
            assert!(span.end <= fixture.offset, "an edit reaches across the cursor");
            text.replace_range(span.start as usize..span.end as usize, &new);
        }
        assert_eq!(text, expected);
    }

    #[test]
    fn a_brace_finishes_its_item() {
        check(
            "let   a=5 m\nload p:constant{torque=5 N·m}$0\nlet   b=2 m\n",
            '}',
            "let   a=5 m\nload p: constant { torque = 5 N·m }\nlet   b=2 m\n",
        );
        check("load p:constant{torque= }$0\n", '}', "load p:constant{torque= }\n");
        check(
            "drive d = m -> p only in plain with { a.b=5 }$0\n",
            '}',
            "drive d = m -> p only in plain with { a.b=5 }\n",
        );
    }

    #[test]
    fn a_line_end_finishes_the_item_above() {
        check("let   a=5 m\n$0", '\n', "let a = 5 m\n");
        check("let   a=5 m\n\n$0", '\n', "let   a=5 m\n\n");
        check("let   a=5*2 m\n$0let b=2 m\n", '\n', "let a = 5 × 2 m\nlet b=2 m\n");
        check("let   a=\n$0", '\n', "let   a=\n");
    }

    #[test]
    fn a_new_line_is_indented() {
        check("load p: constant {\n$0", '\n', "load p: constant {\n    ");
        check("load p: constant {\n        $0\n}\n", '\n', "load p: constant {\n    \n}\n");
        check("load p: constant {\n$0}\n", '\n', "load p: constant {\n}\n");
        check("let a = 5 m\n  $0", '\n', "let a = 5 m\n");
        check("let a = 5 m # text {\n$0", '\n', "let a = 5 m # text {\n");
    }

    #[test]
    fn changes_are_small_and_complete() {
        let apply = |old: &str, new: &str| {
            let mut text = old.to_owned();
            for (span, words) in changes(old, new, 0).into_iter().rev() {
                text.replace_range(span.start as usize..span.end as usize, &words);
            }
            text
        };
        for (old, new) in
            [("a=5", "a = 5"), ("a*b c", "a × b c"), (" a ", "a"), ("", "x"), ("x", ""), ("é=ü", "é = ü·")]
        {
            assert_eq!(apply(old, new), new);
        }
        assert_eq!(changes("a=5", "a = 5", 0).len(), 2);
    }
}
