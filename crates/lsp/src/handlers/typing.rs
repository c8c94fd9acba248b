//! While typing: what stands between brackets, and what a `}` or a new line puts in order.

use layshaft_ide::on_type::on_type;
use layshaft_ide::signature::{self, Help};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{
    DocumentOnTypeFormattingOptions, DocumentOnTypeFormattingParams, Documentation, MarkupContent,
    MarkupKind, ParameterInformation, ParameterLabel, SignatureHelp, SignatureHelpOptions,
    SignatureHelpParams, SignatureInformation, TextEdit, WorkDoneProgressOptions,
};

use crate::core::Core;
use crate::handlers::{Asked, SPEC};

/// When signatures are worth being asked for.
pub fn signature_options() -> SignatureHelpOptions {
    let words = |characters: &[&str]| Some(characters.iter().map(|one| (*one).to_owned()).collect());
    SignatureHelpOptions {
        trigger_characters: words(&["(", ",", "±"]),
        retrigger_characters: words(&[" ", ")"]),
        work_done_progress_options: WorkDoneProgressOptions::default(),
    }
}

/// Behind which characters a text is put in order.
pub fn typing_options() -> DocumentOnTypeFormattingOptions {
    DocumentOnTypeFormattingOptions {
        first_trigger_character: String::from("}"),
        more_trigger_character: Some(vec![String::from("\n")]),
    }
}

/// What is being written between brackets.
pub fn signature(core: &mut Core, params: SignatureHelpParams) -> Result<Option<SignatureHelp>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position_params)?;
    Ok(signature::signature(&asked.snapshot, SPEC, offset).map(help))
}

fn help(found: Help) -> SignatureHelp {
    let told = |words: String| {
        let text = MarkupContent { kind: MarkupKind::PlainText, value: words };
        (!text.value.is_empty()).then_some(Documentation::MarkupContent(text))
    };
    let parameter = |(label, what): (String, String)| ParameterInformation {
        label: ParameterLabel::Simple(label),
        documentation: told(what),
    };
    let one = |signature: signature::Signature| SignatureInformation {
        label: signature.label,
        documentation: told(signature.meaning),
        parameters: Some(signature.parameters.into_iter().map(parameter).collect()),
        active_parameter: None,
    };
    SignatureHelp {
        signatures: found.signatures.into_iter().map(one).collect(),
        active_signature: Some(0),
        active_parameter: u32::try_from(found.parameter).ok(),
    }
}

/// What a `}` or a new line puts in order.
pub fn typed(core: &mut Core, params: DocumentOnTypeFormattingParams) -> Result<Vec<TextEdit>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position)?;
    let Some(typed) = params.ch.chars().next() else { return Ok(Vec::new()) };
    let edits = on_type(&asked.snapshot, SPEC, offset, typed);
    let file = asked.file();
    let edit = |(span, text)| TextEdit::new(core.client.encoding.range(file, span), text);
    Ok(edits.into_iter().map(edit).collect())
}
