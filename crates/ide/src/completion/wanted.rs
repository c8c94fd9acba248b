//! What a place of a value wants: a field with its shape, kinds of quantity, or anything.

use layshaft_diagnostics::FileId;
use layshaft_mechanics::registry::{self, ColumnRow, Field, ResultShape, Shape};
use layshaft_mechanics::solution::Answer;
use layshaft_present::unit::kind_of;
use layshaft_semantics::quantity::Datum;
use layshaft_units::{Kind, Type, demand, kind};

use crate::Snapshot;
use crate::names::{Declared, Named, fields_of, parts_of_drive, results_of, row_of_part};
use crate::numbers::{answer, plain};

/// What a place wants.
#[derive(Clone, Debug, Default)]
pub(crate) struct Wanted {
    /// The row of the field whose value it is.
    pub field: Option<&'static Field>,
    /// The kinds of quantity that fit; empty where any does.
    pub kinds: Vec<&'static str>,
    /// The words that fit.
    pub words: &'static [&'static str],
    /// Whether yes and no fit.
    pub flag: bool,
    /// Columns of points.
    pub columns: &'static [ColumnRow],
}

impl Wanted {
    /// What a field wants.
    pub fn of_field(field: &'static Field) -> Self {
        let mut wanted = Self { field: Some(field), ..Self::default() };
        match field.shape {
            Shape::Quantity(kind) | Shape::OfRated(kind) | Shape::Interval(kind) => wanted.kinds.push(kind),
            Shape::Flag => wanted.flag = true,
            Shape::Points(columns) => {
                wanted.columns = columns;
                wanted.kinds = columns.iter().map(|column| column.kind).collect();
            }
            Shape::Ratio { diameters: true } => wanted.kinds.push("length"),
            _ => {}
        }
        // A set speed is one of the source or of the load.
        if field.name == "set_speed" {
            wanted.kinds.push("speed");
        }
        wanted
    }

    /// A quantity of a kind.
    pub fn of_kind(kind: &'static str) -> Self {
        Self { kinds: vec![kind], ..Self::default() }
    }

    /// The same with nothing known of the kind: behind `*`, `/` and `^`.
    pub fn any_quantity(&self) -> Self {
        Self { kinds: Vec::new(), words: &[], flag: false, ..self.clone() }
    }

    /// The kinds that fit, with their rows.
    pub fn rows(&self) -> impl Iterator<Item = &'static Kind> {
        self.kinds.iter().filter_map(|name| kind(name))
    }

    /// Whether a value of this type fits; none where any does.
    pub fn fits(&self, ty: &Type) -> Option<bool> {
        (!self.kinds.is_empty()).then(|| self.rows().any(|row| demand(ty, row).is_ok()))
    }
}

/// The kinds that a result can have.
pub(crate) fn kinds_of(shape: ResultShape) -> Vec<&'static str> {
    match shape {
        ResultShape::Quantity(kind) => vec![kind],
        ResultShape::Speed => vec!["rotational_speed", "speed"],
        ResultShape::Effort => vec!["torque", "force"],
        ResultShape::Way => vec!["angle", "length"],
        ResultShape::Flag | ResultShape::Word(_) => Vec::new(),
    }
}

/// What stands beside a path in a comparison, or behind it in a case.
pub(crate) fn of_path(snapshot: &Snapshot, file: FileId, names: &[&str]) -> Wanted {
    found(snapshot, file, names).unwrap_or_default()
}

fn found(snapshot: &Snapshot, file: FileId, names: &[&str]) -> Option<Wanted> {
    let (head, used) = snapshot.names().head(file, names)?;
    let rest = names.get(used..)?;
    match (head.what, rest) {
        (Declared::Value, []) => of_datum(snapshot.value(head.place)?.value.as_ref()?),
        (Declared::Part(_), [field]) => of_part(snapshot, head, field),
        (Declared::Drive, [setting]) if is_setting(setting) => {
            registry::DRIVE_FIELDS.iter().find(|field| field.name == *setting).map(Wanted::of_field)
        }
        (Declared::Drive, rest) => of_station(snapshot, head, rest),
        _ => None,
    }
}

/// Whether a word is a setting of a drive and no result.
pub(crate) fn is_setting(word: &str) -> bool {
    registry::DRIVE_FIELDS.iter().any(|field| field.name == word)
        && registry::DRIVE_RESULTS.iter().all(|row| row.name != word)
}

fn of_datum(datum: &Datum) -> Option<Wanted> {
    match datum {
        Datum::Quantity(quantity) => Some(Wanted::of_kind(kind_of(&quantity.ty)?.name)),
        Datum::Flag(_) => Some(Wanted { flag: true, ..Wanted::default() }),
        Datum::Word(_) | Datum::Text(_) => None,
    }
}

fn of_part(snapshot: &Snapshot, part: Named, field: &str) -> Option<Wanted> {
    let row = row_of_part(snapshot, part)?;
    if let Some(field) = fields_of(row).find(|known| known.name == field) {
        return Some(Wanted::of_field(field));
    }
    let result = row.results.iter().find(|known| known.name == field)?;
    Some(of_shape(result.shape, kinds_of(result.shape)))
}

fn of_shape(shape: ResultShape, kinds: Vec<&'static str>) -> Wanted {
    match shape {
        ResultShape::Flag => Wanted { flag: true, ..Wanted::default() },
        ResultShape::Word(words) => Wanted { words, ..Wanted::default() },
        _ => Wanted { kinds, ..Wanted::default() },
    }
}

fn of_station(snapshot: &Snapshot, drive: Named, rest: &[&str]) -> Option<Wanted> {
    let (result, middle) = rest.split_last()?;
    let (port, middle) = match middle.split_last() {
        Some((port @ (&"input" | &"output"), before)) if !before.is_empty() => (Some(*port), before),
        _ => (None, middle),
    };
    let written = middle.join(".");
    let part = match middle {
        [] => None,
        _ => parts_of_drive(snapshot, drive).into_iter().find(|(name, _)| *name == written).map(|one| one.1),
    };
    let row = match part {
        None if middle.is_empty() => registry::DRIVE_RESULTS.iter().find(|row| row.name == *result)?,
        None => return None,
        Some(part) => results_of(row_of_part(snapshot, part)?).find(|row| row.name == *result)?,
    };
    let kinds = answered(snapshot, drive, part, port, row.name)
        .map_or_else(|| kinds_of(row.shape), |kind| vec![kind]);
    Some(of_shape(row.shape, kinds))
}

/// The kind that a result came out as in the plain spec.
pub(crate) fn answered(
    snapshot: &Snapshot,
    drive: Named,
    part: Option<Named>,
    port: Option<&str>,
    name: &str,
) -> Option<&'static str> {
    let (_, record) = snapshot.drive(drive.place)?;
    match answer(plain(record)?, part.map(|part| part.place), port, name) {
        Answer::Quantity { kind, .. } => Some(kind),
        _ => None,
    }
}
