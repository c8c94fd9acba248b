//! What the protocol asks for, one file a group: convert, ask `ide`, convert.

mod actions;
mod calls;
pub mod commands;
mod complete;
pub mod diagnostics;
mod documents;
mod files;
mod format;
mod initialize;
mod names;
mod navigate;
mod outline;
pub mod paint;
mod read;
mod results;
pub mod settings;
mod sync;
mod typing;

use std::path::PathBuf;
use std::sync::Arc;

use layshaft_ide::Snapshot;
use layshaft_ide::base::{FileId, FileSpan, SourceFile};
use serde::Serialize;
use serde::de::DeserializeOwned;
use serde_json::Value;
use tower_lsp::jsonrpc::{Error, Result};
use tower_lsp::lsp_types::{Location, Position, Range, TextDocumentPositionParams, Url};

use crate::closed::Closed;
use crate::core::Core;
use crate::outbox::value;

/// The spec itself; other files come behind it.
const SPEC: FileId = FileId(0);

/// Answers a request.
pub fn request(core: &mut Core, method: &str, params: Value) -> Result<Value> {
    match method {
        "initialize" => {
            let refresh = initialize::refreshes_diagnostics(&params);
            typed(core, params, |core, params| initialize::initialize(core, params, refresh))
        }
        "textDocument/definition" => typed(core, params, navigate::definition),
        "textDocument/implementation" => typed(core, params, navigate::implementation),
        "textDocument/references" => typed(core, params, names::all),
        "textDocument/documentHighlight" => typed(core, params, names::highlights),
        "textDocument/prepareRename" => typed(core, params, names::prepare),
        "textDocument/rename" => typed(core, params, names::rename),
        "textDocument/hover" => typed(core, params, read::hovered),
        "textDocument/inlayHint" => typed(core, params, read::inlay),
        "inlayHint/resolve" => typed(core, params, read::resolve_inlay),
        "textDocument/codeLens" => typed(core, params, read::lens),
        "textDocument/completion" => typed(core, params, complete::complete),
        "completionItem/resolve" => typed(core, params, complete::resolve),
        "textDocument/signatureHelp" => typed(core, params, typing::signature),
        "textDocument/semanticTokens/full" => typed(core, params, paint::full),
        "textDocument/semanticTokens/full/delta" => typed(core, params, paint::delta),
        "textDocument/semanticTokens/range" => typed(core, params, paint::range),
        "textDocument/onTypeFormatting" => typed(core, params, typing::typed),
        "textDocument/documentSymbol" => typed(core, params, outline::document),
        "workspace/symbol" => typed(core, params, outline::workspace),
        "textDocument/foldingRange" => typed(core, params, outline::folding),
        "textDocument/selectionRange" => typed(core, params, outline::selection),
        "textDocument/documentLink" => typed(core, params, outline::links),
        "textDocument/prepareCallHierarchy" => typed(core, params, calls::prepare),
        "callHierarchy/outgoingCalls" => typed(core, params, calls::outgoing),
        "callHierarchy/incomingCalls" => typed(core, params, calls::incoming),
        "workspace/executeCommand" => typed(core, params, commands::execute),
        "textDocument/codeAction" => typed(core, params, actions::offered),
        "textDocument/typeDefinition" => typed(core, params, documents::of_kind),
        "workspace/willRenameFiles" => typed(core, params, files::will_rename),
        "layshaft/document" => typed(core, params, documents::document),
        "workspace/textDocumentContent" => typed(core, params, documents::content),
        "layshaft/results" => typed(core, params, results::asked),
        "textDocument/diagnostic" => typed(core, params, diagnostics::document),
        "workspace/diagnostic" => typed(core, params, diagnostics::workspace),
        "textDocument/formatting" => typed(core, params, format::document),
        "textDocument/rangeFormatting" => typed(core, params, format::range),
        _ => Err(Error {
            message: format!("`{method}` is not known here").into(),
            ..Error::method_not_found()
        }),
    }
}

/// Takes a notification. Unknown ones are passed over.
pub fn notification(core: &mut Core, method: &str, params: Value) -> std::result::Result<(), String> {
    match method {
        "initialized" => initialize::initialized(core),
        "textDocument/didOpen" => sync::opened(core, parsed(params)?),
        "textDocument/didChange" => return sync::changed(core, parsed(params)?),
        "textDocument/didClose" => return sync::closed(core, &parsed(params)?),
        "textDocument/didSave" => sync::saved(core),
        "workspace/didChangeWatchedFiles" => sync::watched(core, parsed(params)?),
        "workspace/didChangeWorkspaceFolders" => sync::folders(core, parsed(params)?),
        "workspace/didChangeConfiguration" => settings::changed(core, parsed(params)?),
        _ => {}
    }
    Ok(())
}

fn parsed<P: DeserializeOwned>(params: Value) -> std::result::Result<P, String> {
    serde_json::from_value(params).map_err(|error| error.to_string())
}

fn typed<P: DeserializeOwned, R: Serialize>(
    core: &mut Core,
    params: Value,
    handler: impl FnOnce(&mut Core, P) -> Result<R>,
) -> Result<Value> {
    let params = parsed(params).map_err(Error::invalid_params)?;
    handler(core, params).map(|answer| value(&answer))
}

/// A spec with a place in it.
struct Asked {
    uri: Url,
    snapshot: Arc<Snapshot>,
    /// The root of a closed spec; that of an open one stands with its document.
    root: Option<PathBuf>,
}

impl Asked {
    /// The spec a request is about.
    fn new(core: &mut Core, uri: &Url) -> Result<Self> {
        match core.specs.snapshot(uri) {
            Some(snapshot) => Ok(Self { uri: uri.clone(), snapshot, root: None }),
            None if core.specs.specs.get(uri).is_some_and(|spec| spec.stopped > 0) => {
                Err(Error::content_modified())
            }
            None if core.specs.specs.contains_key(uri) => Err(Error {
                message: "the analysis of this text failed; change it to try again".into(),
                ..Error::internal_error()
            }),
            None => Err(Error::invalid_params(format!("{uri} is not open as a spec"))),
        }
    }

    /// The spec and the offset a request is about.
    fn at(core: &mut Core, place: &TextDocumentPositionParams) -> Result<(Self, u32)> {
        let asked = Self::new(core, &place.text_document.uri)?;
        let offset = asked.offset(core, place.position);
        Ok((asked, offset))
    }

    /// A closed spec, its names read.
    fn closed(of: &Closed) -> Self {
        Self { uri: of.uri.clone(), snapshot: Arc::clone(&of.snapshot), root: Some(of.place.root.clone()) }
    }

    /// The name of one of its files in the client's words.
    fn uri_of(&self, core: &Core, file: FileId) -> Option<Url> {
        match &self.root {
            Some(root) => core.specs.uri_below(&self.uri, Some(root), &self.snapshot, file),
            None => core.specs.uri_of(&self.uri, &self.snapshot, file),
        }
    }

    fn file(&self) -> &SourceFile {
        // An analysis always holds its spec.
        &self.snapshot.analysis.files[0]
    }

    fn offset(&self, core: &Core, position: Position) -> u32 {
        core.client.encoding.offset(self.file(), position)
    }

    /// A place of the spec or a file that it uses.
    fn location(&self, core: &Core, place: FileSpan) -> Option<Location> {
        Some(Location::new(self.uri_of(core, place.file)?, self.range(core, place)?))
    }

    fn range(&self, core: &Core, place: FileSpan) -> Option<Range> {
        Some(core.client.encoding.range(self.snapshot.file(place.file)?, place.span))
    }
}
