//! Slips with numbers and units.

use layshaft_diagnostics::{Code, Span};

use super::{Place, View};
use crate::token::TokenKind as K;
use crate::tree::Problem;

pub(super) fn rules(view: &View<'_, '_>) -> Option<Problem> {
    comma(view)
        .or_else(|| blank(view))
        .or_else(|| dot(view))
        .or_else(|| hexadecimal(view))
        .or_else(|| behind_number(view))
        .or_else(|| behind_unit(view))
        .or_else(|| bracketed_unit(view))
        .or_else(|| lone_unit(view))
}

fn bad_number(span: Span, message: &str) -> Problem {
    Problem::new(Code::BadNumber, span, message)
}

/// `0,02`, `1,000`, `1,000,000.5`
fn comma(view: &View<'_, '_>) -> Option<Problem> {
    let number_comma = |by| view.is_number(by - 1) && view.is(by, K::Comma) && view.is(by + 1, K::Number);
    let tight = |by| view.tight(by) && view.tight(by + 1);
    if !(number_comma(0) && tight(0)) {
        return None;
    }
    let mut last = 1;
    let mut thousands = is_group(view.text(1)) && plain_digits(view.text(-1)) <= 3;
    while number_comma(last + 1) && tight(last + 1) {
        last += 2;
        thousands &= is_group(view.text(last));
    }
    let span = view.spans(-1, last);
    let shown = view.ctx.shown(span);
    if last == 1 && !thousands {
        let point = shown.replace(',', ".");
        let problem = bad_number(span, "the decimal sign is a point");
        return Some(problem.fix(format!("write `{point}`"), span, point));
    }
    let whole = shown.replace(',', "");
    let mut problem = bad_number(span, "a number has no commas: a decimal sign or thousands?")
        .help("the decimal sign is a point, and thousands are not set apart")
        .fix(format!("write `{whole}`"), span, whole);
    if last == 1 && !view.text(1).contains('.') {
        let point = shown.replace(',', ".");
        problem = problem.fix(format!("write `{point}`"), span, point);
    }
    Some(problem)
}

/// Three digits, with decimals perhaps.
fn is_group(text: &str) -> bool {
    text.split('.').next().is_some_and(|whole| plain_digits(whole) == 3)
}

/// The number of digits of a text of digits and a sign; many otherwise.
fn plain_digits(text: &str) -> usize {
    let digits = text.trim_start_matches(['-', '−', '–']);
    if digits.bytes().all(|byte| byte.is_ascii_digit()) { digits.len() } else { usize::MAX }
}

/// `1 000`, `3 4`
fn blank(view: &View<'_, '_>) -> Option<Problem> {
    if !(view.is_number(-1) && view.is(0, K::Number)) {
        return None;
    }
    let span = view.spans(-1, 0);
    if plain_digits(view.text(-1)) <= 3 && is_group(view.text(0)) {
        let joined = format!("{}{}", view.text(-1), view.text(0));
        let problem = bad_number(span, "a number has no blanks between its digits");
        return Some(problem.fix(format!("write `{joined}`"), span, joined));
    }
    Some(
        bad_number(span, "two numbers stand side by side").help("an operator or `;` is missing between them"),
    )
}

/// `5.`, `.5`, `1.2.3`, `1 ... 2`
fn dot(view: &View<'_, '_>) -> Option<Problem> {
    if !view.is(0, K::Dot) {
        return None;
    }
    if view.is(-1, K::DotDot) && view.tight(0) {
        let span = view.spans(-1, 0);
        return Some(view.syntax(span, "a range is written `..`").fix("write `..`", span, ".."));
    }
    if view.is_number(-1) && view.tight(0) {
        if view.is(1, K::Number) && view.tight(1) {
            return Some(bad_number(view.spans(-1, 1), "a number has one decimal point"));
        }
        let whole = view.text(-1);
        let problem = bad_number(view.spans(-1, 0), "digits stand on both sides of a decimal point");
        let span = view.spans(-1, 0);
        let decimal = if whole.contains('.') { whole.to_owned() } else { format!("{whole}.0") };
        return Some(problem.fix(format!("write `{decimal}`"), span, decimal));
    }
    if view.is(1, K::Number) && view.tight(1) {
        let span = view.spans(0, 1);
        let decimal = format!("0.{}", view.text(1));
        let problem = bad_number(span, "digits stand on both sides of a decimal point");
        return Some(problem.fix(format!("write `{decimal}`"), span, decimal));
    }
    None
}

/// `0x1F`
fn hexadecimal(view: &View<'_, '_>) -> Option<Problem> {
    if !(view.is(-1, K::Number) && view.text(-1) == "0" && view.is(0, K::Name) && view.tight(0)) {
        return None;
    }
    let digits = view.text(0).strip_prefix(['x', 'X'])?;
    let value = u64::from_str_radix(digits, 16).ok()?;
    let span = view.spans(-1, 0);
    let problem = bad_number(span, "numbers are written in decimal");
    Some(problem.fix(format!("write `{value}`"), span, value.to_string()))
}

