//! Slips in expressions.

use super::{Place, View};
use crate::grammar::Sort;
use crate::token::TokenKind as K;
use crate::tree::Problem;

pub(super) fn rules(view: &View<'_, '_>) -> Option<Problem> {
    signed_power(view)
        .or_else(|| double_power(view))
        .or_else(|| second_tolerance(view))
        .or_else(|| comparison(view))
        .or_else(|| basis(view))
        .or_else(|| text(view))
        .or_else(|| brackets(view))
        .or_else(|| choice(view))
        .or_else(|| missing_operand(view))
        .or_else(|| foreign_word(view))
        .or_else(|| arrow(view))
}

fn is_power(view: &View<'_, '_>) -> bool {
    view.is(0, K::Caret) || view.is(0, K::Superscript)
}

/// How many tokens a power takes, its sign among them.
fn power_end(view: &View<'_, '_>) -> isize {
    isize::from(view.is(0, K::Caret))
}

/// `-2^2`
fn signed_power(view: &View<'_, '_>) -> Option<Problem> {
    let base = if view.is(-1, K::SignedNumber) {
        -1
    } else if view.is(-1, K::Unit) && view.is(-2, K::SignedNumber) {
        -2
    } else {
        return None;
    };
    if !is_power(view) {
        return None;
    }
    let number = view.ctx.shown(view.spans(base, -1));
    let positive = number.trim_start_matches(['-', '−', '–', '—']);
    let power = view.ctx.shown(view.spans(0, power_end(view)));
    let span = view.spans(base, power_end(view));
    let (inside, outside) = (format!("(-{positive}){power}"), format!("-({positive}{power})"));
    let problem = view.syntax(span, "the power of a number with a sign can be read in two ways");
    let problem = problem.help(format!("`{inside}` or `{outside}`"));
    let problem = problem.fix(format!("write `{inside}`"), span, inside);
    Some(problem.fix(format!("write `{outside}`"), span, outside))
}

/// `2^3^2`
fn double_power(view: &View<'_, '_>) -> Option<Problem> {
    let first = if view.is(-1, K::Superscript) {
        -1
    } else if view.is(-2, K::Caret) {
        -2
    } else {
        return None;
    };
    if !is_power(view) {
        return None;
    }
    let span = view.spans(first, power_end(view));
    let problem = view.syntax(span, "a power of a power needs brackets");
    if !matches!(view.kind(first - 1), Some(K::Number | K::Name))
        || !view.is(-2, K::Caret)
        || !view.is(0, K::Caret)
    {
        return Some(problem);
    }
    let whole = view.spans(first - 1, 1);
    let (base, middle, last) = (view.text(-3), view.text(-1), view.text(1));
    let (left, right) = (format!("({base}^{middle})^{last}"), format!("{base}^({middle}^{last})"));
    let problem = problem.help(format!("`{left}` or `{right}`"));
    let problem = problem.fix(format!("write `{left}`"), whole, left);
    Some(problem.fix(format!("write `{right}`"), whole, right))
}

/// `a ± b ± c`
fn second_tolerance(view: &View<'_, '_>) -> Option<Problem> {
    let tolerance = |kind| matches!(kind, K::PlusMinus | K::Within);
    if !view.kind(0).is_some_and(tolerance) || !view.before().iter().any(|token| tolerance(token.kind)) {
        return None;
    }
    let problem = view.syntax(view.span(0), "a value has one tolerance");
    Some(problem.help("`±` binds tighter than any operator: a sum with a tolerance stands in brackets"))
}

/// `a < b < c < d`, `a < b > c`, `=>`
fn comparison(view: &View<'_, '_>) -> Option<Problem> {
    let compares = |kind: K| {
        matches!(kind, K::Less | K::LessEqual | K::Greater | K::GreaterEqual | K::EqualEqual | K::NotEqual)
    };
    let reversed =
        view.is(0, K::Equal) && view.tight(1) && matches!(view.kind(1), Some(K::Greater | K::Less));
    if reversed && view.place != Place::Drive {
        let right = if view.is(1, K::Greater) { ">=" } else { "<=" };
        let span = view.spans(0, 1);
        let problem = view.syntax(span, format!("`={}` is written `{right}`", view.text(1)));
        return Some(problem.fix(format!("write `{right}`"), span, right));
    }
    let kind = view.kind(0)?;
    if !compares(kind) && kind != K::Equal {
        return None;
    }
    let earlier: Vec<K> = view.before().iter().map(|t| t.kind).filter(|&kind| compares(kind)).collect();
    let problem = match earlier.len() {
        0 if kind == K::Equal && matches!(view.place, Place::Let | Place::Entry) => {
            let problem = view.syntax(view.span(0), "a definition has one `=`");
            return Some(problem.help("to compare, write `==`"));
        }
        0 => return None,
        1 => view.syntax(view.span(0), "the two comparisons point different ways"),
        _ => view.syntax(view.span(0), "a comparison has at most two sides: `low <= x <= high`"),
    };
    Some(problem.help("join several comparisons by `and`"))
}

fn is_basis(kind: K) -> bool {
    matches!(kind, K::From | K::Measured | K::Assumed)
}

