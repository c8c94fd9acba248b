//! Numbers for the end of a line: four significant digits, padded so that a changing digit does not move the text.

use layshaft_present::number::{digits, percent};
use layshaft_present::shown::joined;
use layshaft_present::unit::convert;

/// Digits of a hint.
const DIGITS: usize = 4;

/// As wide as four digits and their point.
const WIDTH: usize = DIGITS + 1;

/// A blank as wide as a digit, so that the text stays where it is.
const FIGURE_SPACE: char = '\u{2007}';

/// An SI value in a unit.
pub(super) fn figure(si: f64, unit: &str) -> String {
    let number = if unit == "%" { percent(si) } else { digits(convert(si, unit), DIGITS) };
    joined(&padded(&number), unit)
}

/// The number with figure spaces before it, as wide as four digits and a point.
pub(super) fn padded(number: &str) -> String {
    let lacks = WIDTH.saturating_sub(number.chars().count());
    let mut out: String = std::iter::repeat_n(FIGURE_SPACE, lacks).collect();
    out.push_str(number);
    out
}

/// The first of these texts that is not too long; the last one cut where none is.
pub(super) fn fitting(candidates: &[String]) -> String {
    let fits = |text: &&String| text.chars().count() <= super::LONGEST;
    if let Some(text) = candidates.iter().find(fits) {
        return text.clone();
    }
    let last = candidates.last().map_or("", String::as_str);
    let mut cut: String = last.chars().take(super::LONGEST - 1).collect();
    cut.push('…');
    cut
}

#[cfg(test)]
mod tests {
    use super::{figure, fitting};

    #[test]
    fn a_changing_digit_moves_nothing() {
        let widths: Vec<usize> = [9.996, 10.0, 99.99, 100.0, 999.9, 1000.0, 9999.0]
            .map(|si| figure(si, "m").chars().count())
            .to_vec();
        assert!(widths.iter().all(|width| *width == widths[0]), "{widths:?}");
        assert_eq!(figure(1447.0, ""), "\u{2007}1447");
        assert_eq!(figure(0.0714, "%"), "\u{2007}7.14 %");
    }

    #[test]
    fn the_first_that_fits() {
        let texts = ["a".repeat(26), "b".repeat(25), "c".to_owned()];
        assert_eq!(fitting(&texts), "b".repeat(25));
        assert_eq!(fitting(&["é".repeat(40)]).chars().count(), 25);
    }
}
