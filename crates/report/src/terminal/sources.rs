//! The texts of an analysis made harmless for a terminal, with the way from a byte of the text to a character of it.

use ariadne::Source;
use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_present::escape::is_hostile;
use layshaft_semantics::Analysis;

/// Lines longer than this many characters are shown by a piece around the place.
const LONGEST_LINE: usize = 400;
/// Characters of a long line shown on each side of a place.
const AROUND: usize = 40;

/// One text.
struct Text {
    name: String,
    source: Source<String>,
    /// Bytes at which a harmless character took the place of a hostile one of another length: place in the
    /// original text, and what the harmless text is longer up to behind it.
    shifts: Vec<(usize, isize)>,
}

/// Every text of an analysis.
pub struct Sources {
    texts: Vec<Text>,
}

/// A place in characters of a harmless text.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Place {
    /// The text.
    pub file: usize,
    /// First character.
    pub start: usize,
    /// One past the last.
    pub end: usize,
}

impl ariadne::Span for Place {
    type SourceId = usize;

    fn source(&self) -> &usize {
        &self.file
    }

    fn start(&self) -> usize {
        self.start
    }

    fn end(&self) -> usize {
        self.end
    }
}

impl ariadne::Cache<usize> for &Sources {
    type Storage = String;

    fn fetch(&mut self, id: &usize) -> Result<&Source<String>, impl std::fmt::Debug> {
        self.texts.get(*id).map(|text| &text.source).ok_or("no such text")
    }

    fn display<'a>(&self, id: &'a usize) -> Option<impl std::fmt::Display + 'a> {
        self.texts.get(*id).map(|text| text.name.clone())
    }
}

impl Sources {
    /// The texts of an analysis; `names` are the paths to show, those of the analysis where one is missing.
    #[must_use]
    pub fn new(analysis: &Analysis, names: &[String]) -> Self {
        let text = |(at, file): (usize, &layshaft_semantics::analysis::SourceFile)| {
            let name = names.get(at).unwrap_or(&file.path);
            let (harmless, shifts) = harmless(&file.text);
            Text {
                name: layshaft_present::escape::terminal(name).into_owned(),
                source: Source::from(harmless),
                shifts,
            }
        };
        Self { texts: analysis.files.iter().enumerate().map(text).collect() }
    }

    /// The path of a text as it is shown.
    #[must_use]
    pub fn name(&self, file: FileId) -> &str {
        self.texts.get(file.0 as usize).map_or("?", |text| text.name.as_str())
    }

    /// A place in characters, clamped to the text; `None` for a text that is not there.
    ///
    /// Characters and not bytes: with bytes the heading of a second text is looked up by a character's number, which
    /// ends in the middle of a character where the text is not ASCII.
    #[must_use]
    pub fn place(&self, place: FileSpan) -> Option<Place> {
        let text = self.texts.get(place.file.0 as usize)?;
        let start = text.character(text.shifted(place.span.start as usize));
        let end = text.character(text.shifted(place.span.end.max(place.span.start) as usize));
        Some(Place { file: place.file.0 as usize, start, end: end.max(start) })
    }

    /// Line and column from 1, and a piece of the line around the place.
    #[must_use]
    pub fn excerpt(&self, place: Place) -> (usize, usize, String) {
        let Some(source) = self.texts.get(place.file).map(|text| &text.source) else {
            return (1, 1, String::new());
        };
        let Some((line, number, column)) = source.get_offset_line(place.start) else {
            return (1, 1, String::new());
        };
        let text = source.get_line_text(line).unwrap_or("").trim_end();
        let from = column.saturating_sub(AROUND);
        let piece: String =
            text.chars().skip(from).take(2 * AROUND).map(|c| if c == '\t' { ' ' } else { c }).collect();
        let before = if from > 0 { "…" } else { "" };
        let after = if from + 2 * AROUND < text.chars().count() { "…" } else { "" };
        (number + 1, column + 1, format!("{before}{}{after}", piece.trim()))
    }

    /// Whether a place begins or ends on a line too long to be shown whole.
    #[must_use]
    pub fn on_long_line(&self, place: Place) -> bool {
        let Some(source) = self.texts.get(place.file).map(|text| &text.source) else { return false };
        let long = |at: usize| source.get_offset_line(at).is_some_and(|(line, ..)| line.len() > LONGEST_LINE);
        long(place.start) || long(place.end)
    }
}

impl Text {
    /// The byte in the harmless text of a byte of the original.
    fn shifted(&self, at: usize) -> usize {
        let passed = self.shifts.partition_point(|(place, _)| *place < at);
        let shift = passed.checked_sub(1).map_or(0, |last| self.shifts[last].1);
        at.saturating_add_signed(shift)
    }

    /// The character at a byte, or the last one that begins before it; not the end of a line.
    fn character(&self, byte: usize) -> usize {
        let byte = byte.min(self.source.text().len());
        let Some((line, _, column)) = self.source.get_byte_line(byte) else { return 0 };
        let text = self.source.get_line_text(line).unwrap_or("").trim_end_matches(['\r', '\n']);
        let mut column = column.min(text.len());
        while !text.is_char_boundary(column) {
            column -= 1;
        }
        line.offset() + text[..column].chars().count()
    }
}

/// The text with every hostile character but tabs and line ends shown by a sign, and the shifts that makes.
fn harmless(text: &str) -> (String, Vec<(usize, isize)>) {
    let bad = |c: char| is_hostile(c) && !matches!(c, '\n' | '\r' | '\t');
    if !text.chars().any(bad) {
        return (text.to_string(), Vec::new());
    }
    let mut out = String::with_capacity(text.len() + 16);
    let mut shifts = Vec::new();
    for (at, c) in text.char_indices() {
        if !bad(c) {
            out.push(c);
            continue;
        }
        out.push(match c {
            '\0'..='\u{1f}' => char::from_u32(0x2400 + c as u32).unwrap_or('\u{fffd}'),
            '\u{7f}' => '\u{2421}',
            _ => '\u{fffd}',
        });
        shifts.push((at, out.len() as isize - (at + c.len_utf8()) as isize));
    }
    (out, shifts)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_harmless_text_has_the_same_lines_and_its_places_move_along() {
        let text = "a\u{1b}b\u{85}c\r\nd\u{2028}e\tf";
        let (out, shifts) = harmless(text);
        assert_eq!(out, "a␛b\u{fffd}c\r\nd\u{fffd}e\tf");
        let source = Source::from(out.clone());
        let text_of = Text { name: String::new(), source, shifts };
        for (at, c) in text.char_indices().filter(|(_, c)| c.is_ascii_lowercase()) {
            let found = text_of.shifted(at);
            assert_eq!(out[found..].chars().next(), Some(c), "{at}");
        }
        assert_eq!(text_of.source.lines().len(), 2);
    }
}
