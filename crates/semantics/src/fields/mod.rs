//! From the entries of a part to the values its law is built from.

mod csv_file;
mod shape;
mod table;
mod words;

use std::collections::BTreeMap;

use layshaft_diagnostics::{Code, Diagnostic, Span};
use layshaft_mechanics::registry::{self, Field, Need, Shape};
use layshaft_mechanics::values::{FieldValue, Gear, Values};

use crate::defs::{Given, PartDef, SlotName, required};
use crate::eval::Eval;
use crate::quantity::{Datum, Quantity};
use crate::world::ItemRef;

pub(crate) use shape::{is_neutral, read};
pub(crate) use table::Tables;

/// A field as read: for the law, for a reader, and the part it names.
#[derive(Clone, Debug)]
pub(crate) struct FieldRead {
    pub value: FieldValue,
    pub datum: Option<Datum>,
    pub link: Option<ItemRef>,
}

/// A part's values in one state.
#[derive(Debug, Default)]
pub(crate) struct Built {
    pub values: Values,
    /// Fields that name other parts.
    pub links: BTreeMap<&'static str, ItemRef>,
    /// Results known from the fields alone.
    pub given: Vec<(&'static str, Datum)>,
    /// Defaults the registry put in.
    pub defaults: Vec<&'static Field>,
    /// Whether the law accepts the values.
    pub sound: bool,
    pub on: bool,
}

impl Built {
    pub fn given_result(&self, name: &str) -> Option<Datum> {
        self.given.iter().find(|(known, _)| *known == name).map(|(_, datum)| datum.clone())
    }
}

/// A default of the registry as a value.
pub(crate) fn of_default(field: &Field, si: f64) -> Option<Datum> {
    match field.shape {
        Shape::Quantity(kind) | Shape::OfRated(kind) => quantity(si, kind),
        Shape::Flag => Some(Datum::Flag(si != 0.0)),
        Shape::Choice(words) => words.get(si as usize).map(|(word, _)| Datum::Word((*word).into())),
        _ => None,
    }
}

/// An SI value of a kind.
pub(crate) fn quantity(si: f64, kind: &str) -> Option<Datum> {
    let kind = layshaft_units::kind(kind)?;
    let unit = Some(kind.unit).filter(|unit| !unit.is_empty()).map(Into::into);
    Some(Datum::Quantity(Quantity {
        si,
        ty: kind.ty(),
        limits: None,
        is_range: false,
        confidence: None,
        unit,
    }))
}

fn default_value(field: &Field, si: f64) -> Option<FieldValue> {
    match field.shape {
        Shape::Quantity(_) | Shape::OfRated(_) => Some(FieldValue::Si(si)),
        Shape::Flag => Some(FieldValue::Flag(si != 0.0)),
        Shape::Choice(words) => words.get(si as usize).map(|(word, _)| FieldValue::Word(word)),
        _ => None,
    }
}

/// A loss of one gear: its name, the field, the value and the entry.
type OfGear<'w> = (Box<str>, &'static str, f64, Given<'w>);

/// Puts the gears together, each with the losses of its own; false where one of these fits no gear.
fn put_gears<'w>(
    eval: &Eval<'w>,
    built: &mut Built,
    mut gears: Vec<(Span, Gear)>,
    of_gears: Vec<OfGear<'w>>,
) -> bool {
    if gears.is_empty() {
        return of_gears.is_empty();
    }
    // In the order of the text, as a driver would name them.
    gears.sort_by_key(|(span, _)| *span);
    let mut gears: Vec<Gear> = gears.into_iter().map(|(_, gear)| gear).collect();
    let mut fits = true;
    for (name, field, si, given) in of_gears {
        fits &= put_in_gear(eval, &mut gears, (&name, field, si), &given);
    }
    built.values.set("gear", FieldValue::Gears(gears));
    fits
}

/// Gives a gear a loss of its own; says so where there is no such gear.
fn put_in_gear(
    eval: &Eval<'_>,
    gears: &mut [Gear],
    (name, field, si): (&str, &str, f64),
    given: &Given<'_>,
) -> bool {
    let Some(gear) = gears.iter_mut().find(|gear| gear.name == name) else {
        let place = eval.place(given.at, given.entry.span);
        let message = format!("no gear of this gearbox is called `{name}`");
        let names: Vec<_> = gears.iter().map(|gear| gear.name.as_str()).collect();
        let help = format!("its gears are {}", names.join(", "));
        eval.report(Diagnostic::new(Code::UnknownName, place, message).help(help));
        return false;
    };
    let slot = if field == "efficiency" { &mut gear.efficiency } else { &mut gear.efficiency_backward };
    *slot = Some(si);
    true
}

