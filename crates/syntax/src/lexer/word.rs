//! Words: names, reserved words and declaring words.

use layshaft_diagnostics::{Code, Span};

use super::fold::{Role, continues_word, is_letter, role};
use super::unit::unit_end;
use super::{Lexer, name_text};
use crate::token::TokenKind;
use crate::tree::Problem;
use crate::words::word_kind;

impl Lexer<'_> {
    pub(super) fn word(&mut self) {
        let start = self.at;
        let mut end = start;
        while let Some(b'a'..=b'z' | b'A'..=b'Z' | b'0'..=b'9' | b'_') = self.bytes.get(end) {
            end += 1;
        }
        if self.bytes.get(end).is_some_and(|&byte| byte >= 0x80) {
            end = self.word_beyond_ascii(start, end);
        }
        let text = self.text;
        let kind = match word_kind(&text[start..end]) {
            Some(kind) if kind.is_reserved() => kind,
            Some(kind) if self.declares(kind, end) => {
                self.head = false;
                kind
            }
            _ => self.place_word(&text[start..end]),
        };
        self.push(kind, start, end);
        if kind == TokenKind::As && !self.head {
            self.unit_after_as();
        }
    }

    /// Words that mean something behind a certain word only.
    fn place_word(&self, word: &str) -> TokenKind {
        match (self.last, word) {
            (TokenKind::Only | TokenKind::Not, "in") => TokenKind::In,
            (TokenKind::Only, "where") => TokenKind::Where,
            (TokenKind::Unit | TokenKind::Number, "of") => TokenKind::Of,
            (TokenKind::Of, "value") => TokenKind::ValueWord,
            _ => TokenKind::Name,
        }
    }

    /// Whether a declaring word declares here: first of a statement, with a name, a text or a number behind it.
    fn declares(&self, kind: TokenKind, end: usize) -> bool {
        use TokenKind as K;
        let first =
            matches!(self.last, K::Newline | K::Semicolon | K::RightBrace | K::RightParen | K::RightSquare)
                || (kind == K::Allow && self.last == K::LeftBrace);
        if !first {
            return false;
        }
        let next = self.after_blanks(end);
        match self.bytes.get(next) {
            Some(b'"' | b'0'..=b'9' | b'a'..=b'z' | b'A'..=b'Z' | b'_') => true,
            Some(b'(' | b'-') => kind == K::Show,
            Some(0x80..) => {
                let c = self.char_at(next).unwrap_or(' ');
                is_letter(c) || matches!(role(c), Role::Quote)
            }
            _ => false,
        }
    }

    /// Behind the `as` of a `show` stands a unit; behind the one of a `use` a name.
    fn unit_after_as(&mut self) {
        let before = self.tokens.len().checked_sub(2).map(|at| self.tokens[at].kind);
        if before == Some(TokenKind::String) {
            return;
        }
        let start = self.after_blanks(self.at);
        if let Some(end) = unit_end(self.text, start, true) {
            self.push(TokenKind::Unit, start, end);
        }
    }

    /// Goes on with a word that holds characters outside ASCII. Subscript digits and invisible characters are
    /// reported and belong to the word, so that it is still the word that was meant.
    fn word_beyond_ascii(&mut self, start: usize, from: usize) -> usize {
        let mut end = from;
        let mut subscript = false;
        while let Some(c) = self.char_at(end) {
            let in_word = match role(c) {
                Role::Subscript(_) => {
                    subscript = true;
                    true
                }
                // Inside a word only: a zero width behind it is a blank.
                Role::Invisible => self.char_at(end + c.len_utf8()).is_some_and(continues_word),
                _ => continues_word(c),
            };
            if !in_word {
                break;
            }
            end += c.len_utf8();
        }
        if subscript {
            let span = Span::new(start as u32, end as u32);
            let plain = name_text(&self.text[start..end]);
            let message = "a name is written with plain digits";
            let help = "subscripts look like plain digits in many fonts";
            let problem = Problem::new(Code::BadName, span, message).help(help);
            self.report(problem.fix(format!("write `{plain}`"), span, &*plain));
        }
        end
    }
}
