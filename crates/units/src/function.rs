//! The functions of an expression: their names, types and values.

use crate::algebra::{root, unify};
use crate::angle::Angle;
use crate::dimension::WHOLE;
use crate::quantity::{Scale, Tag, Turns, Type};
use crate::refusal::{Operation, Refusal};

/// A function that may be called in an expression.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[expect(missing_docs, reason = "the names say it; `Function::meaning` has the words")]
pub enum Function {
    Sin,
    Cos,
    Tan,
    Asin,
    Acos,
    Atan,
    Atan2,
    Sqrt,
    Cbrt,
    Exp,
    Ln,
    Log10,
    Abs,
    Min,
    Max,
    Floor,
    Ceil,
    Round,
}

/// Name, fewest and most arguments, meaning.
type Row = (Function, &'static str, usize, usize, &'static str);

/// Most arguments of `min` and `max`.
const MANY: usize = 64;

static TABLE: [Row; 18] = [
    (Function::Sin, "sin", 1, 1, "sine of an angle"),
    (Function::Cos, "cos", 1, 1, "cosine of an angle"),
    (Function::Tan, "tan", 1, 1, "tangent of an angle"),
    (Function::Asin, "asin", 1, 1, "angle whose sine is the number, from -90° to 90°"),
    (Function::Acos, "acos", 1, 1, "angle whose cosine is the number, from 0° to 180°"),
    (Function::Atan, "atan", 1, 1, "angle whose tangent is the number or the grade, from -90° to 90°"),
    (Function::Atan2, "atan2", 2, 2, "angle of the direction with rise and run, from -180° to 180°"),
    (Function::Sqrt, "sqrt", 1, 1, "square root"),
    (Function::Cbrt, "cbrt", 1, 1, "cube root"),
    (Function::Exp, "exp", 1, 1, "e to the power of a number, or of an angle in radians"),
    (Function::Ln, "ln", 1, 1, "natural logarithm of a number"),
    (Function::Log10, "log10", 1, 1, "logarithm of a number to the base 10"),
    (Function::Abs, "abs", 1, 1, "value without its sign"),
    (Function::Min, "min", 2, MANY, "least of values of one kind"),
    (Function::Max, "max", 2, MANY, "greatest of values of one kind"),
    (Function::Floor, "floor", 1, 1, "whole number at or below a number"),
    (Function::Ceil, "ceil", 1, 1, "whole number at or above a number"),
    (Function::Round, "round", 1, 1, "nearest whole number, halves away from zero"),
];

impl Function {
    /// The function of this name.
    pub fn from_name(name: &str) -> Option<Self> {
        TABLE.iter().find(|row| row.1 == name).map(|row| row.0)
    }

    /// Every function, in the order of the reference.
    pub fn all() -> impl Iterator<Item = Function> {
        TABLE.iter().map(|row| row.0)
    }

