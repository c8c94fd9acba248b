//! Files that are about to move: what the specs that name them have to say then.

use std::collections::BTreeMap;
use std::path::Path;

use layshaft_ide::Snapshot;
use layshaft_ide::moves::{Move, moved};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{
    FileOperationFilter, FileOperationPattern, FileOperationPatternKind, FileOperationRegistrationOptions,
    FileRename, RenameFilesParams, TextEdit, Url, WorkspaceEdit,
};

use crate::core::Core;
use crate::disk::Place;
use crate::handlers::{Asked, names};
use crate::specs::file_path;

/// Which moves the server wants to hear of before they happen.
pub fn filters() -> FileOperationRegistrationOptions {
    let filter = |glob: &str, matches| FileOperationFilter {
        scheme: Some(String::from("file")),
        pattern: FileOperationPattern { glob: glob.to_owned(), matches: Some(matches), options: None },
    };
    FileOperationRegistrationOptions {
        filters: vec![
            filter("**/*.shaft", FileOperationPatternKind::File),
            filter("**/*.csv", FileOperationPatternKind::File),
            filter("**/*", FileOperationPatternKind::Folder),
        ],
    }
}

/// The edits that keep every path true, in open specs and closed ones.
pub fn will_rename(core: &mut Core, params: RenameFilesParams) -> Result<Option<WorkspaceEdit>> {
    let mut edits: BTreeMap<Url, Vec<TextEdit>> = BTreeMap::new();
    let open: Vec<Url> = core.specs.specs.keys().cloned().collect();
    for uri in open {
        let place = core.specs.documents.get(&uri).and_then(|document| document.place.clone());
        let Some(place) = place else { continue };
        let Ok(asked) = Asked::new(core, &uri) else { continue };
        take(core, &asked, &place, &params.files, &mut edits);
    }
    for closed in core.specs.closed(&core.folders) {
        let asked = Asked::closed(&closed);
        take(core, &asked, &closed.place, &params.files, &mut edits);
    }
    Ok((!edits.is_empty()).then(|| names::workspace_edit(core, edits)))
}

fn take(
    core: &Core,
    asked: &Asked,
    place: &Place,
    files: &[FileRename],
    edits: &mut BTreeMap<Url, Vec<TextEdit>>,
) {
    let moves: Vec<Move> = files.iter().filter_map(|file| below_root(core, place, file)).collect();
    if moves.is_empty() {
        return;
    }
    let snapshot: &Snapshot = &asked.snapshot;
    for edit in moved(snapshot, &moves) {
        if let Some(range) = asked.range(core, edit.place) {
            edits.entry(asked.uri.clone()).or_default().push(TextEdit::new(range, edit.text));
        }
    }
}

/// A move as paths below the root of a spec; none where the old place is not below it.
fn below_root(core: &Core, spec: &Place, file: &FileRename) -> Option<Move> {
    let path = |uri: &str| file_path(&Url::parse(uri).ok()?);
    let old = path(&file.old_uri)?;
    // Through the disk, so that links in the path to the root do not hide that it is the same.
    let old = core.specs.disk().place(&old).map_or(old, |place| place.whole());
    let new = path(&file.new_uri)?;
    let new = core.specs.disk().place(&new).map_or(new, |place| place.whole());
    Some(Move { from: relative(&spec.root, &old)?, to: relative(&spec.root, &new) })
}

fn relative(root: &Path, path: &Path) -> Option<String> {
    let names: Option<Vec<&str>> = path.strip_prefix(root).ok()?.iter().map(|name| name.to_str()).collect();
    names.filter(|names| !names.is_empty()).map(|names| names.join("/"))
}
