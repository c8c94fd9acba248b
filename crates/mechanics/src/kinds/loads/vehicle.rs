//! A vehicle on a road or track.

use super::incline::{GRADE, SLOPE, breakaway, slope};
use crate::curve::Curve;
use crate::fault::Fault;
use crate::kinds::fields::{default, not_negative, positive, quantity, range};
use crate::kinds::reading::{done, limits};
use crate::laws::road::{self as law, RoadLoad};
use crate::laws::wheel;
use crate::model::{Known, Limit, LimitOn, Load, LoadState, Model, Motion, Standstill};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::solution::{Answer, Marks};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "vehicle",
    title: "vehicle",
    summary: "Grade, rolling resistance and air, at the rim of the wheels. Forward is ahead; a grade above zero is \
              uphill. Wind changes the force of the air, power is force times speed over ground.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::ROAD_LOAD, wheel::GRIP_FORCE],
    cautions: &[
        "Downhill the vehicle drives the machine: its highest speed and its service brakes are to be checked for \
         themselves; brakes of vehicles follow the local traffic code.",
    ],
    example: "load road: vehicle { mass = 240 kg; rolling_resistance = 0.008; drag_area = 0.9 m²; \
              air_density = 1.20 kg/m³; grade = 0 % }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive("mass", "mass", Need::Required, range(1.0, 1e7), "mass with load and driver"),
    not_negative(
        "rolling_resistance",
        "number",
        Need::Required,
        range(5e-4, 0.3),
        "rolling resistance over the force that presses on the road: common practice is 0.002 on rail, 0.005 to 0.015 \
         on asphalt",
    ),
    not_negative(
        "rolling_breakaway",
        "number",
        Need::Optional,
        range(5e-4, 0.5),
        "the same at rest; as while rolling when not given",
    ),
    not_negative(
        "drag_area",
        "area",
        Need::Required,
        range(0.1, 20.0),
        "drag coefficient times frontal area",
    ),
    not_negative(
        "air_density",
        "density",
        Need::Required,
        range(0.6, 1.5),
        "density of the air, by altitude and temperature: 1.2 kg/m³ at 20 °C near the sea",
    ),
    GRADE,
    SLOPE,
    quantity(
        "headwind",
        "speed",
        default(0.0, "still air"),
        Bounds::ANY,
        range(-30.0, 30.0),
        "wind against the vehicle; below zero a tailwind",
    ),
    quantity(
        "rotating_mass_factor",
        "number",
        default(1.0, "the inertias of wheels and rotors are given where they turn"),
        range(1.0, 10.0),
        range(1.0, 1.5),
        "mass that accelerates over mass, for rotating parts that are not given elsewhere",
    ),
    positive("max_speed", "speed", Need::Optional, range(0.1, 200.0), "highest speed it may run at"),
];

static RESULTS: &[ResultRow] = &[
    force("grade_force", "force that pulls it down the grade; below zero it pulls ahead"),
    force("rolling_force", "rolling resistance"),
    force("air_force", "force of the air; below zero the wind pushes"),
];

const fn force(name: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity("force"), meaning }
}

#[derive(Debug)]
struct Vehicle {
    road: RoadLoad,
    rolling_breakaway: f64,
    moved_mass: f64,
    limits: Vec<Limit>,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let rolling_breakaway = breakaway(values, ("rolling_resistance", "rolling_breakaway"), &mut faults);
    let Some((sine, cosine)) = slope(values, &mut faults) else { return Err(faults) };
    let field = |name| values.si(name).unwrap_or(0.0);
    let mass = field("mass");
    let vehicle = Vehicle {
        road: RoadLoad {
            mass,
            grade: values.si("grade").unwrap_or(sine / cosine),
            rolling_resistance: field("rolling_resistance"),
            air_density: field("air_density"),
            drag_area: field("drag_area"),
            headwind: field("headwind"),
        },
        rolling_breakaway,
        moved_mass: mass * values.si("rotating_mass_factor").unwrap_or(1.0),
        limits: limits(values, &[("max_speed", LimitOn::InputSpeed)]),
    };
    done(Model::Load(Box::new(vehicle)), faults)
}

impl Load for Vehicle {
    fn motion(&self) -> Motion {
        Motion::Linear
    }

    fn demand(&self) -> Box<dyn Curve> {
        Box::new(self.road)
    }

    fn standstill(&self) -> Standstill {
        let holding = self.road.grade_force() + self.road.air_force(0.0);
        let friction = self.rolling_breakaway * self.road.normal_force();
        Standstill { holding, breakaway_forward: holding + friction, breakaway_reverse: holding - friction }
    }

    fn inertia(&self) -> Known {
        Known::Value(self.moved_mass)
    }

    fn weight_on_ground(&self) -> Option<f64> {
        Some(self.road.normal_force())
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }

    fn answer(&self, name: &str, state: &LoadState) -> Option<Answer> {
        let si = match name {
            "grade_force" => self.road.grade_force(),
            "rolling_force" => self.road.rolling_force(),
            "air_force" => self.road.air_force(state.speed),
            _ => return None,
        };
        Some(Answer::Quantity { si, kind: "force", marks: Marks::default() })
    }

    fn symbols(&self, state: &LoadState) -> Vec<(&'static str, f64)> {
        vec![
            ("m", self.road.mass),
            ("G", self.road.grade),
            ("C_rr", self.road.rolling_resistance),
            ("rho", self.road.air_density),
            ("A", self.road.drag_area),
            ("v", state.speed),
            ("u", self.road.headwind),
        ]
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::{Load, LoadState, Model};
    use crate::solution::Answer;
    use crate::values::{FieldValue::Si, Values};

    fn vehicle(more: &[(&'static str, f64)]) -> Box<dyn Load> {
        let base = [
            ("mass", 1500.0),
            ("rolling_resistance", 0.012),
            ("drag_area", 0.65),
            ("air_density", 1.2),
            ("headwind", 5.0),
        ];
        let fields = base.iter().chain(more);
        let values = fields.fold(Values::default(), |values, (name, si)| values.with(name, Si(*si)));
        let Ok(Model::Load(load)) = build(&values) else { panic!("no vehicle") };
        load
    }

    #[test]
    fn hill_with_wind() {
        // Closed form of the road load, power with the speed over ground.
        let car = vehicle(&[("grade", 0.06)]);
        close(car.demand().at(25.0), 1_408.216_919_16, 1e-11);
        let state = LoadState { speed: 25.0, effort: car.demand().at(25.0) };
        let Some(Answer::Quantity { si, .. }) = car.answer("air_force", &state) else { panic!("a force") };
        close(si, 351.0, 1e-11);
        assert!(car.answer("lift", &state).is_none());
    }

    #[test]
    fn slope_says_the_same_as_its_grade() {
        let (a, b) = (vehicle(&[("grade", 0.06)]), vehicle(&[("slope", libm::atan(0.06))]));
        close(a.demand().at(10.0), b.demand().at(10.0), 1e-12);
        close(a.weight_on_ground().unwrap(), b.weight_on_ground().unwrap(), 1e-12);
    }

    #[test]
    fn rolls_back_where_the_grade_beats_its_rolling() {
        let car = vehicle(&[("grade", 0.06), ("rolling_breakaway", 0.02)]);
        assert!(car.standstill().breakaway_reverse > 0.0);
        let level = vehicle(&[("grade", 0.0), ("headwind", 0.0)]);
        assert!(level.standstill().breakaway_reverse < 0.0);
        assert_eq!(level.standstill().holding, 0.0);
        close(level.demand().at(-3.0), -level.demand().at(3.0), 1e-14);
    }
}
