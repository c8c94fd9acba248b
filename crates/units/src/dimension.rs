//! The seven SI exponents of a quantity, in sixths, so that square and cube roots stay exact.

/// Exponents of length, mass, time, current, temperature, amount and luminous intensity, in sixths:
/// a length is `[6, 0, 0, 0, 0, 0, 0]`, its square root `[3, 0, …]`.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Dim(pub [i16; 7]);

/// Sixths in a whole exponent.
pub(crate) const WHOLE: i16 = 6;

/// The SI base symbols in the order of [`Dim`].
pub(crate) const BASE: [&str; 7] = ["m", "kg", "s", "A", "K", "mol", "cd"];

impl Dim {
    /// No dimension: a number, an angle, a grade.
    pub const NONE: Dim = Dim([0; 7]);

    /// From whole exponents of length, mass, time, current and temperature.
    pub const fn whole(length: i16, mass: i16, time: i16, current: i16, temperature: i16) -> Dim {
        Dim([length * WHOLE, mass * WHOLE, time * WHOLE, current * WHOLE, temperature * WHOLE, 0, 0])
    }

    /// True if every exponent is zero.
    pub fn is_none(&self) -> bool {
        *self == Dim::NONE
    }

    /// The exponents of a product; `None` if one leaves the range of the type.
    pub fn plus(self, other: Dim) -> Option<Dim> {
        let mut sum = [0; 7];
        for (slot, (a, b)) in sum.iter_mut().zip(self.0.iter().zip(other.0)) {
            *slot = a.checked_add(b)?;
        }
        Some(Dim(sum))
    }

    /// The exponents of a quotient; `None` if one leaves the range of the type.
    pub fn minus(self, other: Dim) -> Option<Dim> {
        self.plus(other.times(-1, 1)?)
    }

    /// The exponents of the power `num / den`; `None` if one is no longer a whole number of sixths or leaves
    /// the range of the type, or if `den` is 0.
    pub fn times(self, num: i32, den: i32) -> Option<Dim> {
        let mut out = [0; 7];
        for (slot, exponent) in out.iter_mut().zip(self.0) {
            *slot = scaled(exponent, num, den)?;
        }
        Some(Dim(out))
    }

    /// The unit of this dimension in SI base units, with `angle` sixths of radians: `kg·m²/(s³·rad)`.
    /// Empty for a plain number.
    pub(crate) fn si_text(&self, angle: i16) -> String {
        let mut above = Vec::new();
        let mut below = Vec::new();
        // Mass first, as the SI writes its derived units.
        for index in [1, 0, 2, 3, 4, 5, 6] {
            push_factor(BASE[index], self.0[index], &mut above, &mut below);
        }
        push_factor("rad", angle, &mut above, &mut below);
        fraction(&above, &below)
    }
}

/// Puts `symbol` with its exponent in sixths above or below the line.
pub(crate) fn push_factor(symbol: &str, sixths: i16, above: &mut Vec<String>, below: &mut Vec<String>) {
    if sixths == 0 {
        return;
    }
    let text = format!("{symbol}{}", exponent_text(sixths.unsigned_abs()));
    if sixths > 0 { above.push(text) } else { below.push(text) }
}

/// `a·b/(c·d)`, or `1/c` with nothing above the line.
pub(crate) fn fraction(above: &[String], below: &[String]) -> String {
    let top = above.join("·");
    match below {
        [] => top,
        [one] => format!("{}/{one}", if top.is_empty() { "1" } else { &top }),
        many => format!("{}/({})", if top.is_empty() { "1" } else { &top }, many.join("·")),
    }
}

/// A positive exponent in sixths as it is written behind a symbol: nothing for 1, `²`, `^(3/2)`.
fn exponent_text(sixths: u16) -> String {
    if sixths == 6 {
        return String::new();
    }
    if sixths.is_multiple_of(6) {
        return superscript(i32::from(sixths / 6));
    }
    let (num, den) = match sixths {
        s if s.is_multiple_of(3) => (s / 3, 2),
        s if s.is_multiple_of(2) => (s / 2, 3),
        s => (s, 6),
    };
    format!("^({num}/{den})")
}

/// A whole number in superscript digits: `⁻¹²`.
pub(crate) fn superscript(value: i32) -> String {
    value
        .to_string()
        .chars()
        .map(|c| match c {
            '-' => '⁻',
            '1' => '¹',
            '2' => '²',
            '3' => '³',
            digit => digit.to_digit(10).and_then(|d| char::from_u32(0x2070 + d)).unwrap_or(digit),
        })
        .collect()
}

/// `value · num / den` if that is a whole number in range.
pub(crate) fn scaled(value: i16, num: i32, den: i32) -> Option<i16> {
    let product = i64::from(value) * i64::from(num);
    let den = i64::from(den);
    if den == 0 || product % den != 0 {
        return None;
    }
    i16::try_from(product / den).ok()
}
