//! A combustion engine with its governor.

use super::straight_line::ratings;
use crate::curve::{Constant, Curve, Law};
use crate::fault::Fault;
use crate::kinds::derating::Derating;
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, NO_BRAKING, RATED_DUTY, RATED_TORQUE, not_negative, plain, positive,
    quantity, range,
};
use crate::kinds::reading::{bad_value, contradiction, done, inertia, missing, table};
use crate::laws::engine::{self as law, EngineCurve, Governor};
use crate::laws::table::{self as table_law, Table};
use crate::model::{Braking, Characteristic, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::solution::{Answer, Marks};
use crate::values::{Duty, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "engine",
    title: "combustion engine",
    summary: "An engine by its full-load curve, its idle speed and its governor. It gives no torque at standstill: it \
              idles, and takes up its load through a clutch that slips until the load has come up to idle speed.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[table_law::BETWEEN, law::DERATED, law::GOVERNED],
    cautions: &[
        "Full-load curves are of a new engine on the test stand: auxiliaries, altitude and heat take their part.",
        "A load that drives an engine beyond its governed speed is held by its drag alone: guard against overspeed.",
    ],
    example: "source engine: engine { curve = points (speed [rpm], torque [N·m]) {\n    800 150\n    1400 210\n    2200 180\n\
              }; idle_speed = 800 rpm; governed_speed = 2200 rpm; droop = 6 %; braking = none }",
    build,
    given,
};

const BY_DRAG: &str = "by_drag";

static FIELDS: &[Field] = &[
    plain(
        "curve",
        Shape::Points(COLUMNS),
        Need::Required,
        "torque or power over speed at full load, from idle or below to the governed speed",
    ),
    positive(
        "idle_speed",
        "rotational_speed",
        Need::Required,
        range(10.0, 500.0),
        "speed it idles at; it takes up the load from there",
    ),
    positive(
        "governed_speed",
        "rotational_speed",
        Need::Optional,
        range(20.0, 2000.0),
        "speed up to which the governor gives full load; without one nothing but the load bounds it",
    ),
    quantity(
        "droop",
        "percentage",
        Need::Where("a governed speed"),
        range(0.0, 1.0),
        range(0.0, 0.25),
        "speed without load over the governed speed, less one; 0 % holds the speed exactly",
    ),
    plain(
        "braking",
        Shape::Choice(&[
            (BY_DRAG, "holds back with its drag while the load turns it faster than it would turn itself"),
            (NO_BRAKING, "gives nothing while the load drives"),
        ]),
        Need::Where("a load that drives"),
        "what it does while the load drives; there is no default",
    ),
    not_negative(
        "drag_torque",
        "torque",
        Need::Where("braking = by_drag"),
        range(0.1, 1e5),
        "torque it takes to turn it unfired",
    ),
    RATED_TORQUE,
    positive(
        "rated_power",
        "mechanical_power",
        Need::Optional,
        range(10.0, 1e8),
        "power at the shaft it can give for the rated duty",
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
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "no_load_speed",
        shape: ResultShape::Quantity("rotational_speed"),
        meaning: "speed without load, by its governor",
    },
    ResultRow {
        name: "full_load_torque",
        shape: ResultShape::Quantity("torque"),
        meaning: "torque at full load at this speed, or at the governed speed above it, derating counted",
    },
    ResultRow {
        name: "load_factor",
        shape: ResultShape::Quantity("percentage"),
        meaning: "torque over full-load torque",
    },
];

#[derive(Debug)]
struct Engine {
    table: Table,
    idle: f64,
    /// Governed speed and droop.
    governed: Option<(f64, f64)>,
    braking: Option<&'static str>,
    drag: f64,
    derating: Derating,
    inertia: Known,
    ratings: Ratings,
}

fn governed(values: &Values, table: &Table, idle: f64, faults: &mut Vec<Fault>) -> Option<(f64, f64)> {
    let (speed, droop) = (values.si("governed_speed"), values.si("droop"));
    match (speed, droop) {
        (Some(speed), Some(droop)) => {
            if speed <= idle {
                let how = "the governed speed, {0}, lies above the idle speed, {1}";
                let quantities = [(speed, "rotational_speed"), (idle, "rotational_speed")];
                faults.push(contradiction(&["governed_speed", "idle_speed"], how, &quantities));
            } else if table.eval(speed) <= 0.0 {
                let how = "by its full-load curve the engine has no torque left at its governed speed, {0}";
                faults.push(contradiction(&["curve", "governed_speed"], how, &[(speed, "rotational_speed")]));
            }
            Some((speed, droop))
        }
        (Some(_), None) => {
            let why =
                "how far the speed falls from no load to full load; 0 % for a governor that holds it exactly";
            faults.push(missing(&[&["droop"]], why));
            None
        }
        (None, Some(_)) => {
            faults.push(missing(&[&["governed_speed"]], "the speed its droop ends at"));
            None
        }
        (None, None) => None,
    }
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let derating = Derating::read(values, &mut faults);
    let Some(table) = table(values, "curve", "torque", Motion::Rotary, &mut faults) else {
        return Err(faults);
    };
    let idle = values.si("idle_speed").unwrap_or(0.0);
    if table.eval(idle) <= 0.0 {
        let why =
            "by this curve the engine has no torque at its idle speed, {0}: it could not take up a load";
        faults.push(bad_value("curve", why, &[(idle, "rotational_speed")]));
    }
    let governed = governed(values, &table, idle, &mut faults);
    let braking = values.word("braking");
    let drag = values.si("drag_torque");
    if braking == Some(BY_DRAG) && drag.is_none() {
        faults.push(missing(&[&["drag_torque"]], "the torque it holds back with"));
    }
    let engine = Engine {
        table,
        idle,
        governed,
        braking,
        drag: drag.unwrap_or(0.0),
        derating,
        inertia,
        ratings: Ratings { power: values.si("rated_power"), ..ratings(values, "rated_torque") },
    };
    done(Model::Source(Box::new(engine)), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    match (values.si("governed_speed"), values.si("droop")) {
        (Some(speed), Some(droop)) => vec![("no_load_speed", speed * (1.0 + droop))],
        _ => Vec::new(),
    }
}

impl Engine {
    fn curve(&self, feed: &Feed) -> Result<EngineCurve, Vec<Fault>> {
        let factor = self.derating.factor(feed)?;
        let governor = self.governed.map(|(speed, droop)| Governor {
            speed,
            droop,
            torque: self.table.eval(speed) * factor,
        });
        let holds = self.braking == Some(BY_DRAG);
        Ok(EngineCurve {
            table: self.table.clone(),
            factor,
            governor,
            drag: if holds { self.drag } else { 0.0 },
        })
    }
}

impl Source for Engine {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let curve = self.curve(feed)?;
        let (first, last) = self.table.range();
        let top = curve.governor.map_or(last, |governor| governor.no_load_speed());
        let braking = match self.braking {
            None => Braking::Unknown("braking"),
            Some(BY_DRAG) => Braking::Can(Box::new(Constant(self.drag))),
            Some(_) => Braking::Cannot,
        };
        let mut character = Characteristic::new(Box::new(curve), braking, top);
        // On the governor's line the full-load curve is not asked.
        let covered = self.governed.is_some_and(|(speed, _)| speed <= last * (1.0 + 1e-9));
        character.measured = Some((first, if covered { f64::max(top, last) } else { last }));
        character.idle = Some(self.idle);
        character.droop = self.governed.map(|(_, droop)| droop);
        character.reversible = false;
        Ok(character)
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn limited_by(&self, _feed: &Feed, speed: f64) -> &'static str {
        if self.governed.is_some_and(|(governed, _)| speed > governed) { "governor" } else { "torque" }
    }

    fn answer(&self, name: &str, state: &SourceState<'_>) -> Option<Answer> {
        let curve = self.curve(state.feed).ok()?;
        // On the governor's line the load is judged by the torque at the governed speed.
        let governed = self.governed.map_or(f64::INFINITY, |(speed, _)| speed);
        let speed = f64::min(f64::max(state.speed, self.idle), governed);
        let full = EngineCurve { governor: None, ..curve }.at(speed);
        let (si, kind) = match name {
            "full_load_torque" => (full, "torque"),
            "load_factor" => (state.effort.abs() / full, "percentage"),
            _ => return None,
        };
        let (first, last) = self.table.range();
        let marks = Marks { outside: speed < first || speed > last, scaled: false };
        si.is_finite().then_some(Answer::Quantity { si, kind, marks })
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let Ok(curve) = self.curve(state.feed) else { return Vec::new() };
        let mut out = self.table.symbols(state.speed, Motion::Rotary);
        out.extend([("T", self.table.eval(state.speed)), ("y", curve.factor)]);
        if let Some(governor) = curve.governor.filter(|governor| governor.droop > 0.0) {
            out.extend([("T_g", governor.torque), ("w_g", governor.speed), ("d", governor.droop)]);
        }
        out
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::{close, rpm};
    use crate::model::{Braking, Feed, Model, Source};
    use crate::values::{FieldValue, Table, Values};

    fn table(columns: Vec<(&'static str, Vec<f64>)>) -> FieldValue {
        FieldValue::Points(Table { columns, at: Vec::new() })
    }

    fn values() -> Values {
        let speeds = vec![rpm(800.0), rpm(1400.0), rpm(2200.0)];
        Values::default()
            .with("curve", table(vec![("speed", speeds), ("torque", vec![150.0, 210.0, 180.0])]))
            .with("idle_speed", FieldValue::Si(rpm(800.0)))
            .with("governed_speed", FieldValue::Si(rpm(2200.0)))
            .with("droop", FieldValue::Si(0.06))
            .with("braking", FieldValue::Word("none"))
    }

    fn engine(values: &Values) -> Box<dyn Source> {
        let Ok(Model::Source(engine)) = build(values) else { panic!("no engine") };
        engine
    }

    const SITE: Feed = Feed { supply: None, machines: 1.0, ambient: None, altitude: Some(2000.0) };

    #[test]
    fn idles_and_is_governed() {
        let character = engine(&values()).characteristic(&SITE).unwrap();
        assert_eq!(character.idle, Some(rpm(800.0)));
        close(character.top_speed, rpm(2332.0), 1e-14);
        close(character.drive.at(rpm(2266.0)), 90.0, 1e-12);
        assert!(!character.reversible && matches!(character.braking, Braking::Cannot));
    }

    #[test]
    fn thin_air_takes_from_the_whole_curve() {
        let derated = values().with(
            "altitude_derating",
            table(vec![("altitude", vec![1000.0, 3000.0]), ("factor", vec![1.0, 0.8])]),
        );
        let character = engine(&derated).characteristic(&SITE).unwrap();
        close(character.drive.at(rpm(1400.0)), 189.0, 1e-12);
        close(character.drive.at(rpm(2266.0)), 81.0, 1e-12);
        let high = Feed { altitude: Some(3500.0), ..SITE };
        assert!(engine(&derated).characteristic(&high).is_err());
        let low = Feed { altitude: Some(200.0), ..SITE };
        close(engine(&derated).characteristic(&low).unwrap().drive.at(rpm(1400.0)), 210.0, 1e-12);
    }

    #[test]
    fn fields_that_do_not_fit() {
        let mut no_droop = Values::default();
        for (name, value) in values().iter().filter(|(name, _)| *name != "droop") {
            no_droop.set(name, value.clone());
        }
        assert!(build(&no_droop).is_err());
        assert!(build(&values().with("governed_speed", FieldValue::Si(rpm(700.0)))).is_err());
        assert!(build(&values().with("braking", FieldValue::Word("by_drag"))).is_err());
        assert!(build(&values().with("governed_speed", FieldValue::Si(rpm(9000.0)))).is_err());
    }
}
