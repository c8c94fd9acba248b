//! What a load must answer: effort over speed, what it does at rest, inertia.

use std::fmt::Debug;
use std::sync::Arc;

use super::{Known, Limit, Motion};
use crate::curve::Curve;
use crate::solution::Answer;

/// What a load does while it stands still; efforts with the sign of the load's own sense.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Standstill {
    /// What it pulls with, friction left out (weight, wind): a brake holds against this.
    pub holding: f64,
    /// Least effort that sets it moving in its positive sense, breakaway included.
    pub breakaway_forward: f64,
    /// Effort below which it moves in its negative sense; `holding` less the friction at rest.
    pub breakaway_reverse: f64,
}

/// Where a load stands in a solved drive, in the load's own sense.
#[derive(Clone, Copy, Debug)]
pub struct LoadState {
    /// Its speed.
    pub speed: f64,
    /// The effort it takes.
    pub effort: f64,
}

/// A result of a load's own.
#[derive(Clone)]
pub enum Own {
    /// A law of its speed, in its own sense.
    Law {
        /// The kind of the result.
        kind: &'static str,
        /// Its value over the speed.
        curve: Arc<dyn Curve>,
    },
    /// It cannot be said until this field is given.
    Missing(&'static str),
}

impl Own {
    /// A law of the speed.
    #[must_use]
    pub fn law(kind: &'static str, law: impl Curve + 'static) -> Self {
        Self::Law { kind, curve: Arc::new(law) }
    }
}

impl Debug for Own {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        match self {
            Self::Law { kind, .. } => write!(f, "Law({kind})"),
            Self::Missing(field) => write!(f, "Missing({field})"),
        }
    }
}

/// The driven machine.
pub trait Load: Debug + Send + Sync {
    /// How its shaft (or rope, or wheel rim) moves.
    fn motion(&self) -> Motion;

    /// The effort it takes over speed, for speeds of both signs in its own sense: what friction and drag do
    /// backwards, they do with the other sign. A friction that turns over at rest is a jump at 0.
    fn demand(&self) -> Box<dyn Curve>;

    /// What it does at rest.
    fn standstill(&self) -> Standstill;

    /// Its inertia at its shaft, or its mass.
    fn inertia(&self) -> Known;

    /// A speed of the order of its usual one, if it knows one.
    fn usual_speed(&self) -> Option<f64> {
        None
    }

    /// The range of speeds its data were measured in.
    fn measured(&self) -> Option<(f64, f64)> {
        None
    }

    /// The force that presses it on the ground, N, for the grip of wheels.
    fn weight_on_ground(&self) -> Option<f64> {
        None
    }

    /// Whether it falls or rolls when nothing holds it, so that a drive without a brake is a finding.
    fn needs_holding(&self) -> bool {
        false
    }

    /// Its limits, at its input.
    fn limits(&self) -> Vec<Limit> {
        Vec::new()
    }

    /// A result of its own that its speed settles; `None` if it has none of this name.
    fn own(&self, _name: &str) -> Option<Own> {
        None
    }

    /// Results of its own that rest on more than its speed, `None` if it has no result of this name.
    fn answer(&self, _name: &str, _state: &LoadState) -> Option<Answer> {
        None
    }

    /// Values of the symbols in its row's formulas.
    fn symbols(&self, _state: &LoadState) -> Vec<(&'static str, f64)> {
        Vec::new()
    }
}
