//! From atoms to lines: one item at a time, never wider than need be.
//!
//! A line break that the writer made inside a statement stays; a line that is too wide is broken at the places that
//! read best. Both give the same lines when they are laid out again.

use crate::format::atoms::Atom;
use crate::format::measure::{Measure, WIDTH};
use crate::format::rows::Columns;
use crate::token::{Comment, TokenKind as K};

/// Blanks a level is indented by.
const INDENT: usize = 4;

/// A bracket that is open where the layout stands.
enum Frame {
    /// `(` or `[`.
    Bracket,
    /// `{`
    Brace {
        /// Whether every statement of it stands on a line of its own.
        lines: bool,
        /// How far the line of the `{` is indented.
        base: usize,
        /// Indentation of the statement around it.
        outer: usize,
        /// Rows of a table, aligned.
        columns: Option<Columns>,
    },
}

/// What comes before an atom.
enum Lead {
    Blanks(usize),
    /// The next statement of a block on one line.
    Separator,
    /// A new line; inside a statement no empty line is kept.
    Line {
        indent: usize,
        statement: bool,
    },
}

/// Writes items.
pub(super) struct Layout<'t> {
    text: &'t str,
    comments: &'t [Comment],
    out: String,
    /// Characters on the line so far.
    column: usize,
    /// Indentation of the line.
    line: usize,
    /// Indentation of the statement.
    statement: usize,
    frames: Vec<Frame>,
}

