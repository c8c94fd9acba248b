//! Numbers in the sentences of findings, in the unit a kind is usually given in.

use layshaft_mechanics::fault::Note;

/// A number with four significant digits, no exponent where a person would write none.
pub(crate) fn plain(value: f64) -> String {
    significant(value, 4)
}

/// A number with so many significant digits, trailing zeros of the fraction cut.
#[must_use]
pub fn significant(value: f64, digits: usize) -> String {
    if value == 0.0 || !value.is_finite() {
        return if value == 0.0 { "0".to_owned() } else { value.to_string() };
    }
    let written = format!("{value:.*e}", digits.saturating_sub(1));
    let Some((_, exponent)) = written.split_once('e') else { return written };
    let exponent: i32 = exponent.parse().unwrap_or(0);
    if !(-4..=8).contains(&exponent) {
        return written.replace("e0", "");
    }
    let decimals = (digits as i32 - 1 - exponent).max(0) as usize;
    // Rounding to the significant digits comes first, so that 9999.96 is 10000 and not 9999.
    let rounded: f64 = written.parse().unwrap_or(value);
    let mut text = format!("{rounded:.decimals$}");
    if text.contains('.') {
        text.truncate(text.trim_end_matches('0').trim_end_matches('.').len());
    }
    text
}

/// An SI value of a kind in its usual unit: `1450 rpm`.
#[must_use]
pub fn in_usual_unit(si: f64, kind: &str) -> String {
    let Some(kind) = layshaft_units::kind(kind) else { return plain(si) };
    in_unit(si, kind.unit)
}

/// An SI value in a unit.
#[must_use]
pub fn in_unit(si: f64, unit: &str) -> String {
    match layshaft_units::parse_unit(unit) {
        Ok(unit) => {
            let number = plain(unit.from_si(si));
            if unit.text.is_empty() { number } else { format!("{number} {}", unit.text) }
        }
        Err(_) => plain(si),
    }
}

/// The sentence of a note, its quantities in the units their kinds are usually given in.
#[must_use]
pub fn note(note: &Note) -> String {
    let mut text = note.template.to_owned();
    for (index, (si, kind)) in note.quantities.iter().enumerate() {
        text = text.replace(&format!("{{{index}}}"), &in_usual_unit(*si, kind));
    }
    text
}

#[cfg(test)]
mod tests {
    use super::significant;

    #[test]
    fn numbers_are_written_as_a_person_would() {
        for (value, text) in [
            (0.0, "0"),
            (-0.0, "0"),
            (1450.0, "1450"),
            (23.547_1, "23.55"),
            (0.012_345_6, "0.01235"),
            (9999.96, "10000"),
            (1_234_567.0, "1235000"),
            (1.5e12, "1.500e12"),
        ] {
            assert_eq!(significant(value, 4), text);
        }
    }
}
