//! Units: reading them, converting with them, and settling what a literal means where it stands.

mod context;
mod error;
mod literal;
mod refused;
mod rows;
mod suggest;
mod symbols;
mod tree;

pub use context::{interpret_unit, replacements};
pub use error::UnitError;
pub use rows::{Prefixes, UnitRow};

use crate::dimension::Dim;
use crate::exact::Exact;
use crate::quantity::{Scale, Type};
use symbols::Symbol;

/// A unit as it stands behind a number.
#[derive(Clone, Debug, PartialEq)]
pub struct Unit {
    /// The spelling of the formatter: `kg·m²` for `kg*m^2`.
    pub text: String,
    /// One unit in SI units.
    pub factor: f64,
    /// Zero of the scale above absolute zero, in this unit's own degrees: 273.15 for °C, else 0.
    pub offset: f64,
    /// The type of a number with this unit.
    pub ty: Type,
}

impl Unit {
    /// The value in SI units: `(v + offset) * factor`.
    pub fn to_si(&self, v: f64) -> f64 {
        (v + self.offset) * self.factor
    }

    /// The value in this unit of one in SI units.
    pub fn from_si(&self, si: f64) -> f64 {
        si / self.factor - self.offset
    }

    /// The unit without its offset, as it is meant behind `±` and in a compound: `°C` as kelvin of difference.
    pub fn as_difference(&self) -> Unit {
        Unit { offset: 0.0, ty: Type { scale: Scale::Ratio, ..self.ty }, ..self.clone() }
    }

    /// Another unit of the same dimension that may replace this one keeps the quantity if its number is
    /// multiplied by this.
    pub fn ratio_to(&self, other: &Unit) -> Option<f64> {
        let same = self.ty.dim == other.ty.dim && self.offset == 0.0 && other.offset == 0.0;
        same.then(|| self.factor / other.factor)
    }
}

/// Reads a unit as the lexer cuts it out behind a number: `kg·m²`, `kg*m^2`, `N·m/(rad/s)^2`, `min⁻¹`.
///
/// # Errors
/// Unknown and ambiguous symbols, a second operator behind a `/`, and text that is no unit. Time and memory
/// are bounded by the length of the text, which is refused beyond 256 bytes.
pub fn parse_unit(text: &str) -> Result<Unit, UnitError> {
    let level = tree::read(text)?;
    let parts = level.components();
    let whole = (0, text.len());
    let beyond =
        || UnitError::Syntax { at: whole, message: "the powers of this unit are beyond all use".to_owned() };
    let dim = dimension(&parts).ok_or_else(beyond)?;
    if let Some(choices) = refused::product(&level, &parts, dim) {
        return Err(UnitError::Ambiguous { symbol: level.text(), at: whole, choices });
    }
    if parts.len() > 1 && parts.iter().any(|(symbol, _)| symbol.row.tag.is_some()) {
        let message =
            "a gauge or absolute pressure stands alone: in a compound write `bar` or `psi`".to_owned();
        return Err(UnitError::Syntax { at: whole, message });
    }
    let factor = factor(&parts).ok_or_else(beyond)?;
    let ty = literal::literal_type(&parts, dim).ok_or_else(beyond)?;
    let offset = match parts.as_slice() {
        [(symbol, 1)] => symbol.row.offset,
        _ => 0.0,
    };
    Ok(Unit { text: level.text(), factor, offset, ty })
}

fn dimension(parts: &[(Symbol, i32)]) -> Option<Dim> {
    parts.iter().try_fold(Dim::NONE, |sum, (symbol, power)| sum.plus(symbol.row.dim.times(*power, 1)?))
}

/// The factor in SI units: exact but for the last rounding, or multiplied out where the whole numbers of the
/// fraction grow too long.
fn factor(parts: &[(Symbol, i32)]) -> Option<f64> {
    let exact = parts.iter().try_fold(Exact::ONE, |product, (symbol, power)| {
        let row = symbol.row.factor;
        let own = if symbol.tens == 0 { row } else { row.product(Exact::power_of_ten(symbol.tens))? };
        product.product(own.power(*power)?)
    });
    let value = exact.map_or_else(|| multiplied_out(parts), Exact::value);
    value.is_normal().then_some(value)
}

fn multiplied_out(parts: &[(Symbol, i32)]) -> f64 {
    parts.iter().fold(1.0, |product, (symbol, power)| {
        let own = symbol.row.factor.value() * Exact::power_of_ten(symbol.tens).value();
        (0..power.unsigned_abs()).fold(product, |value, _| if *power > 0 { value * own } else { value / own })
    })
}

/// True if `text` is one bare symbol, with or without prefix, that is a unit or is refused with choices: what
/// a name in a spec may be mistaken for.
pub fn unit_symbol(text: &str) -> bool {
    symbols::find(text).is_some() || refused::symbols().any(|symbol| symbol == text)
}

/// Every symbol of the table of units, by what it measures.
pub fn unit_rows() -> &'static [UnitRow] {
    rows::ROWS
}
