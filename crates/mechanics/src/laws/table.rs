//! A measured curve: straight between its points.
//!
//! Formula: `y = y_1 + (y_2 - y_1) * (x - x_1) / (x_2 - x_1)` between neighbouring points.
//! Symbols: x variable, usually a speed (rad/s or m/s); y value, usually a torque (N·m) or force (N).
//! Validity: between the first and the last point. Outside, the end pieces go on straight, and whoever shows a number
//! from there marks it as outside the measured range.
//! Source: linear interpolation, closed form.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::model::Motion;
use crate::registry::Formula;
use crate::scalar::Real;
use std::sync::Arc;

/// Between two points.
pub const BETWEEN: Formula = Formula {
    name: "torque",
    text: "T_1 + (T_2 - T_1) * (w - w_1) / (w_2 - w_1)",
    symbols: &[
        ("T_1", "torque", "torque at the point below"),
        ("T_2", "torque", "torque at the point above"),
        ("w", "rotational_speed", "speed"),
        ("w_1", "rotational_speed", "speed of the point below"),
        ("w_2", "rotational_speed", "speed of the point above"),
    ],
    validity: "inside the measured range; results outside are marked",
    source: "linear interpolation, closed form",
    revision: 1,
};

/// The same for forces over straight speeds.
pub const BETWEEN_FORCES: Formula = Formula {
    name: "force",
    text: "F_1 + (F_2 - F_1) * (v - v_1) / (v_2 - v_1)",
    symbols: &[
        ("F_1", "force", "force at the point below"),
        ("F_2", "force", "force at the point above"),
        ("v", "speed", "speed"),
        ("v_1", "speed", "speed of the point below"),
        ("v_2", "speed", "speed of the point above"),
    ],
    validity: "inside the measured range; results outside are marked",
    source: "linear interpolation, closed form",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked { formula: &BETWEEN, domain: DOMAIN, kernel: between },
    Checked { formula: &BETWEEN_FORCES, domain: DOMAIN, kernel: between },
];

const DOMAIN: &[(f64, f64)] = &[(0.0, 100.0), (0.0, 100.0), (20.0, 80.0), (1.0, 19.0), (81.0, 200.0)];

fn between(x: &[f64]) -> f64 {
    let points = vec![(x[3], x[0]), (x[4], x[1])];
    Table::new(points).map_or(f64::NAN, |table| table.eval(x[2]))
}

/// Points in rising order of the variable, at least two; a copy shares them.
#[derive(Clone, Debug, PartialEq)]
pub struct Table {
    points: Arc<[(f64, f64)]>,
    breaks: Arc<[f64]>,
}

/// Why points make no curve.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum TableError {
    /// Fewer than two points.
    TooFew,
    /// Two values at this place.
    Twice(f64),
    /// A number that is not finite.
    NotFinite,
}

impl Table {
    /// From points in any order; the same point given twice counts once.
    ///
    /// # Errors
    /// Fewer than two points, two values at one place, a number that is not finite.
    pub fn new(mut points: Vec<(f64, f64)>) -> Result<Self, TableError> {
        if points.iter().any(|(x, y)| !x.is_finite() || !y.is_finite()) {
            return Err(TableError::NotFinite);
        }
        points.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.total_cmp(&b.1)));
        points.dedup();
        if let Some(pair) = points.windows(2).find(|pair| pair[0].0 >= pair[1].0) {
            return Err(TableError::Twice(pair[0].0));
        }
        if points.len() < 2 {
            return Err(TableError::TooFew);
        }
        let breaks = points[1..points.len() - 1].iter().map(|(x, _)| *x).collect();
        Ok(Self { points: points.into(), breaks })
    }

    /// The first and the last place measured.
    #[must_use]
    pub fn range(&self) -> (f64, f64) {
        (self.points[0].0, self.points[self.points.len() - 1].0)
    }

    /// The symbols of the formula at a place: of torques, or of forces when it moves straight.
    #[must_use]
    pub fn symbols(&self, x: f64, motion: Motion) -> Vec<(&'static str, f64)> {
        let piece = self.breaks.partition_point(|b| *b <= x);
        let (from, to) = (self.points[piece], self.points[piece + 1]);
        let names = match motion {
            Motion::Rotary => ["w", "w_1", "T_1", "w_2", "T_2"],
            Motion::Linear => ["v", "v_1", "F_1", "v_2", "F_2"],
        };
        names.into_iter().zip([x, from.0, from.1, to.0, to.1]).collect()
    }

    /// The points, in rising order.
    #[must_use]
    pub fn points(&self) -> &[(f64, f64)] {
        &self.points
    }
}

impl Law for Table {
    fn eval<R: Real>(&self, x: R) -> R {
        x.piecewise(&self.breaks, |piece, x| {
            let (from, to) = (self.points[piece], self.points[piece + 1]);
            (x - from.0) * ((to.1 - from.1) / (to.0 - from.0)) + from.1
        })
    }

    fn kinks(&self) -> Vec<f64> {
        self.breaks.to_vec()
    }
}

#[cfg(test)]
mod tests {
    use super::{Table, TableError};
    use crate::curve::Curve;
    use crate::laws::testing::{close, encloses};
    use proptest::prelude::*;

    #[test]
    fn between_and_outside() {
        let table = Table::new(vec![(300.0, 5.0), (100.0, 9.0), (200.0, 8.0)]).unwrap();
        assert_eq!(table.range(), (100.0, 300.0));
        close(table.at(150.0), 8.5, 1e-14);
        close(table.at(200.0), 8.0, 1e-14);
        close(table.at(290.0), 5.3, 1e-14);
        close(table.at(0.0), 10.0, 1e-14);
        close(table.at(400.0), 2.0, 1e-14);
    }

    #[test]
    fn points_that_make_no_curve() {
        assert_eq!(Table::new(vec![]), Err(TableError::TooFew));
        assert_eq!(Table::new(vec![(1.0, 2.0), (1.0, 2.0)]), Err(TableError::TooFew));
        assert_eq!(Table::new(vec![(1.0, 2.0), (1.0, 3.0)]), Err(TableError::Twice(1.0)));
        assert_eq!(Table::new(vec![(0.0, 2.0), (-0.0, 3.0)]), Err(TableError::Twice(-0.0)));
        assert_eq!(Table::new(vec![(1.0, f64::NAN), (2.0, 3.0)]), Err(TableError::NotFinite));
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(200))]
        #[test]
        fn bounds_hold(
            ys in proptest::collection::vec(-50.0..50.0f64, 2..12),
            lo in -3.0..14.0f64, width in 0.0..6.0f64, t in 0.0..1.0f64,
        ) {
            let points = ys.iter().enumerate().map(|(i, y)| (i as f64, *y)).collect();
            let table = Table::new(points).unwrap();
            encloses(&table, lo, width, t);
            for (i, y) in ys.iter().enumerate() {
                prop_assert!((table.at(i as f64) - y).abs() < 1e-12);
            }
        }
    }
}
