//! Gives a number a name of its own: a `let` above the item, its basis with it.

use layshaft_diagnostics::{Edit, Span};
use layshaft_semantics::index::Target;
use layshaft_syntax::{DECLARATION_WORDS, Entry, Expr, ExprKind, Item, ItemKind, RESERVED, Value, ValueKind};

use super::{ActionKind, Claim, Offer, Place};
use crate::hover::{entries, key};
use crate::tree;

/// The offer for the number under the cursor.
pub(super) fn offers(place: &Place<'_>) -> Vec<Offer> {
    let Some(item) = place.item else { return Vec::new() };
    let here = place.span.start.saturating_sub(item.offset);
    let holding = tree::holding(&item.tree, here);
    let Some(at) = holding.iter().rposition(|expr| matches!(expr.kind, ExprKind::Quantity { .. })) else {
        return Vec::new();
    };
    // A number with its tolerance is one value.
    let outer = at.checked_sub(1).map(|outer| holding[outer]);
    let toleranced =
        outer.filter(|outer| matches!(outer.kind, ExprKind::Tolerance { .. } | ExprKind::Within { .. }));
    let expr = toleranced.unwrap_or(holding[at]);
    let whole = whole_value(item, expr);
    if matches!(item.tree.kind, ItemKind::Let { .. }) && whole.is_some() {
        return Vec::new();
    }
    let name = free(place, &suggested(item, here));
    let text = place.snapshot.text(place.of(item, expr.span));
    let basis = whole.and_then(|value| value.basis.as_ref());
    let moved = basis.map(|basis| format!("  {}", place.snapshot.text(place.of(item, basis.span))));
    let start = item.tree.docs.first().map_or(item.tree.span.start, |docs| docs.span.start);
    let above = place.of(item, Span::new(start, start));
    let mut edits = vec![
        Edit { place: above, text: format!("let {name} = {text}{}\n", moved.unwrap_or_default()) },
        Edit { place: place.of(item, expr.span), text: name.clone() },
    ];
    if let Some(basis) = basis {
        let from = place.of(item, Span::new(expr.span.end, basis.span.end));
        edits.push(Edit { place: from, text: String::new() });
    }
    vec![Offer {
        title: format!("name this number `{name}`"),
        kind: ActionKind::Extract,
        edits,
        mends: None,
        preferred: false,
        claim: Claim::Unchanged,
    }]
}

/// The value of a `let` or a line that an expression is all of.
fn whole_value<'a>(item: &'a Item, expr: &Expr) -> Option<&'a Value> {
    let is = |value: &&Value| matches!(&value.kind, ValueKind::Expr(whole) if whole.span == expr.span);
    match &item.tree.kind {
        ItemKind::Let { value, .. } => Some(value).filter(is),
        _ => entries(item).iter().map(|entry| &entry.value).find(is),
    }
}

/// `motor_rated_power`, `hill_road_grade`, `limit`
fn suggested(item: &Item, here: u32) -> String {
    let line = entries(item).iter().find(|entry| entry.span.touches(here));
    let of_line = |entry: &Entry| {
        let names: Vec<&str> = entry.key.names.iter().map(|name| &*name.text).collect();
        match names.as_slice() {
            [_] => key(entry).replace(' ', "_"),
            names => names.join("_"),
        }
    };
    match &item.tree.kind {
        ItemKind::Let { name, .. } => format!("{}_part", name.text),
        ItemKind::Part { name, .. } | ItemKind::Drive { name, .. } | ItemKind::Case { name, .. } => {
            line.map_or_else(|| name.text.to_string(), |entry| format!("{}_{}", name.text, of_line(entry)))
        }
        _ => String::from("limit"),
    }
}

/// The name, with a number behind it where it is taken or a word of the language.
fn free(place: &Place<'_>, name: &str) -> String {
    let known = |name: &str| {
        let words = RESERVED.iter().chain(DECLARATION_WORDS).any(|word| word.word == name);
        let taken = |of: &layshaft_semantics::index::Reference| {
            of.place.file == place.file
                && !matches!(of.target, Target::Field(..) | Target::Result { .. })
                && place.snapshot.text(of.place) == name
        };
        words || layshaft_units::unit_symbol(name) || place.snapshot.index.references.iter().any(taken)
    };
    let mut tried = name.to_owned();
    let mut count = 2;
    while known(&tried) && count < 1000 {
        tried = format!("{name}_{count}");
        count += 1;
    }
    tried
}
