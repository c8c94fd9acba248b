//! Torque of a combustion engine: full load up to its governed speed, then the governor's droop.
//!
//! Formula: full load as measured, times the derating factor; above the governed speed
//! `T_g * (w_0 - w) / (w_0 - w_g)` with `w_0 = w_g * (1 + d)`; turned faster, less than nothing down to its drag.
//! Symbols: T torque (N·m); T_g full-load torque at the governed speed w_g (rad/s); d droop, speed without load over
//! governed speed less one (-); w_0 speed without load (rad/s).
//! Validity: steady state, warm; a turbocharged engine that is loaded suddenly gives less for seconds.
//! Source: droop as ISO 3046-4 defines it (from memory).
//! Revision: 1

use super::Checked;
use super::table::Table;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// On the governor's line.
pub const GOVERNED: Formula = Formula {
    name: "governed_torque",
    text: "T_g * (w_g * (1 + d) - w) / (w_g * d)",
    symbols: &[
        ("T_g", "torque", "full-load torque at the governed speed"),
        ("w_g", "rotational_speed", "governed speed, at full load"),
        ("d", "percentage", "droop"),
        ("w", "rotational_speed", "speed"),
    ],
    validity: "from the governed speed at full load to the speed without load",
    source: "ISO 3046-4, droop (from memory)",
    revision: 1,
};

/// Full load at the site.
pub const DERATED: Formula = Formula {
    name: "derated_torque",
    text: "y * T",
    symbols: &[
        ("y", "percentage", "factor of the derating tables at the drive's altitude and ambient temperature"),
        ("T", "torque", "full-load torque as measured"),
    ],
    validity: "the user's own table",
    source: "common practice, no source",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &GOVERNED,
        domain: &[(10.0, 2e3), (100.0, 250.0), (0.02, 0.15), (251.0, 300.0)],
        kernel: |x| Governor { speed: x[1], droop: x[2], torque: x[0] }.line(x[3]),
    },
    Checked { formula: &DERATED, domain: &[(0.4, 1.0), (1.0, 2e3)], kernel: |x| x[1] * x[0] },
];

/// The governor's line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Governor {
    /// Speed at full load, rad/s.
    pub speed: f64,
    /// Speed without load over it, less one; zero for none.
    pub droop: f64,
    /// Torque at full load there.
    pub torque: f64,
}

impl Governor {
    /// Speed without load.
    #[must_use]
    pub fn no_load_speed(&self) -> f64 {
        self.speed * (1.0 + self.droop)
    }

    fn line<R: Real>(&self, speed: R) -> R {
        (-speed + self.no_load_speed()) * (self.torque / (self.speed * self.droop))
    }
}

/// An engine.
#[derive(Clone, Debug, PartialEq)]
pub struct EngineCurve {
    /// Full load as measured.
    pub table: Table,
    /// Factor of the site.
    pub factor: f64,
    /// Its governor.
    pub governor: Option<Governor>,
    /// What it takes to turn it unfired, N·m.
    pub drag: f64,
}

impl Law for EngineCurve {
    fn eval<R: Real>(&self, speed: R) -> R {
        let full = |speed: R| self.table.eval(speed) * self.factor;
        let Some(governor) = &self.governor else { return full(speed).max(R::of(-self.drag)) };
        speed.piecewise(&[governor.speed], |piece, speed| {
            if piece == 0 {
                full(speed)
            } else if governor.droop > 0.0 {
                governor.line(speed).max(R::of(-self.drag))
            } else {
                R::of(-self.drag)
            }
        })
    }

    fn jumps(&self) -> Vec<f64> {
        self.governor.iter().filter(|g| g.droop <= 0.0).map(|g| g.speed).collect()
    }

    fn kinks(&self) -> Vec<f64> {
        let mut kinks = Law::kinks(&self.table);
        if let Some(governor) = &self.governor {
            kinks.retain(|w| *w < governor.speed);
            kinks.push(governor.speed);
            if governor.torque > 0.0 {
                kinks.push(
                    governor.no_load_speed() + self.drag / governor.torque * governor.speed * governor.droop,
                );
            }
        }
        kinks
    }
}

#[cfg(test)]
mod tests {
    use super::{EngineCurve, Governor};
    use crate::curve::Curve;
    use crate::laws::table::Table;
    use crate::laws::testing::{close, encloses, rpm};
    use proptest::prelude::*;

    fn engine(droop: f64) -> EngineCurve {
        let table =
            Table::new(vec![(rpm(800.0), 180.0), (rpm(1400.0), 240.0), (rpm(2200.0), 200.0)]).unwrap();
        let governor = Governor { speed: rpm(2000.0), droop, torque: 210.0 };
        EngineCurve { table, factor: 1.0, governor: Some(governor), drag: 30.0 }
    }

    #[test]
    fn droop_line() {
        let engine = engine(0.05);
        close(engine.at(rpm(1999.999)), 210.0, 1e-5);
        close(engine.at(rpm(2050.0)), 105.0, 1e-12);
        close(engine.at(rpm(2100.0)) + 1.0, 1.0, 1e-9);
        assert_eq!(engine.at(rpm(2400.0)), -30.0);
        assert!(Curve::jumps(&engine).is_empty());
    }

    #[test]
    fn isochronous() {
        let engine = engine(0.0);
        assert_eq!(engine.at(rpm(2001.0)), -30.0);
        assert_eq!(Curve::jumps(&engine), [rpm(2000.0)]);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(100))]
        #[test]
        fn bounds_hold(droop in 0.01..0.2f64, lo in 0.0..300.0f64, width in 0.0..80.0f64, t in 0.0..1.0f64) {
            encloses(&engine(droop), lo, width, t);
        }
    }
}
