//! From a text to tokens, in one pass without a look at the grammar.
//!
//! Three rules need a little memory, all of it inside one statement: a unit stands behind a number, behind `as` and
//! in a table's head; a minus belongs to the number it stands tight before where no value stands before it; a
//! declaring word is one as the first of a statement and before a name, a text or a number.

mod fold;
mod number;
mod strings;
mod unit;
mod unreadable;
mod word;

use layshaft_diagnostics::{Code, Span};

pub(crate) use fold::{name_text, superscript_text, unit_text};
pub(crate) use strings::string_text;

use crate::token::{Comment, Lexed, Token, TokenKind};
use crate::tree::Problem;
use fold::Role;
use unit::unit_end;

/// Takes a text apart. Total: what cannot be read becomes a problem and a [`TokenKind::Bad`].
#[must_use]
pub fn lex(text: &str) -> Lexed {
    let mut lexer = Lexer::new(text);
    unreadable::unreadable(text.strip_prefix('\u{feff}').unwrap_or(text), &mut lexer.problems);
    if text.starts_with('\u{feff}') {
        // The mark at the very start tells an encoding; the places found behind it are counted without it.
        lexer.at = '\u{feff}'.len_utf8();
        let shift = lexer.at as u32;
        for problem in &mut lexer.problems {
            problem.span = problem.span.shifted(shift);
            problem
                .fixes
                .iter_mut()
                .flat_map(|fix| &mut fix.1)
                .for_each(|edit| edit.0 = edit.0.shifted(shift));
        }
    }
    let seen = lexer.problems.len();
    lexer.run();
    let mut problems = lexer.problems;
    if seen > 0 && problems.len() > seen {
        problems.sort_by_key(|problem| problem.span.start);
    }
    Lexed { tokens: lexer.tokens, comments: lexer.comments, problems }
}

struct Lexer<'a> {
    text: &'a str,
    bytes: &'a [u8],
    at: usize,
    tokens: Vec<Token>,
    comments: Vec<Comment>,
    problems: Vec<Problem>,
    /// The kind of the last token; a line break before the first.
    last: TokenKind,
    /// Inside the head of a table, where `[ ]` holds a unit.
    head: bool,
}

impl<'a> Lexer<'a> {
    fn new(text: &'a str) -> Self {
        Self {
            text,
            bytes: text.as_bytes(),
            at: 0,
            tokens: Vec::with_capacity(text.len() / 4),
            comments: Vec::new(),
            problems: Vec::new(),
            last: TokenKind::Newline,
            head: false,
        }
    }

    fn run(&mut self) {
        while let Some(&byte) = self.bytes.get(self.at) {
            match byte {
                b' ' | b'\t' => self.at += 1,
                b'\n' | b'\r' => self.newline(byte),
                b'0'..=b'9' => self.number(self.at),
                b'a'..=b'z' | b'A'..=b'Z' | b'_' => self.word(),
                b'#' => self.comment(),
                b'"' => self.string(1),
                0x80.. => self.beyond_ascii(),
                _ => self.sign(byte),
            }
        }
    }

    fn peek(&self, ahead: usize) -> u8 {
        self.bytes.get(self.at + ahead).copied().unwrap_or(0)
    }

    /// The character at a place.
    fn char_at(&self, at: usize) -> Option<char> {
        self.text.get(at..)?.chars().next()
    }

    fn push(&mut self, kind: TokenKind, start: usize, end: usize) {
        self.tokens.push(Token { kind, span: Span::new(start as u32, end as u32) });
        self.last = kind;
        self.at = end;
    }

    fn take(&mut self, kind: TokenKind, length: usize) {
        self.push(kind, self.at, self.at + length);
    }

    fn report(&mut self, problem: Problem) {
        self.problems.push(problem);
    }

    fn newline(&mut self, byte: u8) {
        let length = if byte == b'\r' && self.peek(1) == b'\n' { 2 } else { 1 };
        if self.last == TokenKind::Newline {
            self.at += length;
        } else {
            self.take(TokenKind::Newline, length);
        }
    }

    fn comment(&mut self) {
        let rest = &self.bytes[self.at..];
        let length = rest.iter().position(|&b| b == b'\n' || b == b'\r').unwrap_or(rest.len());
        let own_line = self.last == TokenKind::Newline;
        let doc = own_line && self.peek(1) == b'#';
        let span = Span::new(self.at as u32, (self.at + length) as u32);
        self.comments.push(Comment { span, doc, own_line });
        self.at += length;
    }

    fn sign(&mut self, byte: u8) {
        use TokenKind as K;
        let next = self.peek(1);
        match (byte, next) {
            (b'=', b'=') => self.take(K::EqualEqual, 2),
            (b'=', _) => self.take(K::Equal, 1),
            (b'<', b'=') => self.take(K::LessEqual, 2),
            (b'<', _) => self.take(K::Less, 1),
            (b'>', b'=') => self.take(K::GreaterEqual, 2),
            (b'>', _) => self.take(K::Greater, 1),
            (b'!', b'=') => self.take(K::NotEqual, 2),
            (b'+', b'/') if self.peek(2) == b'-' => self.take(K::PlusMinus, 3),
            (b'+', _) => self.take(K::Plus, 1),
            (b'-', b'>') => self.take(K::Arrow, 2),
            (b'-', _) => self.minus(1),
            (b'*', _) => self.take(K::Star, 1),
            (b'/', _) => self.take(K::Slash, 1),
            (b'^', _) => self.take(K::Caret, 1),
            (b'.', b'.') => self.take(K::DotDot, 2),
            (b'.', _) => self.take(K::Dot, 1),
            (b',', _) => self.take(K::Comma, 1),
            (b';', _) => self.take(K::Semicolon, 1),
            (b':', _) => self.take(K::Colon, 1),
            (b'(' | b')' | b'[' | b']' | b'{' | b'}', _) => self.bracket(byte),
            (b'%', _) => self.lone_unit(),
            (0x21..=0x7e, _) => self.foreign_sign(byte, next),
            // Control characters: reported by the first look.
            _ => self.at += 1,
        }
    }

