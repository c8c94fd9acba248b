//! From a spec to a sentence of the grammar's terminals.
//!
//! Which line ends mean something is found here once more, from the words of the grammar alone, so that the parser
//! cannot read lines in another way than the grammar says.

use layshaft_syntax::{Token, TokenKind as K, lex};

/// A token as a terminal: what it may be, the first that fits is meant, and its place in the text.
pub type Terminal = (Vec<String>, usize);

/// The terminals of a spec.
pub fn sentence(text: &str) -> Vec<Terminal> {
    let tokens = lex(text).tokens;
    let mut out: Vec<Terminal> = Vec::new();
    let mut open: Vec<K> = Vec::new();
    let mut rows_ahead = false;
    let mut at = 0;
    while let Some(token) = tokens.get(at) {
        let before = at.checked_sub(1).map(|before| tokens[before].kind);
        let next = tokens.get(at + 1).map(|next| next.kind);
        let in_rows = open.last() == Some(&K::Points);
        at += 1;
        match token.kind {
            K::Newline if goes_on(before, next, open.last().copied()) => continue,
            K::LeftBrace => open.push(if std::mem::take(&mut rows_ahead) { K::Points } else { K::LeftBrace }),
            K::LeftParen | K::LeftSquare => open.push(token.kind),
            K::RightParen | K::RightSquare | K::RightBrace => drop(open.pop()),
            K::Points => rows_ahead = next == Some(K::LeftParen),
            K::Minus if in_rows && tokens.get(at).is_some_and(|next| is_signed(token, next)) => {
                out.push((vec!["NEGATIVE".into()], token.span.start as usize));
                at += 1;
                continue;
            }
            _ => {}
        }
        let word = &text[token.span.start as usize..token.span.end as usize];
        let number = matches!(next, Some(K::Number | K::SignedNumber));
        let special = match word {
            "reduction" | "increase" if number || next == Some(K::Name) => Some("RATIO"),
            "teeth" if number || next == Some(K::Name) => Some("TEETH"),
            _ if is_duty(word) && (number || next.is_none_or(ends_value)) => Some("DUTY"),
            _ => None,
        };
        // Inside a block only `allow` declares.
        let named = token.kind.is_declaration() && token.kind != K::Allow && !open.is_empty();
        let plain = if named { K::Name } else { token.kind };
        let terminals = special.into_iter().map(String::from).chain([terminal(plain)]).collect();
        out.push((terminals, token.span.start as usize));
        if token.kind == K::Allow {
            out.push((vec!["CODE".into()], token.span.end as usize));
            while tokens.get(at).is_some_and(|part| part.kind != K::Because) {
                at += 1;
            }
        }
    }
    out
}

fn is_duty(word: &str) -> bool {
    word.strip_prefix('S')
        .and_then(|digits| digits.parse::<u8>().ok())
        .is_some_and(|type_| (1..=10).contains(&type_))
}

/// What can stand behind a whole value.
fn ends_value(next: K) -> bool {
    matches!(next, K::Newline | K::Semicolon | K::RightBrace | K::RightSquare | K::Comma)
        || matches!(next, K::From | K::Measured | K::Assumed)
}

/// In a row, a minus that stands tight before a number is its sign.
fn is_signed(minus: &Token, number: &Token) -> bool {
    number.kind == K::Number && minus.span.end == number.span.start
}

/// The terminal of a kind of token.
pub fn terminal(kind: K) -> String {
    match kind {
        K::Name => "NAME",
        K::Number => "NUMBER",
        K::SignedNumber => "NEGATIVE",
        K::Unit => "UNIT",
        K::String => "STRING",
        K::Superscript => "SUPERSCRIPT",
        K::Less | K::LessEqual | K::Greater | K::GreaterEqual | K::EqualEqual | K::NotEqual => "COMPARE",
        K::Newline => "NL",
        _ => return kind.describe().replace('`', "\""),
    }
    .into()
}

/// Whether a statement goes on behind a line end.
fn goes_on(before: Option<K>, next: Option<K>, open: Option<K>) -> bool {
    let Some(next) = next else { return false };
    match open {
        Some(K::LeftParen | K::LeftSquare) => return true,
        Some(K::Points) => return false,
        _ => {}
    }
    let leaves_open = matches!(
        before,
        Some(
            K::Plus
                | K::Minus
                | K::Star
                | K::Slash
                | K::Caret
                | K::PlusMinus
                | K::Equal
                | K::Comma
                | K::Arrow
        ) | Some(
            K::Less | K::LessEqual | K::Greater | K::GreaterEqual | K::EqualEqual | K::NotEqual | K::DotDot
        ) | Some(K::And | K::Or | K::Not | K::If | K::Then | K::Else)
    );
    leaves_open || next == K::Arrow || next.is_reserved() || (open.is_none() && next == K::LeftBrace)
}

/// The line of the text that a token stands in, for messages.
pub fn line_at(text: &str, at: usize) -> &str {
    let begin = text[..at].rfind('\n').map_or(0, |end| end + 1);
    text[begin..].lines().next().unwrap_or_default()
}
