//! From the tokens of one item to atoms: the spelling of each, the blanks before it, and where a line may break.

use std::borrow::Cow;
use std::ops::Range;

use layshaft_diagnostics::Span;

use super::layout::line_ends;
use super::spell::{spelling, superscript};
use crate::token::{Comment, Token, TokenKind as K};
use crate::words::word_kind;

/// A token as it is to be written, and what stands before it in the text.
#[derive(Debug)]
pub(super) struct Atom<'t> {
    pub kind: K,
    pub text: Cow<'t, str>,
    /// Where it stands in the text.
    pub span: Span,
    /// In characters.
    pub width: usize,
    /// Blanks before it on a line.
    pub space: usize,
    /// How gladly a line breaks before it: 0 never, 3 first.
    pub soft: u8,
    /// The comments before it.
    pub comments: Range<usize>,
    /// Whether it begins a line in the text.
    pub newline: bool,
    /// Whether a statement of a block ends before it.
    pub separated: bool,
    /// For `{`, the place of its `}`.
    pub mate: usize,
    /// For `{`, whether a table's rows follow; for what stands in such rows too.
    pub rows: bool,
}

/// An open bracket.
#[derive(Clone, Copy, PartialEq)]
enum Open {
    Paren,
    /// The head of a table.
    Head,
    Square,
    Block(usize),
    Rows(usize),
}

/// What is known while the atoms are made.
struct Maker<'t, 'c> {
    text: &'t str,
    comments: &'c [Comment],
    /// The next comment.
    comment: usize,
    atoms: Vec<Atom<'t>>,
    open: Vec<Open>,
    /// Whether the last atom is a minus without a left side.
    unary: bool,
    /// Between `allow` and `because`: the parts of a code stand tight.
    code: bool,
    /// The blanks round the last `^`.
    caret: usize,
}

/// The atoms of an item, or none if its brackets do not fit together. Line ends and `;` among the tokens end
/// statements; other line ends are found in the text.
pub(super) fn atoms<'t>(text: &'t str, tokens: &[Token], comments: &[Comment]) -> Option<Vec<Atom<'t>>> {
    let mut maker = Maker {
        text,
        comments,
        comment: 0,
        atoms: Vec::with_capacity(tokens.len()),
        open: Vec::new(),
        unary: false,
        code: false,
        caret: 0,
    };
    let mut at = 0;
    let mut separated = false;
    while let Some(&token) = tokens.get(at) {
        at += 1;
        if matches!(token.kind, K::Newline | K::Semicolon) {
            separated = true;
        } else {
            at += maker.push(token, tokens.get(at..).unwrap_or_default(), separated)? - 1;
            separated = false;
        }
    }
    maker.open.is_empty().then_some(maker.atoms)
}

