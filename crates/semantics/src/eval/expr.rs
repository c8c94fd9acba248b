//! Expressions: kinds by the algebra, numbers in SI.

use layshaft_diagnostics::{Code, Diagnostic, Span};
use layshaft_syntax::{BinaryOp, Expr, ExprKind, UnaryOp};
use layshaft_units::{Function, Refusal, Type};

use super::{Eval, Reading};
use crate::quantity::{Datum, Quantity};

/// Factors that people type to convert units by hand; they are not needed where units are checked.
const TYPED_FACTORS: &[(f64, &str)] = &[
    (9.55, "from kW and rpm to N·m (60/2π)"),
    (9.549, "from kW and rpm to N·m (60/2π)"),
    (9549.0, "from kW and rpm to N·m (60 000/2π)"),
    (9550.0, "from kW and rpm to N·m (60 000/2π)"),
    (5252.0, "from hp and rpm to lbf·ft"),
    (33000.0, "from ft·lbf/min to hp"),
    (63025.0, "from hp and rpm to lbf·in"),
    (746.0, "from hp to W"),
    (745.7, "from hp to W"),
    (735.5, "from PS to W"),
    (308.0, "from GD² and rpm to a run-up time"),
    (375.0, "from GD² and rpm to a run-up time"),
    (9.81, "standard gravity without its unit"),
    (9.80665, "standard gravity without its unit"),
];

