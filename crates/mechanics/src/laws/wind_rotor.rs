//! A wind turbine's rotor by its power coefficient over the tip speed ratio.
//!
//! Formula: `T = 0.5 * rho * A * v^3 * c / w`, `x = w * D / (2 * v)`.
//! Symbols: T torque (N·m); rho density of the air (kg/m³); A swept area (m²); v wind speed (m/s); c power
//! coefficient (-); w speed (rad/s); x tip speed ratio (-); D diameter of the rotor (m).
//! Validity: steady wind, one blade angle. Between its points the coefficient goes straight over the tip speed ratio,
//! below the first the torque stays; where the coefficient falls through zero the rotor runs away, unloaded.
//! Source: definitions of IEC 61400-12-1 (from memory); A. Betz's limit, 16/27 (from memory).
//! Revision: 1

use super::Checked;
use super::table::Table;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;
use core::f64::consts::PI;

/// The most of the wind's power that a rotor can take: 16/27.
pub const BETZ: f64 = 16.0 / 27.0;

/// The torque.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "0.5 * rho * A * v^3 * c / w",
    symbols: &[
        ("rho", "density", "density of the air"),
        ("A", "area", "area the rotor sweeps"),
        ("v", "speed", "speed of the wind"),
        ("c", "percentage", "power coefficient at this tip speed ratio"),
        ("w", "rotational_speed", "speed of the rotor"),
    ],
    validity: "steady wind, one blade angle",
    source: "definition of the power coefficient, IEC 61400-12-1 (from memory)",
    revision: 1,
};

/// The tip speed ratio.
pub const TIP_SPEED_RATIO: Formula = Formula {
    name: "tip_speed_ratio",
    text: "w * D / (2 * v)",
    symbols: &[
        ("w", "rotational_speed", "speed of the rotor"),
        ("D", "length", "diameter of the rotor"),
        ("v", "speed", "speed of the wind"),
    ],
    validity: "always",
    source: "definition",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TORQUE,
        domain: &[(0.9, 1.3), (1.0, 8e3), (3.0, 25.0), (0.01, 0.55), (1.0, 60.0)],
        kernel: |x| {
            let level = Table::new(vec![(1e-9, x[3]), (1e9, x[3])]);
            level.map_or(f64::NAN, |coefficients| {
                let diameter = (4.0 * x[1] / PI).sqrt();
                WindRotor { coefficients, diameter, density: x[0], wind: x[2] }.eval(x[4])
            })
        },
    },
    Checked {
        formula: &TIP_SPEED_RATIO,
        domain: &[(1.0, 60.0), (1.0, 100.0), (3.0, 25.0)],
        kernel: |x| x[0] * x[1] / (2.0 * x[2]),
    },
];

/// A rotor in a wind.
#[derive(Clone, Debug, PartialEq)]
pub struct WindRotor {
    /// Power coefficient over tip speed ratio, the first of which is above zero.
    pub coefficients: Table,
    /// Diameter, m.
    pub diameter: f64,
    /// Density of the air, kg/m³.
    pub density: f64,
    /// Speed of the wind, m/s.
    pub wind: f64,
}

impl WindRotor {
    /// The area it sweeps, m².
    #[must_use]
    pub fn area(&self) -> f64 {
        0.25 * PI * self.diameter * self.diameter
    }

    /// The power of the wind through that area, W.
    #[must_use]
    pub fn wind_power(&self) -> f64 {
        0.5 * self.density * self.area() * self.wind * self.wind * self.wind
    }

    /// Tip speed ratio per speed.
    fn per_speed(&self) -> f64 {
        0.5 * self.diameter / self.wind
    }

    /// Tip speed ratio at a speed.
    #[must_use]
    pub fn tip_speed_ratio(&self, speed: f64) -> f64 {
        speed * self.per_speed()
    }

    /// Power coefficient at a speed.
    #[must_use]
    pub fn coefficient(&self, speed: f64) -> f64 {
        let ratio = self.tip_speed_ratio(speed);
        let (first, at_first) = self.coefficients.points()[0];
        if ratio < first { at_first * ratio / first } else { self.coefficients.eval(ratio) }
    }

    /// The highest speed at which the coefficient falls through zero, within its points or along the last piece.
    #[must_use]
    pub fn runaway_speed(&self) -> Option<f64> {
        let points = self.coefficients.points();
        let last = points.windows(2).rev().find_map(|pair| {
            let ((x, c), (y, d)) = (pair[0], pair[1]);
            let ends = y == points[points.len() - 1].0;
            (c > 0.0 && d <= 0.0 || (ends && c > d && d > 0.0)).then(|| x + c * (y - x) / (c - d))
        });
        last.map(|ratio| ratio / self.per_speed())
    }
}

impl Law for WindRotor {
    fn eval<R: Real>(&self, speed: R) -> R {
        let points = self.coefficients.points();
        let breaks: Vec<f64> =
            points[..points.len() - 1].iter().map(|(ratio, _)| ratio / self.per_speed()).collect();
        let power = self.wind_power();
        speed.piecewise(&breaks, |piece, speed| {
            if piece == 0 {
                return R::of(power * points[0].1 / points[0].0 * self.per_speed());
            }
            let (from, to) = (points[piece - 1], points[piece]);
            let slope = (to.1 - from.1) / (to.0 - from.0);
            R::of(power * (from.1 - slope * from.0)) / speed + power * slope * self.per_speed()
        })
    }

    fn kinks(&self) -> Vec<f64> {
        self.coefficients.points().iter().map(|(ratio, _)| ratio / self.per_speed()).collect()
    }
}

#[cfg(test)]
mod tests {
    use super::WindRotor;
    use crate::curve::Curve;
    use crate::laws::table::Table;
    use crate::laws::testing::{close, encloses};
    use proptest::prelude::*;

    fn rotor() -> WindRotor {
        let points = vec![(2.0, 0.08), (4.0, 0.26), (6.0, 0.42), (7.0, 0.44), (9.0, 0.34), (12.0, 0.0)];
        WindRotor { coefficients: Table::new(points).unwrap(), diameter: 4.0, density: 1.2, wind: 8.0 }
    }

    #[test]
    fn power_is_the_coefficients_share_of_the_wind() {
        let rotor = rotor();
        for (ratio, coefficient) in [(2.0, 0.08), (5.0, 0.34), (7.0, 0.44), (12.0, 0.0)] {
            let speed = ratio * 8.0 / 2.0;
            close(rotor.at(speed) * speed + 1.0, coefficient * rotor.wind_power() + 1.0, 1e-12);
            close(rotor.coefficient(speed) + 1.0, coefficient + 1.0, 1e-12);
        }
        close(rotor.runaway_speed().unwrap(), 48.0, 1e-12);
        assert_eq!(rotor.at(0.0), rotor.at(1.0));
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(200))]
        #[test]
        fn bounds_hold(lo in -10.0..60.0f64, width in 0.0..20.0f64, t in 0.0..1.0f64) {
            encloses(&rotor(), lo, width, t);
        }
    }
}
