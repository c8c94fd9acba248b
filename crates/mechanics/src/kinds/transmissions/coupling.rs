//! A coupling between two shafts at one speed.

use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, SMALL_INERTIA, positive, range};
use crate::kinds::reading::limits;
use crate::model::{Coupling, Known, Limit, LimitOn, Model, Transmission};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "coupling",
    title: "coupling",
    summary: "Joins two shafts at one speed without loss; it brings its inertia and the most torque it may carry.",
    fields: FIELDS,
    results: &[],
    formulas: &[],
    cautions: &["Guard couplings and shaft ends."],
    example: "transmission jaws: coupling { max_torque = 310 N·m; inertia = 0.004 kg·m² }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive(
        "max_torque",
        "torque",
        Need::Optional,
        range(1e-3, 1e8),
        "most torque it may carry, its service factor already taken off",
    ),
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

#[derive(Debug)]
struct ShaftCoupling {
    inertia: f64,
    limits: Vec<Limit>,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    Ok(Model::Transmission(Box::new(ShaftCoupling {
        inertia: values.si("inertia").unwrap_or(0.0),
        limits: limits(
            values,
            &[("max_torque", LimitOn::InputEffort), ("max_input_speed", LimitOn::InputSpeed)],
        ),
    })))
}

impl Transmission for ShaftCoupling {
    fn coupling(&self, _gear: usize) -> Coupling {
        Coupling::ideal(1.0)
    }

    fn input_inertia(&self) -> Known {
        Known::Value(self.inertia)
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }
}
