//! The first look at a text: control characters, invisible characters and marks of writing direction, wherever
//! they stand (in comments and texts too).

use layshaft_diagnostics::{Code, Span};

use super::fold::{is_direction, is_invisible};
use crate::tree::Problem;

/// Reports each run of unreadable characters once.
pub(super) fn unreadable(text: &str, problems: &mut Vec<Problem>) {
    let bytes = text.as_bytes();
    let mut at = 0;
    while let Some(skip) = bytes[at..].iter().position(|&byte| suspect(byte)) {
        let start = at + skip;
        let Some(c) = text[start..].chars().next() else { return };
        at = start + c.len_utf8();
        let Some(sort) = sort(c) else { continue };
        while let Some(next) = text[at..].chars().next().filter(|&next| self::sort(next) == Some(sort)) {
            at += next.len_utf8();
        }
        problems.push(problem(sort, c, Span::new(start as u32, at as u32)));
    }
}

/// Whether a character of interest can begin with this byte.
const fn suspect(byte: u8) -> bool {
    (byte < 0x20 && byte != b'\t' && byte != b'\n' && byte != b'\r')
        || matches!(byte, 0x7f | 0xc2 | 0xd8 | 0xe2 | 0xef)
}

#[derive(Clone, Copy, PartialEq, Eq)]
enum Sort {
    Control,
    Direction,
    Invisible,
}

const fn sort(c: char) -> Option<Sort> {
    match c {
        '\t' | '\n' | '\r' => None,
        '\0'..='\u{1f}' | '\u{7f}'..='\u{9f}' => Some(Sort::Control),
        _ if is_direction(c) => Some(Sort::Direction),
        _ if is_invisible(c) => Some(Sort::Invisible),
        _ => None,
    }
}

fn problem(sort: Sort, c: char, span: Span) -> Problem {
    let code = c as u32;
    let message = match sort {
        Sort::Control => format!("a control character (U+{code:04X}) stands here"),
        Sort::Direction => {
            format!(
                "a mark of writing direction (U+{code:04X}) stands here: the text may read otherwise than it is"
            )
        }
        Sort::Invisible => format!("an invisible character (U+{code:04X}) stands here"),
    };
    Problem::new(Code::BadText, span, message).fix("take it out", span, "")
}
