//! A centrifugal pump on its system.

use super::fields::{BREAKAWAY_TORQUE, RATED_POWER, RATED_SPEED, RATED_TORQUE};
use super::turbo::{CLOSED_POWER, Names, RATED_EFFICIENCY, RATED_FLOW, SYSTEM_FLOW, load, turbo};
use crate::fault::Fault;
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, default, not_negative, plain, positive, range,
};
use crate::kinds::reading::done;
use crate::laws::{G_N, affinity, turbo as law};
use crate::model::Model;
use crate::registry::{ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "pump",
    title: "centrifugal pump",
    summary: "A rotodynamic pump, by its rated point or its curve, on a system with static head and friction. Without \
              static head torque goes by the square of the speed and flow with it; against a static head the flow moves \
              along the curve and begins only where the head at no flow passes it. Its start is judged with the valve as \
              it stands: say valve = closed in the case that starts so.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        affinity::TORQUE,
        affinity::FLOW,
        affinity::HEAD,
        affinity::HYDRAULIC_POWER,
        law::SYSTEM_HEAD,
    ],
    cautions: &[
        "Suction conditions, water hammer when it stops and running against a shut valve for long are not part of these \
         numbers; a pump that heats its fluid behind a shut valve can burst.",
    ],
    example: "load lift_pump: pump { rated_speed = 1450 rpm; rated_flow = 90 m³/h; rated_head = 24 m; rated_efficiency = 74 % }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    RATED_SPEED,
    RATED_POWER,
    RATED_TORQUE,
    RATED_FLOW,
    positive("rated_head", "length", Need::Optional, range(0.1, 5e3), "head at the rated point"),
    RATED_EFFICIENCY,
    plain(
        "curve",
        Shape::Points(COLUMNS),
        Need::OneOf,
        "head and shaft power (or efficiency) over flow at the rated speed, or at the speed behind `at`",
    ),
    positive(
        "closed_valve_head",
        "length",
        Need::Optional,
        range(0.1, 5e3),
        "head at the rated speed with the valve shut; instead of a curve",
    ),
    CLOSED_POWER,
    not_negative(
        "static_head",
        "length",
        default(
            0.0,
            "a closed circuit, or levels that are equal; give the lift where the pump raises its fluid",
        ),
        range(0.0, 5e3),
        "head the system asks at no flow: difference of levels and pressures",
    ),
    not_negative(
        "friction_head",
        "length",
        Need::Optional,
        range(0.0, 5e3),
        "head lost to friction at system_flow; what the rated head leaves over the static head when not given",
    ),
    SYSTEM_FLOW,
    positive(
        "density",
        "density",
        default(998.2, "water of 20 °C"),
        range(500.0, 3e3),
        "density of the fluid; powers of the curve and the rated point are for it",
    ),
    plain(
        "valve",
        Shape::Choice(&[
            ("open", "the system is open, or a check valve opens once the head suffices"),
            ("closed", "shut: no flow at any speed, the shaft power of the closed valve"),
        ]),
        default(0.0, "as it runs; the start against a closed valve is a case of its own"),
        "how the valve stands in this case",
    ),
    BREAKAWAY_TORQUE,
    INERTIA,
    FLYWHEEL_EFFECT,
    MAX_SPEED,
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "flow", kind: "flow", optional: false },
    ColumnRow { name: "head", kind: "length", optional: false },
    ColumnRow { name: "power", kind: "mechanical_power", optional: true },
    ColumnRow { name: "efficiency", kind: "percentage", optional: true },
];

