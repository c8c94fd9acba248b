//! Finding a symbol, with its prefix, in the table of units.

use std::borrow::Cow;
use std::sync::OnceLock;

use super::rows::{PREFIXES, Prefixes, ROWS, UnitRow};

/// A symbol of the table with its prefix.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Symbol {
    pub row: &'static UnitRow,
    /// Canonical prefix, empty if none.
    pub prefix: &'static str,
    /// Power of ten of the prefix.
    pub tens: i32,
}

impl Symbol {
    /// The spelling the formatter writes.
    pub fn text(&self) -> String {
        format!("{}{}", self.prefix, self.row.symbol)
    }
}

/// Every spelling of every symbol with every prefix it takes, sorted.
pub(crate) fn index() -> &'static [(String, Symbol)] {
    static INDEX: OnceLock<Vec<(String, Symbol)>> = OnceLock::new();
    INDEX.get_or_init(|| {
        let mut all = Vec::new();
        for row in ROWS {
            for spelling in std::iter::once(&row.symbol).chain(row.also) {
                all.push(((*spelling).to_owned(), Symbol { row, prefix: "", tens: 0 }));
                for (prefix, also, tens) in PREFIXES {
                    if takes(row.prefixes, prefix) {
                        for written in std::iter::once(prefix).chain(*also) {
                            all.push((format!("{written}{spelling}"), Symbol { row, prefix, tens: *tens }));
                        }
                    }
                }
            }
        }
        all.sort_by(|a, b| a.0.cmp(&b.0));
        all
    })
}

fn takes(prefixes: Prefixes, prefix: &str) -> bool {
    match prefixes {
        Prefixes::None => false,
        Prefixes::All => true,
        Prefixes::Only(list) => list.contains(&prefix),
    }
}

/// The symbol written so.
pub(crate) fn find(text: &str) -> Option<Symbol> {
    let folded = fold(text);
    let index = index();
    index
        .binary_search_by(|entry| entry.0.as_str().cmp(&folded))
        .ok()
        .and_then(|at| index.get(at))
        .map(|e| e.1)
}

/// One spelling for characters that look or mean the same: both micro signs, both ohm signs, the degree sign
/// and its doubles.
fn fold(text: &str) -> Cow<'_, str> {
    if text.is_ascii() {
        return Cow::Borrowed(text);
    }
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '\u{b5}' => out.push('μ'),
            '\u{2126}' => out.push('Ω'),
            '\u{ba}' | '\u{2da}' => out.push('°'),
            '\u{2103}' => out.push_str("°C"),
            '\u{2109}' => out.push_str("°F"),
            other => out.push(other),
        }
    }
    Cow::Owned(out)
}

#[cfg(test)]
mod tests {
    use super::{find, index};

    #[test]
    fn no_spelling_has_two_readings() {
        for pair in index().windows(2) {
            assert_ne!(pair[0].0, pair[1].0);
        }
    }

    #[test]
    fn prefixes_do_not_misread_the_trade() {
        for (text, name) in [
            ("min", "minute"),
            ("ft", "foot"),
            ("cd", "candela"),
            ("PS", "metric horsepower"),
            ("kn", "knot"),
        ] {
            assert!(
                find(text).is_some_and(|s| s.prefix.is_empty() && s.row.name.starts_with(name)),
                "{text}"
            );
        }
        assert!(find("kN").is_some_and(|s| s.row.symbol == "N" && s.tens == 3));
        assert_eq!(find("kt"), None);
        assert_eq!(find("mmin"), None);
    }

    #[test]
    fn one_symbol_has_one_spelling() {
        for (a, b) in
            [("\u{b5}m", "\u{3bc}m"), ("um", "\u{b5}m"), ("mOhm", "mΩ"), ("kohm", "k\u{2126}"), ("deg", "°")]
        {
            assert_eq!(find(a), find(b));
            assert!(find(a).is_some());
        }
        assert_eq!(find("degC"), find("\u{2103}"));
        assert_eq!(find("\u{ba}C").map(|s| s.text()), Some("°C".to_owned()));
    }
}
