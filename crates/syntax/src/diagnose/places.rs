//! Slips that belong to one place of the grammar.

use layshaft_diagnostics::{Code, Span};

use super::{Place, View};
use crate::grammar::Sort;
use crate::token::TokenKind as K;
use crate::tree::Problem;
use crate::words::{DECLARATION_WORDS, word_kind};

pub(super) fn rules(view: &View<'_, '_>) -> Option<Problem> {
    let own = match view.place {
        Place::Item => item(view),
        Place::Part => part(view),
        Place::Drive => drive(view),
        Place::Case => case(view),
        Place::Row => row(view),
        Place::Entry => entry(view),
        Place::Name => settled(view),
        Place::Condition | Place::Tail => tail(view),
        Place::Rest | Place::Let => None,
    };
    own.or_else(|| declaration(view)).or_else(|| side_by_side(view))
}

/// A word that was read as a unit because it follows a number, and begins something new: `{ a = 1 b = 2 }`,
/// `let a = 5 let b = 6`.
pub(super) fn run_together(view: &View<'_, '_>) -> Option<Problem> {
    if !(view.is(-1, K::Unit) && view.is_number(-2)) {
        return None;
    }
    if view.is(0, K::Equal) && view.place == Place::Entry {
        let problem = view.syntax(view.span(-1), "a `;` or a new line is missing before the next entry");
        return Some(problem.fix("write `;`", view.gap(-1), "; "));
    }
    if word_kind(view.text(-1)).is_some_and(K::is_declaration)
        && matches!(view.kind(0), Some(K::Name | K::String | K::Number))
    {
        let problem = view.syntax(view.span(-1), "a declaration begins on a line of its own");
        return Some(problem.fix("begin a new line", view.gap(-1), "\n"));
    }
    None
}

fn before(span: Span) -> Span {
    Span::new(span.start, span.start)
}

/// A line at the top that begins with no declaring word, or a short declaration that is not complete.
fn item(view: &View<'_, '_>) -> Option<Problem> {
    let first = view.ctx.tokens.first()?;
    if first.kind.is_declaration() {
        return short_declaration(view);
    }
    let span = first.span;
    let shown = view.ctx.shown(span);
    let at = |index: usize| view.ctx.tokens.get(index).map(|token| token.kind);
    if first.kind == K::Name && matches!(word_kind(shown), Some(kind) if kind.is_declaration()) {
        let problem = view.syntax(span, format!("`{shown}` is not complete"));
        return Some(problem.help(example(shown)));
    }
    if first.kind == K::Name && at(1) == Some(K::Equal) {
        let problem = view.syntax(span, format!("`{shown} = …` stands in no block"));
        return Some(problem.help("a named value is declared by `let`").fix(
            "write `let`",
            before(span),
            "let ",
        ));
    }
    if first.kind == K::Name && at(1) == Some(K::Colon) {
        let problem = view.syntax(span, "a part begins with what it is");
        return Some(problem.help("`supply`, `source`, `transmission` or `load`"));
    }
    let words: Vec<String> = DECLARATION_WORDS.iter().take(14).map(|row| format!("`{}`", row.word)).collect();
    let problem = view.syntax(span, format!("a declaration does not begin with `{}`", super::clipped(shown)));
    Some(problem.help(format!("it begins with one of {}", words.join(", "))))
}

/// How each declaration is written.
fn example(word: &str) -> String {
    let example = match word {
        "language" => "language 1",
        "title" => "title \"Mill hoist\"",
        "revision" => "revision \"B\"",
        "use" => "use \"parts/motors.shaft\" as parts",
        "let" => "let rated_load = 1250 kg from \"order\"",
        "supply" => "supply pack: battery { … }",
        "source" => "source motor: dc_motor { … }",
        "transmission" => "transmission reducer: gear { … }",
        "load" => "load hook: hoist { … }",
        "drive" => "drive lift = motor -> reducer -> hook { … }",
        "case" => "case hill { road.grade = 6 % }",
        "require" => "require \"H-1 speed\" lift.hook.speed >= 14 m/min",
        "show" => "show lift.motor.current as A",
        "allow" => "allow part-limit because \"short duty\"",
        _ => return format!("`{word}` belongs to a later version of the language"),
    };
    format!("such as `{example}`")
}

