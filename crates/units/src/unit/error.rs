//! Why a unit cannot be read, and what to write instead.

/// A unit that cannot be read. All ranges are bytes of the text given to [`crate::parse_unit`].
#[derive(Clone, Debug, PartialEq)]
pub enum UnitError {
    /// No unit is written so.
    Unknown {
        /// The unknown symbol.
        symbol: String,
        /// Where it stands.
        at: (usize, usize),
        /// What may have been meant, the likeliest first; each can replace the symbol.
        suggestions: Vec<String>,
    },
    /// What two trades read differently.
    Ambiguous {
        /// The symbol, or the unit if it is the product that has two readings.
        symbol: String,
        /// Where it stands.
        at: (usize, usize),
        /// The unit to write in its place, and what that means.
        choices: Vec<(String, String)>,
    },
    /// `a/b/c` or `a/b·c`, which people read in two ways.
    TwoReadings {
        /// The part with two readings.
        at: (usize, usize),
        /// Both, with brackets, and what each means.
        choices: Vec<(String, String)>,
    },
    /// No unit at all.
    Syntax {
        /// Where reading stopped.
        at: (usize, usize),
        /// What is wrong and what to write.
        message: String,
    },
}

impl UnitError {
    /// Where it is wrong, in bytes of the text.
    pub fn at(&self) -> (usize, usize) {
        match self {
            UnitError::Unknown { at, .. }
            | UnitError::Ambiguous { at, .. }
            | UnitError::TwoReadings { at, .. }
            | UnitError::Syntax { at, .. } => *at,
        }
    }

    /// What is wrong, in one sentence without a full stop.
    pub fn message(&self) -> String {
        match self {
            UnitError::Unknown { symbol, .. } => format!("no unit is written `{symbol}`"),
            UnitError::Ambiguous { symbol, choices, .. } => match choices.as_slice() {
                [(unit, _)] => format!("`{symbol}` is not the unit wanted here, `{unit}` is"),
                _ => format!("`{symbol}` is read in more than one way"),
            },
            UnitError::TwoReadings { .. } => {
                "after a `/` the rest is read in two ways: write brackets".to_owned()
            }
            UnitError::Syntax { message, .. } => message.clone(),
        }
    }

    /// What to write instead, the likeliest first; may be empty.
    pub fn hints(&self) -> Vec<String> {
        match self {
            UnitError::Unknown { suggestions, .. } if suggestions.is_empty() => Vec::new(),
            UnitError::Unknown { suggestions, .. } => {
                let list: Vec<String> = suggestions.iter().map(|unit| format!("`{unit}`")).collect();
                vec![format!("did you mean {}?", list.join(" or "))]
            }
            UnitError::Ambiguous { choices, .. } | UnitError::TwoReadings { choices, .. } => {
                choices.iter().map(|(unit, meaning)| format!("`{unit}`: {meaning}")).collect()
            }
            UnitError::Syntax { .. } => Vec::new(),
        }
    }
}
