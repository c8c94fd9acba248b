//! Accepts a warning: `allow … because "…"`, the reason left for the author to give.

use layshaft_diagnostics::{Edit, FileSpan, Severity, Span};
use layshaft_syntax::{Item, ItemKind};

use super::{ActionKind, Claim, Offer, Place};

/// An `allow` for each warning at a place.
pub(super) fn offers(place: &Place<'_>) -> Vec<Offer> {
    let offer = |(index, found): (usize, &layshaft_diagnostics::Diagnostic)| {
        let word = found.code.row().word;
        if found.severity == Severity::Error || word == "unused-allow" {
            return None;
        }
        let item = place.item_of(found)?;
        Some(Offer {
            title: format!("accept `{word}` here, for a reason to be given"),
            kind: ActionKind::Fix,
            edits: vec![allow(place, item, word)],
            mends: Some(index),
            preferred: false,
            claim: Claim::UnchangedOnceFilled,
        })
    };
    place.findings().filter_map(offer).collect()
}

/// The line, inside the block of the item where it has one, else behind the item.
fn allow(place: &Place<'_>, item: &Item, code: &str) -> Edit {
    let words = format!("allow {code} because \"\"");
    let block = match &item.tree.kind {
        ItemKind::Part { block, .. } => Some(block),
        ItemKind::Drive { block, .. } | ItemKind::Case { block, .. } => block.as_ref(),
        _ => None,
    };
    let block = block.map(|block| block.span).filter(|span| span.end > span.start + 1);
    match block {
        Some(span) => into_block(place, item, span, &[words]),
        None => {
            let end = place.of(item, item.tree.span).span.end;
            Edit {
                place: FileSpan { file: place.file, span: Span::new(end, end) },
                text: format!("\n{words}"),
            }
        }
    }
}

/// Lines put before the closing brace of a block; the braces are those of `span`, relative to the item.
pub(super) fn into_block(place: &Place<'_>, item: &Item, span: Span, lines: &[String]) -> Edit {
    let whole = place.of(item, span);
    let inside = Span::new(whole.span.start + 1, whole.span.end.saturating_sub(1).max(whole.span.start + 1));
    let text = place.snapshot.text(FileSpan { file: place.file, span: inside });
    let kept = inside.start + text.trim_end().len() as u32;
    let gap = FileSpan { file: place.file, span: Span::new(kept, inside.end) };
    let indent = margin(place.source(), place.of(item, item.tree.span).span.start);
    let mut out = String::new();
    for line in lines {
        out.push_str(&format!("\n{indent}    {line}"));
    }
    out.push_str(&format!("\n{indent}"));
    Edit { place: gap, text: out }
}

/// The blanks that the line of an offset begins with.
fn margin(text: &str, offset: u32) -> String {
    let head = text.get(..offset as usize).unwrap_or("");
    let line = head.rsplit('\n').next().unwrap_or("");
    line.chars().take_while(|c| matches!(c, ' ' | '\t')).collect()
}
