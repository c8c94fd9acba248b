//! What those who serve an editor need of the crates below: places, files, and the text in its one form.

pub use layshaft_diagnostics::{
    CODES, Code, Diagnostic, Edit, FileId, FileSpan, Fix, Label, LineIndex, Position, Severity, Span,
};
pub use layshaft_semantics::analysis::SourceFile;
pub use layshaft_semantics::{Analysis, Files, Memo, NoFiles, ReadError};
pub use layshaft_syntax::format::{Formatted, format, format_range};