fn short_declaration(view: &View<'_, '_>) -> Option<Problem> {
    let first = view.ctx.tokens.first()?;
    let word = view.ctx.shown(first.span);
    if view.wanted.kind(K::String) {
        let what = if first.kind == K::Require { "its clause in quotes" } else { "a text in quotes" };
        let behind = if view.at == 1 { word } else { view.text(-1) };
        let problem =
            view.syntax(view.here(), format!("{what} is missing behind `{}`", super::clipped(behind)));
        return Some(problem.help(example(word)));
    }
    if let Some(problem) = allowed(view) {
        return Some(problem);
    }
    let ended = view.ended() || view.at >= view.ctx.tokens.len();
    let problem = view.syntax(view.here(), format!("{} is not complete here", first.kind.describe()));
    ended.then(|| problem.help(example(word)))
}

/// `allow` on a line of its own or in a block.
fn allowed(view: &View<'_, '_>) -> Option<Problem> {
    if view.ctx.tokens.get(view.start)?.kind != K::Allow {
        return None;
    }
    if view.wanted.kind(K::Because) && view.is(0, K::Name) {
        let problem = view.syntax(view.spans(-1, 0), "the words of a code are joined by `-`");
        return Some(problem.fix("write `-`", view.gap(0), "-"));
    }
    let missing = match (view.wanted.kind(K::Because), view.wanted.kind(K::String)) {
        (true, _) => "`because` and the reason are missing here",
        (_, true) => "the reason is missing behind `because`",
        _ => return None,
    };
    view.ended().then(|| view.syntax(view.here(), missing).help(example("allow")))
}

/// `=` where a colon or nothing stands.
fn equal(view: &View<'_, '_>, message: &str) -> Option<Problem> {
    if !view.wanted.kind(K::Equal) {
        return None;
    }
    if view.is(0, K::Colon) || view.is(0, K::EqualEqual) {
        let colon = view.is(0, K::Colon) && view.is(1, K::Equal) && view.tight(1);
        let span = if colon { view.spans(0, 1) } else { view.span(0) };
        let text = if view.tight(0) { " =" } else { "=" };
        return Some(view.syntax(span, message).fix("write `=`", span, text));
    }
    // `x 5` and `x 5 m`: the number was taken as the member of a key such as `gear 1`.
    if view.is_number(-1) && view.is(-2, K::Name) && (view.ended() || view.is(0, K::Unit)) {
        return Some(view.syntax(view.span(-1), "`=` is missing here").fix("write `=`", view.gap(-1), " = "));
    }
    let problem = view.syntax(view.here(), "`=` and a value are missing here");
    if view.ended() {
        return Some(problem);
    }
    let value =
        matches!(view.kind(0), Some(K::Number | K::SignedNumber | K::String | K::LeftParen | K::Each));
    value.then(|| view.syntax(view.here(), "`=` is missing here").fix("write `=`", view.gap(0), " = "))
}

/// The head of a `let`.
fn settled(view: &View<'_, '_>) -> Option<Problem> {
    if view.is(-1, K::Colon) && view.is(0, K::Equal) {
        let span = view.spans(-1, 0);
        if view.tight(0) {
            let problem = view.syntax(span, "a `let` is set by `=`");
            return Some(problem.fix("write `=`", span, if view.tight(-1) { " =" } else { "=" }));
        }
        return Some(
            view.syntax(view.end(), "the kind is missing behind `:`").help("such as `let x: torque = 5 N·m`"),
        );
    }
    equal(view, "a `let` is set by `=`")
}

