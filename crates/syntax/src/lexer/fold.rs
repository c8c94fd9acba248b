//! Characters that look alike are one: how each is read, and the normal form of names and units.
//!
//! Spans always refer to the user's own bytes; only the texts of names and units are folded.

use unicode_normalization::{UnicodeNormalization, is_nfc};

use crate::token::TokenKind;

/// How a character outside ASCII is read.
pub(super) enum Role {
    /// Part of a word.
    Letter,
    /// As a sign of the language.
    Sign(TokenKind),
    /// As `-`.
    Minus,
    /// As a blank.
    Blank,
    /// Invisible: reported already by the first look at the text, and skipped.
    Invisible,
    /// Opens a text.
    Quote,
    /// Part of a power.
    Superscript,
    /// A subscript digit: the ASCII digit that is meant.
    Subscript(char),
    /// A fraction of one character: its decimal spelling.
    Fraction(&'static str),
    /// `°`, `‰` and the like.
    UnitSign,
    /// `′`
    Prime,
    /// `″`
    DoublePrime,
    /// Anything else.
    Other,
}

pub(super) fn role(c: char) -> Role {
    match c {
        '·' | '\u{387}' | '⋅' | '∙' | '•' | '×' => Role::Sign(TokenKind::Star),
        '÷' => Role::Sign(TokenKind::Slash),
        '…' => Role::Sign(TokenKind::DotDot),
        '→' | '⟶' => Role::Sign(TokenKind::Arrow),
        '≤' => Role::Sign(TokenKind::LessEqual),
        '≥' => Role::Sign(TokenKind::GreaterEqual),
        '≠' => Role::Sign(TokenKind::NotEqual),
        '±' => Role::Sign(TokenKind::PlusMinus),
        '−' | '–' | '—' | '\u{2010}' | '\u{2011}' => Role::Minus,
        '“' | '”' | '„' => Role::Quote,
        '°' | 'º' | '˚' | '℃' | '℉' | '‰' => Role::UnitSign,
        '′' | '’' => Role::Prime,
        '″' => Role::DoublePrime,
        '₀'..='₉' => Role::Subscript(char::from(b'0' + (c as u32 - '₀' as u32) as u8)),
        _ if is_blank(c) => Role::Blank,
        _ if is_invisible(c) => Role::Invisible,
        _ if is_superscript(c) => Role::Superscript,
        _ if is_letter(c) => Role::Letter,
        _ => fraction(c).map_or(Role::Other, Role::Fraction),
    }
}

/// Blanks outside ASCII.
pub(super) const fn is_blank(c: char) -> bool {
    matches!(c, '\u{a0}' | '\u{1680}' | '\u{2000}'..='\u{200a}' | '\u{202f}' | '\u{205f}' | '\u{3000}')
}

/// Characters nobody sees: zero widths, byte order marks and marks of writing direction.
pub(super) const fn is_invisible(c: char) -> bool {
    matches!(c, '\u{ad}' | '\u{200b}'..='\u{200d}' | '\u{2060}' | '\u{feff}') || is_direction(c)
}

/// Marks that turn the direction in which a text is shown.
pub(super) const fn is_direction(c: char) -> bool {
    matches!(c, '\u{61c}' | '\u{200e}' | '\u{200f}' | '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}')
}

pub(super) const fn is_superscript(c: char) -> bool {
    matches!(c, '⁰' | '¹' | '²' | '³' | '⁴'..='⁹' | '⁻')
}

/// A power in superscripts as plain text: `⁻¹` is `-1`.
pub(crate) fn superscript_text(text: &str) -> String {
    text.chars().map(superscript_char).collect()
}

fn superscript_char(c: char) -> char {
    match c {
        '⁰' => '0',
        '¹' => '1',
        '²' => '2',
        '³' => '3',
        '⁴'..='⁹' => char::from(b'4' + (c as u32 - '⁴' as u32) as u8),
        '⁻' => '-',
        _ => c,
    }
}

/// Whether a word can begin with it. Ordinal signs look like the degree sign and are read as one.
pub(super) fn is_letter(c: char) -> bool {
    !matches!(c, 'º' | 'ª') && unicode_ident::is_xid_start(c)
}

/// Whether a word can go on with it. `·` is a "continue" character of Unicode and never one here: `N·m`.
pub(super) fn continues_word(c: char) -> bool {
    !matches!(c, 'º' | 'ª' | '·' | '\u{387}') && unicode_ident::is_xid_continue(c)
}

fn fraction(c: char) -> Option<&'static str> {
    Some(match c {
        '½' => "0.5",
        '¼' => "0.25",
        '¾' => "0.75",
        '⅕' => "0.2",
        '⅖' => "0.4",
        '⅗' => "0.6",
        '⅘' => "0.8",
        '⅛' => "0.125",
        '⅜' => "0.375",
        '⅝' => "0.625",
        '⅞' => "0.875",
        '⅓' => "(1/3)",
        '⅔' => "(2/3)",
        '⅙' => "(1/6)",
        '⅚' => "(5/6)",
        _ => return None,
    })
}

/// The text of a name: look-alikes folded, subscripts and invisible characters resolved, normal form C.
pub(crate) fn name_text(text: &str) -> Box<str> {
    if text.is_ascii() {
        return text.into();
    }
    let folded: String = text
        .chars()
        .filter_map(|c| match (c, role(c)) {
            ('µ', _) => Some('μ'),
            (_, Role::Subscript(digit)) => Some(digit),
            (_, Role::Invisible) => None,
            _ => Some(c),
        })
        .collect();
    if is_nfc(&folded) { folded.into() } else { folded.nfc().collect::<String>().into() }
}

/// The text of a unit: one spelling of every sign (`·`, `/`, `^` and superscripts as written, `μ`, `Ω`, `°`).
pub(crate) fn unit_text(text: &str) -> Box<str> {
    if text.is_ascii() {
        return text.into();
    }
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match (c, role(c)) {
            ('µ', _) => out.push('μ'),
            ('\u{2126}', _) => out.push('Ω'),
            ('℃', _) => out.push_str("°C"),
            ('℉', _) => out.push_str("°F"),
            ('º' | '˚', _) => out.push('°'),
            (_, Role::Sign(TokenKind::Star)) => out.push('·'),
            (_, Role::Sign(TokenKind::Slash)) => out.push('/'),
            (_, Role::Minus) => out.push('-'),
            (_, Role::Invisible) => {}
            _ => out.push(c),
        }
    }
    if is_nfc(&out) { out.into() } else { out.nfc().collect::<String>().into() }
}
