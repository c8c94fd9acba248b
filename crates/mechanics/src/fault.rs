//! Why a part or a drive cannot be solved, and what a solution is worth remarking: facts, not sentences for a screen.
//!
//! A message is a template whose `{0}`, `{1}` … stand for quantities, so that the layer that knows the user's
//! units writes the numbers.

/// A sentence with quantities to be put in.
#[derive(Clone, Debug, PartialEq)]
pub struct Note {
    /// The sentence, `{0}` for the first quantity.
    pub template: &'static str,
    /// SI value and kind.
    pub quantities: Vec<(f64, &'static str)>,
}

impl Note {
    /// A sentence without numbers.
    #[must_use]
    pub const fn plain(template: &'static str) -> Self {
        Self { template, quantities: Vec::new() }
    }
}

/// What stands in the way.
#[derive(Clone, Debug, PartialEq)]
pub struct Fault {
    /// The part it is about, by index in the drive; `None` while a part is built alone, or for the drive itself.
    pub part: Option<usize>,
    /// What it is.
    pub kind: FaultKind,
}

/// The ways in which a part or a drive cannot be solved.
#[derive(Clone, Debug, PartialEq)]
pub enum FaultKind {
    /// Any one of these groups of fields must be given; says why.
    Missing {
        /// Groups that would do: `[["inertia"]]`, `[["teeth"], ["reduction"]]`.
        any_of: Vec<Vec<&'static str>>,
        /// What needs it.
        why: Note,
    },
    /// The fields cannot all be true.
    Contradiction {
        /// The fields that take part.
        fields: Vec<&'static str>,
        /// In which way, with numbers.
        how: Note,
    },
    /// A value of a field that the law cannot take.
    Value {
        /// The field.
        field: &'static str,
        /// Why not.
        why: Note,
    },
    /// The load drives, and the field that says how the source or supply takes it is not given.
    BrakingUnknown {
        /// `braking` or `accepts_return`.
        field: &'static str,
    },
    /// The chain does not fit: rotary to linear, a load in the middle, no source …
    Chain {
        /// In which way.
        how: Note,
    },
    /// The solver did not settle; says with which numbers.
    Unsettled {
        /// The numbers.
        how: Note,
    },
}
