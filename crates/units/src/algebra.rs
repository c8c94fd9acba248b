//! Types of products, powers, sums and comparisons.

use crate::angle::Angle;
use crate::dimension::{Dim, WHOLE};
use crate::quantity::{Scale, Tag, Turns, Type};
use crate::refusal::{Operation, Refusal};

/// One over time, whose roots are told apart by the context.
const PER_TIME: Dim = Dim::whole(0, 0, -1, 0, 0);
const TIME: Dim = Dim::whole(0, 0, 1, 0, 0);

/// The type of `a * b`.
///
/// # Errors
/// A temperature level in a product; exponents beyond the range of [`Dim`].
pub fn multiply(a: &Type, b: &Type) -> Result<Type, Refusal> {
    product(a, b, Operation::Multiply)
}

/// The type of `a / b`.
///
/// # Errors
/// A temperature level in a quotient; exponents beyond the range of [`Dim`].
pub fn divide(a: &Type, b: &Type) -> Result<Type, Refusal> {
    product(a, b, Operation::Divide)
}

fn product(a: &Type, b: &Type, operation: Operation) -> Result<Type, Refusal> {
    if a.scale == Scale::Level || b.scale == Scale::Level {
        return Err(Refusal::LevelScaled { operation });
    }
    let sign = if operation == Operation::Divide { -1 } else { 1 };
    let turns = a.turns.times(if sign < 0 { b.turns.inverse() } else { b.turns });
    let dim = b.dim.times(sign, 1).and_then(|dim| a.dim.plus(dim));
    let angle = b.angle.times(sign, 1).and_then(|angle| a.angle.plus(angle));
    match (dim, angle) {
        (Some(dim), Some(angle)) => Ok(Type { dim, angle, turns, ..Type::number() }),
        _ => Err(Refusal::ExponentTooLarge),
    }
}

/// The type of `a` to the constant power `num / den`.
///
/// # Errors
/// A level; an exponent that leaves no whole sixths of a unit; a zero `den`.
pub fn power(a: &Type, num: i32, den: i32) -> Result<Type, Refusal> {
    if a.scale == Scale::Level {
        return Err(Refusal::LevelScaled { operation: Operation::Power });
    }
    let turns = a.turns.power(num, den);
    match (a.dim.times(num, den), a.angle.times(num, den)) {
        (Some(dim), Some(angle)) => {
            let root = num.checked_rem(den).is_some_and(|rest| rest != 0);
            let angle = if root && (dim == PER_TIME || dim == TIME) { root_of_rate(angle) } else { angle };
            Ok(Type { dim, angle, turns, ..Type::number() })
        }
        // A plain number may be raised to anything: nothing is counted in it that could break.
        _ if den != 0 && a.dim.is_none() && a.angle.allows(0) => {
            let angle = if a.angle == Angle::Free { Angle::Free } else { Angle::exactly(0) };
            Ok(Type { angle, ..Type::number() })
        }
        _ => Err(Refusal::PowerOfUnit { base: *a, num, den }),
    }
}

/// The root of 1/s² is a rotational speed (`sqrt(k/m)`, `sqrt(c/J)`) or a rate, and its radians do not say
/// which, unless they come out as exactly one: `sqrt(2*E/J)`. The root of s² is the inverse of such a root.
fn root_of_rate(angle: Angle) -> Angle {
    let certain = angle == Angle::exactly(WHOLE) || angle == Angle::exactly(-WHOLE);
    if certain { angle } else { Angle::Free }
}

/// The type of the `degree`-th root of `a`.
///
/// # Errors
/// As for [`power`].
pub fn root(a: &Type, degree: i32) -> Result<Type, Refusal> {
    power(a, 1, degree)
}

