//! The one spelling of each token: signs as the trade prints them, numbers and texts as written.

use std::borrow::Cow;

use crate::lexer::{name_text, unit_text};
use crate::token::TokenKind;

/// The spelling of a token that stands as `text` in the spec.
pub(super) fn spelling(kind: TokenKind, text: &str) -> Cow<'_, str> {
    use TokenKind as K;
    let sign = match kind {
        K::Star => "×",
        K::PlusMinus => "±",
        K::Minus => "-",
        K::Slash => "/",
        K::Arrow => "->",
        K::DotDot => "..",
        K::LessEqual => "<=",
        K::GreaterEqual => ">=",
        K::NotEqual => "!=",
        K::Unit => return unit(text),
        K::Name if !text.is_ascii() => return Cow::Owned(name_text(text).into()),
        K::SignedNumber if !text.starts_with('-') => return Cow::Owned(format!("-{}", without_first(text))),
        K::String if !text.starts_with('"') => return Cow::Owned(format!("\"{}\"", without_ends(text))),
        _ => text,
    };
    Cow::Borrowed(sign)
}

/// A unit: `·` for a product, superscripts for whole powers; the unit itself stays the writer's.
fn unit(text: &str) -> Cow<'_, str> {
    if text.bytes().all(|byte| byte.is_ascii_alphabetic() || byte == b'/' || byte == b'%') {
        return Cow::Borrowed(text);
    }
    let folded = unit_text(text);
    let mut out = String::with_capacity(folded.len() + 2);
    let mut rest = &*folded;
    while let Some(c) = rest.chars().next() {
        rest = &rest[c.len_utf8()..];
        match c {
            '*' => out.push('·'),
            '^' => {
                let digits = rest.strip_prefix('-').unwrap_or(rest);
                let length =
                    digits.bytes().take_while(u8::is_ascii_digit).count() + rest.len() - digits.len();
                out.push_str(&superscript(&rest[..length]));
                rest = &rest[length..];
            }
            _ => out.push(c),
        }
    }
    Cow::Owned(out)
}

/// A whole number as a power: `-2` is `⁻²`.
pub(super) fn superscript(number: &str) -> String {
    const DIGITS: [char; 10] = ['⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹'];
    let raised = |c: char| c.to_digit(10).map_or('⁻', |digit| DIGITS[digit as usize % 10]);
    number.chars().map(raised).collect()
}

fn without_first(text: &str) -> &str {
    let mut chars = text.chars();
    chars.next();
    chars.as_str()
}

fn without_ends(text: &str) -> &str {
    let mut chars = text.chars();
    chars.next();
    chars.next_back();
    chars.as_str()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn signs_have_one_spelling() {
        let cases = [
            (TokenKind::Star, "*", "×"),
            (TokenKind::Star, "·", "×"),
            (TokenKind::PlusMinus, "+/-", "±"),
            (TokenKind::Arrow, "→", "->"),
            (TokenKind::LessEqual, "≤", "<="),
            (TokenKind::SignedNumber, "−20", "-20"),
            (TokenKind::SignedNumber, "-1e3", "-1e3"),
            (TokenKind::Number, "1_000", "1_000"),
            (TokenKind::String, "“mill”", "\"mill\""),
            (TokenKind::String, "\"a “b” c\"", "\"a “b” c\""),
        ];
        for (kind, text, expected) in cases {
            assert_eq!(spelling(kind, text), expected);
        }
    }

    #[test]
    fn units_stay_the_writers() {
        let cases = [
            ("kg*m^2", "kg·m²"),
            ("N⋅m", "N·m"),
            ("min^-1", "min⁻¹"),
            ("1/min", "1/min"),
            ("W/(m^2*K)", "W/(m²·K)"),
            ("µm", "μm"),
            ("km/h", "km/h"),
            ("m^12/s", "m¹²/s"),
            ("º", "°"),
            ("℃", "°C"),
            ("ohm", "ohm"),
        ];
        for (text, expected) in cases {
            assert_eq!(unit(text), expected);
            assert_eq!(unit(expected), expected);
        }
    }
}
