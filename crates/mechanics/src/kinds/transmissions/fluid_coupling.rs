//! A fluid coupling behind a source.

use super::fixed::{Fixed, Own};
use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, SMALL_INERTIA, positive, quantity, range};
use crate::kinds::reading::contradiction;
use crate::laws::fluid_coupling as law;
use crate::laws::fluid_coupling::Fluid;
use crate::model::{LimitOn, Model};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "fluid_coupling",
    title: "fluid coupling",
    summary: "Two blade wheels in oil: the torque is the same on both sides, the output lags behind by the slip, and the \
              torque grows with the square of the speed. A source runs up nearly unloaded and brings the load after it. \
              It stands directly behind its source, which has a speed of its own.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::SHAPE, law::TORQUE],
    cautions: &[
        "What it slips away heats the oil: a blocked or slow output opens the fusible plug within a minute, and hot oil \
         sprays. Guard it and keep clear of the plug.",
        "It is no holding device and holds nothing at rest.",
    ],
    example: "transmission soft_start: fluid_coupling { rated_torque = 98 N·m; rated_speed = 1470 rpm; rated_slip = 3 %; \
              stall_torque_ratio = 2 }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive(
        "rated_torque",
        "torque",
        Need::Required,
        range(0.1, 1e6),
        "torque at rated speed and rated slip",
    ),
    positive(
        "rated_speed",
        "rotational_speed",
        Need::Required,
        range(10.0, 1000.0),
        "input speed the rated torque is for",
    ),
    quantity(
        "rated_slip",
        "percentage",
        Need::Required,
        Bounds { low: 0.0, low_in: false, high: 0.5, high_in: true },
        range(0.01, 0.08),
        "slip at that torque and speed",
    ),
    quantity(
        "stall_torque_ratio",
        "number",
        Need::Required,
        Bounds { low: 1.0, low_in: false, high: 100.0, high_in: true },
        range(1.2, 8.0),
        "torque with the output held over rated torque, at rated speed",
    ),
    MAX_INPUT_SPEED,
    Field { meaning: "moment of inertia of the output side, the oil in it included", ..SMALL_INERTIA },
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "slip",
        shape: ResultShape::Quantity("percentage"),
        meaning: "how far the output lags behind the input, over the input speed",
    },
    ResultRow { name: "heat", shape: ResultShape::Quantity("heat"), meaning: "power that stays in the oil" },
];

static OWN: &[Own] = &[
    Own { name: "slip", kind: "percentage", value: |_, state| 1.0 - state.output_speed / state.input_speed },
    Own {
        name: "heat",
        kind: "heat",
        value: |_, state| (state.output_effort * (state.input_speed - state.output_speed)).abs(),
    },
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let si = |field| values.si(field).unwrap_or(1.0);
    let (torque, speed) = (si("rated_torque"), si("rated_speed"));
    let (slip, stall) = (si("rated_slip"), si("stall_torque_ratio"));
    if slip * stall >= 1.0 {
        let how = "from {0} of slip at rated torque it cannot rise to {1} times that at stall: a straight line would not \
                   even reach it; give the slip and the ratio of one curve";
        let quantities = [(slip, "percentage"), (stall, "number")];
        return Err(vec![contradiction(&["rated_slip", "stall_torque_ratio"], how, &quantities)]);
    }
    let coupling = Fixed {
        fluid: Some(Fluid::rated(torque, speed, slip, stall)),
        at_output: true,
        constants: vec![
            ("T_r", torque),
            ("w_r", speed),
            ("s_r", slip),
            ("R", stall),
            ("a", law::shape(slip, stall)),
        ],
        symbols: |_, state| {
            vec![("w", state.input_speed), ("s", 1.0 - state.output_speed / state.input_speed)]
        },
        own: OWN,
        ..Fixed::shafts(values)
    };
    Ok(coupling.limited(values, &[("max_input_speed", LimitOn::InputSpeed)]).model())
}
