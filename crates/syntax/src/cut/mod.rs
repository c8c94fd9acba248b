//! From the tokens of a file to its items: line ends, brackets, limits.
//!
//! What is done here depends on the text of one item alone (but for closing braces that an item before it still
//! owes), so that the tree of an item can be kept by its text. The grammar behind it sees balanced brackets, only
//! those line ends that end something, and no expression beyond the limits.

mod brackets;
mod docs;
mod limits;
mod lines;

use layshaft_diagnostics::{Code, Span};

pub(crate) use docs::directly_above;
pub(crate) use limits::MOST_BYTES;

use crate::token::{Comment, Lexed, Token, TokenKind};
use crate::tree::Problem;

/// One item, not yet parsed. All places are file offsets.
pub(crate) struct Piece {
    /// Where its text begins: its first `##` line or its first word.
    pub(crate) base: u32,
    /// Where its first word begins.
    pub(crate) first: u32,
    /// Where its last token ends.
    pub(crate) end: u32,
    /// Its tokens, in [`Pieces::tokens`].
    pub(crate) tokens: std::ops::Range<usize>,
    /// The `##` lines above it.
    pub(crate) docs: Vec<Comment>,
    /// The `##` lines inside it.
    pub(crate) inner_docs: Vec<Comment>,
    /// What was found wrong so far.
    pub(crate) problems: Vec<Problem>,
}

/// A file cut into items.
pub(crate) struct Pieces {
    pub(crate) tokens: Vec<Token>,
    pub(crate) items: Vec<Piece>,
    /// Problems outside every item.
    pub(crate) problems: Vec<Problem>,
    /// `##` lines that describe the file.
    pub(crate) docs: Vec<Comment>,
}

/// Cuts a file into items.
pub(crate) fn cut(text: &str, lexed: Lexed) -> Pieces {
    let mut cutter = Cutter::new(text, &lexed);
    cutter.run();
    let (tokens, mut items, mut problems) = (cutter.out, cutter.items, cutter.problems);
    let docs = docs::attach(text, &tokens, &lexed.comments, &mut items);
    distribute(lexed.problems, &mut items, &mut problems);
    Pieces { tokens, items, problems, docs }
}

/// Hands what the lexer found to the items it lies in.
fn distribute(found: Vec<Problem>, items: &mut [Piece], outside: &mut Vec<Problem>) {
    if found.is_empty() {
        return;
    }
    let mut touched = Vec::new();
    for problem in found {
        let place = problem.span.start;
        let index = items.partition_point(|item| item.end <= place);
        match items.get_mut(index) {
            Some(item) if item.base <= place => {
                item.problems.push(problem);
                touched.push(index);
            }
            _ => outside.push(problem),
        }
    }
    for index in touched {
        items[index].problems.sort_by_key(|problem| problem.span.start);
    }
    outside.sort_by_key(|problem| problem.span.start);
}

/// What opened a bracket.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Bracket {
    /// `(`; `true`: of an expression or a group of quantities, not of a call or a table's head.
    Paren(bool),
    Square,
    /// `{` of entries.
    Block,
    /// `{` of rows.
    Table,
}

/// An open bracket.
#[derive(Clone, Copy, Debug)]
struct Open {
    bracket: Bracket,
    /// Its token in `out`.
    index: usize,
    span: Span,
    /// Put in by the cutter, and reported then.
    inserted: bool,
}

struct Cutter<'a> {
    text: &'a str,
    raw: &'a [Token],
    found: &'a [Problem],
    at: usize,
    out: Vec<Token>,
    items: Vec<Piece>,
    problems: Vec<Problem>,
    stack: Vec<Open>,
    /// Closing braces of blocks that a declaration closed: they are no news when they come.
    owed: usize,
    item: Current,
}

/// The item at hand.
#[derive(Default)]
struct Current {
    running: bool,
    /// Its first token in `raw`.
    first: usize,
    /// Its first token in `out`.
    out_first: usize,
    problems: Vec<Problem>,
    has_block: bool,
    /// `points` was read and its rows are still to come.
    table_ahead: bool,
    /// Operators since the last border.
    operators: u32,
    /// The first token in `out` behind the last border.
    expression: usize,
    /// A limit was reported: brackets left open by it are no news.
    limited: bool,
}

impl<'a> Cutter<'a> {
    fn new(text: &'a str, lexed: &'a Lexed) -> Self {
        Self {
            text,
            raw: &lexed.tokens,
            found: &lexed.problems,
            at: 0,
            out: Vec::with_capacity(lexed.tokens.len() + 16),
            items: Vec::new(),
            problems: Vec::new(),
            stack: Vec::new(),
            owed: 0,
            item: Current::default(),
        }
    }

    fn run(&mut self) {
        while let Some(&token) = self.raw.get(self.at) {
            if self.item.running {
                self.step(token);
            } else {
                self.between(token);
            }
        }
        if self.item.running {
            self.end_item();
        }
    }

    /// Between two items.
    fn between(&mut self, token: Token) {
        use TokenKind as K;
        match token.kind {
            K::Newline => self.at += 1,
            K::RightBrace | K::RightParen | K::RightSquare => self.stray(token),
            K::Semicolon => self.lone_semicolon(token.span),
            _ => {
                self.item = Current {
                    running: true,
                    first: self.at,
                    out_first: self.out.len(),
                    expression: self.out.len(),
                    ..Current::default()
                };
                if token.kind.is_declaration() {
                    self.push(token);
                    self.item.expression = self.out.len();
                    self.at += 1;
                } else {
                    self.step(token);
                }
            }
        }
    }

