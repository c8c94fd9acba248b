//! Why the algebra refuses an expression, in facts, and the words for them.

use crate::angle::Angle;
use crate::dimension::WHOLE;
use crate::function::Function;
use crate::kind::Kind;
use crate::quantity::{Scale, Tag, Type};

/// The operation that was refused.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Operation {
    /// `a * b`
    Multiply,
    /// `a / b`
    Divide,
    /// `a ^ n`
    Power,
    /// `a + b`
    Add,
    /// `a - b`
    Subtract,
    /// `-a`
    Negate,
    /// `a < b` and its like
    Compare,
    /// `min`, `max`, the branches of an `if`, a table's look-up
    Unify,
    /// A function
    Call(Function),
}

/// Why an expression, or a value in its place, is refused.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Refusal {
    /// A sum or comparison of different dimensions.
    DifferentDimensions {
        /// The operation.
        operation: Operation,
        /// Its left side.
        left: Type,
        /// Its right side.
        right: Type,
    },
    /// A sum or comparison of one dimension but two kinds.
    DifferentKinds {
        /// The operation.
        operation: Operation,
        /// Its left side.
        left: Type,
        /// Its right side.
        right: Type,
    },
    /// A sum or comparison of two values whose names say different things.
    DifferentTags {
        /// The operation.
        operation: Operation,
        /// The left side's tag.
        left: Tag,
        /// The right side's tag.
        right: Tag,
    },
    /// A temperature level multiplied, divided, negated, raised to a power or put in a function.
    LevelScaled {
        /// The operation.
        operation: Operation,
    },
    /// A sum of two temperature levels.
    LevelsAdded,
    /// A level taken from a difference.
    LevelTaken,
    /// A level compared or united with a difference.
    LevelBesideDifference {
        /// The operation.
        operation: Operation,
    },
    /// A function of an angle got something else.
    WantsAngle {
        /// The function.
        function: Function,
        /// What it got.
        found: Type,
    },
    /// A function of a plain number got something else.
    WantsNumber {
        /// The function.
        function: Function,
        /// What it got.
        found: Type,
    },
    /// A function got too few or too many arguments.
    Arguments {
        /// The function.
        function: Function,
        /// How many it got.
        found: usize,
    },
    /// A value of another dimension than its place wants.
    WrongDimension {
        /// What the place wants.
        wanted: &'static Kind,
        /// What stands there.
        found: Type,
    },
    /// A value of the right dimension but another kind.
    WrongKind {
        /// What the place wants.
        wanted: &'static Kind,
        /// What stands there.
        found: Type,
    },
    /// A value whose name says something else than its place wants.
    WrongTag {
        /// What the place wants.
        wanted: &'static Kind,
        /// What the value's name says.
        found: Tag,
    },
    /// A level where a difference is wanted, or the other way round.
    WrongScale {
        /// What the place wants.
        wanted: &'static Kind,
        /// What stands there.
        found: Type,
    },
    /// An exponent that is no plain number.
    ExponentNotNumber {
        /// What stands there.
        found: Type,
    },
    /// A base with a unit under an exponent that is not a constant fraction.
    ExponentNotConstant {
        /// The base.
        base: Type,
    },
    /// A power that would leave a fraction of a unit which no formula has.
    PowerOfUnit {
        /// The base.
        base: Type,
        /// Above the line of the exponent.
        num: i32,
        /// Below the line of the exponent.
        den: i32,
    },
    /// A unit's exponent beyond all bounds.
    ExponentTooLarge,
}

impl Refusal {
    /// What is wrong, in one sentence without a full stop.
    pub fn message(&self) -> String {
        match self {
            Refusal::DifferentDimensions { operation, left, right } => {
                format!("{} {} and {}", together(*operation), left.describe(), right.describe())
            }
            Refusal::DifferentKinds { operation, left, right } => {
                let (left, right) = (left.describe(), right.describe());
                format!(
                    "{} {left} and {right}: they share a dimension but are different kinds",
                    together(*operation)
                )
            }
            Refusal::DifferentTags { operation, left, right } => {
                format!("{} {} and {}", together(*operation), left.describe(), right.describe())
            }
            Refusal::LevelScaled { operation } => level_scaled(*operation),
            Refusal::LevelsAdded => "two temperatures have no sum, for each is a level on a scale".to_owned(),
            Refusal::LevelTaken => "a temperature cannot be taken from a temperature difference".to_owned(),
            Refusal::LevelBesideDifference { operation } => {
                format!("{} a temperature and a temperature difference", together(*operation))
            }
            Refusal::WantsAngle { function, found } => {
                format!("`{}` wants an angle, this is {}", function.name(), found.describe())
            }
            Refusal::WantsNumber { function, found } => {
                format!("`{}` wants a plain number, this is {}", function.name(), found.describe())
            }
            Refusal::Arguments { function, found } => {
                format!("`{}` takes {}, not {found}", function.name(), function.arity_text())
            }
            Refusal::WrongDimension { wanted, found } | Refusal::WrongKind { wanted, found } => {
                format!("{} is wanted here, this is {}", wanted.with_article(), found.describe())
            }
            Refusal::WrongTag { wanted, found } => {
                format!("{} is wanted here, this is {}", wanted.with_article(), found.describe())
            }
            Refusal::WrongScale { wanted, found } => {
                format!("{} is wanted here, this is {}", wanted.with_article(), found.describe())
            }
            Refusal::ExponentNotNumber { found } => {
                format!("an exponent is a plain number, this is {}", found.describe())
            }
            Refusal::ExponentNotConstant { base } => {
                format!(
                    "the exponent of {} must be a constant fraction, for the unit depends on it",
                    base.describe()
                )
            }
            Refusal::PowerOfUnit { base, num, den } => {
                format!(
                    "{} to the power {num}/{den} leaves a fraction of a unit that no formula has",
                    base.describe()
                )
            }
            Refusal::ExponentTooLarge => "the exponent of a unit grows beyond all bounds".to_owned(),
        }
    }

    /// What to write instead, the likeliest first; may be empty.
    pub fn hints(&self) -> Vec<String> {
        crate::hints::hints(self)
    }
}

fn together(operation: Operation) -> &'static str {
    match operation {
        Operation::Compare => "these cannot be compared:",
        Operation::Unify => "these are not of one kind:",
        Operation::Subtract => "these have no difference:",
        _ => "these have no sum:",
    }
}

fn level_scaled(operation: Operation) -> String {
    let verb = match operation {
        Operation::Multiply => "multiplied".to_owned(),
        Operation::Divide => "divided".to_owned(),
        Operation::Power => "raised to a power".to_owned(),
        Operation::Negate => "negated".to_owned(),
        Operation::Call(function) => format!("put into `{}`", function.name()),
        Operation::Add | Operation::Subtract | Operation::Compare | Operation::Unify => "used so".to_owned(),
    };
    format!("a temperature cannot be {verb}, for it is a level on a scale whose zero is a convention")
}

/// How many radians more the wanted kind counts than the value, if both say so.
pub(crate) fn missing_radians(wanted: &Kind, found: &Type) -> Option<i16> {
    let wanted = wanted.angle? * WHOLE;
    match found.angle {
        Angle::Range(low, high) if found.scale == Scale::Ratio => {
            let nearest = wanted.clamp(low, high);
            let missing = wanted.checked_sub(nearest)?;
            (missing % WHOLE == 0).then_some(missing / WHOLE)
        }
        _ => None,
    }
}
