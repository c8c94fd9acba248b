//! The first look at a text: control characters, invisible characters and marks of writing direction, wherever
//! they stand (in comments and texts too).

use layshaft_diagnostics::{Code, Span};

use super::fold::{is_direction, is_invisible};
use crate::tree::Problem;

/// Reports each run of unreadable characters once.
pub(super) fn unreadable(text: &str, problems: &mut Vec<Problem>) {
    let mut at = 0;
    while let Some(start) = next_suspect(text.as_bytes(), at) {
        let Some(c) = text[start..].chars().next() else { return };
        at = start + c.len_utf8();
        let Some(sort) = sort(c) else { continue };
        while let Some(next) = text[at..].chars().next().filter(|&next| self::sort(next) == Some(sort)) {
            at += next.len_utf8();
        }
        problems.push(problem(sort, c, Span::new(start as u32, at as u32)));
    }
}

/// The next byte that a character of interest can begin with. Looked for in runs, which costs a fraction of a look
/// at each byte.
fn next_suspect(bytes: &[u8], from: usize) -> Option<usize> {
    let mut at = from;
    for run in bytes[from..].chunks(32) {
        if run.iter().fold(false, |any, &byte| any | suspect(byte)) {
            return run.iter().position(|&byte| suspect(byte)).map(|skip| at + skip);
        }
        at += run.len();
    }
    None
}

/// Whether a character of interest can begin with this byte.
const fn suspect(byte: u8) -> bool {
    // Without branches, so that a run is looked at in one go.
    ((byte < 0x20) & (byte != b'\t') & (byte != b'\n') & (byte != b'\r'))
        | (byte == 0x7f)
        | (byte == 0xc2)
        | (byte == 0xd8)
        | (byte == 0xe2)
        | (byte == 0xef)
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
    let row = if sort == Sort::Direction { Code::WritingDirection } else { Code::BadText };
    let message = match sort {
        Sort::Control => format!("a control character (U+{code:04X}) stands here"),
        Sort::Direction => {
            format!(
                "a mark of writing direction (U+{code:04X}) stands here: the text may read otherwise than it is"
            )
        }
        Sort::Invisible => format!("an invisible character (U+{code:04X}) stands here"),
    };
    Problem::new(row, span, message).fix("take it out", span, "")
}
