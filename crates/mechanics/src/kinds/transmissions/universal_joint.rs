//! A universal joint, or two.

use super::fixed::{Fixed, Own};
use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, SMALL_INERTIA, plain, positive, quantity, range};
use crate::laws::universal_joint as law;
use crate::model::{LimitOn, Model};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "universal_joint",
    title: "universal joint",
    summary: "A cross between two forks that joins shafts at an angle. Over a whole turn both are equally fast; within it \
              the output swings twice. The drive is solved at the mean; how far the speed swings is a result. A second \
              joint turned the right way makes it even again, turned the wrong way doubles the swing.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::HIGHEST, law::LOWEST],
    cautions: &[
        "What swings in speed swings in torque too, and can shake a heavy load behind it out of its fixing: guard shafts \
         with joints over their whole length.",
    ],
    example: "transmission propshaft: universal_joint { angle = 12°; second_joint = phased; max_torque = 400 N·m }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    quantity(
        "angle",
        "angle",
        Need::Required,
        Bounds { high_in: false, ..range(0.0, core::f64::consts::FRAC_PI_2) },
        range(0.0, 0.62),
        "angle between the shafts, the same at both joints where there are two",
    ),
    plain(
        "second_joint",
        Shape::Choice(&[
            (PHASED, "forks of the middle shaft in one plane: the swing is taken back"),
            (CROSSED, "forks of the middle shaft across: the swing adds up"),
        ]),
        Need::Optional,
        "a second joint at the same angle, by how it is turned",
    ),
    positive(
        "max_torque",
        "torque",
        Need::Optional,
        range(1e-3, 1e7),
        "most torque it may carry at this angle",
    ),
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

const PHASED: &str = "phased";
const CROSSED: &str = "crossed";

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "fastest_speed",
        shape: ResultShape::Quantity("rotational_speed"),
        meaning: "highest speed of the output within a turn",
    },
    ResultRow {
        name: "slowest_speed",
        shape: ResultShape::Quantity("rotational_speed"),
        meaning: "lowest speed of the output within a turn",
    },
];

static OWN: &[Own] = &[
    Own {
        name: "fastest_speed",
        kind: "rotational_speed",
        value: |part, state| state.input_speed * law::swing(part.constant("a"), part.constant("k")),
    },
    Own {
        name: "slowest_speed",
        kind: "rotational_speed",
        value: |part, state| state.input_speed / law::swing(part.constant("a"), part.constant("k")),
    },
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let joints = match values.word("second_joint") {
        None => 1.0,
        Some(PHASED) => 0.0,
        Some(_) => 2.0,
    };
    let joint = Fixed {
        constants: vec![("a", values.si("angle").unwrap_or(0.0)), ("k", joints)],
        symbols: |_, state| vec![("w", state.input_speed)],
        own: OWN,
        ..Fixed::shafts(values)
    };
    let limits = [("max_torque", LimitOn::InputEffort), ("max_input_speed", LimitOn::InputSpeed)];
    Ok(joint.limited(values, &limits).model())
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::{Model, TransmissionState};
    use crate::solution::Answer;
    use crate::values::{FieldValue, Values};

    #[test]
    fn the_second_joint_by_its_turning() {
        let fastest = |second: Option<&'static str>| {
            let mut values = Values::default().with("angle", FieldValue::Si(0.3));
            if let Some(word) = second {
                values.set("second_joint", FieldValue::Word(word));
            }
            let Ok(Model::Transmission(joint)) = build(&values) else { panic!("no joint") };
            let state = TransmissionState {
                input_speed: 50.0,
                input_effort: 1.0,
                output_speed: 50.0,
                output_effort: 1.0,
                gear: 0,
            };
            let Some(Answer::Quantity { si, .. }) = joint.answer("fastest_speed", &state) else {
                panic!("none")
            };
            si / 50.0
        };
        let one = fastest(None);
        assert!(one > 1.0);
        close(fastest(Some("phased")), 1.0, 1e-15);
        close(fastest(Some("crossed")), one * one, 1e-14);
    }
}
