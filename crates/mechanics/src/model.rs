//! What a part must answer before it can stand in a drive: one trait a role.
//!
//! A kind reads its fields into one of these once; the solver asks only through them. SI throughout. Speeds are
//! rad/s on rotary and m/s on linear motion, efforts N·m and N, inertias kg·m² and kg, so that speed times effort
//! is always W.
//!
//! Signs: a source's effort is positive when it drives in its own running direction; a load's effort is positive
//! when it opposes motion in its own positive sense. The solver turns them to the direction asked for.

use std::fmt::Debug;

use crate::curve::Curve;
use crate::fault::Fault;
use crate::scalar::{Dual, Enclosure, Real};
use crate::solution::Answer;
use crate::values::Duty;

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

// -- supplies ---------------------------------------------------------------------------------------------------

/// What a supply feeds with.
#[derive(Clone, Copy, Debug, PartialEq, Default)]
pub struct SupplyData {
    /// Voltage without load, V.
    pub voltage: Option<f64>,
    /// Frequency, Hz; none for direct current.
    pub frequency: Option<f64>,
    /// Inner resistance with its leads, Ω; `Some(0.0)` where it is declared stiff, `None` where nothing is said.
    pub resistance: Option<f64>,
    /// Most current it gives, A.
    pub current_limit: Option<f64>,
    /// Whether it takes power back; `None` where nothing is said.
    pub accepts_return: Option<bool>,
    /// Pressure difference of a hydraulic or pneumatic supply, Pa.
    pub pressure: Option<f64>,
    /// Most flow it gives, m³/s.
    pub flow_limit: Option<f64>,
}

/// A supply.
pub trait Supply: Debug + Send + Sync {
    /// What it feeds with.
    fn data(&self) -> SupplyData;

    /// Voltage (or pressure) at its terminals while it gives this current (or flow); a current below zero comes back.
    fn terminal(&self, current: f64) -> f64 {
        let data = self.data();
        match (data.voltage, data.pressure) {
            (Some(voltage), _) => voltage - data.resistance.unwrap_or(0.0) * current,
            (None, pressure) => pressure.unwrap_or(0.0),
        }
    }

    /// Results of its own, `None` if it has no result of this name.
    fn answer(&self, _name: &str, _current: f64) -> Option<Answer> {
        None
    }

    /// Values of the symbols in its row's formulas.
    fn symbols(&self, _current: f64) -> Vec<(&'static str, f64)> {
        Vec::new()
    }
}

/// What a source hangs on.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Feed {
    /// The supply of its field `supply`; `None` when it names none.
    pub supply: Option<SupplyData>,
    /// How many equal machines hang on that supply and pull it down together, itself included: each sees `machines`
    /// times the supply's resistance and a `machines`-th of its current limit.
    pub machines: f64,
    /// Ambient temperature, K, where the drive gives it.
    pub ambient: Option<f64>,
    /// Altitude, m, where the drive gives it.
    pub altitude: Option<f64>,
}

// -- sources ----------------------------------------------------------------------------------------------------

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
    /// Whether the data were taken at other conditions and scaled to these.
    pub scaled: bool,
    /// The speed at which it comes to the drive through a clutch: an engine's idle speed.
    pub idle: Option<f64>,
    /// Whether a set speed of the drive acts on it (servo, inverter, governor).
    pub follows_set_speed: bool,
    /// Whether it can run in both directions.
    pub reversible: bool,
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
            scaled: false,
            idle: None,
            follows_set_speed: true,
            reversible: true,
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

// -- transmissions ----------------------------------------------------------------------------------------------

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

    /// Results of its own, `None` if it has no result of this name.
    fn answer(&self, _name: &str, _state: &TransmissionState) -> Option<Answer> {
        None
    }

    /// Values of the symbols in its row's formulas.
    fn symbols(&self, _state: &TransmissionState) -> Vec<(&'static str, f64)> {
        Vec::new()
    }
}

// -- loads ------------------------------------------------------------------------------------------------------

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

    /// Results of its own, `None` if it has no result of this name.
    fn answer(&self, _name: &str, _state: &LoadState) -> Option<Answer> {
        None
    }

    /// Values of the symbols in its row's formulas.
    fn symbols(&self, _state: &LoadState) -> Vec<(&'static str, f64)> {
        Vec::new()
    }
}
