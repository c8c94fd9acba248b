//! What can stand at a place in a value.

use layshaft_diagnostics::Span;
use layshaft_syntax::{Token, TokenKind as K};

use super::place::{Asking, Flavor, Place, wants_operand};
use super::wanted::Wanted;
use crate::cursor::path_before;

/// Tokens that compare what stands beside them.
const fn compares(kind: K) -> bool {
    matches!(
        kind,
        K::Less | K::LessEqual | K::Greater | K::GreaterEqual | K::EqualEqual | K::NotEqual | K::Equal
    )
}

/// Finds out what can stand behind these tokens of a value.
pub(super) fn value<'a>(
    at: Asking<'_, '_, 'a>,
    tokens: &[Token],
    wanted: Wanted,
    flavor: Flavor,
) -> Option<Place<'a>> {
    if let Some(place) = head(at, tokens, &wanted) {
        return place;
    }
    if at.cursor.unit.is_none() && ends_in_number(at, tokens) {
        return None;
    }
    let wanted = narrowed(at, tokens, wanted, flavor);
    if let Some(typed) = at.cursor.unit {
        // The cursor keeps the number as the last token.
        return unit(tokens, wanted, typed, flavor);
    }
    let Some(last) = tokens.last() else {
        return Some(Place::Operand { wanted, flavor, first: true });
    };
    match last.kind {
        K::Dot => Some(Place::Member { names: path_before(at.cursor, tokens), wanted }),
        kind if wants_operand(kind) => {
            let first = kind == K::Each;
            Some(Place::Operand { wanted, flavor, first })
        }
        K::Points | K::Csv | K::From | K::Measured | K::Assumed | K::Confidence | K::Because => None,
        K::Drives => Some(Place::Operand { wanted, flavor, first: false }),
        _ => Some(Place::Words(following(tokens, &wanted, flavor))),
    }
}

/// Whether the cursor stands right behind the digits of a number.
fn ends_in_number(at: Asking<'_, '_, '_>, tokens: &[Token]) -> bool {
    tokens.last().is_some_and(|token| {
        matches!(token.kind, K::Number | K::SignedNumber) && token.span.end as usize == at.cursor.offset
    })
}

/// The head of a table: a column, or its unit; none where the place is in no head.
fn head<'a>(at: Asking<'_, '_, 'a>, tokens: &[Token], wanted: &Wanted) -> Option<Option<Place<'a>>> {
    let word = tokens.iter().rposition(|token| matches!(token.kind, K::Points | K::Csv))?;
    let behind = &tokens[word + 1..];
    let open = behind.iter().position(|token| token.kind == K::LeftParen)?;
    if behind.iter().any(|token| token.kind == K::RightParen) {
        return None;
    }
    let csv = tokens[word].kind == K::Csv;
    let inside = &behind[open..];
    Some(match inside.last().map(|token| token.kind) {
        Some(K::LeftParen | K::Comma | K::As) => Some(Place::Column(wanted.columns)),
        Some(K::LeftSquare) => {
            let name = inside.len().checked_sub(2).map_or("", |at_name| at.cursor.text_of(&inside[at_name]));
            let column = wanted.columns.iter().find(|column| column.name == name);
            let wanted = column.map_or_else(Wanted::default, |column| Wanted::of_kind(column.kind));
            Some(Place::Unit { wanted, typed: at.cursor.word, words: &[] })
        }
        Some(K::Name | K::String) if csv => Some(Place::Words(&["as"])),
        _ => None,
    })
}

fn unit<'a>(tokens: &[Token], wanted: Wanted, typed: Span, flavor: Flavor) -> Option<Place<'a>> {
    let before = tokens.len().checked_sub(2).and_then(|at| tokens.get(at)).map(|token| token.kind);
    let scaled = matches!(before, Some(K::Star | K::Slash | K::Caret));
    let words = following(tokens, &wanted, flavor);
    let wanted = if scaled { wanted.any_quantity() } else { wanted };
    Some(Place::Unit { wanted, typed, words })
}

/// What is wanted behind the last comparison, or beside the operand at hand.
fn narrowed(at: Asking<'_, '_, '_>, tokens: &[Token], wanted: Wanted, flavor: Flavor) -> Wanted {
    let asks = matches!(flavor, Flavor::Require | Flavor::Show | Flavor::Let);
    let own = tokens.iter().rposition(|token| matches!(token.kind, K::And | K::Or | K::Not | K::If));
    let tokens = &tokens[own.map_or(0, |at| at + 1)..];
    let compared = tokens.iter().rposition(|token| compares(token.kind));
    let (operand, mut wanted) = match compared {
        Some(index) if asks || own.is_some() => (&tokens[index + 1..], at.beside(&tokens[..index])),
        _ => (tokens, wanted),
    };
    if !wanted.columns.is_empty() {
        return of_point(tokens, wanted);
    }
    let in_call = operand.iter().any(|token| token.kind == K::LeftParen);
    let last = operand.last().map(|token| token.kind);
    if in_call || matches!(last, Some(K::Star | K::Slash | K::Caret)) {
        wanted = wanted.any_quantity();
    }
    if operand.iter().any(|token| matches!(token.kind, K::PlusMinus)) && !wanted.kinds.is_empty() {
        wanted.kinds.push("percentage");
    }
    wanted
}

/// What stands at a place of a point: behind `at` the speed, elsewhere what belongs to it. Behind a table its
/// conditions, of any kind.
fn of_point(tokens: &[Token], wanted: Wanted) -> Wanted {
    if tokens.iter().any(|token| matches!(token.kind, K::Points | K::Csv)) {
        return Wanted { columns: &[], ..wanted.any_quantity() };
    }
    let open = tokens.iter().rposition(|token| matches!(token.kind, K::LeftParen | K::PairParen));
    let point = &tokens[open.map_or(0, |at| at + 1)..];
    let border = point.iter().rposition(|token| matches!(token.kind, K::At | K::Comma));
    let speed = border.is_some_and(|at| point[at].kind == K::At);
    let fitting = wanted.columns.iter().filter(|column| (column.name == "speed") == speed);
    Wanted { kinds: fitting.map(|column| column.kind).collect(), ..wanted }
}

/// Words that may follow a finished operand.
fn following(tokens: &[Token], wanted: &Wanted, flavor: Flavor) -> &'static [&'static str] {
    use layshaft_mechanics::registry::Shape;
    let has = |kind: K| tokens.iter().any(|token| token.kind == kind);
    if has(K::If) && !has(K::Then) {
        return &["then", "and", "or"];
    }
    if has(K::Then) && !has(K::Else) {
        return &["else"];
    }
    if has(K::PlusMinus) && !has(K::Confidence) {
        return &["points", "of value", "confidence", "from", "measured", "assumed"];
    }
    let shape = wanted.field.map(|field| field.shape);
    match flavor {
        Flavor::Require => &["only in", "not in", "only where", "at", "probability", "and", "or", "within"],
        Flavor::Show => &["as", "only in", "not in", "only where", "at"],
        Flavor::Asked => &["only in", "not in", "only where", "at", "probability"],
        Flavor::Case | Flavor::Field { .. }
            if matches!(shape, Some(Shape::Ratio { .. })) && !has(K::Drives) =>
        {
            &["drives", "from", "measured", "assumed"]
        }
        Flavor::Case | Flavor::Field { .. } if matches!(shape, Some(Shape::Points(_))) => {
            &["at", "from", "measured", "assumed"]
        }
        Flavor::Let | Flavor::Case | Flavor::Field { .. } => {
            &["from", "measured", "assumed", "within", "confidence"]
        }
    }
}
