//! The tokens before a place: what completion and signature help decide by. A half-typed item has no tree to ask.

use layshaft_diagnostics::{Code, FileId, Span};
use layshaft_syntax::{Item, Token, TokenKind as K};

use crate::Snapshot;

/// An item is cut into tokens up to a place no further behind its start than this.
const LONGEST: usize = 32 << 10;

/// A place with the tokens of its item before it.
pub(crate) struct Cursor<'a> {
    /// The text of the file.
    pub text: &'a str,
    /// The place, at a border of characters.
    pub offset: usize,
    /// The item the place is in or behind.
    pub item: Option<&'a Item>,
    /// The tokens of the item that end before the word; offsets of the file.
    pub tokens: Vec<Token>,
    /// The word that is being typed, empty where none is.
    pub word: Span,
    /// The text between quotes that is being typed, without its opening quote.
    pub quoted: Option<Span>,
    /// The unit that is being typed, directly behind its number and blanks; may be empty.
    pub unit: Option<Span>,
}

impl<'a> Cursor<'a> {
    /// Reads the tokens before a place; none inside a comment, and where too much stands before it.
    pub fn new(snapshot: &'a Snapshot, file: FileId, offset: u32) -> Option<Self> {
        let source = snapshot.file(file)?;
        let text: &str = &source.text;
        let offset = border(text, offset as usize);
        let items = &source.tree.items;
        let behind = items.partition_point(|item| item.offset as usize <= offset);
        let item = behind.checked_sub(1).and_then(|at| items.get(at));
        let base = base(text, offset, item)?;
        let lexed = layshaft_syntax::lex(text.get(base..offset)?);
        let shift = base as u32;
        let commented = lexed.comments.last().is_some_and(|last| last.span.end as usize + base == offset);
        let mut tokens = lexed.tokens;
        tokens.iter_mut().for_each(|token| token.span = token.span.shifted(shift));
        let quoted = quoted(text, &tokens, offset);
        if commented && quoted.is_none() {
            return None;
        }
        let here = offset as u32;
        let mut cursor = Self { text, offset, item, tokens, word: Span::new(here, here), quoted, unit: None };
        if cursor.quoted.is_some() {
            cursor.tokens.pop();
        } else {
            cursor.unit = cursor.unit_typed();
            cursor.take_word();
        }
        Some(cursor)
    }

    /// The words of a token.
    pub fn text_of(&self, token: &Token) -> &'a str {
        self.slice(token.span)
    }

    /// The text of a span of the file.
    pub fn slice(&self, span: Span) -> &'a str {
        self.text.get(span.start as usize..span.end as usize).unwrap_or("")
    }

    /// Where the word at the place ends to its right.
    pub fn word_end(&self) -> u32 {
        let rest = self.text.get(self.offset..).unwrap_or("");
        let length = rest.find(|c: char| !(c.is_alphanumeric() || c == '_')).unwrap_or(rest.len());
        (self.offset + length) as u32
    }

    /// What follows the word on its line.
    pub fn rest_of_line(&self) -> &'a str {
        let rest = self.text.get(self.word_end() as usize..).unwrap_or("");
        rest.split(['\n', '\r']).next().unwrap_or("").trim_start()
    }

    /// Takes the token that touches the place off the list, where it is a word.
    fn take_word(&mut self) {
        let Some(last) = self.tokens.last().copied() else { return };
        let word = self.text_of(&last);
        let begins = word.chars().next().is_some_and(|c| c.is_alphabetic() || c == '_');
        if last.span.end as usize == self.offset && begins && last.kind != K::Unit {
            self.word = last.span;
            self.tokens.pop();
        }
    }

    /// The unit being typed behind the last number.
    fn unit_typed(&mut self) -> Option<Span> {
        let number =
            self.tokens.iter().rposition(|token| matches!(token.kind, K::Number | K::SignedNumber))?;
        let end = self.tokens[number].span.end as usize;
        let behind = self.text.get(end..self.offset)?;
        let typed = behind.trim_start_matches([' ', '\t']);
        if behind.is_empty() || (typed.is_empty() && !behind.starts_with([' ', '\t'])) {
            return None;
        }
        let inside = |c: char| c.is_alphabetic() || "·*/^²³⁴⁻¹()°%‰1234".contains(c);
        let begins = typed.chars().next().is_none_or(|c| c.is_alphabetic() || "°%‰".contains(c));
        if !typed.chars().all(inside) || !begins || typed.len() > 40 {
            return None;
        }
        let start = (self.offset - typed.len()) as u32;
        self.tokens.truncate(number + 1);
        Some(Span::new(start, self.offset as u32))
    }
}