fn part(view: &View<'_, '_>) -> Option<Problem> {
    let role = view.ctx.tokens.first().map_or("source", |token| view.ctx.shown(token.span));
    if view.wanted.kind(K::With) {
        let problem =
            view.syntax(view.here(), "a variant names what it is made of and then `with` its changes");
        let problem = problem.help(format!("`{role} name = base with {{ … }}`"));
        let text = if view.is(0, K::LeftBrace) { " with" } else { " with { }" };
        return Some(problem.fix("write `with`", view.end(), text));
    }
    if view.wanted.kind(K::Colon) {
        if view.is(0, K::Name) {
            let problem = view.syntax(view.here(), "a colon is missing between name and kind");
            return Some(problem.fix("write `:`", view.end(), ":"));
        }
        let problem = view.syntax(view.here(), "the kind is missing");
        return Some(problem.help(example(role)));
    }
    if view.is(-1, K::Equal) {
        let problem = view.syntax(view.here(), "what the variant is made of is missing behind `=`");
        return Some(problem.help(format!("`{role} name = base with {{ … }}`")));
    }
    if view.is(-1, K::Colon) {
        let problem = view.syntax(view.here(), "the kind is missing behind `:`");
        return Some(problem.help(example(role)));
    }
    None
}

fn drive(view: &View<'_, '_>) -> Option<Problem> {
    if view.wanted.kind(K::Star) && view.is(-1, K::Number) {
        let count = view.text(-1);
        let what = view.text(0);
        let problem = view.syntax(view.spans(-1, 0), "a number of equal parts is written with `*`");
        let problem = problem.help(format!("`{count} {what}` is a quantity with a unit"));
        return Some(problem.fix(format!("write `{count} * {what}`"), view.gap(0), " * "));
    }
    if view.is(0, K::Number) && view.wanted.sort(Sort::Name) {
        let problem = view.syntax(view.span(0), "a number of equal parts is a whole number from 1 on");
        return Some(problem.help("`2 * motor`"));
    }
    if view.wanted.kind(K::Equal) && view.ended() {
        let problem = view.syntax(view.here(), "`=` and the chain of the drive are missing here");
        return Some(problem.help(example("drive")));
    }
    if view.wanted.kind(K::Equal) {
        return equal(view, "the chain of a drive stands behind `=`");
    }
    if view.is(0, K::Equal) && view.is(1, K::Greater) && view.tight(1) {
        let span = view.spans(0, 1);
        return Some(view.syntax(span, "parts are joined by `->`").fix("write `->`", span, "->"));
    }
    if view.wanted.sort(Sort::Name) {
        let behind = view.text(-1);
        if matches!(view.kind(-1), Some(K::Arrow | K::Plus | K::Equal | K::Star | K::LeftParen)) {
            return Some(view.syntax(view.here(), format!("a part is missing behind `{behind}`")));
        }
    }
    if view.is(0, K::Name) && matches!(view.kind(-1), Some(K::Name | K::RightParen)) {
        let problem = view.syntax(view.here(), format!("`->` or `+` is missing before {}", view.found()));
        return Some(problem.fix("write `->`", view.gap(0), " -> "));
    }
    if view.is(0, K::Minus) || view.is(0, K::Greater) {
        return Some(view.syntax(view.span(0), "parts are joined by `->`").fix(
            "write `->`",
            view.span(0),
            "->",
        ));
    }
    None
}

fn case(view: &View<'_, '_>) -> Option<Problem> {
    if view.wanted.kind(K::With) {
        let problem = view.syntax(view.here(), "what a composed case changes stands behind `with`");
        let fixed = problem.clone().fix("write `with`", view.end(), " with");
        return Some(if view.is(0, K::LeftBrace) { fixed } else { problem.help(example("case")) });
    }
    if view.is(-1, K::Plus) || view.is(-1, K::Equal) {
        return Some(view.syntax(view.here(), format!("a case is missing behind `{}`", view.text(-1))));
    }
    if view.wanted.kind(K::LeftBrace) {
        let problem = view.syntax(view.here(), "a case names what it changes between `{` and `}`");
        return Some(problem.help(example("case")));
    }
    None
}

