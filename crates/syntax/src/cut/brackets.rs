//! Brackets: missing closing ones are put in, stray ones left out, each reported once. What the grammar sees is
//! balanced.

use layshaft_diagnostics::{Code, Span};

use super::{Bracket, Cutter, Open};
use crate::token::{Token, TokenKind};
use crate::tree::Problem;

impl Bracket {
    const fn closing(self) -> (TokenKind, &'static str, &'static str) {
        match self {
            Bracket::Paren(_) => (TokenKind::RightParen, "(", ")"),
            Bracket::Square => (TokenKind::RightSquare, "[", "]"),
            Bracket::Block | Bracket::Table => (TokenKind::RightBrace, "{", "}"),
        }
    }

    const fn is_brace(self) -> bool {
        matches!(self, Bracket::Block | Bracket::Table)
    }
}

impl Cutter<'_> {
    pub(super) fn open(&mut self, token: Token) {
        use TokenKind as K;
        if self.stack.len() >= super::limits::DEEPEST {
            return self.too_deep(token);
        }
        let bracket = match token.kind {
            K::LeftParen => {
                let before = self.out.get(self.item.out_first..).and_then(<[Token]>::last).map(|t| t.kind);
                Bracket::Paren(!matches!(before, Some(K::Name | K::Points | K::String)))
            }
            K::LeftSquare => Bracket::Square,
            _ if self.item.table_ahead => Bracket::Table,
            _ => Bracket::Block,
        };
        if bracket.is_brace() {
            // A brace opens nothing inside `(` or `[`: what is open there was forgotten.
            self.close_parens(token.span.start);
            self.item.table_ahead = false;
            self.item.has_block = true;
        }
        self.stack.push(Open { bracket, index: self.out.len(), span: token.span, inserted: false });
        self.push(token);
        if bracket.is_brace() {
            self.border();
        }
        self.at += 1;
    }

    pub(super) fn close(&mut self, token: Token) {
        let brace = token.kind == TokenKind::RightBrace;
        let mut found = None;
        for (index, open) in self.stack.iter().enumerate().rev() {
            if open.bracket.closing().0 == token.kind {
                found = Some(index);
                break;
            }
            if !brace && open.bracket.is_brace() {
                break;
            }
        }
        let Some(index) = found else {
            return if brace || self.between_brackets() { self.stray(token) } else { self.mismatched(token) };
        };
        while self.stack.len() > index + 1 {
            self.close_top(token.span.start);
        }
        if brace {
            self.drop_separator();
        }
        self.stack.pop();
        self.push(token);
        if brace {
            self.border();
            self.item.table_ahead = false;
        }
        self.at += 1;
    }

    /// `(b]`: the bracket that is open is closed by the other kind.
    fn mismatched(&mut self, token: Token) {
        let Some(open) = self.stack.pop() else { return };
        let (kind, opening, closing) = open.bracket.closing();
        let shown = &self.text[token.span.start as usize..token.span.end as usize];
        let problem =
            Problem::new(Code::UnclosedBracket, token.span, format!("`{opening}` is closed by `{shown}`"))
                .related(open.span, format!("`{opening}` is opened here"))
                .fix(format!("write `{closing}`"), token.span, closing);
        self.item.problems.push(problem);
        self.push(Token { kind, span: token.span });
        self.at += 1;
    }

    /// The separator before a closing brace parts nothing.
    fn drop_separator(&mut self) {
        if matches!(self.out.last().map(|t| t.kind), Some(TokenKind::Newline | TokenKind::Semicolon)) {
            self.out.pop();
        }
    }

    /// A closing bracket that closes nothing. Where an earlier block was closed by a declaration, its own brace is
    /// no news.
    pub(super) fn stray(&mut self, token: Token) {
        self.at += 1;
        let brace = token.kind == TokenKind::RightBrace;
        if brace && self.owed > 0 && self.stack.is_empty() {
            self.owed -= 1;
            return;
        }
        let shown = &self.text[token.span.start as usize..token.span.end as usize];
        let message = format!("`{shown}` closes nothing");
        let problem = Problem::new(Code::UnclosedBracket, token.span, message).fix(
            format!("take `{shown}` out"),
            token.span,
            "",
        );
        // A brace depends on the items before: it is the file's.
        if self.item.running && !brace { &mut self.item.problems } else { &mut self.problems }.push(problem);
    }

    /// Closes the innermost open bracket, which was forgotten; `place` is what comes next.
    fn close_top(&mut self, place: u32) {
        let Some(open) = self.stack.pop() else { return };
        let before = self.raw[..self.at].iter().rev().find(|token| token.kind != TokenKind::Newline);
        let end = before.map_or(place, |token| token.span.end);
        let (kind, shown, closing) = open.bracket.closing();
        if open.bracket.is_brace() {
            self.drop_separator();
        }
        self.push(Token { kind, span: Span::new(end, end) });
        if open.inserted || self.item.limited || self.quote_is_open(open.span.start, end) {
            return;
        }
        let text = if open.bracket.is_brace() { "\n}" } else { closing };
        let mut problem =
            Problem::new(Code::UnclosedBracket, open.span, format!("`{shown}` is never closed"))
                .related(Span::new(end, end), format!("`{closing}` is missed here"));
        if !before.is_some_and(|token| token.kind.leaves_line_open()) {
            problem = problem.fix(format!("write `{closing}` here"), Span::new(end, end), text);
        }
        self.item.problems.push(problem);
    }

    /// Whether a text without closing quote took the rest of its line, a closing bracket perhaps among it.
    fn quote_is_open(&self, from: u32, to: u32) -> bool {
        let first = self.found.partition_point(|problem| problem.span.start < from);
        let inside = self.found[first..].iter().take_while(|problem| problem.span.start < to);
        inside.into_iter().any(|problem| problem.code == Code::UnclosedBracket)
    }

    /// Closes every `(` and `[` above the innermost brace.
    pub(super) fn close_parens(&mut self, place: u32) {
        while self.stack.last().is_some_and(|open| !open.bracket.is_brace()) {
            self.close_top(place);
        }
    }

    /// Whether a brace is open.
    pub(super) fn inside_brace(&self) -> bool {
        self.stack.iter().any(|open| open.bracket.is_brace())
    }

    /// Closes a table whose rows are followed by an entry.
    pub(super) fn close_table(&mut self, place: u32) {
        if self.stack.last().is_some_and(|open| open.bracket == Bracket::Table) {
            self.close_top(place);
        }
    }

    /// Closes whatever is open at the end of the item.
    pub(super) fn close_all(&mut self) {
        let place = self.raw[..self.at].last().map_or(0, |token| token.span.end);
        while let Some(open) = self.stack.last() {
            let owes = open.bracket.is_brace();
            self.owed += usize::from(owes);
            self.close_top(place);
        }
        // A line end behind the last entry parts nothing.
        while self.out.len() > self.item.out_first
            && self.out.last().is_some_and(|token| token.kind == TokenKind::Newline)
        {
            self.out.pop();
        }
    }
}
