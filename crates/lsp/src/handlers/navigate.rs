//! From a name to its declaration.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{GotoDefinitionParams, Location};

use crate::core::Core;
use crate::handlers::{Asked, SPEC};

/// Where the name at a place is declared.
pub fn definition(core: &mut Core, params: GotoDefinitionParams) -> Result<Option<Location>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position_params)?;
    let jump = layshaft_ide::definition::definition(&asked.snapshot, SPEC, offset);
    Ok(jump.and_then(|jump| asked.location(core, jump.to)))
}
