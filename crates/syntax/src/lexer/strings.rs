//! Texts between quotes.

use layshaft_diagnostics::{Code, Span};

use super::Lexer;
use crate::token::TokenKind;
use crate::tree::Problem;

impl Lexer<'_> {
    /// A text whose opening quote is `quote` bytes long. A text opened by `"` ends at `"`; one opened by a quote of
    /// a word processor ends at any, as `“…”` and `„…“` are both in use.
    pub(super) fn string(&mut self, quote: usize) {
        let start = self.at;
        let mut at = start + quote;
        let mut escapes = false;
        let end = loop {
            match self.bytes.get(at) {
                Some(b'"') => break Some(at + 1),
                None | Some(b'\n' | b'\r') => break None,
                Some(b'\\') => {
                    escapes = true;
                    let next = self.char_at(at + 1).filter(|c| !matches!(c, '\n' | '\r'));
                    at += 1 + next.map_or(0, char::len_utf8);
                }
                Some(0x80..) => {
                    let c = self.char_at(at).unwrap_or(' ');
                    at += c.len_utf8();
                    if quote > 1 && matches!(c, '“' | '”' | '„') {
                        break Some(at);
                    }
                }
                Some(_) => at += 1,
            }
        };
        if escapes {
            self.check_escapes(start + quote, end.unwrap_or(at));
        }
        match end {
            Some(end) => {
                if self.text[start + quote..end].chars().count() == 1 {
                    let span = Span::new(start as u32, end as u32);
                    let message = "the text between the quotes is empty";
                    self.report(
                        Problem::new(Code::Syntax, span, message).help("say in a few words what it is"),
                    );
                }
                self.push(TokenKind::String, start, end);
            }
            None => self.unclosed(start, quote, at),
        }
    }

    /// `'text'`
    pub(super) fn single_quotes(&mut self) {
        let start = self.at;
        let line = self.text[start + 1..].split(['\n', '\r']).next().unwrap_or("");
        let Some(length) = line.find('\'') else { return self.foreign_char('\'') };
        let end = start + length + 2;
        let span = Span::new(start as u32, end as u32);
        let inner = line[..length].replace('\\', "\\\\").replace('"', "\\\"");
        let problem = Problem::new(Code::BadText, span, "a text stands between double quotes").fix(
            format!("write `\"{inner}\"`"),
            span,
            format!("\"{inner}\""),
        );
        self.report(problem);
        self.push(TokenKind::Bad, start, end);
    }

    /// No closing quote before the end of the line: the text ends where the line does.
    fn unclosed(&mut self, start: usize, quote: usize, line_end: usize) {
        let line = self.text[start..line_end].trim_end();
        // A brace behind a blank is the block's: the rest of the block is still read.
        let inner = line.strip_suffix('}').filter(|inner| inner.ends_with([' ', '\t'])).unwrap_or(line);
        let end = start + inner.trim_end().len();
        let end = end.max(start + quote);
        let opened = Span::new(start as u32, (start + quote) as u32);
        let close = Span::new(end as u32, end as u32);
        let problem =
            Problem::new(Code::UnclosedBracket, opened, "the closing quote is missing on this line")
                .help("a text ends on the line it begins on")
                .fix("close the text here", close, "\"");
        self.report(problem);
        self.push(TokenKind::String, start, end);
        self.at = start + inner.len();
    }

    fn check_escapes(&mut self, from: usize, to: usize) {
        let mut at = from;
        while let Some(skip) = self.bytes[at..to].iter().position(|&byte| byte == b'\\') {
            let slash = at + skip;
            let next = self.char_at(slash + 1).filter(|c| !matches!(c, '\n' | '\r'));
            at = (slash + 1 + next.map_or(0, char::len_utf8)).min(to);
            if matches!(next, Some('"' | '\\')) {
                continue;
            }
            let span = Span::new(slash as u32, at as u32);
            let message = "behind `\\` in a text stands `\"` or `\\`";
            let problem = Problem::new(Code::BadText, span, message)
                .help("folders of a path are parted by `/`")
                .fix("write `\\\\`", Span::new(slash as u32, slash as u32 + 1), "\\\\");
            self.report(problem);
        }
    }
}

/// The text a string token stands for: quotes taken off, escapes resolved.
pub(crate) fn string_text(token: &str) -> Box<str> {
    const QUOTES: [char; 4] = ['"', '“', '”', '„'];
    let inner = token.strip_prefix(QUOTES).unwrap_or(token);
    if !inner.contains('\\') {
        return inner.strip_suffix(QUOTES).unwrap_or(inner).into();
    }
    let mut out = String::with_capacity(inner.len());
    let mut chars = inner.chars().peekable();
    while let Some(c) = chars.next() {
        match c {
            '\\' => match chars.next() {
                Some(next @ ('"' | '\\')) => out.push(next),
                Some(next) => out.extend(['\\', next]),
                None => out.push('\\'),
            },
            c if QUOTES.contains(&c) && chars.peek().is_none() => {}
            c => out.push(c),
        }
    }
    out.into()
}
