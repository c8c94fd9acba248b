//! Says of a value without basis that it is assumed, the reason left for the author to give.

use layshaft_diagnostics::{Edit, FileSpan, Span};
use layshaft_syntax::{ItemKind, Value};

use super::{ActionKind, Claim, Offer, Place};
use crate::hover::entries;

/// The offer where the value at the place has no basis and stands in the list of those without.
pub(super) fn offers(place: &Place<'_>) -> Vec<Offer> {
    let Some(item) = place.item else { return Vec::new() };
    let here = place.span.start.saturating_sub(item.offset);
    let (name, value): (Span, &Value) = match &item.tree.kind {
        ItemKind::Let { name, value, .. } if item.tree.span.touches(here) => (name.span, value),
        ItemKind::Part { .. } => match entries(item).iter().find(|entry| entry.span.touches(here)) {
            Some(entry) => (entry.key.span, &entry.value),
            None => return Vec::new(),
        },
        _ => return Vec::new(),
    };
    let named = place.of(item, name);
    if !place.snapshot.analysis.without_basis.iter().any(|(_, at)| *at == named) {
        return Vec::new();
    }
    let end = place.of(item, value.span).span.end;
    vec![Offer {
        title: String::from("say that this is assumed, for a reason to be given"),
        kind: ActionKind::Rewrite,
        edits: vec![Edit {
            place: FileSpan { file: place.file, span: Span::new(end, end) },
            text: String::from("  assumed \"\""),
        }],
        mends: None,
        preferred: false,
        claim: Claim::UnchangedOnceFilled,
    }]
}
