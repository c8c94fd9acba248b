//! Colour on a terminal. It never carries a meaning of its own: every word it marks says the same.

/// What a piece of text is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Tone {
    /// As it is.
    Plain,
    /// Titles and names.
    Strong,
    /// What is beside the point: heads of tables, remarks.
    Faint,
    /// Holds.
    Good,
    /// A warning; not judged.
    Warn,
    /// An error; fails.
    Bad,
}

/// Whether colour is written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Style {
    /// Whether escape codes may be written.
    pub color: bool,
}

impl Style {
    /// A text in its tone. The text must be harmless already.
    #[must_use]
    pub fn paint(self, tone: Tone, text: &str) -> String {
        let code = match tone {
            Tone::Plain => "",
            Tone::Strong => "1",
            Tone::Faint => "2",
            Tone::Good => "32",
            Tone::Warn => "33",
            Tone::Bad => "1;31",
        };
        if !self.color || code.is_empty() || text.is_empty() {
            return text.to_string();
        }
        format!("\u{1b}[{code}m{text}\u{1b}[0m")
    }
}

/// Columns a text takes on a terminal.
#[must_use]
pub fn width(text: &str) -> usize {
    unicode_width::UnicodeWidthStr::width(text)
}
