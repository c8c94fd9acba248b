//! Documents and files: opened, changed, closed, changed on the disk.

use tower_lsp::lsp_types::{
    DidChangeTextDocumentParams, DidChangeWatchedFilesParams, DidChangeWorkspaceFoldersParams,
    DidCloseTextDocumentParams, DidOpenTextDocumentParams, MessageType, Url,
};

use crate::core::Core;
use crate::handlers::diagnostics;
use crate::specs::file_path;

/// The file whose coming and going moves the roots.
const ROOT_MARK: &str = "layshaft.toml";

/// A document was opened.
pub fn opened(core: &mut Core, params: DidOpenTextDocumentParams) {
    let document = params.text_document;
    core.specs.open(&document.uri, &document.language_id, document.version, document.text);
    without_watching(core);
}

/// A document changed.
///
/// # Errors
/// It is not open.
pub fn changed(core: &mut Core, params: DidChangeTextDocumentParams) -> Result<(), String> {
    let uri = params.text_document.uri;
    let Some(document) = core.specs.documents.get_mut(&uri) else {
        return Err(format!("{uri} is not open; the change is lost"));
    };
    let (before, now) = (document.version, params.text_document.version);
    document.version = now;
    document.change(params.content_changes, core.client.encoding);
    core.specs.edited(&uri);
    if now <= before {
        core.out.log(MessageType::WARNING, format!("{uri}: version {now} came after version {before}"));
    }
    Ok(())
}

/// A document was closed: what the disk holds counts again.
///
/// # Errors
/// It was not open.
pub fn closed(core: &mut Core, params: &DidCloseTextDocumentParams) -> Result<(), String> {
    let uri = &params.text_document.uri;
    if !core.specs.close(uri) {
        return Err(format!("{uri} is not open"));
    }
    diagnostics::forget(core, uri);
    Ok(())
}

/// A document was written to the disk.
pub fn saved(core: &mut Core) {
    without_watching(core);
}

/// A client that does not watch files gives no sign of a change but this.
fn without_watching(core: &mut Core) {
    if !core.client.watches {
        core.specs.look_again();
    }
}

/// Files changed on the disk. Only what asked for them is analyzed again.
pub fn watched(core: &mut Core, params: DidChangeWatchedFilesParams) {
    for event in params.changes {
        let Some(path) = file_path(&event.uri) else { continue };
        if path.ends_with(ROOT_MARK) {
            return core.specs.placed_anew();
        }
        let place = core.specs.disk().place(&path);
        core.specs.changed(&place.map_or(path, |place| place.whole()));
    }
}

/// Folders came or went.
pub fn folders(core: &mut Core, params: DidChangeWorkspaceFoldersParams) {
    let gone = |uri: &Url| params.event.removed.iter().any(|folder| folder.uri == *uri);
    core.folders.retain(|uri| !gone(uri));
    core.folders.extend(params.event.added.into_iter().map(|folder| folder.uri));
}
