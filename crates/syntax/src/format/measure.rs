//! How wide the parts of an item are on one line, found once for the whole item.

use crate::format::atoms::Atom;
use crate::format::layout::line_ends;
use crate::token::TokenKind as K;

/// Characters a line has at most, where it can be broken.
pub(super) const WIDTH: usize = 110;

/// Widths on one line.
pub(super) struct Measure {
    /// Where each atom ends if the item stands on one line.
    ends: Vec<usize>,
    /// Where each atom begins then.
    starts: Vec<usize>,
    /// One past the last atom that stays on a line with this one if the line breaks at equally good places.
    chunks: Vec<usize>,
    /// For `{`: one past the last atom that stays on the line of its `}`.
    tails: Vec<usize>,
    /// For `{`: whether the text has a line break inside.
    lines: Vec<bool>,
    /// The `->` of a drive that begin a line of their own.
    arrows: Vec<usize>,
    /// What follows such an arrow stays on its line.
    joined: bool,
}

impl Measure {
    pub(super) fn new(text: &str, atoms: &[Atom<'_>]) -> Self {
        let none = vec![0; atoms.len()];
        let mut measure = Self {
            ends: none.clone(),
            starts: none.clone(),
            chunks: none.clone(),
            tails: none,
            lines: vec![false; atoms.len()],
            arrows: Vec::new(),
            joined: false,
        };
        measure.find_lines(text, atoms);
        measure.find_ends(atoms);
        measure.find_arrows(atoms);
        measure.find_chunks(atoms);
        measure
    }

    /// The width of what stays together from an atom on.
    pub(super) fn chunk(&self, index: usize) -> usize {
        self.width(index, self.chunks[index])
    }

    /// The width of what follows a `{` up to its `}` and further up to the first place where the line may break.
    pub(super) fn block(&self, open: usize) -> usize {
        self.width(open, self.tails[open]).saturating_sub(1)
    }

    /// Whether the text has a line break inside a block.
    pub(super) fn has_lines(&self, open: usize) -> bool {
        self.lines[open]
    }

    /// Whether a line begins at an atom because the chain it belongs to is broken.
    pub(super) fn breaks(&self, index: usize) -> bool {
        self.joined && self.arrows.binary_search(&index).is_ok()
    }

    /// Whether an atom follows an arrow that begins a line.
    pub(super) fn joins(&self, index: usize) -> bool {
        index > 0 && self.breaks(index - 1)
    }

    /// From the beginning of one atom to the end of the one before another.
    fn width(&self, from: usize, to: usize) -> usize {
        if to > from { self.ends[to - 1] - self.starts[from] } else { 0 }
    }

    /// The blocks with line breaks (or comments, which end lines) inside.
    fn find_lines(&mut self, text: &str, atoms: &[Atom<'_>]) {
        let mut breaks = 0;
        let mut open = Vec::new();
        for (index, atom) in atoms.iter().enumerate() {
            let from = if index == 0 { atom.span.start } else { atoms[index - 1].span.end };
            let gap = text.get(from as usize..atom.span.start as usize).unwrap_or_default();
            breaks += line_ends(gap);
            match atom.kind {
                K::LeftBrace => open.push((index, breaks)),
                K::RightBrace => {
                    if let Some((begin, before)) = open.pop() {
                        self.lines[begin] = breaks > before;
                    }
                }
                _ => {}
            }
        }
    }

    fn find_ends(&mut self, atoms: &[Atom<'_>]) {
        let mut column = 0;
        let mut last = None;
        for (index, atom) in atoms.iter().enumerate() {
            let in_block = last == Some(K::LeftBrace) || atom.kind == K::RightBrace;
            column += match (in_block, atom.separated) {
                (true, _) => 1,
                (false, true) => 2,
                (false, false) => atom.space,
            };
            self.starts[index] = column;
            column += atom.width;
            self.ends[index] = column;
            last = Some(atom.kind);
        }
    }

    /// For each place where a line may break, the next place that is as good; those inside a block count inside.
    fn find_chunks(&mut self, atoms: &[Atom<'_>]) {
        let mut ends = [atoms.len(); 3];
        let mut outer = Vec::new();
        // The block of a declaration, and a table in it, is opened rather than the line before it broken.
        let asked = atoms.first().is_some_and(|first| matches!(first.kind, K::Require | K::Show));
        for (index, atom) in atoms.iter().enumerate().rev() {
            self.chunks[index] = ends[usize::from(atom.soft.clamp(1, 3)) - 1];
            match atom.kind {
                K::RightBrace => {
                    // Behind the brace the line goes on as it does outside.
                    outer.push((ends, ends[0]));
                    ends = [index; 3];
                }
                K::LeftBrace => {
                    if let Some((around, tail)) = outer.pop() {
                        self.tails[index] = tail;
                        ends = if self.lines[index] || !asked { [index + 1; 3] } else { around };
                    }
                }
                _ => {}
            }
            if atom.newline || atom.separated || self.breaks(index) {
                ends = [index; 3];
            } else {
                ends[..usize::from(atom.soft)].fill(index);
            }
        }
    }

    /// A drive's chain stands on one line, or every arrow of its outer level begins one.
    fn find_arrows(&mut self, atoms: &[Atom<'_>]) {
        if atoms.first().is_none_or(|first| first.kind != K::Drive) {
            return;
        }
        let mut depth = 0_usize;
        let mut end = atoms.len();
        for (index, atom) in atoms.iter().enumerate() {
            match atom.kind {
                K::LeftParen | K::LeftSquare => depth += 1,
                K::RightParen | K::RightSquare => depth = depth.saturating_sub(1),
                K::LeftBrace => {
                    end = index + 1;
                    break;
                }
                K::Arrow if depth == 0 => self.arrows.push(index),
                _ => {}
            }
        }
        let broken = |&at: &usize| atoms[at].newline || atoms.get(at + 1).is_some_and(|next| next.newline);
        self.joined = self.arrows.iter().any(broken) || self.width(0, end) > WIDTH;
    }
}
