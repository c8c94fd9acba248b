//! A series-wound dc motor.

use super::dc_motor::torques;
use super::dc_reading::warming;
use super::series_draw::SeriesDraw;
use super::series_reading::magnet;
use super::straight_line::ratings;
use crate::fault::{Fault, Note};
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, RATED_DUTY, RATED_TORQUE, SUPPLY, not_negative, plain, positive,
    quantity, range,
};
use crate::kinds::reading::{bad_value, done, inertia, missing};
use crate::laws::series_machine::{self as law, Magnet, SeriesEnvelope};
use crate::laws::winding;
use crate::model::{Braking, Characteristic, Draw, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::solution::{Answer, Marks};
use crate::values::{Duty, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "series_motor",
    title: "series-wound dc motor",
    summary: "A brushed motor whose field carries the current of the armature: great torque at standstill, and a speed \
              that rises without end as the load falls off. By one measured point or its series constant while the \
              iron is not saturated, by several points where it is.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::TORQUE, law::SERIES_CONSTANT, winding::RESISTANCE],
    cautions: &[
        "Without load a series motor runs away until it bursts: couple it so that the load cannot come off (no belt, no \
         clutch, no freewheel), and guard it against overspeed as the local code requires.",
        "It brakes only when its circuit is rearranged for that: what can fall or run away needs a brake of its own.",
        "Switched on at standstill without a starter it takes many times its rated current.",
    ],
    example: "supply line: dc_bus { voltage = 220 V; resistance = 0 Ω; accepts_return = no }\n\
              source motor: series_motor { supply = line; measured_voltage = 220 V; resistance = 0.5 Ω; \
              point = (110 N·m at 600 rpm, 42 A); max_speed = 1800 rpm; inertia = 0.3 kg·m² }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    SUPPLY,
    plain(
        "point",
        Shape::Points(COLUMNS),
        Need::OneOf,
        "measured points, torque at speed and current, at measured_voltage; one leaves saturation aside",
    ),
    positive(
        "measured_voltage",
        "voltage",
        Need::Where("points"),
        range(6.0, 3000.0),
        "voltage at the motor's terminals during the measurement",
    ),
    positive(
        "series_constant",
        "series_constant",
        Need::OneOf,
        range(1e-6, 10.0),
        "torque per square of the current, which is induced voltage per speed and current",
    ),
    positive(
        "resistance",
        "resistance",
        Need::Required,
        range(1e-4, 1e3),
        "resistance of armature and field together, with brushes",
    ),
    not_negative(
        "loss_torque",
        "torque",
        Need::Where("a series constant"),
        range(0.0, 1e3),
        "torque that friction and iron take; points settle it",
    ),
    quantity(
        "resistance_at",
        "temperature",
        Need::Where("a winding temperature"),
        range(150.0, 600.0),
        range(273.15, 423.15),
        "temperature at which the resistance was measured",
    ),
    quantity(
        "winding_temperature",
        "temperature",
        Need::Where("a resistance that was not measured warm"),
        range(150.0, 600.0),
        range(253.15, 453.15),
        "temperature of the winding while it runs: its resistance follows it",
    ),
    not_negative(
        "starting_resistance",
        "resistance",
        Need::Optional,
        range(0.0, 1e3),
        "resistance in the circuit of the motor, such as a step of its starter",
    ),
    positive(
        "current_limit",
        "current",
        Need::Optional,
        range(0.1, 1e4),
        "most current its controller gives it; without one it hangs directly on the supply",
    ),
    RATED_TORQUE,
    positive(
        "rated_current",
        "current",
        Need::Optional,
        range(0.01, 1e4),
        "current it stands for the rated duty",
    ),
    positive(
        "rated_power",
        "mechanical_power",
        Need::Optional,
        range(1e-2, 1e7),
        "power at the shaft it can give for the rated duty",
    ),
    RATED_DUTY,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "torque", kind: "torque", optional: false },
    ColumnRow { name: "speed", kind: "rotational_speed", optional: false },
    ColumnRow { name: "current", kind: "current", optional: false },
];

