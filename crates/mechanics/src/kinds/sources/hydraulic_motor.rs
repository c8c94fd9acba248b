//! A hydraulic motor of constant displacement.

use super::straight_line::ratings;
use crate::curve::{Constant, Curve};
use crate::fault::Fault;
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, NO_BRAKING, RATED_DUTY, RATED_TORQUE, SUPPLY, plain, positive,
    quantity, range,
};
use crate::kinds::reading::{bad_value, done, inertia, missing};
use crate::laws::hydraulic_motor::{self as law, FlowLimited};
use crate::model::{
    Braking, Characteristic, Draw, DrawLaw, Drawn, Feed, Known, Model, Motion, Ratings, Source, SourceState,
};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::scalar::Real;
use crate::solution::{Answer, Marks};
use crate::values::{Duty, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "hydraulic_motor",
    title: "hydraulic motor",
    summary: "A gear, vane or piston motor of constant displacement on a hydraulic unit: its torque goes with the \
              pressure, its speed with the flow. It runs at the speed that the flow allows as long as the load asks for \
              less than full pressure, and stands where it asks for more.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::TORQUE, law::FLOW],
    cautions: &[
        "A motor leaks at standstill and creeps: it holds no load. What can fall needs a brake of its own.",
        "A load that drives empties the lines unless a counterbalance valve at the motor holds it back.",
        "Starting torque lies below running torque: take the efficiency of starting where the start decides.",
    ],
    example: "supply unit: hydraulic_unit { pressure = 180 bar; flow_limit = 40 l/min }\n\
              source motor: hydraulic_motor { supply = unit; displacement = 100 cm³/rev; mechanical_efficiency = 90 %; \
              volumetric_efficiency = 94 %; braking = none; inertia = 0.01 kg·m² }",
    build,
    given: |_| Vec::new(),
};

const COUNTERBALANCE: &str = "counterbalance_valve";

static FIELDS: &[Field] = &[
    SUPPLY,
    positive(
        "displacement",
        "displacement",
        Need::Required,
        range(1e-8, 1e-2),
        "volume of oil that one turn takes",
    ),
    share(
        "mechanical_efficiency",
        "hydraulic-mechanical efficiency: torque over pressure times displacement",
    ),
    share("volumetric_efficiency", "volumetric efficiency: what turns the shaft over all oil that flows in"),
    plain(
        "braking",
        Shape::Choice(&[
            (COUNTERBALANCE, "a counterbalance valve at the motor holds the load at the speed of the flow"),
            (NO_BRAKING, "gives nothing while the load drives"),
        ]),
        Need::Where("a load that drives"),
        "what it does while the load drives; there is no default",
    ),
    RATED_TORQUE,
    RATED_DUTY,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
];

const fn share(name: &'static str, meaning: &'static str) -> Field {
    quantity(name, "percentage", Need::Required, Bounds::EFFICIENCY, range(0.5, 0.99), meaning)
}

static RESULTS: &[ResultRow] = &[
    result("flow", "flow", "oil it takes"),
    result("pressure_difference", "pressure", "pressure over it that the load asks for"),
    result("hydraulic_power", "power", "flow times pressure difference"),
    result("full_pressure_torque", "torque", "torque at the full pressure of its unit"),
    result("full_flow_speed", "rotational_speed", "speed at the whole flow of its unit"),
];

const fn result(name: &'static str, kind: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity(kind), meaning }
}

#[derive(Clone, Copy, Debug)]
struct HydraulicMotor {
    /// m³/rad
    displacement: f64,
    mechanical: f64,
    volumetric: f64,
    braking: Option<&'static str>,
    inertia: Known,
    ratings: Ratings,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let field = |name| values.si(name).unwrap_or(1.0);
    let motor = HydraulicMotor {
        displacement: field("displacement"),
        mechanical: field("mechanical_efficiency"),
        volumetric: field("volumetric_efficiency"),
        braking: values.word("braking"),
        inertia,
        ratings: ratings(values, "rated_torque"),
    };
    done(Model::Source(Box::new(motor)), faults)
}

impl HydraulicMotor {
    /// Pressure difference and flow for one of the machines.
    fn fed(feed: &Feed) -> Result<(f64, f64), Vec<Fault>> {
        let Some(supply) = feed.supply else {
            return Err(vec![missing(&[&["supply"]], "the pressure and the flow it runs on")]);
        };
        let (Some(pressure), Some(flow)) = (supply.pressure, supply.flow_limit) else {
            let why = "a hydraulic motor needs a supply with pressure and flow: a hydraulic unit";
            return Err(vec![bad_value("supply", why, &[])]);
        };
        Ok((pressure, flow / f64::max(feed.machines, 1.0)))
    }

    fn curve(&self, feed: &Feed) -> Result<FlowLimited, Vec<Fault>> {
        let (pressure, flow) = Self::fed(feed)?;
        let hold = if self.braking == Some(COUNTERBALANCE) {
            pressure * self.displacement / self.mechanical
        } else {
            0.0
        };
        Ok(FlowLimited {
            torque: law::torque(pressure, self.displacement, self.mechanical),
            highest: flow * self.volumetric / self.displacement,
            hold,
        })
    }

