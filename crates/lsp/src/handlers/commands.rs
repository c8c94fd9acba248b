//! Commands: pages that a client shows as documents of their own. Each answers with Markdown.

use layshaft_ide::documents::explain;
use serde_json::Value;
use tower_lsp::jsonrpc::{Error, Result};
use tower_lsp::lsp_types::{ExecuteCommandParams, Position, Url};

use crate::core::Core;
use crate::handlers::documents;

/// The page of a code. Argument: the code.
pub const EXPLAIN: &str = "layshaft.explain";
/// Everything known of a drive. Arguments: the document, a position on something of the drive.
pub const RESULT_TABLE: &str = "layshaft.resultTable";

/// Runs a command. A client that shows documents of the server is asked to show it, the others get the text.
pub fn execute(core: &mut Core, params: ExecuteCommandParams) -> Result<Option<String>> {
    let mut arguments = params.arguments.into_iter();
    match params.command.as_str() {
        EXPLAIN => {
            let code: String = argument(arguments.next(), "a code")?;
            let page =
                explain(&code).ok_or_else(|| Error::invalid_params(format!("`{code}` is not a code")))?;
            Ok((!documents::show_code(core, &code)).then(|| page.to_owned()))
        }
        RESULT_TABLE => {
            let uri: Url = argument(arguments.next(), "a document")?;
            let position: Position = argument(arguments.next(), "a position")?;
            let Some((drive, text)) = documents::table(core, &uri, position)? else { return Ok(None) };
            Ok((!documents::show_table(core, &drive, &uri, position)).then_some(text))
        }
        other => Err(Error::invalid_params(format!("`{other}` is not a command of this server"))),
    }
}

fn argument<T: serde::de::DeserializeOwned>(value: Option<Value>, what: &str) -> Result<T> {
    let value = value.ok_or_else(|| Error::invalid_params(format!("{what} is missing")))?;
    serde_json::from_value(value).map_err(|error| Error::invalid_params(format!("{what}: {error}")))
}
