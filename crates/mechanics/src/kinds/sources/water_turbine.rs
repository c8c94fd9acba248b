//! A water turbine by a measured curve, taken to its own head and size.

use super::straight_line::ratings;
use crate::curve::Curve;
use crate::fault::{Fault, Note};
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, RATED_DUTY, RATED_TORQUE, plain, positive, range,
};
use crate::kinds::reading::{HoldBack, bad_value, differ, done, inertia, missing, table};
use crate::laws::G_N;
use crate::laws::scaled_table::{self as law, ScaledTable, head_factors};
use crate::laws::table::{self as table_law, Table};
use crate::model::{Braking, Characteristic, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::solution::{Answer, Marks};
use crate::values::{Duty, FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "water_turbine",
    title: "water turbine",
    summary: "A turbine at one gate opening by torque (and flow) over speed as measured at one net head, taken to its own \
              head and runner diameter by the affinity laws. Unit values are a measurement at 1 m of head with a runner \
              of 1 m. A load that comes off leaves it running away.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[table_law::BETWEEN, law::HEAD],
    cautions: &[
        "Without its load a turbine runs away to nearly twice its speed: everything on its shaft must stand that, or a gate \
         must close in time without bursting the pipe. Local codes for water power and pressure pipes apply.",
    ],
    example: "source wheel: water_turbine { head = 12 m; measured_head = 10 m; curve = points (speed [rpm], torque [N·m], \
              flow [l/s]) {\n    0 420 96\n    300 300 92\n    600 150 84\n    900 0 70\n} }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    positive(
        "head",
        "length",
        Need::Required,
        range(0.5, 2000.0),
        "net head, the losses of the pipe taken off",
    ),
    plain(
        "curve",
        Shape::Points(COLUMNS),
        Need::Required,
        "torque or power, and flow if known, over speed at measured_head; the last point, of no torque, is the runaway",
    ),
    positive(
        "measured_head",
        "length",
        Need::Required,
        range(0.5, 2000.0),
        "net head the curve was measured at; 1 m for unit values",
    ),
    positive(
        "runner_diameter",
        "length",
        Need::Where("a curve measured with another runner"),
        range(0.05, 15.0),
        "diameter of its runner",
    ),
    positive(
        "measured_diameter",
        "length",
        Need::Where("a curve measured with another runner"),
        range(0.05, 15.0),
        "diameter of the runner measured; 1 m for unit values",
    ),
    RATED_TORQUE,
    positive(
        "rated_power",
        "mechanical_power",
        Need::Optional,
        range(1.0, 1e9),
        "power at the shaft it can give for long",
    ),
    RATED_DUTY,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "speed", kind: "rotational_speed", optional: false },
    ColumnRow { name: "torque", kind: "torque", optional: true },
    ColumnRow { name: "power", kind: "mechanical_power", optional: true },
    ColumnRow { name: "flow", kind: "flow", optional: true },
];

static RESULTS: &[ResultRow] = &[
    result("flow", "flow", "water it takes"),
    result("hydraulic_power", "power", "weight of the water it takes times the head"),
    result("hydraulic_efficiency", "percentage", "power at the shaft over the power of the water"),
    result("runaway_speed", "rotational_speed", "speed without load"),
];

const fn result(name: &'static str, kind: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity(kind), meaning }
}

/// Density of fresh water, kg/m³ (at 4 °C; a few per mille less when warm).
const WATER: f64 = 1000.0;

#[derive(Debug)]
struct WaterTurbine {
    torque: ScaledTable,
    flow: Option<ScaledTable>,
    runaway: f64,
    head: f64,
    measured_head: f64,
    /// Own over measured diameter.
    diameters: (f64, f64),
    inertia: Known,
    ratings: Ratings,
}

fn diameters(values: &Values, faults: &mut Vec<Fault>) -> (f64, f64) {
    match (values.si("runner_diameter"), values.si("measured_diameter")) {
        (Some(own), Some(measured)) => (own, measured),
        (None, None) => (1.0, 1.0),
        (Some(_), None) => {
            faults.push(missing(&[&["measured_diameter"]], "the runner the curve was measured with"));
            (1.0, 1.0)
        }
        (None, Some(_)) => {
            faults.push(missing(&[&["runner_diameter"]], "the runner it has"));
            (1.0, 1.0)
        }
    }
}

