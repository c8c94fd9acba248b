//! The type of a value: dimension, angle state, tag and scale, with the facts the turn warning needs.

use crate::angle::Angle;
use crate::dimension::{BASE, Dim, WHOLE, fraction, push_factor, scaled};
use crate::kind::Kind;
use crate::kinds::KINDS;

/// What a name says beyond dimension and angle. A tag lives on names and on a few units (`barg`), through sums,
/// `min`, `max` and `if`; a product drops it, also one with a plain number.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Tag {
    /// Power at a shaft.
    Mechanical,
    /// Power at terminals.
    Electrical,
    /// Power lost as heat.
    Heat,
    /// Rise per run, uphill positive.
    Grade,
    /// A moment of inertia by name, so that it is not taken for a flywheel effect.
    Inertia,
    /// GD², four times the moment of inertia.
    FlywheelEffect,
    /// Pressure above the surroundings.
    Gauge,
    /// Pressure above vacuum.
    Absolute,
}

impl Tag {
    /// The tag in the words of a message, with its article.
    pub fn describe(self) -> &'static str {
        match self {
            Tag::Mechanical => "a mechanical power",
            Tag::Electrical => "an electrical power",
            Tag::Heat => "a heat (power lost)",
            Tag::Grade => "a grade (rise per run)",
            Tag::Inertia => "a moment of inertia",
            Tag::FlywheelEffect => "a flywheel effect (GD²)",
            Tag::Gauge => "a gauge pressure",
            Tag::Absolute => "an absolute pressure",
        }
    }
}

/// Whether a value may be scaled, or is a level on a scale whose zero is a convention.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Scale {
    /// Twice the value is twice the thing.
    Ratio,
    /// A temperature: two levels have a difference, but no sum and no double.
    Level,
}

/// What the turn warning counts, in sixths: it never decides whether an expression is allowed.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub(crate) struct Turns {
    /// Exponent of π.
    pub pi: i16,
    /// Sum of the radians that the factors count for certain.
    pub angle: i16,
    /// Powers of lengths, and of what else leaves radians free, above the line.
    pub up: i16,
    /// The same below the line.
    pub down: i16,
    /// Powers of frequencies, which π turns into radians per time.
    pub frequency: i16,
    /// A rotational speed, a frequency, a lead or a displacement takes part.
    pub rotates: bool,
}

impl Turns {
    pub(crate) fn times(self, other: Turns) -> Turns {
        Turns {
            pi: self.pi.saturating_add(other.pi),
            angle: self.angle.saturating_add(other.angle),
            up: self.up.saturating_add(other.up),
            down: self.down.saturating_add(other.down),
            frequency: self.frequency.saturating_add(other.frequency),
            rotates: self.rotates || other.rotates,
        }
    }

    pub(crate) fn inverse(self) -> Turns {
        Turns {
            pi: self.pi.saturating_neg(),
            angle: self.angle.saturating_neg(),
            frequency: self.frequency.saturating_neg(),
            up: self.down,
            down: self.up,
            ..self
        }
    }

    /// The facts of a power; none where they are no whole number of sixths, for then nothing sure is known.
    pub(crate) fn power(self, num: i32, den: i32) -> Turns {
        let base = if (num < 0) == (den < 0) { self } else { self.inverse() };
        let (num, den) = (num.saturating_abs(), den.saturating_abs());
        let all =
            [base.pi, base.angle, base.up, base.down, base.frequency].map(|fact| scaled(fact, num, den));
        match all {
            [Some(pi), Some(angle), Some(up), Some(down), Some(frequency)] => {
                Turns { pi, angle, up, down, frequency, ..self }
            }
            _ => Turns { rotates: self.rotates, ..Turns::default() },
        }
    }
}

/// The type of a value or of an expression. Two values may stand on two sides of a sum or a comparison if
/// [`crate::unify`] says so; equality of types is stricter than that.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Type {
    /// SI exponents.
    pub dim: Dim,
    /// Radians counted.
    pub angle: Angle,
    /// What its name says beyond that.
    pub tag: Option<Tag>,
    /// Ratio or level.
    pub scale: Scale,
    pub(crate) turns: Turns,
    /// A number written with its unit: `313 K` may be a level, which a named difference may not.
    pub(crate) literal: bool,
    /// A bare 0, which fits every kind but a level.
    pub(crate) zero: bool,
    /// A difference of two powers of one tag, which is what is left or what is lost.
    pub(crate) maybe_heat: bool,
    /// Wanted behind the `±` of a temperature, where `°C` is a difference.
    pub(crate) of_level: bool,
}

impl Type {
    /// A plain number that is not written as a literal 0.
    pub const fn number() -> Type {
        Type {
            dim: Dim::NONE,
            angle: Angle::exactly(0),
            tag: None,
            scale: Scale::Ratio,
            turns: Turns { pi: 0, angle: 0, up: 0, down: 0, frequency: 0, rotates: false },
            literal: false,
            zero: false,
            maybe_heat: false,
            of_level: false,
        }
    }

