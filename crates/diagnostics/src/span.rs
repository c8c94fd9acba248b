//! Places in a text: byte ranges, relative to an item or to a file.

/// A byte range. In a tree it is relative to the start of its item, so that an edit in one item
/// leaves every other item's spans true.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord, Default)]
pub struct Span {
    /// First byte.
    pub start: u32,
    /// One past the last byte.
    pub end: u32,
}

impl Span {
    /// The range from `start` up to but without `end`.
    #[must_use]
    pub const fn new(start: u32, end: u32) -> Self {
        Self { start, end }
    }

    /// The smallest range that holds both.
    #[must_use]
    pub fn cover(self, other: Self) -> Self {
        Self { start: self.start.min(other.start), end: self.end.max(other.end) }
    }

    /// The same range, `offset` bytes later.
    #[must_use]
    pub const fn shifted(self, offset: u32) -> Self {
        Self { start: self.start + offset, end: self.end + offset }
    }

    /// Whether `offset` lies in the range or directly behind it.
    #[must_use]
    pub const fn touches(self, offset: u32) -> bool {
        self.start <= offset && offset <= self.end
    }
}

/// A file of an analysis, by its place in the list of sources.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct FileId(pub u32);

/// A byte range in a file, counted from the start of the file in the user's own bytes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct FileSpan {
    /// The file.
    pub file: FileId,
    /// The range in it.
    pub span: Span,
}
