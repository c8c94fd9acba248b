//! A hydraulic unit: pressure up to its relief valve, flow up to what its pump gives.

use crate::fault::{Fault, Note};
use crate::kinds::fields::{default, not_negative, positive, range};
use crate::model::{Model, Supply, SupplyData};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::solution::{Answer, Marks};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Supply,
    name: "hydraulic_unit",
    title: "hydraulic unit",
    summary: "Pump, tank and relief valve as motors see them: whatever pressure the load asks for up to the setting of the \
              relief valve, whatever flow up to that of the pump.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[],
    cautions: &[
        "Oil under pressure injures through the skin and moves loads when a line breaks: depressurise before work, and \
         hold what can fall by other means than a pump.",
    ],
    example: "supply unit: hydraulic_unit { pressure = 180 bar; flow_limit = 40 l/min; return_pressure = 4 bar }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive(
        "pressure",
        "pressure",
        Need::Required,
        range(1e6, 5e7),
        "pressure at the motors' inlets while the relief valve opens, losses of the lines taken off",
    ),
    positive(
        "flow_limit",
        "flow",
        Need::Required,
        range(1e-6, 0.1),
        "flow the pump gives at that pressure, for all motors together",
    ),
    not_negative(
        "return_pressure",
        "pressure",
        default(0.0, "the line to the tank is taken as open"),
        range(0.0, 5e6),
        "pressure at the motors' outlets",
    ),
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "flow",
        shape: ResultShape::Quantity("flow"),
        meaning: "flow it gives to all motors on it",
    },
    ResultRow {
        name: "hydraulic_power",
        shape: ResultShape::Quantity("power"),
        meaning: "flow times its pressure; what the motors do not use warms the oil",
    },
];

#[derive(Debug)]
struct HydraulicUnit {
    data: SupplyData,
    pressure: f64,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let pressure = values.si("pressure").unwrap_or(0.0);
    let back = values.si("return_pressure").unwrap_or(0.0);
    if back >= pressure {
        let why = crate::kinds::reading::contradiction(
            &["pressure", "return_pressure"],
            "nothing is left to drive a motor: {0} at its inlet, {1} at its outlet",
            &[(pressure, "pressure"), (back, "pressure")],
        );
        return Err(vec![why]);
    }
    let data = SupplyData {
        pressure: Some(pressure - back),
        flow_limit: values.si("flow_limit"),
        ..SupplyData::default()
    };
    Ok(Model::Supply(Box::new(HydraulicUnit { data, pressure })))
}

impl Supply for HydraulicUnit {
    fn data(&self) -> SupplyData {
        self.data
    }

    fn answer(&self, name: &str, flow: f64) -> Option<Answer> {
        let (si, kind) = match name {
            "flow" => (flow.abs(), "flow"),
            "hydraulic_power" => ((flow * self.pressure).abs(), "power"),
            _ => return Some(Answer::Absent(Note::plain("a hydraulic unit gives flow, not current"))),
        };
        Some(Answer::Quantity { si, kind, marks: Marks::default() })
    }
}
