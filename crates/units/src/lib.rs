//! Runtime kinds of quantity, their algebra, and the unit table of Layshaft.
//!
//! A value of a spec has a [`Type`]: seven SI exponents, an angle state, an optional [`Tag`] and a [`Scale`].
//! The algebra ([`multiply`], [`add`], [`apply`], …) computes the type of an expression or refuses it with a
//! [`Refusal`] that says why and what to write instead; [`demand`] asks whether a value may stand where a
//! [`Kind`] is wanted. [`parse_unit`] reads the unit behind a number, with exact factors of our own.
//!
//! The angle state is what tells a torque from an energy and a rotational speed from a frequency, although the
//! SI gives each pair one dimension. It is not an eighth base exponent: a length may or may not stand for
//! "length per radian" (`v / r` is a rotational speed, `F * r` a torque), so a length leaves it free.
//!
//! Nothing here opens files, reads clocks or panics, and transcendental functions come from `libm`, so that
//! results are the same to the bit on every machine.

mod algebra;
mod angle;
mod closest;
mod demand;
mod dimension;
mod exact;
mod function;
mod hints;
mod kind;
mod kinds;
mod quantity;
mod refusal;
mod unit;

pub use algebra::{
    add, compare, difference_of, divide, multiply, negate, power, raise, rational, root, subtract, unify,
};
pub use angle::Angle;
pub use closest::closest;
pub use demand::{TurnWarning, demand};
pub use dimension::Dim;
pub use function::{Function, apply};
pub use kind::{Kind, kind};
pub use kinds::KINDS;
pub use quantity::{Scale, Tag, Type};
pub use refusal::{Operation, Refusal};
pub use unit::{
    Prefixes, Unit, UnitError, UnitRow, interpret_unit, parse_unit, replacements, unit_rows, unit_symbol,
};
