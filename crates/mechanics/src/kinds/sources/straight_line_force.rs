//! A source in straight motion whose force falls evenly from stall to no-load speed.

use super::line_reading::{Names, read_line};
use super::straight_line::{BRAKING, LineSource, ratings};
use crate::fault::Fault;
use crate::kinds::fields::{RATED_DUTY, not_negative, plain, positive, range};
use crate::laws::straight_line as law;
use crate::model::{Known, Model, Motion};
use crate::registry::{ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "straight_line_force",
    title: "straight-line source in straight motion",
    summary: "A source that pushes instead of turning: its force falls evenly from standstill to its no-load speed. \
              Right for linear motors and cylinders known by two numbers, and for a push by muscle.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::FORCE, law::PEAK_POWER_OF_FORCE],
    cautions: &[
        "Peak power is for moments: an electric motor held near half its no-load speed, or stalled, soon burns.",
    ],
    example: "source pusher: straight_line_force { stall_force = 300 N; no_load_speed = 2 m/s; braking = none }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    positive("stall_force", "force", Need::OneOf, range(1e-3, 1e8), "force at standstill"),
    positive("no_load_speed", "speed", Need::OneOf, range(1e-4, 100.0), "speed at which no force is left"),
    positive(
        "peak_power",
        "mechanical_power",
        Need::OneOf,
        range(1e-2, 1e8),
        "the most power, a quarter of stall force times no-load speed",
    ),
    positive(
        "peak_power_speed",
        "speed",
        Need::OneOf,
        range(5e-5, 50.0),
        "speed of the peak power, half the no-load speed",
    ),
    plain(
        "point",
        Shape::Points(COLUMNS),
        Need::OneOf,
        "one or two measured points: force or power at a speed",
    ),
    positive(
        "rated_force",
        "force",
        Need::Optional,
        range(1e-3, 1e8),
        "force it can give for the rated duty without growing too warm",
    ),
    RATED_DUTY,
    positive(
        "max_speed",
        "speed",
        Need::Optional,
        range(1e-4, 1e3),
        "highest speed it may run at, driven or driving",
    ),
    not_negative(
        "moving_mass",
        "mass",
        Need::Where("run-up time, run-up distance and stopping"),
        range(0.0, 1e6),
        "mass of its moving part",
    ),
    plain(
        "braking",
        Shape::Choice(BRAKING),
        Need::Where("a load that drives"),
        "what it does while the load drives",
    ),
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "force", kind: "force", optional: true },
    ColumnRow { name: "power", kind: "mechanical_power", optional: true },
    ColumnRow { name: "speed", kind: "speed", optional: false },
];

static RESULTS: &[ResultRow] = &[
    ResultRow { name: "stall_force", shape: ResultShape::Quantity("force"), meaning: "force at standstill" },
    ResultRow {
        name: "no_load_speed",
        shape: ResultShape::Quantity("speed"),
        meaning: "speed at which no force is left",
    },
];

const NAMES: Names = Names {
    stall: "stall_force",
    no_load: "no_load_speed",
    peak: "peak_power",
    peak_speed: "peak_power_speed",
    point: "point",
    effort_column: "force",
    speed_kind: "speed",
};

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some(line) = read_line(values, &NAMES, &mut faults) else { return Err(faults) };
    Ok(Model::Source(Box::new(LineSource {
        line,
        motion: Motion::Linear,
        inertia: Known::of(values.si("moving_mass"), "moving_mass"),
        braking: values.word("braking"),
        ratings: ratings(values, "rated_force"),
    })))
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    match read_line(values, &NAMES, &mut Vec::new()) {
        Some(line) => vec![("stall_force", line.stall), ("no_load_speed", line.no_load)],
        None => Vec::new(),
    }
}
