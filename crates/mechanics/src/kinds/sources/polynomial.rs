//! A source known as a polynomial of its speed.

use super::straight_line::ratings;
use crate::fault::Fault;
use crate::kinds::fields::{
    BRAKING, FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, RATED_DUTY, RATED_TORQUE, SUPPLY_IF_ANY, plain, quantity,
    range,
};
use crate::kinds::reading::{HoldBack, bad_value, braking, done, inertia, missing};
use crate::laws::torque_polynomial::{self as law, TorquePolynomial};
use crate::model::{Characteristic, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::{Duty, FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "polynomial",
    title: "source by a polynomial",
    summary: "Torque as a constant, a linear and a quadratic part of the speed, each of either sign: a fitted curve or a \
              formula of a data sheet. It need not start, and its peak power need not lie at half speed.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::TORQUE],
    cautions: &[
        "A fitted polynomial turns where its data end: give speed_range, so that results from outside are marked.",
    ],
    example: "source turbine: polynomial { constant_torque = 12 N·m; viscous_torque = 0.05 N·m/(rad/s); \
              quadratic_torque = -0.0008 N·m/(rad/s)²; speed_range = 0 rpm .. 1400 rpm; braking = none }",
    build,
    given,
};

const EITHER: Bounds = range(-1e8, 1e8);

static FIELDS: &[Field] = &[
    SUPPLY_IF_ANY,
    quantity("constant_torque", "torque", Need::OneOf, Bounds::ANY, EITHER, "torque at standstill"),
    quantity(
        "viscous_torque",
        "viscous_torque_coefficient",
        Need::OneOf,
        Bounds::ANY,
        EITHER,
        "torque per speed; below zero where the torque falls",
    ),
    quantity(
        "quadratic_torque",
        "quadratic_torque_coefficient",
        Need::OneOf,
        Bounds::ANY,
        EITHER,
        "torque per square of the speed",
    ),
    Field {
        plausible: range(0.0, 1e4),
        ..plain(
            "speed_range",
            Shape::Interval("rotational_speed"),
            Need::Where("a torque that does not fall to zero, and for results outside of it to be marked"),
            "range of speeds the polynomial was fitted in",
        )
    },
    RATED_TORQUE,
    RATED_DUTY,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
    BRAKING,
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "no_load_speed",
        shape: ResultShape::Quantity("rotational_speed"),
        meaning: "highest speed at which the torque falls to zero",
    },
    ResultRow {
        name: "highest_torque",
        shape: ResultShape::Quantity("torque"),
        meaning: "the most torque between standstill and the no-load speed, or the end of the range",
    },
];

#[derive(Debug)]
struct Polynomial {
    law: TorquePolynomial,
    /// The no-load speed, or the end of the range.
    top: f64,
    measured: Option<(f64, f64)>,
    inertia: Known,
    braking: Option<&'static str>,
    ratings: Ratings,
}

fn coefficients(values: &Values) -> TorquePolynomial {
    let part = |name| values.si(name).unwrap_or(0.0);
    TorquePolynomial {
        coefficients: [part("constant_torque"), part("viscous_torque"), part("quadratic_torque")],
    }
}

fn speed_range(values: &Values) -> Option<(f64, f64)> {
    match values.get("speed_range") {
        Some(FieldValue::Interval(low, high)) => Some((*low, *high)),
        _ => None,
    }
}

fn top(values: &Values, law: &TorquePolynomial) -> Option<f64> {
    law.no_load_speed().or(speed_range(values).map(|(_, high)| high)).filter(|top| *top > 0.0)
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let names = ["constant_torque", "viscous_torque", "quadratic_torque"];
    let given: Vec<&'static str> = names.into_iter().filter(|name| values.get(name).is_some()).collect();
    if given.is_empty() {
        let groups: Vec<&[&'static str]> = names.iter().map(std::slice::from_ref).collect();
        return Err(vec![missing(&groups, "the parts of the torque")]);
    }
    let law = coefficients(values);
    let Some(top) = top(values, &law) else {
        let why =
            "this torque does not fall to zero at any speed: the range in which it was fitted bounds it";
        return Err(vec![missing(&[&["speed_range"]], why)]);
    };
    if law.highest(top) <= 0.0 {
        let why = "a source drives somewhere above standstill: this polynomial does not";
        faults.push(bad_value(given[0], why, &[]));
    }
    let source = Polynomial {
        law,
        top,
        measured: speed_range(values),
        inertia,
        braking: values.word("braking"),
        ratings: ratings(values, "rated_torque"),
    };
    done(Model::Source(Box::new(source)), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    let law = coefficients(values);
    let mut out = Vec::new();
    out.extend(law.no_load_speed().map(|speed| ("no_load_speed", speed)));
    out.extend(top(values, &law).map(|top| ("highest_torque", law.highest(top))));
    out
}

impl Source for Polynomial {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let braking = braking(self.braking, feed, || Box::new(HoldBack(self.law)));
        let mut character = Characteristic::new(Box::new(self.law), braking, self.top);
        character.measured = self.measured;
        character.follows_set_speed = false;
        Ok(character)
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let [c, b, a] = self.law.coefficients;
        vec![("c_0", c), ("c_1", b), ("w", state.speed), ("c_2", a)]
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::{Feed, Model};
    use crate::values::{FieldValue, Values};

    const ALONE: Feed = Feed { supply: None, machines: 1.0, ambient: None, altitude: None };

    fn values(fields: &[(&'static str, f64)]) -> Values {
        fields.iter().fold(Values::default(), |values, (name, si)| values.with(name, FieldValue::Si(*si)))
    }

    #[test]
    fn bounded_by_its_zero_or_its_range() {
        let fields = values(&[("constant_torque", 12.0), ("viscous_torque", -0.06)]);
        let Ok(Model::Source(source)) = build(&fields) else { panic!("no source") };
        let character = source.characteristic(&ALONE).unwrap();
        close(character.top_speed, 200.0, 1e-14);
        assert_eq!(character.measured, None);
        let rising = values(&[("constant_torque", 0.6), ("viscous_torque", 1.9)]);
        assert!(build(&rising).is_err());
        let rising = rising.with("speed_range", FieldValue::Interval(0.0, 5.0));
        let Ok(Model::Source(source)) = build(&rising) else { panic!("no source") };
        assert_eq!(source.characteristic(&ALONE).unwrap().measured, Some((0.0, 5.0)));
    }

    #[test]
    fn a_polynomial_that_drives_nothing() {
        assert!(build(&values(&[])).is_err());
        assert!(build(&values(&[("constant_torque", -1.0), ("viscous_torque", -1.0)])).is_err());
    }
}
