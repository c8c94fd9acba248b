//! Code actions: fixes of findings, other ways to write the same, and every fix that is certain at once.

use std::collections::BTreeMap;
use std::time::Duration;

use layshaft_ide::actions::{self, Action, ActionKind};
use layshaft_ide::base::Edit;
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{
    CodeAction, CodeActionKind, CodeActionOrCommand, CodeActionParams, CodeActionTriggerKind, Diagnostic,
    NumberOrString, TextEdit, Url,
};

use crate::core::{Core, now};
use crate::handlers::{Asked, SPEC, names};

/// What is offered.
pub const KINDS: [CodeActionKind; 4] = [
    CodeActionKind::QUICKFIX,
    CodeActionKind::REFACTOR_REWRITE,
    CodeActionKind::REFACTOR_EXTRACT,
    CodeActionKind::SOURCE_FIX_ALL,
];

/// How long trials may be begun for actions that were asked for, and for those that an editor lists by itself.
const ASKED: Duration = Duration::from_millis(400);
const LISTED: Duration = Duration::from_millis(120);

/// What can be done about a range, each with its effect.
pub fn offered(core: &mut Core, params: CodeActionParams) -> Result<Vec<CodeActionOrCommand>> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let span = core.client.encoding.span(asked.file(), params.range);
    let context = &params.context;
    let only = context.only.as_deref();
    let by_itself = context.trigger_kind == Some(CodeActionTriggerKind::AUTOMATIC);
    let until = now() + if by_itself { LISTED } else { ASKED };
    let mut found = Vec::new();
    if [ActionKind::Fix, ActionKind::Rewrite, ActionKind::Extract].iter().any(|of| wanted(only, &kind(*of))) {
        let mut trials = core.specs.trials(&asked.uri, &asked.snapshot, until);
        let all = actions::actions(&asked.snapshot, SPEC, span, &mut trials);
        drop(trials);
        let those = all.into_iter().filter(|action| wanted(only, &kind(action.kind)));
        found.extend(those.map(|action| one(core, &asked, action, &context.diagnostics)));
    }
    // On every save, if the user wants it so: never among what is offered at a place.
    if only.is_some() && wanted(only, &CodeActionKind::SOURCE_FIX_ALL) {
        found.extend(all_certain(core, &asked, until));
    }
    Ok(found.into_iter().map(CodeActionOrCommand::CodeAction).collect())
}

/// Whether a kind is asked for: all are where none is named, and `refactor` stands for `refactor.rewrite`.
fn wanted(only: Option<&[CodeActionKind]>, kind: &CodeActionKind) -> bool {
    let under = |named: &CodeActionKind| {
        let rest = kind.as_str().strip_prefix(named.as_str());
        rest.is_some_and(|rest| rest.is_empty() || rest.starts_with('.') || named.as_str().is_empty())
    };
    only.is_none_or(|only| only.iter().any(under))
}

const fn kind(of: ActionKind) -> CodeActionKind {
    match of {
        ActionKind::Fix => CodeActionKind::QUICKFIX,
        ActionKind::Rewrite => CodeActionKind::REFACTOR_REWRITE,
        ActionKind::Extract => CodeActionKind::REFACTOR_EXTRACT,
    }
}

fn one(core: &Core, asked: &Asked, action: Action, told: &[Diagnostic]) -> CodeAction {
    let mended = action.mends.and_then(|index| asked.snapshot.analysis.diagnostics.get(index));
    let mended = mended.and_then(|found| {
        let range = asked.range(core, found.primary.place)?;
        let code = NumberOrString::String(found.code.row().word.to_owned());
        told.iter().find(|one| one.range == range && one.code.as_ref() == Some(&code)).cloned()
    });
    CodeAction {
        title: sentence(action.title),
        kind: Some(kind(action.kind)),
        diagnostics: mended.map(|found| vec![found]),
        edit: Some(edits(core, asked, &action.edits)),
        is_preferred: action.preferred.then_some(true),
        ..CodeAction::default()
    }
}

/// The replacements for the very state of the document that was looked at.
fn edits(core: &Core, asked: &Asked, edits: &[Edit]) -> tower_lsp::lsp_types::WorkspaceEdit {
    let mut by_file: BTreeMap<Url, Vec<TextEdit>> = BTreeMap::new();
    for edit in edits {
        if let Some(at) = asked.location(core, edit.place) {
            by_file.entry(at.uri).or_default().push(TextEdit::new(at.range, edit.text.clone()));
        }
    }
    names::workspace_edit(core, by_file)
}

fn all_certain(core: &mut Core, asked: &Asked, until: std::time::Instant) -> Option<CodeAction> {
    let mut trials = core.specs.trials(&asked.uri, &asked.snapshot, until);
    let found = actions::fix_all(&asked.snapshot, SPEC, &mut trials);
    drop(trials);
    (!found.is_empty()).then(|| CodeAction {
        title: String::from("Mend everything that is certain"),
        kind: Some(CodeActionKind::SOURCE_FIX_ALL),
        edit: Some(edits(core, asked, &found)),
        ..CodeAction::default()
    })
}

/// A title with a capital at its beginning.
fn sentence(title: String) -> String {
    let mut chars = title.chars();
    match chars.next() {
        Some(first) => first.to_uppercase().chain(chars).collect(),
        None => title,
    }
}
