//! What a transmission must answer: coupling, losses, drag, inertia, limits; brake, freewheel and grip.

use std::fmt::Debug;

use super::{Known, Motion};
use crate::curve::Curve;
use crate::drive::Direction;
use crate::laws::fluid_coupling::Fluid;
use crate::solution::Answer;

/// How a transmission couples its two ports, in one gear.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Coupling {
    /// Input speed per output speed, slip included, above 0: `reduction / (1 - slip)`; 1/m for a drum.
    pub speed: f64,
    /// Output effort per input effort without losses, above 0: `reduction`. Equals `speed` when nothing slips.
    pub effort: f64,
    /// Whether the output runs against the input.
    pub reverses: bool,
    /// Efficiency while power flows from input to output, above 0 up to 1. Slip is not in it.
    pub forward: f64,
    /// Efficiency while power flows back, at most 1; 0 or below is self-locking: the source must push to let it move.
    /// With slip the kind multiplies by `(1 - slip)²` here, so that slip loses power in both directions.
    pub backward: Known,
}

impl Coupling {
    /// Without slip and losses.
    #[must_use]
    pub const fn ideal(ratio: f64) -> Self {
        Self { speed: ratio, effort: ratio, reverses: false, forward: 1.0, backward: Known::Value(1.0) }
    }
}

/// What a limit of a part is about.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LimitOn {
    /// Effort at the input.
    InputEffort,
    /// Effort at the output.
    OutputEffort,
    /// Speed of the input.
    InputSpeed,
    /// Speed of the output.
    OutputSpeed,
    /// Power through it.
    Power,
}

/// A limit of a transmission or a load.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Limit {
    /// The field it comes from: `max_output_torque`.
    pub field: &'static str,
    /// What it is about.
    pub on: LimitOn,
    /// Greatest magnitude allowed.
    pub value: f64,
    /// The code a violation belongs to: `part-limit`, `overspeed` or `slips`.
    pub code: &'static str,
}

/// A brake that sits at the input shaft of a part.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Brake {
    /// Its torque (or force) when it bites.
    pub effort: f64,
    /// Time from switching off until it bites, s.
    pub apply_time: Known,
}

/// A wheel's hold on the ground.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Grip {
    /// Coefficient of friction.
    pub friction: f64,
    /// Share of the weight on the driven wheels.
    pub share: Known,
}

/// What is asked of a friction, and what it passes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Slip {
    /// Magnitude that has to pass.
    pub asked: f64,
    /// Most it passes.
    pub most: f64,
    /// Kind of both: `torque` or `force`.
    pub kind: &'static str,
}

/// Where a transmission stands in a solved drive: efforts and speeds are of one part and with their signs.
#[derive(Clone, Copy, Debug)]
pub struct TransmissionState {
    /// Speed of the input.
    pub input_speed: f64,
    /// Effort at the input.
    pub input_effort: f64,
    /// Speed of the output.
    pub output_speed: f64,
    /// Effort at the output.
    pub output_effort: f64,
    /// The gear engaged, for gearboxes.
    pub gear: usize,
}

/// What changes speed and torque, or a brake, freewheel or clutch where it sits.
pub trait Transmission: Debug + Send + Sync {
    /// How its input moves.
    fn input(&self) -> Motion {
        Motion::Rotary
    }

    /// How its output moves.
    fn output(&self) -> Motion {
        Motion::Rotary
    }

    /// The names of its gears; empty for all but gearboxes.
    fn gears(&self) -> Vec<String> {
        Vec::new()
    }

    /// How its ports are coupled in a gear (index in [`gears`](Self::gears), 0 without).
    fn coupling(&self, gear: usize) -> Coupling;

    /// Drag at its input over the input's speed: odd, opposing motion; part of its losses at any load.
    fn drag(&self) -> Option<Box<dyn Curve>> {
        None
    }

    /// Its inertia, at its input.
    fn input_inertia(&self) -> Known {
        Known::Value(0.0)
    }

    /// Its inertia at its output, if it is stated there.
    fn output_inertia(&self) -> Known {
        Known::Value(0.0)
    }

    /// Its limits.
    fn limits(&self) -> Vec<Limit> {
        Vec::new()
    }

    /// Its brake, if it has one.
    fn brake(&self) -> Option<Brake> {
        None
    }

    /// Whether it passes only driving effort from input to output and lets the input be left behind.
    fn one_way(&self) -> bool {
        false
    }

    /// Its hold on the ground, for wheels.
    fn grip(&self) -> Option<Grip> {
        None
    }

    /// What is asked of its friction where it stands so, and the most it passes; `None` where it cannot slip.
    fn slip(&self, _state: &TransmissionState) -> Option<Slip> {
        None
    }

    /// Whether it passes nothing in this gear: neutral, or a clutch that is out.
    fn open(&self, _gear: usize) -> bool {
        false
    }

    /// Its law, where its ports have no fixed ratio of speeds but pass one torque: a fluid coupling. Its
    /// [`coupling`](Self::coupling) is then ideal and one to one, and the source before it has a speed of its own.
    fn fluid(&self) -> Option<Fluid> {
        None
    }

    /// The gear it takes by the direction the drive is asked for, for a reversing gear; `None` for all others.
    fn gear_towards(&self, _direction: Direction) -> Option<usize> {
        None
    }

    /// Results of its own, `None` if it has no result of this name.
    fn answer(&self, _name: &str, _state: &TransmissionState) -> Option<Answer> {
        None
    }

    /// Values of the symbols in its row's formulas.
    fn symbols(&self, _state: &TransmissionState) -> Vec<(&'static str, f64)> {
        Vec::new()
    }
}
