//! Names: every place of one, and the rename of all of them, in every spec that is open and every closed one of the
//! open folders.

use std::collections::BTreeMap;

use layshaft_ide::base::FileId;
use layshaft_ide::references::{self, Renaming};
use tower_lsp::jsonrpc::{Error, ErrorCode, Result};
use tower_lsp::lsp_types::{
    DocumentChanges, DocumentHighlight, DocumentHighlightKind, DocumentHighlightParams, Location, OneOf,
    OptionalVersionedTextDocumentIdentifier, PrepareRenameResponse, ReferenceParams, RenameParams,
    TextDocumentEdit, TextDocumentPositionParams, TextEdit, Url, WorkspaceEdit,
};

use crate::core::Core;
use crate::handlers::{Asked, SPEC};
use crate::service::error;

/// The same name as each spec sees it that holds its declaration.
fn seen_by_all(core: &mut Core, asked: Asked, offset: u32) -> Vec<(Asked, FileId, u32)> {
    let target = asked.snapshot.reference(SPEC, offset).map(|name| &name.target);
    let declared = target.and_then(|target| asked.snapshot.declaration(target));
    let home = declared.and_then(|place| Some((asked.location(core, place)?.uri, place.span.start)));
    let mut seen = Vec::new();
    if let Some((home, start)) = home {
        let others: Vec<Url> = core.specs.specs.keys().filter(|uri| **uri != asked.uri).cloned().collect();
        let mut all: Vec<Asked> = others.iter().filter_map(|uri| Asked::new(core, uri).ok()).collect();
        all.extend(core.specs.closed(&core.folders).iter().map(Asked::closed));
        for other in all {
            let files = 0..other.snapshot.analysis.files.len() as u32;
            let same = |file: &FileId| other.uri_of(core, *file).is_some_and(|uri| uri == home);
            let file = files.map(FileId).find(same);
            if let Some(file) = file {
                seen.push((other, file, start));
            }
        }
    }
    seen.insert(0, (asked, SPEC, offset));
    seen
}

/// Every place of a name.
pub fn all(core: &mut Core, params: ReferenceParams) -> Result<Vec<Location>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position)?;
    let declaration = params.context.include_declaration;
    let mut found: Vec<Location> = Vec::new();
    for (asked, file, offset) in seen_by_all(core, asked, offset) {
        let places = references::references(&asked.snapshot, file, offset, declaration);
        for location in places.into_iter().filter_map(|place| asked.location(core, place)) {
            if !found.contains(&location) {
                found.push(location);
            }
        }
    }
    Ok(found)
}

/// The places of a name in the same text.
pub fn highlights(core: &mut Core, params: DocumentHighlightParams) -> Result<Vec<DocumentHighlight>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position_params)?;
    let found = references::highlights(&asked.snapshot, SPEC, offset);
    let one = |light: references::Highlight| {
        let kind = if light.writes { DocumentHighlightKind::WRITE } else { DocumentHighlightKind::READ };
        Some(DocumentHighlight { range: asked.range(core, light.place)?, kind: Some(kind) })
    };
    Ok(found.into_iter().filter_map(one).collect())
}

/// Whether a name can be another.
pub fn prepare(core: &mut Core, params: TextDocumentPositionParams) -> Result<Option<PrepareRenameResponse>> {
    let (asked, offset) = Asked::at(core, &params)?;
    let Renaming { place, name } =
        references::prepare_rename(&asked.snapshot, SPEC, offset).map_err(refused)?;
    let range = asked.range(core, place);
    Ok(range.map(|range| PrepareRenameResponse::RangeWithPlaceholder { range, placeholder: name }))
}

/// The changes that give a name another spelling everywhere.
pub fn rename(core: &mut Core, params: RenameParams) -> Result<WorkspaceEdit> {
    let (asked, offset) = Asked::at(core, &params.text_document_position)?;
    let mut edits: BTreeMap<Url, Vec<TextEdit>> = BTreeMap::new();
    for (asked, file, offset) in seen_by_all(core, asked, offset) {
        let found = references::rename(&asked.snapshot, file, offset, &params.new_name).map_err(refused)?;
        for edit in found {
            let Some(Location { uri, range }) = asked.location(core, edit.place) else { continue };
            let edit = TextEdit::new(range, edit.text);
            let of_file = edits.entry(uri).or_default();
            if !of_file.contains(&edit) {
                of_file.push(edit);
            }
        }
    }
    Ok(workspace_edit(core, edits))
}

/// Changes in the form that the client takes.
pub(super) fn workspace_edit(core: &Core, edits: BTreeMap<Url, Vec<TextEdit>>) -> WorkspaceEdit {
    if !core.client.versioned_edits {
        return WorkspaceEdit { changes: Some(edits.into_iter().collect()), ..WorkspaceEdit::default() };
    }
    let of_file = |(uri, edits): (Url, Vec<TextEdit>)| {
        let version = core.specs.documents.get(&uri).map(|document| document.version);
        TextDocumentEdit {
            text_document: OptionalVersionedTextDocumentIdentifier { uri, version },
            edits: edits.into_iter().map(OneOf::Left).collect(),
        }
    };
    let all = edits.into_iter().map(of_file).collect();
    WorkspaceEdit { document_changes: Some(DocumentChanges::Edits(all)), ..WorkspaceEdit::default() }
}

/// A request that is understood and cannot be granted.
fn refused(why: String) -> Error {
    error(ErrorCode::ServerError(-32803), why)
}