/// `from` twice, inside an expression, or without its text.
fn basis(view: &View<'_, '_>) -> Option<Problem> {
    if view.kind(-1).is_some_and(is_basis) && view.wanted.kind(K::String) {
        let word = view.text(-1);
        let problem = view.syntax(view.here(), format!("a text in quotes is missing behind `{word}`"));
        return Some(problem.help(format!("`{word} \"…\"` says where the value comes from")));
    }
    let kind = view.kind(0)?;
    if view.is(-1, K::String) && view.kind(-2).is_some_and(is_basis) && kind.is_operator() {
        return Some(view.syntax(view.span(0), "where a value comes from is said at its end"));
    }
    if !is_basis(kind) {
        return None;
    }
    if view.before().iter().any(|token| is_basis(token.kind)) {
        return Some(view.syntax(view.span(0), "a value says once where it comes from"));
    }
    let depth = view.before().iter().fold(0_i32, |depth, token| match token.kind {
        K::LeftParen | K::PairParen | K::LeftSquare => depth + 1,
        K::RightParen | K::RightSquare => depth - 1,
        _ => depth,
    });
    if depth > 0 {
        let message =
            "where a value comes from is said behind the whole definition, not inside an expression";
        return Some(view.syntax(view.span(0), message).help("name the part with a `let` of its own"));
    }
    let value = matches!(view.place, Place::Let | Place::Entry);
    if value && !matches!(view.kind(-1), None | Some(K::Equal)) && !view.wanted.sort(Sort::Operand) {
        return Some(view.syntax(view.span(0), "where a value comes from is said at its end"));
    }
    (!value).then(|| view.syntax(view.span(0), "only a definition says where its value comes from"))
}

/// `5 "x"`
fn text(view: &View<'_, '_>) -> Option<Problem> {
    let complete = !view.wanted.sort(Sort::Operand) && view.wanted.sort(Sort::Operator);
    if !view.is(0, K::String) || !complete || !matches!(view.place, Place::Let | Place::Entry) {
        return None;
    }
    let mut problem = view.syntax(view.span(0), "a text behind a value needs a word that says what it is");
    for word in ["from", "measured", "assumed"] {
        let title = format!("write `{word} {}`", super::clipped(view.text(0)));
        let place = layshaft_diagnostics::Span::new(view.span(0).start, view.span(0).start);
        problem = problem.fix(title, place, format!("{word} "));
    }
    Some(problem)
}

/// Groups and lists where an expression stands.
fn brackets(view: &View<'_, '_>) -> Option<Problem> {
    match view.kind(0)? {
        K::PairParen => {
            let message = "a group of quantities stands alone as a value, not inside an expression";
            Some(view.syntax(view.span(0), message))
        }
        kind if kind.is_operator() && view.is(-1, K::RightParen) && view.group_stands_first() => {
            let message = "a group of quantities stands alone as a value, not inside an expression";
            Some(view.syntax(view.span(0), message))
        }
        K::LeftSquare if view.wanted.sort(Sort::Operand) => {
            let problem = view.syntax(view.span(0), "a list of values stands without brackets");
            Some(problem.help("`each 360 V, 400 V` in a case, or pairs: `(1.2 N·m at 2850 rpm), (…)`"))
        }
        K::LeftSquare if view.wanted.sort(Sort::Operator) => {
            let message = "brackets `[ ]` hold the unit of a column or the members of a case";
            Some(view.syntax(view.span(0), message))
        }
        _ => None,
    }
}

/// `if` without `then` or `else`.
fn choice(view: &View<'_, '_>) -> Option<Problem> {
    let word = match (view.wanted.kind(K::Then), view.wanted.kind(K::Else)) {
        (true, _) => "then",
        (_, true) => "else",
        _ => return None,
    };
    let problem = view.syntax(view.here(), format!("`{word}` is missing"));
    Some(problem.help("a choice is written `if condition then value else value`"))
}

/// Nothing behind an operator.
fn missing_operand(view: &View<'_, '_>) -> Option<Problem> {
    if !view.wanted.sort(Sort::Operand) {
        return None;
    }
    let before = view.kind(-1)?;
    let word = view.text(-1);
    if before == K::Star && view.is(0, K::Star) && view.tight(0) {
        let span = view.spans(-1, 0);
        let problem = view.syntax(span, "a power is written `^`");
        return Some(problem.fix("write `^`", span, "^"));
    }
    if !view.ended() && view.kind(0).is_some_and(|kind| !kind.is_operator() && kind != K::RightParen) {
        return None;
    }
    if before == K::Equal && view.ended() {
        return Some(view.syntax(view.here(), "a value is missing after `=`"));
    }
    let joins = before.leaves_line_open() || before.is_reserved() || before == K::LeftParen;
    joins.then(|| view.syntax(view.here(), format!("a value is missing after `{word}`")))
}

/// Words of other notations.
fn foreign_word(view: &View<'_, '_>) -> Option<Problem> {
    if !view.is(0, K::Name) {
        return None;
    }
    let shows = view.ctx.tokens.first().is_some_and(|token| token.kind == K::Show);
    let (message, write) = match (view.text(0), view.place) {
        ("in", _) if view.is(-1, K::Only) => return None,
        ("in", Place::Condition | Place::Tail) if shows => ("a unit to show in stands behind `as`", "as"),
        ("in", Place::Condition | Place::Tail) => ("cases are named behind `only in` or `not in`", "only in"),
        ("relative", _) => ("a tolerance relative to a percentage is `of value`", "of value"),
        ("given", _) => ("where a value comes from stands behind `from`", "from"),
        ("where" | "when", Place::Condition | Place::Tail) => {
            ("a field is asked for by `only where`", "only where")
        }
        _ => return None,
    };
    let problem = view.syntax(view.span(0), message);
    Some(problem.fix(format!("write `{write}`"), view.span(0), write))
}

/// `->` outside a drive.
fn arrow(view: &View<'_, '_>) -> Option<Problem> {
    if !view.is(0, K::Arrow) || view.place == Place::Drive {
        return None;
    }
    let problem = view.syntax(view.span(0), "`->` joins the parts of a drive and nothing else");
    Some(problem.help("`drive name = source -> transmission -> load`"))
}
