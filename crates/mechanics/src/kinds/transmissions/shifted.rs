//! The model of parts with several gears, of which one is engaged.

use super::fixed::Symbols;
use super::gear::symbols;
use crate::drive::Direction;
use crate::model::{Coupling, Known, Limit, Transmission, TransmissionState};

/// A part with several gears.
#[derive(Debug)]
pub(super) struct Shifted {
    /// Names and couplings; no coupling is neutral.
    pub gears: Vec<(String, Option<Coupling>)>,
    /// Whether the direction of the drive engages a gear instead of its name: the first forward, the second reverse.
    pub by_direction: bool,
    /// Inertia at the input.
    pub inertia: f64,
    /// Limits.
    pub limits: Vec<Limit>,
}

impl Shifted {
    /// The caller engages gears by their index; one that does not exist is the last.
    fn engaged(&self, gear: usize) -> Option<Coupling> {
        let (_, coupling) = self.gears.get(gear).or(self.gears.last())?;
        *coupling
    }
}

impl Transmission for Shifted {
    fn gears(&self) -> Vec<String> {
        if self.by_direction {
            return Vec::new();
        }
        self.gears.iter().map(|(name, _)| name.clone()).collect()
    }

    fn coupling(&self, gear: usize) -> Coupling {
        self.engaged(gear).unwrap_or(Coupling::ideal(1.0))
    }

    fn open(&self, gear: usize) -> bool {
        self.engaged(gear).is_none()
    }

    fn gear_towards(&self, direction: Direction) -> Option<usize> {
        self.by_direction.then_some(usize::from(direction == Direction::Reverse))
    }

    fn input_inertia(&self) -> Known {
        Known::Value(self.inertia)
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }

    fn symbols(&self, state: &TransmissionState) -> Symbols {
        match self.engaged(state.gear) {
            Some(coupling) => symbols(&coupling, state),
            None => Vec::new(),
        }
    }
}