/// The highest speed at which the torque is zero, on the last falling piece.
fn runaway(table: &Table) -> Option<f64> {
    let points = table.points();
    let pair = &points[points.len() - 2..];
    let ((v, a), (w, b)) = (pair[0], pair[1]);
    (a > b && a > 0.0).then(|| v + a * (w - v) / (a - b))
}

fn read(values: &Values, faults: &mut Vec<Fault>) -> Option<WaterTurbine> {
    let table = table(values, "curve", "torque", Motion::Rotary, faults)?;
    let field = |name| values.si(name).unwrap_or(1.0);
    let (head, measured_head) = (field("head"), field("measured_head"));
    let diameters = diameters(values, faults);
    let size = diameters.0 / diameters.1;
    let (speed, effort) = head_factors(head / measured_head, size);
    let Some(at) = runaway(&table) else {
        let why = "the torque must fall to zero at its end: give the points up to the runaway speed";
        faults.push(bad_value("curve", why, &[]));
        return None;
    };
    let flows = match values.get("curve") {
        Some(FieldValue::Points(given)) => given.column("flow").map(|flows| {
            let speeds = given.column("speed").unwrap_or_default();
            speeds.iter().copied().zip(flows.iter().copied()).collect::<Vec<_>>()
        }),
        _ => None,
    };
    // Q goes with D² and the square root of the head.
    let flow = flows.and_then(|points| Table::new(points).ok()).map(|table| ScaledTable {
        table,
        speed,
        effort: size * size * (head / measured_head).sqrt(),
    });
    Some(WaterTurbine {
        torque: ScaledTable { table, speed, effort },
        flow,
        runaway: at * speed,
        head,
        measured_head,
        diameters,
        inertia: Known::Value(0.0),
        ratings: Ratings { power: values.si("rated_power"), ..ratings(values, "rated_torque") },
    })
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let Some(turbine) = read(values, &mut faults) else { return Err(faults) };
    done(Model::Source(Box::new(WaterTurbine { inertia, ..turbine })), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    read(values, &mut Vec::new()).map(|turbine| ("runaway_speed", turbine.runaway)).into_iter().collect()
}

impl WaterTurbine {
    fn scaled(&self) -> bool {
        differ(self.head, self.measured_head, 1e-3) || differ(self.diameters.0, self.diameters.1, 1e-3)
    }
}

impl Source for WaterTurbine {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, _feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let braking = Braking::Can(Box::new(HoldBack(self.torque.clone())));
        let mut character = Characteristic::new(Box::new(self.torque.clone()), braking, self.runaway);
        character.measured = Some(self.torque.range());
        character.scaled = self.scaled();
        character.follows_set_speed = false;
        character.reversible = false;
        Ok(character)
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn answer(&self, name: &str, state: &SourceState<'_>) -> Option<Answer> {
        if !["flow", "hydraulic_power", "hydraulic_efficiency"].contains(&name) {
            return None;
        }
        let Some(flow) = &self.flow else {
            return Some(Answer::Absent(Note::plain("its curve has no column of flow")));
        };
        let flow = flow.at(state.speed);
        let power = WATER * G_N * self.head * flow;
        let (si, kind) = match name {
            "flow" => (flow, "flow"),
            "hydraulic_power" => (power, "power"),
            _ => (state.effort * state.speed / power, "percentage"),
        };
        let marks = Marks { outside: false, scaled: self.scaled() };
        si.is_finite().then_some(Answer::Quantity { si, kind, marks })
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let measured = state.speed / self.torque.speed;
        let mut out = self.torque.table.symbols(measured, Motion::Rotary);
        out.extend([
            ("T", self.torque.table.at(measured)),
            ("H", self.head),
            ("H_1", self.measured_head),
            ("D", self.diameters.0),
            ("D_1", self.diameters.1),
        ]);
        out
    }
}
