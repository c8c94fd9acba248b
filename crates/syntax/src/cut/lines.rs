//! Which line ends mean something.
//!
//! A statement ends at the end of its line unless a bracket `(` or `[` is open, the line ends in an operator, `=`,
//! `,`, `->` or one of `and or not if then else`, or the next line begins with `->` or a reserved word, as none
//! begins a statement. A half-typed line does not swallow the next: one that looks like an entry begins anew.

use layshaft_diagnostics::{Code, Span};

use super::{Bracket, Cutter, Open};
use crate::token::{Token, TokenKind};
use crate::tree::Problem;

/// A path of more names than this is not looked through to find whether a line is an entry.
const LONGEST_KEY: usize = 40;

impl Cutter<'_> {
    pub(super) fn line_end(&mut self) {
        let Some(&next) = self.raw.get(self.at + 1) else {
            self.at += 1;
            return;
        };
        if next.kind.is_declaration() && self.cuts(next.kind) {
            self.at += 1;
            return self.end_item();
        }
        let line = self.raw[self.at];
        match self.stack.last().map(|open| open.bracket) {
            Some(Bracket::Paren(_) | Bracket::Square) => {
                if self.looks_like_entry(self.at + 1) && self.inside_brace() {
                    self.close_parens(line.span.start);
                    self.separator(line);
                }
            }
            Some(Bracket::Table) => {
                if self.looks_like_entry(self.at + 1) {
                    self.close_table(line.span.start);
                }
                self.separator(line);
            }
            top => self.line_end_outside_brackets(line, next, top.is_some()),
        }
        self.at += 1;
    }

    /// A line end in a block or at the top of the file.
    fn line_end_outside_brackets(&mut self, line: Token, next: Token, in_block: bool) {
        use TokenKind as K;
        if self.joins(self.at, self.at + 1) {
            return;
        }
        let last = self.raw[self.at.saturating_sub(1)].kind;
        if next.kind.is_operator() && !matches!(last, K::LeftBrace | K::Semicolon) {
            return self.leading_operator(next);
        }
        if in_block {
            return self.separator(line);
        }
        if self.is_header() && next.kind == K::LeftBrace {
            return;
        }
        if self.is_header() && self.looks_like_entry(self.at + 1) {
            return self.missing_brace();
        }
        self.end_item();
    }

    /// Whether the line that ends at `end` goes on with the token at `next`.
    pub(super) fn joins(&self, end: usize, next: usize) -> bool {
        use TokenKind as K;
        let (Some(last), Some(first)) = (end.checked_sub(1).map(|at| self.raw[at].kind), self.raw.get(next))
        else {
            return false;
        };
        if last == K::LeftBrace {
            return false;
        }
        let names_something = self.raw.get(next + 1).is_some_and(|token| token.kind == K::Equal);
        if first.kind == K::Arrow || (first.kind.is_reserved() && !names_something) {
            return true;
        }
        let word = matches!(last, K::And | K::Or | K::Not | K::If | K::Then | K::Else);
        last.leaves_line_open() && first.kind != K::RightBrace && (word || !self.looks_like_entry(next))
    }

    /// Whether a declaring word at the start of a line ends the item at hand. Words that can stand in a block end
    /// it only where nothing is open.
    fn cuts(&self, kind: TokenKind) -> bool {
        use TokenKind as K;
        self.stack.is_empty() || !matches!(kind, K::Allow | K::DutyWord | K::Vary | K::Determine)
    }

    /// `path =`, `gear 1 =`: the start of an entry.
    pub(super) fn looks_like_entry(&self, from: usize) -> bool {
        use TokenKind as K;
        let kind = |at: usize| self.raw.get(at).map(|token| token.kind);
        let mut at = from;
        if kind(at) != Some(K::Name) {
            return false;
        }
        at += 1;
        while at - from < 2 * LONGEST_KEY && kind(at) == Some(K::Dot) && kind(at + 1) == Some(K::Name) {
            at += 2;
        }
        if matches!(kind(at), Some(K::Name | K::Number)) {
            at += 1;
        }
        kind(at) == Some(K::Equal)
    }

    /// Whether the item is one that has a block, and has none yet.
    fn is_header(&self) -> bool {
        use TokenKind as K;
        let first = self.raw.get(self.item.first).map(|token| token.kind);
        let blocked =
            matches!(first, Some(K::Supply | K::Source | K::Transmission | K::Load | K::Drive | K::Case));
        blocked && !self.item.has_block
    }

    /// Whether the header of an item ended before the token at hand and an entry begins with it, on the same line:
    /// `source m: dc_motor supply = pack; … }`.
    pub(super) fn entry_follows_header(&self) -> bool {
        use TokenKind as K;
        if !self.is_header() || self.at < self.item.first + 2 {
            return false;
        }
        let kind = |at: usize| self.raw.get(at).map(|token| token.kind);
        let ended = match (kind(self.item.first), kind(self.at - 1)) {
            (_, Some(K::With)) => true,
            (Some(K::Case), Some(K::Name)) => kind(self.at + 1) == Some(K::Dot),
            (Some(K::Drive), Some(K::Name | K::RightParen)) => kind(self.item.first + 2) == Some(K::Equal),
            (_, Some(K::Name)) => kind(self.at - 2) == Some(K::Colon),
            _ => false,
        };
        ended && self.looks_like_entry(self.at)
    }

    /// Entries follow a header without `{`.
    pub(super) fn missing_brace(&mut self) {
        let end = self.raw[self.at.saturating_sub(1)].span.end;
        let place = Span::new(end, end);
        let problem = Problem::new(Code::UnclosedBracket, place, "`{` is missing before the entries").fix(
            "open the block here",
            place,
            " {",
        );
        self.item.problems.push(problem);
        let index = self.out.len();
        self.push(Token { kind: TokenKind::LeftBrace, span: place });
        self.stack.push(Open { bracket: Bracket::Block, index, span: place, inserted: true });
        self.item.has_block = true;
        self.border();
    }

    /// A line that begins with an operator goes on with the line above, with a message.
    fn leading_operator(&mut self, next: Token) {
        let end = self.raw[self.at.saturating_sub(1)].span.end;
        let shown = &self.text[next.span.start as usize..next.span.end as usize];
        let behind = next.span.end + self.blanks_behind(next.span.end);
        let edits = vec![
            (Span::new(end, end), format!(" {shown}")),
            (Span::new(next.span.start, behind), String::new()),
        ];
        let message = format!("a line never begins with `{shown}`");
        let problem = Problem::new(Code::Syntax, next.span, message)
            .help("an expression goes on in the next line where its line ends in an operator")
            .fix_all(format!("move `{shown}` to the end of the line above"), edits);
        self.item.problems.push(problem);
    }

    fn blanks_behind(&self, from: u32) -> u32 {
        let rest = &self.text.as_bytes()[from as usize..];
        rest.iter().take_while(|&&byte| byte == b' ' || byte == b'\t').count() as u32
    }
}
