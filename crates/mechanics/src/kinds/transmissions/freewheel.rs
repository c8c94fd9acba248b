//! A freewheel: an overrunning clutch.

use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, MAX_INPUT_TORQUE, SMALL_INERTIA};
use crate::kinds::reading::limits;
use crate::model::{Coupling, Known, Limit, LimitOn, Model, Transmission};
use crate::registry::{Field, KindRow, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "freewheel",
    title: "freewheel",
    summary: "Passes torque that drives and lets the load run ahead: a source that cannot follow is left behind, and \
              none of its braking reaches the load.",
    fields: FIELDS,
    results: &[],
    formulas: &[],
    cautions: &["Behind a freewheel no source and no brake before it can slow the load."],
    example: "transmission clutch: freewheel { }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[MAX_INPUT_TORQUE, MAX_INPUT_SPEED, SMALL_INERTIA];

#[derive(Debug)]
struct Freewheel {
    inertia: f64,
    limits: Vec<Limit>,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    Ok(Model::Transmission(Box::new(Freewheel {
        inertia: values.si("inertia").unwrap_or(0.0),
        limits: limits(
            values,
            &[("max_input_torque", LimitOn::InputEffort), ("max_input_speed", LimitOn::InputSpeed)],
        ),
    })))
}

impl Transmission for Freewheel {
    fn coupling(&self, _gear: usize) -> Coupling {
        Coupling::ideal(1.0)
    }

    fn input_inertia(&self) -> Known {
        Known::Value(self.inertia)
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }

    fn one_way(&self) -> bool {
        true
    }
}
