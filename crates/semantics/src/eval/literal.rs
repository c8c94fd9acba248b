//! Numbers with their units, and the messages for the ways they go wrong.

use std::rc::Rc;
use std::sync::{Arc, OnceLock};

use layshaft_diagnostics::{Code, Diagnostic, FileSpan, Span};
use layshaft_syntax::{Expr, Number, UnitText};
use layshaft_units::{Kind, Refusal, Type, UnitError};

use super::{Eval, Reading, article};
use crate::quantity::Quantity;
use crate::unit_memo::Read;
use crate::world::{Declared, ItemRef};

impl Eval<'_> {
    /// The words of an expression as written.
    pub fn words(&self, expr: &Expr, reading: Reading<'_>) -> String {
        self.shared.world.text(reading.at, expr.span).to_owned()
    }

    /// A number and its unit, read as its place wants where two readings exist.
    pub fn literal(
        &self,
        number: &Number,
        unit: Option<&UnitText>,
        reading: Reading<'_>,
    ) -> Option<Quantity> {
        let Some(written) = unit else {
            let ty = Type::of_number_literal(number.value);
            let quantity = Quantity {
                si: number.value,
                ty,
                limits: None,
                is_range: false,
                confidence: None,
                unit: None,
            };
            return self.finite(quantity, reading, number.span);
        };
        let unit = self.unit(written, reading.at, reading.wanted, Some(number))?;
        self.hint_hidden_names(written, number, reading.at);
        let si = unit.to_si(number.value);
        let quantity = Quantity {
            si,
            ty: unit.ty,
            limits: None,
            is_range: false,
            confidence: None,
            unit: Some(Arc::clone(&unit.spelling)),
        };
        self.finite(quantity, reading, number.span.cover(written.span))
    }

    /// A unit, or what is wrong with it.
    pub fn unit(
        &self,
        written: &UnitText,
        at: ItemRef,
        wanted: Option<&Type>,
        number: Option<&Number>,
    ) -> Option<Rc<Read>> {
        match self.shared.units.read(&written.text, wanted) {
            Ok(unit) => Some(unit),
            Err(error) => {
                self.report(self.bad_unit(written, &error, at, number));
                None
            }
        }
    }

    fn bad_unit(
        &self,
        written: &UnitText,
        error: &UnitError,
        at: ItemRef,
        number: Option<&Number>,
    ) -> Diagnostic {
        let whole = self.place(at, written.span);
        match error {
            UnitError::Unknown { symbol, at: range, suggestions } => {
                let place = self.symbol_place(written, at, *range);
                let mut found =
                    Diagnostic::new(Code::UnknownUnit, place, format!("no unit is written `{symbol}`"));
                if let Some((Declared::Let, _)) = self.shared.world.find(at.file, symbol)
                    && let Some(number) = number
                {
                    let text = format!("{} * {}", number.text, written.text);
                    let place = self.place(at, number.span.cover(written.span));
                    return found.note("directly after a number stands a unit").fix(
                        format!("for your value `{symbol}` write `{text}`"),
                        place,
                        text,
                    );
                }
                for close in suggestions {
                    found = found.fix(format!("write `{close}`"), place, close.clone());
                }
                if suggestions.is_empty() {
                    found = found.help("`layshaft units` lists the units and how they are written");
                }
                found
            }
            UnitError::Ambiguous { symbol, at: range, choices } => {
                let place = self.symbol_place(written, at, *range);
                let message = format!("`{symbol}` is read differently by different trades");
                let mut found = Diagnostic::new(Code::AmbiguousUnit, place, message);
                for (unit, meaning) in choices {
                    found = found.fix(format!("write `{unit}` for {meaning}"), place, unit.clone());
                }
                found
            }
            UnitError::TwoReadings { choices, .. } => {
                let message = format!("`{}` can be read in two ways", written.text);
                let mut found = Diagnostic::new(Code::AmbiguousUnit, whole, message)
                    .note("after one `/` no further `·` or `/` may follow without brackets");
                for (unit, meaning) in choices {
                    found = found.fix(format!("write `{unit}`: {meaning}"), whole, unit.clone());
                }
                found
            }
            UnitError::Syntax { message, .. } => Diagnostic::new(Code::UnknownUnit, whole, message.clone()),
        }
    }

    /// Where a symbol of a unit stands. A folded spelling can differ in length from the text: then the whole unit.
    fn symbol_place(&self, written: &UnitText, at: ItemRef, (start, end): (usize, usize)) -> FileSpan {
        let text = self.shared.world.text(at, written.span);
        let exact = text == &*written.text && end <= text.len() && start < end;
        let span = if exact {
            Span::new(written.span.start + start as u32, written.span.start + end as u32)
        } else {
            written.span
        };
        self.place(at, span)
    }

    /// `10 kg*g` with a value `g` in sight: it is the gram, and may not be meant. A unit of the trade, such as `m/s²`
    /// or one written with `·`, is no product of values.
    fn hint_hidden_names(&self, written: &UnitText, number: &Number, at: ItemRef) {
        if is_usual(self.shared.world.text(at, written.span)) {
            return;
        }
        let mut symbols = written.text.split(|c: char| "·*/()^⁻¹²³0123456789-".contains(c));
        let _first = symbols.next();
        for symbol in symbols.filter(|symbol| !symbol.is_empty()) {
            if let Some((Declared::Let, _)) = self.shared.world.find(at.file, symbol) {
                let place = self.place(at, number.span.cover(written.span));
                let message =
                    format!("`{symbol}` is read as a unit here, and the spec has a value of that name");
                let spaced = self.shared.world.text(at, written.span).replacen('*', " * ", 1);
                let text = format!("{} {}", number.text, spaced.replacen('/', " / ", 1));
                self.report(Diagnostic::new(Code::UnitHidesName, place, message).fix(
                    format!("with blanks, `{text}`, it is your value"),
                    place,
                    text,
                ));
            }
        }
    }

    /// The finding for a quantity of another kind than its place wants.
    pub fn mismatch(
        &self,
        found: &Quantity,
        kind: &'static Kind,
        refusal: &Refusal,
        at: ItemRef,
        span: Span,
    ) -> Diagnostic {
        let place = self.place(at, span);
        if found.ty.is_plain_number() && found.unit.is_none() && !kind.ty().is_plain_number() {
            let message = format!("{} is wanted here, and the number has no unit", article(kind.title));
            let words = self.shared.world.text(at, span).to_owned();
            let mut finding = Diagnostic::new(Code::MissingUnit, place, message);
            for unit in kind.units.iter().take(3) {
                let text = format!("{words} {unit}");
                finding = finding.fix(format!("write `{text}`"), place, text);
            }
            return finding;
        }
        let message = format!("{} is wanted here, and this is {}", article(kind.title), found.ty.describe());
        let mut finding = Diagnostic::new(Code::KindMismatch, place, message);
        if let Some(unit) = found.unit.as_deref().and_then(|unit| layshaft_units::parse_unit(unit).ok())
            && let Some(place) = self.unit_place(at, span)
        {
            for (text, why) in layshaft_units::replacements(&unit, &kind.ty()) {
                finding = finding.fix(format!("write `{text}`: {why}"), place, text);
            }
        }
        let hints = refusal.hints();
        if !hints.is_empty() {
            finding = finding.help(hints.join("; or "));
        }
        // Where the algebra says no more than the message, it is not said twice.
        let why = refusal.message();
        if why == finding.message.replace(", and this", ", this") { finding } else { finding.note(why) }
    }

    /// The unit of a literal that is all the span holds.
    fn unit_place(&self, at: ItemRef, span: Span) -> Option<FileSpan> {
        let text = self.shared.world.text(at, span);
        if !text.trim_start_matches(['-', '−', ' ']).starts_with(|c: char| c.is_ascii_digit()) {
            return None;
        }
        let number = text.find(|c: char| c.is_ascii_digit())?;
        let after = text[number..].find(|c: char| !"0123456789._eE+-".contains(c))? + number;
        let start = text[after..].find(|c: char| !c.is_whitespace())? + after;
        let written = text[start..].trim_end();
        if written.contains(char::is_whitespace) {
            return None;
        }
        let from = span.start + start as u32;
        Some(self.place(at, Span::new(from, from + written.len() as u32)))
    }

    /// The finding for two sides of a comparison that do not agree, at the literal among them.
    pub(super) fn refused(
        &self,
        found: &Quantity,
        other: &Quantity,
        refusal: &Refusal,
        literal: &Expr,
        place: FileSpan,
    ) -> Diagnostic {
        let _ = literal;
        if other.ty.is_plain_number() && other.unit.is_none() {
            let message = format!("the limit of {} has no unit", found.ty.describe());
            return Diagnostic::new(Code::MissingUnit, place, message);
        }
        let message = format!("{} is compared with {}", found.ty.describe(), other.ty.describe());
        let mut finding = Diagnostic::new(Code::KindMismatch, place, message);
        let hints = refusal.hints();
        if !hints.is_empty() {
            finding = finding.help(hints.join("; or "));
        }
        finding
    }
}

/// Whether a unit is one of those offered for some kind, or written with the sign that only units have.
fn is_usual(unit: &str) -> bool {
    static OFFERED: OnceLock<Vec<&'static str>> = OnceLock::new();
    if unit.contains('·') {
        return true;
    }
    let offered = OFFERED.get_or_init(|| {
        let units = layshaft_units::KINDS.iter().flat_map(|kind| kind.units);
        let mut units: Vec<&str> = units.copied().collect();
        units.sort_unstable();
        units
    });
    let is_offered = |unit: &str| offered.binary_search(&unit).is_ok();
    if unit.contains(['*', '^']) {
        return is_offered(&unit.replace('*', "·").replace("^2", "²").replace("^3", "³"));
    }
    is_offered(unit)
}
