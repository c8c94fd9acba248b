//! How a number is written: the same number always the same way, with no more digits than it is worth.
//!
//! A computed number has four significant digits; the digits before the point are never rounded away. A number
//! somebody wrote is shown as it was written. Two numbers that are compared get as many digits as tell them apart.

/// Significant digits of a computed number.
pub const DIGITS: usize = 4;
/// Significant digits of a share or a margin.
pub const SHARE_DIGITS: usize = 3;
/// As many as a double can hold.
const MOST: usize = 17;
/// More than so many significant digits nobody writes by hand: such a number was computed.
const WRITTEN: usize = 7;

/// From here on a number is written with a power of ten.
const LARGE: f64 = 9_999_999.5;

/// A computed number with `significant` digits: `14.90`, `1447`, `0.01234`, `1.235e7`.
///
/// Not a number and infinities are written as words; the analysis stores none.
#[must_use]
pub fn digits(value: f64, significant: usize) -> String {
    let significant = significant.clamp(1, MOST);
    if !value.is_finite() {
        return String::from(if value.is_nan() { "undefined" } else { "unbounded" });
    }
    if value == 0.0 {
        return String::from("0");
    }
    let scientific = format!("{value:.*e}", significant - 1);
    let at = exponent(&scientific);
    if at < -4 || value.abs() >= LARGE {
        return scientific;
    }
    let decimals = (significant as i32 - 1 - at).max(0);
    format!("{value:.*}", decimals as usize)
}

/// A number as somebody wrote it: the shortest text that means it, free of the noise of a unit's factor. One that
/// nobody would write so (`1/3`) is taken as computed.
#[must_use]
pub fn written(value: f64) -> String {
    let exact = shortened(&digits(value, 12));
    if significant(&exact) <= WRITTEN { exact } else { digits(value, DIGITS) }
}

/// As many digits as make the two texts differ; [`DIGITS`] where they differ anyway or are equal.
#[must_use]
pub fn apart(a: f64, b: f64) -> usize {
    if a == b {
        return DIGITS;
    }
    (DIGITS..=MOST).find(|&n| shortened(&digits(a, n)) != shortened(&digits(b, n))).unwrap_or(MOST)
}

/// With a fixed number of decimals and never a negative zero.
#[must_use]
pub fn decimals(value: f64, decimals: usize) -> String {
    let text = format!("{value:.decimals$}");
    match text.strip_prefix('-') {
        Some(rest) if rest.bytes().all(|b| matches!(b, b'0' | b'.')) => rest.to_string(),
        _ => text,
    }
}

/// A share or margin in per cent, without the sign `%`: three significant digits, at most two decimals.
#[must_use]
pub fn percent(ratio: f64) -> String {
    let value = ratio * 100.0;
    if !value.is_finite() {
        return digits(value, SHARE_DIGITS);
    }
    let size = value.abs();
    let places = if size < 9.995 { 2 } else { usize::from(size < 99.95) };
    decimals(value, places)
}

/// Without zeros that say nothing: `14.90` is `14.9`, `400.0` is `400`.
#[must_use]
pub fn shortened(text: &str) -> String {
    let (mantissa, exponent) = match text.split_once('e') {
        Some((mantissa, exponent)) => (mantissa, Some(exponent)),
        None => (text, None),
    };
    let mantissa =
        if mantissa.contains('.') { mantissa.trim_end_matches('0').trim_end_matches('.') } else { mantissa };
    match exponent {
        Some(exponent) => format!("{mantissa}e{exponent}"),
        None => mantissa.to_string(),
    }
}

/// The power of ten of a number written by `{:e}`.
fn exponent(scientific: &str) -> i32 {
    scientific.split_once('e').and_then(|(_, exponent)| exponent.parse().ok()).unwrap_or(0)
}

/// How many significant digits a text shows, zeros at its end not counted where no point stands.
fn significant(text: &str) -> usize {
    let mantissa = text.split('e').next().unwrap_or(text);
    let digits: String = mantissa.chars().filter(char::is_ascii_digit).collect();
    let digits = digits.trim_start_matches('0');
    if mantissa.contains('.') { digits.len() } else { digits.trim_end_matches('0').len() }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    #[test]
    fn computed_numbers_have_four_digits_and_keep_the_integer_part() {
        let cases = [
            (14.9, "14.90"),
            (1447.06, "1447"),
            (23.5512, "23.55"),
            (0.0123449, "0.01234"),
            (12_345.6, "12346"),
            (9_999_999.0, "9999999"),
            (12_345_678.0, "1.235e7"),
            (0.000_012_345_67, "1.235e-5"),
            (9.9996, "10.00"),
            (-0.0, "0"),
            (-1e-320, "-1.000e-320"),
        ];
        for (value, text) in cases {
            assert_eq!(digits(value, DIGITS), text);
        }
    }

    #[test]
    fn written_numbers_come_back_as_they_were_written() {
        for (value, text) in [
            (400.0, "400"),
            (0.1 + 0.2, "0.3"),
            (1562.5, "1562.5"),
            (1.0 / 3.0, "0.3333"),
            (2.0e-5, "2e-5"),
            (1_000_000.0, "1000000"),
            (14.0 / 60.0 * 60.0, "14"),
        ] {
            assert_eq!(written(value), text);
        }
    }

    #[test]
    fn a_pair_gets_the_digits_that_tell_it_apart() {
        assert_eq!(apart(14.9, 14.0), 4);
        let (found, limit) = (30.000_4, 30.0);
        let n = apart(found, limit);
        assert_eq!((n, digits(found, n)), (6, String::from("30.0004")));
        assert_eq!(apart(7.0, 7.0), 4);
    }

    #[test]
    fn percentages_have_three_digits_and_no_negative_zero() {
        for (ratio, text) in [
            (0.532_1, "53.2"),
            (1.234_5, "123"),
            (0.061_26, "6.13"),
            (-0.000_001, "0.00"),
            (-0.12, "-12.0"),
            (0.999_7, "100"),
        ] {
            assert_eq!(percent(ratio), text);
        }
    }

    proptest! {
        #[test]
        fn a_text_is_worth_its_number(value in proptest::num::f64::NORMAL, n in 1usize..16) {
            let text = digits(value, n);
            let back: f64 = text.parse().unwrap();
            let worth = (0..n - 1).fold(0.51, |worth, _| worth / 10.0);
            prop_assert!(((back - value) / value).abs() <= worth, "{value} as {text}");
            prop_assert!(text.len() <= 26);
        }

        #[test]
        fn what_differs_is_shown_differently(a in -1e9f64..1e9, ulps in 1u32..1000) {
            let mut b = a;
            for _ in 0..ulps {
                b = b.next_up();
            }
            let n = apart(a, b);
            prop_assert_ne!(digits(a, n), digits(b, n));
        }
    }
}
