//! The shape of a text: its declarations, what folds, how a selection grows, the files it names.

use layshaft_ide::folding::{folds, selections};
use layshaft_ide::links::document_links;
use layshaft_ide::symbols::{self, Symbol, SymbolKind as Kind, workspace_symbols};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{
    DocumentLink, DocumentLinkParams, DocumentSymbol, DocumentSymbolParams, FoldingRange, FoldingRangeKind,
    FoldingRangeParams, SelectionRange, SelectionRangeParams, SymbolInformation, SymbolKind, Url,
    WorkspaceSymbolParams,
};

use crate::core::Core;
use crate::disk::below;
use crate::handlers::{Asked, SPEC};

/// The declarations of a text.
pub fn document(core: &mut Core, params: DocumentSymbolParams) -> Result<Vec<DocumentSymbol>> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let found = symbols::document_symbols(&asked.snapshot, SPEC);
    Ok(found.into_iter().filter_map(|symbol| document_symbol(core, &asked, symbol)).collect())
}

#[allow(deprecated, reason = "the type has the field, and wants a value for it")]
fn document_symbol(core: &Core, asked: &Asked, symbol: Symbol) -> Option<DocumentSymbol> {
    let children: Vec<DocumentSymbol> =
        symbol.children.into_iter().filter_map(|child| document_symbol(core, asked, child)).collect();
    Some(DocumentSymbol {
        name: symbol.name,
        detail: Some(symbol.detail).filter(|detail| !detail.is_empty()),
        kind: kind(symbol.kind),
        tags: None,
        deprecated: None,
        range: asked.range(core, symbol.whole)?,
        selection_range: asked.range(core, symbol.place)?,
        children: (!children.is_empty()).then_some(children),
    })
}

/// A kind of declaration in the words of the protocol.
pub const fn kind(of: Kind) -> SymbolKind {
    match of {
        Kind::File => SymbolKind::FILE,
        Kind::Value => SymbolKind::VARIABLE,
        Kind::Supply => SymbolKind::INTERFACE,
        Kind::Source | Kind::Transmission | Kind::Load => SymbolKind::OBJECT,
        Kind::Field => SymbolKind::FIELD,
        Kind::Drive => SymbolKind::CLASS,
        Kind::Case => SymbolKind::NAMESPACE,
        Kind::Criterion => SymbolKind::EVENT,
    }
}

/// The declarations of every spec, open or closed, and the files it uses, by some letters of the name.
#[allow(deprecated, reason = "the type has the field, and wants a value for it")]
pub fn workspace(core: &mut Core, params: WorkspaceSymbolParams) -> Result<Vec<SymbolInformation>> {
    let specs: Vec<Url> = core.specs.specs.keys().cloned().collect();
    let mut all: Vec<Asked> = specs.iter().filter_map(|uri| Asked::new(core, uri).ok()).collect();
    all.extend(core.specs.closed(&core.folders).iter().map(Asked::closed));
    let mut found: Vec<SymbolInformation> = Vec::new();
    for asked in all {
        for symbol in workspace_symbols(&asked.snapshot, &params.query) {
            let Some(location) = asked.location(core, symbol.place) else { continue };
            found.push(SymbolInformation {
                name: symbol.name,
                kind: kind(symbol.kind),
                tags: None,
                deprecated: None,
                location,
                container_name: None,
            });
        }
    }
    let place = |one: &SymbolInformation| (one.location.uri.clone(), one.location.range.start);
    found.sort_by_key(place);
    found.dedup_by_key(|one| place(one));
    Ok(found)
}

/// What folds.
pub fn folding(core: &mut Core, params: FoldingRangeParams) -> Result<Vec<FoldingRange>> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let range = |fold: layshaft_ide::folding::Fold| FoldingRange {
        start_line: fold.first,
        end_line: fold.last,
        kind: fold.comment.then_some(FoldingRangeKind::Comment),
        ..FoldingRange::default()
    };
    Ok(folds(&asked.snapshot, SPEC).into_iter().map(range).collect())
}

/// How selections grow.
pub fn selection(core: &mut Core, params: SelectionRangeParams) -> Result<Vec<SelectionRange>> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let grown = |position| {
        let offset = asked.offset(core, position);
        let mut spans = selections(&asked.snapshot, SPEC, offset);
        spans.reverse();
        let mut outer: Option<Box<SelectionRange>> = None;
        for span in spans {
            let range = core.client.encoding.range(asked.file(), span);
            outer = Some(Box::new(SelectionRange { range, parent: outer }));
        }
        outer.map_or_else(
            || SelectionRange { range: tower_lsp::lsp_types::Range::new(position, position), parent: None },
            |outer| *outer,
        )
    };
    Ok(params.positions.into_iter().map(grown).collect())
}

/// The files that a text names.
pub fn links(core: &mut Core, params: DocumentLinkParams) -> Result<Vec<DocumentLink>> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let place = core.specs.documents.get(&asked.uri).and_then(|document| document.place.clone());
    let Some(place) = place else { return Ok(Vec::new()) };
    let link = |link: layshaft_ide::links::Link| {
        let target = core.specs.uri_at(&below(&place.root, &link.path))?;
        let range = asked.range(core, link.place)?;
        Some(DocumentLink { range, target: Some(target), tooltip: None, data: None })
    };
    Ok(document_links(&asked.snapshot, SPEC).into_iter().filter_map(link).collect())
}
