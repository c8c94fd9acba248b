//! The rows of a table: columns aligned at the decimal point.

use crate::format::atoms::Atom;
use crate::token::TokenKind as K;

/// Blanks between two columns.
const GAP: usize = 2;

/// A cell: atoms of one number, its sign included.
struct Cell {
    /// The first atom.
    first: usize,
    row: usize,
    column: usize,
    /// Characters before the decimal point.
    whole: usize,
    /// Characters from the decimal point on.
    rest: usize,
}

/// The blanks before each cell of a table.
pub(super) struct Columns {
    /// The first atom of a cell and the blanks before it, beside the one that stands there anyway.
    pads: Vec<(usize, usize)>,
}

impl Columns {
    /// Measures the atoms between the braces; the first of them is the atom `first` of the item.
    pub(super) fn new(atoms: &[Atom<'_>], first: usize) -> Self {
        let cells = cells(atoms, first);
        let count = cells.iter().map(|cell| cell.column + 1).max().unwrap_or(0);
        let mut widest = vec![(0, 0); count];
        for cell in &cells {
            let column: &mut (usize, usize) = &mut widest[cell.column];
            *column = (column.0.max(cell.whole), column.1.max(cell.rest));
        }
        let mut pads = Vec::with_capacity(cells.len());
        let mut left: Option<&Cell> = None;
        for cell in &cells {
            let mut pad = widest[cell.column].0 - cell.whole;
            if let Some(left) = left.filter(|left| left.row == cell.row) {
                pad += widest[left.column].1 - left.rest + GAP - 1;
            }
            pads.push((cell.first, pad));
            left = Some(cell);
        }
        Self { pads }
    }

    /// The blanks before the atom `index` of the item.
    pub(super) fn before(&self, index: usize) -> usize {
        self.pads.binary_search_by_key(&index, |pad| pad.0).map_or(0, |at| self.pads[at].1)
    }
}

fn cells(atoms: &[Atom<'_>], first: usize) -> Vec<Cell> {
    let mut cells: Vec<Cell> = Vec::new();
    let (mut row, mut column) = (0, 0);
    for (index, atom) in atoms.iter().enumerate() {
        if atom.separated && index > 0 {
            (row, column) = (row + 1, 0);
        }
        let point = atom.text.find(['.', 'e', 'E']).unwrap_or(atom.text.len());
        let signed = index > 0 && atoms[index - 1].kind == K::Minus;
        match cells.last_mut().filter(|_| signed) {
            Some(cell) => {
                cell.whole += point;
                cell.rest = atom.text.len() - point;
            }
            None => {
                cells.push(Cell {
                    first: first + index,
                    row,
                    column,
                    whole: point,
                    rest: atom.text.len() - point,
                });
                column += 1;
            }
        }
    }
    cells
}
