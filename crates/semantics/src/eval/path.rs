//! Names, fields and results.

use layshaft_diagnostics::{Code, Diagnostic};
use layshaft_mechanics::drive::Port;
use layshaft_mechanics::registry::{self, ResultRow, ResultShape, Shape};
use layshaft_mechanics::solution::Answer;
use layshaft_syntax::Path;
use layshaft_units::Type;

use super::{Eval, Reading, Slot};
use crate::defs::{path_text, role_word};
use crate::quantity::{Datum, Quantity};
use crate::world::{Declared, ItemRef};

/// Standard acceleration of gravity, exact by definition (3rd CGPM, 1901; ISO 80000-3).
pub(crate) const STANDARD_GRAVITY: f64 = 9.806_65;

pub(crate) fn is_constant(name: &str) -> bool {
    matches!(name, "pi" | "standard_gravity")
}

/// A path into a drive, its parts resolved.
pub(crate) struct Station {
    /// The part's item; none for the drive itself.
    pub part: Option<ItemRef>,
    pub port: Option<Port>,
    pub result: Box<str>,
    pub shape: ResultShape,
}

/// A value of which only the kind is known.
pub(crate) fn unknown(kind: &str) -> Option<Datum> {
    Some(Datum::Quantity(Quantity::unknown(layshaft_units::kind(kind)?.ty())))
}

