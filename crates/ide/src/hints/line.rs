//! What is told at the end of each kind of line.

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_mechanics::registry::Role;
use layshaft_present::number::apart;
use layshaft_present::sheet::{self, Entry};
use layshaft_present::shown::{Shown, unit_of};
use layshaft_present::unit::kind_of;
use layshaft_semantics::analysis::{CriterionRecord, Verdict};
use layshaft_semantics::quantity::{Datum, Quantity};
use layshaft_syntax::{Expr, ExprKind, Item, ItemKind, UnaryOp, Value, ValueKind};

use super::figure::{figure, fitting, padded};
use crate::Snapshot;
use crate::numbers::{entry, plain};

/// The text, and the name in the item the tooltip is that of.
pub(super) fn told(snapshot: &Snapshot, file: FileId, item: &Item) -> Option<(String, Option<Span>)> {
    let place = |span: Span| FileSpan { file, span: span.shifted(item.offset) };
    match &item.tree.kind {
        ItemKind::Let { name, value, .. } if is_computed(value) => {
            let record = snapshot.value(place(name.span))?;
            Some((value_text(snapshot, record.value.as_ref()?), Some(name.span)))
        }
        ItemKind::Part { name, .. } => Some((part(snapshot, place(name.span))?, Some(name.span))),
        ItemKind::Drive { name, .. } => Some((drive(snapshot, place(name.span))?, Some(name.span))),
        ItemKind::Require { clause, .. } => {
            let whole = place(item.tree.span);
            let criteria = &snapshot.analysis.criteria;
            let index = criteria.binary_search_by(|criterion| criterion.place.cmp(&whole)).ok()?;
            Some((criterion(snapshot, index)?, Some(clause.span)))
        }
        ItemKind::Show { value, .. } => {
            let whole = place(item.tree.span);
            let shows = &snapshot.analysis.shows;
            let index = shows.binary_search_by(|show| show.place.cmp(&whole)).ok()?;
            Some((show(snapshot, index)?, last_name(value)))
        }
        _ => None,
    }
}

/// Where the hint of an item stands: the line of a part's and drive's first word, the last line of anything else.
pub(super) fn first_line(item: &Item) -> u32 {
    let span = item.tree.span.shifted(item.offset);
    match &item.tree.kind {
        ItemKind::Part { .. } | ItemKind::Drive { .. } => span.start,
        _ => span.end.max(span.start + 1) - 1,
    }
}

/// Whether a value says something that does not stand there already.
fn is_computed(value: &Value) -> bool {
    match &value.kind {
        ValueKind::Expr(expr) => !is_literal(expr),
        ValueKind::Range { low, high } => !(is_literal(low) && is_literal(high)),
        _ => false,
    }
}

fn is_literal(expr: &Expr) -> bool {
    match &expr.kind {
        ExprKind::Quantity { .. } | ExprKind::Text(_) | ExprKind::Flag(_) | ExprKind::Broken => true,
        ExprKind::Paren(inner) | ExprKind::Unary { op: UnaryOp::Minus, arg: inner } => is_literal(inner),
        ExprKind::Tolerance { value, tolerance, .. } => is_literal(value) && is_literal(tolerance),
        ExprKind::Within { value, .. } => is_literal(value),
        _ => false,
    }
}

fn last_name(expr: &Expr) -> Option<Span> {
    match &expr.kind {
        ExprKind::Path(path) => path.names.last().map(|name| name.span),
        _ => None,
    }
}

fn value_text(snapshot: &Snapshot, datum: &Datum) -> String {
    let Datum::Quantity(quantity) = datum else {
        return fitting(&[layshaft_present::shown::shown(datum).text().to_owned()]);
    };
    fitting(&[quantity_text(snapshot, quantity)])
}

fn quantity_text(snapshot: &Snapshot, quantity: &Quantity) -> String {
    let unit = match (&quantity.unit, kind_of(&quantity.ty)) {
        (Some(unit), _) => unit.to_string(),
        (None, Some(kind)) => snapshot.habits().unit(kind.name, [quantity.si]),
        (None, None) => unit_of(quantity),
    };
    figure(quantity.si, &unit)
}

const EFFORT: &[&str] = &["torque", "force"];

/// `23.55 N·m · 1447 rpm` at the reached point of the first drive it takes part in, in the plain spec.
fn part(snapshot: &Snapshot, place: FileSpan) -> Option<String> {
    let record = snapshot.part(place)?;
    let (_, drive) = snapshot.drives_with(place).next()?;
    let case = plain(drive)?;
    case.solution.as_deref()?;
    let ask = |names: &[&str]| number(&entry(snapshot, case, Some(place), None, names));
    let (first, second) = match record.role {
        Role::Supply => (ask(&["voltage"]), ask(&["current"])),
        _ => (ask(EFFORT), ask(&["speed"])),
    };
    match (first, second) {
        (Some(first), Some(second)) => Some(fitting(&[format!("{first} · {second}"), first])),
        (one, other) => one.or(other).map(|text| fitting(&[text])),
    }
}

