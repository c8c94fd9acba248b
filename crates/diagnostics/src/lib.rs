//! Spans, files, lines, diagnostics and the table of codes.
//!
//! Every stage of Layshaft reports what it found as a [`Diagnostic`]; nothing here knows how one is shown.

mod code;
mod diagnostic;
mod lines;
mod span;

pub use code::{CODES, Code, CodeRow, Severity};
pub use diagnostic::{Diagnostic, Edit, Fix, Label};
pub use lines::{LineIndex, Position};
pub use span::{FileId, FileSpan, Span};