/// The nearest border of characters at or before an offset.
fn border(text: &str, offset: usize) -> usize {
    let mut at = offset.min(text.len());
    while !text.is_char_boundary(at) {
        at -= 1;
    }
    at
}

/// Where the tokens begin: at the item; at the line, where a long item ended before it.
fn base(text: &str, offset: usize, item: Option<&Item>) -> Option<usize> {
    let Some(item) = item else {
        let line = text[..offset].rfind(['\n', '\r']).map_or(0, |at| at + 1);
        return (offset - line <= LONGEST).then_some(line);
    };
    let start = item.offset as usize;
    if offset - start <= LONGEST {
        return Some(start);
    }
    let line = text[..offset].rfind(['\n', '\r']).map_or(0, |at| at + 1);
    let end = item.offset + item.tree.span.end;
    let open = item.tree.problems.iter().any(|problem| problem.code == Code::UnclosedBracket);
    (line as u32 >= end && !open && offset - line <= LONGEST).then_some(line)
}

/// The text between quotes that the place is in.
fn quoted(text: &str, tokens: &[Token], offset: usize) -> Option<Span> {
    let last = tokens.last().filter(|token| token.kind == K::String)?;
    let words = text.get(last.span.start as usize..offset)?;
    let opening = words.chars().next()?;
    let inner = &words[opening.len_utf8()..];
    let own = text.get(last.span.start as usize + opening.len_utf8()..last.span.end as usize)?;
    let closed = opening != '"' || (own.ends_with('"') && !own.ends_with("\\\""));
    (!closed && !inner.contains(['\n', '\r']))
        .then(|| Span::new(last.span.start + opening.len_utf8() as u32, offset as u32))
}

/// The statement a place is in: what stands before the innermost open brace, and what follows the last separator.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Frame<'t> {
    /// The tokens before the innermost open `{`, from the start of their statement; none at the top of the file.
    pub header: Option<&'t [Token]>,
    /// The tokens of the statement at hand.
    pub statement: &'t [Token],
    /// The innermost open `(` or `[` of the statement, by its index there.
    pub bracket: Option<usize>,
}

/// Finds the statement that ends with these tokens.
pub(crate) fn frame(tokens: &[Token]) -> Frame<'_> {
    let mut walk = Walk { tokens, start: 0, open: Vec::new() };
    for (at, token) in tokens.iter().enumerate() {
        walk.step(at, token.kind);
    }
    let brace = walk.open.iter().rposition(|open| open.kind == K::LeftBrace);
    let header = brace.and_then(|at| walk.open.get(at)).map(|open| &tokens[open.start..open.at]);
    let inner = walk.open.last().filter(|open| open.kind != K::LeftBrace && open.at >= walk.start);
    Frame { header, statement: &tokens[walk.start..], bracket: inner.map(|open| open.at - walk.start) }
}

/// An open bracket.
struct Open {
    kind: K,
    at: usize,
    /// Where the statement around it begins.
    start: usize,
}

struct Walk<'t> {
    tokens: &'t [Token],
    start: usize,
    open: Vec<Open>,
}