impl Eval<'_> {
    /// The value a path stands for.
    pub(super) fn path(&self, path: &Path, reading: Reading<'_>) -> Option<Datum> {
        let world = self.shared.world;
        let head = world.head(reading.at.file, &path.names);
        let Some((declared, at, used)) = head else { return self.constant(path, reading) };
        let rest = &path.names[used..];
        match (declared, rest) {
            (Declared::Let, []) => {
                if reading.own == Some(&Slot::Let(at)) {
                    return self.plain.as_ref()?.let_typed(at);
                }
                self.let_typed(at)
            }
            (Declared::Part, [field]) => self.part_field(path, at, &field.text, reading),
            (Declared::Part, []) => {
                let name = path_text(path);
                let message = format!("`{name}` is a part, not a value");
                let found = Diagnostic::new(Code::KindMismatch, self.place(reading.at, path.span), message);
                self.report(found.help(format!("name one of its fields or results: `{name}.inertia`")));
                None
            }
            (Declared::Drive, _) => self.drive_path(path, at, used, reading),
            _ => {
                let message = format!("`{}` has no value", path_text(path));
                self.report(Diagnostic::new(Code::UnknownName, self.place(reading.at, path.span), message));
                None
            }
        }
    }

    fn constant(&self, path: &Path, reading: Reading<'_>) -> Option<Datum> {
        let name = &*path.names.first()?.text;
        let quantity = |si, ty, unit: Option<&str>| {
            let unit = unit.map(Into::into);
            Some(Datum::Quantity(Quantity { si, ty, limits: None, is_range: false, confidence: None, unit }))
        };
        if path.names.len() == 1 {
            match name {
                "pi" => return quantity(std::f64::consts::PI, Type::pi(), None),
                "standard_gravity" => {
                    let ty = layshaft_units::kind("acceleration").map(layshaft_units::Kind::ty)?;
                    return quantity(STANDARD_GRAVITY, ty, Some("m/s²"));
                }
                _ => {}
            }
        }
        self.report(self.unknown_name(path, reading.at));
        None
    }

    fn unknown_name(&self, path: &Path, at: ItemRef) -> Diagnostic {
        let world = self.shared.world;
        let first = &path.names[0];
        let place = self.place(at, first.span);
        let names = &world.scopes[at.file as usize].names;
        if let Some((Declared::File(Some(file)), _)) = names.get(&first.text)
            && let Some(second) = path.names.get(1)
        {
            let place = self.place(at, second.span);
            let message = format!("`{}` declares no value or part `{}`", first.text, second.text);
            let found = Diagnostic::new(Code::UnknownName, place, message);
            let inner = world.scopes[*file as usize].names.keys();
            return match layshaft_units::closest(&second.text, inner.map(|name| &**name)) {
                Some(close) => found.fix(format!("write `{close}`"), place, close),
                None => found,
            };
        }
        let message = format!("nothing here is called `{}`", first.text);
        let found = Diagnostic::new(Code::UnknownName, place, message);
        let own = names.keys().map(|name| &**name);
        if let Some(close) = layshaft_units::closest(&first.text, own) {
            return found.fix(format!("write `{close}`"), place, close);
        }
        if &*first.text == "g" {
            return found.help("the acceleration of free fall is `standard_gravity`, the gram is written behind a number: `1 g`");
        }
        if layshaft_units::unit_symbol(&first.text) {
            return found
                .help(format!("if the unit is meant, a number stands before it: `1 {}`", first.text));
        }
        found.help("declare it: `let name = value`")
    }

    /// A field of a part as given, or a result known from its fields alone.
    fn part_field(&self, path: &Path, at: ItemRef, field: &str, reading: Reading<'_>) -> Option<Datum> {
        let slot = (field.into(), None);
        if reading.own == Some(&Slot::Field(at, (field.into(), None))) {
            return self.plain.as_ref()?.field(at, &slot);
        }
        let part = self.shared.parts.get(&at)?;
        let row = part.row?;
        if self.given(at, &slot).is_some() {
            return self.given_field(path, at, &slot, reading);
        }
        let built = self.built(at)?;
        if let Some(datum) = built.given_result(field) {
            return Some(datum);
        }
        let place = self.place(reading.at, path.span);
        if let Some(known) = part.field(field) {
            if let registry::Need::Default { si, .. } = known.need
                && let Some(datum) = crate::fields::of_default(known, si)
            {
                return Some(datum);
            }
            // It may follow from a field that could not be read, which has been reported.
            if !built.sound {
                return None;
            }
            let message = format!("`{}` is not given", path_text(path));
            let mut found = Diagnostic::new(Code::MissingField, place, message);
            found = found.related(self.place(at, part.name.span), "the part is declared here");
            self.report(found);
            return None;
        }
        let results = || row.results.iter().chain(registry::common_results(part.role)).map(|row| row.name);
        let fields = || row.fields.iter().chain(registry::common_fields(part.role)).map(|field| field.name);
        let message = if results().any(|name| name == field) {
            format!("`{field}` of a `{}` is known only in a drive", row.name)
        } else {
            format!("a `{}` has no field `{field}`", row.name)
        };
        let mut found = Diagnostic::new(Code::UnknownField, place, message);
        if results().any(|name| name == field) {
            found = found.help(format!("put the drive before it: `drive.{}`", path_text(path)));
        } else if let Some(close) = layshaft_units::closest(field, fields()) {
            let name = path.names.last().map_or(path.span, |name| name.span);
            let place = self.place(reading.at, name);
            found = found.fix(format!("write `{close}`"), place, close);
        }
        self.report(found);
        None
    }

    /// A field that is given: its value, or its kind where the value is not to be had.
    fn given_field(
        &self,
        path: &Path,
        at: ItemRef,
        slot: &crate::defs::SlotName,
        reading: Reading<'_>,
    ) -> Option<Datum> {
        let field = self.shared.parts.get(&at)?.field(&slot.0)?;
        match field.shape {
            Shape::Quantity(kind) | Shape::OfRated(kind) | Shape::Interval(kind) => {
                let found = self.field(at, slot).or_else(|| crate::fields::rated_value(self, at, slot));
                found.or_else(|| unknown(kind))
            }
            Shape::Flag | Shape::Choice(_) | Shape::Part(_) => self.field(at, slot),
            _ => {
                // `reduction` of a gear given by its teeth is a result, the teeth are not a number.
                let message = format!("`{}` is not a single value", path_text(path));
                self.report(Diagnostic::new(Code::KindMismatch, self.place(reading.at, path.span), message));
                None
            }
        }
    }

    fn drive_path(&self, path: &Path, at: ItemRef, used: usize, reading: Reading<'_>) -> Option<Datum> {
        if let [setting] = &path.names[used..]
            && registry::DRIVE_FIELDS.iter().any(|field| field.name == &*setting.text)
            && !registry::DRIVE_RESULTS.iter().any(|row| row.name == &*setting.text)
        {
            let slot = (setting.text.clone(), None);
            if reading.own == Some(&Slot::Field(at, slot.clone())) {
                return self.plain.as_ref()?.field(at, &slot);
            }
            return self.setting(path, at, &slot, reading);
        }
        let station = self.station(path, at, used, reading.at)?;
        let solved = self.solved(at);
        let answer = solved.answer(self, &station, reading.ask.filter(|ask| ask.drive == at));
        let Some(answer) = answer else { return solved.unknown(&station) };
        if let Answer::Unbounded(note) = &answer {
            self.remark(crate::say::note(note));
            return solved.unbounded(&station);
        }
        if let Answer::Refused(faults) = &answer {
            solved.report(self, at, faults);
            return solved.unknown(&station);
        }
        let absent = matches!(answer, Answer::Absent(_));
        let found = self.answer(path, answer, reading);
        if absent { solved.unknown(&station) } else { found }
    }

    fn setting(
        &self,
        path: &Path,
        at: ItemRef,
        slot: &crate::defs::SlotName,
        reading: Reading<'_>,
    ) -> Option<Datum> {
        if &*slot.0 == "gear"
            && let Some(gear) = &self.gear
            && self.given(at, slot).is_none()
        {
            return Some(Datum::Word(gear.clone()));
        }
        if self.given(at, slot).is_some() {
            return self.field(at, slot);
        }
        let field = registry::DRIVE_FIELDS.iter().find(|field| *field.name == *slot.0)?;
        if let registry::Need::Default { si, .. } = field.need
            && let Some(datum) = crate::fields::of_default(field, si)
        {
            return Some(datum);
        }
        let message = format!("`{}` is not given", path_text(path));
        self.report(Diagnostic::new(Code::MissingField, self.place(reading.at, path.span), message));
        None
    }

    /// Turns an answer of the solver into a value, or says why there is none.
    fn answer(&self, path: &Path, answer: Answer, reading: Reading<'_>) -> Option<Datum> {
        let found = match answer {
            Answer::Quantity { si, kind, marks } => {
                if marks.outside {
                    self.remark("taken outside the range in which the curve was measured".to_owned());
                } else if marks.scaled {
                    self.remark("from data taken at other conditions and scaled".to_owned());
                }
                let kind = layshaft_units::kind(kind)?;
                // Nobody wrote a unit: the reader is shown the one that suits the number. A share has the type of a
                // plain number and would be shown as one.
                let share = matches!(kind.name, "percentage" | "grade");
                let ty = kind.ty();
                return Some(Datum::Quantity(Quantity {
                    si,
                    ty,
                    limits: None,
                    is_range: false,
                    confidence: None,
                    unit: share.then(|| "%".into()),
                }));
            }
            Answer::Flag(flag) => return Some(Datum::Flag(flag)),
            Answer::Word(word) => return Some(Datum::Word(word.into())),
            Answer::Absent(note) | Answer::Unbounded(note) => {
                self.remark(crate::say::note(&note));
                return None;
            }
            Answer::Refused(_) => return None,
            Answer::NoSuch => format!("there is no result `{}`", path_text(path)),
        };
        self.report(Diagnostic::new(Code::UnknownName, self.place(reading.at, path.span), found));
        None
    }

    /// Resolves `drive.result`, `drive.part.result`, `drive.part.port.result`.
    pub(crate) fn station(&self, path: &Path, drive: ItemRef, used: usize, at: ItemRef) -> Option<Station> {
        let rest = &path.names[used..];
        let place = self.place(at, path.span);
        let (result, middle) = match rest.split_last() {
            Some((last, middle)) if middle.len() <= 3 => (last, middle),
            _ => {
                let name = path_text(path);
                let message = format!("`{name}` is a drive, not a value");
                let found = Diagnostic::new(Code::KindMismatch, place, message);
                self.report(found.help(format!("name one of its results: `{name}.speed`")));
                return None;
            }
        };
        let (port, middle) = match middle.split_last() {
            Some((port, middle)) if &*port.text == "input" && !middle.is_empty() => {
                (Some(Port::Input), middle)
            }
            Some((port, middle)) if &*port.text == "output" && !middle.is_empty() => {
                (Some(Port::Output), middle)
            }
            _ => (None, middle),
        };
        let part = if middle.is_empty() { None } else { Some(self.part_of(drive, middle, at)?) };
        let known: Vec<&'static ResultRow> = match part {
            None => registry::DRIVE_RESULTS.iter().collect(),
            Some(part) => {
                let def = self.shared.parts.get(&part)?;
                let row = def.row?;
                row.results.iter().chain(registry::common_results(def.role)).collect()
            }
        };
        if let Some(row) = known.iter().find(|row| row.name == &*result.text) {
            let shape = row.shape;
            return Some(Station { part, port, result: result.text.clone(), shape });
        }
        let place = self.place(at, result.span);
        let whose = match part {
            None => "a drive".to_owned(),
            Some(part) => {
                let role = self.shared.parts.get(&part).map_or("part", |part| role_word(part.role));
                format!("this {role}")
            }
        };
        let message = format!("{whose} has no result `{}`", result.text);
        let found = Diagnostic::new(Code::UnknownName, place, message);
        let names = || known.iter().map(|row| row.name);
        self.report(match layshaft_units::closest(&result.text, names()) {
            Some(close) => found.fix(format!("write `{close}`"), place, close),
            None => found.help(format!("results: {}", names().collect::<Vec<_>>().join(", "))),
        });
        None
    }

    /// The part a drive's path names; it must take part in the drive.
    fn part_of(&self, drive: ItemRef, names: &[layshaft_syntax::Name], at: ItemRef) -> Option<ItemRef> {
        let world = self.shared.world;
        let def = self.shared.drives.get(&drive)?;
        let head = world.head(drive.file, names).filter(|(.., used)| *used == names.len());
        if let Some((Declared::Part, part, _)) = head
            && self.takes_part(def, part)
        {
            return Some(part);
        }
        let span = names.iter().map(|name| name.span).reduce(layshaft_diagnostics::Span::cover)?;
        let place = self.place(at, span);
        let written: Vec<_> = names.iter().map(|name| &*name.text).collect();
        let message = format!("no part `{}` takes part in `{}`", written.join("."), def.name.text);
        let mut found = Diagnostic::new(Code::UnknownName, place, message);
        let members: Vec<&str> =
            def.members.iter().filter_map(|part| world.name(*part)).map(|name| &*name.text).collect();
        if let Some(close) = layshaft_units::closest(&written.join("."), members.iter().copied()) {
            found = found.fix(format!("write `{close}`"), place, close);
        } else {
            found = found.help(format!("its parts: {}", members.join(", ")));
        }
        self.report(found);
        None
    }

    fn takes_part(&self, def: &crate::drives::DriveDef<'_>, part: ItemRef) -> bool {
        def.members.contains(&part)
            || def.members.iter().any(|member| {
                self.built(*member).is_some_and(|built| built.links.values().any(|link| *link == part))
            })
    }
}
