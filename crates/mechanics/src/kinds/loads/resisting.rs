//! What the loads share that resist motion in either direction by a law of the speed.

use std::sync::Arc;

use super::fields::{BREAKAWAY_FORCE, BREAKAWAY_TORQUE};
use crate::curve::{Curve, Law, Line};
use crate::fault::Fault;
use crate::kinds::reading::{bad_value, contradiction, inertia, limits};
use crate::model::{Known, Limit, LimitOn, Load, LoadState, Motion, Own, Standstill};
use crate::values::Values;

/// A load that resists motion in either direction.
pub(super) struct Resisting<L> {
    /// How it moves.
    pub motion: Motion,
    /// Effort over speed, for both signs of the speed.
    pub law: L,
    /// Effort that sets it moving from rest.
    pub breakaway: f64,
    /// Inertia or mass.
    pub inertia: Known,
    /// A speed of the order of its usual one.
    pub usual_speed: Option<f64>,
    /// The range of speeds its data were measured in.
    pub measured: Option<(f64, f64)>,
    /// Limits.
    pub limits: Vec<Limit>,
    /// Symbols of its formulas that its fields settle.
    pub symbols: Vec<(&'static str, f64)>,
    /// Symbols of its formulas that change with the speed.
    pub moving: Vec<(&'static str, Arc<dyn Curve>)>,
    /// Results of its own.
    pub own: Vec<(&'static str, Own)>,
}

impl<L: Law> Resisting<L> {
    /// A law with what the fields say beside it: inertia or mass, highest speed. Nothing holds it at rest, and its
    /// formula names the speed.
    pub fn new(motion: Motion, law: L, values: &Values, faults: &mut Vec<Fault>) -> Self {
        let speed: Arc<dyn Curve> = Arc::new(Line { at_zero: 0.0, slope: 1.0 });
        Self {
            motion,
            law,
            breakaway: 0.0,
            inertia: mass_or_inertia(motion, values, faults),
            usual_speed: None,
            measured: None,
            limits: limits(values, &[("max_speed", LimitOn::InputSpeed)]),
            symbols: Vec::new(),
            moving: vec![(if motion == Motion::Rotary { "w" } else { "v" }, speed)],
            own: Vec::new(),
        }
    }
}

impl<L> std::fmt::Debug for Resisting<L> {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.debug_struct("Resisting").field("symbols", &self.symbols).finish_non_exhaustive()
    }
}

impl<L: Law + Clone + 'static> Load for Resisting<L> {
    fn motion(&self) -> Motion {
        self.motion
    }

    fn demand(&self) -> Box<dyn Curve> {
        Box::new(self.law.clone())
    }

    fn standstill(&self) -> Standstill {
        Standstill { holding: 0.0, breakaway_forward: self.breakaway, breakaway_reverse: -self.breakaway }
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn usual_speed(&self) -> Option<f64> {
        self.usual_speed
    }

    fn measured(&self) -> Option<(f64, f64)> {
        self.measured
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }

    fn own(&self, name: &str) -> Option<Own> {
        self.own.iter().find(|(own, _)| *own == name).map(|(_, own)| own.clone())
    }

    fn symbols(&self, state: &LoadState) -> Vec<(&'static str, f64)> {
        let moving = self.moving.iter().map(|(name, curve)| (*name, curve.at(state.speed)));
        self.symbols.iter().copied().chain(moving).collect()
    }
}

/// Inertia of a load whose motion its fields decide: `inertia` turning, `mass` running straight.
pub(super) fn mass_or_inertia(motion: Motion, values: &Values, faults: &mut Vec<Fault>) -> Known {
    let foreign: &[&'static str] = match motion {
        Motion::Rotary => &["mass"],
        Motion::Linear => &["inertia", "flywheel_effect"],
    };
    for field in foreign.iter().copied().filter(|field| values.get(field).is_some()) {
        let template = "a load that turns has an inertia, one that runs straight has a mass";
        faults.push(contradiction(&[field], template, &[]));
    }
    match motion {
        Motion::Rotary => inertia(values, faults),
        Motion::Linear => Known::of(values.si("mass"), "mass"),
    }
}

/// Effort that sets a load moving, by whichever field says it: a torque or force, or its ratio to the effort just
/// after. One that is below the effort just after is no breakaway.
pub(super) fn breakaway(values: &Values, motion: Motion, running: f64, faults: &mut Vec<Fault>) -> f64 {
    let (own, foreign) = match motion {
        Motion::Rotary => (BREAKAWAY_TORQUE.name, BREAKAWAY_FORCE.name),
        Motion::Linear => (BREAKAWAY_FORCE.name, BREAKAWAY_TORQUE.name),
    };
    if values.si(foreign).is_some() {
        let template = "a load that turns breaks away with a torque, one that runs straight with a force";
        faults.push(contradiction(&[foreign], template, &[]));
    }
    let ratio = values.si("breakaway_ratio");
    let Some(effort) = values.si(own) else { return running * ratio.unwrap_or(1.0) };
    let kind = motion.effort_kind();
    if let Some(ratio) = ratio {
        let template = "both say the same thing: the ratio makes {0}, the other field says {1}; keep one";
        faults.push(contradiction(
            &["breakaway_ratio", own],
            template,
            &[(running * ratio, kind), (effort, kind)],
        ));
    }
    if effort < running * (1.0 - 1e-9) {
        let template = "just after it moves it takes {0}, so less than that does not set it moving";
        faults.push(bad_value(own, template, &[(running, kind)]));
    }
    effort
}
