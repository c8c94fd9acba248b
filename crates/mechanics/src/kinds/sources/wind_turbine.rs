//! The rotor of a wind turbine.

use super::straight_line::ratings;
use crate::fault::{Fault, Note};
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, RATED_DUTY, RATED_TORQUE, plain, positive, range,
};
use crate::kinds::reading::{HoldBack, bad_value, done, inertia};
use crate::laws::table::{Table, TableError};
use crate::laws::wind_rotor::{self as law, BETZ, WindRotor};
use crate::model::{Braking, Characteristic, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::solution::{Answer, Marks};
use crate::values::{Duty, FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "wind_turbine",
    title: "wind turbine rotor",
    summary: "A rotor by its power coefficient over the tip speed ratio, at one blade angle, in a steady wind. A load that \
              comes off leaves it running away to the tip speed ratio at which the coefficient is zero.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::TORQUE, law::TIP_SPEED_RATIO],
    cautions: &[
        "Without its load a rotor runs away: it needs a brake, furling or feathering of its own that works without power, \
         as the rules for wind turbines require.",
        "Gusts bring several times the mean wind's torque: choose shafts and gears for them, not for the mean.",
    ],
    example: "source rotor: wind_turbine { diameter = 4 m; wind_speed = 8 m/s; air_density = 1.2 kg/m³; \
              curve = points (tip_speed_ratio, power_coefficient) {\n    2 0.08\n    5 0.34\n    7 0.44\n    9 0.34\n    12 0\n\
              } }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    positive("diameter", "length", Need::Required, range(0.2, 300.0), "diameter of the rotor"),
    positive("wind_speed", "speed", Need::Required, range(0.5, 60.0), "speed of the wind before the rotor"),
    positive(
        "air_density",
        "density",
        Need::Required,
        range(0.7, 1.5),
        "density of the air, by altitude and temperature: 1.225 kg/m³ at 15 °C near the sea",
    ),
    plain(
        "curve",
        Shape::Points(COLUMNS),
        Need::Required,
        "power coefficient over tip speed ratio; the last point, of no power, is where it runs away",
    ),
    RATED_TORQUE,
    positive(
        "rated_power",
        "mechanical_power",
        Need::Optional,
        range(1.0, 1e8),
        "power at the shaft it can give for long",
    ),
    RATED_DUTY,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "tip_speed_ratio", kind: "number", optional: false },
    ColumnRow { name: "power_coefficient", kind: "percentage", optional: false },
];

static RESULTS: &[ResultRow] = &[
    result("tip_speed_ratio", "number", "speed of the blades' tips over the speed of the wind"),
    result("power_coefficient", "percentage", "share of the wind's power it takes here"),
    result("wind_power", "power", "power of the wind through the area it sweeps"),
    result("runaway_speed", "rotational_speed", "speed without load"),
];

const fn result(name: &'static str, kind: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity(kind), meaning }
}

#[derive(Debug)]
struct WindTurbine {
    rotor: WindRotor,
    inertia: Known,
    ratings: Ratings,
}

fn coefficients(values: &Values, faults: &mut Vec<Fault>) -> Option<Table> {
    let Some(FieldValue::Points(given)) = values.get("curve") else { return None };
    let column = |name| given.column(name).unwrap_or_default();
    let pairs = column("tip_speed_ratio").iter().zip(column("power_coefficient"));
    let points: Vec<(f64, f64)> = pairs.map(|(ratio, coefficient)| (*ratio, *coefficient)).collect();
    // At no tip speed there is no power: the torque of the first point stays below it.
    let points: Vec<(f64, f64)> = points.into_iter().filter(|(x, c)| *x != 0.0 || *c != 0.0).collect();
    if let Some((_, coefficient)) = points.iter().find(|(_, coefficient)| *coefficient > BETZ) {
        let why = "no rotor takes {0} of the wind's power: {1} is the most (Betz's limit)";
        faults.push(bad_value("curve", why, &[(*coefficient, "percentage"), (BETZ, "percentage")]));
        return None;
    }
    if points.iter().any(|(ratio, _)| *ratio <= 0.0) {
        let why = "tip speed ratios lie above zero";
        faults.push(bad_value("curve", why, &[]));
        return None;
    }
    let why = match Table::new(points) {
        Ok(table) if table.points()[0].1 > 0.0 => return Some(table),
        Ok(_) => {
            "the first point gives the torque at which the rotor starts: its coefficient lies above zero"
        }
        Err(TableError::TooFew) => "a curve needs two points at least",
        Err(TableError::NotFinite) => "a point is not a finite number",
        Err(TableError::Twice(_)) => "two different coefficients at one tip speed ratio: keep one",
    };
    faults.push(bad_value("curve", why, &[]));
    None
}

fn rotor(values: &Values, faults: &mut Vec<Fault>) -> Option<WindRotor> {
    let field = |name| values.si(name).unwrap_or(1.0);
    let rotor = WindRotor {
        coefficients: coefficients(values, faults)?,
        diameter: field("diameter"),
        density: field("air_density"),
        wind: field("wind_speed"),
    };
    if rotor.runaway_speed().is_none() {
        let why = "the coefficient must fall towards zero at its end: give the points up to where the rotor runs away";
        faults.push(bad_value("curve", why, &[]));
        return None;
    }
    Some(rotor)
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let Some(rotor) = rotor(values, &mut faults) else { return Err(faults) };
    let ratings = Ratings { power: values.si("rated_power"), ..ratings(values, "rated_torque") };
    done(Model::Source(Box::new(WindTurbine { rotor, inertia, ratings })), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    let Some(rotor) = rotor(values, &mut Vec::new()) else { return Vec::new() };
    let mut out = vec![("wind_power", rotor.wind_power())];
    out.extend(rotor.runaway_speed().map(|speed| ("runaway_speed", speed)));
    out
}

impl Source for WindTurbine {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, _feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let rotor = &self.rotor;
        let top = rotor.runaway_speed().unwrap_or(1.0);
        let braking = Braking::Can(Box::new(HoldBack(rotor.clone())));
        let mut character = Characteristic::new(Box::new(rotor.clone()), braking, top);
        let per_ratio = 2.0 * rotor.wind / rotor.diameter;
        let (first, last) = rotor.coefficients.range();
        character.measured = Some((first * per_ratio, last * per_ratio));
        character.follows_set_speed = false;
        character.reversible = false;
        Ok(character)
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn answer(&self, name: &str, state: &SourceState<'_>) -> Option<Answer> {
        let (si, kind) = match name {
            "tip_speed_ratio" => (self.rotor.tip_speed_ratio(state.speed), "number"),
            "power_coefficient" => {
                let share = state.effort * state.speed / self.rotor.wind_power();
                if share < 0.0 {
                    return Some(Answer::Absent(Note::plain(
                        "it is turned by its load: it takes nothing from the wind",
                    )));
                }
                (share, "percentage")
            }
            _ => return None,
        };
        Some(Answer::Quantity { si, kind, marks: Marks::default() })
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let rotor = &self.rotor;
        vec![
            ("rho", rotor.density),
            ("A", rotor.area()),
            ("v", rotor.wind),
            ("c", rotor.coefficient(state.speed)),
            ("w", state.speed),
            ("D", rotor.diameter),
        ]
    }
}
