//! The row of a kind: everything the rest of Layshaft knows about a motor, a gear or a load.

mod common;

use crate::fault::Fault;
use crate::values::Values;

pub use common::{DRIVE_FIELDS, DRIVE_RESULTS, LIMITS, common_fields, common_results, said_otherwise};

/// What a part is in a drive.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Role {
    /// Feeds sources.
    Supply,
    /// A power plant.
    Source,
    /// Between two shafts, or shaft and rope, wheel, screw.
    Transmission,
    /// The driven machine.
    Load,
}

/// One kind of part.
#[derive(Debug)]
pub struct KindRow {
    /// Its role.
    pub role: Role,
    /// The word behind the colon: `dc_motor`.
    pub name: &'static str,
    /// The trade's name: "permanent-magnet dc motor".
    pub title: &'static str,
    /// What it is and when it is right to use it, two or three sentences.
    pub summary: &'static str,
    /// Its fields, the usual order of a spec.
    pub fields: &'static [Field],
    /// What can be asked of it after the drive is solved, beyond [`common_results`] of its role.
    pub results: &'static [ResultRow],
    /// The laws behind it.
    pub formulas: &'static [Formula],
    /// Cautions a reader of a result must see.
    pub cautions: &'static [&'static str],
    /// A block that is accepted as it stands: `source m: dc_motor { … }`.
    pub example: &'static str,
    /// Reads the fields into a model. Required fields are present and every value lies in its hard range;
    /// what can only be seen from several fields together is refused here.
    pub build: fn(&Values) -> Result<crate::model::Model, Vec<Fault>>,
    /// Results known from the fields alone, such as `rated_torque`: names among `results`, SI values.
    pub given: fn(&Values) -> Vec<(&'static str, f64)>,
}

impl PartialEq for KindRow {
    /// Rows are told apart by their place in the registry; no two are alike.
    fn eq(&self, other: &Self) -> bool {
        self.role == other.role && self.name == other.name
    }
}

/// One field of a kind.
#[derive(Debug)]
pub struct Field {
    /// Its name.
    pub name: &'static str,
    /// What can stand there.
    pub shape: Shape,
    /// Whether it must be given.
    pub need: Need,
    /// Outside of this the law makes no sense: an error.
    pub hard: Bounds,
    /// Outside of this the trade would ask again: a warning.
    pub plausible: Bounds,
    /// One line, without a final point.
    pub meaning: &'static str,
}

/// What can stand in a field.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Shape {
    /// A quantity of this kind of `layshaft_units::KINDS`.
    Quantity(&'static str),
    /// A quantity, or a multiple of the part's rated value: `2.3 × rated`.
    OfRated(&'static str),
    /// `lo .. hi`
    Interval(&'static str),
    /// One of these words, each with its meaning.
    Choice(&'static [(&'static str, &'static str)]),
    /// `yes` or `no`
    Flag,
    /// The name of a part of this role.
    Part(Role),
    /// Pairs, a table in the text or a CSV file with these columns; optional columns may be missing.
    Points(&'static [ColumnRow]),
    /// `42 drives 18`: plain counts, or two lengths when `diameters` is set.
    Ratio {
        /// Whether the two numbers are diameters instead of teeth.
        diameters: bool,
    },
    /// Named gears: `gear 1 = reduction 14.5`; the field's name is `gear`.
    Gears,
    /// A duty type: `S1`, `S3 40 %`.
    Duty,
}

/// A column of a table of points.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ColumnRow {
    /// Its name in a table head.
    pub name: &'static str,
    /// Its kind.
    pub kind: &'static str,
    /// Whether a table may come without it.
    pub optional: bool,
}

/// Whether a field must be given.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Need {
    /// Always.
    Required,
    /// Not needed; the law does without.
    Optional,
    /// Taken so when not given, and listed as an assumption of the tool.
    Default {
        /// SI value (1 or 0 for a flag).
        si: f64,
        /// Why this value is safe or usual.
        why: &'static str,
    },
    /// No default exists: refused by name where a question needs it. Says which question.
    Where(&'static str),
    /// One of several fields or groups of fields; `build` checks and names the choices.
    OneOf,
}

/// A range of SI values.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bounds {
    /// Lowest value.
    pub low: f64,
    /// Whether `low` itself is inside.
    pub low_in: bool,
    /// Highest value.
    pub high: f64,
    /// Whether `high` itself is inside.
    pub high_in: bool,
}

impl Bounds {
    /// Every value.
    pub const ANY: Self = Self::closed(f64::NEG_INFINITY, f64::INFINITY);
    /// Above zero.
    pub const POSITIVE: Self = Self { low: 0.0, low_in: false, high: f64::INFINITY, high_in: true };
    /// Zero or above.
    pub const NOT_NEGATIVE: Self = Self::closed(0.0, f64::INFINITY);
    /// An efficiency: above 0 up to 100 %.
    pub const EFFICIENCY: Self = Self { low: 0.0, low_in: false, high: 1.0, high_in: true };

    /// Both ends inside.
    #[must_use]
    pub const fn closed(low: f64, high: f64) -> Self {
        Self { low, low_in: true, high, high_in: true }
    }

    /// Whether a value is inside.
    #[must_use]
    pub fn holds(&self, value: f64) -> bool {
        let above = if self.low_in { value >= self.low } else { value > self.low };
        let below = if self.high_in { value <= self.high } else { value < self.high };
        above && below
    }
}

/// Something that can be asked after the drive is solved.
#[derive(Clone, Copy, Debug)]
pub struct ResultRow {
    /// Its name: `torque`, `holding_reserve`.
    pub name: &'static str,
    /// What it is.
    pub shape: ResultShape,
    /// One line, without a final point.
    pub meaning: &'static str,
}

/// What a result is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum ResultShape {
    /// A quantity of this kind.
    Quantity(&'static str),
    /// The speed of a station: `rotational_speed` or `speed`, as its motion is.
    Speed,
    /// The torque or force of a station, as its motion is.
    Effort,
    /// An angle or a length, as the motion of the station is.
    Way,
    /// Yes or no.
    Flag,
    /// One of these words.
    Word(&'static [&'static str]),
}

/// A law as a reader checks it.
#[derive(Debug)]
pub struct Formula {
    /// The result's symbol or name it belongs to.
    pub name: &'static str,
    /// The formula in the language's own expression syntax: `T0 * (1 - w / w0)`.
    pub text: &'static str,
    /// Symbols: name, kind, meaning.
    pub symbols: &'static [(&'static str, &'static str, &'static str)],
    /// Where it holds.
    pub validity: &'static str,
    /// Where it is published, or "common practice, no source", or "from memory".
    pub source: &'static str,
    /// Counted up when a result changes.
    pub revision: u32,
}

/// Every kind, in the order of the reference.
#[must_use]
pub fn rows() -> &'static [&'static KindRow] {
    crate::kinds::ROWS
}

/// The row of a kind.
#[must_use]
pub fn row(role: Role, name: &str) -> Option<&'static KindRow> {
    rows().iter().copied().find(|row| row.role == role && row.name == name)
}
