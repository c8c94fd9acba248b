//! Sorts out power, speed and torque (or force) that disagree: each of the three can be computed from the other two.

use layshaft_diagnostics::{Code, Diagnostic, Edit, FileSpan};
use layshaft_mechanics::registry::Shape;
use layshaft_present::number::shortened;
use layshaft_semantics::analysis::{FieldRecord, PartRecord};
use layshaft_semantics::quantity::Datum;
use layshaft_syntax::{Item, ItemKind};
use layshaft_units::{Unit, parse_unit};

use super::convert::plainly;
use super::{ActionKind, Claim, Offer, Place};

/// Significant digits of a number that was computed.
const DIGITS: usize = 4;

/// What a field of the three is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Part {
    Power,
    Speed,
    Effort,
}

/// A field of the three, with its value.
struct Given<'a> {
    part: Part,
    record: &'a FieldRecord,
    si: f64,
    unit: Unit,
}

/// Three offers for each finding that power, speed and torque disagree: one for each field.
pub(super) fn offers(place: &Place<'_>) -> Vec<Offer> {
    let mut offers = Vec::new();
    for (index, found) in place.findings() {
        if found.code == Code::Contradiction
            && let Some(item) = place.item_of(found)
            && let Some([power, speed, effort]) = three(place, item, found)
        {
            let computed = [
                (&power, speed.si * effort.si, [&speed, &effort]),
                (&speed, power.si / effort.si, [&power, &effort]),
                (&effort, power.si / speed.si, [&power, &speed]),
            ];
            for (given, si, from) in computed {
                offers.extend(offer(place, item, index, (given, si), from));
            }
        }
    }
    offers
}

/// Power, speed and torque (or force), where these three take part in a contradiction.
fn three<'a>(place: &Place<'a>, item: &Item, found: &Diagnostic) -> Option<[Given<'a>; 3]> {
    let ItemKind::Part { name, .. } = &item.tree.kind else { return None };
    let part: &'a PartRecord = place.snapshot.part(place.of(item, name.span))?;
    let group = found.fields.first().filter(|group| group.len() == 3)?;
    let given: Vec<Given<'a>> = group.iter().filter_map(|name| given(part, name)).collect();
    let of = |part: Part| given.iter().position(|one| one.part == part);
    let at = [of(Part::Power)?, of(Part::Speed)?, of(Part::Effort)?];
    let mut given: Vec<Option<Given<'a>>> = given.into_iter().map(Some).collect();
    let mut take = |at: usize| given.get_mut(at).and_then(Option::take);
    Some([take(at[0])?, take(at[1])?, take(at[2])?])
}

fn given<'a>(part: &'a PartRecord, name: &str) -> Option<Given<'a>> {
    let row = part.row?.fields.iter().find(|field| field.name == name)?;
    let (Shape::Quantity(kind) | Shape::OfRated(kind)) = row.shape else { return None };
    let role = match kind {
        "mechanical_power" | "power" => Part::Power,
        "rotational_speed" | "speed" => Part::Speed,
        "torque" | "force" => Part::Effort,
        _ => return None,
    };
    let record = part.fields.iter().find(|field| field.name == name)?;
    let Some(Datum::Quantity(quantity)) = &record.value else { return None };
    let kind = layshaft_units::kind(kind)?;
    let written = quantity.unit.as_deref().and_then(|unit| parse_unit(unit).ok());
    let meant = written.and_then(|unit| layshaft_units::interpret_unit(&unit, &kind.ty()).ok());
    let unit = meant.or_else(|| parse_unit(kind.unit).ok())?;
    Some(Given { part: role, record, si: quantity.si, unit })
}

fn offer(
    place: &Place<'_>,
    item: &Item,
    index: usize,
    (given, si): (&Given<'_>, f64),
    from: [&Given<'_>; 2],
) -> Option<Offer> {
    if !si.is_finite() || given.record.value_place.file != place.file {
        return None;
    }
    let name = &given.record.name;
    let write = |si: f64| plainly(given.unit.from_si(si), DIGITS - 1);
    let (old, new) = (plainly(given.unit.from_si(given.si), 11)?, write(si)?);
    let because = format!("from {} and {}", from[0].record.name, from[1].record.name);
    let span = super::take_out::entry(item, name)?;
    let line = place.of(item, span);
    let value = FileSpan { file: place.file, span: given.record.value_place.span };
    // What the number rested on is no longer what it rests on.
    let whole = FileSpan { file: place.file, span: value.span.cover(line.span) };
    let whole = FileSpan {
        file: place.file,
        span: layshaft_diagnostics::Span::new(value.span.start, whole.span.end),
    };
    let unit = &given.unit.text;
    Some(Offer {
        title: format!("recompute `{name}`: {} -> {new} {unit}", shortened(&old)),
        kind: ActionKind::Fix,
        edits: vec![Edit { place: whole, text: format!("{new} {unit}  assumed \"{because}\"") }],
        mends: Some(index),
        preferred: false,
        claim: Claim::MayMend,
    })
}
