//! A field of a part or a setting of a drive: its value here and what the registry says of it.

use layshaft_diagnostics::FileSpan;
use layshaft_mechanics::registry::{self, Bounds, Field, Need, Shape};
use layshaft_present::number;
use layshaft_present::shown::joined;
use layshaft_present::unit::{convert, usual_unit};
use layshaft_semantics::analysis::FieldRecord;
use layshaft_syntax::{Entry, Item, ItemKind};

use super::value::{basis, came_about, docs, line, overridden};
use crate::Snapshot;
use crate::markup::{self, Page, code, text};

pub(super) fn field(snapshot: &Snapshot, owner: FileSpan, name: &str) -> Option<String> {
    let mut page = Page::default();
    let (label, row, record) = known(snapshot, owner, name)?;
    let given = entry(snapshot, owner, name, record);
    page.paragraph(format!("**{label}\\.{}** = {}", text(name), value(snapshot, record, given, row)));
    if let Some(row) = row {
        page.paragraph(format!("{}; {}", row.meaning, wants(row)));
        page.paragraph(ranges(row));
    }
    if let Some((item_place, entry)) = given {
        let datum = record.and_then(|record| record.value.as_ref());
        page.paragraph(came_about(snapshot, item_place, &entry.value, datum));
        page.paragraph(docs(&entry.docs.iter().map(|doc| doc.value.to_string()).collect::<Vec<_>>()));
    }
    page.paragraph(basis(record.and_then(|record| record.basis.as_ref())));
    page.paragraph(overridden(snapshot, owner, Some(name)));
    Some(page.finish())
}

/// The owner's name, made harmless, the row of the field, and what the analysis has of it.
fn known<'a>(
    snapshot: &'a Snapshot,
    owner: FileSpan,
    name: &str,
) -> Option<(String, Option<&'static Field>, Option<&'a FieldRecord>)> {
    let word = name.split(' ').next().unwrap_or(name);
    if let Some(part) = snapshot.part(owner) {
        let common = registry::common_fields(part.role);
        let row = part.row?.fields.iter().chain(common).find(|field| field.name == word);
        return Some((text(&part.name), row, part.fields.iter().find(|field| field.name == name)));
    }
    let (_, drive) = snapshot.drive(owner)?;
    let row = registry::DRIVE_FIELDS.iter().find(|field| field.name == word);
    Some((text(&drive.name), row, None))
}

/// The value of a field or setting in the plain spec, made harmless.
pub(super) fn plain_value(snapshot: &Snapshot, owner: FileSpan, name: &str) -> Option<String> {
    let (_, row, record) = known(snapshot, owner, name)?;
    Some(value(snapshot, record, entry(snapshot, owner, name, record), row))
}

/// The line that gives a field its value: in the part itself, in the base of a variant, in a drive's block.
fn entry<'a>(
    snapshot: &'a Snapshot,
    owner: FileSpan,
    name: &str,
    record: Option<&FieldRecord>,
) -> Option<(FileSpan, &'a Entry)> {
    let place = record.map_or(owner, |record| record.place);
    let item = snapshot.item(place.file, place.span.start)?;
    let entry = entries(item).iter().find(|entry| key(entry) == name)?;
    Some((place, entry))
}

/// The lines of an item's block.
pub(crate) fn entries(item: &Item) -> &[Entry] {
    match &item.tree.kind {
        ItemKind::Part { block, .. } => &block.entries,
        ItemKind::Drive { block: Some(block), .. } | ItemKind::Case { block: Some(block), .. } => {
            &block.entries
        }
        _ => &[],
    }
}

/// `stall_torque`, `gear 1`.
pub(crate) fn key(entry: &Entry) -> String {
    let name = entry.key.names.last().map_or("", |name| &name.text);
    match &entry.member {
        Some(member) => format!("{name} {}", member.text),
        None => name.to_owned(),
    }
}

