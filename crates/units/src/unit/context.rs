//! What a literal's unit means where the place says what it wants.

use super::error::UnitError;
use super::refused::{with_force, with_mass};
use super::rows::Role;
use super::tree::{self, Factor, Level};
use super::{Unit, parse_unit};
use crate::angle::Angle;
use crate::dimension::{Dim, WHOLE};
use crate::quantity::{Scale, Type};

const PER_TIME: Dim = Dim::whole(0, 0, -1, 0, 0);
const KELVIN: Dim = Dim::whole(0, 0, 0, 0, 1);
const FORCE: Dim = Dim::whole(1, 1, -2, 0, 0);
const TORQUE: Dim = Dim::whole(2, 1, -2, 0, 0);
const ACCELERATION: Dim = Dim::whole(1, 0, -2, 0, 0);

/// Settles what the unit of a literal means where a value of type `wanted` is wanted.
///
/// - `min⁻¹` or `1/min` as the whole unit is a turn per minute where a rotational speed is wanted, else events
///   per minute.
/// - `K` is a level where a temperature is wanted, else a difference. Where [`crate::difference_of`] a
///   temperature is wanted, behind `±`, `°C` is a difference as well.
/// - Everything else means what it always means; whether it fits is for [`crate::demand`] to say.
///
/// # Errors
/// [`UnitError::Ambiguous`], with ranges in `unit.text`: `s⁻¹` or `1/s` for a rotational speed (radians or
/// turns?), and a pound or an ounce for a force.
pub fn interpret_unit(unit: &Unit, wanted: &Type) -> Result<Unit, UnitError> {
    let plain = unit.ty.angle == Angle::exactly(0);
    if unit.ty.dim == PER_TIME && wanted.dim == PER_TIME && plain {
        return per_time(unit, wanted);
    }
    if unit.ty.dim == KELVIN && wanted.scale == Scale::Level && unit.ty.scale == Scale::Ratio {
        return Ok(Unit { ty: Type { scale: Scale::Level, ..unit.ty }, ..unit.clone() });
    }
    if wanted.of_level && unit.ty.scale == Scale::Level {
        return Ok(unit.as_difference());
    }
    if wanted.dim.minus(unit.ty.dim) == Some(ACCELERATION)
        && let Some(choices) = pound_as_force(unit)
    {
        return Err(ambiguous(unit, choices));
    }
    Ok(unit.clone())
}

fn ambiguous(unit: &Unit, choices: Vec<(String, String)>) -> UnitError {
    UnitError::Ambiguous { symbol: unit.text.clone(), at: (0, unit.text.len()), choices }
}

/// A literal per minute, second, hour or day.
fn per_time(unit: &Unit, wanted: &Type) -> Result<Unit, UnitError> {
    let Some(time) = whole_per_time(&unit.text) else { return Ok(unit.clone()) };
    let events = wanted.angle == Angle::exactly(0);
    if events {
        return Ok(unit.clone());
    }
    let turns = format!("rev/{time}");
    if time == "min" && wanted.angle == Angle::exactly(WHOLE) {
        let read = parse_unit(&turns)?;
        return Ok(Unit { text: unit.text.clone(), ..read });
    }
    if !wanted.angle.allows(WHOLE) {
        return Ok(unit.clone());
    }
    let mut choices = vec![(turns, format!("turns per {}", in_words(time)))];
    if wanted.angle == Angle::Free {
        let hertz = format!("events, not turns; 1/{time} is {} Hz", unit.factor);
        choices.push(("Hz".to_owned(), hertz));
    } else {
        choices.insert(0, (format!("rad/{time}"), format!("radians per {}", in_words(time))));
    }
    Err(ambiguous(unit, choices))
}

fn in_words(time: &str) -> &'static str {
    match time {
        "min" => "minute",
        "h" => "hour",
        "d" => "day",
        _ => "second",
    }
}

/// The time symbol if the whole unit is its inverse: `1/min`, `min⁻¹`.
fn whole_per_time(text: &str) -> Option<&'static str> {
    let level = tree::read(text).ok()?;
    let time = match level.terms.as_slice() {
        [only] if only.power == -1 => only,
        [one, time] if one.factor == Factor::One && time.below && time.power == 1 => time,
        _ => return None,
    };
    match &time.factor {
        Factor::Symbol(symbol) if symbol.prefix.is_empty() => {
            ["s", "min", "h", "d"].into_iter().find(|name| *name == symbol.row.symbol)
        }
        _ => None,
    }
}