static RESULTS: &[ResultRow] = &[
    result("series_constant", "series_constant", "torque in the air gap per square of the current here"),
    result("resistance", "resistance", "resistance of the circuit at the winding's temperature"),
    result("rated_torque", "torque", "torque it can give for its rated duty"),
    result("stall_torque", "torque", "torque at standstill at full command"),
    result("stall_current", "current", "current at standstill on this supply without a controller's limit"),
    result("no_load_speed", "rotational_speed", "speed without load; its loss torque alone bounds it"),
];

const fn result(name: &'static str, kind: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity(kind), meaning }
}

#[derive(Debug)]
struct SeriesMotor {
    magnet: Magnet,
    /// The torques of its measured points.
    measured: Option<(f64, f64)>,
    resistance: f64,
    current_limit: Option<f64>,
    inertia: Known,
    ratings: Ratings,
}

fn resistance(values: &Values, faults: &mut Vec<Fault>) -> f64 {
    let own = values.si("resistance").unwrap_or(0.0) * warming(values, faults);
    own + values.si("starting_resistance").unwrap_or(0.0)
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let resistance = resistance(values, &mut faults);
    let Some(magnet) = magnet(values, &mut faults) else { return Err(faults) };
    let current = values.si("rated_current");
    let of_current = current.map(|current| magnet.torque(current));
    let motor = SeriesMotor {
        measured: torques(values).filter(|_| magnet.saturates()),
        resistance,
        current_limit: values.si("current_limit"),
        inertia,
        ratings: Ratings {
            effort: values.si("rated_torque").or(of_current),
            power: values.si("rated_power"),
            current,
            ..ratings(values, "rated_torque")
        },
        magnet,
    };
    done(Model::Source(Box::new(motor)), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    let mut out = vec![("resistance", resistance(values, &mut Vec::new()))];
    let Some(magnet) = magnet(values, &mut Vec::new()) else { return out };
    if !magnet.saturates() {
        out.push(("series_constant", magnet.at(1.0).0));
    }
    let of_current = values.si("rated_current").map(|current| magnet.torque(current));
    out.extend(values.si("rated_torque").or(of_current).map(|torque| ("rated_torque", torque)));
    out
}

impl SeriesMotor {
    fn envelope(&self, feed: &Feed) -> Result<SeriesEnvelope, Vec<Fault>> {
        let Some(supply) = feed.supply else {
            return Err(vec![missing(&[&["supply"]], "the voltage it runs on")]);
        };
        if supply.frequency.is_some() {
            let why = "a series motor on alternating voltage has a circuit of its own: give it a battery or a dc bus";
            return Err(vec![bad_value("supply", why, &[])]);
        }
        let Some(open_circuit) = supply.voltage.filter(|voltage| *voltage > 0.0) else {
            return Err(vec![bad_value("supply", "this supply has no voltage", &[])]);
        };
        let machines = f64::max(feed.machines, 1.0);
        Ok(SeriesEnvelope {
            magnet: self.magnet.clone(),
            resistance: self.resistance,
            open_circuit,
            supply_resistance: machines * supply.resistance.unwrap_or(0.0),
            supply_limit: supply.current_limit.map(|limit| limit / machines),
            motor_limit: self.current_limit,
        })
    }
}

impl Source for SeriesMotor {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let envelope = self.envelope(feed)?;
        // Without saturation the greatest power stands at the speed R / k; with points, near the lowest current.
        let low = f64::min(0.1 * envelope.open_circuit / self.resistance, self.magnet.lowest());
        let low = if self.magnet.saturates() { low } else { 0.1 * envelope.open_circuit / self.resistance };
        let top_speed = envelope.speed(low);
        let mut character = Characteristic::new(Box::new(envelope), Braking::Cannot, top_speed);
        character.follows_set_speed = self.current_limit.is_some();
        character.measured_effort = self.measured;
        Ok(character)
    }

    fn draw(&self, feed: &Feed) -> Option<Box<dyn Draw>> {
        Some(Box::new(SeriesDraw { envelope: self.envelope(feed).ok()? }))
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn limited_by(&self, feed: &Feed, speed: f64) -> &'static str {
        let Ok(envelope) = self.envelope(feed) else { return "voltage" };
        let current = envelope.current(speed);
        if self.current_limit.is_some_and(|limit| current >= limit) {
            "current"
        } else if envelope.speed(current) > speed * (1.0 + 1e-9) {
            "supply"
        } else {
            "voltage"
        }
    }

    fn answer(&self, name: &str, state: &SourceState<'_>) -> Option<Answer> {
        let envelope = self.envelope(state.feed).ok()?;
        let (si, kind) = match name {
            "stall_torque" => (crate::curve::Curve::at(&envelope, 0.0), "torque"),
            "stall_current" => {
                (envelope.open_circuit / (self.resistance + envelope.supply_resistance), "current")
            }
            "series_constant" => {
                let current = self.magnet.current(state.effort);
                (self.magnet.at(current).0 / current, "series_constant")
            }
            "no_load_speed" => match envelope.no_load_speed() {
                Some(speed) => (speed, "rotational_speed"),
                None => {
                    let why = "without losses nothing bounds the speed of a series motor without load";
                    return Some(Answer::Unbounded(Note::plain(why)));
                }
            },
            _ => return None,
        };
        si.is_finite().then_some(Answer::Quantity { si, kind, marks: Marks::default() })
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let Ok(envelope) = self.envelope(state.feed) else { return Vec::new() };
        let current = self.magnet.current(state.effort);
        let (flux, loss) = self.magnet.at(current);
        let mut out = vec![
            ("U_0", envelope.open_circuit),
            ("R", self.resistance),
            ("R_s", envelope.supply_resistance),
            ("w", state.speed),
            ("T_0", loss),
        ];
        let k = flux / current;
        if k.is_finite() {
            out.push(("k", k));
        }
        out
    }
}

