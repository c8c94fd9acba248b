//! A door for Rust users: quantities of `uom` in, quantities of `uom` out, so that wrong physics does not compile.
//!
//! ```
//! use layshaft_mechanics::typed::{Gear, Quadratic, StraightLine};
//! use uom::si::angular_velocity::revolution_per_minute;
//! use uom::si::f64::{AngularVelocity, Ratio, Torque};
//! use uom::si::power::watt;
//! use uom::si::ratio::{percent, ratio};
//! use uom::si::torque::newton_meter;
//!
//! # fn main() -> Result<(), layshaft_mechanics::typed::OutOfRange> {
//! let rpm = AngularVelocity::new::<revolution_per_minute>;
//! let motor = StraightLine::new(Torque::new::<newton_meter>(4.8), rpm(3000.0))?;
//! let fan = Quadratic::through(Torque::new::<newton_meter>(6.0), rpm(1450.0))?;
//! let belt = Gear::new(Ratio::new::<ratio>(1.6), Ratio::new::<percent>(95.0))?;
//!
//! // The fan as the motor sees it, and where the two meet.
//! let point = motor.against(belt.reflected(fan));
//! assert!(point.speed > rpm(1650.0) && point.speed < rpm(1750.0));
//!
//! // The most power the motor can give, at half its no-load speed.
//! let peak = motor.peak_power();
//! assert!((peak.speed - rpm(1500.0)).abs() < rpm(1e-9));
//! assert!(point.power < peak.power);
//! assert!(point.power.get::<watt>() > 350.0);
//! # Ok(())
//! # }
//! ```
//!
//! For laws of your own see [`operating_points`]; for many drives at once [`straight_lines_against_quadratics`] and
//! [`sole_operating_point`].

mod points;
mod sole;

use uom::si::angular_velocity::radian_per_second;
use uom::si::f64::{AngularVelocity, Power, Ratio, Torque};
use uom::si::power::watt;
use uom::si::ratio::ratio;
use uom::si::torque::newton_meter;

pub use points::{Point, operating_points};
pub use sole::{Sole, sole_operating_point};

/// A quantity that the law cannot take.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct OutOfRange {
    /// Which one.
    pub what: &'static str,
    /// Its SI value.
    pub si: f64,
    /// What it has to be.
    pub wanted: &'static str,
}

impl std::fmt::Display for OutOfRange {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{} is {} in SI and must be {}", self.what, self.si, self.wanted)
    }
}

impl std::error::Error for OutOfRange {}

fn positive(what: &'static str, si: f64) -> Result<f64, OutOfRange> {
    if si > 0.0 && si.is_finite() {
        Ok(si)
    } else {
        Err(OutOfRange { what, si, wanted: "above zero and finite" })
    }
}

/// A rotary source whose torque falls in a straight line from rest to no-load speed: `T = T0 (1 - w / w0)`, for
/// `0 <= w <= w0`. Source: common practice; published checks of such lines stand in the tests.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StraightLine {
    stall: f64,
    no_load: f64,
}

/// A load whose torque rises with the square of speed: `T = c w²`, for `w >= 0`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Quadratic {
    coefficient: f64,
}

/// A gear of fixed reduction (input speed over output speed) and efficiency, power flowing from input to output.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Gear {
    reduction: f64,
    efficiency: f64,
}

/// Speed, torque and power at one place.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Station {
    /// Speed.
    pub speed: AngularVelocity,
    /// Torque.
    pub torque: Torque,
    /// Mechanical power, their product.
    pub power: Power,
}

impl Station {
    fn of(speed: f64, torque: f64) -> Self {
        Self {
            speed: AngularVelocity::new::<radian_per_second>(speed),
            torque: Torque::new::<newton_meter>(torque),
            power: Power::new::<watt>(speed * torque),
        }
    }
}

impl StraightLine {
    /// From torque at rest and speed without load.
    ///
    /// # Errors
    ///
    /// Both must be above zero and finite.
    pub fn new(stall: Torque, no_load: AngularVelocity) -> Result<Self, OutOfRange> {
        Ok(Self {
            stall: positive("the stall torque", stall.get::<newton_meter>())?,
            no_load: positive("the no-load speed", no_load.get::<radian_per_second>())?,
        })
    }

    /// Torque at a speed; below zero above the no-load speed.
    #[must_use]
    pub fn torque(&self, speed: AngularVelocity) -> Torque {
        Torque::new::<newton_meter>(self.stall * (1.0 - speed.get::<radian_per_second>() / self.no_load))
    }

    /// The most power it can give: at half its no-load speed, `T0 w0 / 4`.
    #[must_use]
    pub fn peak_power(&self) -> Station {
        Station::of(0.5 * self.no_load, 0.5 * self.stall)
    }

    /// Where it meets a quadratic load: the one operating point, which is stable.
    #[must_use]
    pub fn against(&self, load: Quadratic) -> Station {
        let speed = meet(self.stall, self.no_load, load.coefficient);
        Station::of(speed, load.coefficient * speed * speed)
    }
}

impl Quadratic {
    /// Through one known point.
    ///
    /// # Errors
    ///
    /// Torque and speed must be above zero and finite.
    pub fn through(torque: Torque, speed: AngularVelocity) -> Result<Self, OutOfRange> {
        let torque = positive("the torque", torque.get::<newton_meter>())?;
        let speed = positive("the speed", speed.get::<radian_per_second>())?;
        Ok(Self { coefficient: torque / (speed * speed) })
    }

    /// Torque at a speed of the usual sense.
    #[must_use]
    pub fn torque(&self, speed: AngularVelocity) -> Torque {
        let speed = speed.get::<radian_per_second>();
        Torque::new::<newton_meter>(self.coefficient * speed * speed.abs())
    }
}

impl Gear {
    /// From reduction and efficiency.
    ///
    /// # Errors
    ///
    /// The reduction must be above zero, the efficiency above zero and at most 1.
    pub fn new(reduction: Ratio, efficiency: Ratio) -> Result<Self, OutOfRange> {
        let reduction = positive("the reduction", reduction.get::<ratio>())?;
        let efficiency = positive("the efficiency", efficiency.get::<ratio>())?;
        if efficiency > 1.0 {
            return Err(OutOfRange { what: "the efficiency", si: efficiency, wanted: "at most 1" });
        }
        Ok(Self { reduction, efficiency })
    }

    /// A load at the output as it is seen at the input: `T_in = T_out / (i eta)` at `w_in = i w_out`.
    #[must_use]
    pub fn reflected(&self, load: Quadratic) -> Quadratic {
        let i = self.reduction;
        Quadratic { coefficient: load.coefficient / (i * i * i * self.efficiency) }
    }
}

/// The positive zero of `T0 (1 - w / w0) - c w²`, in the form that does not cancel; `w0` itself without load.
#[inline]
fn meet(stall: f64, no_load: f64, coefficient: f64) -> f64 {
    let slope = stall / no_load;
    2.0 * stall / (slope + (slope * slope + 4.0 * coefficient * stall).sqrt())
}

/// Operating speeds of many drives at once, each a straight line against a quadratic load, in closed form and without
/// allocating: `speeds[k]` for `sources[k]` and `loads[k]`. What has no counterpart in the other lists is left alone.
pub fn straight_lines_against_quadratics(
    sources: &[StraightLine],
    loads: &[Quadratic],
    speeds: &mut [AngularVelocity],
) {
    for ((source, load), speed) in sources.iter().zip(loads).zip(speeds) {
        *speed =
            AngularVelocity::new::<radian_per_second>(meet(source.stall, source.no_load, load.coefficient));
    }
}

#[cfg(test)]
mod tests;
