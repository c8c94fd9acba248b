//! What is read beside the text: hovers, hints at line ends, lenses above drives.

use std::time::Duration;

use layshaft_ide::base::Span;
use layshaft_ide::hints::{Categories, Hint, hints, merge_stale};
use layshaft_ide::hover::{Options, hover};
use layshaft_ide::lenses::{LensKind, lenses};
use layshaft_ide::sensitivity::sensitivity;
use serde_json::{Value, json};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{
    CodeLens, CodeLensParams, Command, Hover, HoverContents, HoverParams, InlayHint, InlayHintKind,
    InlayHintLabel, InlayHintLabelPart, InlayHintParams, InlayHintTooltip, Location, MarkupContent,
    MarkupKind, Url,
};

use crate::core::Core;
use crate::handlers::{Asked, SPEC};

/// Last good values kept of one document.
const MOST_KEPT: usize = 4096;

/// The longest that an analysis may take for a hover to begin another.
const PATIENCE: Duration = Duration::from_millis(150);

/// What is told about a place.
pub fn hovered(core: &mut Core, params: HoverParams) -> Result<Option<Hover>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position_params)?;
    let options = Options { charts: core.client.charts || core.settings.charts };
    let Some(mut told) = hover(&asked.snapshot, SPEC, offset, options) else { return Ok(None) };
    if let Some(influence) = influence(core, &asked, offset) {
        told.markdown.push_str("\n\n");
        told.markdown.push_str(&influence);
    }
    let range = asked.range(core, told.place);
    Ok(Some(Hover { contents: HoverContents::Markup(markdown(told.markdown)), range }))
}

/// How the tightest margin moves with the number under the cursor. Left out where the analysis takes so long that a
/// hover would be late.
fn influence(core: &mut Core, asked: &Asked, offset: u32) -> Option<String> {
    let took = core.specs.specs.get(&asked.uri)?.took;
    if took > PATIENCE {
        return None;
    }
    let until = crate::core::now() + PATIENCE;
    let mut trials = core.specs.trials(&asked.uri, &asked.snapshot, until);
    sensitivity(&asked.snapshot, SPEC, offset, &mut trials).map(|found| found.markdown)
}

const fn markdown(value: String) -> MarkupContent {
    MarkupContent { kind: MarkupKind::Markdown, value }
}

/// Results at the ends of the lines of a range.
pub fn inlay(core: &mut Core, params: InlayHintParams) -> Result<Vec<InlayHint>> {
    let uri = params.text_document.uri;
    let asked = Asked::new(core, &uri)?;
    let wanted = &core.settings.hints;
    let categories = Categories {
        values: wanted.values,
        parts: wanted.parts,
        drives: wanted.drives,
        criteria: wanted.criteria,
    };
    let range = core.client.encoding.span(asked.file(), params.range);
    let shown = with_old(core, &asked, range, categories);
    Ok(shown.iter().map(|hint| inlay_hint(core, &asked, hint)).collect())
}

/// The hints of a range. Where a line is being typed, the last good value stays, marked as old.
fn with_old(core: &mut Core, asked: &Asked, range: Span, categories: Categories) -> Vec<Hint> {
    let mut shown = hints(&asked.snapshot, SPEC, range, categories);
    let Some(spec) = core.specs.specs.get_mut(&asked.uri) else { return shown };
    if asked.snapshot.analysis.has_errors() && !spec.hints.is_empty() {
        let before: Vec<Hint> = spec.hints.values().cloned().collect();
        shown = merge_stale(&asked.snapshot, SPEC, &before, shown, categories);
        shown.retain(|hint| range.start <= hint.offset && hint.offset <= range.end);
    }
    if spec.hints.len() > MOST_KEPT {
        spec.hints.clear();
    }
    let good = shown.iter().filter(|hint| !hint.stale && !hint.key.is_empty());
    spec.hints.extend(good.map(|hint| (hint.key.clone(), hint.clone())));
    shown
}

fn inlay_hint(core: &Core, asked: &Asked, hint: &Hint) -> InlayHint {
    let target = hint.target.and_then(|place| asked.location(core, place));
    let data = hint.target.map(|place| json!({ "uri": asked.uri, "at": place.span.start }));
    let value = if hint.stale { format!("was {}", hint.text) } else { hint.text.clone() };
    let part = InlayHintLabelPart { value, location: target, ..InlayHintLabelPart::default() };
    InlayHint {
        position: core.client.encoding.position(asked.file(), hint.offset),
        label: InlayHintLabel::LabelParts(vec![part]),
        kind: None::<InlayHintKind>,
        text_edits: None,
        tooltip: None,
        padding_left: Some(true),
        padding_right: None,
        data,
    }
}

/// A hint with what it comes from.
pub fn resolve_inlay(core: &mut Core, mut hint: InlayHint) -> Result<InlayHint> {
    let at = hint.data.as_ref().and_then(|data| data.get("at")).and_then(Value::as_u64);
    let uri = hint.data.as_ref().and_then(|data| data.get("uri")).and_then(Value::as_str);
    let uri = uri.and_then(|uri| Url::parse(uri).ok());
    if let (Some(at), Some(uri)) = (at.and_then(|at| u32::try_from(at).ok()), uri)
        && let Ok(asked) = Asked::new(core, &uri)
        && let Some(told) = hover(&asked.snapshot, SPEC, at, Options::default())
    {
        hint.tooltip = Some(InlayHintTooltip::MarkupContent(markdown(told.markdown)));
    }
    Ok(hint)
}

/// Operating point and verdicts above each drive, where the user wants them.
pub fn lens(core: &mut Core, params: CodeLensParams) -> Result<Vec<CodeLens>> {
    if !core.settings.lenses {
        return Ok(Vec::new());
    }
    let asked = Asked::new(core, &params.text_document.uri)?;
    let found = lenses(&asked.snapshot, SPEC).into_iter().filter_map(|lens| {
        let Location { uri, range } = asked.location(core, lens.place)?;
        let command = match lens.kind {
            LensKind::OperatingPoint | LensKind::Verdicts => Command {
                title: lens.text,
                command: String::from(super::commands::RESULT_TABLE),
                arguments: Some(vec![json!(uri), json!(range.start)]),
            },
        };
        Some(CodeLens { range, command: Some(command), data: None })
    });
    Ok(found.collect())
}