impl Eval<'_> {
    /// The value of an expression; `None` where something in it is wrong, which has been reported.
    pub fn datum(&self, expr: &Expr, reading: Reading<'_>) -> Option<Datum> {
        match &expr.kind {
            ExprKind::Quantity { number, unit } => {
                self.literal(number, unit.as_ref(), reading).map(Datum::Quantity)
            }
            ExprKind::Text(text) => Some(Datum::Text(text.clone())),
            ExprKind::Flag(flag) => Some(Datum::Flag(*flag)),
            ExprKind::Path(path) => self.path(path, reading),
            ExprKind::Call { function, args } => self.call(expr, function, args, reading),
            ExprKind::Unary { op: UnaryOp::Not, arg } => {
                self.flag(arg, reading).map(|flag| Datum::Flag(!flag))
            }
            ExprKind::Unary { op: UnaryOp::Minus, arg } => self.minus(expr, arg, reading),
            ExprKind::Binary { op: BinaryOp::And, left, right, .. } => {
                let (left, right) = (self.flag(left, reading), self.flag(right, reading));
                both(left, right, false)
            }
            ExprKind::Binary { op: BinaryOp::Or, left, right, .. } => {
                let (left, right) = (self.flag(left, reading), self.flag(right, reading));
                both(left, right, true)
            }
            ExprKind::Binary { op, op_span, left, right } => {
                self.arithmetic(*op, *op_span, left, right, reading).map(Datum::Quantity)
            }
            ExprKind::Power { base, exponent } => {
                self.raise(expr, base, exponent, reading).map(Datum::Quantity)
            }
            ExprKind::Compare { first, rest } => self.compare(first, rest, reading).map(Datum::Flag),
            ExprKind::If { condition, then, otherwise } => self.choose(condition, then, otherwise, reading),
            ExprKind::Tolerance { value, tolerance, form, confidence } => self
                .tolerance(expr, value, tolerance, *form, confidence.as_deref(), reading)
                .map(Datum::Quantity),
            ExprKind::Within { value, low, high } => {
                self.within(expr, value, low, high, reading).map(Datum::Quantity)
            }
            ExprKind::Rated => {
                let message = "`rated` stands for the rated value of a motor, in the fields that can be given as a multiple of it";
                self.report(
                    Diagnostic::new(Code::WrongValue, self.place(reading.at, expr.span), message)
                        .help("write `2.3 × rated` in such a field, or name the value: `motor.rated_torque`"),
                );
                None
            }
            ExprKind::Paren(inner) => self.datum(inner, reading),
            ExprKind::Broken => None,
        }
    }

    /// An expression that must be a quantity.
    pub fn quantity(&self, expr: &Expr, reading: Reading<'_>) -> Option<Quantity> {
        match self.datum(expr, reading)? {
            Datum::Quantity(quantity) => Some(quantity),
            other => {
                let place = self.place(reading.at, expr.span);
                let message = format!("a quantity is wanted here, and this is {}", what(&other));
                self.report(Diagnostic::new(Code::KindMismatch, place, message));
                None
            }
        }
    }

    /// An expression that must be yes or no.
    pub fn flag(&self, expr: &Expr, reading: Reading<'_>) -> Option<bool> {
        match self.datum(expr, reading.wanting(None))? {
            Datum::Flag(flag) => Some(flag),
            other => {
                let place = self.place(reading.at, expr.span);
                let message = format!("a condition (yes or no) is wanted here, and this is {}", what(&other));
                self.report(
                    Diagnostic::new(Code::KindMismatch, place, message)
                        .help("compare it with a limit: `… <= 12 N·m`"),
                );
                None
            }
        }
    }

    fn minus(&self, expr: &Expr, arg: &Expr, reading: Reading<'_>) -> Option<Datum> {
        let found = self.quantity(arg, reading)?;
        let ty = self.allowed(layshaft_units::negate(&found.ty), reading, expr.span)?;
        let limits = found.limits.map(|(low, high)| (-high, -low));
        Some(Datum::Quantity(Quantity { si: -found.si, ty, limits, ..found }))
    }

    /// Passes a type on, or says why the algebra refuses it.
    fn allowed(&self, result: Result<Type, Refusal>, reading: Reading<'_>, span: Span) -> Option<Type> {
        match result {
            Ok(ty) => Some(ty),
            Err(refusal) => {
                let place = self.place(reading.at, span);
                let mut found = Diagnostic::new(Code::KindMismatch, place, refusal.message());
                let hints = refusal.hints();
                if !hints.is_empty() {
                    found = found.help(hints.join("; or "));
                }
                self.report(found);
                None
            }
        }
    }

    /// Two operands of which a bare literal takes its reading from the other: `n + 50 1/min`.
    pub fn pair(&self, left: &Expr, right: &Expr, reading: Reading<'_>) -> Option<(Quantity, Quantity)> {
        if is_literal(left) && !is_literal(right) {
            let b = self.quantity(right, reading)?;
            let a = self.quantity(left, reading.wanting(Some(&b.ty)))?;
            return Some((a, b));
        }
        let a = self.quantity(left, reading);
        let wanted = a.as_ref().map(|a| a.ty).filter(|_| is_literal(right));
        let b = self.quantity(right, wanted.as_ref().map_or(reading, |ty| reading.wanting(Some(ty))));
        Some((a?, b?))
    }

    fn arithmetic(
        &self,
        op: BinaryOp,
        op_span: Span,
        left: &Expr,
        right: &Expr,
        reading: Reading<'_>,
    ) -> Option<Quantity> {
        let adds = matches!(op, BinaryOp::Add | BinaryOp::Subtract);
        let inner = if adds { reading } else { reading.wanting(None) };
        let (a, b) = if adds {
            self.pair(left, right, inner)?
        } else {
            let (a, b) = (self.quantity(left, inner), self.quantity(right, inner));
            (a?, b?)
        };
        let ty = match op {
            BinaryOp::Add => layshaft_units::add(&a.ty, &b.ty),
            BinaryOp::Subtract => layshaft_units::subtract(&a.ty, &b.ty),
            BinaryOp::Multiply => layshaft_units::multiply(&a.ty, &b.ty),
            _ => layshaft_units::divide(&a.ty, &b.ty),
        };
        let span = left.span.cover(right.span);
        if let (BinaryOp::Subtract, Err(_)) = (op, &ty)
            && self.is_written_power(left, right, reading)
        {
            return None;
        }
        let ty = self.allowed(ty, reading, if adds { span } else { op_span })?;
        if !adds {
            self.hint_factor(left, &b, reading);
            self.hint_factor(right, &a, reading);
        }
        let si = match op {
            BinaryOp::Add => a.si + b.si,
            BinaryOp::Subtract => a.si - b.si,
            BinaryOp::Multiply => a.si * b.si,
            _ => a.si / b.si,
        };
        if !(a.is_known() && b.is_known()) {
            return Some(Quantity::unknown(ty));
        }
        let unit = match op {
            BinaryOp::Add | BinaryOp::Subtract => a.unit.or(b.unit),
            BinaryOp::Multiply if b.ty.is_plain_number() => a.unit,
            BinaryOp::Multiply if a.ty.is_plain_number() => b.unit,
            BinaryOp::Divide if b.ty.is_plain_number() => a.unit,
            _ => None,
        };
        self.finite(Quantity { si, ty, limits: None, is_range: false, confidence: None, unit }, reading, span)
    }

    /// `1450 min-1`, a power written without its sign: says so, and whether it was that.
    fn is_written_power(&self, left: &Expr, right: &Expr, reading: Reading<'_>) -> bool {
        let (ExprKind::Quantity { unit: Some(unit), .. }, ExprKind::Quantity { number, unit: None }) =
            (&left.kind, &right.kind)
        else {
            return false;
        };
        let tight = right.span.start == left.span.end + 1 && number.text.len() == 1;
        if !tight {
            return false;
        }
        let power = format!("{}^-{}", unit.text, number.text);
        let Ok(meant) = layshaft_units::parse_unit(&power) else { return false };
        let place = self.place(reading.at, unit.span.cover(right.span));
        let message = format!("this reads as {} less {}", unit.text, number.text);
        let text = meant.text;
        self.report(Diagnostic::new(Code::KindMismatch, place, message).fix(
            format!("write `{text}`"),
            place,
            text,
        ));
        true
    }

    /// A hint where a plain factor beside a quantity looks like a conversion by hand.
    fn hint_factor(&self, expr: &Expr, other: &Quantity, reading: Reading<'_>) {
        let ExprKind::Quantity { number, unit: None } = &expr.kind else { return };
        let Some((_, meaning)) = TYPED_FACTORS.iter().find(|(factor, _)| *factor == number.value) else {
            return;
        };
        if other.ty.is_plain_number() {
            return;
        }
        let place = self.place(reading.at, expr.span);
        let message = format!("{} looks like the factor {meaning}", number.text);
        let found = Diagnostic::new(Code::TypedFactor, place, message);
        let gravity = meaning.starts_with("standard gravity");
        self.report(if gravity {
            found.help("write it with its unit, `9.80665 m/s²`, or as `standard_gravity`")
        } else {
            found.help(
                "units are converted for you: write the quantities with their units and leave the factor out",
            )
        });
    }

    /// Refuses what is no number.
    pub fn finite(&self, found: Quantity, reading: Reading<'_>, span: Span) -> Option<Quantity> {
        if found.si.is_finite() {
            return Some(found);
        }
        let place = self.place(reading.at, span);
        let message = "this has no finite value: something is divided by zero, or too large to be meant";
        self.report(Diagnostic::new(Code::WrongValue, place, message));
        None
    }

    fn raise(&self, expr: &Expr, base: &Expr, exponent: &Expr, reading: Reading<'_>) -> Option<Quantity> {
        let a = self.quantity(base, reading.wanting(None))?;
        let e = self.quantity(exponent, reading.wanting(None))?;
        let constant = is_constant_exponent(exponent).then_some(e.si);
        let ty = self.allowed(layshaft_units::raise(&a.ty, &e.ty, constant), reading, expr.span)?;
        if !(a.is_known() && e.is_known()) {
            return Some(Quantity::unknown(ty));
        }
        let si = libm::pow(a.si, e.si);
        self.finite(
            Quantity { si, ty, limits: None, is_range: false, confidence: None, unit: None },
            reading,
            expr.span,
        )
    }

    fn call(
        &self,
        expr: &Expr,
        name: &layshaft_syntax::Name,
        args: &[Expr],
        reading: Reading<'_>,
    ) -> Option<Datum> {
        let Some(function) = Function::from_name(&name.text) else {
            let place = self.place(reading.at, name.span);
            let message = format!("there is no function `{}`", name.text);
            let mut found = Diagnostic::new(Code::UnknownName, place, message);
            let names = || Function::all().map(Function::name);
            if let Some(close) = layshaft_units::closest(&name.text, names()) {
                found = found.fix(format!("write `{close}`"), place, close);
            } else {
                let all: Vec<_> = names().collect();
                found = found.help(format!("functions: {}", all.join(", ")));
            }
            self.report(found);
            return None;
        };
        let (least, most) = function.arity();
        if !(least..=most).contains(&args.len()) {
            let takes = if least == most { values(least) } else { format!("{least} or more values") };
            let message = format!("`{}` takes {takes}, and {} given", name.text, count(args.len()));
            self.report(Diagnostic::new(Code::Syntax, self.place(reading.at, expr.span), message));
            return None;
        }
        let same = matches!(function, Function::Min | Function::Max | Function::Abs);
        let inner = if same { reading } else { reading.wanting(None) };
        let found: Vec<_> = args.iter().map(|arg| self.quantity(arg, inner)).collect();
        let found: Vec<Quantity> = found.into_iter().collect::<Option<_>>()?;
        let types: Vec<_> = found.iter().map(|value| value.ty).collect();
        let ty = self.allowed(layshaft_units::apply(function, &types), reading, expr.span)?;
        if !found.iter().all(Quantity::is_known) {
            return Some(Datum::Quantity(Quantity::unknown(ty)));
        }
        let numbers: Vec<_> = found.iter().map(|value| value.si).collect();
        let Some(si) = function.evaluate(&numbers) else {
            let message = format!("`{}` has no value here", name.text);
            self.report(Diagnostic::new(Code::WrongValue, self.place(reading.at, expr.span), message));
            return None;
        };
        let unit = if same { found.into_iter().find_map(|value| value.unit) } else { None };
        let found = Quantity { si, ty, limits: None, is_range: false, confidence: None, unit };
        self.finite(found, reading, expr.span).map(Datum::Quantity)
    }

    fn choose(&self, condition: &Expr, then: &Expr, otherwise: &Expr, reading: Reading<'_>) -> Option<Datum> {
        let holds = self.flag(condition, reading);
        let (a, b) = (self.datum(then, reading), self.datum(otherwise, reading));
        let (holds, a, b) = (holds?, a?, b?);
        if let (Datum::Quantity(x), Datum::Quantity(y)) = (&a, &b) {
            let span = then.span.cover(otherwise.span);
            let ty = self.allowed(layshaft_units::unify(&x.ty, &y.ty), reading, span)?;
            let taken = if holds { x } else { y };
            return Some(Datum::Quantity(Quantity { ty, ..taken.clone() }));
        }
        if std::mem::discriminant(&a) != std::mem::discriminant(&b) {
            let place = self.place(reading.at, then.span.cover(otherwise.span));
            let message = format!("the two branches differ: {} and {}", what(&a), what(&b));
            self.report(Diagnostic::new(Code::KindMismatch, place, message));
            return None;
        }
        Some(if holds { a } else { b })
    }
}