fn row(view: &View<'_, '_>) -> Option<Problem> {
    let (message, help) = match view.kind(0)? {
        K::Unit => ("a row holds numbers only", "their units stand in the head: `speed [rpm]`"),
        K::Comma => ("the cells of a row are parted by blanks", "the decimal sign is a point"),
        K::Minus | K::Plus => ("a row holds numbers, not sums", "a minus stands tight before its number"),
        _ => ("a row holds numbers only", "a cell that is not known leaves its row out"),
    };
    Some(view.syntax(view.span(0), message).help(help))
}

fn entry(view: &View<'_, '_>) -> Option<Problem> {
    if let Some(problem) = allowed(view) {
        return Some(problem);
    }
    if view.at == view.start {
        let problem =
            view.syntax(view.here(), format!("a line of a block does not begin with {}", view.found()));
        return Some(problem.help("it is `field = value`"));
    }
    if let Some(problem) = equal(view, "a field is set by `=`") {
        return Some(problem);
    }
    if view.is(0, K::Comma) && view.entry_begins(1) {
        let problem = view.syntax(view.span(0), "the entries of a block are parted by `;` or a new line");
        return Some(problem.fix("write `;`", view.span(0), ";"));
    }
    if view.is(0, K::Comma) {
        let problem = view.syntax(view.span(0), "a value ends before a comma");
        return Some(
            problem.help(
                "entries are parted by `;`; several cases are `each a, b`; the decimal sign is a point",
            ),
        );
    }
    if view.entry_begins(0) {
        let problem = view.syntax(view.here(), "a `;` or a new line is missing before the next entry");
        return Some(problem.fix("write `;`", view.end(), ";"));
    }
    None
}

fn tail(view: &View<'_, '_>) -> Option<Problem> {
    if view.is(-1, K::Only) && view.is(0, K::Name) {
        let problem = view.syntax(view.here(), "`in` or `where` stands behind `only`");
        return Some(problem.fix("write `only in`", view.gap(0), " in "));
    }
    if view.is(0, K::As) && !view.wanted.kind(K::Unit) {
        return Some(view.syntax(view.span(0), "only `show` says in which unit"));
    }
    if view.wanted.kind(K::Unit) && view.is(-1, K::As) {
        return Some(view.syntax(view.here(), "a unit is missing behind `as`"));
    }
    if view.at == view.start && view.place == Place::Condition {
        let problem = view.syntax(
            view.here(),
            if view.ended() { "the condition is missing" } else { "a value is missing here" },
        );
        return Some(problem.help(example("require")));
    }
    if view.is(-1, K::At) || (view.wanted.kind(K::Equal) && view.before().iter().any(|t| t.kind == K::At)) {
        let problem = view.syntax(view.here(), "behind `at` stands a speed and its value");
        return Some(problem.help("such as `at ride.speed = 15 km/h`"));
    }
    None
}

/// A declaring word in the middle of a line.
fn declaration(view: &View<'_, '_>) -> Option<Problem> {
    let declares = view.is(0, K::Name) && word_kind(view.text(0)).is_some_and(K::is_declaration);
    if !declares || !matches!(view.kind(1), Some(K::Name | K::String)) || view.at == view.start {
        return None;
    }
    let problem = view.syntax(view.span(0), "a declaration begins on a line of its own");
    Some(problem.fix("begin a new line", before(view.span(0)), "\n"))
}

/// Two names or values without anything between.
fn side_by_side(view: &View<'_, '_>) -> Option<Problem> {
    let ends = matches!(view.kind(-1), Some(K::Name | K::RightParen | K::Superscript | K::Number | K::Unit));
    if !ends || !view.is(0, K::Name) || view.wanted.sort(Sort::Operand) || !view.wanted.sort(Sort::Operator) {
        return None;
    }
    if view.is(-1, K::Name) && view.place != Place::Rest {
        let (first, second) = (view.text(-1), view.text(0));
        let joined = format!("{first}_{second}");
        let span = view.spans(-1, 0);
        let problem = Problem::new(Code::BadName, span, "a name is one word: its parts are joined by `_`")
            .help(format!("or an operator is missing between `{first}` and `{second}`"));
        return Some(problem.fix(format!("write `{joined}`"), span, joined));
    }
    Some(view.syntax(view.here(), format!("an operator is missing before {}", view.found())))
}
