//! The straight line of torque (or force) over speed.
//!
//! Formula: `T = T0 * (1 - w / w0)`; power is greatest at half the no-load speed, `T0 * w0 / 4`.
//! Symbols: T torque (N·m) (force (N)), T0 at standstill; w speed (rad/s) ((m/s)), w0 without load.
//! Validity: sources whose torque falls evenly with speed: a permanent-magnet motor on a stiff supply, a muscle
//! over a short effort. Beyond w0 the line turns negative: the source brakes, if its supply lets it.
//! Source: Common practice, closed form. The peak at half speed is checked against the torque line of McCartney, Heigenhauser
//! and Jones, J. Appl. Physiol. 55 (1983) 218, and the optimum of Martin, Wagner and Coyle, Med. Sci. Sports
//! Exerc. 29 (1997) 1505.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// The line itself.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "T0 * (1 - w / w0)",
    symbols: &[
        ("T0", "torque", "stall torque"),
        ("w", "rotational_speed", "speed"),
        ("w0", "rotational_speed", "no-load speed"),
    ],
    validity: "from standstill to the no-load speed; beyond it the source brakes along the same line, where it can",
    source: "common practice, no source",
    revision: 1,
};

/// The line of a source in straight motion.
pub const FORCE: Formula = Formula {
    name: "force",
    text: "F0 * (1 - v / v0)",
    symbols: &[("F0", "force", "stall force"), ("v", "speed", "speed"), ("v0", "speed", "no-load speed")],
    validity: "from standstill to the no-load speed; beyond it the source brakes along the same line, where it can",
    source: "common practice, no source",
    revision: 1,
};

/// Its greatest power.
pub const PEAK_POWER: Formula = Formula {
    name: "peak_power",
    text: "T0 * w0 / 4",
    symbols: &[("T0", "torque", "stall torque"), ("w0", "rotational_speed", "no-load speed")],
    validity: "at half the no-load speed and half the stall torque; not a continuous rating",
    source: "closed form, maximum of T·ω on the line",
    revision: 1,
};

/// The greatest power of a source in straight motion.
pub const PEAK_POWER_OF_FORCE: Formula = Formula {
    name: "peak_power",
    text: "F0 * v0 / 4",
    symbols: &[("F0", "force", "stall force"), ("v0", "speed", "no-load speed")],
    validity: "at half the no-load speed and half the stall force; not a continuous rating",
    source: "closed form, maximum of F·v on the line",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TORQUE,
        domain: &[(0.1, 1e4), (0.0, 1e3), (0.1, 1e3)],
        kernel: |x| Line { stall: x[0], no_load: x[2] }.effort(x[1]),
    },
    Checked {
        formula: &FORCE,
        domain: &[(0.1, 1e4), (0.0, 1e2), (0.1, 1e2)],
        kernel: |x| Line { stall: x[0], no_load: x[2] }.effort(x[1]),
    },
    Checked {
        formula: &PEAK_POWER,
        domain: &[(0.1, 1e4), (0.1, 1e3)],
        kernel: |x| Line { stall: x[0], no_load: x[1] }.peak_power(),
    },
    Checked {
        formula: &PEAK_POWER_OF_FORCE,
        domain: &[(0.1, 1e4), (0.1, 1e2)],
        kernel: |x| Line { stall: x[0], no_load: x[1] }.peak_power(),
    },
];

/// A straight line by its two ends, both above zero.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Line {
    /// Torque (N·m) or force (N) at standstill.
    pub stall: f64,
    /// Speed (rad/s or m/s) at which nothing is left.
    pub no_load: f64,
}

impl Line {
    /// Torque or force at a speed.
    #[must_use]
    pub fn effort(&self, speed: f64) -> f64 {
        self.stall * (1.0 - speed / self.no_load)
    }

    /// Change of torque or force per change of speed; below zero.
    #[must_use]
    pub fn slope(&self) -> f64 {
        -self.stall / self.no_load
    }

    /// The greatest power, at half the no-load speed.
    #[must_use]
    pub fn peak_power(&self) -> f64 {
        self.stall * self.no_load / 4.0
    }

