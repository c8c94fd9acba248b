//! What the client can do, as far as the server acts upon it.

use tower_lsp::lsp_types::{
    ClientCapabilities, CompletionClientCapabilities, InitializeParams, PositionEncodingKind,
};

use crate::convert::Encoding;

/// What the client can do.
#[derive(Clone, Debug, Default)]
pub struct Client {
    /// What columns count.
    pub encoding: Encoding,
    /// Whether the client asks for findings; else they are sent.
    pub pulls: bool,
    /// Whether an answer may hold the findings of other files.
    pub related_documents: bool,
    /// Whether findings may point to other places.
    pub related_information: bool,
    /// Whether the client answers questions for its settings.
    pub configuration: bool,
    /// Whether it tells of changed settings only where asked to.
    pub register_configuration: bool,
    /// Whether it watches files where asked to.
    pub watches: bool,
    /// Which answers the client takes again when told that they changed.
    pub refresh: Refresh,
    /// Whether an edit may name the version it is for.
    pub versioned_edits: bool,
    /// What a list of entries may hold.
    pub completion: Completion,
    /// Whether charts may stand in a hover.
    pub charts: bool,
    /// Whether documents of the server's own scheme can be opened.
    pub documents: bool,
    /// Whether the client shows a document when asked to.
    pub shows: bool,
    /// Whether a code of a finding may link to its page.
    pub code_links: bool,
    /// Whether the client shows how long work goes on.
    pub progress: bool,
    /// The process to end with.
    pub process: Option<u32>,
}

/// Which answers the client takes again when told that they changed.
#[derive(Clone, Copy, Debug, Default)]
pub struct Refresh {
    /// Findings.
    pub diagnostics: bool,
    /// Inlay hints.
    pub hints: bool,
    /// Code lenses.
    pub lenses: bool,
    /// Semantic tokens.
    pub tokens: bool,
}

/// What a list of entries may hold.
#[derive(Clone, Copy, Debug, Default)]
pub struct Completion {
    /// Texts with places to be filled in.
    pub snippets: bool,
    /// One edit for putting a word in and one for writing it anew.
    pub insert_replace: bool,
    /// A few words beside the label.
    pub label_details: bool,
    /// One range for all entries.
    pub default_range: bool,
}

impl Completion {
    fn new(of: &CompletionClientCapabilities) -> Self {
        let item = of.completion_item.as_ref();
        let on = |flag: Option<bool>| flag == Some(true);
        let defaults = of.completion_list.as_ref().and_then(|list| list.item_defaults.as_ref());
        Self {
            snippets: on(item.and_then(|of| of.snippet_support)),
            insert_replace: on(item.and_then(|of| of.insert_replace_support)),
            label_details: on(item.and_then(|of| of.label_details_support)),
            default_range: defaults.is_some_and(|known| known.iter().any(|one| one == "editRange")),
        }
    }
}

impl Client {
    /// Reads what a client says of itself.
    #[must_use]
    pub fn new(params: &InitializeParams) -> Self {
        let of = &params.capabilities;
        let workspace = of.workspace.as_ref();
        let document = of.text_document.as_ref();
        let window = of.window.as_ref();
        let options = params.initialization_options.as_ref();
        let on = |flag: Option<bool>| flag == Some(true);
        Self {
            encoding: encoding(of),
            pulls: document.is_some_and(|of| of.diagnostic.is_some()),
            related_documents: on(document
                .and_then(|of| of.diagnostic.as_ref())
                .and_then(|of| of.related_document_support)),
            related_information: on(document
                .and_then(|of| of.publish_diagnostics.as_ref())
                .and_then(|of| of.related_information)),
            configuration: on(workspace.and_then(|of| of.configuration)),
            register_configuration: on(workspace
                .and_then(|of| of.did_change_configuration)
                .and_then(|of| of.dynamic_registration)),
            watches: on(workspace
                .and_then(|of| of.did_change_watched_files)
                .and_then(|of| of.dynamic_registration)),
            refresh: Refresh {
                diagnostics: on(workspace
                    .and_then(|of| of.diagnostic.as_ref())
                    .and_then(|of| of.refresh_support)),
                hints: on(workspace.and_then(|of| of.inlay_hint.as_ref()).and_then(|of| of.refresh_support)),
                tokens: on(workspace
                    .and_then(|of| of.semantic_tokens.as_ref())
                    .and_then(|of| of.refresh_support)),
                lenses: on(workspace.and_then(|of| of.code_lens.as_ref()).and_then(|of| of.refresh_support)),
            },
            versioned_edits: on(workspace
                .and_then(|of| of.workspace_edit.as_ref())
                .and_then(|of| of.document_changes)),
            completion: document
                .and_then(|of| of.completion.as_ref())
                .map_or_else(Completion::default, Completion::new),
            documents: options.and_then(|of| of.get("documents")).and_then(serde_json::Value::as_bool)
                == Some(true),
            shows: window.and_then(|of| of.show_document.as_ref()).is_some_and(|of| of.support),
            code_links: on(document
                .and_then(|of| of.publish_diagnostics.as_ref())
                .and_then(|of| of.code_description_support)),
            progress: on(window.and_then(|of| of.work_done_progress)),
            process: params.process_id,
            charts: options.and_then(|of| of.get("charts")).and_then(serde_json::Value::as_bool)
                == Some(true),
        }
    }
}

/// UTF-8 where the client offers it before UTF-16; UTF-16 is what every client can.
fn encoding(of: &ClientCapabilities) -> Encoding {
    let offered = of.general.as_ref().and_then(|of| of.position_encodings.as_ref());
    let known = offered.into_iter().flatten().find_map(|kind| {
        if *kind == PositionEncodingKind::UTF8 {
            Some(Encoding::Utf8)
        } else if *kind == PositionEncodingKind::UTF16 {
            Some(Encoding::Utf16)
        } else {
            None
        }
    });
    known.unwrap_or_default()
}