/// The type of `base ^ exponent`, where `constant` is the value of the exponent if it is known without running
/// the spec. A base with a unit wants a constant exponent; a plain number takes any plain number.
///
/// # Errors
/// As for [`power`]; an exponent that is no plain number, or not constant under a base with a unit.
pub fn raise(base: &Type, exponent: &Type, constant: Option<f64>) -> Result<Type, Refusal> {
    if !exponent.is_plain_number() || exponent.angle == Angle::Free && !exponent.dim.is_none() {
        return Err(Refusal::ExponentNotNumber { found: *exponent });
    }
    match constant.and_then(rational) {
        Some((num, den)) => power(base, num, den),
        None if base.is_plain_number() => Ok(Type::number()),
        None => Err(Refusal::ExponentNotConstant { base: *base }),
    }
}

/// `value` as a fraction with a denominator of at most 12, if it is one to within rounding.
pub fn rational(value: f64) -> Option<(i32, i32)> {
    if !value.is_finite() || value.abs() > 1000.0 {
        return None;
    }
    (1..=12).find_map(|den: i32| {
        let scaled = value * f64::from(den);
        let whole = scaled.round();
        let close = (scaled - whole).abs() <= 1e-12 * scaled.abs().max(1.0);
        close.then_some((whole as i32, den))
    })
}

/// The type of `a + b`.
///
/// # Errors
/// Different dimensions, kinds or tags; two levels.
pub fn add(a: &Type, b: &Type) -> Result<Type, Refusal> {
    sum(a, b, Operation::Add)
}

/// The type of `a - b`. Two levels give a difference; electrical less mechanical power is heat.
///
/// # Errors
/// Different dimensions, kinds or tags; a difference less a level.
pub fn subtract(a: &Type, b: &Type) -> Result<Type, Refusal> {
    sum(a, b, Operation::Subtract)
}

fn sum(a: &Type, b: &Type, operation: Operation) -> Result<Type, Refusal> {
    let minus = operation == Operation::Subtract;
    match (a.scale, b.scale) {
        (Scale::Ratio, Scale::Ratio) => {
            let tag = sum_tag(a, b, operation)?;
            let mut met = meet(a, b, operation)?;
            let same_power =
                minus && a.tag == b.tag && matches!(a.tag, Some(Tag::Mechanical | Tag::Electrical));
            met.tag = tag;
            met.maybe_heat = same_power || tag.is_some() && (a.maybe_heat || b.maybe_heat);
            Ok(met)
        }
        _ if a.dim != b.dim && !a.zero && !b.zero => {
            Err(Refusal::DifferentDimensions { operation, left: *a, right: *b })
        }
        (Scale::Level, Scale::Level) if minus => Ok(Type { scale: Scale::Ratio, ..a.named() }),
        (Scale::Level, Scale::Level) => Err(Refusal::LevelsAdded),
        (Scale::Level, Scale::Ratio) => Ok(a.named()),
        (Scale::Ratio, Scale::Level) if minus => Err(Refusal::LevelTaken),
        (Scale::Ratio, Scale::Level) => Ok(b.named()),
    }
}

/// The tag of a sum. Heat goes with both sides of a machine: what goes in is what comes out and what is lost,
/// so a sum with heat may be either power and carries no tag.
fn sum_tag(a: &Type, b: &Type, operation: Operation) -> Result<Option<Tag>, Refusal> {
    let minus = operation == Operation::Subtract;
    match (a.tag, b.tag) {
        (Some(Tag::Gauge), Some(Tag::Gauge)) | (Some(Tag::Absolute), Some(Tag::Absolute)) if minus => {
            Ok(None)
        }
        (Some(Tag::Heat), None) | (None, Some(Tag::Heat)) => Ok(None),
        (one, None) | (None, one) => Ok(one),
        (Some(x), Some(y)) if x == y => Ok(Some(x)),
        (Some(Tag::Electrical), Some(Tag::Mechanical)) | (Some(Tag::Mechanical), Some(Tag::Electrical))
            if minus =>
        {
            Ok(Some(Tag::Heat))
        }
        (Some(Tag::Heat), Some(Tag::Mechanical | Tag::Electrical)) if !minus => Ok(None),
        (Some(Tag::Mechanical | Tag::Electrical), Some(Tag::Heat)) => Ok(None),
        (Some(left), Some(right)) => Err(Refusal::DifferentTags { operation, left, right }),
    }
}

