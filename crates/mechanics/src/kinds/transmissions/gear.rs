//! A gear pair or gear train of fixed ratio.

use crate::fault::Fault;
use crate::model::{Coupling, Known, Limit, LimitOn, Model, Transmission, TransmissionState};
use crate::registry::{Bounds, Field, Formula, KindRow, Need, Role, Shape};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "gear",
    title: "gear",
    summary: "A gear pair or train of fixed ratio; the efficiency holds in the direction in which power flows.",
    fields: FIELDS,
    results: &[],
    formulas: &[Formula {
        name: "torque",
        text: "T_in * i * eta",
        symbols: &[
            ("T_in", "torque", "torque at the input"),
            ("i", "number", "reduction"),
            ("eta", "ratio", "efficiency"),
        ],
        validity: "power flows from input to output",
        source: "common practice, no source",
        revision: 1,
    }],
    cautions: &[],
    example: "{ reduction = 12; efficiency = 96 % }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    Field {
        name: "reduction",
        shape: Shape::Quantity("number"),
        need: Need::Required,
        hard: Bounds::POSITIVE,
        plausible: Bounds::ANY,
        meaning: "input speed over output speed",
    },
    Field {
        name: "efficiency",
        shape: Shape::Quantity("ratio"),
        need: Need::Required,
        hard: Bounds::EFFICIENCY,
        plausible: Bounds::ANY,
        meaning: "efficiency while the source drives",
    },
    Field {
        name: "efficiency_backward",
        shape: Shape::Quantity("ratio"),
        need: Need::Where("power that flows back"),
        hard: Bounds::EFFICIENCY,
        plausible: Bounds::ANY,
        meaning: "efficiency while the load drives",
    },
    Field {
        name: "max_output_torque",
        shape: Shape::Quantity("torque"),
        need: Need::Optional,
        hard: Bounds::POSITIVE,
        plausible: Bounds::ANY,
        meaning: "highest torque allowed at the output",
    },
];

#[derive(Debug)]
struct Gear {
    reduction: f64,
    efficiency: f64,
    backward: Known,
    max_output_torque: Option<f64>,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    Ok(Model::Transmission(Box::new(Gear {
        reduction: values.si("reduction").unwrap_or(1.0),
        efficiency: values.si("efficiency").unwrap_or(1.0),
        backward: Known::of(values.si("efficiency_backward"), "efficiency_backward"),
        max_output_torque: values.si("max_output_torque"),
    })))
}

impl Transmission for Gear {
    fn coupling(&self, _gear: usize) -> Coupling {
        Coupling { forward: self.efficiency, backward: self.backward, ..Coupling::ideal(self.reduction) }
    }

    fn limits(&self) -> Vec<Limit> {
        let limit = |value| Limit {
            field: "max_output_torque",
            on: LimitOn::OutputEffort,
            value,
            code: "part-limit",
        };
        self.max_output_torque.map(limit).into_iter().collect()
    }

    fn symbols(&self, state: &TransmissionState) -> Vec<(&'static str, f64)> {
        vec![("T_in", state.input_effort), ("i", self.reduction), ("eta", self.efficiency)]
    }
}