fn number(entry: &Entry) -> Option<String> {
    match entry {
        Entry::Number(number) => Some(figure(number.si, &number.unit)),
        _ => None,
    }
}

/// Speed and outcome in the plain spec; of several gears the first that runs.
fn drive(snapshot: &Snapshot, place: FileSpan) -> Option<String> {
    let (_, record) = snapshot.drive(place)?;
    let case = plain(record)?;
    let solution = case.solution.as_deref()?;
    // Asked for by itself: the row of the table would search for peak powers too.
    let speed = entry(snapshot, case, None, None, &["speed"]);
    let unit = match &speed {
        Entry::Number(number) => number.unit.as_str(),
        _ => "",
    };
    let (outcome, moves) = sheet::outcome(solution, unit);
    Some(match number(&speed) {
        Some(speed) if moves => fitting(&[format!("{speed}, {outcome}"), speed]),
        Some(speed) => fitting(&[format!("{outcome}, {speed}"), outcome]),
        None => fitting(&[outcome]),
    })
}

/// `holds, 7.8 %` or `fails in corner[…]`.
fn criterion(snapshot: &Snapshot, index: usize) -> Option<String> {
    let record: &CriterionRecord = snapshot.analysis.criteria.get(index)?;
    let line = sheet::criterion(&snapshot.analysis, index, snapshot.habits(), 0)?;
    let outcome = line.outcomes.get(line.governing?)?;
    let label = &outcome.label;
    let short = match label.split_once('[') {
        Some((name, _)) => format!("{name}[…]"),
        None => label.clone(),
    };
    let margin = outcome.margin.as_ref().map(|margin| padded_margin(&margin.text));
    Some(match (record.verdict, margin) {
        (Verdict::Holds, Some(margin)) => fitting(&[format!("holds, {margin}"), "holds".to_owned()]),
        (Verdict::Holds, None) => "holds".to_owned(),
        (Verdict::Fails, _) => {
            fitting(&[format!("fails in {label}"), format!("fails in {short}"), "fails".to_owned()])
        }
        (Verdict::NotJudged, _) => fitting(&[
            format!("not judged in {label}"),
            format!("not judged in {short}"),
            "not judged".to_owned(),
        ]),
    })
}

fn padded_margin(text: &str) -> String {
    match text.split_once(' ') {
        Some((number, unit)) => format!("{} {unit}", padded(number)),
        None => padded(text),
    }
}

/// The shown value in the plain spec, or in the first case it is asked in; over all cases where it differs.
fn show(snapshot: &Snapshot, index: usize) -> Option<String> {
    let record = snapshot.analysis.shows.get(index)?;
    let quantities = record.outcomes.iter().filter_map(|outcome| match &outcome.value {
        Some(Datum::Quantity(quantity)) => Some(quantity),
        _ => None,
    });
    let (mut low, mut high): (Option<&Quantity>, Option<&Quantity>) = (None, None);
    for quantity in quantities {
        low = Some(low.filter(|low| low.si <= quantity.si).unwrap_or(quantity));
        high = Some(high.filter(|high| high.si >= quantity.si).unwrap_or(quantity));
    }
    let line = sheet::show(&snapshot.analysis, index, snapshot.habits(), 1)?;
    let first = match line.outcomes.first()?.value.as_ref()? {
        Shown::Number(number) => figure(number.si, &number.unit),
        other => other.text().to_owned(),
    };
    let (Some(low), Some(high)) = (low, high) else { return Some(fitting(&[first])) };
    if low.si == high.si {
        return Some(fitting(&[first]));
    }
    let unit = match line.outcomes.first().and_then(|outcome| outcome.value.as_ref()) {
        Some(Shown::Number(number)) => number.unit.clone(),
        _ => unit_of(low),
    };
    let convert = |quantity: &Quantity| layshaft_present::unit::convert(quantity.si, &unit);
    // A pair that would look equal gets the digits that tell it apart.
    let digits = apart(convert(low), convert(high));
    let write = |quantity: &Quantity| layshaft_present::number::digits(convert(quantity), digits);
    let pair = layshaft_present::shown::joined(&format!("{} .. {}", write(low), write(high)), &unit);
    Some(fitting(&[pair, first]))
}
