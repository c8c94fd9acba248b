//! What a source must answer: its characteristic on a feed, its braking, limits and electrical side.

use std::fmt::Debug;

use super::{Feed, Known, Motion};
use crate::curve::Curve;
use crate::fault::Fault;
use crate::scalar::{Dual, Enclosure, Real};
use crate::solution::Answer;
use crate::values::Duty;

/// How a source takes a load that drives it.
pub enum Braking {
    /// It holds back. The curve is the most it can hold back (0 or above) at a speed above zero when a set speed is
    /// held with it; without a set speed the part of the drive curve below zero is what it gives.
    Can(Box<dyn Curve>),
    /// It gives nothing: the part of the drive curve below zero counts as zero.
    Cannot,
    /// Not said, and it has no default: the field to name, `braking` of the source or `accepts_return` of its supply.
    Unknown(&'static str),
}

/// What a source gives at full command, while it hangs on a given feed.
pub struct Characteristic {
    /// Effort over speed at full command, with its sign, for every speed: above no-load speed it is below zero as
    /// the machine naturally holds back; below speed zero (driven backwards by the load) it is what it still pushes.
    /// Its own governor and top speed are in it, as jumps or slopes.
    pub drive: Box<dyn Curve>,
    /// What happens when the load drives.
    pub braking: Braking,
    /// A speed of the order of its highest useful one (no-load, synchronous, maximum): where to look first. Above 0.
    pub top_speed: f64,
    /// The range of speeds its data were measured in.
    pub measured: Option<(f64, f64)>,
    /// The range of efforts its data were measured in, where the speeds follow the supply.
    pub measured_effort: Option<(f64, f64)>,
    /// Whether the data were taken at other conditions and scaled to these.
    pub scaled: bool,
    /// The speed at which it comes to the drive through a clutch: an engine's idle speed.
    pub idle: Option<f64>,
    /// The field that would have to say at which speed it runs where the drive sets none.
    pub needs_set_speed: Option<&'static str>,
    /// Drop of its set speed from no torque to full torque, where it has one of its own.
    pub droop: Option<f64>,
    /// Whether a set speed of the drive acts on it (servo, inverter, governor).
    pub follows_set_speed: bool,
    /// Whether it can run in both directions.
    pub reversible: bool,
    /// The speed it holds whatever that takes: a source without limits, for sizing before a motor is chosen.
    pub holds: Option<f64>,
}

impl Characteristic {
    /// A reversible source without measured range, idle speed or scaling that follows a set speed.
    #[must_use]
    pub fn new(drive: Box<dyn Curve>, braking: Braking, top_speed: f64) -> Self {
        Self {
            drive,
            braking,
            top_speed,
            measured: None,
            measured_effort: None,
            scaled: false,
            idle: None,
            droop: None,
            needs_set_speed: None,
            follows_set_speed: true,
            reversible: true,
            holds: None,
        }
    }
}

/// What a source can give for long at a duty, and its hard limits; `None` where nothing is said.
#[derive(Clone, Copy, Debug, PartialEq, Default)]
pub struct Ratings {
    /// Continuous effort at the duty.
    pub effort: Option<f64>,
    /// Continuous power at the duty, W, at the shaft.
    pub power: Option<f64>,
    /// Continuous current at the duty, A.
    pub current: Option<f64>,
    /// The duty these are for; `None` for continuous running (S1).
    pub duty: Option<Duty>,
    /// Highest speed it may turn.
    pub max_speed: Option<f64>,
    /// Highest effort it may give even for a moment.
    pub max_effort: Option<f64>,
}

/// The electrical (or hydraulic, fuel …) side of one machine; `None` where the kind cannot know it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Drawn<R> {
    /// Current of the machine, A.
    pub current: Option<R>,
    /// Current it takes from the supply, A; below zero when it gives back.
    pub supply_current: Option<R>,
    /// Voltage at the machine, V.
    pub voltage: Option<R>,
    /// Power it takes in, W.
    pub input_power: Option<R>,
}

impl<R> Drawn<R> {
    /// Nothing is known.
    pub const NOTHING: Self = Self { current: None, supply_current: None, voltage: None, input_power: None };
}

/// What one machine takes in at a speed and an effort: written once for all numbers.
pub trait DrawLaw: Send + Sync {
    /// At this speed and effort (effort within what it can give there).
    fn eval<R: Real>(&self, speed: R, effort: R) -> Drawn<R>;
}

/// The same as an object.
pub trait Draw: Send + Sync {
    /// At a point.
    fn at(&self, speed: f64, effort: f64) -> Drawn<f64>;
    /// Bounds over a range.
    fn over(&self, speed: Enclosure, effort: Enclosure) -> Drawn<Enclosure>;
    /// With slopes.
    fn dual(&self, speed: Dual, effort: Dual) -> Drawn<Dual>;
}

impl<L: DrawLaw> Draw for L {
    fn at(&self, speed: f64, effort: f64) -> Drawn<f64> {
        self.eval(speed, effort)
    }
    fn over(&self, speed: Enclosure, effort: Enclosure) -> Drawn<Enclosure> {
        self.eval(speed, effort)
    }
    fn dual(&self, speed: Dual, effort: Dual) -> Drawn<Dual> {
        self.eval(speed, effort)
    }
}

/// Where a source stands in a solved drive.
#[derive(Clone, Copy, Debug)]
pub struct SourceState<'a> {
    /// Its speed.
    pub speed: f64,
    /// The effort of each machine, with its sign.
    pub effort: f64,
    /// What it hangs on.
    pub feed: &'a Feed,
}

/// A power plant.
pub trait Source: Debug + Send + Sync {
    /// How its shaft (or rod, or pedal force) moves.
    fn motion(&self) -> Motion;

    /// Its inertia at its own shaft.
    fn inertia(&self) -> Known;

    /// What it gives while it hangs on this feed. A feed that is missing something it needs is refused by field.
    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>>;

    /// Its electrical side on this feed; `None` when it has none.
    fn draw(&self, _feed: &Feed) -> Option<Box<dyn Draw>> {
        None
    }

    /// What it can give for long, and its limits.
    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        Ratings::default()
    }

    /// What bounds it at full command at this speed: `torque`, `current`, `supply` or `governor`.
    fn limited_by(&self, _feed: &Feed, _speed: f64) -> &'static str {
        "torque"
    }

    /// Results of its own beyond the common ones, `None` if it has no result of this name.
    fn answer(&self, _name: &str, _state: &SourceState<'_>) -> Option<Answer> {
        None
    }

    /// Values of the symbols in its row's formulas at this state.
    fn symbols(&self, _state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        Vec::new()
    }
}