/// A number as it stands, a minus or brackets round it.
pub(crate) fn is_literal(expr: &Expr) -> bool {
    match &expr.kind {
        ExprKind::Quantity { .. } => true,
        ExprKind::Paren(inner) | ExprKind::Unary { op: UnaryOp::Minus, arg: inner } => is_literal(inner),
        ExprKind::Tolerance { value, .. } | ExprKind::Within { value, .. } => is_literal(value),
        _ => false,
    }
}

/// `a and b`, `a or b` where one side may be unknown and the other decides.
fn both(left: Option<bool>, right: Option<bool>, deciding: bool) -> Option<Datum> {
    match (left, right) {
        (Some(a), Some(b)) => Some(Datum::Flag(if deciding { a || b } else { a && b })),
        (Some(a), None) | (None, Some(a)) if a == deciding => Some(Datum::Flag(deciding)),
        _ => None,
    }
}

/// Whether an exponent is made of numbers alone, so that the kind of the power can be known.
fn is_constant_exponent(expr: &Expr) -> bool {
    match &expr.kind {
        ExprKind::Quantity { .. } => true,
        ExprKind::Paren(inner) | ExprKind::Unary { op: UnaryOp::Minus, arg: inner } => {
            is_constant_exponent(inner)
        }
        ExprKind::Binary { left, right, .. } => is_constant_exponent(left) && is_constant_exponent(right),
        _ => false,
    }
}

/// "a text", "yes or no" and so on.
pub(crate) fn what(datum: &Datum) -> String {
    match datum {
        Datum::Quantity(quantity) => quantity.ty.describe(),
        Datum::Flag(_) => "yes or no".to_owned(),
        Datum::Word(word) => format!("the word `{word}`"),
        Datum::Text(_) => "a text".to_owned(),
    }
}

fn values(number: usize) -> String {
    if number == 1 { "one value".to_owned() } else { format!("{number} values") }
}

fn count(number: usize) -> String {
    match number {
        0 => "none is".to_owned(),
        1 => "one is".to_owned(),
        more => format!("{more} are"),
    }
}
