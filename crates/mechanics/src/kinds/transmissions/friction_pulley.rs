//! A pulley that pulls a belt or rope by friction.

use super::fixed::Fixed;
use super::wrap::{FRICTION, GROOVE, MASS, OWN, SLACK, TENSIONS, TIGHT, WRAP, slip, tension_ratio, wrapped};
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, SMALL_INERTIA, positive, range,
};
use crate::laws::{capstan as law, rope};
use crate::model::{LimitOn, Model, Motion};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "friction_pulley",
    title: "friction pulley",
    summary: "A pulley, capstan or traction sheave that pulls a belt or rope by friction alone. The load behind it takes \
              the pull, tight less slack tension; the take-up, a tail weight or a hand holds the slack side. With \
              friction, wrap and one tension it is checked whether it slips.",
    fields: FIELDS,
    results: &TENSIONS,
    formulas: &[
        law::TENSION_RATIO,
        law::PULL_BY_SLACK,
        law::PULL_BY_TIGHT,
        rope::ROPE_SPEED,
        rope::ROPE_PULL,
    ],
    cautions: &[
        "A wrap that slips neither drives nor holds, and wears and heats the rope: count on the least friction, wet or \
         greasy. While the load drives, the tight side is the other one.",
        "Traction drives that carry people or lift over people follow their own standards and licensed practice.",
    ],
    example: "transmission head: friction_pulley { pitch_diameter = 600 mm; wrap = 160°; friction_coefficient = 0.25; \
              slack_tension = 1.3 kN; efficiency = 97 % }",
    build,
    given: |values| tension_ratio(values).map(|ratio| ("tension_ratio", ratio)).into_iter().collect(),
};

static FIELDS: &[Field] = &[
    positive(
        "pitch_diameter",
        "length",
        Need::Required,
        range(0.01, 10.0),
        "diameter the belt or rope works at: to the middle of a flat belt, to the centre of a rope",
    ),
    FRICTION,
    WRAP,
    GROOVE,
    SLACK,
    TIGHT,
    MASS,
    EFFICIENCY,
    EFFICIENCY_BACKWARD,
    MAX_INPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let diameter = values.si("pitch_diameter").unwrap_or(1.0);
    let Some(mut constants) = wrapped(values, true, &mut faults) else { return Err(faults) };
    constants.push(("D", diameter));
    let pulley = Fixed {
        ports: (Motion::Rotary, Motion::Linear),
        constants,
        hidden: vec![("rim", diameter / 2.0), ("pull_out", 1.0)],
        symbols: |coupling, state| {
            vec![("w", state.input_speed), ("T", state.input_effort), ("eta", coupling.forward)]
        },
        slip: Some(slip),
        own: OWN,
        ..Fixed::geared(values, rope::drum_ratio(diameter))
    };
    let limits = [("max_input_torque", LimitOn::InputEffort), ("max_input_speed", LimitOn::InputSpeed)];
    Ok(pulley.limited(values, &limits).model())
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::{close, rpm};
    use crate::model::{Model, TransmissionState};
    use crate::solution::Answer;
    use crate::values::{FieldValue::Si, Values};
    use core::f64::consts::PI;

    fn head(fields: &[(&'static str, f64)]) -> Values {
        let base = [("pitch_diameter", 0.6), ("friction_coefficient", 0.25), ("efficiency", 1.0)];
        base.iter().chain(fields).fold(Values::default(), |all, (name, si)| all.with(name, Si(*si)))
    }

    fn at(pull: f64) -> TransmissionState {
        let speed = rpm(200.0);
        TransmissionState {
            input_speed: speed,
            input_effort: 0.3 * pull,
            output_speed: 0.3 * speed,
            output_effort: pull,
            gear: 0,
        }
    }

    #[test]
    fn published_belt() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 11.4: 2500 N on the tight side.
        let values = head(&[("wrap", 160.0 * PI / 180.0), ("tight_tension", 2500.0)]);
        let Ok(Model::Transmission(pulley)) = build(&values) else { panic!("no pulley") };
        let slip = pulley.slip(&at(1000.0)).unwrap();
        close(slip.most * 2.0 * PI, 7_893.032_558_46, 1e-10);
        close(slip.asked, 1000.0, 1e-15);
        let Some(Answer::Quantity { si, .. }) = pulley.answer("slack_tension", &at(slip.most)) else {
            panic!("no answer")
        };
        close(si, 1_243.784_852_34, 1e-10);
    }

    #[test]
    fn a_running_belt_presses_less() {
        let light = head(&[("wrap", 3.0), ("slack_tension", 500.0)]);
        let heavy = light.clone().with("mass_per_length", Si(2.0));
        let most = |values: &Values| {
            let Ok(Model::Transmission(pulley)) = build(values) else { panic!("no pulley") };
            pulley.slip(&at(100.0)).unwrap().most
        };
        close(most(&heavy) / most(&light), 1.0 - 2.0 * 4.0 * PI * PI / 500.0, 1e-12);
    }

    #[test]
    fn what_it_must_say() {
        let kind = |values: Values| build(&values).unwrap_err().remove(0).kind;
        assert!(matches!(kind(head(&[("wrap", 3.0)])), FaultKind::Missing { .. }));
        assert!(matches!(kind(head(&[("slack_tension", 3.0)])), FaultKind::Missing { .. }));
        let both = head(&[("wrap", 3.0), ("slack_tension", 3.0), ("tight_tension", 9.0)]);
        assert!(matches!(kind(both), FaultKind::Contradiction { .. }));
    }
}