/// The type in which `a` and `b` are compared by `<`, `<=`, `>` or `>=`.
///
/// # Errors
/// Different dimensions, kinds or tags; a level against a difference.
pub fn compare(a: &Type, b: &Type) -> Result<Type, Refusal> {
    agree(a, b, Operation::Compare)
}

/// The type that `a` and `b` have in common: of `min`, `max`, both branches of an `if`, a table's look-up.
///
/// # Errors
/// Different dimensions, kinds or tags; a level beside a difference.
pub fn unify(a: &Type, b: &Type) -> Result<Type, Refusal> {
    agree(a, b, Operation::Unify)
}

fn agree(a: &Type, b: &Type, operation: Operation) -> Result<Type, Refusal> {
    match (a.scale, b.scale) {
        (Scale::Ratio, Scale::Ratio) => {
            let tag = match (a.tag, b.tag) {
                (Some(left), Some(right)) if left != right => {
                    let heat = a.maybe_heat && right == Tag::Heat || b.maybe_heat && left == Tag::Heat;
                    if !heat {
                        return Err(Refusal::DifferentTags { operation, left, right });
                    }
                    Some(Tag::Heat)
                }
                (left, right) => left.or(right),
            };
            let met = meet(a, b, operation)?;
            Ok(Type { tag, maybe_heat: tag != Some(Tag::Heat) && a.maybe_heat && b.maybe_heat, ..met })
        }
        (Scale::Level, Scale::Level) if a.dim == b.dim => Ok(a.named()),
        // A literal in kelvin is a level where a level is wanted.
        (Scale::Level, Scale::Ratio) if a.dim == b.dim && b.literal => Ok(a.named()),
        (Scale::Ratio, Scale::Level) if a.dim == b.dim && a.literal => Ok(b.named()),
        _ if a.dim == b.dim => Err(Refusal::LevelBesideDifference { operation }),
        _ => Err(Refusal::DifferentDimensions { operation, left: *a, right: *b }),
    }
}

/// What two ratios have in common, but for the tag, which the caller settles.
fn meet(a: &Type, b: &Type, operation: Operation) -> Result<Type, Refusal> {
    if a.zero && b.zero {
        return Ok(Type { zero: true, ..Type::number() });
    }
    if a.zero {
        return Ok(b.named());
    }
    if b.zero {
        return Ok(a.named());
    }
    if a.dim != b.dim {
        return Err(Refusal::DifferentDimensions { operation, left: *a, right: *b });
    }
    let Some(angle) = a.angle.meet(b.angle) else {
        return Err(Refusal::DifferentKinds { operation, left: *a, right: *b });
    };
    let literal = a.literal && b.literal;
    Ok(Type { dim: a.dim, angle, turns: facts_of_sum(a, b), literal, ..Type::number() })
}

/// The facts of a sum are those of one operand: of the one with a π in it, for there a turn may be counted
/// twice; else of the one that says its radians. The rest of the order only makes sums symmetric.
fn facts_of_sum(a: &Type, b: &Type) -> Turns {
    let rank = |ty: &Type| (ty.turns.pi != 0, ty.angle != Angle::Free, ty.turns);
    if rank(a) >= rank(b) { a.turns } else { b.turns }
}

/// The type of `-a`.
///
/// # Errors
/// A level: the sign of a temperature belongs to its number.
pub fn negate(a: &Type) -> Result<Type, Refusal> {
    if a.scale == Scale::Level {
        return Err(Refusal::LevelScaled { operation: Operation::Negate });
    }
    Ok(Type { literal: false, ..*a })
}

/// The type of a tolerance on a value of type `a`: the same, and for a level the difference.
pub fn difference_of(a: &Type) -> Type {
    Type { scale: Scale::Ratio, of_level: a.scale == Scale::Level, ..a.named() }
}
