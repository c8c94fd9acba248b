//! A text in its one form.

use layshaft_ide::base::{Span, format_range};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{DocumentFormattingParams, DocumentRangeFormattingParams, TextEdit};

use crate::core::Core;
use crate::handlers::Asked;

/// The changes that bring the whole text into its form: the items that differ, so that the cursor stays.
pub fn document(core: &mut Core, params: DocumentFormattingParams) -> Result<Vec<TextEdit>> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let whole = Span::new(0, asked.file().text.len() as u32);
    Ok(edits(core, &asked, whole))
}

/// The same for the items that a range touches.
pub fn range(core: &mut Core, params: DocumentRangeFormattingParams) -> Result<Vec<TextEdit>> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let span = core.client.encoding.span(asked.file(), params.range);
    Ok(edits(core, &asked, span))
}

fn edits(core: &Core, asked: &Asked, span: Span) -> Vec<TextEdit> {
    let file = asked.file();
    let edit = |(span, text)| TextEdit::new(core.client.encoding.range(file, span), text);
    format_range(&file.text, span).into_iter().map(edit).collect()
}
