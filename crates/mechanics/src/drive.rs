//! A drive as plain values: what the solver is asked.

mod bits;

use crate::registry::KindRow;
use crate::values::{Duty, Values};

pub use bits::Bits;

/// A drive to be solved.
#[derive(Clone, Debug, PartialEq)]
pub struct DriveSpec {
    /// Every part that takes part, supplies included.
    pub parts: Vec<PartSpec>,
    /// How they stand behind one another.
    pub chain: Chain,
    /// The settings of the drive.
    pub settings: Settings,
}

/// A part of a drive.
#[derive(Clone, Debug, PartialEq)]
pub struct PartSpec {
    /// Its name in the spec, for messages.
    pub name: String,
    /// Its row.
    pub row: &'static KindRow,
    /// Its fields.
    pub values: Values,
    /// `on = no` takes a source out: it gives and brakes nothing, but its inertia stays.
    pub on: bool,
}

/// How parts stand behind one another, from the sources to the loads.
#[derive(Clone, Debug, PartialEq)]
pub enum Chain {
    /// `count` equal parts side by side.
    Part {
        /// Index in [`DriveSpec::parts`].
        index: usize,
        /// How many.
        count: u32,
    },
    /// One behind the other.
    Series(Vec<Chain>),
    /// On one shaft, at one speed; torques add.
    Joined(Vec<Chain>),
}

/// Which way the load moves.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub enum Direction {
    /// As the load's law counts positive: up for a hoist, ahead for a vehicle.
    #[default]
    Forward,
    /// The other way. Speeds, torques and powers are still counted positive in the direction of motion.
    Reverse,
}

/// The settings of a drive.
#[derive(Clone, Debug, PartialEq)]
pub struct Settings {
    /// Which way.
    pub direction: Direction,
    /// The gear engaged in every gearbox of the drive.
    pub gear: Option<String>,
    /// The speed a servo, inverter or governor holds, at a station.
    pub set_speed: Option<StatedSpeed>,
    /// Drop of the set speed from no torque to full torque, as a ratio.
    pub droop: f64,
    /// Share of the reached speed at which the run-up counts as done.
    pub run_up_to: f64,
    /// The duty the drive is used at.
    pub duty: Option<Duty>,
    /// Factor on the load's torque for choosing parts; does not change the operating point.
    pub application_factor: f64,
    /// Ambient temperature in K, where given.
    pub ambient: Option<f64>,
    /// Altitude in m, where given.
    pub altitude: Option<f64>,
}

impl Default for Settings {
    fn default() -> Self {
        Self {
            direction: Direction::Forward,
            gear: None,
            set_speed: None,
            droop: 0.0,
            run_up_to: 0.95,
            duty: None,
            application_factor: 1.0,
            ambient: None,
            altitude: None,
        }
    }
}

/// Which side of a part.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Port {
    /// Toward the sources.
    Input,
    /// Toward the loads.
    Output,
}

/// A speed asked for at a station.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StatedSpeed {
    /// The part; `None` for the drive's own speed, which is that of its (first) load.
    pub part: Option<usize>,
    /// The side; `None` for the usual one of its role (a source's and transmission's output, a load's input).
    pub port: Option<Port>,
    /// rad/s or m/s, in the direction of motion.
    pub speed: f64,
}
