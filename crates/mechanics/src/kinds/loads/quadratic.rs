//! A load whose torque rises with the square of speed: fan, agitator, propeller at a fixed advance.

use crate::curve::{Curve, Law};
use crate::fault::Fault;
use crate::model::{Known, Load, LoadState, Model, Motion, Standstill};
use crate::registry::{Bounds, Field, Formula, KindRow, Need, Role, Shape};
use crate::scalar::Real;
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "quadratic",
    title: "load with quadratic torque",
    summary: "A load whose torque rises with the square of speed: fans, agitators, propellers at a fixed advance.",
    fields: FIELDS,
    results: &[],
    formulas: &[Formula {
        name: "torque",
        text: "Tr * (w / wr) ^ 2",
        symbols: &[
            ("Tr", "torque", "torque at the rated speed"),
            ("w", "rotational_speed", "speed"),
            ("wr", "rotational_speed", "rated speed"),
        ],
        validity: "w >= 0",
        source: "common practice, no source",
        revision: 1,
    }],
    cautions: &[],
    example: "{ rated_torque = 10 N·m; rated_speed = 1450 rpm }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    Field {
        name: "rated_torque",
        shape: Shape::Quantity("torque"),
        need: Need::Required,
        hard: Bounds::POSITIVE,
        plausible: Bounds::ANY,
        meaning: "torque at the rated speed",
    },
    Field {
        name: "rated_speed",
        shape: Shape::Quantity("rotational_speed"),
        need: Need::Required,
        hard: Bounds::POSITIVE,
        plausible: Bounds::ANY,
        meaning: "speed at which the rated torque is taken",
    },
    Field {
        name: "inertia",
        shape: Shape::Quantity("moment_of_inertia"),
        need: Need::Where("run-up and stop"),
        hard: Bounds::NOT_NEGATIVE,
        plausible: Bounds::ANY,
        meaning: "moment of inertia of the driven machine",
    },
];

#[derive(Debug)]
struct Quadratic {
    factor: f64,
    rated_torque: f64,
    rated_speed: f64,
    inertia: Known,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let (torque, speed) = (values.si("rated_torque").unwrap_or(0.0), values.si("rated_speed").unwrap_or(1.0));
    Ok(Model::Load(Box::new(Quadratic {
        factor: torque / (speed * speed),
        rated_torque: torque,
        rated_speed: speed,
        inertia: Known::of(values.si("inertia"), "inertia"),
    })))
}

/// `factor * x * |x|`
struct SignedSquare(f64);

impl Law for SignedSquare {
    fn eval<R: Real>(&self, x: R) -> R {
        x * x.abs() * self.0
    }
}

impl Load for Quadratic {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn demand(&self) -> Box<dyn Curve> {
        Box::new(SignedSquare(self.factor))
    }

    fn standstill(&self) -> Standstill {
        Standstill { holding: 0.0, breakaway_forward: 0.0, breakaway_reverse: 0.0 }
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn usual_speed(&self) -> Option<f64> {
        Some(self.rated_speed)
    }

    fn symbols(&self, state: &LoadState) -> Vec<(&'static str, f64)> {
        vec![("Tr", self.rated_torque), ("w", state.speed), ("wr", self.rated_speed)]
    }
}