/// Lays an item out, from its first atom to its last, without a line end behind it.
pub(super) fn lay_out(text: &str, comments: &[Comment], atoms: &[Atom<'_>]) -> String {
    let out = String::with_capacity(atoms.len() * 6);
    let mut layout = Layout { text, comments, out, column: 0, line: 0, statement: 0, frames: Vec::new() };
    let measure = Measure::new(text, atoms);
    for index in 0..atoms.len() {
        layout.place(index, atoms, &measure);
    }
    layout.out
}

impl<'t> Layout<'t> {
    fn place(&mut self, index: usize, atoms: &[Atom<'_>], measure: &Measure) {
        let atom = &atoms[index];
        let opened = index > 0 && atoms[index - 1].kind == K::LeftBrace;
        let lead = if index == 0 { Lead::Blanks(0) } else { self.lead(index, atoms, measure, opened) };
        if let Lead::Line { statement: true, indent } = lead
            && atom.kind != K::RightBrace
        {
            self.statement = indent;
        }
        let from = if index == 0 { atom.span.start } else { atoms[index - 1].span.end };
        self.lead_in(&lead, atom, from, opened);
        if let Some(Frame::Brace { lines: true, columns: Some(columns), .. }) = self.frames.last_mut()
            && atom.kind != K::RightBrace
        {
            let pad = columns.before(index);
            self.blanks(pad);
        }
        self.out.push_str(&atom.text);
        self.column += atom.width;
        self.brackets(index, atoms, measure);
    }

    /// What comes before the atom at `index`.
    fn lead(&self, index: usize, atoms: &[Atom<'_>], measure: &Measure, opened: bool) -> Lead {
        let atom = &atoms[index];
        if let Some(Frame::Brace { lines, base, .. }) = self.frames.last() {
            match (lines, atom.kind == K::RightBrace, opened || atom.separated) {
                (true, true, _) => return Lead::Line { indent: *base, statement: true },
                (true, false, true) => return Lead::Line { indent: base + INDENT, statement: true },
                (false, true, _) => return Lead::Blanks(1),
                (false, false, true) if opened => return Lead::Blanks(1),
                (false, false, true) => return Lead::Separator,
                (_, false, false) => {}
            }
        }
        let closes = matches!(atom.kind, K::RightParen | K::RightSquare) && self.depth() == 1;
        let indent = if closes { self.statement } else { self.statement + INDENT };
        let keeps =
            (atom.newline && !measure.joins(index)) || measure.breaks(index) || !atom.comments.is_empty();
        let fresh = self.column <= self.line;
        let wide = atom.soft > 0 && !fresh && self.column + atom.space + measure.chunk(index) > WIDTH;
        if keeps || (wide && self.may_break()) {
            Lead::Line { indent, statement: false }
        } else {
            Lead::Blanks(atom.space)
        }
    }

    /// Inside a block that stands on one line nothing breaks.
    fn may_break(&self) -> bool {
        !self.frames.iter().any(|frame| matches!(frame, Frame::Brace { lines: false, .. }))
    }

    /// Open brackets of the statement.
    fn depth(&self) -> usize {
        self.frames.iter().rev().take_while(|frame| matches!(frame, Frame::Bracket)).count()
    }

    /// Writes the comments before an atom, then its blanks or its line break.
    fn lead_in(&mut self, lead: &Lead, atom: &Atom<'_>, from: u32, opened: bool) {
        let Lead::Line { indent, statement } = *lead else {
            match lead {
                Lead::Separator => {
                    self.out.push(';');
                    self.column += 1;
                    self.blanks(1);
                }
                Lead::Blanks(count) => self.blanks(*count),
                Lead::Line { .. } => {}
            }
            return;
        };
        let closes = atom.kind == K::RightBrace;
        let comment_indent = if closes && statement { indent + INDENT } else { indent };
        let mut from = from;
        let mut first = opened;
        for index in atom.comments.clone() {
            let comment = self.comments[index];
            let body = self.slice(comment.span.start, comment.span.end).trim_end();
            // Behind a `;` that is left out, a comment can be the first of its line.
            let own_line = line_ends(self.slice(from, comment.span.start)) > 0;
            if own_line {
                let empty = statement && !first && self.empty_line(from, comment.span.start);
                self.break_line(comment_indent, empty);
            } else {
                self.blanks(2);
            }
            self.out.push_str(body);
            first &= !own_line;
            from = comment.span.end;
        }
        let empty = statement && !first && !closes && self.empty_line(from, atom.span.start);
        self.break_line(indent, empty);
    }

    fn brackets(&mut self, index: usize, atoms: &[Atom<'_>], measure: &Measure) {
        let atom = &atoms[index];
        match atom.kind {
            K::LeftParen | K::LeftSquare => self.frames.push(Frame::Bracket),
            K::RightParen | K::RightSquare => drop(self.frames.pop()),
            K::LeftBrace => {
                let lines = measure.has_lines(index)
                    || (self.may_break() && self.column + measure.block(index) > WIDTH);
                let columns =
                    (atom.rows && lines).then(|| Columns::new(&atoms[index + 1..atom.mate], index + 1));
                let outer = self.statement;
                self.frames.push(Frame::Brace { lines, base: self.line, outer, columns });
            }
            K::RightBrace => {
                if let Some(Frame::Brace { outer, .. }) = self.frames.pop() {
                    self.statement = outer;
                }
            }
            _ => {}
        }
    }

    fn slice(&self, start: u32, end: u32) -> &'t str {
        self.text.get(start as usize..end as usize).unwrap_or_default()
    }

    fn empty_line(&self, from: u32, to: u32) -> bool {
        line_ends(self.slice(from, to)) > 1
    }

    fn blanks(&mut self, count: usize) {
        self.out.extend(std::iter::repeat_n(' ', count));
        self.column += count;
    }

    fn break_line(&mut self, indent: usize, empty: bool) {
        self.out.push_str(if empty { "\n\n" } else { "\n" });
        self.line = indent;
        self.column = 0;
        self.blanks(indent);
    }
}

/// How many lines end in a text.
pub(super) fn line_ends(text: &str) -> usize {
    let feeds = text.bytes().filter(|&byte| byte == b'\n').count();
    let lone = |pair: &[u8]| pair[0] == b'\r' && pair[1] != b'\n';
    feeds + text.as_bytes().windows(2).filter(|pair| lone(pair)).count() + usize::from(text.ends_with('\r'))
}
