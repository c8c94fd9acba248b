//! A fan on its ducts.

use super::fields::{BREAKAWAY_TORQUE, RATED_POWER, RATED_SPEED, RATED_TORQUE};
use super::turbo::{CLOSED_POWER, Names, RATED_EFFICIENCY, RATED_FLOW, SYSTEM_FLOW, load, turbo};
use crate::fault::Fault;
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, default, not_negative, plain, positive, range,
};
use crate::kinds::reading::{done, missing};
use crate::laws::{affinity, turbo as law};
use crate::model::Model;
use crate::registry::{ColumnRow, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "fan",
    title: "fan",
    summary: "A fan or blower by its rated point, or by its curve on a duct. Torque goes by the square of the speed, power \
              by the cube: a fifth more speed asks 44 % more torque and 73 % more power. Pressure and power grow with \
              the density of the gas: a fan for hot gas is heavier to turn while it is cold.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        affinity::TORQUE,
        affinity::FLOW,
        affinity::PRESSURE,
        affinity::AIR_POWER,
        law::SYSTEM_PRESSURE,
    ],
    cautions: &[
        "An impeller has a highest speed, whatever the motor could do: a change of pulleys or of frequency is checked \
         against it. Guard inlet and outlet.",
    ],
    example: "load blower: fan { rated_speed = 1450 rpm; rated_power = 5.2 kW; rated_flow = 9000 m³/h }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    RATED_SPEED,
    RATED_POWER,
    RATED_TORQUE,
    RATED_FLOW,
    positive(
        "rated_pressure",
        "pressure",
        Need::Optional,
        range(1.0, 1e6),
        "total pressure at the rated point",
    ),
    RATED_EFFICIENCY,
    plain(
        "curve",
        Shape::Points(COLUMNS),
        Need::OneOf,
        "pressure and shaft power (or efficiency) over flow at the rated speed, or at the speed behind `at`",
    ),
    positive(
        "closed_damper_pressure",
        "pressure",
        Need::Optional,
        range(1.0, 1e6),
        "pressure at the rated speed with the damper shut; instead of a curve",
    ),
    Field {
        name: "closed_damper_power",
        meaning: "shaft power at the rated speed with the damper shut; from the curve when that has a point at no flow",
        ..CLOSED_POWER
    },
    not_negative(
        "back_pressure",
        "pressure",
        default(
            0.0,
            "it blows from and into the open; give it where it works against a bed, a liquid or a room",
        ),
        range(0.0, 1e6),
        "pressure the system asks at no flow",
    ),
    not_negative(
        "duct_pressure",
        "pressure",
        Need::Optional,
        range(0.0, 1e6),
        "pressure lost to friction at system_flow; what the rated pressure leaves when not given",
    ),
    SYSTEM_FLOW,
    positive(
        "density",
        "density",
        Need::Optional,
        range(0.1, 20.0),
        "density of the gas as it runs; with rated_density. As the data were taken when not given",
    ),
    positive(
        "rated_density",
        "density",
        Need::Optional,
        range(0.1, 20.0),
        "density the rated point and the curve were taken at, often 1.2 kg/m³",
    ),
    plain(
        "damper",
        Shape::Choice(&[
            ("open", "as the system stands"),
            ("closed", "shut: no flow at any speed, the shaft power of the closed damper"),
        ]),
        default(0.0, "as it runs; the start against a closed damper is a case of its own"),
        "how the damper stands in this case",
    ),
    BREAKAWAY_TORQUE,
    INERTIA,
    FLYWHEEL_EFFECT,
    MAX_SPEED,
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "flow", kind: "flow", optional: false },
    ColumnRow { name: "pressure", kind: "pressure", optional: false },
    ColumnRow { name: "power", kind: "mechanical_power", optional: true },
    ColumnRow { name: "efficiency", kind: "percentage", optional: true },
];

static RESULTS: &[ResultRow] = &[
    ResultRow { name: "flow", shape: ResultShape::Quantity("flow"), meaning: "flow through it" },
    ResultRow { name: "pressure", shape: ResultShape::Quantity("pressure"), meaning: "pressure it gives" },
    ResultRow {
        name: "air_power",
        shape: ResultShape::Quantity("mechanical_power"),
        meaning: "power the gas takes up",
    },
    ResultRow {
        name: "efficiency",
        shape: ResultShape::Quantity("percentage"),
        meaning: "power the gas takes up over shaft power",
    },
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let dense = match (values.si("density"), values.si("rated_density")) {
        (Some(density), Some(rated)) => density / rated,
        (None, None) => 1.0,
        _ => {
            let why = "pressure and power go by the ratio of both densities";
            faults.push(missing(&[&["density", "rated_density"]], why));
            1.0
        }
    };
    let names = Names {
        column: "pressure",
        rated: "rated_pressure",
        closed: "closed_damper_pressure",
        closed_power: "closed_damper_power",
        fixed: "back_pressure",
        friction: "duct_pressure",
        weight: 1.0,
        dense: (dense, dense),
        shut: values.word("damper") == Some("closed"),
        kind: "pressure",
        results: ["pressure", "air_power"],
        symbols: ["p_q", "p"],
    };
    let Some(turbo) = turbo(values, &names, &mut faults) else { return Err(faults) };
    let fan = load(&turbo, &names, values, &mut faults);
    done(Model::Load(Box::new(fan)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::{Model, Own};
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn cold_gas_is_heavier() {
        let hot = Values::default()
            .with("rated_speed", Si(150.0))
            .with("rated_power", Si(6e3))
            .with("rated_flow", Si(2.0))
            .with("rated_pressure", Si(2e3))
            .with("rated_density", Si(0.6));
        assert!(build(&hot).is_err());
        let Ok(Model::Load(load)) = build(&hot.with("density", Si(1.2))) else { panic!("no fan") };
        close(load.demand().at(150.0), 80.0, 1e-12);
        let Some(Own::Law { curve, .. }) = load.own("pressure") else { panic!("a pressure") };
        close(curve.at(75.0), 1e3, 1e-12);
        let Some(Own::Law { curve, .. }) = load.own("efficiency") else { panic!("an efficiency") };
        close(curve.at(75.0), 2.0 / 3.0, 1e-12);
    }

    #[test]
    fn what_is_not_given_is_named() {
        let bare = Values::default().with("rated_speed", Si(150.0)).with("rated_power", Si(6e3));
        let Ok(Model::Load(load)) = build(&bare) else { panic!("no fan") };
        assert!(matches!(load.own("flow"), Some(Own::Missing("rated_flow"))));
        assert!(matches!(load.own("pressure"), Some(Own::Missing("rated_flow"))));
        assert!(load.own("head").is_none());
    }
}