    /// Their names, in the same order.
    pub fn names() -> impl Iterator<Item = &'static str> {
        TABLE.iter().map(|row| row.1)
    }

    fn row(self) -> &'static Row {
        TABLE.iter().find(|row| row.0 == self).unwrap_or(&TABLE[0])
    }

    /// The name in a spec.
    pub fn name(self) -> &'static str {
        self.row().1
    }

    /// What it gives, in a few words.
    pub fn meaning(self) -> &'static str {
        self.row().4
    }

    /// Fewest and most arguments.
    pub fn arity(self) -> (usize, usize) {
        (self.row().2, self.row().3)
    }

    /// True if it can be called with so many arguments.
    pub fn takes(self, count: usize) -> bool {
        let (fewest, most) = self.arity();
        (fewest..=most).contains(&count)
    }

    /// How many arguments it takes, in words: "one value", "two values", "two values or more".
    pub fn arity_text(self) -> &'static str {
        match self.arity() {
            (1, 1) => "one value",
            (2, 2) => "two values",
            _ => "two values or more",
        }
    }

    /// The value for arguments in SI units, or `None` where it is undefined: outside the domain, with the wrong
    /// number of arguments, or where the result is not finite.
    pub fn evaluate(self, arguments: &[f64]) -> Option<f64> {
        if !self.takes(arguments.len()) || arguments.iter().any(|x| x.is_nan()) {
            return None;
        }
        let x = *arguments.first()?;
        let value = match self {
            Function::Sin => libm::sin(x),
            Function::Cos => libm::cos(x),
            Function::Tan => libm::tan(x),
            Function::Asin => libm::asin(x),
            Function::Acos => libm::acos(x),
            Function::Atan => libm::atan(x),
            Function::Atan2 => {
                let run = *arguments.get(1)?;
                // The point without a direction.
                if x == 0.0 && run == 0.0 {
                    return None;
                }
                libm::atan2(x, run)
            }
            Function::Sqrt => x.sqrt(),
            Function::Cbrt => libm::cbrt(x),
            Function::Exp => libm::exp(x),
            Function::Ln => libm::log(x),
            Function::Log10 => libm::log10(x),
            Function::Abs => x.abs(),
            Function::Min => arguments.iter().copied().fold(x, f64::min),
            Function::Max => arguments.iter().copied().fold(x, f64::max),
            Function::Floor => x.floor(),
            Function::Ceil => x.ceil(),
            Function::Round => x.round(),
        };
        value.is_finite().then_some(value)
    }
}

/// The type of a function's value.
///
/// # Errors
/// Arguments of a kind the function does not take, or too few or too many of them.
pub fn apply(function: Function, arguments: &[Type]) -> Result<Type, Refusal> {
    let [first, rest @ ..] = arguments else {
        return Err(Refusal::Arguments { function, found: 0 });
    };
    if !function.takes(arguments.len()) {
        return Err(Refusal::Arguments { function, found: arguments.len() });
    }
    if first.scale == Scale::Level && !matches!(function, Function::Min | Function::Max) {
        return Err(Refusal::LevelScaled { operation: Operation::Call(function) });
    }
    match function {
        Function::Sin | Function::Cos | Function::Tan => wants_angle(function, first),
        Function::Asin | Function::Acos | Function::Atan => {
            let slope = function == Function::Atan && first.tag == Some(Tag::Grade);
            if slope { Ok(angle()) } else { wants_number(function, first).map(|_| angle()) }
        }
        Function::Atan2 => unify(first, rest.first().unwrap_or(first)).map(|_| angle()),
        Function::Sqrt => root(first, 2),
        Function::Cbrt => root(first, 3),
        Function::Exp if first.dim.is_none() => Ok(Type::number()),
        Function::Exp
        | Function::Ln
        | Function::Log10
        | Function::Floor
        | Function::Ceil
        | Function::Round => wants_number(function, first),
        Function::Abs => Ok(Type { literal: false, ..*first }),
        Function::Min | Function::Max => rest.iter().try_fold(*first, |common, next| unify(&common, next)),
    }
}

fn angle() -> Type {
    let turns = Turns { angle: WHOLE, ..Turns::default() };
    Type { angle: Angle::exactly(WHOLE), turns, ..Type::number() }
}

fn wants_angle(function: Function, found: &Type) -> Result<Type, Refusal> {
    let fits = found.dim.is_none() && found.angle.allows(WHOLE) && found.tag.is_none();
    if fits || found.zero { Ok(Type::number()) } else { Err(Refusal::WantsAngle { function, found: *found }) }
}

fn wants_number(function: Function, found: &Type) -> Result<Type, Refusal> {
    let grade = found.tag == Some(Tag::Grade) && !matches!(function, Function::Asin | Function::Acos);
    let fits = found.dim.is_none() && found.angle.allows(0) && (found.tag.is_none() || grade);
    if fits { Ok(Type::number()) } else { Err(Refusal::WantsNumber { function, found: *found }) }
}