/// The choices for a unit with a pound or an ounce where the same with a force is wanted.
fn pound_as_force(unit: &Unit) -> Option<Vec<(String, String)>> {
    let level = tree::read(&unit.text).ok()?;
    let pound = level.components().iter().any(|(s, _)| matches!(s.row.symbol, "lb" | "oz"));
    let as_force = one_replaced(&level, Role::Mass)?;
    pound.then(|| {
        vec![
            (as_force, "the pound or ounce as a force".to_owned()),
            ("kg".to_owned(), "a mass, in kilograms; its weight is mass * 9.80665 m/s²".to_owned()),
        ]
    })
}

/// The unit with its one mass written as a force, or its one force as a mass.
fn one_replaced(level: &Level, role: Role) -> Option<String> {
    let parts = level.components();
    let one = parts.iter().filter(|(s, _)| s.row.role == role).count() == 1;
    let replaced = match role {
        Role::Mass => level.text_with(&with_force),
        _ => level.text_with(&with_mass),
    };
    (one && replaced != level.text()).then_some(replaced)
}

/// Units that were perhaps meant where a literal in `unit` stands but `wanted` is wanted, with what each means:
/// `N·m` for `J` where a torque is wanted, `kgf·cm` for `kg·cm`, `rev/s` for `Hz`.
///
/// The number stays as it is: these correct the unit, they do not convert it.
pub fn replacements(unit: &Unit, wanted: &Type) -> Vec<(String, String)> {
    let Ok(level) = tree::read(&unit.text) else { return Vec::new() };
    let mut out: Vec<(String, String)> = Vec::new();
    let mut push = |text: &str, meaning: &str| out.push((text.to_owned(), meaning.to_owned()));
    if wanted.dim.minus(unit.ty.dim) == Some(ACCELERATION)
        && let Some(text) = one_replaced(&level, Role::Mass)
    {
        push(&text, "the unit of mass as a force");
    }
    if unit.ty.dim.minus(wanted.dim) == Some(ACCELERATION)
        && let Some(text) = one_replaced(&level, Role::Force)
    {
        push(&text, "the unit of force as a mass");
    }
    for (text, dim, angle, instead, meaning) in SLIPS {
        let place = wanted.dim == *dim && wanted.angle.allows(angle * WHOLE);
        if *text == unit.text && place && wanted.angle != Angle::Free {
            push(instead, meaning);
        }
    }
    if unit.ty.scale == Scale::Level && wanted.scale == Scale::Ratio && wanted.dim == KELVIN {
        push("K", "a difference of temperature");
    }
    out.retain(|(text, _)| parse_unit(text).is_ok_and(|found| found.ty.dim == wanted.dim));
    out
}

/// Unit, dimension and radians wanted, unit meant, its meaning.
const SLIPS: &[(&str, Dim, i16, &str, &str)] = &[
    ("J", TORQUE, -1, "N·m", "a torque"),
    ("kJ", TORQUE, -1, "kN·m", "a torque"),
    ("nm", TORQUE, -1, "N·m", "newton metre, a torque"),
    ("mm", TORQUE, -1, "mN·m", "millinewton metre, a torque"),
    ("kg/cm", TORQUE, -1, "kgf·cm", "kilogram-force centimetre, a torque"),
    ("N/m", TORQUE, -1, "N·m", "newton metre, a torque"),
    ("N·m", TORQUE, 0, "J", "an energy"),
    ("kN·m", TORQUE, 0, "kJ", "an energy"),
    ("N·m", TORQUE, -2, "N·m/rad", "torque per angle"),
    ("Hz", PER_TIME, 1, "rev/s", "turns per second"),
    ("rpm", PER_TIME, 0, "1/min", "events per minute"),
    ("rev/s", PER_TIME, 0, "Hz", "cycles per second"),
    ("C", KELVIN, 0, "°C", "degree Celsius"),
    ("F", KELVIN, 0, "°F", "degree Fahrenheit"),
    ("S", Dim::whole(0, 0, 1, 0, 0), 0, "s", "second"),
    ("g", ACCELERATION, 0, "g_n", "standard acceleration of free fall"),
    ("m", Dim::whole(0, 0, 1, 0, 0), 0, "min", "minute"),
    ("%", Dim::NONE, 1, "°", "degree of angle; the angle of a grade is atan(grade)"),
    ("°", Dim::NONE, 0, "%", "per cent, rise per run"),
    ("V·s", Dim::whole(2, 1, -2, -1, 0), -1, "V·s/rad", "volt per radian and second"),
    ("kg", FORCE, 0, "N", "newton"),
];
