//! Comparisons: of quantities, of words, of flags.

use layshaft_diagnostics::{Code, Diagnostic, Span};
use layshaft_syntax::{CompareOp, Expr, ExprKind};

use super::expr::{is_literal, what};
use super::{Eval, Reading};
use crate::quantity::{Datum, Quantity};
use crate::world::ItemRef;

/// Two sides that were compared, by their place.
pub(crate) struct Compared {
    at: ItemRef,
    spans: (Span, Span),
    pub sides: (Quantity, Quantity),
}

impl Compared {
    /// Whether these are the sides meant.
    pub fn is(&self, at: ItemRef, left: &Expr, right: &Expr) -> bool {
        self.at == at && self.spans == (left.span, right.span)
    }
}

impl Eval<'_> {
    /// From now on the sides of every comparison are kept.
    pub fn watch_comparisons(&self) {
        *self.compared.borrow_mut() = Some(Vec::new());
    }

    /// The sides compared since.
    pub fn watched_comparisons(&self) -> Vec<Compared> {
        self.compared.borrow_mut().take().unwrap_or_default()
    }

    pub(super) fn compare(
        &self,
        first: &Expr,
        rest: &[(CompareOp, Span, Expr)],
        reading: Reading<'_>,
    ) -> Option<bool> {
        let mut left = first;
        let mut holds = Some(true);
        for (op, _, right) in rest {
            let one = self.one_comparison(left, *op, right, reading.wanting(None));
            holds = holds.zip(one).map(|(a, b)| a && b);
            left = right;
        }
        holds
    }

    fn one_comparison(&self, left: &Expr, op: CompareOp, right: &Expr, reading: Reading<'_>) -> Option<bool> {
        if let Some(equal) = compare_words(self, left, right, reading)? {
            return self.equality(op, equal, left.span.cover(right.span), reading);
        }
        let (a, b) = self.operands(left, right, reading)?;
        if let Some(compared) = &mut *self.compared.borrow_mut() {
            let spans = (left.span, right.span);
            compared.push(Compared { at: reading.at, spans, sides: (a.clone(), b.clone()) });
        }
        if !(a.is_known() && b.is_known()) {
            return None;
        }
        Some(match op {
            CompareOp::Less => a.si < b.si,
            CompareOp::LessEqual => a.si <= b.si,
            CompareOp::Greater => a.si > b.si,
            CompareOp::GreaterEqual => a.si >= b.si,
            CompareOp::Equal | CompareOp::NotEqual => {
                if !(a.ty.is_plain_number() && b.ty.is_plain_number()) {
                    let place = self.place(reading.at, left.span.cover(right.span));
                    let message = "two measured quantities are never exactly equal";
                    self.report(
                        Diagnostic::new(Code::WrongValue, place, message)
                            .help("say a band: `a - t <= b <= a + t`"),
                    );
                    return None;
                }
                (a.si == b.si) == (op == CompareOp::Equal)
            }
        })
    }

    /// Both sides of a comparison, their kinds agreeing.
    pub fn operands(&self, left: &Expr, right: &Expr, reading: Reading<'_>) -> Option<(Quantity, Quantity)> {
        let (a, b) = self.pair(left, right, reading)?;
        let span = left.span.cover(right.span);
        match layshaft_units::compare(&a.ty, &b.ty) {
            Ok(_) => Some((a, b)),
            Err(refusal) => {
                let (literal, found, other) =
                    if is_literal(right) { (right, &a, &b) } else { (left, &b, &a) };
                let place = self.place(reading.at, if is_literal(literal) { literal.span } else { span });
                self.report(self.refused(found, other, &refusal, literal, place));
                None
            }
        }
    }

    fn equality(&self, op: CompareOp, equal: bool, span: Span, reading: Reading<'_>) -> Option<bool> {
        match op {
            CompareOp::Equal => Some(equal),
            CompareOp::NotEqual => Some(!equal),
            _ => {
                let message = "words and flags are equal or not; they have no order";
                self.report(Diagnostic::new(Code::KindMismatch, self.place(reading.at, span), message));
                None
            }
        }
    }
}

/// Whether two words or flags are equal; `Some(None)` where the sides are quantities, `None` where one is unknown.
///
/// A bare name beside a word is that word: `lift.mode == braking`.
pub(crate) fn compare_words(
    eval: &Eval<'_>,
    left: &Expr,
    right: &Expr,
    reading: Reading<'_>,
) -> Option<Option<bool>> {
    let bare = |expr: &Expr| match &expr.kind {
        ExprKind::Path(path) if path.names.len() == 1 => {
            let name = path.names[0].text.clone();
            let free = eval.shared.world.find(reading.at.file, &name).is_none();
            (free && !super::path::is_constant(&name)).then_some(name)
        }
        _ => None,
    };
    let may_be_word = |expr: &Expr| matches!(&expr.kind, ExprKind::Path(_) | ExprKind::Flag(_));
    if !may_be_word(left) || !(may_be_word(right)) {
        return Some(None);
    }
    let side = |expr: &Expr| match bare(expr) {
        Some(word) => Some(Datum::Word(word)),
        None => eval.datum(expr, reading),
    };
    let (a, b) = (side(left), side(right));
    let (a, b) = (a?, b?);
    match (&a, &b) {
        (Datum::Quantity(_), Datum::Quantity(_)) => Some(None),
        (Datum::Word(_), Datum::Word(_)) | (Datum::Flag(_), Datum::Flag(_)) => Some(Some(a == b)),
        _ => {
            let place = eval.place(reading.at, left.span.cover(right.span));
            let message = format!("{} is compared with {}", what(&a), what(&b));
            eval.report(Diagnostic::new(Code::KindMismatch, place, message));
            None
        }
    }
}
