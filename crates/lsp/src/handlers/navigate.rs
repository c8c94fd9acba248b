//! From a name to its declaration, and to what overrides it.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::request::GotoImplementationParams;
use tower_lsp::lsp_types::{GotoDefinitionParams, Location};

use crate::core::Core;
use crate::handlers::{Asked, SPEC};

/// Where the name at a place is declared.
pub fn definition(core: &mut Core, params: GotoDefinitionParams) -> Result<Option<Location>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position_params)?;
    let jump = layshaft_ide::definition::definition(&asked.snapshot, SPEC, offset);
    Ok(jump.and_then(|jump| asked.location(core, jump.to)))
}

/// Every case and variant that overrides what is named at a place.
pub fn implementation(core: &mut Core, params: GotoImplementationParams) -> Result<Vec<Location>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position_params)?;
    let found = layshaft_ide::implementations::implementations(&asked.snapshot, SPEC, offset);
    Ok(found.into_iter().filter_map(|place| asked.location(core, place)).collect())
}
