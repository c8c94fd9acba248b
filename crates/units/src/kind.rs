//! A kind of quantity: what a field or a named value wants, with its usual units and its meaning.

use crate::angle::Angle;
use crate::dimension::{Dim, WHOLE};
use crate::kinds::KINDS;
use crate::quantity::{Scale, Tag, Turns, Type};

/// A kind of quantity as it is written after `let x:` and wanted by a field.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Kind {
    /// The name in a spec: `rotational_speed`.
    pub name: &'static str,
    /// The name in a sentence: "rotational speed".
    pub title: &'static str,
    /// The unit results are shown in unless asked otherwise; empty for a plain number.
    pub unit: &'static str,
    /// Units offered for it, the usual one first.
    pub units: &'static [&'static str],
    /// The unit values are kept in; empty for a plain number.
    pub si: &'static str,
    /// One line on what it is.
    pub meaning: &'static str,
    pub(crate) dim: Dim,
    /// Whole radians counted; `None` leaves them free.
    pub(crate) angle: Option<i16>,
    pub(crate) tag: Option<Tag>,
    pub(crate) scale: Scale,
}

/// The kind with this name as written in a spec.
pub fn kind(name: &str) -> Option<&'static Kind> {
    KINDS.iter().find(|kind| kind.name == name)
}

impl Kind {
    /// The start of a row of the table: a ratio without tag.
    pub(crate) const fn new(name: &'static str, title: &'static str, dim: Dim, angle: Option<i16>) -> Kind {
        Kind {
            name,
            title,
            unit: "",
            units: &[],
            si: "",
            meaning: "",
            dim,
            angle,
            tag: None,
            scale: Scale::Ratio,
        }
    }

    /// Adds the SI unit and the units offered, the first of which is the usual one.
    pub(crate) const fn units(mut self, si: &'static str, units: &'static [&'static str]) -> Kind {
        self.si = si;
        self.units = units;
        if let [first, ..] = units {
            self.unit = first;
        }
        self
    }

    /// Adds the meaning.
    pub(crate) const fn means(mut self, meaning: &'static str) -> Kind {
        self.meaning = meaning;
        self
    }

    /// Adds a tag.
    pub(crate) const fn tagged(mut self, tag: Tag) -> Kind {
        self.tag = Some(tag);
        self
    }

    /// Makes it a level.
    pub(crate) const fn level(mut self) -> Kind {
        self.scale = Scale::Level;
        self
    }

    /// The type of a value of this kind.
    pub fn ty(&self) -> Type {
        let per_time = self.dim == Dim::whole(0, 0, -1, 0, 0);
        let length = self.dim.0[0];
        let up = match self.angle {
            Some(_) => 0,
            None if self.dim == Dim([length, 0, 0, 0, 0, 0, 0]) => length,
            // An inductance is volts per change of current, by the radian of a phase or not.
            None => WHOLE,
        };
        let turns = Turns {
            angle: self.angle.unwrap_or(0) * WHOLE,
            up,
            frequency: if per_time && self.angle == Some(0) { WHOLE } else { 0 },
            rotates: per_time || per_turn(self.dim, self.angle),
            ..Turns::default()
        };
        let angle = self.angle.map_or(Angle::Free, |a| Angle::exactly(a * WHOLE));
        Type { dim: self.dim, angle, tag: self.tag, scale: self.scale, turns, ..Type::number() }
    }

    /// The kind in a sentence: "a torque", "an energy".
    pub fn with_article(&self) -> String {
        let vowel = self.title.starts_with(['a', 'e', 'i', 'o']);
        format!("{} {}", if vowel { "an" } else { "a" }, self.title)
    }

    pub(crate) fn allowed_by(&self, state: Angle) -> bool {
        match self.angle {
            None => state == Angle::Free,
            Some(whole) => state.allows(whole * WHOLE),
        }
    }
}

/// True for a lead and a displacement, lengths and volumes that say they are per turn.
pub(crate) fn per_turn(dim: Dim, angle: Option<i16>) -> bool {
    let length = dim.0[0];
    dim == Dim([length, 0, 0, 0, 0, 0, 0]) && length > 0 && angle == Some(-1)
}