    /// The type of a number written without a unit. A bare 0 fits every kind but a level.
    pub fn of_number_literal(value: f64) -> Type {
        Type { literal: true, zero: value == 0.0, ..Type::number() }
    }

    /// The constant π, which may or may not count a turn: `2 * pi * f` is a rotational speed, `pi * d` a length.
    pub fn pi() -> Type {
        let turns = Turns { pi: WHOLE, ..Turns::default() };
        Type { angle: Angle::Range(0, WHOLE), turns, ..Type::number() }
    }

    /// The type of a value that has been given a name: no longer a literal, and no longer a bare 0.
    pub fn named(self) -> Type {
        Type { literal: false, zero: false, ..self }
    }

    /// True if the value can be used as a number without any unit.
    pub fn is_plain_number(&self) -> bool {
        self.dim.is_none() && self.angle.allows(0) && self.tag.is_none() && self.scale == Scale::Ratio
    }

    /// True for a bare 0, which fits every kind but a level.
    pub fn is_bare_zero(&self) -> bool {
        self.zero
    }

    /// The kinds that a value of this type may be, the usual one of each angle and tag first.
    pub(crate) fn candidates(&self) -> Vec<&'static Kind> {
        let mut found: Vec<&'static Kind> = Vec::new();
        for kind in KINDS {
            let same = kind.dim == self.dim && kind.scale == self.scale && kind.allowed_by(self.angle);
            // A tag that only keeps two named kinds apart does not hide what an untagged value is.
            let tag = kind.tag == self.tag || (self.tag.is_none() && kind.tag == Some(Tag::Inertia));
            let known = found.iter().any(|other| other.angle == kind.angle && other.tag == kind.tag);
            if same && tag && !known {
                found.push(kind);
            }
        }
        found
    }

    /// What the value is, with its article: "a torque", "a torque or an energy", "a quantity in kg·m/s".
    pub fn describe(&self) -> String {
        if self.is_plain_number() {
            return "a plain number".to_owned();
        }
        let candidates = self.candidates();
        // A free angle is best named by the kind that leaves it free: a length rather than a lead.
        let free = candidates.iter().find(|kind| self.angle == Angle::Free && kind.angle.is_none());
        match (free, candidates.as_slice()) {
            (Some(kind), _) => kind.with_article(),
            (None, []) if self.dim.is_none() => self.describe_bare(),
            (None, []) => format!("a quantity in {}", self.si_unit()),
            (None, [one]) => one.with_article(),
            (None, [first, second, ..]) => format!("{} or {}", first.with_article(), second.with_article()),
        }
    }

    fn describe_bare(&self) -> String {
        match self.tag {
            Some(tag) => tag.describe().to_owned(),
            None => format!("a quantity in {}", self.si_unit()),
        }
    }

    /// The unit in which the value is kept: `W/rad`, `kg·m²/s`. Empty for a plain number.
    pub fn si_unit(&self) -> String {
        let angle = match self.angle {
            Angle::Free => 0,
            Angle::Range(low, high) if low <= 0 && 0 <= high => 0,
            Angle::Range(low, _) => low,
        };
        let exact =
            KINDS.iter().find(|kind| kind.dim == self.dim && kind.angle.map(|a| a * WHOLE) == Some(angle));
        if let Some(kind) = exact {
            return kind.si.to_owned();
        }
        match self.as_named_unit() {
            Some((symbol, index, sixths)) => {
                let (mut above, mut below) = (vec![symbol.to_owned()], Vec::new());
                push_factor(BASE.get(index).copied().unwrap_or_default(), sixths, &mut above, &mut below);
                push_factor("rad", angle, &mut above, &mut below);
                fraction(&above, &below)
            }
            None => self.dim.si_text(angle),
        }
    }

    /// The dimension as a unit with a name of its own times a power of one base unit: `V·s`, `W/m`.
    fn as_named_unit(&self) -> Option<(&'static str, usize, i16)> {
        // Two base units are plain enough.
        if self.dim.0.iter().filter(|sixths| **sixths != 0).count() < 3 {
            return None;
        }
        let mut best: Option<(&'static str, usize, i16)> = None;
        for kind in KINDS.iter().filter(|kind| kind.angle == Some(0) && !kind.dim.is_none()) {
            let own = !kind.si.is_empty() && kind.si.chars().all(char::is_alphabetic);
            let symbol = own && kind.si != "Hz" && !BASE.contains(&kind.si);
            let Some(rest) = self.dim.minus(kind.dim).filter(|_| symbol) else { continue };
            let mut others = rest.0.iter().enumerate().filter(|(_, sixths)| **sixths != 0);
            let (index, sixths) = others.next().map_or((0, 0), |(index, sixths)| (index, *sixths));
            // The lower power is the plainer unit, and a product plainer than a quotient.
            let rank = |sixths: i16| (sixths.unsigned_abs(), sixths < 0);
            let nearer = best.is_none_or(|(_, _, least)| rank(sixths) < rank(least));
            if others.next().is_none() && nearer {
                best = Some((kind.si, index, sixths));
            }
        }
        best
    }
}
