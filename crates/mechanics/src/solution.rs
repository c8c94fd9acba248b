//! What the solver answers.

use crate::fault::{Fault, Note};

/// An answer to one question about a solved drive.
#[derive(Clone, Debug, PartialEq)]
pub enum Answer {
    /// A quantity.
    Quantity {
        /// SI value.
        si: f64,
        /// Its kind of `layshaft_units::KINDS`.
        kind: &'static str,
        /// What a reader must know of it.
        marks: Marks,
    },
    /// Yes or no.
    Flag(bool),
    /// A word, such as `motoring`.
    Word(&'static str),
    /// It grows above every limit: the highest speed of a drive that runs away. An upper limit on it fails.
    Unbounded(Note),
    /// There is such a result, but not here: the reason.
    Absent(Note),
    /// It cannot be answered until these are mended: a field that only this question needs is not given.
    Refused(Vec<Fault>),
    /// The part or the drive has no result of this name.
    NoSuch,
}

/// What a reader must know of a number.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub struct Marks {
    /// Taken outside the range in which a curve was measured.
    pub outside: bool,
    /// From data taken at other conditions and scaled.
    pub scaled: bool,
}

/// What happens when the drive is switched on at rest.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Outcome {
    /// Starts and comes to its operating point, or hangs below the highest one: see `runs_up`.
    Starts,
    /// Friction holds it at rest.
    Stalls,
    /// The load wins and turns it backwards to a speed.
    DrivenBack,
    /// The load turns it (backwards or forwards) and nothing stops it.
    Runaway,
    /// The load alone sets it moving in the direction asked for.
    SelfMoving,
}

/// How power flows at an operating point.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mode {
    /// The source drives.
    Motoring,
    /// The load drives, the source brakes.
    Braking,
    /// At rest.
    Standstill,
    /// The load turns the drive against the direction asked for.
    DrivenBack,
    /// The load drives and no source takes part.
    Freewheeling,
    /// A source that is switched off and turns along or stands.
    Off,
}

/// Whether a small push comes back.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stability {
    /// A little faster: the load wins; a little slower: the source wins.
    Stable,
    /// The other way round: the drive leaves the point.
    Unstable,
    /// The curves touch.
    Marginal,
}

/// A finding about a solved drive that a colleague would raise.
#[derive(Clone, Debug, PartialEq)]
pub struct Finding {
    /// The word of the code it belongs to: `pull-up-dip`.
    pub code: &'static str,
    /// The part it is about.
    pub part: Option<usize>,
    /// The sentence.
    pub note: Note,
}

impl Mode {
    /// The word of the mode.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Motoring => "motoring",
            Self::Braking => "braking",
            Self::Standstill => "standstill",
            Self::DrivenBack => "driven_back",
            Self::Freewheeling => "freewheeling",
            Self::Off => "off",
        }
    }

    /// All words of modes.
    pub const WORDS: &'static [&'static str] =
        &["motoring", "braking", "standstill", "driven_back", "freewheeling", "off"];
}
