//! `##` lines: they belong to the declaration right below; a block of them that a blank line follows, or above
//! `title`, describes the file.

use super::Piece;
use crate::token::{Comment, Token, TokenKind};

/// Hands documentation to the items; what is left describes the file.
pub(super) fn attach(
    text: &str,
    tokens: &[Token],
    comments: &[Comment],
    items: &mut [Piece],
) -> Vec<Comment> {
    let mut of_file = Vec::new();
    let docs: Vec<Comment> = comments.iter().copied().filter(|comment| comment.doc).collect();
    if docs.is_empty() {
        return of_file;
    }
    let mut next = 0;
    for item in items {
        let above = docs[next..].partition_point(|doc| doc.span.start < item.first) + next;
        let mut first = above;
        let mut below = item.first;
        while first > next && directly_above(text, docs[first - 1].span.end, below) {
            first -= 1;
            below = docs[first].span.start;
        }
        of_file.extend_from_slice(&docs[next..first]);
        if tokens.get(item.tokens.start).is_some_and(|token| token.kind == TokenKind::Title) {
            of_file.extend_from_slice(&docs[first..above]);
        } else if first < above {
            item.docs = docs[first..above].to_vec();
            item.base = below;
        }
        next = docs[above..].partition_point(|doc| doc.span.start < item.end) + above;
        item.inner_docs = docs[above..next].to_vec();
    }
    of_file.extend_from_slice(&docs[next..]);
    of_file
}

/// Whether one line end and nothing but blanks lies between.
pub(crate) fn directly_above(text: &str, end: u32, start: u32) -> bool {
    let Some(between) = text.get(end as usize..start as usize) else { return false };
    let between = between.replace("\r\n", "\n");
    let ends = between.chars().filter(|&c| c == '\n' || c == '\r').count();
    ends == 1 && between.chars().all(|c| c.is_whitespace() || c == '\u{feff}')
}
