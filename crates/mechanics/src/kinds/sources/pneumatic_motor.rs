//! An air motor on compressed air.

use super::line_reading::{Names, read_line};
use super::straight_line::ratings;
use crate::fault::{Fault, Note};
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, NO_BRAKING, RATED_DUTY, RATED_TORQUE, SUPPLY, plain, positive, range,
};
use crate::kinds::reading::{bad_value, differ, done, inertia, missing};
use crate::laws::air_motor::{self as law, AirMotor};
use crate::laws::straight_line::Line;
use crate::model::{
    Braking, Characteristic, Draw, DrawLaw, Drawn, Feed, Known, Model, Motion, Ratings, Source, SourceState,
};
use crate::registry::{Bounds, ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::scalar::Real;
use crate::solution::{Answer, Marks};
use crate::values::{Duty, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "pneumatic_motor",
    title: "air motor",
    summary: "A vane or piston motor on compressed air: its torque falls in a straight line from standstill to its \
              no-load speed and goes with the pressure. It may be stalled without harm.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::TORQUE, law::CONSUMPTION],
    cautions: &[
        "Without load an air motor runs near its highest speed: vanes wear, and a free rotor is loud and fast.",
        "Starting torque varies with the place of the vanes: makers name a least starting torque below the stall torque.",
    ],
    example: "supply net: compressed_air { pressure = 6 bar; flow_limit = 900 l/min }\n\
              source motor: pneumatic_motor { supply = net; rated_pressure = 6.3 bar; peak_power = 300 W; \
              peak_power_speed = 2000 rpm; air_consumption = 420 l/min; braking = none }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    SUPPLY,
    Field {
        name: "rated_pressure",
        shape: Shape::Quantity("gauge_pressure"),
        need: Need::Required,
        hard: Bounds::POSITIVE,
        plausible: range(2e5, 1.5e6),
        meaning: "gauge pressure its data hold at",
    },
    positive(
        "stall_torque",
        "torque",
        Need::OneOf,
        range(1e-3, 1e5),
        "torque at standstill at rated pressure",
    ),
    positive(
        "no_load_speed",
        "rotational_speed",
        Need::OneOf,
        range(1.0, 1e4),
        "speed at which no torque is left",
    ),
    positive(
        "peak_power",
        "mechanical_power",
        Need::OneOf,
        range(1.0, 1e6),
        "the most power, at half its no-load speed and rated pressure",
    ),
    positive("peak_power_speed", "rotational_speed", Need::OneOf, range(1.0, 5e3), "speed of the peak power"),
    plain("point", Shape::Points(COLUMNS), Need::OneOf, "one or two measured points at rated pressure"),
    positive(
        "air_consumption",
        "flow",
        Need::Where("the flow, and a supply of limited flow"),
        range(1e-5, 10.0),
        "free air it takes at the speed of its peak power and rated pressure",
    ),
    plain(
        "braking",
        Shape::Choice(&[(NO_BRAKING, "gives nothing while the load drives")]),
        Need::Where("a load that drives"),
        "what it does while the load drives; there is no default",
    ),
    RATED_TORQUE,
    RATED_DUTY,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "torque", kind: "torque", optional: true },
    ColumnRow { name: "power", kind: "mechanical_power", optional: true },
    ColumnRow { name: "speed", kind: "rotational_speed", optional: false },
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "stall_torque",
        shape: ResultShape::Quantity("torque"),
        meaning: "torque at standstill at this pressure",
    },
    ResultRow { name: "flow", shape: ResultShape::Quantity("flow"), meaning: "free air it takes" },
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

#[derive(Debug)]
struct PneumaticMotor {
    line: Line,
    rated_pressure: f64,
    consumption: Option<f64>,
    braking: Option<&'static str>,
    inertia: Known,
    ratings: Ratings,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let Some(line) = read_line(values, &NAMES, &mut faults) else { return Err(faults) };
    let motor = PneumaticMotor {
        line,
        rated_pressure: values.si("rated_pressure").unwrap_or(1.0),
        consumption: values.si("air_consumption"),
        braking: values.word("braking"),
        inertia,
        ratings: ratings(values, "rated_torque"),
    };
    done(Model::Source(Box::new(motor)), faults)
}

fn given(_: &Values) -> Vec<(&'static str, f64)> {
    Vec::new()
}

/// Free air over speed.
struct Air(f64);

impl DrawLaw for Air {
    fn eval<R: Real>(&self, speed: R, _: R) -> Drawn<R> {
        Drawn { supply_current: Some(speed * self.0), ..Drawn::NOTHING }
    }
}

impl PneumaticMotor {
    fn pressure(feed: &Feed) -> Result<f64, Vec<Fault>> {
        let Some(supply) = feed.supply else {
            return Err(vec![missing(&[&["supply"]], "the pressure it runs on")]);
        };
        supply
            .pressure
            .ok_or_else(|| vec![bad_value("supply", "an air motor needs a supply of compressed air", &[])])
    }

