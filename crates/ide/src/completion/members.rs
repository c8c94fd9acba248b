//! What follows a point: results of drives and of parts in them, fields of parts, names of used files.

use layshaft_mechanics::registry::{self, ResultRow, ResultShape, Role};
use layshaft_present::sheet::role_word;
use layshaft_semantics::analysis::PartRecord;

use super::Asked;
use super::fields::key;
use super::menu::{CompletionKind, Menu};
use super::names::{name, of_file};
use super::wanted::{Wanted, answered, kinds_of};
use crate::names::{Declared, Named, fields_of, parts_of_drive, results_of, row_of_part};

/// The names behind the point of a value's path.
pub(super) fn members(asked: Asked<'_, '_>, path: &[&str], wanted: &Wanted, menu: &mut Menu<'_>) {
    let Some((head, used)) = asked.snapshot.names().head(asked.file, path) else { return };
    let rest = path.get(used..).unwrap_or(&[]);
    match (head.what, rest) {
        (Declared::File(Some(file)), []) => of_file(asked, file, menu),
        (Declared::Part(_), []) => of_part(asked, head, wanted, menu),
        (Declared::Drive, []) => of_drive(asked, head, wanted, menu),
        (Declared::Drive, rest) => of_station(asked, head, rest, wanted, menu),
        _ => {}
    }
}

/// Fields that are given, and what is known from them alone.
fn of_part(asked: Asked<'_, '_>, part: Named, wanted: &Wanted, menu: &mut Menu<'_>) {
    let Some(row) = row_of_part(asked.snapshot, part) else { return };
    let record = asked.snapshot.part(part.place);
    let known = |name: &str| record.is_some_and(|part| part.given.iter().any(|(given, _)| *given == name));
    for field in fields_of(row) {
        let written = |part: &PartRecord| part.fields.iter().any(|given| given.name == field.name);
        let given = record.is_some_and(written) || known(field.name);
        let own = Wanted::of_field(field);
        let rank = fit(&own.kinds, wanted) + if given { 0 } else { 3 };
        let subject = format!("field:{}:{}:{}", role_word(row.role), row.name, field.name);
        let note = if given { kinds_note(&own.kinds) } else { "not given".to_owned() };
        menu.add(rank, CompletionKind::Field, field.name).note(note).about(subject);
    }
    for result in row.results {
        if known(result.name) && fields_of(row).all(|field| field.name != result.name) {
            let kinds = kinds_of(result.shape);
            let entry = menu.add(fit(&kinds, wanted), CompletionKind::Result, result.name);
            entry.note(kinds_note(&kinds)).about(super::names::about(asked, part));
        }
    }
}

/// Parts and results of a drive.
fn of_drive(asked: Asked<'_, '_>, drive: Named, wanted: &Wanted, menu: &mut Menu<'_>) {
    let station = Station::new(asked, drive, None);
    for row in registry::DRIVE_RESULTS {
        result(asked, station, row, wanted, menu);
    }
    for (text, part) in parts_of_drive(asked.snapshot, drive) {
        name(asked, &text, part, 1, menu);
    }
    for field in registry::DRIVE_FIELDS {
        if registry::DRIVE_RESULTS.iter().all(|row| row.name != field.name) {
            let entry = menu.add(4, CompletionKind::Field, field.name);
            entry.note("setting").about(format!("setting:{}", field.name));
        }
    }
}

/// Results of a part in a drive, and its sides.
fn of_station(asked: Asked<'_, '_>, drive: Named, rest: &[&str], wanted: &Wanted, menu: &mut Menu<'_>) {
    let (port, names) = match rest.split_last() {
        Some((&("input" | "output"), before)) if !before.is_empty() => (true, before),
        _ => (false, rest),
    };
    let written = names.join(".");
    let parts = parts_of_drive(asked.snapshot, drive);
    let Some((_, part)) = parts.into_iter().find(|(name, _)| *name == written) else {
        return file_in_chain(asked, names, menu);
    };
    let Some(row) = row_of_part(asked.snapshot, part) else { return };
    let station = Station::new(asked, drive, Some(part));
    for row in results_of(row) {
        result(asked, station, row, wanted, menu);
    }
    if part.what == Declared::Part(Role::Transmission) && !port {
        for (side, note) in
            [("input", "the side toward the sources"), ("output", "the side toward the loads")]
        {
            menu.add(4, CompletionKind::Word, side).note(note);
        }
    }
}

