//! A table on a terminal: columns as wide as their cells, numbers under their decimal points, long texts wrapped;
//! where even that is too wide for the terminal, one block of lines a row.

use super::style::{Style, Tone, width};

/// Blanks between two columns.
const GAP: usize = 2;
/// Blanks between two columns where the terminal is narrow.
const NARROW_GAP: usize = 1;
/// Blanks before a table.
const INDENT: usize = 2;
/// A wrapped column is not made narrower than this.
const NARROWEST: usize = 9;
/// A longer word is broken where the terminal is narrow.
const LONGEST_WORD: usize = 24;

/// How the cells of a column stand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Align {
    /// Texts, wrapped where the terminal is narrow.
    Text,
    /// Numbers, their decimal points under one another.
    Number,
}

/// A column.
#[derive(Clone, Debug)]
pub struct Column {
    /// Lines of its head: what it is, in which unit.
    pub head: Vec<String>,
    /// How its cells stand.
    pub align: Align,
}

/// A cell.
#[derive(Clone, Debug)]
pub struct Cell {
    /// Its text, harmless and on one line.
    pub text: String,
    /// Its tone.
    pub tone: Tone,
}

impl Cell {
    /// A cell without tone.
    #[must_use]
    pub fn plain(text: impl Into<String>) -> Self {
        Self { text: text.into(), tone: Tone::Plain }
    }
}

/// A table.
#[derive(Clone, Debug, Default)]
pub struct Grid {
    /// Its columns.
    pub columns: Vec<Column>,
    /// Its rows, each with one cell a column.
    pub rows: Vec<Vec<Cell>>,
}

/// Widths of the columns and blanks between them.
struct Layout {
    widths: Vec<usize>,
    gap: usize,
}

impl Grid {
    /// Writes the table, at most `limit` columns wide where that is possible.
    #[must_use]
    pub fn render(&self, limit: usize, style: Style) -> String {
        let (grid, layout) = self.laid_out(limit);
        match layout {
            Some(layout) => grid.as_table(&layout, style),
            None => self.as_blocks(style),
        }
    }

    /// Whether the table can be at most `limit` columns wide.
    #[must_use]
    pub fn fits(&self, limit: usize) -> bool {
        self.laid_out(limit).1.is_some()
    }

    /// The table with its numbers lined up, and its layout where it fits.
    fn laid_out(&self, limit: usize) -> (Self, Option<Layout>) {
        let mut grid = self.clone();
        grid.line_up_numbers();
        let natural: Vec<usize> = (0..grid.columns.len()).map(|at| grid.natural_width(at)).collect();
        let gaps = [GAP, NARROW_GAP].into_iter();
        let mut layouts =
            gaps.filter_map(|gap| Some(Layout { widths: grid.shrunk(&natural, limit, gap)?, gap }));
        let layout = layouts.next();
        (grid, layout)
    }

    /// Pads numbers on the right so that their decimal points stand under one another.
    fn line_up_numbers(&mut self) {
        for at in 0..self.columns.len() {
            if self.columns[at].align != Align::Number {
                continue;
            }
            let cells = || self.rows.iter().filter_map(|row| row.get(at));
            let most = cells().map(|cell| behind_point(&cell.text)).max().unwrap_or(0);
            for row in &mut self.rows {
                if let Some(cell) = row.get_mut(at).filter(|cell| is_number(&cell.text)) {
                    let missing = most - behind_point(&cell.text);
                    cell.text.extend(std::iter::repeat_n(' ', missing));
                }
            }
        }
    }

    fn natural_width(&self, at: usize) -> usize {
        let head = self.columns[at].head.iter().map(|line| width(line));
        let cells = self.rows.iter().filter_map(|row| row.get(at)).map(|cell| width(&cell.text));
        head.chain(cells).max().unwrap_or(0)
    }

