//! Commands: pages that a client shows as documents of their own. Each answers with Markdown.

use layshaft_ide::documents::{explain, result_table};
use serde_json::Value;
use tower_lsp::jsonrpc::{Error, Result};
use tower_lsp::lsp_types::{ExecuteCommandParams, Position, Url};

use crate::core::Core;
use crate::handlers::{Asked, SPEC};

/// The page of a code. Argument: the code.
pub const EXPLAIN: &str = "layshaft.explain";
/// Everything known of a drive. Arguments: the document, a position on the name of the drive.
pub const RESULT_TABLE: &str = "layshaft.resultTable";

/// Runs a command.
pub fn execute(core: &mut Core, params: ExecuteCommandParams) -> Result<Option<String>> {
    let mut arguments = params.arguments.into_iter();
    match params.command.as_str() {
        EXPLAIN => {
            let code: String = argument(arguments.next(), "a code")?;
            explain(&code)
                .map(|page| Some(page.to_owned()))
                .ok_or_else(|| Error::invalid_params(format!("`{code}` is not a code")))
        }
        RESULT_TABLE => {
            let uri: Url = argument(arguments.next(), "a document")?;
            let position: Position = argument(arguments.next(), "a position")?;
            let asked = Asked::new(core, &uri)?;
            let offset = asked.offset(core, position);
            let reference = asked.snapshot.reference(SPEC, offset);
            let drive = reference.and_then(|name| asked.snapshot.declaration(&name.target));
            Ok(drive.and_then(|drive| result_table(&asked.snapshot, drive)))
        }
        other => Err(Error::invalid_params(format!("`{other}` is not a command of this server"))),
    }
}

fn argument<T: serde::de::DeserializeOwned>(value: Option<Value>, what: &str) -> Result<T> {
    let value = value.ok_or_else(|| Error::invalid_params(format!("{what} is missing")))?;
    serde_json::from_value(value).map_err(|error| Error::invalid_params(format!("{what}: {error}")))
}