    /// Pressure over it at an effort.
    fn pressure<R: Real>(&self, effort: R) -> R {
        // Turned by its load it works as a pump: friction adds to what the valve holds.
        effort.by_sign(1.0 / self.mechanical, self.mechanical) * (1.0 / self.displacement)
    }
}

/// Its oil.
struct Oil(HydraulicMotor);

impl DrawLaw for Oil {
    fn eval<R: Real>(&self, speed: R, effort: R) -> Drawn<R> {
        let flow = speed * (self.0.displacement / self.0.volumetric);
        Drawn {
            supply_current: Some(flow),
            input_power: Some(flow * self.0.pressure(effort)),
            ..Drawn::NOTHING
        }
    }
}

impl Source for HydraulicMotor {
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
            Some(COUNTERBALANCE) => Braking::Can(Box::new(Constant(curve.hold))),
            Some(_) => Braking::Cannot,
        };
        let mut character = Characteristic::new(Box::new(curve), braking, curve.highest);
        character.follows_set_speed = false;
        Ok(character)
    }

    fn draw(&self, feed: &Feed) -> Option<Box<dyn Draw>> {
        Self::fed(feed).ok()?;
        Some(Box::new(Oil(*self)))
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn limited_by(&self, feed: &Feed, speed: f64) -> &'static str {
        match self.curve(feed) {
            Ok(curve) if speed >= curve.highest * (1.0 - 1e-9) => "supply",
            _ => "torque",
        }
    }

    fn answer(&self, name: &str, state: &SourceState<'_>) -> Option<Answer> {
        let curve = self.curve(state.feed).ok()?;
        let flow = law::flow(self.displacement, state.speed, self.volumetric);
        let pressure = self.pressure(state.effort).abs();
        let (si, kind) = match name {
            "flow" => (flow.abs(), "flow"),
            "pressure_difference" => (pressure, "pressure"),
            "hydraulic_power" => ((flow * pressure).abs(), "power"),
            "full_pressure_torque" => (curve.at(0.0), "torque"),
            "full_flow_speed" => (curve.highest, "rotational_speed"),
            _ => return None,
        };
        Some(Answer::Quantity { si, kind, marks: Marks::default() })
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let mut out = vec![
            ("V_d", self.displacement),
            ("eta_hm", self.mechanical),
            ("eta_v", self.volumetric),
            ("w", state.speed),
        ];
        out.extend(Self::fed(state.feed).ok().map(|_| ("dp", self.pressure(state.effort).abs())));
        out
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::{close, rpm};
    use crate::model::{Braking, Feed, Model, Source, SupplyData};
    use crate::values::{FieldValue, Values};
    use core::f64::consts::TAU;

    fn motor(braking: &'static str) -> Box<dyn Source> {
        let values = Values::default()
            .with("displacement", FieldValue::Si(1e-4 / TAU))
            .with("mechanical_efficiency", FieldValue::Si(0.9))
            .with("volumetric_efficiency", FieldValue::Si(0.95))
            .with("braking", FieldValue::Word(braking));
        let Ok(Model::Source(motor)) = build(&values) else { panic!("no motor") };
        motor
    }

    fn feed(machines: f64) -> Feed {
        let supply =
            SupplyData { pressure: Some(2e7), flow_limit: Some(0.05 / 60.0), ..SupplyData::default() };
        Feed { supply: Some(supply), machines, ambient: None, altitude: None }
    }

    #[test]
    fn pressure_makes_torque_and_flow_makes_speed() {
        // Closed form: 100 cm³/rev, 200 bar, 50 l/min.
        let character = motor("none").characteristic(&feed(1.0)).unwrap();
        close(character.drive.at(10.0), 0.9 * 2000.0 / TAU, 1e-13);
        close(character.top_speed, rpm(475.0), 1e-13);
        assert_eq!(character.drive.at(rpm(476.0)), 0.0);
        close(motor("none").characteristic(&feed(2.0)).unwrap().top_speed, rpm(237.5), 1e-13);
        let drawn = motor("none").draw(&feed(1.0)).unwrap().at(rpm(475.0), 0.9 * 1000.0 / TAU);
        close(drawn.supply_current.unwrap(), 0.05 / 60.0, 1e-13);
        close(drawn.input_power.unwrap(), 0.05 / 60.0 * 1e7, 1e-13);
    }

    #[test]
    fn a_counterbalance_valve_holds() {
        let character = motor("counterbalance_valve").characteristic(&feed(1.0)).unwrap();
        close(character.drive.at(rpm(480.0)), -2000.0 / TAU / 0.9, 1e-13);
        assert!(matches!(character.braking, Braking::Can(_)));
    }

    #[test]
    fn needs_oil() {
        let electric = SupplyData { voltage: Some(48.0), ..SupplyData::default() };
        let feed = Feed { supply: Some(electric), ..feed(1.0) };
        assert!(motor("none").characteristic(&feed).is_err());
    }
}
