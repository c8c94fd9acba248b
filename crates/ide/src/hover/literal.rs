//! A typed number: as typed, in SI, in a few other usual units, with the limits of its tolerance.

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_present::number::{self, DIGITS, digits, shortened};
use layshaft_present::shown::joined;
use layshaft_present::unit::kind_of;
use layshaft_semantics::quantity::{Datum, Quantity};
use layshaft_syntax::{Expr, ExprKind, Item, ItemKind, Points, ToleranceForm, ValueKind};
use layshaft_units::{Unit, parse_unit};

use super::field::entries;
use super::value::{limits, title};
use crate::markup::{self, Page};
use crate::{Snapshot, tree};

/// Other units offered.
const OTHERS: usize = 3;

pub(super) fn literal(snapshot: &Snapshot, file: FileId, item: &Item, here: u32) -> Option<(Span, String)> {
    if let Some(found) = in_table(snapshot, file, item, here) {
        return Some(found);
    }
    let holding = tree::holding(&item.tree, here);
    let at = holding.iter().rposition(|expr| matches!(expr.kind, ExprKind::Quantity { .. }))?;
    let expr = holding[at];
    let typed = typed(expr)?;
    let outer = at.checked_sub(1).map(|outer| holding[outer]);
    let tolerance = outer.filter(|outer| matches!(outer.kind, ExprKind::Tolerance { .. }));
    let whole = tolerance.unwrap_or(expr).span;
    let quantity = match recorded(snapshot, file, item, whole) {
        Some(found) => Quantity { si: if tolerance.is_some() { typed.si } else { found.si }, ..found },
        None => Quantity { limits: tolerance.and_then(spelled), ..typed },
    };
    let written = snapshot.text(FileSpan { file, span: expr.span.shifted(item.offset) });
    Some((expr.span, page(written, &quantity)))
}

/// A number by itself.
fn typed(expr: &Expr) -> Option<Quantity> {
    let ExprKind::Quantity { number, unit } = &expr.kind else { return None };
    of_number(number.value, unit.as_ref().map_or("", |unit| &unit.text))
}

fn of_number(value: f64, unit: &str) -> Option<Quantity> {
    let unit: Option<Unit> = if unit.is_empty() { None } else { Some(parse_unit(unit).ok()?) };
    let si = unit.as_ref().map_or(value, |unit| unit.to_si(value));
    let ty = unit.as_ref().map_or_else(|| layshaft_units::Type::of_number_literal(value), |unit| unit.ty);
    let unit = unit.map(|unit| unit.text.into());
    si.is_finite().then_some(Quantity { si, ty, limits: None, is_range: false, confidence: None, unit })
}

/// What the analysis made of it where it is the whole value of a `let` or a field: there its kind is settled.
pub(crate) fn recorded(snapshot: &Snapshot, file: FileId, item: &Item, span: Span) -> Option<Quantity> {
    let place = |span: Span| FileSpan { file, span: span.shifted(item.offset) };
    let datum = match &item.tree.kind {
        ItemKind::Let { name, value, .. } if value.span == span => {
            snapshot.value(place(name.span))?.value.as_ref()?
        }
        ItemKind::Part { name, .. } if entries(item).iter().any(|entry| entry.value.span == span) => {
            let part = snapshot.part(place(name.span))?;
            part.fields.iter().find(|field| field.value_place == place(span))?.value.as_ref()?
        }
        _ => return None,
    };
    match datum {
        Datum::Quantity(quantity) => Some(quantity.clone()),
        _ => None,
    }
}

/// Limits of a tolerance of two numbers.
fn spelled(expr: &Expr) -> Option<(f64, f64)> {
    let ExprKind::Tolerance { value, tolerance, form, .. } = &expr.kind else { return None };
    let (value, by) = (typed(value)?, typed(tolerance)?);
    let share = by.ty.is_plain_number() && by.unit.is_some() && !value.ty.is_plain_number();
    let half = match form {
        ToleranceForm::Points => by.si / if by.unit.is_some() { 1.0 } else { 100.0 },
        ToleranceForm::OfValue => value.si.abs() * by.si,
        ToleranceForm::Plain if share => value.si.abs() * by.si,
        ToleranceForm::Plain => match by.unit.as_deref().map(parse_unit) {
            Some(Ok(unit)) => (by.si - unit.to_si(0.0)).abs(),
            _ => by.si.abs(),
        },
    };
    Some((value.si - half, value.si + half))
}

