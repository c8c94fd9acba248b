//! The limits of the language: passed ones are reported once, and what passes them is read as one unreadable token.
//! They bound the depth of every tree, so that no walk over one can overflow the stack.

use layshaft_diagnostics::{Code, Span};

use super::Cutter;
use crate::token::{Token, TokenKind};
use crate::tree::Problem;

/// How many bytes a file may have.
pub(crate) const MOST_BYTES: usize = 10_000_000;
/// How many brackets may be open at once.
pub(crate) const DEEPEST: usize = 128;
/// How many operators an expression may have.
pub(crate) const MOST_OPERATORS: u32 = 1_000;

impl Cutter<'_> {
    pub(super) fn too_deep(&mut self, token: Token) {
        if !self.item.limited {
            let message = format!("more than {DEEPEST} brackets are open here");
            let help = "name parts of the expression with `let`";
            self.item.problems.push(Problem::new(Code::TooLarge, token.span, message).help(help));
        }
        self.item.limited = true;
        self.at += 1;
        self.skip(token.span, 1, true);
    }

    pub(super) fn too_many_operators(&mut self, token: Token) {
        let message = format!("the expression has more than {MOST_OPERATORS} operators");
        let help = "name parts of the expression with `let`";
        self.item.problems.push(Problem::new(Code::TooLarge, token.span, message).help(help));
        let first = self.item.expression.min(self.out.len());
        let start = self.out.get(first).map_or(token.span, |token| token.span);
        self.out.truncate(first);
        let mut depth = 0;
        while self.stack.last().is_some_and(|open| open.index >= first) {
            self.stack.pop();
            depth += 1;
        }
        self.item.operators = 0;
        self.at += 1;
        self.skip(start, depth, false);
    }

    /// Passes over tokens to the end of the group (`depth` brackets are open in it) or of the expression, and puts
    /// one unreadable token for them.
    fn skip(&mut self, from: Span, mut depth: usize, group: bool) {
        use TokenKind as K;
        while let Some(token) = self.raw.get(self.at) {
            match token.kind {
                K::LeftParen | K::LeftSquare | K::LeftBrace => depth += 1,
                K::RightParen | K::RightSquare | K::RightBrace => {
                    if depth == 0 {
                        break;
                    }
                    depth -= 1;
                    if depth == 0 && group {
                        self.at += 1;
                        break;
                    }
                }
                K::Semicolon | K::Comma if depth == 0 => break,
                K::Newline => {
                    let next = self.raw.get(self.at + 1);
                    if next.is_some_and(|token| token.kind.is_declaration()) {
                        break;
                    }
                    let goes_on =
                        self.joins(self.at, self.at + 1) || next.is_some_and(|t| t.kind.is_operator());
                    if depth == 0 && !goes_on {
                        break;
                    }
                }
                _ => {}
            }
            self.at += 1;
        }
        let end = self.raw[..self.at].last().map_or(from.end, |token| token.span.end);
        self.push(Token { kind: K::Bad, span: Span::new(from.start, end.max(from.end)) });
    }
}
