//! A named value: as written and in SI, its kind and limits, how it came about, where it comes from, which cases
//! change it.

use layshaft_diagnostics::FileSpan;
use layshaft_present::number;
use layshaft_present::shown::{joined, shown, unit_of};
use layshaft_present::unit::{convert, kind_of};
use layshaft_semantics::quantity::{Datum, Quantity};
use layshaft_syntax::{ItemKind, Value, ValueKind};

use super::MOST;
use crate::markup::{self, Page, text};
use crate::{Snapshot, numbers};

pub(super) fn value(snapshot: &Snapshot, place: FileSpan) -> Option<String> {
    let record = snapshot.value(place)?;
    let mut page = Page::default();
    let name = text(&record.name);
    match &record.value {
        Some(datum) => page.paragraph(format!("**{name}** = {}", line(datum))),
        None => page.paragraph(format!("**{name}** has no value: a finding says why")),
    }
    if let Some(item) = snapshot.item(place.file, place.span.start)
        && let ItemKind::Let { value, .. } = &item.tree.kind
    {
        page.paragraph(came_about(snapshot, place, value, record.value.as_ref()));
    }
    page.paragraph(basis(record.basis.as_ref()));
    page.paragraph(docs(&record.docs));
    page.paragraph(overridden(snapshot, place, None));
    Some(page.finish())
}

/// `1250 kg (mass)`, with SI and limits behind it.
pub(super) fn line(datum: &Datum) -> String {
    let Datum::Quantity(quantity) = datum else { return text(shown(datum).text()) };
    let mut words = markup::number(shown(datum).text());
    if let Some(si) = in_si(quantity) {
        words.push_str(&format!(" = {}", markup::number(&si)));
    }
    words.push_str(&format!(" ({})", title(quantity)));
    if let Some(limits) = limits(quantity) {
        words.push_str(&format!("; {limits}"));
    }
    words
}

/// The kind in words.
pub(super) fn title(quantity: &Quantity) -> String {
    match kind_of(&quantity.ty) {
        Some(kind) => kind.title.to_owned(),
        None => markup::number(&quantity.ty.describe()),
    }
}

/// The SI value, where it is not what is shown anyway.
pub(super) fn in_si(quantity: &Quantity) -> Option<String> {
    let si = quantity.ty.si_unit();
    let unit = unit_of(quantity);
    (unit != si && convert(1.0, &unit) != 1.0).then(|| joined(&number::written(quantity.si), &si))
}

/// The limits of a tolerance, spelled.
pub(super) fn limits(quantity: &Quantity) -> Option<String> {
    let (low, high) = quantity.limits.filter(|(low, high)| low < high)?;
    let unit = unit_of(quantity);
    let end = |si: f64| markup::number(&joined(&number::written(convert(si, &unit)), &unit));
    let confidence =
        quantity.confidence.map(|share| format!(", for {} % of all pieces", number::percent(share)));
    Some(format!("limits {} .. {}{}", end(low), end(high), confidence.unwrap_or_default()))
}

/// `1.25 * rated_load + block_mass = 1.25 × 1250 kg + 60 kg = 1622.5 kg`; empty where nothing is to be said.
pub(super) fn came_about(
    snapshot: &Snapshot,
    place: FileSpan,
    value: &Value,
    datum: Option<&Datum>,
) -> String {
    let Some(item) = snapshot.item(place.file, place.span.start) else { return String::new() };
    let written = snapshot.text(FileSpan { file: place.file, span: value.span.shifted(item.offset) });
    let written = written.split_whitespace().collect::<Vec<_>>().join(" ");
    let Some(numbers) = numbers::put_in(snapshot, place.file, item, value) else {
        // `2.9 × rated`, `12 N·m ± 5 %`: said as written where the value does not look the same.
        let same = datum.is_none_or(|datum| shown(datum).text() == written);
        let single = matches!(value.kind, ValueKind::Expr(_) | ValueKind::Range { .. });
        return if same || !single { String::new() } else { format!("written {}", text(&written)) };
    };
    let gives = datum.map_or(String::new(), |datum| format!(" = {}", text(shown(datum).text())));
    format!("{} = {}{gives}", text(&written), text(&numbers))
}

/// `from "catalogue"`; empty without a basis.
pub(super) fn basis(basis: Option<&(&'static str, String)>) -> String {
    basis.map_or(String::new(), |(word, why)| format!("`{word}` “{}”", text(why)))
}

/// The `##` lines.
pub(super) fn docs(lines: &[String]) -> String {
    let lines: Vec<String> = lines.iter().map(|line| text(line)).collect();
    lines.join(" ")
}

/// In which cases a value, field or setting is overridden, and to what.
pub(crate) fn overridden(snapshot: &Snapshot, owner: FileSpan, field: Option<&str>) -> String {
    let mut found: Vec<(String, Vec<&str>)> = Vec::new();
    for case in &snapshot.analysis.cases {
        let mut changes = case.changes.iter();
        let Some(change) = changes.find(|c| c.owner == owner && c.field.as_deref() == field) else {
            continue;
        };
        let to = match &change.value {
            Some(datum) => text(shown(datum).text()),
            None => text(snapshot.text(change.value_place)),
        };
        match found.iter_mut().find(|(known, _)| *known == to) {
            Some((_, labels)) => labels.push(&case.label),
            None => found.push((to, vec![&case.label])),
        }
    }
    if found.is_empty() {
        return String::new();
    }
    let mut lines = vec!["Overridden".to_owned(), String::new()];
    for (to, labels) in found.iter().take(MOST) {
        let more = match labels.len() {
            0..=3 => String::new(),
            n => format!(" and {} more", n - 3),
        };
        let named: Vec<String> = labels.iter().take(3).map(|label| text(label)).collect();
        lines.push(format!("- {to} in {}{more}", named.join(", ")));
    }
    if found.len() > MOST {
        lines.push(format!("- and {} more values", found.len() - MOST));
    }
    lines.join("\n")
}
