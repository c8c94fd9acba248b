//! Takes a line out: an `allow` that accepts nothing, one of two fields that say the same thing.

use layshaft_diagnostics::{Code, Edit, FileSpan, Span};
use layshaft_syntax::Item;

use super::{ActionKind, Claim, Offer, Place};
use crate::hover::{entries, key};

/// What can be taken out to mend the findings at a place.
pub(super) fn offers(place: &Place<'_>) -> Vec<Offer> {
    let mut offers = Vec::new();
    for (index, found) in place.findings() {
        match found.code {
            Code::UnusedAllow => offers.push(Offer {
                title: String::from("take the `allow` out"),
                kind: ActionKind::Fix,
                edits: line(place.source(), found.primary.place),
                mends: Some(index),
                preferred: true,
                claim: Claim::Unknown,
            }),
            Code::Contradiction => {
                let Some(item) = place.item_of(found) else { continue };
                for field in found.fields.iter().flatten() {
                    let Some(span) = entry(item, field) else { continue };
                    offers.push(Offer {
                        title: format!("take `{field}` out"),
                        kind: ActionKind::Fix,
                        edits: line(place.source(), place.of(item, span)),
                        mends: Some(index),
                        preferred: false,
                        claim: Claim::Mends,
                    });
                }
            }
            _ => {}
        }
    }
    offers
}

/// The line of a field in an item's own block.
pub(super) fn entry(item: &Item, field: &str) -> Option<Span> {
    entries(item).iter().find(|entry| key(entry) == field).map(|entry| match entry.value.basis.as_ref() {
        Some(basis) => entry.span.cover(basis.span),
        None => entry.span,
    })
}

/// Takes the words of a place out: with their lines where nothing else stands on these, else with the `;` and the
/// blanks on one side.
pub(super) fn line(text: &str, place: FileSpan) -> Vec<Edit> {
    let (start, end) = (place.span.start as usize, place.span.end as usize);
    let (Some(head), Some(tail)) = (text.get(..start), text.get(end..)) else { return Vec::new() };
    let from = head.rfind('\n').map_or(0, |at| at + 1);
    let until = tail.find('\n').map_or(text.len(), |at| end + at + 1);
    let before = text[from..start].trim();
    let after = text[end..until].trim();
    let (from, until) = if before.is_empty() && (after.is_empty() || after == ";") {
        (from, until)
    } else if let Some(rest) = tail.trim_start_matches([' ', '\t']).strip_prefix(';') {
        (start, text.len() - rest.trim_start_matches([' ', '\t']).len())
    } else {
        let kept = head.trim_end_matches([' ', '\t']);
        (kept.strip_suffix(';').unwrap_or(kept).len(), end)
    };
    vec![Edit {
        place: FileSpan { file: place.file, span: Span::new(from as u32, until as u32) },
        text: String::new(),
    }]
}
