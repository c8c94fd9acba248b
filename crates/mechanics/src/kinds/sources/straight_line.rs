//! A rotary source whose torque falls in a straight line from stall to no-load speed.

use crate::curve::{Curve, Line};
use crate::fault::{Fault, FaultKind, Note};
use crate::model::{Braking, Characteristic, Feed, Known, Model, Motion, Source, SourceState};
use crate::registry::{Bounds, Field, Formula, KindRow, Need, Role, Shape};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "straight_line",
    title: "straight-line source",
    summary: "A source whose torque falls in a straight line from stall torque at rest to zero at no-load speed. \
              Right for a first sizing before the machine is known by its constants.",
    fields: FIELDS,
    results: &[],
    formulas: &[Formula {
        name: "torque",
        text: "T0 * (1 - w / w0)",
        symbols: &[
            ("T0", "torque", "stall torque"),
            ("w", "rotational_speed", "speed"),
            ("w0", "rotational_speed", "no-load speed"),
        ],
        validity: "0 <= w <= w0",
        source: "common practice, no source",
        revision: 1,
    }],
    cautions: &[],
    example: "{ stall_torque = 10 N·m; no_load_speed = 2400 rpm }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    Field {
        name: "stall_torque",
        shape: Shape::Quantity("torque"),
        need: Need::OneOf,
        hard: Bounds::POSITIVE,
        plausible: Bounds::ANY,
        meaning: "torque at rest",
    },
    Field {
        name: "no_load_speed",
        shape: Shape::Quantity("rotational_speed"),
        need: Need::OneOf,
        hard: Bounds::POSITIVE,
        plausible: Bounds::ANY,
        meaning: "speed at which the torque is zero",
    },
    Field {
        name: "inertia",
        shape: Shape::Quantity("moment_of_inertia"),
        need: Need::Where("run-up and stop"),
        hard: Bounds::NOT_NEGATIVE,
        plausible: Bounds::ANY,
        meaning: "moment of inertia of the rotor",
    },
    Field {
        name: "braking",
        shape: Shape::Choice(&[
            ("as_generator", "holds back along the same line when driven above no-load speed"),
            ("none", "gives nothing when driven"),
        ]),
        need: Need::Where("a load that drives"),
        hard: Bounds::ANY,
        plausible: Bounds::ANY,
        meaning: "what it does when the load drives it",
    },
];

#[derive(Debug)]
struct StraightLine {
    stall: f64,
    no_load: f64,
    inertia: Known,
    braking: Option<&'static str>,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let (Some(stall), Some(no_load)) = (values.si("stall_torque"), values.si("no_load_speed")) else {
        let any_of = vec![vec!["stall_torque", "no_load_speed"]];
        let why = Note::plain("two values settle a straight line");
        return Err(vec![Fault { part: None, kind: FaultKind::Missing { any_of, why } }]);
    };
    let inertia = Known::of(values.si("inertia"), "inertia");
    Ok(Model::Source(Box::new(StraightLine { stall, no_load, inertia, braking: values.word("braking") })))
}

impl StraightLine {
    fn line(&self, sign: f64) -> Box<dyn Curve> {
        Box::new(Line { at_zero: sign * self.stall, slope: -sign * self.stall / self.no_load })
    }
}

impl Source for StraightLine {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, _feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let braking = match self.braking {
            Some("as_generator") => Braking::Can(self.line(-1.0)),
            Some(_) => Braking::Cannot,
            None => Braking::Unknown("braking"),
        };
        Ok(Characteristic::new(self.line(1.0), braking, self.no_load))
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        vec![("T0", self.stall), ("w", state.speed), ("w0", self.no_load)]
    }
}
