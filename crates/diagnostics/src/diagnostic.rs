//! One finding: what, where, why and what to write instead.

use crate::{Code, FileSpan, Severity};

/// A place with a few words beside it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Label {
    /// Where.
    pub place: FileSpan,
    /// What is to be seen there.
    pub text: String,
}

/// One replacement of text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Edit {
    /// What is replaced; empty for an insertion.
    pub place: FileSpan,
    /// What stands there instead.
    pub text: String,
}

/// A change that mends the finding, safe to apply without a further thought of syntax.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Fix {
    /// What it does, as an offer: ``write `0.5 in` ``.
    pub title: String,
    /// The replacements, none overlapping.
    pub edits: Vec<Edit>,
}

/// One finding.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Diagnostic {
    /// The row of the table of codes.
    pub code: Code,
    /// How grave it is here.
    pub severity: Severity,
    /// One sentence without a final point: what is wrong.
    pub message: String,
    /// The place it is about, with a few words (may be empty).
    pub primary: Label,
    /// Other places that take part.
    pub related: Vec<Label>,
    /// Why it matters, one sentence each.
    pub notes: Vec<String>,
    /// What to write instead, where no fix can be applied or as its explanation.
    pub help: Option<String>,
    /// Changes that mend it, best first.
    pub fixes: Vec<Fix>,
    /// Fields it is about: any one of these groups given mends a finding of missing fields; the fields of the one group
    /// of a contradiction cannot all be true.
    pub fields: Vec<Vec<&'static str>>,
}

impl Diagnostic {
    /// A finding of `code` at `place`, with the severity of the code's row.
    #[must_use]
    pub fn new(code: Code, place: FileSpan, message: impl Into<String>) -> Self {
        Self {
            code,
            severity: code.row().severity,
            message: message.into(),
            primary: Label { place, text: String::new() },
            related: Vec::new(),
            notes: Vec::new(),
            help: None,
            fixes: Vec::new(),
            fields: Vec::new(),
        }
    }

    /// Words beside the primary place.
    #[must_use]
    pub fn label(mut self, text: impl Into<String>) -> Self {
        self.primary.text = text.into();
        self
    }

    /// A further place.
    #[must_use]
    pub fn related(mut self, place: FileSpan, text: impl Into<String>) -> Self {
        self.related.push(Label { place, text: text.into() });
        self
    }

    /// A reason.
    #[must_use]
    pub fn note(mut self, text: impl Into<String>) -> Self {
        self.notes.push(text.into());
        self
    }

    /// What to write instead.
    #[must_use]
    pub fn help(mut self, text: impl Into<String>) -> Self {
        self.help = Some(text.into());
        self
    }

    /// The fields it is about, by groups.
    #[must_use]
    pub fn fields(mut self, groups: Vec<Vec<&'static str>>) -> Self {
        self.fields = groups;
        self
    }

    /// A change that mends it: one replacement.
    #[must_use]
    pub fn fix(mut self, title: impl Into<String>, place: FileSpan, text: impl Into<String>) -> Self {
        self.fixes.push(Fix { title: title.into(), edits: vec![Edit { place, text: text.into() }] });
        self
    }
}
