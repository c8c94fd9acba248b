//! Items: one rule a declaration.

use chumsky::prelude::*;
use layshaft_diagnostics::{Code, Span};

use super::block::{allow, block};
use super::chain::chain;
use super::expr::exprs;
use super::recover::{
    broken_case, broken_chain, broken_let, broken_part, broken_rest, broken_start, broken_value, misspelt,
};
use super::require::{require, show};
use super::terms::{maybe, miss, name, path, peek, position, take_number, text, token};
use super::value::{not_at_end, value};
use super::{Extra, In, Input, ItemRule, Parsed, Rule};
use crate::lexer::name_text;
use crate::token::TokenKind as K;
use crate::tree::{Block, Chain, ItemKind, Name, PartBase, Problem, RoleWord, Value};

/// The rule of an item: total, every failure inside it ends as a problem.
pub(crate) fn item<'s>() -> ItemRule<'s> {
    let exprs = exprs();
    let value = value(&exprs);
    let block = block(value.clone());
    let language = custom(|inp| take_number(inp, false)).map(ItemKind::Language);
    let title = text().map(ItemKind::Title);
    let revision = text().map(ItemKind::Revision);
    let alias = token(K::As).ignore_then(name()).or_not();
    let used = text().then(alias).map(|(path, alias)| ItemKind::Use { path, alias });
    let allowed = custom(allow).map(ItemKind::Allow).boxed();
    let settled = settled(value);
    let part = part(block.clone());
    let drive = drive(block.clone());
    let case = case(block.clone());
    let require = require(&exprs, block.clone());
    let show = show(&exprs, block);
    let declared = custom(move |inp| {
        let Some(&first) = inp.peek_ref() else { return not_at_end(inp) };
        let kind = misspelt(inp).unwrap_or(first.kind);
        if kind == K::Allow {
            return inp.parse(&allowed);
        }
        if !kind.is_declaration() {
            return not_at_end(inp);
        }
        inp.skip();
        match kind {
            K::Language => inp.parse(language),
            K::Title => inp.parse(title),
            K::Revision => inp.parse(revision),
            K::Use => inp.parse(used),
            K::Let => inp.parse(&settled),
            K::Drive => inp.parse(&drive),
            K::Case => inp.parse(&case),
            K::Require => inp.parse(&require),
            K::Show => inp.parse(&show),
            K::DutyWord | K::Vary | K::Determine => Ok(later(inp, first.span)),
            _ => part(inp, kind, first.span),
        }
    })
    .recover_with(via_parser(custom(broken_start)));
    declared.then_ignore(custom(end).recover_with(via_parser(custom(broken_rest)))).boxed()
}

/// Nothing may follow an item.
fn end(inp: &mut In<'_, '_>) -> Parsed<()> {
    if peek(inp).is_none() { Ok(()) } else { not_at_end(inp) }
}

/// `name: kind = value`
fn settled<'s>(value: Rule<'s, Value>) -> Rule<'s, ItemKind> {
    let kind = token(K::Colon).ignore_then(name()).or_not();
    let head = name()
        .then(kind)
        .then_ignore(token(K::Equal))
        .recover_with(via_parser(custom(broken_let).map(|name| (name, None))));
    let value = value.then_ignore(custom(end)).recover_with(via_parser(custom(broken_value)));
    head.then(value).map(|((name, kind), value)| ItemKind::Let { name, kind, value }).boxed()
}

/// The rest of `source name: kind { … }` or `source name = base with { … }`.
fn part<'s>(block: Rule<'s, Block>) -> impl Fn(&mut In<'s, '_>, K, Span) -> Parsed<ItemKind> + Clone + 's {
    let opens = custom(|inp| if peek(inp) == Some(K::LeftBrace) { Ok(()) } else { miss(inp, K::LeftBrace) });
    let kind = token(K::Colon).ignore_then(name()).map(PartBase::Kind);
    let base = token(K::Equal)
        .ignore_then(path())
        .then_ignore(token(K::With))
        .then_ignore(opens)
        .map(PartBase::Variant);
    let opens = custom(|inp| match peek(inp) {
        None | Some(K::LeftBrace) => Ok(()),
        _ => not_at_end(inp),
    });
    let head =
        name().then(kind.or(base)).then_ignore(opens).recover_with(via_parser(custom(broken_part))).boxed();
    move |inp, word, role_span| {
        let role = match word {
            K::Supply => RoleWord::Supply,
            K::Source => RoleWord::Source,
            K::Transmission => RoleWord::Transmission,
            _ => RoleWord::Load,
        };
        let (name, base) = inp.parse(&head)?;
        let block = if peek(inp).is_none() { empty_block(inp) } else { inp.parse(&block)? };
        Ok(ItemKind::Part { role, role_span, name, base, block })
    }
}

/// The block of a part that has none.
fn empty_block(inp: &mut In<'_, '_>) -> Block {
    let at = position(inp);
    Block { span: inp.state().place_before(at), ..Block::default() }
}

/// `name = chain { … }`
fn drive<'s>(block: Rule<'s, Block>) -> Rule<'s, ItemKind> {
    let opens = custom(|inp| match peek(inp) {
        None | Some(K::LeftBrace) => Ok(()),
        _ => not_at_end(inp),
    });
    let head = name()
        .then_ignore(token(K::Equal))
        .then(chain())
        .then_ignore(opens)
        .recover_with(via_parser(custom(broken_chain)));
    head.then(optional(block))
        .map(|((name, chain), block): ((Name, Chain), _)| ItemKind::Drive { name, chain, block })
        .boxed()
}

/// A block where one stands.
fn optional<'s>(block: Rule<'s, Block>) -> impl Parser<'s, Input<'s>, Option<Block>, Extra<'s>> + Clone {
    custom(move |inp| match peek(inp) {
        Some(K::LeftBrace) => inp.parse(&block).map(Some),
        _ => Ok(None),
    })
}

/// `name { … }`, `name = a + b`, `name = a + b with { … }`
fn case<'s>(block: Rule<'s, Block>) -> Rule<'s, ItemKind> {
    let bases = name().separated_by(token(K::Plus)).at_least(1).collect::<Vec<_>>();
    let opens = custom(|inp| {
        if maybe(inp, K::With).is_some() {
            return if peek(inp) == Some(K::LeftBrace) { Ok(()) } else { miss(inp, K::LeftBrace) };
        }
        if peek(inp).is_none() { Ok(()) } else { miss(inp, K::With) }
    });
    let composed = token(K::Equal).ignore_then(bases).then_ignore(opens);
    let plain = custom(|inp| match peek(inp) {
        Some(K::LeftBrace) => Ok(Vec::new()),
        _ => miss(inp, K::LeftBrace),
    });
    let head = name().then(composed.or(plain)).recover_with(via_parser(custom(broken_case)));
    head.then(optional(block)).map(|((name, bases), block)| ItemKind::Case { name, bases, block }).boxed()
}

/// A word of a later language, with all that follows it.
fn later(inp: &mut In<'_, '_>, word: Span) -> ItemKind {
    while peek(inp).is_some() {
        inp.skip();
    }
    let shown = inp.state().shown(word);
    let message = format!("`{shown}` belongs to a later version of the language");
    inp.state().problems.push(Problem::new(Code::Syntax, word, message));
    ItemKind::Later(Name { text: name_text(shown), span: word })
}
