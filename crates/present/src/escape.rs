//! Strings of specs and CSV files are not trusted: each exit has its own way of making them harmless.

use std::borrow::Cow;

/// For a terminal: control characters (C0, C1, DEL), line and paragraph separators, and characters that turn or
/// hide text are written out as `\u{202e}`, a line feed as `\n`.
#[must_use]
pub fn terminal(text: &str) -> Cow<'_, str> {
    if !text.chars().any(is_hostile) {
        return Cow::Borrowed(text);
    }
    let mut out = String::with_capacity(text.len() + 16);
    for c in text.chars() {
        match c {
            '\n' => out.push_str("\\n"),
            '\r' => out.push_str("\\r"),
            '\t' => out.push_str("\\t"),
            c if is_hostile(c) => out.extend(c.escape_unicode()),
            c => out.push(c),
        }
    }
    Cow::Owned(out)
}

/// Whether a character can steer a terminal, turn the direction of text or hide in it.
#[must_use]
pub const fn is_hostile(c: char) -> bool {
    matches!(c,
        '\0'..='\u{1f}' | '\u{7f}'..='\u{9f}'
        | '\u{ad}' | '\u{61c}' | '\u{180e}'
        | '\u{200b}' | '\u{200e}' | '\u{200f}'
        | '\u{2028}'..='\u{202e}' | '\u{2060}'..='\u{206f}'
        | '\u{feff}' | '\u{fff9}'..='\u{fffb}' | '\u{e0000}'..='\u{e007f}')
}

/// For Markdown: every character with a meaning there is escaped and HTML is taken apart, so that neither a link
/// nor an image nor a tag of the user's comes through. Line ends become blanks.
#[must_use]
pub fn markdown(text: &str) -> String {
    let mut out = String::with_capacity(text.len() + 16);
    for c in text.chars() {
        match c {
            '\n' | '\r' | '\t' => out.push(' '),
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            c if is_hostile(c) => out.push('\u{fffd}'),
            // A bare address would become a link in many viewers: its colon and dots are taken apart too.
            ':' => out.push_str("&#58;"),
            '@' => out.push_str("&#64;"),
            '\\' | '`' | '*' | '_' | '{' | '}' | '[' | ']' | '(' | ')' | '#' | '+' | '-' | '.' | '!'
            | '|' | '~' | '$' | '=' => {
                out.push('\\');
                out.push(c);
            }
            c => out.push(c),
        }
    }
    out
}

/// For the text and the attributes of HTML and SVG.
#[must_use]
pub fn html(text: &str) -> String {
    let mut out = String::with_capacity(text.len() + 16);
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\'' => out.push_str("&#39;"),
            '\n' | '\t' => out.push(c),
            c if is_hostile(c) => out.push('\u{fffd}'),
            c => out.push(c),
        }
    }
    out
}

/// For a cell of a CSV file: quoted where needed (RFC 4180), and a text that a spreadsheet would run as a formula
/// (it begins with `=`, `+`, `-`, `@`) gets an apostrophe before it, unless it is a plain number.
#[must_use]
pub fn csv(text: &str) -> String {
    let clean: String = text.chars().map(|c| if is_hostile(c) { ' ' } else { c }).collect();
    let runs =
        clean.trim_start().starts_with(['=', '+', '-', '@', '\u{ff1d}', '\u{ff0b}', '\u{ff0d}', '\u{ff20}']);
    let clean = if runs && clean.trim().parse::<f64>().is_err() { format!("'{clean}") } else { clean };
    if clean.contains(['"', ',', ';']) || clean != clean.trim() {
        format!("\"{}\"", clean.replace('"', "\"\""))
    } else {
        clean
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    #[test]
    fn a_terminal_gets_no_control_and_no_turned_text() {
        assert_eq!(terminal("Mill hoist H3 · 1.2 kN·m ≤ 5"), "Mill hoist H3 · 1.2 kN·m ≤ 5");
        assert_eq!(terminal("a\u{1b}[31mb\u{9b}c\nd"), "a\\u{1b}[31mb\\u{9b}c\\nd");
        assert_eq!(terminal("x\u{202e}y\u{2066}z\u{feff}"), "x\\u{202e}y\\u{2066}z\\u{feff}");
    }

    #[test]
    fn markdown_shows_what_was_written() {
        assert_eq!(markdown("![x](http://a.b)"), "\\!\\[x\\]\\(http&#58;//a\\.b\\)");
        assert_eq!(markdown("<img src=x>\n# y"), "&lt;img src\\=x&gt; \\# y");
    }

    #[test]
    fn html_is_taken_apart() {
        assert_eq!(html("<a href='x' b=\"y\">&"), "&lt;a href=&#39;x&#39; b=&quot;y&quot;&gt;&amp;");
    }

    #[test]
    fn a_cell_neither_breaks_out_nor_runs() {
        assert_eq!(csv("plain"), "plain");
        assert_eq!(csv("=HYPERLINK(\"x\")"), "\"'=HYPERLINK(\"\"x\"\")\"");
        assert_eq!(csv("-12.5"), "-12.5");
        assert_eq!(csv("a\r\nb"), "a  b");
        assert_eq!(csv("-1+cmd|x"), "'-1+cmd|x");
    }

    proptest! {
        #[test]
        fn nothing_hostile_comes_out(text in any::<String>()) {
            for out in [terminal(&text).into_owned(), markdown(&text), csv(&text)] {
                prop_assert!(!out.chars().any(is_hostile));
            }
            let out = html(&text);
            prop_assert!(!out.chars().any(|c| is_hostile(c) && c != '\n' && c != '\t'));
            prop_assert!(!out.contains(['<', '>', '"']));
        }
    }
}
