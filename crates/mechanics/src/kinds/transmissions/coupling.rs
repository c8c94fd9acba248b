//! A coupling between two shafts at one speed.

use super::fixed::Fixed;
use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, SMALL_INERTIA, positive, range};
use crate::model::{LimitOn, Model};
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

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let limits = [("max_torque", LimitOn::InputEffort), ("max_input_speed", LimitOn::InputSpeed)];
    Ok(Fixed::shafts(values).limited(values, &limits).model())
}