fn value(
    snapshot: &Snapshot,
    record: Option<&FieldRecord>,
    given: Option<(FileSpan, &Entry)>,
    row: Option<&Field>,
) -> String {
    if let Some(datum) = record.and_then(|record| record.value.as_ref()) {
        return line(datum);
    }
    if let Some((place, entry)) = given
        && let Some(item) = snapshot.item(place.file, place.span.start)
    {
        let span = entry.value.span.shifted(item.offset);
        let written = snapshot.text(FileSpan { file: place.file, span });
        let short: String =
            written.split_whitespace().collect::<Vec<_>>().join(" ").chars().take(120).collect();
        return text(&short);
    }
    match row.map(|row| (row, &row.need)) {
        Some((row, Need::Default { si, .. })) => format!("{} (default)", of_default(row, *si)),
        _ => "not given".to_owned(),
    }
}

/// A default of the registry as a reader writes it.
fn of_default(row: &Field, si: f64) -> String {
    match row.shape {
        Shape::Quantity(kind) | Shape::OfRated(kind) => quantity(si, kind),
        Shape::Flag => layshaft_present::shown::yes_or_no(si != 0.0).to_owned(),
        Shape::Choice(words) => words.get(si as usize).map_or(String::new(), |(word, _)| code(word)),
        _ => number::written(si),
    }
}

fn quantity(si: f64, kind: &'static str) -> String {
    let unit = usual_unit(kind, [si]);
    markup::number(&joined(&number::written(convert(si, &unit)), &unit))
}

/// What can stand there and whether it must.
pub(crate) fn wants(row: &Field) -> String {
    let kind = |name: &'static str| {
        let kind = layshaft_units::kind(name);
        kind.map_or(name.to_owned(), |kind| {
            let usual = if kind.unit.is_empty() { String::new() } else { format!(", {}", kind.unit) };
            format!("{}{usual}", kind.title)
        })
    };
    let shape = match row.shape {
        Shape::Quantity(name) => kind(name),
        Shape::OfRated(name) => format!("{}, or a multiple of the rated value", kind(name)),
        Shape::Interval(name) => format!("a range of {}", kind(name)),
        Shape::Choice(words) => {
            words.iter().map(|(word, _)| format!("`{word}`")).collect::<Vec<_>>().join(", ")
        }
        Shape::Flag => "`yes` or `no`".to_owned(),
        Shape::Part(role) => format!("the name of a {}", layshaft_present::sheet::role_word(role)),
        Shape::Points(columns) => {
            let names: Vec<_> = columns.iter().map(|column| column.name).collect();
            format!("points ({})", names.join(", "))
        }
        Shape::Ratio { diameters: false } => "teeth, `17 drives 51`".to_owned(),
        Shape::Ratio { diameters: true } => "diameters, `140 mm drives 212 mm`".to_owned(),
        Shape::Gears => "gears by name".to_owned(),
        Shape::Duty => "a duty type, `S3 40 %`".to_owned(),
    };
    format!("{shape}; {}", need(row))
}

/// Whether a field must be given, in words.
pub(crate) fn need(row: &Field) -> String {
    match row.need {
        Need::Required => "required".to_owned(),
        Need::Optional => "optional".to_owned(),
        Need::Default { si, why } => format!("default {}: {why}", of_default(row, si)),
        Need::Where(questions) => format!("no default; needed for {questions}"),
        Need::OneOf => "one of several that say the same".to_owned(),
    }
}

fn ranges(row: &Field) -> String {
    let (Shape::Quantity(kind) | Shape::OfRated(kind) | Shape::Interval(kind)) = row.shape else {
        return String::new();
    };
    let spelled = |bounds: &Bounds, word: &str| {
        let words = match (bounds.low.is_finite(), bounds.high.is_finite()) {
            (true, true) => format!("{} .. {}", quantity(bounds.low, kind), quantity(bounds.high, kind)),
            (true, false) if bounds.low_in => format!("{} or more", quantity(bounds.low, kind)),
            (true, false) => format!("above {}", quantity(bounds.low, kind)),
            (false, true) => format!("{} or less", quantity(bounds.high, kind)),
            (false, false) => return None,
        };
        Some(format!("{word} {words}"))
    };
    let both = [spelled(&row.plausible, "usual"), spelled(&row.hard, "possible")];
    both.into_iter().flatten().collect::<Vec<_>>().join("; ")
}
