//! Markdown for hovers and documents. What comes from specs and CSV files goes through [`text`]; everything else that
//! is written here is our own: words of the registry, numbers, units.

use layshaft_present::escape;

/// A text of the author's, made harmless: no link, no image, no HTML.
pub(crate) fn text(untrusted: &str) -> String {
    escape::markdown(untrusted)
}

/// A number with its unit, or a sentence of our own: left alone unless it holds a character that Markdown reads.
pub(crate) fn number(own: &str) -> String {
    let calm = |c: char| {
        c.is_alphanumeric()
            || matches!(c, ' ' | '.' | ',' | '×' | '-' | '+' | '/' | '(' | ')' | '·' | '%' | '±' | '°')
    };
    if own.chars().all(calm) && !own.contains("www.") { own.to_owned() } else { escape::markdown(own) }
}

/// Names and signs of the user's as code; escaped as text where anything else stands among them.
pub(crate) fn names(untrusted: &str) -> String {
    let calm = |c: char| c.is_alphanumeric() || " _.->+*×()".contains(c);
    if !untrusted.is_empty() && untrusted.chars().all(calm) {
        format!("`{untrusted}`")
    } else {
        escape::markdown(untrusted)
    }
}

/// Words of our own as code.
pub(crate) fn code(own: &'static str) -> String {
    format!("`{own}`")
}

/// Paragraphs, tables and lists, one below the other.
#[derive(Debug, Default)]
pub(crate) struct Page {
    out: String,
}

impl Page {
    /// A paragraph; an empty one is left out.
    pub fn paragraph(&mut self, words: impl AsRef<str>) {
        let words = words.as_ref().trim();
        if words.is_empty() {
            return;
        }
        if !self.out.is_empty() {
            self.out.push_str("\n\n");
        }
        self.out.push_str(words);
    }

    /// A list; an empty one is left out.
    pub fn list(&mut self, entries: &[String]) {
        let lines: Vec<String> = entries.iter().map(|entry| format!("- {entry}")).collect();
        self.paragraph(lines.join("\n"));
    }

    /// A table, columns of numbers aligned right; columns without any entry are left out.
    pub fn table(&mut self, head: &[&str], rows: &[Vec<String>]) {
        let used = |at: &usize| rows.iter().any(|row| row.get(*at).is_some_and(|cell| !cell.is_empty()));
        let columns: Vec<usize> = (0..head.len()).filter(used).collect();
        if columns.is_empty() {
            return;
        }
        let line = |cells: Vec<&str>| format!("| {} |", cells.join(" | "));
        let mut lines = vec![
            line(columns.iter().map(|at| head[*at]).collect()),
            line(columns.iter().map(|at| if numeric(rows, *at) { "---:" } else { "---" }).collect()),
        ];
        for row in rows {
            lines.push(line(columns.iter().map(|at| row.get(*at).map_or("", String::as_str)).collect()));
        }
        self.paragraph(lines.join("\n"));
    }

    /// The Markdown.
    pub fn finish(self) -> String {
        self.out
    }
}

/// Whether all that stands in a column begins as a number does.
fn numeric(rows: &[Vec<String>], at: usize) -> bool {
    let number = |cell: &str| cell.starts_with(|c: char| c.is_ascii_digit() || c == '-');
    rows.iter().filter_map(|row| row.get(at)).filter(|cell| !cell.is_empty()).all(|cell| number(cell))
}

#[cfg(test)]
mod tests {
    use super::{Page, number};

    #[test]
    fn a_table_leaves_empty_columns_out() {
        let mut page = Page::default();
        page.table(&["case", "speed", "current"], &[vec!["plain".into(), "3 rpm".into(), String::new()]]);
        assert_eq!(page.finish(), "| case | speed |\n| --- | ---: |\n| plain | 3 rpm |");
    }

    #[test]
    fn numbers_stay_readable_and_the_rest_is_escaped() {
        assert_eq!(number("1.5e-7 kg·m²"), "1.5e-7 kg·m²");
        assert_eq!(number("a*b"), "a\\*b");
        assert_eq!(number("www.a"), "www\\.a");
    }
}
