//! Work in strokes from a flywheel.
//!
//! Formula: mean torque `T = W / (2*pi*N)` with a stroke every N turns, or `T = min(W * n / w, W / (2*pi))` with n strokes
//! per time, never more than one a turn; from the flywheel `dE = W * (1 - u)`; `dw = w - sqrt(w^2 - 2*dE/J)`;
//! coefficient of fluctuation `c = dE / (J * w^2)`.
//! Symbols: W work of a stroke (J); u share of the cycle in which the work is done (-); J inertia of the flywheel (kg·m²);
//! w speed (rad/s); dw drop of the speed.
//! Validity: the source gives its mean torque all through the cycle; a source that slips under the stroke gives more, and
//! the drop is smaller. The drop is counted from the speed at the operating point down. For small drops c is dw/w.
//! Source: R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, chapters 3 and 16.
//! Revision: 1

use std::f64::consts::TAU;

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

const BOOK: &str = "R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 3 and 16";

/// Mean torque with a stroke every so many turns.
pub const TORQUE_BY_TURNS: Formula = Formula {
    name: "torque",
    text: "W / (2 * pi * N)",
    symbols: &[("W", "energy", "work of a stroke"), ("N", "number", "turns for each stroke")],
    validity: "mean over the cycle",
    source: BOOK,
    revision: 1,
};

/// Mean torque with so many strokes per time.
pub const TORQUE_BY_RATE: Formula = Formula {
    name: "torque",
    text: "min(W * n / w, W / (2 * pi))",
    symbols: &[
        ("W", "energy", "work of a stroke"),
        ("n", "rate", "strokes per time"),
        ("w", "rotational_speed", "speed"),
    ],
    validity: "mean over the cycle; one stroke a turn at most",
    source: BOOK,
    revision: 1,
};

/// Energy the flywheel gives.
pub const FLYWHEEL_ENERGY: Formula = Formula {
    name: "flywheel_energy",
    text: "W * (1 - u)",
    symbols: &[("W", "energy", "work of a stroke"), ("u", "number", "share of the cycle the stroke takes")],
    validity: "the source gives its mean torque all through",
    source: BOOK,
    revision: 1,
};

/// Drop of the speed.
pub const SPEED_DROP: Formula = Formula {
    name: "speed_drop",
    text: "w - sqrt(w^2 - 2 * dE / J)",
    symbols: &[
        ("w", "rotational_speed", "speed before the stroke"),
        ("dE", "energy", "energy from the flywheel"),
        ("J", "moment_of_inertia", "inertia of the flywheel"),
    ],
    validity: "inertias on other shafts left aside: with them the drop is smaller",
    source: BOOK,
    revision: 1,
};

/// Coefficient of fluctuation.
pub const FLUCTUATION: Formula = Formula {
    name: "speed_fluctuation",
    text: "dE / (J * w^2)",
    symbols: &[
        ("dE", "energy", "energy from the flywheel"),
        ("J", "moment_of_inertia", "inertia of the flywheel"),
        ("w", "rotational_speed", "mean speed"),
    ],
    validity: "small drops",
    source: BOOK,
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TORQUE_BY_TURNS,
        domain: &[(1.0, 1e5), (1.0, 20.0)],
        kernel: |x| Strokes::EveryTurns(x[1]).mean_torque(x[0]).eval(1.0),
    },
    Checked {
        formula: &TORQUE_BY_RATE,
        domain: &[(1.0, 1e5), (0.01, 3.0), (1.0, 50.0)],
        kernel: |x| Strokes::PerTime(x[1]).mean_torque(x[0]).eval(x[2]),
    },
    Checked { formula: &FLYWHEEL_ENERGY, domain: &[(1.0, 1e5), (0.0, 1.0)], kernel: |x| x[0] * (1.0 - x[1]) },
    Checked {
        formula: &SPEED_DROP,
        domain: &[(15.0, 50.0), (1.0, 1e3), (20.0, 500.0)],
        kernel: |x| drop(x[0], x[1], x[2]),
    },
    Checked {
        formula: &FLUCTUATION,
        domain: &[(1.0, 1e3), (20.0, 500.0), (15.0, 50.0)],
        kernel: |x| fluctuation(x[2], x[0], x[1]),
    },
];

/// How often a stroke comes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Strokes {
    /// One every so many turns.
    EveryTurns(f64),
    /// So many per second, one a turn at the most.
    PerTime(f64),
}

impl Strokes {
    /// The mean torque for this work of a stroke.
    #[must_use]
    pub fn mean_torque(self, work: f64) -> MeanTorque {
        MeanTorque { work, strokes: self, from: 0.0 }
    }

