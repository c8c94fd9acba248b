//! May a value stand where a kind is wanted, and does its formula count one turn twice?

use crate::dimension::WHOLE;
use crate::kind::Kind;
use crate::quantity::{Scale, Tag, Type};
use crate::refusal::Refusal;

/// An allowable warning: π and the radians of a rotational speed, a frequency or a length count one turn
/// twice, so that the result is off by 2π or a power of it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TurnWarning {
    /// The kind the result was wanted as.
    pub wanted: &'static Kind,
    /// Exponent of π in the formula, in sixths.
    pub pi: i16,
}

impl TurnWarning {
    /// What is wrong.
    pub fn message(&self) -> String {
        format!(
            "π and the radians of a rotational speed count one turn twice, so this is no {}",
            self.wanted.title
        )
    }

    /// What to write instead.
    pub fn hints(&self) -> Vec<String> {
        vec![
            "a rotational speed already counts radians, in whatever unit it was typed: torque times speed is a \
             power, radius times speed a speed along the rim, both without π"
                .to_owned(),
            "if turns per time are meant as a count, divide by a turn first: `n / (1 rev)`".to_owned(),
        ]
    }
}

/// Asks whether a value of type `found` may stand where `wanted` is wanted.
///
/// # Errors
/// Another dimension, another kind of the same dimension, a clash of tags, a level for a difference or the
/// other way round.
pub fn demand(found: &Type, wanted: &'static Kind) -> Result<Option<TurnWarning>, Refusal> {
    if found.zero && wanted.scale == Scale::Ratio {
        return Ok(None);
    }
    if found.dim != wanted.dim {
        return Err(Refusal::WrongDimension { wanted, found: *found });
    }
    let kelvin_level = wanted.scale == Scale::Level && found.literal;
    if found.scale != wanted.scale && !kelvin_level {
        return Err(Refusal::WrongScale { wanted, found: *found });
    }
    if let Some(tag) = found.tag
        && !tag_fits(tag, found.maybe_heat, wanted)
    {
        return Err(Refusal::WrongTag { wanted, found: tag });
    }
    if let Some(angle) = wanted.angle
        && !found.angle.allows(angle * WHOLE)
    {
        return Err(Refusal::WrongKind { wanted, found: *found });
    }
    Ok(counts_turn_twice(found, wanted).then_some(TurnWarning { wanted, pi: found.turns.pi }))
}

/// A tag fits the kind of the same tag, and a tag of power any power; a bare kind of another sort is refused.
fn tag_fits(tag: Tag, maybe_heat: bool, wanted: &Kind) -> bool {
    match wanted.tag {
        Some(own) => own == tag || (own == Tag::Heat && maybe_heat),
        None => match tag {
            Tag::Mechanical | Tag::Electrical | Tag::Heat => wanted.name == "power",
            Tag::Inertia => true,
            Tag::Grade | Tag::FlywheelEffect | Tag::Gauge | Tag::Absolute => false,
        },
    }
}

/// With p the exponent of π and a the radians that are certain, what is left to explain, wanted − a − p, must
/// be something the lengths in the formula can hide: a length above the line may be a length per radian, one
/// below a radian per length.
///
/// A π that goes with a frequency makes radians of its cycles and is no turn counted twice: `2*pi*f` is as good
/// as a rotational speed in `m * (2*pi*f)^2 * r`.
fn counts_turn_twice(found: &Type, wanted: &Kind) -> bool {
    let turns = found.turns;
    let paired =
        if turns.pi > 0 { turns.frequency.clamp(0, turns.pi) } else { turns.frequency.clamp(turns.pi, 0) };
    let lengths = turns.up != 0 || turns.down != 0;
    if turns.pi == 0 || (turns.pi == paired && lengths) {
        return false;
    }
    let takes_part = turns.rotates || (lengths && wanted.angle.is_some());
    let wanted_angle = i32::from(wanted.angle.unwrap_or(0) * WHOLE);
    let left = wanted_angle - i32::from(turns.angle) - i32::from(turns.pi);
    takes_part && !(-i32::from(turns.up) <= left && left <= i32::from(turns.down))
}
