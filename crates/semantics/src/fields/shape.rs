//! One field: from its entry to the shape its row wants, in range.

use layshaft_diagnostics::{Code, Diagnostic, Span};
use layshaft_mechanics::registry::{Bounds, Field, Role, Shape};
use layshaft_mechanics::values::{Duty, FieldValue, Gear};
use layshaft_syntax::{BinaryOp, Expr, ExprKind, Value, ValueKind};
use layshaft_units::Kind;

use super::FieldRead;
use crate::defs::{Given, role_word};
use crate::eval::{Eval, Reading, Slot, article};
use crate::quantity::{Datum, Quantity};
use crate::world::Declared;

/// Reads a field's entry.
pub(crate) fn read(
    eval: &Eval<'_>,
    field: &'static Field,
    given: &Given<'_>,
    slot: &Slot,
) -> Option<FieldRead> {
    let reader = Reader { eval, field, given, slot };
    match field.shape {
        Shape::Quantity(kind) => reader.quantity(layshaft_units::kind(kind)?),
        Shape::OfRated(kind) => reader.of_rated(layshaft_units::kind(kind)?),
        Shape::Interval(kind) => reader.interval(layshaft_units::kind(kind)?),
        Shape::Choice(words) => reader.choice(words),
        Shape::Flag => reader.flag(),
        Shape::Part(role) => reader.part(role),
        Shape::Points(columns) => {
            let table = super::table::read(eval, given, field, columns)?;
            Some(FieldRead { value: FieldValue::Points(table), datum: None, link: None })
        }
        Shape::Ratio { diameters } => reader.teeth(diameters),
        Shape::Gears if matches!(slot, Slot::Field(_, (_, None))) => reader.engaged(),
        Shape::Gears => reader.gear(),
        Shape::Duty => reader.duty(),
    }
}

/// Whether nothing passes in a gear of this value.
pub(crate) fn is_neutral(value: &Value) -> bool {
    matches!(&value.kind, ValueKind::Expr(Expr { kind: ExprKind::Path(path), .. })
        if matches!(&path.names[..], [word] if &*word.text == "neutral"))
}

struct Reader<'a, 'w> {
    eval: &'a Eval<'w>,
    field: &'static Field,
    given: &'a Given<'w>,
    slot: &'a Slot,
}

