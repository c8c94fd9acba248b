//! From a text to a file of items.

use std::cell::LazyCell;
use std::collections::BTreeMap;
use std::sync::Arc;

use chumsky::Parser;
use layshaft_diagnostics::{Code, Span};

use crate::cut::{MOST_BYTES, Piece, Pieces, cut};
use crate::grammar::{Ctx, ItemRule, doc_text, item};
use crate::lexer::lex;
use crate::token::{Comment, Token};
use crate::tree::{File, Item, ItemKind, ItemTree, Problem};

/// Reads a text. Total: any text gives a file, with what is wrong in it.
#[must_use]
pub fn parse(text: &str) -> File {
    parse_with(text, &mut Memo::default())
}

/// The items of the last text that was read, by their texts. One memo serves one file.
#[derive(Clone, Debug, Default)]
pub struct Memo {
    text: String,
    items: Vec<(Span, Arc<ItemTree>)>,
}

impl Memo {
    fn shown(&self, index: usize) -> Option<&str> {
        let span = self.items.get(index)?.0;
        self.text.get(span.start as usize..span.end as usize)
    }
}

/// Reads a text; an item whose text stood in the last text read with the same memo keeps its tree. The file is
/// equal to what [`parse`] gives.
#[must_use]
pub fn parse_with(text: &str, memo: &mut Memo) -> File {
    if text.len() > MOST_BYTES {
        *memo = Memo::default();
        let message = format!("the file has more than {} MB and is not read", MOST_BYTES / 1_000_000);
        let help = "large tables belong into a file of their own: `csv \"curve.csv\"`";
        let problem = Problem::new(Code::TooLarge, Span::default(), message).help(help);
        return File { problems: vec![problem], ..File::default() };
    }
    let mut pieces = cut(text, lex(text));
    let known = recall(text, &pieces.items, memo);
    rebase(&mut pieces, &known);
    // Built at the first item that is not known.
    let rule = LazyCell::new(item);
    let spans: Vec<Span> = pieces.items.iter().map(|piece| Span::new(piece.base, piece.end)).collect();
    let tokens = &pieces.tokens;
    let mut items = Vec::with_capacity(pieces.items.len());
    for (piece, known) in pieces.items.into_iter().zip(known) {
        let offset = piece.base;
        let tree = known.unwrap_or_else(|| Arc::new(parse_item(text, piece, tokens, &rule)));
        items.push(Item { offset, tree });
    }
    remember(text, &items, memo, spans);
    let docs = pieces.docs.iter().map(|doc| doc_text(shown(text, doc.span), doc.span)).collect();
    File { items, problems: pieces.problems, docs }
}

fn remember(text: &str, items: &[Item], memo: &mut Memo, spans: Vec<Span>) {
    memo.text.clear();
    memo.text.push_str(text);
    memo.items = spans.into_iter().zip(items).map(|(span, item)| (span, item.tree.clone())).collect();
}

fn shown(text: &str, span: Span) -> &str {
    text.get(span.start as usize..span.end as usize).unwrap_or("")
}

/// The trees of the items whose texts the memo knows: those before and behind the edit by their order, the others
/// by their text.
fn recall(text: &str, pieces: &[Piece], memo: &mut Memo) -> Vec<Option<Arc<ItemTree>>> {
    let of = |piece: &Piece| shown(text, Span::new(piece.base, piece.end));
    let mut known: Vec<Option<Arc<ItemTree>>> = vec![None; pieces.len()];
    let mut first = 0;
    while first < pieces.len() && memo.shown(first) == Some(of(&pieces[first])) {
        known[first] = Some(memo.items[first].1.clone());
        first += 1;
    }
    let (mut new_end, mut old_end) = (pieces.len(), memo.items.len());
    while new_end > first && old_end > first && memo.shown(old_end - 1) == Some(of(&pieces[new_end - 1])) {
        new_end -= 1;
        old_end -= 1;
        known[new_end] = Some(memo.items[old_end].1.clone());
    }
    let moved: BTreeMap<&str, usize> =
        (first..old_end).filter_map(|index| memo.shown(index).map(|text| (text, index))).collect();
    if !moved.is_empty() {
        for index in first..new_end {
            let found = moved.get(of(&pieces[index]));
            known[index] = found.map(|&index| memo.items[index].1.clone());
        }
    }
    known
}

/// Makes the tokens of the items that are to be parsed relative to their items.
fn rebase(pieces: &mut Pieces, known: &[Option<Arc<ItemTree>>]) {
    for (piece, known) in pieces.items.iter().zip(known) {
        if known.is_none() {
            for token in &mut pieces.tokens[piece.tokens.clone()] {
                token.span = back(token.span, piece.base);
            }
        }
    }
}

fn back(span: Span, offset: u32) -> Span {
    Span::new(span.start - offset, span.end - offset)
}

fn parse_item<'s>(text: &'s str, piece: Piece, tokens: &'s [Token], rule: &ItemRule<'s>) -> ItemTree {
    let base = piece.base;
    let item_text = shown(text, Span::new(base, piece.end));
    let tokens = &tokens[piece.tokens];
    let relative = |doc: &Comment| Comment { span: back(doc.span, base), ..*doc };
    let docs: Vec<Comment> = piece.inner_docs.iter().map(relative).collect();
    let reported: Vec<Problem> = piece.problems.into_iter().map(|problem| problem.rebased(base)).collect();
    let mut ctx = Ctx::new(item_text, tokens, docs, reported);
    let kind = rule.parse_with_state(tokens, &mut ctx).into_output().unwrap_or(ItemKind::Broken);
    let (mut problems, found) = (ctx.reported, ctx.problems);
    problems.extend(found);
    problems.sort_by_key(|problem| problem.span.start);
    let docs = piece.docs.iter().map(|doc| doc_text(shown(text, doc.span), back(doc.span, base))).collect();
    ItemTree { span: back(Span::new(piece.first, piece.end), base), docs, kind, problems }
}
