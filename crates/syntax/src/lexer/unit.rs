//! Where a unit ends. Directly after a number stands a unit, and nowhere else but after `as` and in the head of a
//! table: the longest run of unit symbols whose operators stand tight on both sides.

use super::fold::{Role, continues_word, is_letter, is_superscript, role};
use crate::token::TokenKind;
use crate::words::word_kind;

/// Units of more than letters, longer ones before those they begin with. A test of the whole asks the language for every
/// unit of the table.
const ODD_SYMBOLS: &[&str] = &[
    "gal_us",
    "gal_imp",
    "g_n",
    "short_ton",
    "long_ton",
    "hp_electric",
    "hp_boiler",
    "mmH2O",
    "mH2O",
    "inH2O",
];

/// Bounds the brackets inside one unit.
const DEEPEST: u32 = 8;

/// The end of the unit that begins at `at`; `inverse` allows it to begin with `1/`.
pub(super) fn unit_end(text: &str, at: usize, inverse: bool) -> Option<usize> {
    match *text.as_bytes().get(at)? {
        b'a'..=b'z' | b'A'..=b'Z' | b'%' => product(text, at, 0),
        b'1' if inverse && text.as_bytes().get(at + 1) == Some(&b'/') => {
            let end = factor(text, at + 2, 0)?;
            Some(product_tail(text, end, 0))
        }
        byte if byte >= 0x80 => product(text, at, 0),
        _ => None,
    }
}

fn product(text: &str, at: usize, depth: u32) -> Option<usize> {
    let end = factor(text, at, depth)?;
    Some(product_tail(text, end, depth))
}

/// Goes on as long as an operator stands tight and a factor follows it.
fn product_tail(text: &str, mut end: usize, depth: u32) -> usize {
    while let Some(operator) = operator_len(text, end) {
        let Some(next) = factor(text, end + operator, depth) else { break };
        end = next;
    }
    end
}

/// The length of `*`, `/`, `·` or one of their look-alikes.
fn operator_len(text: &str, at: usize) -> Option<usize> {
    match *text.as_bytes().get(at)? {
        b'*' | b'/' => Some(1),
        byte if byte < 0x80 => None,
        _ => {
            let c = text[at..].chars().next()?;
            matches!(role(c), Role::Sign(TokenKind::Star | TokenKind::Slash)).then(|| c.len_utf8())
        }
    }
}

fn factor(text: &str, at: usize, depth: u32) -> Option<usize> {
    if text.as_bytes().get(at) == Some(&b'(') {
        if depth >= DEEPEST {
            return None;
        }
        let end = product(text, at + 1, depth + 1)?;
        return (text.as_bytes().get(end) == Some(&b')')).then(|| exponent(text, end + 1));
    }
    let end = symbol(text, at)?;
    Some(exponent(text, end))
}

/// One unit symbol. `m2` and `x_1` are names, `min(` is a call, reserved words are never units.
fn symbol(text: &str, at: usize) -> Option<usize> {
    let mut end = at;
    let bytes = text.as_bytes();
    match bytes.get(at)? {
        b'%' => return Some(at + 1),
        byte if *byte >= 0x80 => {
            let c = text[at..].chars().next()?;
            match c {
                '°' | 'º' | '˚' => {
                    end += c.len_utf8();
                    let lettered = matches!(bytes.get(end), Some(b'C' | b'F'));
                    return Some(end + usize::from(lettered));
                }
                '℃' | '℉' | '‰' => return Some(at + c.len_utf8()),
                _ => {}
            }
        }
        _ => {}
    }
    if let Some(odd) = odd_symbol(text, at) {
        return Some(odd);
    }
    let mut plain = true;
    loop {
        match bytes.get(end) {
            Some(b'a'..=b'z' | b'A'..=b'Z') => end += 1,
            Some(b'0'..=b'9' | b'_' | b'(') => return None,
            Some(&byte) if byte >= 0x80 => {
                let Some(c) = text[end..].chars().next() else { break };
                if is_letter(c) {
                    end += c.len_utf8();
                    plain = false;
                } else if is_superscript(c) || !continues_word(c) {
                    break;
                } else {
                    return None;
                }
            }
            _ => break,
        }
    }
    let reserved = plain && word_kind(&text[at..end]).is_some_and(TokenKind::is_reserved);
    (end > at && !reserved).then_some(end)
}

/// A unit such as `gal_us` or `mmH2O`: the whole word is one, and no call.
fn odd_symbol(text: &str, at: usize) -> Option<usize> {
    let rest = &text[at..];
    let odd = ODD_SYMBOLS.iter().find(|symbol| rest.starts_with(**symbol))?;
    let behind = rest[odd.len()..].chars().next();
    let ends = behind.is_none_or(|c| c != '(' && !continues_word(c));
    ends.then_some(at + odd.len())
}

/// Behind a factor: `^2`, `^-1`, `²`, `⁻¹`.
fn exponent(text: &str, at: usize) -> usize {
    let bytes = text.as_bytes();
    match bytes.get(at) {
        Some(b'^') => {
            let mut digits = at + 1;
            if bytes.get(digits) == Some(&b'-') {
                digits += 1;
            } else if let Some(c) = text[digits..].chars().next().filter(|&c| matches!(role(c), Role::Minus))
            {
                digits += c.len_utf8();
            }
            let length = bytes[digits..].iter().take_while(|byte| byte.is_ascii_digit()).count();
            if length > 0 { digits + length } else { at }
        }
        Some(&byte) if byte >= 0x80 => {
            at + text[at..].chars().take_while(|&c| is_superscript(c)).map(char::len_utf8).sum::<usize>()
        }
        _ => at,
    }
}
