//! A freewheel: an overrunning clutch.

use super::fixed::Fixed;
use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, MAX_INPUT_TORQUE, SMALL_INERTIA};
use crate::model::{LimitOn, Model};
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

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let limits = [("max_input_torque", LimitOn::InputEffort), ("max_input_speed", LimitOn::InputSpeed)];
    Ok(Fixed { one_way: true, ..Fixed::shafts(values).limited(values, &limits) }.model())
}