/// Reads every field of a part and tries its law on them.
pub(crate) fn build(eval: &Eval<'_>, at: ItemRef) -> Option<Built> {
    let part = eval.shared.parts.get(&at)?;
    let row = part.row?;
    let mut built = Built { on: true, ..Built::default() };
    let mut whole = !part.broken;
    let mut gears = Vec::new();
    let mut of_gears = Vec::new();
    for (slot, given) in eval.all_given(at) {
        let Some(field) = part.field(&slot.0) else { continue };
        let Some(read) = eval.read(at, slot) else {
            whole = false;
            continue;
        };
        match (&slot.1, &read.value) {
            (Some(_), FieldValue::Gears(own)) => {
                gears.extend(own.iter().map(|gear| (given.entry.span, gear.clone())));
                continue;
            }
            (Some(name), FieldValue::Si(si)) => {
                of_gears.push((name.clone(), field.name, *si, given));
                continue;
            }
            _ => {}
        }
        if let Some(link) = read.link {
            built.links.insert(field.name, link);
        }
        if field.name == "on" && read.value == FieldValue::Flag(false) {
            built.on = false;
        }
        built.values.set(field.name, read.value.clone());
    }
    whole &= put_gears(eval, &mut built, gears, of_gears);
    if eval.first_layer && part.field("layer").is_some() && built.values.get("layer").is_none() {
        built.values.set("layer", FieldValue::Si(1.0));
    }
    if whole && !report_missing(eval, part, &built.values) {
        whole = false;
    }
    put_defaults(part, &mut built);
    if whole {
        try_law(eval, part, &mut built);
    }
    built.given = given(row, &built.values);
    Some(built)
}

/// Results that the fields alone settle.
fn given(row: &registry::KindRow, values: &Values) -> Vec<(&'static str, Datum)> {
    let found = (row.given)(values);
    found
        .into_iter()
        .filter(|(_, si)| si.is_finite())
        .filter_map(|(name, si)| {
            let result = row.results.iter().find(|result| result.name == name)?;
            let registry::ResultShape::Quantity(kind) = result.shape else { return None };
            Some((name, quantity(si, kind)?))
        })
        .collect()
}

fn put_defaults(part: &PartDef<'_>, built: &mut Built) {
    let Some(row) = part.row else { return };
    for field in row.fields.iter().chain(registry::common_fields(part.role)) {
        if let Need::Default { si, .. } = field.need
            && built.values.get(field.name).is_none()
            && !registry::said_otherwise(field.name).iter().any(|other| built.values.get(other).is_some())
            && let Some(value) = default_value(field, si)
        {
            built.values.set(field.name, value);
            // That a source drives when nothing is said is no assumption about the machine.
            if row.fields.iter().any(|own| own.name == field.name) {
                built.defaults.push(field);
            }
        }
    }
}

/// One message for all required fields that are not given. Whether none is missing.
fn report_missing(eval: &Eval<'_>, part: &PartDef<'_>, values: &Values) -> bool {
    let Some(row) = part.row else { return false };
    let missing: Vec<&Field> =
        row.fields.iter().filter(|field| required(field) && values.get(field.name).is_none()).collect();
    if missing.is_empty() {
        return true;
    }
    let names: Vec<_> = missing.iter().map(|field| format!("`{}`", field.name)).collect();
    let message = format!("`{}` needs {}", part.name.text, names.join(", "));
    let lines: Vec<_> = missing
        .iter()
        .map(|field| format!("{} = {}  # {}", field.name, words::sample(field), field.meaning))
        .collect();
    eval.report(
        Diagnostic::new(Code::MissingField, eval.place(part.at, part.name.span), message)
            .help(format!("add {}", lines.join("\n")))
            .fields(vec![missing.iter().map(|field| field.name).collect()]),
    );
    false
}

/// Builds the law's model once, so that what several fields say together is checked where they stand.
fn try_law(eval: &Eval<'_>, part: &PartDef<'_>, built: &mut Built) {
    let Some(row) = part.row else { return };
    match (row.build)(&built.values) {
        Ok(_) => built.sound = true,
        Err(faults) => {
            for fault in faults {
                crate::faults::report(eval, part.at, &fault);
            }
        }
    }
}

/// A field as a single value; tables and the like have none.
pub(crate) fn rated_value(eval: &Eval<'_>, at: ItemRef, slot: &SlotName) -> Option<Datum> {
    let part = eval.shared.parts.get(&at)?;
    let Shape::OfRated(kind) = part.field(&slot.0)?.shape else { return None };
    let built = eval.built(at)?;
    let FieldValue::OfRated(times) = built.values.get(&slot.0)? else { return None };
    let ty = layshaft_units::kind(kind)?.ty();
    let given = built.given.iter().find_map(|(name, datum)| match datum {
        Datum::Quantity(found) if name.starts_with("rated_") && found.ty == ty => Some(found.si),
        _ => None,
    });
    let rated = given.or_else(|| {
        let mut fields = part.row?.fields.iter();
        let field = fields.find(|f| f.name.starts_with("rated_") && f.shape == Shape::Quantity(kind))?;
        built.values.si(field.name)
    })?;
    quantity(times * rated, kind)
}
