//! A source whose torque falls in a straight line from stall to no-load speed.

use crate::curve::Line as CurveLine;
use crate::fault::Fault;
use crate::kinds::fields::{
    AS_GENERATOR, FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, NO_BRAKING, RATED_DUTY, RATED_TORQUE, plain, positive,
    range,
};
use crate::kinds::reading::{HoldBack, done, inertia};
use crate::laws::straight_line::{self as law, Line};
use crate::model::{Braking, Characteristic, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::{Duty, FieldValue, Values};

use super::line_reading::{Names, read_line};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "straight_line",
    title: "straight-line source",
    summary: "A source whose torque falls evenly from standstill to its no-load speed, settled by any two of stall \
              torque, no-load speed, peak power, its speed, or points. Right for a first sizing, for muscle over a \
              short effort, and for motors known by two numbers only.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::TORQUE, law::PEAK_POWER],
    cautions: &[
        "Peak power is for moments: an electric motor held near half its no-load speed, or stalled, soon burns.",
    ],
    example: "source crank: straight_line { stall_torque = 10 N·m; no_load_speed = 2400 rpm; braking = none }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    positive("stall_torque", "torque", Need::OneOf, range(1e-4, 1e7), "torque at standstill"),
    positive(
        "no_load_speed",
        "rotational_speed",
        Need::OneOf,
        range(0.1, 1e4),
        "speed at which no torque is left",
    ),
    positive(
        "peak_power",
        "mechanical_power",
        Need::OneOf,
        range(1e-2, 1e8),
        "the most power, a quarter of stall torque times no-load speed",
    ),
    positive(
        "peak_power_speed",
        "rotational_speed",
        Need::OneOf,
        range(0.05, 5e3),
        "speed of the peak power, half the no-load speed",
    ),
    plain(
        "point",
        Shape::Points(COLUMNS),
        Need::OneOf,
        "one or two measured points: torque or power at a speed",
    ),
    RATED_TORQUE,
    RATED_DUTY,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
    plain(
        "braking",
        Shape::Choice(BRAKING),
        Need::Where("a load that drives"),
        "what it does while the load drives",
    ),
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "torque", kind: "torque", optional: true },
    ColumnRow { name: "power", kind: "mechanical_power", optional: true },
    ColumnRow { name: "speed", kind: "rotational_speed", optional: false },
];

/// What a line that is not a machine yet can do when driven.
pub(super) const BRAKING: &[(&str, &str)] = &[
    (AS_GENERATOR, "holds back along the same line beyond its no-load speed"),
    (NO_BRAKING, "gives nothing while the load drives"),
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "stall_torque",
        shape: ResultShape::Quantity("torque"),
        meaning: "torque at standstill",
    },
    ResultRow {
        name: "no_load_speed",
        shape: ResultShape::Quantity("rotational_speed"),
        meaning: "speed at which no torque is left",
    },
];

const NAMES: Names = Names {
    stall: "stall_torque",
    no_load: "no_load_speed",
    peak: "peak_power",
    peak_speed: "peak_power_speed",
    point: "point",
    effort_column: "torque",
    speed_kind: "rotational_speed",
};

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let line = read_line(values, &NAMES, &mut faults);
    let Some(line) = line else { return Err(faults) };
    let model = LineSource {
        line,
        motion: Motion::Rotary,
        inertia,
        braking: values.word("braking"),
        ratings: ratings(values, "rated_torque"),
    };
    done(Model::Source(Box::new(model)), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    match read_line(values, &NAMES, &mut Vec::new()) {
        Some(line) => vec![("stall_torque", line.stall), ("no_load_speed", line.no_load)],
        None => Vec::new(),
    }
}

/// Continuous effort, its duty and the highest speed, as far as they are given.
pub(super) fn ratings(values: &Values, effort: &str) -> Ratings {
    let duty = match values.get("rated_duty") {
        Some(FieldValue::Duty(duty)) => Some(*duty),
        _ => None,
    };
    Ratings { effort: values.si(effort), duty, max_speed: values.si("max_speed"), ..Ratings::default() }
}

/// A line as a source, turning or straight.
#[derive(Debug)]
pub(super) struct LineSource {
    /// The line.
    pub line: Line,
    /// How it moves.
    pub motion: Motion,
    /// Inertia or mass.
    pub inertia: Known,
    /// The word of its field `braking`.
    pub braking: Option<&'static str>,
    /// Limits.
    pub ratings: Ratings,
}

impl LineSource {
    fn curve(&self) -> CurveLine {
        CurveLine { at_zero: self.line.stall, slope: self.line.slope() }
    }
}

impl Source for LineSource {
    fn motion(&self) -> Motion {
        self.motion
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, _feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let braking = match self.braking {
            Some(NO_BRAKING) => Braking::Cannot,
            Some(_) => Braking::Can(Box::new(HoldBack(self.curve()))),
            None => Braking::Unknown("braking"),
        };
        Ok(Characteristic::new(Box::new(self.curve()), braking, self.line.no_load))
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let names = match self.motion {
            Motion::Rotary => ["T0", "w", "w0"],
            Motion::Linear => ["F0", "v", "v0"],
        };
        vec![(names[0], self.line.stall), (names[1], state.speed), (names[2], self.line.no_load)]
    }
}