    fn step(&mut self, token: Token) {
        use TokenKind as K;
        match token.kind {
            K::Newline => return self.line_end(),
            K::LeftParen | K::LeftSquare | K::LeftBrace => return self.open(token),
            K::RightParen | K::RightSquare | K::RightBrace => return self.close(token),
            K::Semicolon => return self.semicolon(token),
            kind if kind.is_declaration() => return self.declaration_inside(token),
            K::At | K::Comma => {
                self.mark_group();
                self.push(token);
                if token.kind == K::Comma && self.between_brackets() {
                    self.border();
                }
            }
            K::Points => {
                self.item.table_ahead |= self.raw.get(self.at + 1).is_some_and(|t| t.kind == K::LeftParen);
                self.push(token);
            }
            K::Equal | K::String => {
                self.push(token);
                if self.between_brackets() {
                    self.border();
                }
            }
            _ => {
                if token.kind == K::Name && self.stack.is_empty() && self.entry_follows_header() {
                    self.missing_brace();
                }
                self.push(token);
                if counts_as_operator(token.kind) {
                    self.item.operators += 1;
                    if self.item.operators > limits::MOST_OPERATORS {
                        return self.too_many_operators(token);
                    }
                }
            }
        }
        self.at += 1;
    }

    fn push(&mut self, token: Token) {
        self.out.push(token);
    }

    /// A border of expressions: what is counted begins anew.
    fn border(&mut self) {
        self.item.operators = 0;
        self.item.expression = self.out.len();
    }

    /// Whether no `(` or `[` is open above the innermost brace.
    fn between_brackets(&self) -> bool {
        self.stack.last().is_none_or(|open| matches!(open.bracket, Bracket::Block | Bracket::Table))
    }

    /// `at` or `,` right inside brackets that belong to no call: a group of quantities.
    fn mark_group(&mut self) {
        if let Some(Open { bracket: Bracket::Paren(true), index, .. }) = self.stack.last()
            && let Some(token) = self.out.get_mut(*index)
        {
            token.kind = TokenKind::PairParen;
        }
    }

    /// A declaring word that is not the first of a line, or stands inside a block.
    fn declaration_inside(&mut self, mut token: Token) {
        if self.stack.is_empty() && self.at > self.item.first {
            let place = Span::new(token.span.start, token.span.start);
            let message = "a declaration begins on a line of its own";
            let problem = Problem::new(Code::Syntax, token.span, message);
            self.problems.push(problem.fix("begin a new line", place, "\n"));
            return self.end_item();
        }
        let allow = token.kind == TokenKind::Allow && self.in_block();
        if !allow {
            token.kind = TokenKind::Name;
        }
        self.push(token);
        self.at += 1;
    }

    fn in_block(&self) -> bool {
        self.stack.last().is_some_and(|open| open.bracket == Bracket::Block)
    }

    fn semicolon(&mut self, token: Token) {
        if self.inside_brace() {
            self.close_parens(token.span.start);
            self.separator(token);
            self.at += 1;
        } else if self.stack.is_empty() {
            // What stands behind decides on the fix, so the message is the file's.
            self.end_item();
        } else {
            let message = "`;` parts the entries of a block; what stands between brackets is parted by `,`";
            let problem = Problem::new(Code::Syntax, token.span, message);
            self.item.problems.push(problem.fix("write `,`", token.span, ","));
            self.at += 1;
        }
    }

    /// `;` between two items or behind the last.
    fn lone_semicolon(&mut self, span: Span) {
        let message = "`;` parts the entries of a block; a declaration ends with its line";
        let problem = Problem::new(Code::Syntax, span, message);
        let follows = self.raw.get(self.at + 1).is_some_and(|next| next.kind != TokenKind::Newline);
        self.problems.push(if follows {
            problem.fix("begin a new line", span, "\n")
        } else {
            problem.fix("take `;` out", span, "")
        });
        self.at += 1;
    }

    /// Puts a separator of entries or rows, one where several follow one another.
    fn separator(&mut self, token: Token) {
        use TokenKind as K;
        let last = self.out.last().map(|token| token.kind);
        if !matches!(last, Some(K::Newline | K::Semicolon | K::LeftBrace)) {
            self.push(token);
        }
        self.border();
    }

    fn end_item(&mut self) {
        self.close_all();
        let first = self.raw.get(self.item.first).map_or(0, |token| token.span.start);
        let last = self.raw[..self.at].iter().rev().find(|token| token.kind != TokenKind::Newline);
        let end = last.map_or(first, |token| token.span.end).max(first);
        let current = std::mem::take(&mut self.item);
        self.items.push(Piece {
            base: first,
            first,
            end,
            tokens: current.out_first..self.out.len(),
            docs: Vec::new(),
            inner_docs: Vec::new(),
            problems: current.problems,
        });
    }
}

/// What an expression may hold a limited number of.
const fn counts_as_operator(kind: TokenKind) -> bool {
    use TokenKind as K;
    kind.is_operator() || matches!(kind, K::And | K::Or | K::Not | K::If | K::Within)
}
