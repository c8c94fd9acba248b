//! Blocks of entries: `path = value`, `gear 1 = reduction 14.5`, `allow code because "reason"`.

use chumsky::prelude::*;
use layshaft_diagnostics::{Code, Span};

use super::recover::broken_entry;
use super::terms::{maybe, miss_sort, peek, position, take, take_name, take_path, take_text};
use super::value::{not_at_end, span_since};
use super::{Ctx, In, Parsed, Rule, Sort};
use crate::cut::directly_above;
use crate::lexer::name_text;
use crate::token::{Token, TokenKind as K};
use crate::tree::{Allow, Block, Entry, Name, Path, Problem, Text, Value};

/// A line of a block.
#[allow(clippy::large_enum_variant, reason = "moved once, from the rule to the list")]
pub(super) enum Line {
    Entry(Entry),
    Allow(Allow),
    /// Broken beyond its key; reported.
    Nothing,
}

/// `{ … }`; a broken line costs no other.
pub(super) fn block<'s>(value: Rule<'s, Value>) -> Rule<'s, Block> {
    let line = custom(move |inp| {
        let line = match peek(inp) {
            Some(K::Allow) => Line::Allow(allow(inp)?),
            _ => Line::Entry(entry(inp, &value)?),
        };
        match peek(inp) {
            None | Some(K::Newline | K::Semicolon | K::RightBrace) => Ok(line),
            _ => not_at_end(inp),
        }
    })
    .recover_with(via_parser(custom(broken_entry)));
    custom(move |inp| {
        let open = take(inp, K::LeftBrace)?;
        let mut block = Block::default();
        loop {
            while maybe(inp, K::Newline).is_some() || maybe(inp, K::Semicolon).is_some() {}
            match peek(inp) {
                None | Some(K::RightBrace) => break,
                _ => match inp.parse(&line)? {
                    Line::Entry(entry) => block.entries.push(entry),
                    Line::Allow(allow) => block.allows.push(allow),
                    Line::Nothing => {}
                },
            }
        }
        let close = take(inp, K::RightBrace)?;
        block.span = open.cover(close);
        Ok(block)
    })
    .boxed()
}

fn entry<'s>(inp: &mut In<'s, '_>, value: &Rule<'s, Value>) -> Parsed<Entry> {
    let start = position(inp);
    let (key, member) = key(inp)?;
    take(inp, K::Equal)?;
    let value = inp.parse(value)?;
    let span = span_since(inp, start);
    let docs = docs_above(inp.state(), span.start);
    Ok(Entry { docs, key, member, value, span })
}

/// `motor.voltage`, `gear 1`, `gear low`, `efficiency low`
pub(super) fn key(inp: &mut In<'_, '_>) -> Parsed<(Path, Option<Name>)> {
    let path = take_path(inp)?;
    let member = match inp.peek_ref() {
        Some(&Token { kind: K::Number, span }) => Some(span),
        Some(&Token { kind: K::Name, span }) if is_gear(&path) => Some(span),
        _ => None,
    };
    let member = member.map(|span| {
        inp.skip();
        Name { text: name_text(inp.state().shown(span)), span }
    });
    Ok((path, member))
}

/// Gears have names of their own, and their losses by them; other fields have none, and two words are a slip.
fn is_gear(path: &Path) -> bool {
    let of_gears = ["gear", "efficiency", "efficiency_backward"];
    path.names.last().is_some_and(|name| of_gears.contains(&&*name.text))
}

/// The `##` lines right above a place.
pub(super) fn docs_above(ctx: &Ctx<'_>, start: u32) -> Vec<Text> {
    let above = ctx.docs.partition_point(|doc| doc.span.start < start);
    let (mut first, mut below) = (above, start);
    while first > 0 && directly_above(ctx.text, ctx.docs[first - 1].span.end, below) {
        first -= 1;
        below = ctx.docs[first].span.start;
    }
    ctx.docs[first..above].iter().map(|doc| doc_text(ctx.shown(doc.span), doc.span)).collect()
}

/// What a `##` line says.
pub(crate) fn doc_text(shown: &str, span: Span) -> Text {
    let inner = shown.trim_start_matches('#');
    Text { value: inner.strip_prefix(' ').unwrap_or(inner).trim_end().into(), span }
}

/// `allow code because "reason"`
pub(super) fn allow(inp: &mut In<'_, '_>) -> Parsed<Allow> {
    let start = take(inp, K::Allow)?;
    let code = code(inp)?;
    take(inp, K::Because)?;
    let because = take_text(inp)?;
    let span = start.cover(because.span);
    Ok(Allow { code, because, span })
}

/// Words joined by hyphens.
fn code(inp: &mut In<'_, '_>) -> Parsed<Name> {
    let start = position(inp);
    take_code_word(inp)?;
    while maybe(inp, K::Minus).is_some() {
        take_code_word(inp)?;
    }
    let span = span_since(inp, start);
    let shown = inp.state().shown(span);
    if shown.contains(char::is_whitespace) {
        let text: String = shown.split_whitespace().collect();
        let problem = Problem::new(Code::Syntax, span, "a code is one word without blanks").fix(
            format!("write `{text}`"),
            span,
            text.clone(),
        );
        inp.state().problems.push(problem);
        return Ok(Name { text: text.into(), span });
    }
    Ok(Name { text: name_text(shown), span })
}

/// Codes are made of English words, reserved ones among them (`peak-as-continuous`).
fn take_code_word(inp: &mut In<'_, '_>) -> Parsed<()> {
    match peek(inp) {
        Some(kind) if kind == K::Name || kind.is_reserved() && kind != K::Because => {
            inp.skip();
            Ok(())
        }
        _ => miss_sort(inp, Sort::Name),
    }
}

/// A name alone, where a recovery needs one.
pub(super) fn some_name(inp: &mut In<'_, '_>) -> Option<Name> {
    (peek(inp) == Some(K::Name)).then(|| take_name(inp).ok()).flatten()
}
