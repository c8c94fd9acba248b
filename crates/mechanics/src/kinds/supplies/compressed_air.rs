//! Compressed air: a gauge pressure and as much free air as the compressor delivers.

use crate::fault::{Fault, Note};
use crate::kinds::fields::{positive, range};
use crate::model::{Model, Supply, SupplyData};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::solution::{Answer, Marks};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Supply,
    name: "compressed_air",
    title: "compressed air",
    summary: "A works net of compressed air as it stands at the motor's inlet while it flows: lines, hoses and fittings \
              take a part of the compressor's pressure.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[],
    cautions: &[
        "Compressed air in a receiver is stored energy: vessels, hoses and couplings follow the local code.",
    ],
    example: "supply net: compressed_air { pressure = 6 bar; flow_limit = 900 l/min }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    Field {
        name: "pressure",
        shape: Shape::Quantity("gauge_pressure"),
        need: Need::Required,
        hard: Bounds::POSITIVE,
        plausible: range(1e5, 1.5e6),
        meaning: "gauge pressure at the motor's inlet while it flows",
    },
    positive(
        "flow_limit",
        "flow",
        Need::Optional,
        range(1e-5, 10.0),
        "free air it delivers to all motors together, at the pressure of the surroundings",
    ),
];

static RESULTS: &[ResultRow] = &[ResultRow {
    name: "flow",
    shape: ResultShape::Quantity("flow"),
    meaning: "free air it gives to all motors on it",
}];

#[derive(Debug)]
struct CompressedAir(SupplyData);

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let data = SupplyData {
        pressure: values.si("pressure"),
        flow_limit: values.si("flow_limit"),
        ..SupplyData::default()
    };
    Ok(Model::Supply(Box::new(CompressedAir(data))))
}

impl Supply for CompressedAir {
    fn data(&self) -> SupplyData {
        self.0
    }

    fn answer(&self, name: &str, flow: f64) -> Option<Answer> {
        Some(match name {
            "flow" => Answer::Quantity { si: flow.abs(), kind: "flow", marks: Marks::default() },
            _ => Answer::Absent(Note::plain("compressed air gives flow, not current")),
        })
    }
}
