//! Making problems.

use layshaft_diagnostics::{Code, Span};

use crate::tree::Problem;

impl Problem {
    /// A problem at a place.
    #[must_use]
    pub fn new(code: Code, span: Span, message: impl Into<String>) -> Self {
        Self { code, span, message: message.into(), related: None, help: None, fixes: Vec::new() }
    }

    /// What to write instead, in words.
    #[must_use]
    pub fn help(mut self, help: impl Into<String>) -> Self {
        self.help = Some(help.into());
        self
    }

    /// A second place and its words.
    #[must_use]
    pub fn related(mut self, span: Span, words: impl Into<String>) -> Self {
        self.related = Some((span, words.into()));
        self
    }

    /// An offer to mend it by one replacement.
    #[must_use]
    pub fn fix(mut self, title: impl Into<String>, span: Span, text: impl Into<String>) -> Self {
        self.fixes.push((title.into(), vec![(span, text.into())]));
        self
    }

    /// An offer to mend it by several replacements.
    #[must_use]
    pub fn fix_all(mut self, title: impl Into<String>, edits: Vec<(Span, String)>) -> Self {
        self.fixes.push((title.into(), edits));
        self
    }

    /// The same problem with every place `offset` bytes earlier: from the file to the item.
    #[must_use]
    pub fn rebased(mut self, offset: u32) -> Self {
        let back = |span: Span| Span::new(span.start.saturating_sub(offset), span.end.saturating_sub(offset));
        self.span = back(self.span);
        if let Some((span, _)) = &mut self.related {
            *span = back(*span);
        }
        for (_, edits) in &mut self.fixes {
            for (span, _) in edits {
                *span = back(*span);
            }
        }
        self
    }
}
