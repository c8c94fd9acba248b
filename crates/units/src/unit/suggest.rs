//! What an unknown symbol may have been meant to be.

use super::symbols::{find, index};
use crate::closest::closest;
use crate::dimension::superscript;

/// Most suggestions given.
const MOST: usize = 3;
/// Longest symbol taken apart into known symbols.
const LONGEST_JOINED: usize = 12;

/// Spellings that no rule below would find, in lower case.
const KNOWN_SLIPS: &[(&str, &str)] = &[
    ("amp", "A"),
    ("amps", "A"),
    ("bhp", "hp"),
    ("cc", "cm³"),
    ("ccm", "cm³"),
    ("celsius", "°C"),
    ("day", "d"),
    ("days", "d"),
    ("degree", "°"),
    ("degrees", "°"),
    ("feet", "ft"),
    ("foot", "ft"),
    ("fpm", "ft/min"),
    ("fps", "ft/s"),
    ("ftlb", "lbf·ft"),
    ("ftlbs", "lbf·ft"),
    ("gram", "g"),
    ("grams", "g"),
    ("hour", "h"),
    ("hours", "h"),
    ("hr", "h"),
    ("hrs", "h"),
    ("inches", "in"),
    ("inlb", "lbf·in"),
    ("inlbs", "lbf·in"),
    ("joule", "J"),
    ("kelvin", "K"),
    ("kilo", "kg"),
    ("kmh", "km/h"),
    ("kmph", "km/h"),
    ("knot", "kn"),
    ("knots", "kn"),
    ("kph", "km/h"),
    ("kts", "kn"),
    ("lbft", "lbf·ft"),
    ("lbin", "lbf·in"),
    ("lbs", "lb"),
    ("liter", "l"),
    ("litre", "l"),
    ("lpm", "l/min"),
    ("meter", "m"),
    ("metre", "m"),
    ("mile", "mi"),
    ("miles", "mi"),
    ("mins", "min"),
    ("minute", "min"),
    ("minutes", "min"),
    ("mps", "m/s"),
    ("newton", "N"),
    ("nms", "N·m·s"),
    ("ohms", "Ω"),
    ("ozin", "ozf·in"),
    ("pascal", "Pa"),
    ("percent", "%"),
    ("pound", "lb"),
    ("pounds", "lb"),
    ("radian", "rad"),
    ("radians", "rad"),
    ("revs", "rev"),
    ("sec", "s"),
    ("secs", "s"),
    ("second", "s"),
    ("seconds", "s"),
    ("sqm", "m²"),
    ("tonne", "t"),
    ("tonnes", "t"),
    ("turn", "rev"),
    ("turns", "rev"),
    ("upm", "rpm"),
    ("volt", "V"),
    ("volts", "V"),
    ("watt", "W"),
    ("watts", "W"),
];

/// Up to three units that `symbol` may have been meant to be, the likeliest first.
pub(crate) fn suggestions(symbol: &str) -> Vec<String> {
    let lower = symbol.to_lowercase();
    let mut out: Vec<String> = Vec::new();
    let mut push = |text: String| {
        if out.len() < MOST && !out.contains(&text) {
            out.push(text);
        }
    };
    if let Some((_, unit)) = KNOWN_SLIPS.iter().find(|(slip, _)| *slip == lower) {
        push((*unit).to_owned());
    }
    for (spelling, found) in index() {
        if spelling.chars().flat_map(char::to_lowercase).eq(lower.chars()) {
            push(found.text());
        }
    }
    if let Some(text) = digits_as_power(symbol) {
        push(text);
    }
    if out.is_empty()
        && let Some(text) = taken_apart(symbol)
    {
        out.push(text);
    }
    if out.is_empty()
        && let Some(near) = closest(symbol, index().iter().map(|entry| entry.0.as_str()))
        && let Some(found) = find(near)
    {
        out.push(found.text());
    }
    out
}

/// `m2` as `m²`, `kgm2` as `kg·m²`.
fn digits_as_power(symbol: &str) -> Option<String> {
    let stem = symbol.trim_end_matches(|c: char| c.is_ascii_digit());
    let power: i32 = symbol.get(stem.len()..)?.parse().ok().filter(|power| (2..10).contains(power))?;
    let unit = find(stem).map(|found| found.text()).or_else(|| taken_apart(stem))?;
    Some(format!("{unit}{}", superscript(power)))
}

/// `Nms` as `N·m·s`: the longest known symbol from the left, and again.
fn taken_apart(symbol: &str) -> Option<String> {
    if symbol.len() > LONGEST_JOINED {
        return None;
    }
    let mut parts = Vec::new();
    let mut rest = symbol;
    while !rest.is_empty() {
        let cut = (1..=rest.len())
            .rev()
            .filter(|&end| rest.is_char_boundary(end))
            .find(|&end| find(&rest[..end]).is_some())?;
        let (head, tail) = rest.split_at(cut);
        parts.push(find(head)?.text());
        rest = tail;
    }
    (parts.len() <= 4).then(|| parts.join("·"))
}