#[cfg(test)]
mod tests {
    use super::{build, given};
    use crate::laws::testing::{close, rpm};
    use crate::model::{Braking, Feed, Model, SourceState, SupplyData};
    use crate::solution::Answer;
    use crate::values::{FieldValue, Table, Values};

    fn values(points: &[(f64, f64, f64)]) -> Values {
        let columns = vec![
            ("torque", points.iter().map(|p| p.0).collect()),
            ("speed", points.iter().map(|p| rpm(p.1)).collect()),
            ("current", points.iter().map(|p| p.2).collect()),
        ];
        Values::default()
            .with("point", FieldValue::Points(Table { columns, at: Vec::new() }))
            .with("measured_voltage", FieldValue::Si(220.0))
            .with("resistance", FieldValue::Si(0.5))
    }

    fn feed(voltage: f64) -> Feed {
        let supply = SupplyData { voltage: Some(voltage), resistance: Some(0.0), ..SupplyData::default() };
        Feed { supply: Some(supply), machines: 1.0, ambient: None, altitude: None }
    }

    #[test]
    fn gives_back_its_points() {
        let points = [(50.0, 1000.0, 30.0), (130.0, 650.0, 55.0)];
        let Ok(Model::Source(motor)) = build(&values(&points)) else { panic!("no motor") };
        let character = motor.characteristic(&feed(220.0)).unwrap();
        for (torque, speed, current) in points {
            close(character.drive.at(rpm(speed)), torque, 1e-9);
            let drawn = motor.draw(&feed(220.0)).unwrap().at(rpm(speed), torque);
            close(drawn.current.unwrap(), current, 1e-9);
            close(drawn.voltage.unwrap(), 220.0, 1e-9);
        }
        assert!(matches!(character.braking, Braking::Cannot));
    }

    #[test]
    fn no_load_is_unbounded_without_losses() {
        let fields = [("series_constant", 0.02), ("resistance", 0.5), ("loss_torque", 0.0)];
        let fields = fields
            .iter()
            .fold(Values::default(), |values, (name, si)| values.with(name, FieldValue::Si(*si)));
        let Ok(Model::Source(motor)) = build(&fields) else { panic!("no motor") };
        let feed = feed(220.0);
        let state = SourceState { speed: 50.0, effort: 10.0, feed: &feed };
        assert!(matches!(motor.answer("no_load_speed", &state), Some(Answer::Unbounded(_))));
        assert!(given(&fields).contains(&("series_constant", 0.02)));
    }

    #[test]
    fn points_that_contradict() {
        assert!(
            build(&values(&[(50.0, 1000.0, 30.0)]).with("series_constant", FieldValue::Si(0.1))).is_err()
        );
        // More power out than in.
        assert!(build(&values(&[(80.0, 1000.0, 30.0)])).is_err());
        assert!(build(&values(&[(50.0, 1000.0, 500.0)])).is_err());
    }
}