/// `5 m2`, `5 foo_bar`, `5 min(3, 4)`, `2.3 rated`
fn behind_number(view: &View<'_, '_>) -> Option<Problem> {
    if view.is_number(-1) && view.is(0, K::Rated) {
        let problem = view.syntax(view.span(0), "a multiple of the rated value is written with `×` or `*`");
        return Some(problem.fix("put `×` between", view.gap(0), " × "));
    }
    if !(view.is_number(-1) && view.is(0, K::Name)) || view.entry_begins(0) {
        return None;
    }
    let word = view.text(0);
    let letters = word.trim_end_matches(|c: char| c.is_ascii_digit());
    let power = match &word[letters.len()..] {
        "2" => Some("²"),
        "3" => Some("³"),
        _ => None,
    };
    if let Some(power) = power
        && letters.chars().all(char::is_alphabetic)
        && !view.is(1, K::LeftParen)
    {
        let unit = format!("{letters}{power}");
        let problem = view.syntax(view.span(0), format!("`{word}` is no unit: a power of a unit is raised"));
        let problem =
            problem.help(format!("`{unit}`, or `{letters}^{}` in plain signs", &word[letters.len()..]));
        return Some(problem.fix(format!("write `{unit}`"), view.span(0), unit));
    }
    let what = if view.is(1, K::LeftParen) { "a function" } else { "a name" };
    let problem =
        view.syntax(view.span(0), format!("{what} stands directly after a number, where only a unit can"));
    Some(problem.help("to multiply, write `*`").fix("put `*` between", view.gap(0), " * "))
}

/// `38 N m`, `3 m 4 cm`
fn behind_unit(view: &View<'_, '_>) -> Option<Problem> {
    if !(view.is(-1, K::Unit) && view.is_number(-2)) {
        return None;
    }
    if view.is(0, K::Number) {
        let problem = view.syntax(view.spans(-2, 0), "two quantities stand side by side");
        return Some(problem.help("an operator is missing between them").fix("add them", view.gap(0), " + "));
    }
    if view.text(-1) == "in" && matches!(view.place, Place::Condition | Place::Tail) && view.is(0, K::Name) {
        let problem = view.syntax(view.span(-1), "cases are named behind `only in` or `not in`");
        return Some(problem.help("`in` directly after a number is the inch").fix(
            "write `only in`",
            view.span(-1),
            "only in",
        ));
    }
    let letters = view.text(0).chars().all(|c| c.is_alphabetic() || c == '²' || c == '³');
    if !view.is(0, K::Name) || !letters || view.entry_begins(0) || is_word_of_the_line(view.text(0)) {
        return None;
    }
    let joined = format!("{}·{}", view.text(-1), view.text(0));
    let problem = view
        .syntax(view.spans(-1, 0), "a unit has no blanks")
        .help("inside a unit the signs stand tight: `N·m`, `kg/m³`");
    Some(problem.fix(format!("write `{} {joined}`", view.text(-2)), view.gap(0), "·"))
}

/// `[N m]`, `[m2]`, `speed rpm`: the unit of a column.
fn bracketed_unit(view: &View<'_, '_>) -> Option<Problem> {
    if view.wanted.kind(K::LeftSquare) && view.is(-1, K::Name) && view.is(0, K::Name) {
        let unit = format!("[{}]", view.text(0));
        let problem = view.syntax(view.span(0), "the unit of a column stands between `[` and `]`");
        return Some(problem.fix(format!("write `{unit}`"), view.span(0), unit));
    }
    if !view.wanted.kind(K::Unit) || !view.is(-1, K::LeftSquare) {
        return None;
    }
    if view.is(0, K::Name) && view.is(1, K::Name) && view.is(2, K::RightSquare) {
        let joined = format!("{}·{}", view.text(0), view.text(1));
        let problem = view.syntax(view.spans(0, 1), "a unit has no blanks");
        return Some(problem.fix(format!("write `{joined}`"), view.spans(0, 1), joined));
    }
    let problem = view.syntax(view.here(), "the unit of a column is missing or cannot be read");
    Some(problem.help("`[N·m]`, `[1/min]`; a column of plain numbers has no brackets"))
}

/// Words that readers of other notations put behind a value.
fn is_word_of_the_line(text: &str) -> bool {
    matches!(text, "in" | "relative" | "given" | "where" | "unless" | "when")
}

/// `%` or `°` without a number.
fn lone_unit(view: &View<'_, '_>) -> Option<Problem> {
    if !view.is(0, K::Unit) || view.is_number(-1) {
        return None;
    }
    let shown = view.text(0);
    let problem =
        view.syntax(view.span(0), format!("the unit `{shown}` stands where no number is before it"));
    Some(problem.help("a unit stands directly after a number"))
}
