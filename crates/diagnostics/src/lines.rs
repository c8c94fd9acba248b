//! From byte offsets to lines and columns and back, by the line endings of the Language Server Protocol.

/// A zero-based line and column.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Position {
    /// Line, from 0.
    pub line: u32,
    /// Column, from 0, in the units asked for.
    pub column: u32,
}

/// Where each line of a text starts. A line ends at `\n`, `\r\n` or a lone `\r`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct LineIndex {
    starts: Vec<u32>,
    len: u32,
}

impl LineIndex {
    /// Reads the line starts of `text`.
    #[must_use]
    pub fn new(text: &str) -> Self {
        let bytes = text.as_bytes();
        let mut starts = vec![0];
        for (at, &byte) in bytes.iter().enumerate() {
            let ends = byte == b'\n' || (byte == b'\r' && bytes.get(at + 1) != Some(&b'\n'));
            if ends {
                starts.push(at as u32 + 1);
            }
        }
        Self { starts, len: bytes.len() as u32 }
    }

    /// How many lines there are; an empty text has one.
    #[must_use]
    pub fn lines(&self) -> usize {
        self.starts.len()
    }

    /// The byte range of a line, its line ending included.
    #[must_use]
    pub fn range(&self, line: u32) -> Option<(u32, u32)> {
        let start = *self.starts.get(line as usize)?;
        let end = self.starts.get(line as usize + 1).copied().unwrap_or(self.len);
        Some((start, end))
    }

    /// The line that holds a byte offset; past the end, the last line.
    #[must_use]
    pub fn line_of(&self, offset: u32) -> u32 {
        (self.starts.partition_point(|&start| start <= offset) - 1) as u32
    }

    /// Line and column in bytes (UTF-8 code units).
    #[must_use]
    pub fn utf8(&self, offset: u32) -> Position {
        let offset = offset.min(self.len);
        let line = self.line_of(offset);
        Position { line, column: offset - self.starts[line as usize] }
    }

    /// Line and column in UTF-16 code units; `text` is the text the index was made of.
    #[must_use]
    pub fn utf16(&self, text: &str, offset: u32) -> Position {
        let offset = floor_boundary(text, offset.min(self.len));
        let line = self.line_of(offset);
        let head = &text[self.starts[line as usize] as usize..offset as usize];
        Position { line, column: head.chars().map(|c| c.len_utf16() as u32).sum() }
    }

    /// Line and column in characters, both counted from 1: what a person reads.
    #[must_use]
    pub fn human(&self, text: &str, offset: u32) -> (u32, u32) {
        let offset = floor_boundary(text, offset.min(self.len));
        let line = self.line_of(offset);
        let head = &text[self.starts[line as usize] as usize..offset as usize];
        (line + 1, head.chars().count() as u32 + 1)
    }

    /// The byte offset of a position in bytes, clamped to its line and the text.
    #[must_use]
    pub fn offset_utf8(&self, text: &str, position: Position) -> u32 {
        let Some((start, end)) = self.content(text, position.line) else { return self.len };
        floor_boundary(text, start.saturating_add(position.column).min(end))
    }

    /// The byte offset of a position in UTF-16 code units, clamped to its line and the text.
    #[must_use]
    pub fn offset_utf16(&self, text: &str, position: Position) -> u32 {
        let Some((start, end)) = self.content(text, position.line) else { return self.len };
        let mut units = 0;
        for (at, c) in text[start as usize..end as usize].char_indices() {
            if units + c.len_utf16() as u32 > position.column {
                return start + at as u32;
            }
            units += c.len_utf16() as u32;
        }
        end
    }

    /// The byte range of a line without its line ending.
    fn content(&self, text: &str, line: u32) -> Option<(u32, u32)> {
        let (start, end) = self.range(line)?;
        let trimmed = text[start as usize..end as usize].trim_end_matches(['\r', '\n']);
        Some((start, start + trimmed.len() as u32))
    }
}

/// The nearest character border at or before `offset`.
fn floor_boundary(text: &str, offset: u32) -> u32 {
    let mut at = (offset as usize).min(text.len());
    while !text.is_char_boundary(at) {
        at -= 1;
    }
    at as u32
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_line_ending_of_the_protocol_counts_once() {
        let text = "a\nb\r\nc\rd";
        let index = LineIndex::new(text);
        assert_eq!(index.lines(), 4);
        assert_eq!(index.range(1), Some((2, 5)));
        assert_eq!(index.utf8(7), Position { line: 3, column: 0 });
    }

    #[test]
    fn columns_are_clamped_and_never_split_a_character() {
        let text = "é𝄞x\ny";
        let index = LineIndex::new(text);
        assert_eq!(index.utf16(text, 6), Position { line: 0, column: 3 });
        assert_eq!(index.offset_utf16(text, Position { line: 0, column: 2 }), 2, "half of a pair");
        assert_eq!(index.offset_utf16(text, Position { line: 0, column: 99 }), 7);
        assert_eq!(index.offset_utf8(text, Position { line: 0, column: 1 }), 0, "inside é");
        assert_eq!(index.offset_utf8(text, Position { line: 9, column: 0 }), text.len() as u32);
        assert_eq!(index.human(text, 6), (1, 3));
    }
}