impl Walk<'_> {
    fn step(&mut self, at: usize, kind: K) {
        match kind {
            K::LeftBrace | K::LeftParen | K::LeftSquare => {
                self.open.push(Open { kind, at, start: self.start });
                if kind == K::LeftBrace {
                    self.start = at + 1;
                }
            }
            K::RightBrace => {
                while let Some(open) = self.open.pop() {
                    if open.kind == K::LeftBrace {
                        self.start = open.start;
                        break;
                    }
                }
            }
            K::RightParen | K::RightSquare
                if self.open.last().is_some_and(|open| open.kind != K::LeftBrace) =>
            {
                self.open.pop();
            }
            K::Semicolon => self.separate(at),
            K::Newline => self.line_end(at),
            _ => {}
        }
    }

    fn separate(&mut self, at: usize) {
        while self.open.last().is_some_and(|open| open.kind != K::LeftBrace) {
            self.open.pop();
        }
        self.start = at + 1;
    }

    fn line_end(&mut self, at: usize) {
        let kind = |at: usize| self.tokens.get(at).map(|token| token.kind);
        let entry = kind(at + 1) == Some(K::Name) && kind(at + 2) == Some(K::Equal);
        if self.open.last().is_some_and(|open| open.kind != K::LeftBrace) && !entry {
            return;
        }
        let last = at.checked_sub(1).and_then(kind);
        let next = kind(at + 1);
        let goes_on = last.is_some_and(|last| last != K::Equal && leaves_open(last));
        let joined = next.is_some_and(|next| next == K::Arrow || next == K::LeftBrace || next.is_reserved());
        if !joined && (!goes_on || entry) {
            self.separate(at);
        }
    }
}

/// Whether a line that ends in this goes on in the next.
fn leaves_open(kind: K) -> bool {
    operates(kind) || matches!(kind, K::Equal | K::Comma | K::Arrow)
}

/// Whether an operand follows this.
pub(crate) const fn operates(kind: K) -> bool {
    matches!(
        kind,
        K::Plus
            | K::Minus
            | K::Star
            | K::Slash
            | K::Caret
            | K::PlusMinus
            | K::Less
            | K::LessEqual
            | K::Greater
            | K::GreaterEqual
            | K::EqualEqual
            | K::NotEqual
            | K::DotDot
            | K::And
            | K::Or
            | K::Not
            | K::If
            | K::Then
            | K::Else
    )
}

/// The names of the path that ends with these tokens, the last point included: `lift.motor.` gives two.
pub(crate) fn path_before<'a>(cursor: &Cursor<'a>, tokens: &[Token]) -> Vec<&'a str> {
    let mut names = Vec::new();
    let mut at = tokens.len();
    while at >= 2 && tokens[at - 1].kind == K::Dot && is_name(tokens[at - 2].kind) {
        names.push(cursor.text_of(&tokens[at - 2]));
        at -= 2;
    }
    names.reverse();
    names
}

/// The names of the path that these tokens end with: `lift.motor.torque` gives three.
pub(crate) fn path_at_end<'a>(cursor: &Cursor<'a>, tokens: &[Token]) -> Vec<&'a str> {
    let Some((last, before)) = tokens.split_last() else { return Vec::new() };
    if !is_name(last.kind) {
        return Vec::new();
    }
    let mut names = path_before(cursor, before);
    names.push(cursor.text_of(last));
    names
}

/// Whether a token can be a name: the declaring words are names at other places.
pub(crate) const fn is_name(kind: K) -> bool {
    matches!(kind, K::Name | K::In | K::Where | K::Of | K::ValueWord) || kind.is_declaration()
}

/// How many braces are open behind these tokens, and whether a statement goes on there.
pub(crate) fn depth(tokens: &[Token]) -> (usize, bool) {
    let mut walk = Walk { tokens, start: 0, open: Vec::new() };
    for (at, token) in tokens.iter().enumerate() {
        walk.step(at, token.kind);
    }
    let braces = walk.open.iter().filter(|open| open.kind == K::LeftBrace).count();
    let begun = tokens[walk.start..].iter().any(|token| token.kind != K::Newline);
    (braces, begun)
}