impl Reader<'_, '_> {
    fn reading(&self) -> Reading<'_> {
        Reading { at: self.given.at, wanted: None, own: Some(self.slot), ask: None }
    }

    fn refuse(&self, code: Code, message: String) -> Diagnostic {
        Diagnostic::new(code, self.eval.place(self.given.at, self.given.value.span), message)
    }

    /// A quantity with a value.
    fn known(&self, expr: &Expr) -> Option<Quantity> {
        self.eval.quantity(expr, self.reading()).filter(Quantity::is_known)
    }

    fn expr(&self) -> Option<&Expr> {
        match &self.given.value.kind {
            ValueKind::Expr(expr) => Some(expr),
            _ => None,
        }
    }

    fn quantity(&self, kind: &'static Kind) -> Option<FieldRead> {
        let kind = self.set_speed_of_a_load().unwrap_or(kind);
        let datum = self.eval.value_of(self.given, Some(self.slot), Some(kind))?;
        let Datum::Quantity(found) = &datum else { return None };
        if !found.is_known() || !self.in_range(found, kind) {
            return None;
        }
        Some(FieldRead { value: FieldValue::Si(found.si), datum: Some(datum), link: None })
    }

    /// A set speed is that of the source, or the one of a load that runs straight: `set_speed = 100 km/h`.
    fn set_speed_of_a_load(&self) -> Option<&'static Kind> {
        if self.field.name != "set_speed" {
            return None;
        }
        let linear = layshaft_units::kind("speed")?;
        let found = self.eval.quantity(self.expr()?, self.reading())?;
        (found.ty.dim == linear.ty().dim).then_some(linear)
    }

    /// Whether the law takes the value; says so where not, and where the trade would ask again.
    fn in_range(&self, found: &Quantity, kind: &'static Kind) -> bool {
        let ends = found.limits.map_or([found.si, found.si], |(low, high)| [low, high]);
        let outside = |bounds: &Bounds| ends.iter().any(|si| !bounds.holds(*si));
        let unit = found.unit.as_deref().unwrap_or(kind.unit);
        let name = self.field.name;
        if outside(&self.field.hard) {
            let shown = crate::say::in_unit(found.si, unit);
            let message = format!(
                "`{name}` must be {}, and this is {shown}",
                super::words::say_bounds(&self.field.hard, kind, unit)
            );
            let mut finding = self.refuse(Code::OutOfRange, message);
            if let Some((offer, why)) = self.slip(found, kind) {
                let place = finding.primary.place;
                finding = finding.fix(format!("write `{offer}`{why}"), place, offer);
            }
            self.eval.report(finding);
            return false;
        }
        if outside(&self.field.plausible) {
            let shown = crate::say::in_unit(found.si, unit);
            let usual = super::words::say_bounds(&self.field.plausible, kind, unit);
            let message = format!("{shown} is unusual for `{name}`: {usual} is what is met");
            self.eval.report(self.refuse(Code::Implausible, message).note(self.field.meaning));
        }
        true
    }

    /// What was probably meant by a value out of range: `85` for 85 %.
    fn slip(&self, found: &Quantity, kind: &'static Kind) -> Option<(String, &'static str)> {
        let plain = kind.ty().is_plain_number() && found.unit.is_none();
        if plain && self.field.hard.holds(found.si / 100.0) && self.field.hard.high <= 1.0 {
            let words = self.eval.shared.world.text(self.given.at, self.given.value.span);
            return Some((format!("{words} %"), ": a plain number is not a percentage"));
        }
        None
    }

    /// `2.3 × rated`, or a quantity.
    fn of_rated(&self, kind: &'static Kind) -> Option<FieldRead> {
        let Some(multiple) = self.expr().and_then(rated_multiple) else { return self.quantity(kind) };
        let times = match multiple {
            Some(expr) => {
                let found = self.known(expr)?;
                if !found.ty.is_plain_number() {
                    let message = format!("`rated` is multiplied by {}", found.ty.describe());
                    self.eval.report(
                        self.refuse(Code::KindMismatch, message)
                            .help("a multiple of the rated value is a plain number: `2.3 × rated`"),
                    );
                    return None;
                }
                found.si
            }
            None => 1.0,
        };
        if !(times.is_finite() && times > 0.0) {
            let message = format!("`{}` must be a multiple above 0 of the rated value", self.field.name);
            self.eval.report(self.refuse(Code::OutOfRange, message));
            return None;
        }
        Some(FieldRead { value: FieldValue::OfRated(times), datum: None, link: None })
    }

    fn interval(&self, kind: &'static Kind) -> Option<FieldRead> {
        let datum = self.eval.value_of(self.given, Some(self.slot), Some(kind))?;
        let Datum::Quantity(found) = &datum else { return None };
        if !found.is_known() || !self.in_range(found, kind) {
            return None;
        }
        let (low, high) = found.limits.unwrap_or((found.si, found.si));
        Some(FieldRead { value: FieldValue::Interval(low, high), datum: Some(datum), link: None })
    }

    fn choice(&self, words: &'static [(&'static str, &'static str)]) -> Option<FieldRead> {
        if let Some(ExprKind::Path(path)) = self.expr().map(|expr| &expr.kind) {
            let written = crate::defs::path_text(path);
            if let Some((word, _)) = words.iter().find(|(word, _)| *word == written) {
                let datum = Some(Datum::Word((*word).into()));
                return Some(FieldRead { value: FieldValue::Word(word), datum, link: None });
            }
            // An override may name the plain value or another field: `lift.direction = rise.direction`.
            if path.names.len() > 1
                && let Some(Datum::Word(found)) =
                    self.expr().and_then(|expr| self.eval.datum(expr, self.reading()))
                && let Some((word, _)) = words.iter().find(|(word, _)| **word == *found)
            {
                return Some(FieldRead {
                    value: FieldValue::Word(word),
                    datum: Some(Datum::Word(found)),
                    link: None,
                });
            }
        }
        let written = self.eval.shared.world.text(self.given.at, self.given.value.span);
        let list: Vec<_> = words.iter().map(|(word, meaning)| format!("`{word}` ({meaning})")).collect();
        let message = format!("`{}` is not a choice for `{}`", written, self.field.name);
        let mut finding = self.refuse(Code::WrongValue, message).help(format!("choose {}", list.join(", ")));
        if let Some(close) = layshaft_units::closest(written, words.iter().map(|(word, _)| *word)) {
            let place = finding.primary.place;
            finding = finding.fix(format!("write `{close}`"), place, close);
        }
        self.eval.report(finding);
        None
    }

    fn flag(&self) -> Option<FieldRead> {
        let Some(expr) = self.expr() else {
            let message = format!("`{}` is `yes` or `no`", self.field.name);
            self.eval.report(self.refuse(Code::WrongValue, message));
            return None;
        };
        let flag = self.eval.flag(expr, self.reading())?;
        Some(FieldRead { value: FieldValue::Flag(flag), datum: Some(Datum::Flag(flag)), link: None })
    }

    fn part(&self, role: Role) -> Option<FieldRead> {
        let world = self.eval.shared.world;
        if let Some(ExprKind::Path(path)) = self.expr().map(|expr| &expr.kind) {
            let head =
                world.head(self.given.at.file, &path.names).filter(|(.., used)| *used == path.names.len());
            if let Some((Declared::Part, part, _)) = head {
                let found = self.eval.shared.parts.get(&part)?;
                if found.role == role {
                    let datum = Some(Datum::Word(crate::defs::path_text(path).into()));
                    // The index in a drive is not known yet; the drive puts it in.
                    return Some(FieldRead { value: FieldValue::Part(0), datum, link: Some(part) });
                }
                let message = format!(
                    "`{}` is {}, and a {} is wanted",
                    crate::defs::path_text(path),
                    article(role_word(found.role)),
                    role_word(role)
                );
                self.eval.report(self.refuse(Code::WrongValue, message));
                return None;
            }
        }
        let written = world.text(self.given.at, self.given.value.span);
        let message = format!("there is no {} `{written}`", role_word(role));
        let mut finding = self.refuse(Code::UnknownName, message);
        let parts = self
            .eval
            .shared
            .parts
            .values()
            .filter(|part| part.role == role && part.at.file == self.given.at.file);
        if let Some(close) = layshaft_units::closest(written, parts.map(|part| &*part.name.text)) {
            let place = finding.primary.place;
            finding = finding.fix(format!("write `{close}`"), place, close);
        }
        self.eval.report(finding);
        None
    }

    /// `a drives b`: teeth, or diameters.
    fn teeth(&self, diameters: bool) -> Option<FieldRead> {
        let ValueKind::Teeth { driver, driven } = &self.given.value.kind else {
            let message = format!("`{}` says which wheel drives which", self.field.name);
            let sample = if diameters { "`120 mm drives 300 mm`" } else { "`18 drives 42`" };
            self.eval.report(
                self.refuse(Code::WrongValue, message)
                    .help(format!("write {sample}: the first is the driving one")),
            );
            return None;
        };
        let (driver, driven) = (self.wheel(driver, diameters), self.wheel(driven, diameters));
        let value = FieldValue::Ratio { driver: driver?, driven: driven? };
        Some(FieldRead { value, datum: None, link: None })
    }

    fn wheel(&self, expr: &Expr, diameters: bool) -> Option<f64> {
        let kind = layshaft_units::kind(if diameters { "length" } else { "number" })?;
        let found = self.known(expr)?;
        let found = self.eval.demand(found, kind, self.given.at, expr.span)?;
        let whole = diameters || (found.si - found.si.round()).abs() < 1e-9;
        if found.si > 0.0 && whole {
            return Some(found.si);
        }
        let message =
            if diameters { "a diameter is above 0" } else { "teeth are counted in whole numbers above 0" };
        let place = self.eval.place(self.given.at, expr.span);
        self.eval.report(Diagnostic::new(Code::OutOfRange, place, message));
        None
    }

    /// `gear = 2`, `gear = low`: the gear a drive engages, by its name.
    fn engaged(&self) -> Option<FieldRead> {
        let name = match self.expr().map(|expr| &expr.kind) {
            Some(ExprKind::Quantity { number, unit: None }) => number.text.clone(),
            Some(ExprKind::Path(path)) if path.names.len() == 1 => path.names[0].text.clone(),
            Some(ExprKind::Text(text)) => text.clone(),
            _ => {
                let message = "a gear is engaged by its name".to_owned();
                let finding = self.refuse(Code::WrongValue, message);
                self.eval.report(finding.help("write `gear = 2` or `gear = low`"));
                return None;
            }
        };
        let value = FieldValue::Gears(vec![Gear::of(&*name, 1.0)]);
        Some(FieldRead { value, datum: Some(Datum::Word(name)), link: None })
    }

    /// `gear 1 = reduction 14.5`, `gear n = neutral`
    fn gear(&self) -> Option<FieldRead> {
        let reduction = if is_neutral(self.given.value) { None } else { Some(self.reduction()?) };
        let Slot::Field(_, (_, Some(name))) = self.slot else { return None };
        let gear = Gear { reduction, ..Gear::of(&**name, 1.0) };
        Some(FieldRead { value: FieldValue::Gears(vec![gear]), datum: None, link: None })
    }

    fn reduction(&self) -> Option<f64> {
        Some(match &self.given.value.kind {
            ValueKind::Teeth { driver, driven } => {
                let (driver, driven) = (self.wheel(driver, false), self.wheel(driven, false));
                driven? / driver?
            }
            ValueKind::Ratio { word, value } => {
                let found = self.known(value)?;
                let number = layshaft_units::kind("number")?;
                let found = self.eval.demand(found, number, self.given.at, value.span)?;
                if !(found.si > 0.0 && found.si.is_finite()) {
                    let message = format!("a {} is above 0", word.text);
                    let place = self.eval.place(self.given.at, value.span);
                    self.eval.report(Diagnostic::new(Code::OutOfRange, place, message));
                    return None;
                }
                if &*word.text == "increase" { 1.0 / found.si } else { found.si }
            }
            _ => {
                let message = "a gear says which way it changes the speed".to_owned();
                self.eval.report(self.refuse(Code::WrongValue, message).help(
                    "write `reduction 14.5` (output slower), `increase 2` (output faster), `18 drives 42` or `neutral`",
                ));
                return None;
            }
        })
    }

    fn duty(&self) -> Option<FieldRead> {
        let ValueKind::Duty { word, value } = &self.given.value.kind else {
            let message = format!("`{}` is a duty type of IEC 60034-1", self.field.name);
            self.eval
                .report(self.refuse(Code::WrongValue, message).help("write `S1`, `S2 30 min` or `S3 40 %`"));
            return None;
        };
        let class = word.text.strip_prefix('S').and_then(|class| class.parse().ok()).unwrap_or(0_u8);
        if !(1..=10).contains(&class) {
            let place = self.eval.place(self.given.at, word.span);
            let message = format!("there is no duty type `{}`; S1 to S10 exist", word.text);
            self.eval.report(Diagnostic::new(Code::WrongValue, place, message));
            return None;
        }
        let number = match value {
            Some(expr) => {
                let kind = layshaft_units::kind(if class == 2 { "time" } else { "number" })?;
                let found = self.known(expr)?;
                Some((self.eval.demand(found, kind, self.given.at, expr.span)?.si, expr.span))
            }
            None => None,
        };
        let value = self.duty_number(class, number)?;
        Some(FieldRead { value: FieldValue::Duty(Duty { class, value }), datum: None, link: None })
    }

    fn duty_number(&self, class: u8, number: Option<(f64, Span)>) -> Option<Option<f64>> {
        let wrong = match (class, number) {
            (2, Some((time, _))) => time <= 0.0,
            (3..=6, Some((share, _))) => !(share > 0.0 && share <= 1.0),
            (2 | 3, None) => true,
            _ => false,
        };
        if !wrong {
            return Some(number.map(|(value, _)| value));
        }
        let message = if class == 2 {
            "S2 is followed by its duration: `S2 30 min`"
        } else {
            "this duty type is followed by its cyclic duration factor, up to 100 %: `S3 40 %`"
        };
        self.eval.report(self.refuse(Code::OutOfRange, message.to_owned()));
        None
    }
}

/// The factor before `rated`; `Some(None)` for a bare `rated`.
fn rated_multiple(expr: &Expr) -> Option<Option<&Expr>> {
    match &expr.kind {
        ExprKind::Rated => Some(None),
        ExprKind::Paren(inner) => rated_multiple(inner),
        ExprKind::Binary { op: BinaryOp::Multiply, left, right, .. } => match (&left.kind, &right.kind) {
            (_, ExprKind::Rated) => Some(Some(left)),
            (ExprKind::Rated, _) => Some(Some(right)),
            _ => None,
        },
        _ => None,
    }
}
