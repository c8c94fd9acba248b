//! Laws of the formatter: nothing is lost, nothing changes its meaning, twice is once.

use layshaft_syntax::format::{Formatted, format as write};
use layshaft_syntax::{File, lex};

use super::debug;

/// Formats any text.
///
/// # Panics
/// A law is broken.
pub fn format(text: &str) {
    let Formatted { text: written, skipped } = write(text);
    debug::same(&write(&written).text, &written, "formatting twice is not formatting once");
    assert_eq!(comments(&written), comments(text), "comments are not the same in the same order");
    let (before, after) = (layshaft_syntax::parse(text), layshaft_syntax::parse(&written));
    assert_eq!(before.items.len(), after.items.len(), "there are not as many items");
    if is_clean(&before) {
        assert!(skipped.is_empty(), "an item without a finding was left as it was");
        debug::same(&trees(&after), &trees(&before), "the tree is another");
        assert!(is_clean(&after), "formatting makes findings");
    }
}

fn is_clean(file: &File) -> bool {
    file.problems.is_empty() && file.items.iter().all(|item| item.tree.problems.is_empty())
}

/// The trees without their places, units by what they say: `N*m^2` is `N·m²`.
fn trees(file: &File) -> String {
    let form: String = file.items.iter().map(|item| format!("{:?}\n", item.tree)).collect();
    let form = debug::without_spans(&form);
    let mut parts = form.split("UnitText { text: \"");
    let mut out = String::from(parts.next().unwrap_or_default());
    for part in parts {
        let (unit, rest) = part.split_once('"').unwrap_or((part, ""));
        out.extend(unit.chars().filter(|sign| *sign != '^').map(one_sign));
        out.push_str(rest);
    }
    out
}

fn one_sign(sign: char) -> char {
    const POWERS: [char; 11] = ['⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹', '⁻'];
    match POWERS.iter().position(|power| *power == sign) {
        Some(10) => '-',
        Some(digit) => char::from(b'0' + digit as u8),
        None if matches!(sign, '*' | '⋅' | '×') => '·',
        None => sign,
    }
}

fn comments(text: &str) -> Vec<String> {
    let shown = |span: layshaft_diagnostics::Span| text.get(span.start as usize..span.end as usize);
    lex(text).comments.iter().map(|one| shown(one.span).unwrap_or_default().trim_end().to_string()).collect()
}