    /// Takes width from the widest text columns until the table fits; `None` where it cannot.
    fn shrunk(&self, natural: &[usize], limit: usize, gap: usize) -> Option<Vec<usize>> {
        let mut widths = natural.to_vec();
        let floors: Vec<usize> = (0..natural.len()).map(|at| self.floor(at, natural[at])).collect();
        let floor = |at: usize| floors[at];
        loop {
            let total = INDENT + widths.iter().sum::<usize>() + gap * widths.len().saturating_sub(1);
            if total <= limit {
                return Some(widths);
            }
            let widest =
                (0..widths.len()).filter(|&at| widths[at] > floor(at)).max_by_key(|&at| (widths[at], at))?;
            let next = widths.iter().enumerate().filter(|&(at, _)| at != widest && widths[at] > floor(at));
            let second = next.map(|(_, w)| *w).max().unwrap_or(0).min(widths[widest] - 1);
            let wanted = widths[widest].saturating_sub(total - limit).max(second).max(floor(widest));
            widths[widest] = wanted.min(widths[widest] - 1);
        }
    }

    /// What a column is not made narrower than: its head, its longest word as far as that is reasonable.
    fn floor(&self, at: usize, natural: usize) -> usize {
        if self.columns[at].align == Align::Number {
            return usize::MAX;
        }
        let cells = self.rows.iter().filter_map(|row| row.get(at));
        let words = cells.flat_map(|cell| cell.text.split(' ')).map(width);
        let longest = words.max().unwrap_or(0).min(LONGEST_WORD);
        let head = self.columns[at].head.iter().map(|line| width(line)).max().unwrap_or(0);
        head.max(longest).max(NARROWEST.min(natural))
    }

    fn as_table(&self, layout: &Layout, style: Style) -> String {
        let mut out = String::new();
        let lines = self.columns.iter().map(|column| column.head.len()).max().unwrap_or(0);
        for line in 0..lines {
            let mut row = Vec::new();
            for column in &self.columns {
                let text = column.head.get(line).cloned().unwrap_or_default();
                row.push(Cell { text, tone: Tone::Faint });
            }
            self.write_line(&mut out, &row, layout, style);
        }
        for row in &self.rows {
            let wrapped: Vec<Vec<String>> =
                row.iter().zip(&layout.widths).map(|(cell, &width)| wrap(&cell.text, width)).collect();
            let lines = wrapped.iter().map(Vec::len).max().unwrap_or(0);
            for line in 0..lines {
                let cells: Vec<Cell> = row
                    .iter()
                    .zip(&wrapped)
                    .map(|(cell, parts)| Cell {
                        text: parts.get(line).cloned().unwrap_or_default(),
                        tone: cell.tone,
                    })
                    .collect();
                self.write_line(&mut out, &cells, layout, style);
            }
        }
        out
    }

    fn write_line(&self, out: &mut String, cells: &[Cell], layout: &Layout, style: Style) {
        let gap = layout.gap;
        let mut line = " ".repeat(INDENT);
        let mut pending = 0;
        for ((cell, &wide), column) in cells.iter().zip(&layout.widths).zip(&self.columns) {
            let free = wide.saturating_sub(width(&cell.text));
            let (before, after) = if column.align == Align::Number { (free, 0) } else { (0, free) };
            if !cell.text.is_empty() {
                line.extend(std::iter::repeat_n(' ', pending + before));
                let text = cell.text.trim_end();
                line.push_str(&style.paint(cell.tone, text));
                pending = after + width(&cell.text) - width(text) + gap;
            } else {
                pending += wide + gap;
            }
        }
        out.push_str(line.trim_end());
        out.push('\n');
    }

    /// A block of lines for each row: `head  cell`.
    fn as_blocks(&self, style: Style) -> String {
        let mut out = String::new();
        let heads: Vec<String> =
            self.columns.iter().map(|column| column.head.join(" ").trim().to_string()).collect();
        let widest = heads.iter().map(|head| width(head)).max().unwrap_or(0);
        for (at, row) in self.rows.iter().enumerate() {
            if at > 0 {
                out.push('\n');
            }
            for (head, cell) in heads.iter().zip(row).filter(|(_, cell)| !cell.text.is_empty()) {
                let blanks = " ".repeat(widest - width(head) + GAP);
                let head = style.paint(Tone::Faint, head);
                let line =
                    format!("{}{head}{blanks}{}", " ".repeat(INDENT), style.paint(cell.tone, &cell.text));
                out.push_str(line.trim_end());
                out.push('\n');
            }
        }
        out
    }
}

