//! The beginning: what the client can do, what the server offers.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::request::RegisterCapability;
use tower_lsp::lsp_types::{
    CallHierarchyServerCapability, CodeActionOptions, CodeActionProviderCapability, CodeLensOptions,
    CompletionOptions, DiagnosticOptions, DiagnosticServerCapabilities,
    DidChangeWatchedFilesRegistrationOptions, DocumentLinkOptions, ExecuteCommandOptions, FileSystemWatcher,
    FoldingRangeProviderCapability, GlobPattern, HoverProviderCapability, ImplementationProviderCapability,
    InitializeParams, InitializeResult, InlayHintOptions, InlayHintServerCapabilities, OneOf,
    PositionEncodingKind, Registration, RegistrationParams, RenameOptions, SaveOptions,
    SelectionRangeProviderCapability, ServerCapabilities, ServerInfo, TextDocumentSyncCapability,
    TextDocumentSyncKind, TextDocumentSyncOptions, TextDocumentSyncSaveOptions,
    TypeDefinitionProviderCapability, WorkDoneProgressOptions, WorkspaceFileOperationsServerCapabilities,
    WorkspaceFoldersServerCapabilities, WorkspaceServerCapabilities,
};

use crate::client::Client;
use crate::convert::Encoding;
use crate::core::Core;
use crate::handlers::{actions, commands, complete, files, paint, settings, typing};
use crate::outbox::{Asked, value};

/// What may change answers though it is not open.
const WATCHED: [&str; 3] = ["**/*.shaft", "**/*.csv", "**/layshaft.toml"];

/// Whether the client asks for findings again when told to. Clients say so under `diagnostics`, as the protocol has it;
/// the types at hand know only `diagnostic`.
pub fn refreshes_diagnostics(params: &serde_json::Value) -> bool {
    let said = params.pointer("/capabilities/workspace/diagnostics/refreshSupport");
    said.and_then(serde_json::Value::as_bool) == Some(true)
}

/// Agrees on what both can do.
pub fn initialize(core: &mut Core, params: InitializeParams, refresh: bool) -> Result<InitializeResult> {
    core.client = Client::new(&params);
    core.client.refresh.diagnostics |= refresh;
    if core.client.progress {
        core.watch.tell(core.out.channel());
    }
    core.folders = match params.workspace_folders {
        Some(folders) if !folders.is_empty() => folders.into_iter().map(|folder| folder.uri).collect(),
        _ => params.root_uri.into_iter().collect(),
    };
    if let Some(options) = &params.initialization_options {
        settings::set(core, options);
    }
    Ok(InitializeResult {
        capabilities: capabilities(&core.client),
        server_info: Some(ServerInfo {
            name: String::from("layshaft"),
            version: Some(env!("CARGO_PKG_VERSION").to_owned()),
        }),
    })
}

fn capabilities(client: &Client) -> ServerCapabilities {
    ServerCapabilities {
        position_encoding: Some(match client.encoding {
            Encoding::Utf8 => PositionEncodingKind::UTF8,
            Encoding::Utf16 => PositionEncodingKind::UTF16,
        }),
        text_document_sync: Some(TextDocumentSyncCapability::Options(TextDocumentSyncOptions {
            open_close: Some(true),
            change: Some(TextDocumentSyncKind::INCREMENTAL),
            save: Some(TextDocumentSyncSaveOptions::SaveOptions(SaveOptions { include_text: Some(false) })),
            ..TextDocumentSyncOptions::default()
        })),
        // To a client that does not ask, findings are sent; never both.
        diagnostic_provider: client.pulls.then(|| {
            DiagnosticServerCapabilities::Options(DiagnosticOptions {
                identifier: Some(String::from("layshaft")),
                inter_file_dependencies: true,
                workspace_diagnostics: true,
                ..DiagnosticOptions::default()
            })
        }),
        definition_provider: Some(OneOf::Left(true)),
        // The page of a kind is no file: to a client that cannot open it nothing is promised.
        type_definition_provider: client.documents.then_some(TypeDefinitionProviderCapability::Simple(true)),
        document_formatting_provider: Some(OneOf::Left(true)),
        document_range_formatting_provider: Some(OneOf::Left(true)),
        workspace: Some(WorkspaceServerCapabilities {
            workspace_folders: Some(WorkspaceFoldersServerCapabilities {
                supported: Some(true),
                change_notifications: Some(OneOf::Left(true)),
            }),
            file_operations: Some(WorkspaceFileOperationsServerCapabilities {
                will_rename: Some(files::filters()),
                ..WorkspaceFileOperationsServerCapabilities::default()
            }),
        }),
        ..features()
    }
}