    /// From the stall torque and the greatest power.
    #[must_use]
    pub fn from_stall_and_peak(stall: f64, peak_power: f64) -> Self {
        Self { stall, no_load: 4.0 * peak_power / stall }
    }

    /// From the no-load speed and the greatest power.
    #[must_use]
    pub fn from_no_load_and_peak(no_load: f64, peak_power: f64) -> Self {
        Self { stall: 4.0 * peak_power / no_load, no_load }
    }

    /// Through two points (speed, effort); `None` unless the line falls and both ends come out above zero.
    #[must_use]
    pub fn through(a: (f64, f64), b: (f64, f64)) -> Option<Self> {
        let slope = (b.1 - a.1) / (b.0 - a.0);
        let stall = a.1 - slope * a.0;
        let no_load = -stall / slope;
        let good = slope.is_finite() && slope < 0.0 && stall > 0.0 && no_load.is_finite();
        good.then_some(Self { stall, no_load })
    }
}

#[cfg(test)]
mod tests {
    use super::Line;
    use crate::laws::testing::{close, rpm};

    #[test]
    fn peak_stands_at_half_speed() {
        // Closed form.
        let line = Line { stall: 0.325, no_load: rpm(600.0) };
        close(line.peak_power(), 5.105_088_062_08, 1e-10);
        close(line.effort(rpm(300.0)), 0.1625, 1e-10);
        let line = Line { stall: 0.0722, no_load: rpm(3750.0) };
        close(line.peak_power(), 7.088_218_424_66, 1e-10);
        close(line.effort(rpm(1875.0)), 0.0361, 1e-10);
    }

    #[test]
    fn published_torque_line_of_cycling() {
        // N. McCartney, G. J. F. Heigenhauser, N. L. Jones, J. Appl. Physiol. 55 (1983) 218-224:
        // T = 61.7 - 0.234 n, N·m per litre of thigh muscle, n in rpm.
        let line = Line::through((0.0, 61.7), (rpm(100.0), 61.7 - 23.4)).unwrap();
        close(line.no_load, rpm(263.675_213_675), 1e-10);
        close(line.peak_power(), 425.915_158_726, 1e-10);
    }

    #[test]
    fn published_force_line_of_cycling() {
        // A. J. Sargeant, E. Hoinville, A. Young, J. Appl. Physiol. 51 (1981) 1175-1182:
        // F = 27.51 - 0.125 n, kgf per litre of thigh, n in rpm; optimum at 110 rpm.
        let line = Line::through((0.0, 27.51), (rpm(100.0), 15.01)).unwrap();
        close(line.no_load, rpm(220.08), 1e-10);
        close(line.no_load / 2.0, rpm(110.04), 1e-10);
    }

    #[test]
    fn from_a_published_optimum() {
        // J. C. Martin, B. M. Wagner, E. F. Coyle, Med. Sci. Sports Exerc. 29 (1997) 1505-1512: 1317 W at 122 rpm.
        let line = Line::from_no_load_and_peak(2.0 * rpm(122.0), 1317.0);
        close(line.stall, 206.170_878_74, 1e-10);
        close(line.effort(rpm(122.0)), 103.085_439_37, 1e-10);
        let back = Line::from_stall_and_peak(line.stall, 1317.0);
        close(back.no_load, rpm(244.0), 1e-12);
    }

    #[test]
    fn force_velocity_profile_of_a_sprint() {
        // H. Jaafar et al., BioMed Res. Int. 2015, 954780: braking force falls linearly with pedal rate, Pmax = F0 v0 / 4.
        let line = Line { stall: 200.0, no_load: rpm(240.0) };
        close(line.peak_power() / (line.stall * line.no_load), 0.25, 1e-12);
        close(line.effort(rpm(120.0)), 100.0, 1e-12);
    }

    #[test]
    fn two_points_that_make_no_source() {
        assert_eq!(Line::through((10.0, 1.0), (20.0, 2.0)), None, "rises");
        assert_eq!(Line::through((10.0, 1.0), (10.0, 2.0)), None, "stands upright");
        assert_eq!(Line::through((10.0, 1.0), (20.0, 1.0)), None, "is level");
        assert_eq!(Line::through((-10.0, -1.0), (20.0, -2.0)), None, "lies below zero");
    }
}
