//! The type of a number written with a unit: above all, how many radians the unit counts.

use super::rows::Role;
use super::symbols::Symbol;
use crate::angle::Angle;
use crate::dimension::{Dim, WHOLE};
use crate::kind::per_turn;
use crate::kinds::KINDS;
use crate::quantity::{Scale, Turns, Type};

/// Powers summed over the symbols of a unit.
#[derive(Default)]
struct Sums {
    length: i32,
    reactance: i32,
    force: i32,
    mass: i32,
    angle: i32,
    has_angle: bool,
    has_other: bool,
}

/// The type of a literal whose unit has these symbols and this dimension.
pub(crate) fn literal_type(parts: &[(Symbol, i32)], dim: Dim) -> Option<Type> {
    let mut sums = Sums::default();
    for (symbol, power) in parts {
        match symbol.row.role {
            Role::Length(n) => sums.length += n * power,
            Role::Reactance => sums.reactance += power,
            Role::Force => sums.force += power,
            Role::Mass => sums.mass += power,
            Role::Angle => {
                sums.angle += power;
                sums.has_angle = true;
            }
            Role::Other => sums.has_other = true,
        }
    }
    let alone = match parts {
        [(symbol, 1)] => Some(symbol.row),
        _ => None,
    };
    let counted = counted(&sums, dim);
    let angle = match counted {
        Some(radians) => Angle::exactly(i16::try_from(radians).ok()?.checked_mul(WHOLE)?),
        None => Angle::Free,
    };
    let certain = if let Angle::Range(low, _) = angle { low } else { 0 };
    let lengths = if angle == Angle::Free {
        i16::try_from(sums.length.saturating_add(sums.reactance)).ok()?.checked_mul(WHOLE)?
    } else {
        0
    };
    let per_time = dim == Dim::whole(0, 0, -1, 0, 0);
    let whole = counted.and_then(|radians| i16::try_from(radians).ok());
    let turns = Turns {
        pi: 0,
        angle: certain,
        up: lengths.max(0),
        down: lengths.saturating_neg().max(0),
        frequency: if per_time && whole == Some(0) { WHOLE } else { 0 },
        rotates: per_time || per_turn(dim, whole),
    };
    let level = alone.is_some_and(|row| row.offset != 0.0);
    Some(Type {
        dim,
        angle,
        tag: alone.and_then(|row| row.tag),
        scale: if level { Scale::Level } else { Scale::Ratio },
        turns,
        literal: true,
        ..Type::number()
    })
}

/// The radians a unit counts; `None` if it leaves them free.
fn counted(sums: &Sums, dim: Dim) -> Option<i32> {
    // Newton metres are joules per radian: every pair of a force and a length counts −1.
    let pair = if sums.force.signum() == sums.length.signum() {
        sums.force.signum() * sums.force.abs().min(sums.length.abs())
    } else {
        0
    };
    let mass_length = sums.force == 0 && sums.mass != 0 && sums.length == 2 * sums.mass;
    if sums.has_angle {
        // kg·m²·rad/s² and N·m say the same, so a kilogram square metre hides radians of its own.
        return (!mass_length).then_some(sums.angle - pair);
    }
    if pair != 0 && sums.length == pair && sums.force == pair && !sums.has_other && sums.mass == 0 {
        return Some(-pair);
    }
    if mass_length && sums.mass == 1 && !sums.has_other {
        return Some(-2);
    }
    if sums.reactance != 0 {
        return None;
    }
    if sums.length == 0 {
        return Some(0);
    }
    only_angle_of(dim)
}

/// The angle of the kinds of this dimension, if they all have the same.
fn only_angle_of(dim: Dim) -> Option<i32> {
    // A lead and a displacement are lengths and volumes that say more than their unit does.
    let mut angles = KINDS.iter().filter(|kind| kind.dim == dim).map(|kind| kind.angle);
    let first = angles.next()??;
    angles.all(|angle| angle == Some(first)).then_some(i32::from(first))
}