/// What is there for every client.
fn features() -> ServerCapabilities {
    ServerCapabilities {
        hover_provider: Some(HoverProviderCapability::Simple(true)),
        implementation_provider: Some(ImplementationProviderCapability::Simple(true)),
        references_provider: Some(OneOf::Left(true)),
        document_highlight_provider: Some(OneOf::Left(true)),
        rename_provider: Some(OneOf::Right(RenameOptions {
            prepare_provider: Some(true),
            work_done_progress_options: WorkDoneProgressOptions::default(),
        })),
        inlay_hint_provider: Some(OneOf::Right(InlayHintServerCapabilities::Options(InlayHintOptions {
            resolve_provider: Some(true),
            work_done_progress_options: WorkDoneProgressOptions::default(),
        }))),
        code_action_provider: Some(CodeActionProviderCapability::Options(CodeActionOptions {
            code_action_kinds: Some(actions::KINDS.to_vec()),
            resolve_provider: Some(false),
            work_done_progress_options: WorkDoneProgressOptions::default(),
        })),
        code_lens_provider: Some(CodeLensOptions { resolve_provider: Some(false) }),
        completion_provider: Some(CompletionOptions {
            resolve_provider: Some(true),
            trigger_characters: Some(complete::TRIGGERS.map(String::from).to_vec()),
            ..CompletionOptions::default()
        }),
        signature_help_provider: Some(typing::signature_options()),
        semantic_tokens_provider: Some(paint::options().into()),
        document_on_type_formatting_provider: Some(typing::typing_options()),
        document_symbol_provider: Some(OneOf::Left(true)),
        workspace_symbol_provider: Some(OneOf::Left(true)),
        folding_range_provider: Some(FoldingRangeProviderCapability::Simple(true)),
        selection_range_provider: Some(SelectionRangeProviderCapability::Simple(true)),
        document_link_provider: Some(DocumentLinkOptions {
            resolve_provider: Some(false),
            work_done_progress_options: WorkDoneProgressOptions::default(),
        }),
        call_hierarchy_provider: Some(CallHierarchyServerCapability::Simple(true)),
        execute_command_provider: Some(ExecuteCommandOptions {
            commands: vec![String::from(commands::EXPLAIN), String::from(commands::RESULT_TABLE)],
            work_done_progress_options: WorkDoneProgressOptions::default(),
        }),
        ..ServerCapabilities::default()
    }
}

/// Asks for what the client offers: settings, and to be told of files that change.
pub fn initialized(core: &mut Core) {
    let mut registrations = Vec::new();
    let mut register = |method: &str, options: Option<serde_json::Value>| {
        registrations.push(Registration {
            id: method.to_owned(),
            method: method.to_owned(),
            register_options: options,
        });
    };
    if core.client.watches {
        let watcher = |glob: &&str| FileSystemWatcher {
            glob_pattern: GlobPattern::String((*glob).to_owned()),
            kind: None,
        };
        let options =
            DidChangeWatchedFilesRegistrationOptions { watchers: WATCHED.iter().map(watcher).collect() };
        register("workspace/didChangeWatchedFiles", Some(value(&options)));
    }
    if core.client.register_configuration {
        register(
            "workspace/didChangeConfiguration",
            Some(serde_json::json!({ "section": crate::settings::SECTION })),
        );
    }
    if !registrations.is_empty() {
        core.out.ask::<RegisterCapability>(&RegistrationParams { registrations }, Asked::Favour);
    }
    settings::ask(core);
}