impl<'t> Maker<'t, '_> {
    /// Makes the atom of a token and says how many tokens went into it.
    fn push(&mut self, mut token: Token, rest: &[Token], separated: bool) -> Option<usize> {
        if token.kind == K::PairParen {
            token.kind = K::LeftParen;
        }
        let last = self.atoms.last().map(|atom| atom.kind);
        let comments = self.comments_before(token.span.start);
        let gap = self.atoms.last().map_or(token.span.start, |atom| atom.span.end);
        // A `{` stands on the line of what it belongs to.
        let newline = !comments.is_empty()
            || (token.kind != K::LeftBrace && line_ends(self.slice(Span::new(gap, token.span.start))) > 0);
        let (text, taken) = self.text_of(token, rest);
        let unary = token.kind == K::Minus && (self.in_rows() || !last.is_some_and(ends_value));
        let (space, soft) =
            if separated { (1, 0) } else { (self.space(last, token, rest), self.soft(last, token)) };
        let mut atom = Atom {
            kind: if taken == 2 { K::Superscript } else { token.kind },
            width: text.chars().count(),
            text,
            span: token.span,
            space,
            soft,
            comments,
            newline,
            separated,
            mate: 0,
            rows: self.in_rows(),
        };
        if space == 2 {
            atom.soft = 3;
        }
        if taken == 2 {
            atom.span.end = rest.first().map_or(token.span.end, |exponent| exponent.span.end);
        }
        self.note(&mut atom, rest)?;
        self.unary = unary;
        self.atoms.push(atom);
        Some(taken)
    }

    /// Keeps the state that later atoms depend on.
    fn note(&mut self, atom: &mut Atom<'t>, rest: &[Token]) -> Option<()> {
        let index = self.atoms.len();
        match atom.kind {
            K::LeftParen => {
                let before = |back: usize| index.checked_sub(back).map(|at| self.atoms[at].kind);
                let head = before(1) == Some(K::Points)
                    || (before(1) == Some(K::String) && before(2) == Some(K::Csv));
                self.open.push(if head { Open::Head } else { Open::Paren });
            }
            K::LeftSquare => self.open.push(Open::Square),
            K::LeftBrace => {
                let first = rest
                    .iter()
                    .map(|token| token.kind)
                    .find(|kind| !matches!(kind, K::Newline | K::Semicolon));
                atom.rows = matches!(first, Some(K::Number | K::SignedNumber | K::Minus));
                self.open.push(if atom.rows { Open::Rows(index) } else { Open::Block(index) });
            }
            K::RightParen if !matches!(self.open.pop(), Some(Open::Paren | Open::Head)) => return None,
            K::RightSquare if self.open.pop() != Some(Open::Square) => return None,
            K::RightBrace => match self.open.pop() {
                Some(Open::Block(begin) | Open::Rows(begin)) => self.atoms[begin].mate = index,
                _ => return None,
            },
            K::Caret => {
                self.caret = usize::from(self.atoms.last().is_some_and(|base| base.kind == K::Unit));
            }
            K::Allow => self.code = true,
            K::Because => self.code = false,
            _ => {}
        }
        Some(())
    }

    fn in_rows(&self) -> bool {
        matches!(self.open.last(), Some(Open::Rows(_)))
    }

    fn comments_before(&mut self, start: u32) -> Range<usize> {
        let begin = self.comment;
        while self.comments.get(self.comment).is_some_and(|comment| comment.span.start < start) {
            self.comment += 1;
        }
        begin..self.comment
    }

    fn slice(&self, span: Span) -> &'t str {
        self.text.get(span.start as usize..span.end as usize).unwrap_or_default()
    }

    /// The spelling of a token and how many tokens it stands for: a power of a whole number is written raised.
    fn text_of(&self, token: Token, rest: &[Token]) -> (Cow<'t, str>, usize) {
        let base = self.atoms.last().map(|atom| atom.kind);
        if token.kind == K::Caret
            && base != Some(K::Unit)
            && let Some(exponent) = rest.first()
            && matches!(exponent.kind, K::Number | K::SignedNumber)
            && line_ends(self.slice(Span::new(token.span.end, exponent.span.start))) == 0
            && rest.get(1).is_none_or(|next| next.kind != K::Unit)
        {
            let number = spelling(exponent.kind, self.slice(exponent.span));
            let digits = number.strip_prefix('-').unwrap_or(&number);
            if digits.len() <= 2 && digits.bytes().all(|byte| byte.is_ascii_digit()) {
                return (Cow::Owned(superscript(&number)), 2);
            }
        }
        (spelling(token.kind, self.slice(token.span)), 1)
    }

    /// Blanks between the last atom and a token of the same statement.
    fn space(&self, last: Option<K>, token: Token, rest: &[Token]) -> usize {
        let Some(last) = last else { return 0 };
        if self.code && token.kind != K::Because && last != K::Allow {
            let tight = self.atoms.last().is_some_and(|atom| atom.span.end == token.span.start);
            return usize::from(!tight);
        }
        match (last, token.kind) {
            (_, K::Comma | K::RightParen | K::RightSquare | K::Dot | K::Colon) => 0,
            (K::LeftParen | K::LeftSquare | K::Dot, _) => 0,
            // Tight, `- 5` would be one number, and `- -5` the beginning of a longer sign.
            (K::Minus, K::Number | K::SignedNumber | K::Minus) if self.unary && !self.in_rows() => 1,
            (K::Minus, _) if self.unary => 0,
            (K::Name, K::LeftParen) => 0,
            (_, K::LeftSquare) => usize::from(self.open.last() == Some(&Open::Head)),
            // `5 m ²` is the square of 5 m, `5 m²` an area.
            (base, K::Superscript | K::Caret) => usize::from(base == K::Unit),
            (K::Caret, _) => self.caret,
            (_, K::From | K::Measured | K::Assumed | K::Only | K::Probability) => 2,
            (_, K::Not) if rest.first().is_some_and(|next| next.kind == K::In) => 2,
            (_, K::At) if self.states_a_speed(rest) => 2,
            _ => 1,
        }
    }

    /// Whether an `at` gives the speed at which something is asked, not what belongs to a value.
    fn states_a_speed(&self, rest: &[Token]) -> bool {
        let asked = self.atoms.first().is_some_and(|first| matches!(first.kind, K::Require | K::Show));
        asked && self.open.is_empty() && rest.first().is_some_and(|next| next.kind == K::Name)
    }

    /// How gladly a line breaks before a token.
    fn soft(&self, last: Option<K>, token: Token) -> u8 {
        let breaks = match (last, token.kind) {
            (_, K::And | K::Or | K::Then | K::Else) => true,
            (Some(K::Comma | K::Plus), _) => true,
            (
                Some(K::Less | K::LessEqual | K::Greater | K::GreaterEqual | K::EqualEqual | K::NotEqual),
                _,
            ) => true,
            (Some(K::Minus), _) => !self.unary,
            _ => false,
        };
        // There, a name such as `load` may declare.
        let declares = || word_kind(self.slice(token.span)).is_some_and(K::is_declaration);
        if !breaks || self.in_rows() || self.code || declares() {
            return 0;
        }
        if matches!(self.open.last(), None | Some(Open::Block(_))) { 2 } else { 1 }
    }
}

/// Whether a value can end in this, so that a minus behind it subtracts.
const fn ends_value(kind: K) -> bool {
    matches!(
        kind,
        K::Name | K::Number | K::SignedNumber | K::Unit | K::String | K::Superscript | K::ValueWord
    ) || matches!(kind, K::True | K::False | K::Yes | K::No | K::Points | K::Absent | K::Rated)
        || matches!(kind, K::RightParen | K::RightSquare | K::RightBrace)
}