fn page(written: &str, quantity: &Quantity) -> String {
    let mut page = Page::default();
    let mut equal: Vec<String> = Vec::new();
    let own = quantity.unit.as_deref().unwrap_or("");
    let si = quantity.ty.si_unit();
    if si != own && (si.is_empty() || parse_unit(&si).is_ok()) {
        equal.push(joined(&number::written(quantity.si), &si));
    }
    equal.extend(others(quantity, own, &si));
    let equal: Vec<String> = equal.iter().map(|text| markup::number(text)).collect();
    let equal = if equal.is_empty() { String::new() } else { format!(" = {}", equal.join(" = ")) };
    page.paragraph(format!("**{}**{equal}", markup::text(written)));
    page.paragraph(title(quantity));
    page.paragraph(limits(quantity).unwrap_or_default());
    page.paragraph(unit_name(own));
    page.finish()
}

/// The same in other usual units of its kind; horsepower is always said both ways.
fn others(quantity: &Quantity, own: &str, si: &str) -> Vec<String> {
    let Some(kind) = kind_of(&quantity.ty) else { return Vec::new() };
    let mut units: Vec<&str> =
        kind.units.iter().copied().filter(|unit| !unit.is_empty() && *unit != own && *unit != si).collect();
    let horses = ["hp", "PS"].map(|horse| units.iter().position(|unit| *unit == horse));
    let last: Vec<&str> = horses.iter().flatten().map(|at| units[*at]).collect();
    units.retain(|unit| parse_unit(unit).is_ok_and(|unit| handy(unit.from_si(quantity.si))));
    units.truncate(OTHERS);
    units.extend(last.into_iter().filter(|horse| *horse != own));
    let mut seen: Vec<&str> = Vec::new();
    units.retain(|unit| {
        !seen.contains(unit) && {
            seen.push(unit);
            true
        }
    });
    let write = |unit: &&str| {
        let value = parse_unit(unit).ok()?.from_si(quantity.si);
        Some(joined(&shortened(&digits(value, DIGITS)), unit))
    };
    units.iter().filter_map(write).collect()
}

/// Whether a number is one that a person reads: nobody does 400000 mV.
fn handy(value: f64) -> bool {
    value == 0.0 || (0.01..1e5).contains(&value.abs())
}

/// The unit in full, where its name says more than the symbol.
fn unit_name(own: &str) -> String {
    let row = layshaft_units::unit_rows().iter().find(|row| row.symbol == own || row.also.contains(&own));
    row.map_or(String::new(), |row| format!("{}: {}", markup::number(row.symbol), row.name))
}

/// A number of a table in the text, with its column.
fn in_table(snapshot: &Snapshot, file: FileId, item: &Item, here: u32) -> Option<(Span, String)> {
    let mut found: Option<&Points> = None;
    tree::values(&item.tree, &mut |value| {
        if let ValueKind::Points(points) = &value.kind
            && points.span.touches(here)
        {
            found = Some(points);
        }
    });
    let points = found?;
    let row = points.rows.partition_point(|row| row.first().is_some_and(|(_, span)| span.start <= here));
    let row = points.rows.get(row.checked_sub(1)?)?;
    let at = row.iter().position(|(_, span)| span.touches(here))?;
    let (value, span) = row.get(at)?;
    let column = points.columns.get(at)?;
    let unit = column.unit.as_ref().map_or("", |unit| &unit.text);
    let quantity = of_number(*value, unit)?;
    let written = snapshot.text(FileSpan { file, span: span.shifted(item.offset) });
    let head = format!("{}, {}", markup::text(&column.name.text), page(&joined(written, unit), &quantity));
    Some((*span, head))
}
