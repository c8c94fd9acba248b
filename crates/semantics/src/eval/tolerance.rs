//! Tolerances and ranges: the limits of a value.

use layshaft_diagnostics::{Code, Diagnostic};
use layshaft_syntax::{Expr, ExprKind, ToleranceForm};

use super::expr::is_literal;
use super::{Eval, Reading};
use crate::quantity::Quantity;

impl Eval<'_> {
    /// `x ± t` and its relatives.
    pub(super) fn tolerance(
        &self,
        expr: &Expr,
        value: &Expr,
        tolerance: &Expr,
        form: ToleranceForm,
        confidence: Option<&Expr>,
        reading: Reading<'_>,
    ) -> Option<Quantity> {
        let percent_value = unit_of(value).is_some_and(is_percent);
        let percent = unit_of(tolerance).is_some_and(is_percent);
        if percent_value && form == ToleranceForm::Plain {
            return self.ambiguous_percent(expr, value, tolerance, reading);
        }
        let borrowed = if percent { None } else { unit_of(tolerance) };
        let a = self.with_unit_of(value, borrowed, reading)?;
        let relative = form == ToleranceForm::OfValue || (form == ToleranceForm::Plain && percent);
        let confidence = match confidence {
            Some(expr) => Some(self.ratio(expr, reading)?),
            None => None,
        };
        let half = if relative {
            a.si.abs() * self.ratio(tolerance, reading)?
        } else if form == ToleranceForm::Points {
            self.quantity(tolerance, reading.wanting(None))?.si / 100.0
        } else {
            let t = self.difference(tolerance, &a, reading)?;
            t.si
        };
        if !a.is_known() || half.is_nan() {
            return Some(Quantity::unknown(a.ty));
        }
        if !(half >= 0.0 && half.is_finite()) {
            let message = "a tolerance is written without a sign, `±` says both";
            self.report(Diagnostic::new(Code::WrongValue, self.place(reading.at, tolerance.span), message));
            return None;
        }
        Some(Quantity { limits: Some((a.si - half, a.si + half)), is_range: false, confidence, ..a })
    }

    /// The tolerance of a value, in its kind; of a level it is a difference.
    fn difference(&self, tolerance: &Expr, of: &Quantity, reading: Reading<'_>) -> Option<Quantity> {
        let wanted = layshaft_units::difference_of(&of.ty);
        let t = self.quantity(tolerance, reading.wanting(Some(&wanted)))?;
        if t.ty.is_plain_number() && t.unit.is_none() && is_literal(tolerance) && !wanted.is_plain_number() {
            self.report(self.bare(tolerance, of, reading));
            return None;
        }
        if let Err(refusal) = layshaft_units::unify(&wanted, &t.ty) {
            let place = self.place(reading.at, tolerance.span);
            let message = format!("the tolerance is not of the value's kind: {}", refusal.message());
            self.report(Diagnostic::new(Code::KindMismatch, place, message));
            return None;
        }
        Some(t)
    }

    /// `220 mm ± 0.1`: the right number has to say its unit.
    fn bare(&self, tolerance: &Expr, of: &Quantity, reading: Reading<'_>) -> Diagnostic {
        let place = self.place(reading.at, tolerance.span);
        let found = Diagnostic::new(Code::MissingUnit, place, "the tolerance has no unit");
        match &of.unit {
            Some(unit) => {
                let fixed = format!("{} {unit}", self.words(tolerance, reading));
                found.fix(format!("write `{fixed}`"), place, fixed.clone())
            }
            None => found,
        }
    }

    fn ambiguous_percent(
        &self,
        expr: &Expr,
        value: &Expr,
        tolerance: &Expr,
        reading: Reading<'_>,
    ) -> Option<Quantity> {
        let v = self.quantity(value, reading)?.si * 100.0;
        let t = self.quantity(tolerance, reading.wanting(None))?.si * 100.0;
        let place = self.place(reading.at, expr.span);
        let (v_text, t_text) = (self.words(value, reading), crate::say::plain(t));
        let message = "a tolerance in per cent on a value in per cent can be read in two ways";
        let points = format!("{v_text} ± {t_text} points");
        let of_value = format!("{v_text} ± {t_text} % of value");
        let span =
            |half: f64| format!("{} % .. {} %", crate::say::plain(v - half), crate::say::plain(v + half));
        self.report(
            Diagnostic::new(Code::AmbiguousPercentTolerance, place, message)
                .fix(format!("write `{points}`: {}", span(t)), place, points)
                .fix(format!("write `{of_value}`: {}", span(v * t / 100.0)), place, of_value),
        );
        None
    }

    /// `x within lo .. hi`
    pub(super) fn within(
        &self,
        expr: &Expr,
        value: &Expr,
        low: &Expr,
        high: &Expr,
        reading: Reading<'_>,
    ) -> Option<Quantity> {
        let span = self.range(low, high, reading)?;
        let a = self.with_unit_of(value, unit_of(high), reading.wanting(Some(&span.ty)))?;
        if let Err(refusal) = layshaft_units::unify(&a.ty, &span.ty) {
            let place = self.place(reading.at, expr.span);
            self.report(Diagnostic::new(Code::KindMismatch, place, refusal.message()));
            return None;
        }
        if !a.is_known() || !span.is_known() {
            return Some(Quantity::unknown(a.ty));
        }
        let (low, high) = span.limits?;
        if !(low..=high).contains(&a.si) {
            let message = "the value lies outside its own limits";
            self.report(Diagnostic::new(Code::Contradiction, self.place(reading.at, expr.span), message));
            return None;
        }
        Some(Quantity { limits: Some((low, high)), is_range: false, ..a })
    }

    /// `lo .. hi`: the middle, with the ends as limits.
    pub fn range(&self, low: &Expr, high: &Expr, reading: Reading<'_>) -> Option<Quantity> {
        let b = self.quantity(high, reading);
        let a = self.with_unit_of(low, unit_of(high), reading);
        let (a, b) = (a?, b?);
        let place = self.place(reading.at, low.span.cover(high.span));
        if unit_of(high).is_none() && unit_of(low).is_some() && is_literal(high) {
            let unit = unit_of(low).unwrap_or("");
            let message = "the upper end of the range has no unit";
            let at = self.place(reading.at, high.span);
            let fixed = format!("{} {unit}", self.words(high, reading));
            self.report(Diagnostic::new(Code::MissingUnit, at, message).fix(
                format!("write `{fixed}`"),
                at,
                fixed.clone(),
            ));
            return None;
        }
        let ty = match layshaft_units::unify(&a.ty, &b.ty) {
            Ok(ty) => ty,
            Err(refusal) => {
                self.report(Diagnostic::new(Code::KindMismatch, place, refusal.message()));
                return None;
            }
        };
        if !(a.is_known() && b.is_known()) {
            return Some(Quantity::unknown(ty));
        }
        if a.si > b.si {
            let message = "the lower end of the range lies above the upper end";
            self.report(
                Diagnostic::new(Code::Contradiction, place, message).help("write the smaller value first"),
            );
            return None;
        }
        let si = 0.5 * a.si + 0.5 * b.si;
        let limits = Some((a.si, b.si));
        Some(Quantity { si, ty, limits, is_range: true, confidence: None, unit: b.unit.or(a.unit) })
    }

    /// A bare number takes the unit of its neighbour: `10 .. 20 N·m`, `220 ± 10 mm`.
    fn with_unit_of(&self, expr: &Expr, unit: Option<&str>, reading: Reading<'_>) -> Option<Quantity> {
        if let (ExprKind::Quantity { number, unit: None }, Some(unit)) = (&expr.kind, unit) {
            let unit = layshaft_syntax::UnitText { text: unit.into(), span: number.span };
            return self.literal(number, Some(&unit), reading);
        }
        self.quantity(expr, reading)
    }

    /// A plain number or percentage.
    fn ratio(&self, expr: &Expr, reading: Reading<'_>) -> Option<f64> {
        let found = self.quantity(expr, reading.wanting(None))?;
        if found.ty.is_plain_number() {
            return Some(found.si);
        }
        let place = self.place(reading.at, expr.span);
        let message = format!("a percentage is wanted here, and this is {}", found.ty.describe());
        self.report(Diagnostic::new(Code::KindMismatch, place, message));
        None
    }
}

/// The unit of a literal.
fn unit_of(expr: &Expr) -> Option<&str> {
    match &expr.kind {
        ExprKind::Quantity { unit, .. } => unit.as_ref().map(|unit| &*unit.text),
        ExprKind::Paren(inner) => unit_of(inner),
        _ => None,
    }
}

fn is_percent(unit: &str) -> bool {
    matches!(unit, "%" | "‰")
}