/// Characters from the decimal point on (or none).
fn behind_point(text: &str) -> usize {
    if is_number(text) { text.find('.').map_or(0, |at| text.len() - at) } else { 0 }
}

fn is_number(text: &str) -> bool {
    let plain = |c: char| c.is_ascii_digit() || matches!(c, '.' | '-' | 'e' | '+');
    !text.is_empty() && text.chars().all(plain) && text.chars().any(|c| c.is_ascii_digit())
}

/// Breaks a text at blanks (and within words that are too long) into lines of at most `limit` columns.
#[must_use]
pub fn wrap(text: &str, limit: usize) -> Vec<String> {
    if width(text) <= limit || limit == 0 {
        return vec![text.to_string()];
    }
    let mut lines = Vec::new();
    let mut line = String::new();
    for word in text.split(' ') {
        let gap = usize::from(!line.is_empty());
        if width(&line) + gap + width(word) <= limit {
            if gap == 1 {
                line.push(' ');
            }
            line.push_str(word);
            continue;
        }
        if !line.is_empty() {
            lines.push(std::mem::take(&mut line));
        }
        for c in word.chars() {
            let wide = unicode_width::UnicodeWidthChar::width(c).unwrap_or(0);
            if !line.is_empty() && width(&line) + wide > limit {
                lines.push(std::mem::take(&mut line));
            }
            line.push(c);
        }
    }
    lines.push(line);
    lines
}

#[cfg(test)]
mod tests {
    use super::*;

    fn grid() -> Grid {
        let column = |head: &[&str], align| Column { head: head.iter().map(|&h| h.into()).collect(), align };
        Grid {
            columns: vec![
                column(&["case"], Align::Text),
                column(&["speed", "m/min"], Align::Number),
                column(&["verdict"], Align::Text),
            ],
            rows: vec![
                vec![Cell::plain("plain"), Cell::plain("14.90"), Cell::plain("holds")],
                vec![Cell::plain("corner[360 V, reverse]"), Cell::plain("1447"), Cell::plain("日本")],
                vec![Cell::plain("x"), Cell::plain("-"), Cell::plain("")],
            ],
        }
    }

    const NO: Style = Style { color: false };

    #[test]
    fn points_stand_under_one_another_and_lines_end_without_blanks() {
        let want = [
            "  case                      speed  verdict",
            "                            m/min",
            "  plain                     14.90  holds",
            "  corner[360 V, reverse]  1447     日本",
            "  x                             -",
        ];
        assert_eq!(grid().render(100, NO).lines().collect::<Vec<_>>(), want);
    }

    #[test]
    fn a_narrow_terminal_wraps_texts_first() {
        let got = grid().render(36, NO);
        assert!(got.lines().all(|line| width(line) <= 36), "{got}");
        assert!(got.contains("reverse]") && got.contains("corner["), "{got}");
    }

    #[test]
    fn a_very_narrow_terminal_gets_blocks() {
        let got = grid().render(12, NO);
        assert!(
            got.starts_with("  case         plain\n  speed m/min  14.90\n  verdict      holds\n\n"),
            "{got}"
        );
    }

    #[test]
    fn wrapping_never_loses_a_character() {
        let text = "a bb ccc dddddddddddd 日本語日本語";
        for limit in 2..40 {
            let lines = wrap(text, limit);
            assert!(lines.iter().all(|line| width(line) <= limit), "{limit}: {lines:?}");
            let kept: String = lines.concat().chars().filter(|c| *c != ' ').collect();
            assert_eq!(kept, text.replace(' ', ""));
        }
    }

    #[test]
    fn colour_is_outside_the_blanks() {
        let grid = Grid {
            columns: vec![Column { head: vec!["v".into()], align: Align::Text }],
            rows: vec![vec![Cell { text: "fails".into(), tone: Tone::Bad }]],
        };
        assert!(grid.render(80, Style { color: true }).contains("\u{1b}[1;31mfails\u{1b}[0m\n"));
    }
}