    /// Share of the cycle that is taken by a stroke of this time (s) at a speed.
    pub fn share<R: Real>(self, stroke: Stroke, speed: R) -> R {
        let share = match (self, stroke) {
            (Self::EveryTurns(turns), Stroke::Angle(angle)) => R::of(angle / (TAU * turns)),
            (Self::EveryTurns(turns), Stroke::Time(time)) => speed * (time / (TAU * turns)),
            (Self::PerTime(rate), Stroke::Time(time)) => R::of(time * rate),
            (Self::PerTime(rate), Stroke::Angle(angle)) => R::of(angle * rate) / speed,
        };
        share.min(R::of(1.0))
    }
}

/// How long a stroke takes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Stroke {
    /// s
    Time(f64),
    /// rad of the shaft.
    Angle(f64),
}

/// The mean torque over a speed of zero or above.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MeanTorque {
    work: f64,
    strokes: Strokes,
    from: f64,
}

impl MeanTorque {
    /// The same with strokes from a speed on, and none below it.
    #[must_use]
    pub fn from(self, speed: f64) -> Self {
        Self { from: speed, ..self }
    }

    /// While strokes are made.
    fn working<R: Real>(&self, speed: R) -> R {
        match self.strokes {
            Strokes::EveryTurns(turns) => R::of(self.work / (TAU * turns)),
            Strokes::PerTime(rate) => speed.piecewise(&[TAU * rate], |piece, speed| {
                if piece == 0 { R::of(self.work / TAU) } else { R::of(self.work * rate) / speed }
            }),
        }
    }
}

impl Law for MeanTorque {
    fn eval<R: Real>(&self, speed: R) -> R {
        if self.from == 0.0 {
            return self.working(speed);
        }
        speed
            .piecewise(&[self.from], |piece, speed| if piece == 0 { R::of(0.0) } else { self.working(speed) })
    }

    fn jumps(&self) -> Vec<f64> {
        if self.from == 0.0 { Vec::new() } else { vec![self.from] }
    }

    fn kinks(&self) -> Vec<f64> {
        match self.strokes {
            Strokes::EveryTurns(_) => Vec::new(),
            Strokes::PerTime(rate) => vec![TAU * rate],
        }
    }
}

/// Drop of the speed by an energy taken from an inertia; the whole speed where the energy is not there.
pub fn drop<R: Real>(speed: R, energy: R, inertia: f64) -> R {
    speed - (speed.square() - energy * (2.0 / inertia)).sqrt()
}

/// Coefficient of fluctuation of the speed.
pub fn fluctuation<R: Real>(speed: R, energy: R, inertia: f64) -> R {
    energy / (speed.square() * inertia)
}

#[cfg(test)]
mod tests {
    use super::{Stroke, Strokes, drop, fluctuation};
    use crate::curve::Law;
    use crate::laws::testing::{close, encloses, rpm};
    use proptest::prelude::*;

    #[test]
    fn published_riveter() {
        // Khurmi, Gupta, Ex. 3.3 (p. 34): 4 kW, 140 kg·m² at 240 rpm, 10 kJ in 1 s, 24 rivets a minute.
        let strokes = Strokes::PerTime(0.4);
        close(strokes.mean_torque(10e3).eval(rpm(240.0)) * rpm(240.0), 4e3, 1e-12);
        let share: f64 = strokes.share(Stroke::Time(1.0), rpm(240.0));
        close(drop(rpm(240.0), 10e3 * (1.0 - share), 140.0), rpm(16.877_176_414_6), 1e-10);
    }

    #[test]
    fn published_turning_moment() {
        // Khurmi, Gupta, Ex. 16.6 (p. 576): 8835.73 J from 180 kg·m² at 250 rpm.
        close(fluctuation(rpm(250.0), 8_835.729_338_22, 180.0), 0.071_619_724_391_4, 1e-10);
    }

    #[test]
    fn strokes_by_angle_and_turns() {
        let every: f64 = Strokes::EveryTurns(4.0).share(Stroke::Angle(std::f64::consts::PI), 5.0);
        close(every, 0.125, 1e-14);
        assert_eq!(Strokes::PerTime(1.0).share(Stroke::Time(2.0), 5.0), 1.0);
        assert_eq!(drop(1.0, 1e6, 1.0), 1.0);
        let clutched = Strokes::PerTime(0.5).mean_torque(1e3).from(20.0);
        assert_eq!((clutched.eval(19.0), clutched.eval(25.0)), (0.0, 20.0));
        assert_eq!(Law::jumps(&clutched), [20.0]);
    }

    proptest! {
        #[test]
        fn bounds_hold(rate in 0.1..3.0f64, lo in 0.1..40.0f64, width in 0.0..20.0f64, t in 0.0..1.0f64) {
            encloses(&Strokes::PerTime(rate).mean_torque(5e3), lo, width, t);
        }
    }
}