    fn bracket(&mut self, byte: u8) {
        use TokenKind as K;
        match byte {
            b'(' => {
                let before = self.tokens.len().checked_sub(2).map(|at| self.tokens[at].kind);
                self.head |= self.last == K::Points || (self.last == K::String && before == Some(K::Csv));
                self.take(K::LeftParen, 1);
            }
            b'[' => {
                self.take(K::LeftSquare, 1);
                if self.head {
                    self.head_unit();
                }
            }
            b']' => self.take(K::RightSquare, 1),
            _ => {
                self.head = false;
                let kind = [K::RightParen, K::LeftBrace, K::RightBrace];
                self.take(kind[usize::from(byte != b')') + usize::from(byte == b'}')], 1);
            }
        }
    }

    /// The unit between the brackets of a table's head.
    fn head_unit(&mut self) {
        let start = self.after_blanks(self.at);
        if let Some(end) = unit_end(self.text, start, true)
            && self.bytes.get(self.after_blanks(end)) == Some(&b']')
        {
            self.push(TokenKind::Unit, start, end);
        }
    }

    /// A minus: the sign of the number it stands tight before, where no value stands before it.
    fn minus(&mut self, length: usize) {
        let tight = self.peek(length).is_ascii_digit();
        let signs = match self.last {
            // Where the line before leaves something open, and only there: an item is read without its neighbours.
            TokenKind::Newline => self.tokens.iter().rev().nth(1).is_some_and(|token| match token.kind {
                TokenKind::LeftParen | TokenKind::LeftSquare => true,
                kind => kind.leaves_line_open() && kind.takes_sign(),
            }),
            last => last.takes_sign(),
        };
        if tight && signs {
            self.number(self.at + length);
        } else {
            self.take(TokenKind::Minus, length);
        }
    }

    /// `%` or `°` where no number stands before it: the grammar will say so.
    fn lone_unit(&mut self) {
        let end = unit_end(self.text, self.at, false).unwrap_or(self.at + 1);
        self.push(TokenKind::Unit, self.at, end);
    }

    fn beyond_ascii(&mut self) {
        let Some(c) = self.char_at(self.at) else {
            self.at += 1;
            return;
        };
        let length = c.len_utf8();
        match fold::role(c) {
            Role::Letter => self.word(),
            Role::Sign(kind) => self.take(kind, length),
            Role::Minus => self.minus(length),
            Role::Blank | Role::Invisible => self.at += length,
            Role::Quote => self.string(length),
            Role::Superscript => {
                let rest = self.text[self.at..].chars();
                let run = rest.take_while(|&c| fold::is_superscript(c)).map(char::len_utf8).sum();
                self.take(TokenKind::Superscript, run);
            }
            Role::UnitSign => self.lone_unit(),
            Role::Fraction(decimal) => self.fraction(self.at, length, decimal),
            Role::Prime | Role::DoublePrime | Role::Subscript(_) | Role::Other => self.foreign_char(c),
        }
    }

    /// An ASCII sign that the language does not have.
    fn foreign_sign(&mut self, byte: u8, next: u8) {
        let (length, words): (usize, &[(&str, &str)]) = match (byte, next) {
            (b'&', b'&') => (2, &[("and", "both conditions")]),
            (b'&', _) => (1, &[("and", "both conditions")]),
            (b'|', b'|') => (2, &[("or", "one of two conditions")]),
            (b'|', _) => (1, &[("or", "one of two conditions")]),
            (b'!', _) => (1, &[("not ", "the opposite of a condition")]),
            _ => (1, &[]),
        };
        let span = Span::new(self.at as u32, (self.at + length) as u32);
        let shown = &self.text[self.at..self.at + length];
        let mut problem =
            Problem::new(Code::BadText, span, format!("`{shown}` has no meaning in the language"));
        for (word, meaning) in words {
            let word_shown = word.trim();
            problem = problem.help(format!("{meaning}: `{word_shown}`"));
            problem = problem.fix(format!("write `{word_shown}`"), span, *word);
        }
        if byte == b'\'' {
            return self.single_quotes();
        }
        self.report(problem);
        // `a && b` reads as `a and b`, so that the rest of the line is still looked at.
        let kind = match byte {
            b'&' => TokenKind::And,
            b'|' => TokenKind::Or,
            b'!' => TokenKind::Not,
            _ => TokenKind::Bad,
        };
        self.take(kind, length);
    }

    /// A character outside ASCII that the language does not have.
    fn foreign_char(&mut self, c: char) {
        let end = self.at + c.len_utf8();
        let span = Span::new(self.at as u32, end as u32);
        let message = format!("`{c}` (U+{:04X}) has no meaning in the language", c as u32);
        self.report(Problem::new(Code::BadText, span, message));
        self.push(TokenKind::Bad, self.at, end);
    }

    fn after_blanks(&self, mut at: usize) -> usize {
        loop {
            match self.bytes.get(at) {
                Some(b' ' | b'\t') => at += 1,
                Some(0x80..) => match self.char_at(at) {
                    Some(c) if fold::is_blank(c) || fold::is_invisible(c) => at += c.len_utf8(),
                    _ => return at,
                },
                _ => return at,
            }
        }
    }
}

#[cfg(test)]
mod tests;