static RESULTS: &[ResultRow] = &[
    ResultRow { name: "flow", shape: ResultShape::Quantity("flow"), meaning: "flow through it" },
    ResultRow { name: "head", shape: ResultShape::Quantity("length"), meaning: "head it gives" },
    ResultRow {
        name: "hydraulic_power",
        shape: ResultShape::Quantity("mechanical_power"),
        meaning: "power the fluid takes up",
    },
    ResultRow {
        name: "efficiency",
        shape: ResultShape::Quantity("percentage"),
        meaning: "power the fluid takes up over shaft power",
    },
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let density = values.si("density").unwrap_or(998.2);
    let names = Names {
        column: "head",
        rated: "rated_head",
        closed: "closed_valve_head",
        closed_power: "closed_valve_power",
        fixed: "static_head",
        friction: "friction_head",
        weight: density * G_N,
        dense: (1.0, 1.0),
        shut: values.word("valve") == Some("closed"),
        kind: "length",
        results: ["head", "hydraulic_power"],
        symbols: ["H_q", "H"],
    };
    let Some(turbo) = turbo(values, &names, &mut faults) else { return Err(faults) };
    let mut pump = load(&turbo, &names, values, &mut faults);
    pump.symbols.push(("rho", density));
    done(Model::Load(Box::new(pump)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::kinds::loads::testing::{loaded, result};
    use crate::laws::testing::{close, rpm};
    use crate::model::Load;
    use crate::values::{FieldValue, Table, Values};

    fn values(fields: &[(&'static str, f64)]) -> Values {
        fields.iter().fold(Values::default(), |values, (name, si)| values.with(name, FieldValue::Si(*si)))
    }

    fn pump(values: &Values) -> Box<dyn Load> {
        loaded(build(values))
    }

    #[test]
    fn published_affinity_and_shaft_power() {
        // R. W. Fox, A. T. McDonald, 5th ed., Ex. 7.6 (p. 297): 1170 to 1750 rpm.
        let fields = [
            ("rated_speed", rpm(1170.0)),
            ("rated_flow", 0.018_927),
            ("rated_head", 6.683),
            ("rated_efficiency", 0.8),
            ("density", 999.8),
        ];
        let load = pump(&values(&fields));
        close(result(load.as_ref(), "flow", rpm(1750.0)), 0.018_927 * 1750.0 / 1170.0, 1e-12);
        close(result(load.as_ref(), "efficiency", rpm(1750.0)), 0.8, 1e-12);
        let lifted = result(load.as_ref(), "hydraulic_power", rpm(1170.0));
        close(load.demand().at(rpm(1170.0)) * rpm(1170.0), lifted / 0.8, 1e-12);
    }

    #[test]
    fn a_closed_valve_takes_its_own_power() {
        let rated =
            [("rated_speed", 150.0), ("rated_power", 9e3), ("rated_flow", 0.02), ("rated_head", 32.0)];
        let closed = values(&rated).with("valve", FieldValue::Word("closed"));
        assert!(build(&closed).is_err());
        let load = pump(&closed.with("closed_valve_power", FieldValue::Si(3e3)));
        close(load.demand().at(150.0), 20.0, 1e-12);
        assert_eq!(result(load.as_ref(), "flow", 150.0), 0.0);
    }

    #[test]
    fn a_static_head_needs_the_curve() {
        let rated = [
            ("rated_speed", 150.0),
            ("rated_power", 9e3),
            ("rated_flow", 0.02),
            ("rated_head", 32.0),
            ("static_head", 20.0),
        ];
        assert!(build(&values(&rated)).is_err());
        let more = values(&rated)
            .with("closed_valve_head", FieldValue::Si(40.0))
            .with("closed_valve_power", FieldValue::Si(3e3));
        let load = pump(&more);
        close(result(load.as_ref(), "flow", 150.0), 0.02, 1e-12);
        close(load.demand().at(150.0), 60.0, 1e-12);
        assert_eq!(result(load.as_ref(), "flow", 100.0), 0.0);
        close(load.demand().at(100.0), 20.0 * 4.0 / 9.0, 1e-12);
    }

    #[test]
    fn efficiency_instead_of_power() {
        let columns =
            vec![("flow", vec![0.01, 0.02]), ("head", vec![38.0, 32.0]), ("efficiency", vec![0.6, 0.7])];
        let curve = Values::default()
            .with("curve", FieldValue::Points(Table { columns, at: vec![("rotational_speed", 150.0)] }))
            .with("density", FieldValue::Si(1000.0))
            .with("friction_head", FieldValue::Si(32.0))
            .with("system_flow", FieldValue::Si(0.02));
        let load = pump(&curve);
        close(load.demand().at(150.0), 1000.0 * 9.806_65 * 0.02 * 32.0 / 0.7 / 150.0, 1e-12);
        assert!(build(&curve.with("static_head", FieldValue::Si(5.0))).is_err());
    }
}
