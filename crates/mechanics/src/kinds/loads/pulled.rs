//! What those share that pull whichever way they move: a steady pull, friction that turns over, and a mass.

use crate::curve::Curve;
use crate::laws::incline::Pull;
use crate::model::{Known, Limit, Load, LoadState, Motion, Own, Standstill};

/// What pulls whichever way it moves.
#[derive(Debug)]
pub(super) struct Pulled {
    /// How it moves.
    pub motion: Motion,
    /// Effort over speed.
    pub demand: Pull,
    /// What it does at rest.
    pub standstill: Standstill,
    /// Its mass, or its inertia.
    pub mass: Known,
    /// Whether it runs away when nothing holds it.
    pub needs_holding: bool,
    /// Limits.
    pub limits: Vec<Limit>,
    /// Symbols of its formulas.
    pub symbols: Vec<(&'static str, f64)>,
    /// Results of its own.
    pub own: Vec<(&'static str, Own)>,
}

impl Load for Pulled {
    fn motion(&self) -> Motion {
        self.motion
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

    fn own(&self, name: &str) -> Option<Own> {
        self.own.iter().find(|(own, _)| *own == name).map(|(_, own)| own.clone())
    }

    fn symbols(&self, _state: &LoadState) -> Vec<(&'static str, f64)> {
        self.symbols.clone()
    }
}
