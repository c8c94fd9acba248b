//! Road load: grade, rolling, air.
//!
//! Formula: `F = m * g * (sin(a) + C_rr * cos(a)) + rho * A * (v + u) * abs(v + u) / 2`, `a = atan(G)`.
//! Symbols: m mass (kg); g standard gravity (m/s²); a slope (rad); G grade, rise per run, uphill positive (-);
//! C_rr rolling resistance (-); rho density of air (kg/m³); A drag area, c_d times frontal area (m²); v speed over
//! ground (m/s); u headwind (m/s); F force at the rim (N).
//! Validity: straight road, coefficients that do not change with speed. With wind the air resists the speed through
//! the air, while power is force times speed over ground.
//! Source: road load as in the usual handbooks of vehicle dynamics; closed form.
//! Revision: 1

use super::Checked;
use super::incline::{cosine_of_grade, sine_of_grade, weight};
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Force at the rim of a vehicle moving forward.
pub const ROAD_LOAD: Formula = Formula {
    name: "force",
    text: "m * (9.80665 m/s²) * (sin(atan(G)) + C_rr * cos(atan(G))) + rho * A * (v + u) * abs(v + u) / 2",
    symbols: &[
        ("m", "mass", "mass, load included"),
        ("G", "grade", "grade, rise per run, uphill positive"),
        ("C_rr", "number", "rolling resistance"),
        ("rho", "density", "density of air"),
        ("A", "area", "drag area, drag coefficient times frontal area"),
        ("v", "speed", "speed over ground"),
        ("u", "speed", "headwind"),
    ],
    validity: "straight road, coefficients that do not change with speed",
    source: "usual handbooks of vehicle dynamics, closed form",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[Checked {
    formula: &ROAD_LOAD,
    domain: &[(1.0, 4e4), (-0.3, 0.3), (0.0, 0.1), (0.9, 1.4), (0.0, 12.0), (0.0, 60.0), (-30.0, 30.0)],
    kernel: |x| {
        let road = RoadLoad {
            mass: x[0],
            grade: x[1],
            rolling_resistance: x[2],
            air_density: x[3],
            drag_area: x[4],
            headwind: x[6],
        };
        road.eval(x[5])
    },
}];

/// A vehicle on a road, all SI.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RoadLoad {
    /// kg, load included.
    pub mass: f64,
    /// Rise per run, uphill positive.
    pub grade: f64,
    /// Rolling resistance, force per pressing force.
    pub rolling_resistance: f64,
    /// kg/m³
    pub air_density: f64,
    /// Drag coefficient times frontal area, m².
    pub drag_area: f64,
    /// m/s against the vehicle.
    pub headwind: f64,
}

impl RoadLoad {
    /// The force (N) with which it presses on the road.
    #[must_use]
    pub fn normal_force(&self) -> f64 {
        weight(self.mass) * cosine_of_grade(self.grade)
    }

    /// The force (N) that pulls it down the grade.
    #[must_use]
    pub fn grade_force(&self) -> f64 {
        weight(self.mass) * sine_of_grade(self.grade)
    }

    /// The size (N) of its rolling resistance, against motion.
    #[must_use]
    pub fn rolling_force(&self) -> f64 {
        self.rolling_resistance * self.normal_force()
    }

    /// Force (N) per square of the speed through the air.
    #[must_use]
    pub fn air_coefficient(&self) -> f64 {
        self.air_density * self.drag_area / 2.0
    }

    /// The force (N) of the air at a speed over ground (m/s).
    #[must_use]
    pub fn air_force<R: Real>(&self, speed: R) -> R {
        let coefficient = self.air_coefficient();
        (speed + self.headwind).piecewise(&[0.0], |piece, through_air| {
            through_air.square() * if piece == 0 { -coefficient } else { coefficient }
        })
    }
}

/// The whole force over speed; rolling resistance opposes motion and turns over with it.
impl Law for RoadLoad {
    fn eval<R: Real>(&self, speed: R) -> R {
        let (grade, rolling) = (self.grade_force(), self.rolling_force());
        let ground = speed
            .piecewise(&[0.0], |piece, _| R::of(if piece == 0 { grade - rolling } else { grade + rolling }));
        ground + self.air_force(speed)
    }

    fn jumps(&self) -> Vec<f64> {
        if self.rolling_resistance == 0.0 { Vec::new() } else { vec![0.0] }
    }

    fn kinks(&self) -> Vec<f64> {
        vec![-self.headwind]
    }
}

#[cfg(test)]
mod tests {
    use super::RoadLoad;
    use crate::laws::testing::{close, encloses};
    use proptest::prelude::*;

    #[test]
    fn hill_with_wind() {
        // Closed form F = m g (sin + C_rr cos) + rho cdA (v + u)² / 2; power with the speed over ground.
        let road = RoadLoad {
            mass: 1500.0,
            grade: 0.06,
            rolling_resistance: 0.012,
            air_density: 1.2,
            drag_area: 0.65,
            headwind: 5.0,
        };
        close(road.grade_force(), 881.014_099_301, 1e-11);
        close(road.rolling_force(), 176.202_819_86, 1e-11);
        close(road.air_force(25.0), 351.0, 1e-11);
        let force = road.grade_force() + road.rolling_force() + road.air_force(25.0);
        close(force * 25.0, 35_205.422_979, 1e-11);
    }

    #[test]
    fn published_car() {
        // M. J. Moran, H. N. Shapiro et al., Fundamentals of Engineering Thermodynamics, 8th ed., Problem 2.23.
        let (pound, foot, horsepower) = (0.453_592_37, 0.3048, 745.699_871_582_270_2);
        let speed = 55.0 * 0.44704;
        let road = RoadLoad {
            mass: 3040.0 * pound,
            grade: 0.0,
            rolling_resistance: 0.02,
            air_density: 0.08 * pound / (foot * foot * foot),
            drag_area: 0.25 * 6.24 * foot * foot,
            headwind: 0.0,
        };
        close(road.rolling_force() * speed / horsepower, 8.917_333_333_33, 1e-9);
        close(road.air_force(speed) * speed / horsepower, 1.850_966_339_67, 1e-9);
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(200))]
        #[test]
        fn bounds_hold(
            headwind in -20.0..20.0f64, grade in -0.2..0.2f64,
            lo in 0.0..30.0f64, width in 0.0..20.0f64, t in 0.0..1.0f64,
        ) {
            let road = RoadLoad {
                mass: 240.0, grade, rolling_resistance: 0.008, air_density: 1.2, drag_area: 0.9, headwind,
            };
            encloses(&road, lo, width, t);
            encloses(&road, -lo - width - 1e-9, width, t);
        }
    }

    #[test]
    fn tailwind_pushes() {
        let road = RoadLoad {
            mass: 100.0,
            grade: 0.0,
            rolling_resistance: 0.0,
            air_density: 1.2,
            drag_area: 1.0,
            headwind: -10.0,
        };
        close(road.air_force(4.0), -21.6, 1e-14);
        close(road.air_force(16.0), 21.6, 1e-14);
    }
}
