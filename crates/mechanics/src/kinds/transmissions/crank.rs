//! A slider-crank.

use super::fixed::{Fixed, Own};
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, SMALL_INERTIA, positive, quantity,
    range,
};
use crate::kinds::reading::{bad_value, contradiction, only_one};
use crate::laws::crank as law;
use crate::model::{LimitOn, Model, Motion};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;
use core::f64::consts::PI;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "crank",
    title: "slider-crank",
    summary: "A turning crank that pushes a slider to and fro. The torque for a force swings over the turn: the drive is \
              judged at the worst position, where the lever arm is greatest, or at the crank angle that is given. The \
              slider's speed is that of this position; its mean is a result.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::LEVER_ARM, law::SPEED, law::FORCE, law::MEAN_SPEED],
    cautions: &[
        "At the dead centres the lever arm is nought: no torque moves the slider there, and a small torque makes a force \
         that breaks the frame. Steady running rests on a flywheel.",
        "Guard the slider and the crank: they crush at both ends of the stroke.",
    ],
    example: "transmission ram: crank { stroke = 120 mm; rod_length = 300 mm; efficiency = 90 % }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    positive("stroke", "length", Need::OneOf, range(1e-3, 5.0), "way of the slider from end to end"),
    positive("crank_radius", "length", Need::OneOf, range(5e-4, 2.5), "half the stroke"),
    positive("rod_length", "length", Need::Required, range(1e-3, 20.0), "length of the rod between its eyes"),
    quantity(
        "angle",
        "angle",
        Need::Optional,
        Bounds { low: 0.0, low_in: false, high: PI, high_in: false },
        range(0.017, 3.125),
        "crank angle it is judged at, from the dead centre at which the slider is farthest; the worst when not given",
    ),
    EFFICIENCY,
    EFFICIENCY_BACKWARD,
    positive(
        "max_slider_force",
        "force",
        Need::Optional,
        range(10.0, 1e8),
        "most force the slider may carry",
    ),
    MAX_INPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "crank_angle",
        shape: ResultShape::Quantity("angle"),
        meaning: "crank angle it is judged at, from the farther dead centre",
    },
    ResultRow {
        name: "lever_arm",
        shape: ResultShape::Quantity("length"),
        meaning: "torque per force of the slider at this angle",
    },
    ResultRow {
        name: "mean_speed",
        shape: ResultShape::Quantity("speed"),
        meaning: "mean speed of the slider over a turn, to and fro",
    },
];

static OWN: &[Own] = &[Own {
    name: "mean_speed",
    kind: "speed",
    value: |part, state| law::mean_speed(part.constant("r"), state.input_speed.abs()),
}];

/// Crank radius, rod length, angle and lever arm.
fn geometry(values: &Values, faults: &mut Vec<Fault>) -> Option<(f64, f64, f64, f64)> {
    let way = only_one(values, &["stroke", "crank_radius"], "how far the slider goes", faults)?;
    let radius = if way == "stroke" { values.si("stroke")? / 2.0 } else { values.si("crank_radius")? };
    let rod = values.si("rod_length")?;
    if rod <= radius {
        let how = "a rod of {0} is no longer than the crank of {1}: it cannot turn round";
        let quantities = [(rod, "length"), (radius, "length")];
        faults.push(contradiction(&["rod_length", way], how, &quantities));
        return None;
    }
    let angle = values.si("angle").unwrap_or_else(|| law::worst_angle(radius, rod));
    let arm = law::lever_arm(radius, rod, angle);
    if arm > 1e-9 * radius {
        return Some((radius, rod, angle, arm));
    }
    faults.push(bad_value(
        "angle",
        "at {0} the crank moves nothing: it is a dead centre",
        &[(angle, "angle")],
    ));
    None
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some((radius, rod, angle, arm)) = geometry(values, &mut faults) else { return Err(faults) };
    let crank = Fixed {
        ports: (Motion::Rotary, Motion::Linear),
        constants: vec![("r", radius), ("l", rod), ("t", angle), ("h", arm)],
        symbols: |coupling, state| {
            vec![("w", state.input_speed), ("T", state.input_effort), ("eta", coupling.forward)]
        },
        own: OWN,
        ..Fixed::geared(values, 1.0 / arm)
    };
    let limits = [
        ("max_slider_force", LimitOn::OutputEffort),
        ("max_input_torque", LimitOn::InputEffort),
        ("max_input_speed", LimitOn::InputSpeed),
    ];
    Ok(crank.limited(values, &limits).model())
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    let found = geometry(values, &mut Vec::new());
    found.map(|(_, _, angle, arm)| vec![("crank_angle", angle), ("lever_arm", arm)]).unwrap_or_default()
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::Model;
    use crate::values::{FieldValue::Si, Values};
    use core::f64::consts::PI;

    fn arm(fields: &[(&'static str, f64)]) -> Result<f64, FaultKind> {
        let values = fields.iter().fold(Values::default(), |all, (name, si)| all.with(name, Si(*si)));
        match build(&values) {
            Ok(Model::Transmission(crank)) => Ok(1.0 / crank.coupling(0).effort),
            Ok(_) => panic!("not a transmission"),
            Err(mut faults) => Err(faults.remove(0).kind),
        }
    }

    #[test]
    fn the_worst_position_unless_said() {
        let ram = [("stroke", 0.12), ("rod_length", 0.3)];
        let quarter = arm(&[&ram[..], &[("angle", PI / 2.0)]].concat()).unwrap();
        close(quarter, 0.06, 1e-14);
        assert!(arm(&ram).unwrap() > quarter);
    }

    #[test]
    fn what_a_crank_cannot_be() {
        assert!(matches!(arm(&[("rod_length", 0.3)]), Err(FaultKind::Missing { .. })));
        let short = [("stroke", 0.12), ("rod_length", 0.05)];
        assert!(matches!(arm(&short), Err(FaultKind::Contradiction { .. })));
    }
}
