//! What can be done at a place: fixes of findings, and changes that keep every value. Each says what it does to the
//! results, from a trial analysis of the changed text.

mod accept;
mod assume;
mod convert;
mod effect;
mod extract;
mod fill;
mod fixes;
mod recompute;
mod take_out;
#[cfg(test)]
mod tests;

use layshaft_diagnostics::{Diagnostic, Edit, FileId, FileSpan, Span};
use layshaft_semantics::Analysis;
use layshaft_syntax::Item;

use crate::Snapshot;
use crate::sensitivity::Trials;

pub use effect::{Effect, effect, same_results};
pub use fixes::fix_all;

/// What sort of change an action is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum ActionKind {
    /// Mends a finding.
    Fix,
    /// Writes the same in another way.
    Rewrite,
    /// Gives something a name of its own.
    Extract,
}

/// Something that can be done.
#[derive(Clone, Debug, PartialEq)]
pub struct Action {
    /// What it does, with its effect in brackets: ``write `ozf·in` (lift.speed 14.9 m/min)``.
    pub title: String,
    /// What sort of change it is.
    pub kind: ActionKind,
    /// The replacements, all in one file, none overlapping.
    pub edits: Vec<Edit>,
    /// Index of the finding that it mends.
    pub mends: Option<usize>,
    /// Whether it is the one change that most would make.
    pub preferred: bool,
    /// Whether every result stays as it is, to the bit.
    pub unchanged: bool,
}

/// An action before its effect is known.
struct Offer {
    title: String,
    kind: ActionKind,
    edits: Vec<Edit>,
    mends: Option<usize>,
    preferred: bool,
    claim: Claim,
}

/// What is known of an offer before it is tried.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Claim {
    /// Nothing: it is tried.
    Unknown,
    /// Every result stays: it is tried and not offered where that is not so, or where something new is found.
    Unchanged,
    /// The same, as soon as there are words between its empty quotes.
    UnchangedOnceFilled,
    /// Every result stays by the way it is made.
    Proved,
    /// It leaves something to be filled in: nothing can be said before that is done.
    ToFill,
    /// It is offered only where it mends its finding.
    Mends,
    /// It is offered even where it does not settle its finding, and says so.
    MayMend,
}

/// Where actions are asked for.
struct Place<'a> {
    snapshot: &'a Snapshot,
    file: FileId,
    span: Span,
    /// The item at the beginning of the range.
    item: Option<&'a Item>,
}

impl<'a> Place<'a> {
    /// The findings that the range touches, with their indices.
    fn findings(&self) -> impl Iterator<Item = (usize, &'a Diagnostic)> {
        let (file, span) = (self.file, self.span);
        let all = self.snapshot.analysis.diagnostics.iter().enumerate();
        all.filter(move |(_, found)| {
            let place = found.primary.place;
            place.file == file && place.span.start <= span.end && span.start <= place.span.end
        })
    }

    /// A span of an item as a place of the file.
    fn of(&self, item: &Item, span: Span) -> FileSpan {
        FileSpan { file: self.file, span: span.shifted(item.offset) }
    }

    /// The item that a finding stands in.
    fn item_of(&self, found: &Diagnostic) -> Option<&'a Item> {
        self.snapshot.item(found.primary.place.file, found.primary.place.span.start)
    }

    /// The whole text of the file.
    fn source(&self) -> &'a str {
        self.snapshot.file(self.file).map_or("", |file| &file.text)
    }
}

/// What can be done about a range of a file, best first. `trials` analyzes a changed text; where it gives none, the
/// effect is not said and an action that rests on it is not offered.
#[must_use]
pub fn actions(snapshot: &Snapshot, file: FileId, span: Span, trials: &mut Trials<'_>) -> Vec<Action> {
    let place = Place { snapshot, file, span, item: snapshot.item(file, span.start) };
    let mut offers = fixes::carried(&place);
    offers.extend(take_out::offers(&place));
    offers.extend(recompute::offers(&place));
    offers.extend(fill::offers(&place));
    offers.extend(accept::offers(&place));
    offers.extend(convert::offers(&place));
    offers.extend(assume::offers(&place));
    offers.extend(extract::offers(&place));
    offers.into_iter().filter_map(|offer| tried(&place, offer, trials)).collect()
}

/// An offer with its effect; none where it does not do what it claims.
fn tried(place: &Place<'_>, offer: Offer, trials: &mut Trials<'_>) -> Option<Action> {
    let (said, unchanged) = match offer.claim {
        Claim::Proved => (String::from("value unchanged"), true),
        Claim::ToFill => (String::from("to be filled in"), false),
        claim => {
            let text = match claim {
                Claim::UnchangedOnceFilled => applied(place.source(), &filled(&offer.edits)),
                _ => applied(place.source(), &offer.edits),
            };
            match trials(place.file, text.into()) {
                Some(after) => judged(place, &offer, &after)?,
                None if matches!(claim, Claim::Unknown | Claim::MayMend) => {
                    (String::from("effect not tried: the analysis takes too long"), false)
                }
                None => return None,
            }
        }
    };
    let title = format!("{} ({said})", offer.title);
    let Offer { kind, edits, mends, preferred, .. } = offer;
    Some(Action { title, kind, edits, mends, preferred, unchanged })
}

/// What an offer did in its trial; none where that is not what it claims.
fn judged(place: &Place<'_>, offer: &Offer, after: &Analysis) -> Option<(String, bool)> {
    let found = effect(place.snapshot, after);
    let kept = found.unchanged && found.nothing_new;
    match offer.claim {
        Claim::Unchanged => kept.then_some((found.words, true)),
        Claim::UnchangedOnceFilled => {
            kept.then(|| (String::from("value unchanged once the reason is given"), false))
        }
        Claim::Mends if !mended(place, offer, after) => None,
        Claim::MayMend if !mended(place, offer, after) => {
            Some((format!("does not settle it: {}", found.words), false))
        }
        _ => Some((found.words, found.unchanged)),
    }
}

/// The replacements with a word between empty quotes.
fn filled(edits: &[Edit]) -> Vec<Edit> {
    let with = |edit: &Edit| Edit { place: edit.place, text: edit.text.replace("\"\"", "\"-\"") };
    edits.iter().map(with).collect()
}

/// Whether there is one finding less of the code that the offer is about.
fn mended(place: &Place<'_>, offer: &Offer, after: &Analysis) -> bool {
    let before = &place.snapshot.analysis.diagnostics;
    let Some(code) = offer.mends.and_then(|index| before.get(index)).map(|found| found.code) else {
        return false;
    };
    let count = |all: &[Diagnostic]| all.iter().filter(|found| found.code == code).count();
    count(&after.diagnostics) < count(before)
}

/// A text with replacements made. Those that overlap an earlier one or leave the text are passed over.
#[must_use]
pub fn applied(text: &str, edits: &[Edit]) -> String {
    let mut sorted: Vec<&Edit> = edits.iter().collect();
    sorted.sort_by_key(|edit| edit.place.span);
    let mut out = String::with_capacity(text.len() + 64);
    let mut from = 0;
    for edit in sorted {
        let (start, end) = (edit.place.span.start as usize, edit.place.span.end as usize);
        let Some(before) = text.get(from..start) else { continue };
        if text.get(start..end).is_none() {
            continue;
        }
        out.push_str(before);
        out.push_str(&edit.text);
        from = end;
    }
    out.push_str(text.get(from..).unwrap_or(""));
    out
}
