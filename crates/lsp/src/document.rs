//! An open document: its text, changed in place, with the starts of its lines.

use std::cell::OnceCell;
use std::sync::Arc;

use tower_lsp::lsp_types::{Position, TextDocumentContentChangeEvent};

use crate::convert::Encoding;
use crate::disk::Place;

/// A document that the client has open.
#[derive(Debug)]
pub struct Document {
    /// The client's number for this state of the text.
    pub version: i32,
    /// Counts the changes; never given by the client.
    pub revision: u64,
    /// Where it stands on the disk; none for `untitled:`, `git:` and the like, which are analyzed alone.
    pub place: Option<Place>,
    text: Text,
    shared: OnceCell<Arc<str>>,
}

impl Document {
    /// A document as it was opened.
    #[must_use]
    pub fn new(version: i32, text: String, place: Option<Place>) -> Self {
        Self { version, revision: 0, place, text: Text::new(text), shared: OnceCell::new() }
    }

    /// Applies changes in their order.
    pub fn change(&mut self, changes: Vec<TextDocumentContentChangeEvent>, encoding: Encoding) {
        self.shared.take();
        self.revision += 1;
        for change in changes {
            match change.range {
                None => self.text = Text::new(change.text),
                Some(range) => {
                    let start = self.text.offset(range.start, encoding);
                    let end = self.text.offset(range.end, encoding);
                    self.text.replace(start.min(end), start.max(end), &change.text);
                }
            }
        }
    }

    /// The text, shared by analyses.
    #[must_use]
    pub fn text(&self) -> Arc<str> {
        self.shared.get_or_init(|| Arc::from(self.text.text.as_str())).clone()
    }
}

/// A text with the starts of its lines: `\n`, `\r\n` and a lone `\r` end one.
#[derive(Debug)]
struct Text {
    text: String,
    starts: Vec<usize>,
}

impl Text {
    fn new(text: String) -> Self {
        let mut starts = vec![0];
        line_starts(&text, 0, text.len(), &mut starts);
        Self { text, starts }
    }

    /// The byte of a position, kept inside its line and the text.
    fn offset(&self, position: Position, encoding: Encoding) -> usize {
        let line = position.line as usize;
        let Some(&start) = self.starts.get(line) else { return self.text.len() };
        let end = self.starts.get(line + 1).copied().unwrap_or(self.text.len());
        let content = self.text[start..end].trim_end_matches(['\r', '\n']);
        start + encoding.bytes(content, position.character)
    }

    fn replace(&mut self, start: usize, end: usize, new: &str) {
        self.text.replace_range(start..end, new);
        // A line end at the border may be joined or parted, so the lines before and behind are read again.
        let first = self.starts.partition_point(|at| *at < start).saturating_sub(1);
        let from = self.starts[first];
        let last = self.starts.partition_point(|at| *at <= end + 1);
        let shift = |at: usize| at - end + start + new.len();
        let tail: Vec<usize> = self.starts[last..].iter().map(|at| shift(*at)).collect();
        let until = tail.first().copied().unwrap_or(self.text.len());
        self.starts.truncate(first + 1);
        line_starts(&self.text, from, until, &mut self.starts);
        if self.starts.last() == tail.first() && !tail.is_empty() {
            self.starts.pop();
        }
        self.starts.extend(tail);
    }
}

/// The starts of the lines whose ends stand in a range.
fn line_starts(text: &str, from: usize, until: usize, starts: &mut Vec<usize>) {
    let bytes = text.as_bytes();
    for (at, &byte) in bytes.iter().enumerate().take(until).skip(from) {
        if byte == b'\n' || (byte == b'\r' && bytes.get(at + 1) != Some(&b'\n')) {
            starts.push(at + 1);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::Text;

    #[test]
    fn lines_stay_true_under_any_change() {
        let pieces = ["", "a", "\n", "\r", "\r\n", "é\r", "\nß", "x\n\ny", "𝄞"];
        let mut seed = 7_u64;
        let mut below = |most: usize| {
            seed = seed.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            (seed >> 33) as usize % (most + 1)
        };
        let mut text = Text::new(String::from("a\r\nb\rc\n"));
        for _ in 0..20_000 {
            let mut border = || {
                let mut at = below(text.text.len());
                while !text.text.is_char_boundary(at) {
                    at -= 1;
                }
                at
            };
            let (a, b) = (border(), border());
            let (start, end) = (a.min(b), a.max(b).min(a.min(b) + 4));
            let end = (end..=text.text.len()).find(|at| text.text.is_char_boundary(*at)).unwrap();
            let new = pieces[below(pieces.len() - 1)];
            text.replace(start, end, new);
            assert_eq!(text.starts, Text::new(text.text.clone()).starts, "{:?}", text.text);
            if text.text.len() > 40 {
                text = Text::new(String::new());
            }
        }
    }
}
