//! A chain drive.

use super::gear::{RESULTS, TEETH, fixed_ratio, ratio};
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, MAX_POWER, SMALL_INERTIA,
};
use crate::kinds::reading::missing;
use crate::laws::gear as law;
use crate::model::Model;
use crate::registry::{Field, KindRow, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "chain",
    title: "chain drive",
    summary: "Two sprockets and a chain: no slip, the speed follows the teeth. The small waviness of speed that comes \
              of the links is left aside.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::REDUCTION, law::SPEED, law::TORQUE, law::TORQUE_BACKWARD],
    cautions: &["Guard the chain: it draws in fingers and clothes."],
    example: "transmission crank_chain: chain { teeth = 42 drives 18; efficiency = 97 % }",
    build,
    given: |values| ratio(values, "teeth", &mut Vec::new()).map(|i| ("reduction", i)).into_iter().collect(),
};

static FIELDS: &[Field] =
    &[TEETH, EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_TORQUE, MAX_INPUT_SPEED, MAX_POWER, SMALL_INERTIA];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    match ratio(values, "teeth", &mut faults) {
        Some(reduction) => Ok(fixed_ratio(values, reduction).model()),
        None if faults.is_empty() => {
            Err(vec![missing(&[&["teeth"]], "the teeth of both sprockets: `42 drives 18`")])
        }
        None => Err(faults),
    }
}
