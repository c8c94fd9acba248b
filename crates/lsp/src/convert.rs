//! Places of the protocol and places of the editor features, one into the other.

use layshaft_ide::base::{Position as Column, SourceFile, Span};
use tower_lsp::lsp_types::{Position, Range};

/// What a column counts.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Encoding {
    /// Bytes.
    Utf8,
    /// Halves of UTF-16, unless agreed otherwise.
    #[default]
    Utf16,
}

impl Encoding {
    /// The bytes before a column of a line, kept inside it and before the character it falls into.
    #[must_use]
    pub fn bytes(self, line: &str, column: u32) -> usize {
        let column = column as usize;
        let mut units = 0;
        for (at, c) in line.char_indices() {
            let width = match self {
                Self::Utf8 => c.len_utf8(),
                Self::Utf16 => c.len_utf16(),
            };
            if units + width > column {
                return at;
            }
            units += width;
        }
        line.len()
    }

    /// The offset of a position.
    #[must_use]
    pub fn offset(self, file: &SourceFile, position: Position) -> u32 {
        let column = Column { line: position.line, column: position.character };
        match self {
            Self::Utf8 => file.lines.offset_utf8(&file.text, column),
            Self::Utf16 => file.lines.offset_utf16(&file.text, column),
        }
    }

    /// The position of an offset.
    #[must_use]
    pub fn position(self, file: &SourceFile, offset: u32) -> Position {
        let column = match self {
            Self::Utf8 => file.lines.utf8(offset),
            Self::Utf16 => file.lines.utf16(&file.text, offset),
        };
        Position::new(column.line, column.column)
    }

    /// The range of a span.
    #[must_use]
    pub fn range(self, file: &SourceFile, span: Span) -> Range {
        Range::new(self.position(file, span.start), self.position(file, span.end))
    }

    /// The span of a range.
    #[must_use]
    pub fn span(self, file: &SourceFile, range: Range) -> Span {
        let (start, end) = (self.offset(file, range.start), self.offset(file, range.end));
        Span::new(start.min(end), start.max(end))
    }
}