/// `drive.catalogue.`: the parts of a used file that take part.
fn file_in_chain(asked: Asked<'_, '_>, names: &[&str], menu: &mut Menu<'_>) {
    if let [alias] = names
        && let Some(named) = asked.snapshot.names().find(asked.file, alias)
        && let Declared::File(Some(file)) = named.what
    {
        of_file(asked, file, menu);
    }
}

/// A drive, or a part in it, with the kind of its speed where it was solved.
#[derive(Clone, Copy)]
struct Station {
    drive: Named,
    part: Option<Named>,
    speed: Option<&'static str>,
}

impl Station {
    fn new(asked: Asked<'_, '_>, drive: Named, part: Option<Named>) -> Self {
        Self { drive, part, speed: answered(asked.snapshot, drive, part, None, "speed") }
    }

    /// The kinds that a result has here; none where it has not this one: of torque and force a station has the one
    /// of its motion.
    fn kinds(self, row: &ResultRow) -> Option<Vec<&'static str>> {
        let all = kinds_of(row.shape);
        let Some(speed) = self.speed else { return Some(all) };
        let turning = usize::from(speed != "rotational_speed");
        match row.shape {
            ResultShape::Speed | ResultShape::Way => Some(all.get(turning).copied().into_iter().collect()),
            ResultShape::Effort if all.get(turning) != Some(&row.name) => None,
            ResultShape::Effort => Some(vec![row.name]),
            _ => Some(all),
        }
    }
}

/// A result, if the station has it.
fn result(asked: Asked<'_, '_>, at: Station, row: &'static ResultRow, wanted: &Wanted, menu: &mut Menu<'_>) {
    let Some(kinds) = at.kinds(row) else { return };
    let rank = match row.shape {
        ResultShape::Flag | ResultShape::Word(_) => u8::from(!wanted.kinds.is_empty()) * 2,
        _ => fit(&kinds, wanted),
    };
    let note = match row.shape {
        ResultShape::Flag => "yes or no".to_owned(),
        ResultShape::Word(words) => words.join(", "),
        _ => kinds_note(&kinds),
    };
    let part = at.part.map_or(String::new(), |part| super::names::about(asked, part));
    let subject = format!("result:{}:{}:{}", row.name, super::names::about(asked, at.drive), part);
    menu.add(rank, CompletionKind::Result, row.name).note(note).about(subject);
}

/// 0 where a kind fits, 2 where another is wanted, 1 where nothing is known.
fn fit(kinds: &[&'static str], wanted: &Wanted) -> u8 {
    if wanted.kinds.is_empty() {
        return 0;
    }
    let fits =
        |name: &&str| layshaft_units::kind(name).and_then(|kind| wanted.fits(&kind.ty())) == Some(true);
    if kinds.iter().any(fits) { 0 } else { 2 }
}

/// Kinds with their usual units: `torque, N·m`.
fn kinds_note(kinds: &[&'static str]) -> String {
    let one = |name: &&'static str| {
        let kind = layshaft_units::kind(name)?;
        let unit = if kind.unit.is_empty() { String::new() } else { format!(", {}", kind.unit) };
        Some(format!("{}{unit}", kind.title))
    };
    kinds.iter().filter_map(one).collect::<Vec<_>>().join(" or ")
}

/// The keys behind the point in a case: fields of a part, settings of a drive, names of a used file.
pub(super) fn keys(asked: Asked<'_, '_>, path: &[&str], menu: &mut Menu<'_>) {
    let Some((head, used)) = asked.snapshot.names().head(asked.file, path) else { return };
    if used != path.len() {
        return;
    }
    match head.what {
        Declared::File(Some(file)) => of_file(asked, file, menu),
        Declared::Part(_) => {
            let Some(row) = row_of_part(asked.snapshot, head) else { return };
            let record = asked.snapshot.part(head.place);
            for field in fields_of(row) {
                let given =
                    record.is_some_and(|part| part.fields.iter().any(|given| given.name == field.name));
                let subject = format!("field:{}:{}:{}", role_word(row.role), row.name, field.name);
                key(asked, field, u8::from(!given), subject, menu);
            }
        }
        Declared::Drive => {
            for field in registry::DRIVE_FIELDS {
                key(asked, field, 0, format!("setting:{}", field.name), menu);
            }
        }
        _ => {}
    }
}