    /// Free air per speed at the feed's pressure.
    fn per_speed(&self, feed: &Feed) -> Option<f64> {
        let pressure = Self::pressure(feed).ok()?;
        let at_peak = 0.5 * self.line.no_load;
        Some(self.consumption? * law::filling(pressure, self.rated_pressure) / at_peak)
    }

    fn curve(&self, feed: &Feed) -> Result<AirMotor, Vec<Fault>> {
        let pressure = Self::pressure(feed)?;
        let limit = feed.supply.and_then(|supply| supply.flow_limit);
        let highest = match (limit, self.per_speed(feed)) {
            (Some(limit), Some(per_speed)) => Some(limit / f64::max(feed.machines, 1.0) / per_speed),
            (Some(_), None) => {
                let why = "the free air it takes: its supply has a limit";
                return Err(vec![missing(&[&["air_consumption"]], why)]);
            }
            (None, _) => None,
        };
        Ok(AirMotor {
            stall: self.line.stall * (pressure / self.rated_pressure),
            no_load: self.line.no_load,
            highest: highest.filter(|speed| *speed < self.line.no_load),
        })
    }

    fn scaled(&self, feed: &Feed) -> bool {
        Self::pressure(feed).is_ok_and(|pressure| differ(pressure, self.rated_pressure, 1e-3))
    }
}

impl Source for PneumaticMotor {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let curve = self.curve(feed)?;
        let braking = match self.braking {
            None => Braking::Unknown("braking"),
            Some(_) => Braking::Cannot,
        };
        let mut character = Characteristic::new(Box::new(curve), braking, curve.no_load);
        character.scaled = self.scaled(feed);
        character.follows_set_speed = false;
        Ok(character)
    }

    fn draw(&self, feed: &Feed) -> Option<Box<dyn Draw>> {
        Some(Box::new(Air(self.per_speed(feed)?)))
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn limited_by(&self, feed: &Feed, speed: f64) -> &'static str {
        match self.curve(feed) {
            Ok(AirMotor { highest: Some(highest), .. }) if speed >= highest * (1.0 - 1e-9) => "supply",
            _ => "torque",
        }
    }

    fn answer(&self, name: &str, state: &SourceState<'_>) -> Option<Answer> {
        let (si, kind) = match name {
            "stall_torque" => (self.curve(state.feed).ok()?.stall, "torque"),
            "flow" => match self.per_speed(state.feed) {
                Some(per_speed) => (per_speed * state.speed.abs(), "flow"),
                None => return Some(Answer::Absent(Note::plain("no air consumption is given"))),
            },
            _ => return None,
        };
        let marks = Marks { outside: false, scaled: self.scaled(state.feed) };
        Some(Answer::Quantity { si, kind, marks })
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let Ok(pressure) = Self::pressure(state.feed) else { return Vec::new() };
        let mut out = vec![
            ("T_0", self.line.stall),
            ("p", pressure),
            ("p_n", self.rated_pressure),
            ("w", state.speed),
            ("w_0", self.line.no_load),
        ];
        if let Some(consumption) = self.consumption {
            out.extend([("Q_n", consumption), ("p_0", law::ATMOSPHERE), ("w_n", 0.5 * self.line.no_load)]);
        }
        out
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::{Feed, Model, Source, SupplyData};
    use crate::values::{FieldValue, Values};

    fn motor(consumption: Option<f64>) -> Box<dyn Source> {
        let mut values = Values::default()
            .with("rated_pressure", FieldValue::Si(6e5))
            .with("stall_torque", FieldValue::Si(8.0))
            .with("no_load_speed", FieldValue::Si(400.0))
            .with("braking", FieldValue::Word("none"));
        if let Some(flow) = consumption {
            values.set("air_consumption", FieldValue::Si(flow));
        }
        let Ok(Model::Source(motor)) = build(&values) else { panic!("no motor") };
        motor
    }

    fn feed(pressure: f64, flow_limit: Option<f64>) -> Feed {
        let supply = SupplyData { pressure: Some(pressure), flow_limit, ..SupplyData::default() };
        Feed { supply: Some(supply), machines: 1.0, ambient: None, altitude: None }
    }

    #[test]
    fn torque_goes_with_the_pressure_and_is_marked() {
        let character = motor(None).characteristic(&feed(3e5, None)).unwrap();
        close(character.drive.at(0.0), 4.0, 1e-14);
        assert!(character.scaled);
        assert!(!motor(None).characteristic(&feed(6e5, None)).unwrap().scaled);
    }

    #[test]
    fn the_air_ends_before_the_line() {
        assert!(motor(None).characteristic(&feed(6e5, Some(0.01))).is_err());
        let character = motor(Some(0.01)).characteristic(&feed(6e5, Some(0.015))).unwrap();
        close(character.drive.at(299.0), 8.0 * (1.0 - 299.0 / 400.0), 1e-13);
        assert_eq!(character.drive.at(301.0), 0.0);
        let drawn = motor(Some(0.01)).draw(&feed(6e5, None)).unwrap().at(100.0, 1.0);
        close(drawn.supply_current.unwrap(), 0.005, 1e-14);
    }
}
