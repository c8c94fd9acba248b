//! A load known by measured points.

use super::fields::MASS;
use super::resisting::mass_or_inertia;
use crate::curve::{Against, Curve, Law};
use crate::fault::Fault;
use crate::kinds::fields::{FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, not_negative, plain, range};
use crate::kinds::reading::{bad_value, contradiction, done, limits, only_one, table};
use crate::laws::table::{self as law, Table};
use crate::model::{Known, Limit, LimitOn, Load, LoadState, Model, Motion, Standstill};
use crate::registry::{ColumnRow, Field, KindRow, Need, Role, Shape};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "measured_curve",
    title: "load by measured points",
    summary: "Torque (or force) over speed as measured or read from a sheet, straight between the points. Results \
              outside the measured speeds are marked.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::BETWEEN, law::BETWEEN_FORCES],
    cautions: &[],
    example: "load mixer: measured_curve { curve = points (speed [rpm], torque [N·m]) {\n    0 9\n    100 6\n    300 14\n} }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    plain("curve", Shape::Points(TORQUE_COLUMNS), Need::OneOf, "torque or power over speed, turning"),
    plain(
        "force_curve",
        Shape::Points(FORCE_COLUMNS),
        Need::OneOf,
        "force or power over speed, running straight",
    ),
    not_negative(
        "breakaway_torque",
        "torque",
        Need::Optional,
        range(0.0, 1e7),
        "torque to set it moving from rest; the curve's value at rest when not given",
    ),
    not_negative(
        "breakaway_force",
        "force",
        Need::Optional,
        range(0.0, 1e7),
        "force to set it moving from rest; the curve's value at rest when not given",
    ),
    INERTIA,
    FLYWHEEL_EFFECT,
    MASS,
    MAX_SPEED,
];

const TORQUE_COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "speed", kind: "rotational_speed", optional: false },
    ColumnRow { name: "torque", kind: "torque", optional: true },
    ColumnRow { name: "power", kind: "mechanical_power", optional: true },
];

const FORCE_COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "speed", kind: "speed", optional: false },
    ColumnRow { name: "force", kind: "force", optional: true },
    ColumnRow { name: "power", kind: "mechanical_power", optional: true },
];

#[derive(Debug)]
struct Measured {
    motion: Motion,
    table: Table,
    breakaway: f64,
    inertia: Known,
    limits: Vec<Limit>,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let why = "the measured points: torques if it turns, forces if it runs straight";
    let Some(way) = only_one(values, &["curve", "force_curve"], why, &mut faults) else { return Err(faults) };
    let (motion, effort, breakaway) = match way {
        "curve" => (Motion::Rotary, "torque", "breakaway_torque"),
        _ => (Motion::Linear, "force", "breakaway_force"),
    };
    let Some(table) = table(values, way, effort, motion, &mut faults) else { return Err(faults) };
    if let Some((speed, _)) = table.points().iter().find(|(speed, _)| *speed < 0.0) {
        let template =
            "a load resists backward motion as it resists forward motion: leave out the point at {0}";
        faults.push(bad_value(way, template, &[(*speed, motion.speed_kind())]));
    }
    let at_rest = f64::max(table.eval(0.0), 0.0);
    let given = values.si(breakaway);
    if let Some(given) = given.filter(|given| *given < at_rest && table.range().0 <= 0.0) {
        let template = "the curve begins with {0} at rest, so {1} does not set it moving";
        let kind = motion.effort_kind();
        faults.push(contradiction(&[breakaway, way], template, &[(at_rest, kind), (given, kind)]));
    }
    let load = Measured {
        motion,
        table,
        breakaway: given.unwrap_or(at_rest),
        inertia: mass_or_inertia(motion, values, &mut faults),
        limits: limits(values, &[("max_speed", LimitOn::InputSpeed)]),
    };
    done(Model::Load(Box::new(load)), faults)
}

impl Load for Measured {
    fn motion(&self) -> Motion {
        self.motion
    }

    fn demand(&self) -> Box<dyn Curve> {
        Box::new(Against(self.table.clone()))
    }

    fn standstill(&self) -> Standstill {
        Standstill { holding: 0.0, breakaway_forward: self.breakaway, breakaway_reverse: -self.breakaway }
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn usual_speed(&self) -> Option<f64> {
        Some(self.table.range().1)
    }

    fn measured(&self) -> Option<(f64, f64)> {
        Some(self.table.range())
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }

    fn symbols(&self, state: &LoadState) -> Vec<(&'static str, f64)> {
        self.table.symbols(state.speed.abs(), self.motion)
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::Model;
    use crate::values::{FieldValue, Table, Values};

    fn curve(speed: &[f64], torque: &[f64]) -> Values {
        let columns = vec![("speed", speed.to_vec()), ("torque", torque.to_vec())];
        Values::default().with("curve", FieldValue::Points(Table { columns, at: Vec::new() }))
    }

    #[test]
    fn resists_both_ways_and_knows_its_range() {
        let Ok(Model::Load(load)) = build(&curve(&[0.0, 10.0, 30.0], &[9.0, 6.0, 14.0])) else {
            panic!("no load")
        };
        close(load.demand().at(20.0), 10.0, 1e-14);
        close(load.demand().at(-20.0), -10.0, 1e-14);
        assert_eq!(load.demand().jumps(), [0.0]);
        assert_eq!(load.measured(), Some((0.0, 30.0)));
        assert_eq!(load.standstill().breakaway_forward, 9.0);
    }

    #[test]
    fn points_that_make_no_load() {
        assert!(build(&curve(&[0.0], &[9.0])).is_err());
        assert!(build(&curve(&[-5.0, 5.0], &[9.0, 9.0])).is_err());
        assert!(build(&curve(&[5.0, 5.0], &[9.0, 8.0])).is_err());
        let low = curve(&[0.0, 5.0], &[9.0, 8.0]).with("breakaway_torque", FieldValue::Si(3.0));
        assert!(build(&low).is_err());
    }
}
