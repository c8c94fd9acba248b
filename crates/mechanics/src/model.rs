//! What a part must answer before it can stand in a drive: one trait a role.
//!
//! A kind reads its fields into one of these once; the solver asks only through them. SI throughout. Speeds are
//! rad/s on rotary and m/s on linear motion, efforts N·m and N, inertias kg·m² and kg, so that speed times effort
//! is always W.
//!
//! Signs: a source's effort is positive when it drives in its own running direction; a load's effort is positive
//! when it opposes motion in its own positive sense. The solver turns them to the direction asked for.

mod load;
mod source;
mod supply;
mod transmission;

pub use load::{Load, LoadState, Own, Standstill};
pub use source::{Braking, Characteristic, Draw, DrawLaw, Drawn, Ratings, Source, SourceState};
pub use supply::{Feed, Supply, SupplyData};
pub use transmission::{Brake, Coupling, Grip, Limit, LimitOn, Slip, Transmission, TransmissionState};

/// A part, read from its fields.
#[derive(Debug)]
pub enum Model {
    /// Feeds sources.
    Supply(Box<dyn Supply>),
    /// A power plant.
    Source(Box<dyn Source>),
    /// Between two shafts, or shaft and rope, wheel, screw.
    Transmission(Box<dyn Transmission>),
    /// The driven machine.
    Load(Box<dyn Load>),
}

/// How a port moves.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Motion {
    /// Turns: rad/s, N·m, kg·m².
    Rotary,
    /// Runs straight: m/s, N, kg.
    Linear,
}

impl Motion {
    /// The kind of its speed.
    #[must_use]
    pub const fn speed_kind(self) -> &'static str {
        match self {
            Self::Rotary => "rotational_speed",
            Self::Linear => "speed",
        }
    }

    /// The kind of its effort.
    #[must_use]
    pub const fn effort_kind(self) -> &'static str {
        match self {
            Self::Rotary => "torque",
            Self::Linear => "force",
        }
    }
}

/// A value that only some questions need.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Known {
    /// Given, or zero because the part has none.
    Value(f64),
    /// Not given: the field to name when a question needs it.
    Missing(&'static str),
}

impl Known {
    /// The value of a field, which is named when it is missing.
    #[must_use]
    pub fn of(value: Option<f64>, field: &'static str) -> Self {
        value.map_or(Self::Missing(field), Self::Value)
    }
}
