//! What hoist and incline share: a steady pull, friction that turns over, and a mass.

use crate::curve::Curve;
use crate::laws::incline::Pull;
use crate::model::{Known, Limit, Load, LoadState, Motion, Standstill};

/// A mass that is pulled along.
#[derive(Debug)]
pub(super) struct Pulled {
    /// Force over speed.
    pub demand: Pull,
    /// What it does at rest.
    pub standstill: Standstill,
    /// kg
    pub mass: Known,
    /// Whether it runs away when nothing holds it.
    pub needs_holding: bool,
    /// Limits.
    pub limits: Vec<Limit>,
    /// Symbols of its formulas.
    pub symbols: Vec<(&'static str, f64)>,
}

impl Load for Pulled {
    fn motion(&self) -> Motion {
        Motion::Linear
    }

    fn demand(&self) -> Box<dyn Curve> {
        Box::new(self.demand)
    }

    fn standstill(&self) -> Standstill {
        self.standstill
    }

    fn inertia(&self) -> Known {
        self.mass
    }

    fn needs_holding(&self) -> bool {
        self.needs_holding
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }

    fn symbols(&self, _state: &LoadState) -> Vec<(&'static str, f64)> {
        self.symbols.clone()
    }
}
