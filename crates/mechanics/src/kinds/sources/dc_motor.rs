//! A permanent-magnet dc motor.

use super::dc_draw::DcDraw;
use super::dc_reading::constants;
use super::straight_line::ratings;
use crate::curve::{Constant, Curve};
use crate::fault::Fault;
use crate::kinds::fields::{
    BRAKING, FLYWHEEL_EFFECT, INERTIA, INTO_RESISTOR, MAX_SPEED, RATED_DUTY, RATED_TORQUE, SUPPLY, plain,
    positive, quantity, range,
};
use crate::kinds::reading::{HoldBack, bad_value, braking, contradiction, differ, done, inertia, missing};
use crate::laws::dc_envelope::{self, DcEnvelope};
use crate::laws::dc_machine::{self as law, DcConstants};
use crate::laws::winding;
use crate::model::{Braking, Characteristic, Draw, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{Bounds, ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::solution::{Answer, Marks};
use crate::values::{Duty, FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "dc_motor",
    title: "permanent-magnet dc motor",
    summary: "A brushed or electronically commutated motor with permanent magnets on a direct voltage, by its constants \
              or by two measured points. A current limit means a controller between supply and motor.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        law::TORQUE,
        law::CURRENT,
        dc_envelope::FULL_VOLTAGE_CURRENT,
        law::POWER_LIMITED_CURRENT,
        winding::RESISTANCE,
    ],
    cautions: &[
        "Stalled or near half speed most of the power heats the winding: use rated_torque or rated_current for what it \
         can do for long, and the warm resistance.",
        "A motor driven by its load feeds current back: the supply must accept it or a resistor take it.",
    ],
    example: "supply pack: battery { open_circuit_voltage = 37 V; resistance = 110 mΩ; accepts_return = yes }\n\
              source motor: dc_motor { supply = pack; torque_constant = 0.11 N·m/A; resistance = 85 mΩ; \
              no_load_current = 2.4 A; current_limit = 45 A; braking = as_generator }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    SUPPLY,
    plain(
        "point",
        Shape::Points(COLUMNS),
        Need::OneOf,
        "two measured points, torque at speed and current, at measured_voltage; instead of the constants",
    ),
    positive(
        "measured_voltage",
        "voltage",
        Need::Where("points or a stall current"),
        range(1.0, 1500.0),
        "voltage at the motor's terminals during the measurement",
    ),
    positive("torque_constant", "torque_constant", Need::OneOf, range(1e-4, 100.0), "torque per current"),
    positive(
        "voltage_constant",
        "voltage_constant",
        Need::OneOf,
        range(1e-4, 100.0),
        "induced voltage per speed; the same number as the torque constant in N·m/A and V·s/rad",
    ),
    positive(
        "speed_constant",
        "speed_constant",
        Need::OneOf,
        range(1e-2, 1e4),
        "speed per voltage without load",
    ),
    positive(
        "resistance",
        "resistance",
        Need::OneOf,
        range(1e-4, 1e3),
        "resistance from terminal to terminal, warm, with brushes",
    ),
    positive(
        "stall_current",
        "current",
        Need::OneOf,
        range(0.01, 1e5),
        "current at standstill at measured_voltage",
    ),
    quantity(
        "no_load_current",
        "current",
        Need::OneOf,
        Bounds::NOT_NEGATIVE,
        range(1e-3, 1e3),
        "current while it turns without load",
    ),
    quantity(
        "loss_torque",
        "torque",
        Need::OneOf,
        Bounds::NOT_NEGATIVE,
        range(0.0, 1e3),
        "torque that friction and iron take; instead of the no-load current",
    ),
    quantity(
        "resistance_at",
        "temperature",
        Need::Where("a winding temperature"),
        range(150.0, 600.0),
        range(273.15, 423.15),
        "temperature at which resistance or points were measured",
    ),
    quantity(
        "winding_temperature",
        "temperature",
        Need::Where("a resistance that was not measured warm"),
        range(150.0, 600.0),
        range(253.15, 453.15),
        "temperature of the winding while it runs: its resistance follows it",
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
    BRAKING,
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "torque", kind: "torque", optional: false },
    ColumnRow { name: "speed", kind: "rotational_speed", optional: false },
    ColumnRow { name: "current", kind: "current", optional: false },
];

static RESULTS: &[ResultRow] = &[
    result("torque_constant", "torque_constant", "torque per current"),
    result("voltage_constant", "voltage_constant", "induced voltage per speed"),
    result("resistance", "resistance", "resistance from terminal to terminal at the winding's temperature"),
    result("loss_torque", "torque", "torque that friction and iron take"),
    result("rated_torque", "torque", "torque it can give for its rated duty"),
    result("stall_torque", "torque", "torque at standstill at full command"),
    result("stall_current", "current", "current at standstill on this supply without a controller's limit"),
    result("no_load_speed", "rotational_speed", "speed without load at the voltage of its supply"),
];

const fn result(name: &'static str, kind: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity(kind), meaning }
}

#[derive(Debug)]
struct DcMotor {
    dc: DcConstants,
    /// The torques of its measured points.
    measured: Option<(f64, f64)>,
    current_limit: Option<f64>,
    inertia: Known,
    braking: Option<&'static str>,
    ratings: Ratings,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let Some(dc) = constants(values, &mut faults) else { return Err(faults) };
    let rated_current = values.si("rated_current");
    if let (Some(torque), Some(current)) = (values.si("rated_torque"), rated_current)
        && differ(torque, dc.torque(current), 0.15)
    {
        faults.push(contradiction(
            &["rated_torque", "rated_current"],
            "by its constants the rated current gives {0}, not {1}",
            &[(dc.torque(current), "torque"), (torque, "torque")],
        ));
    }
    let motor = DcMotor {
        dc,
        measured: torques(values),
        current_limit: values.si("current_limit"),
        inertia,
        braking: values.word("braking"),
        ratings: Ratings {
            effort: rated_torque(values, &dc),
            power: values.si("rated_power"),
            current: rated_current,
            ..ratings(values, "rated_torque")
        },
    };
    done(Model::Source(Box::new(motor)), faults)
}

/// The least and the most torque of the measured points.
pub(super) fn torques(values: &Values) -> Option<(f64, f64)> {
    let Some(FieldValue::Points(table)) = values.get("point") else { return None };
    let torques = table.column("torque")?.iter().copied();
    Some(torques.fold((f64::INFINITY, f64::NEG_INFINITY), |(lo, hi), t| (f64::min(lo, t), f64::max(hi, t))))
}

fn rated_torque(values: &Values, dc: &DcConstants) -> Option<f64> {
    values.si("rated_torque").or(values.si("rated_current").map(|current| dc.torque(current)))
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    let Some(dc) = constants(values, &mut Vec::new()) else { return Vec::new() };
    let mut out = vec![
        ("torque_constant", dc.k_t),
        ("voltage_constant", dc.k_e),
        ("resistance", dc.resistance),
        ("loss_torque", dc.loss_torque),
    ];
    out.extend(rated_torque(values, &dc).map(|torque| ("rated_torque", torque)));
    out
}

impl DcMotor {
    /// The motor on its supply.
    fn envelope(&self, feed: &Feed) -> Result<DcEnvelope, Vec<Fault>> {
        let Some(supply) = feed.supply else {
            return Err(vec![missing(&[&["supply"]], "the voltage it runs on")]);
        };
        if supply.frequency.is_some() {
            let why = "a dc motor needs a battery or a dc bus; mains alternate";
            return Err(vec![bad_value("supply", why, &[])]);
        }
        let Some(open_circuit) = supply.voltage.filter(|voltage| *voltage > 0.0) else {
            return Err(vec![bad_value("supply", "this supply has no voltage", &[])]);
        };
        let machines = f64::max(feed.machines, 1.0);
        Ok(DcEnvelope {
            dc: self.dc,
            open_circuit,
            supply_resistance: machines * supply.resistance.unwrap_or(0.0),
            supply_limit: supply.current_limit.map(|limit| limit / machines),
            motor_limit: self.current_limit,
        })
    }
}

impl Source for DcMotor {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let envelope = self.envelope(feed)?;
        let top_speed = envelope.no_load_speed();
        if top_speed <= 0.0 {
            let why =
                "its loss torque is more than the supply can turn: by these constants it stalls without load";
            return Err(vec![bad_value("loss_torque", why, &[])]);
        }
        let hold = || -> Box<dyn Curve> {
            match self.current_limit {
                Some(limit) => Box::new(Constant(self.dc.k_t * limit + self.dc.loss_torque)),
                None => Box::new(HoldBack(envelope)),
            }
        };
        let mut character =
            Characteristic::new(Box::new(envelope), braking(self.braking, feed, hold), top_speed);
        character.follows_set_speed = self.current_limit.is_some();
        character.measured_effort = self.measured;
        Ok(character)
    }

    fn draw(&self, feed: &Feed) -> Option<Box<dyn Draw>> {
        let envelope = self.envelope(feed).ok()?;
        let brakes = matches!(braking(self.braking, feed, || Box::new(HoldBack(envelope))), Braking::Can(_));
        let idle_above = (!brakes).then(|| envelope.no_load_speed());
        let into_resistor = self.braking == Some(INTO_RESISTOR);
        Some(Box::new(DcDraw { envelope, idle_above, into_resistor }))
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn limited_by(&self, feed: &Feed, speed: f64) -> &'static str {
        match self.envelope(feed) {
            Ok(envelope) if envelope.motor_limit.is_some_and(|limit| envelope.current(speed) >= limit) => {
                "current"
            }
            Ok(envelope) if speed < envelope.supply_speed() => "supply",
            _ => "voltage",
        }
    }

    fn answer(&self, name: &str, state: &SourceState<'_>) -> Option<Answer> {
        let envelope = self.envelope(state.feed).ok()?;
        let (si, kind) = match name {
            "stall_torque" => (envelope.at(0.0), "torque"),
            "stall_current" => {
                (envelope.open_circuit / (self.dc.resistance + envelope.supply_resistance), "current")
            }
            "no_load_speed" => (envelope.no_load_speed(), "rotational_speed"),
            _ => return None,
        };
        Some(Answer::Quantity { si, kind, marks: Marks::default() })
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let mut out = vec![
            ("k_T", self.dc.k_t),
            ("k_E", self.dc.k_e),
            ("R", self.dc.resistance),
            ("T_0", self.dc.loss_torque),
            ("w", state.speed),
            ("T", state.effort),
        ];
        if let Ok(envelope) = self.envelope(state.feed) {
            let cap = envelope.supply_cap();
            out.push(("U_0", envelope.open_circuit));
            out.push(("R_s", envelope.supply_resistance));
            if cap.is_finite() {
                out.push(("P", (envelope.open_circuit - envelope.supply_resistance * cap) * cap));
            }
        }
        out
    }
}

#[cfg(test)]
mod tests;
