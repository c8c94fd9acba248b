//! A belt drive, with or without teeth.

use super::fixed::Fixed;
use super::gear::{REDUCTION_RESULT, TEETH, fixed_ratio, ratio};
use super::wrap::{FRICTION, GROOVE, MASS, OWN, SLACK, TENSIONS, TIGHT, WRAP, slip, tension_ratio, wrapped};
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, MAX_POWER, SMALL_INERTIA, plain,
    quantity, range,
};
use crate::kinds::reading::{contradiction, done, missing, only_one};
use crate::laws::{belt as law, capstan, gear};
use crate::model::{Known, Model};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, Role, Shape};
use crate::values::{FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "belt",
    title: "belt drive",
    summary: "Two pulleys and a belt: a friction belt by its pitch diameters and its slip, a toothed belt by its \
              teeth. Slip costs speed but no torque; the loss by slip is beside the efficiency, not in it. With friction, \
              wrap and a tension it is checked whether the belt slips through.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        law::SPEED,
        law::TOTAL_EFFICIENCY,
        gear::TORQUE,
        gear::TORQUE_BACKWARD,
        capstan::TENSION_RATIO,
        capstan::PULL_BY_SLACK,
        capstan::PULL_BY_TIGHT,
    ],
    cautions: &["Guard the belt: it draws in fingers and clothes. A friction belt is no holding device."],
    example: "transmission fan_belt: belt { pitch_diameters = 125 mm drives 200 mm; slip = 1.5 %; efficiency = 96 % }",
    build,
    given: |values| {
        let reduction = diameter_ratio(values, &mut Vec::new()).map(|i| ("reduction", i));
        let tensions = tension_ratio(values).map(|ratio| ("tension_ratio", ratio));
        reduction.into_iter().chain(tensions).collect()
    },
};

static FIELDS: &[Field] = &[
    plain(
        "pitch_diameters",
        Shape::Ratio { diameters: true },
        Need::OneOf,
        "pitch diameters, not outside diameters, of the driving and the driven pulley",
    ),
    TEETH,
    quantity(
        "slip",
        "percentage",
        Need::Where("a friction belt: it always creeps a little, 1 % to 2 % in a good drive"),
        Bounds { high_in: false, ..range(0.0, 1.0) },
        range(0.0, 0.05),
        "loss of speed of the belt on its pulleys, creep included",
    ),
    Field {
        meaning: "power out over power in while the source drives, without the loss by slip",
        ..EFFICIENCY
    },
    EFFICIENCY_BACKWARD,
    FRICTION,
    WRAP,
    Field { need: Need::Optional, ..GROOVE },
    Field { need: Need::Optional, ..SLACK },
    Field { need: Need::Optional, ..TIGHT },
    Field { need: Need::Optional, ..MASS },
    MAX_INPUT_TORQUE,
    MAX_INPUT_SPEED,
    MAX_POWER,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[REDUCTION_RESULT, TENSIONS[0], TENSIONS[1], TENSIONS[2], TENSIONS[3]];

fn diameter_ratio(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let why = "the ratio: pitch diameters of a friction belt, or teeth of a toothed one";
    let way = only_one(values, &["pitch_diameters", "teeth"], why, faults)?;
    ratio(values, way, faults)
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some(ratio) = diameter_ratio(values, &mut faults) else { return Err(faults) };
    let lost = match (values.get("teeth"), values.si("slip")) {
        (Some(_), Some(slip)) if slip > 0.0 => {
            faults.push(contradiction(&["teeth", "slip"], "a toothed belt does not slip", &[]));
            slip
        }
        (None, None) => {
            let why = "a friction belt creeps, 1 % to 2 % in a good drive; say 0 % to leave it out";
            faults.push(missing(&[&["slip"]], why));
            0.0
        }
        (_, slip) => slip.unwrap_or(0.0),
    };
    let mut belt = fixed_ratio(values, ratio);
    belt.coupling.speed = law::speed_ratio(ratio, lost);
    if let Known::Value(backward) = &mut belt.coupling.backward {
        // Slip loses power in both directions: the coupling's speed ratio takes it forward, so it counts twice here.
        let kept = law::slip_factor(lost);
        *backward *= kept * kept;
    }
    belt.constants.push(("s", lost));
    put_on_pulleys(&mut belt, values, &mut faults);
    done(belt.model(), faults)
}

/// What the friction of a belt passes, where it can be said.
fn put_on_pulleys(belt: &mut Fixed, values: &Values, faults: &mut Vec<Fault>) {
    let Some(wrap) = wrapped(values, false, faults) else { return };
    let Some(FieldValue::Ratio { driver, driven }) = values.get("pitch_diameters") else {
        let how = "a toothed belt does not pull by friction";
        faults.push(contradiction(&["teeth", "friction_coefficient"], how, &[]));
        return;
    };
    belt.constants.extend(wrap);
    belt.hidden = vec![("rim", driver / 2.0), ("pull_in", 2.0 / driver), ("pull_out", 2.0 / driven)];
    belt.slip = Some(slip);
    belt.own = OWN;
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::{close, rpm};
    use crate::model::{Known, Model};
    use crate::values::{FieldValue, Values};

    fn pulleys(driver: f64, driven: f64) -> Values {
        Values::default()
            .with("pitch_diameters", FieldValue::Ratio { driver, driven })
            .with("efficiency", FieldValue::Si(0.96))
    }

    #[test]
    fn published_stage_with_slip() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 11.1: 150 rpm, 750 drives 450, 900 drives 150 mm.
        let mut speed = rpm(150.0);
        for (driver, driven) in [(0.75, 0.45), (0.9, 0.15)] {
            let values = pulleys(driver, driven).with("slip", FieldValue::Si(0.02));
            let Ok(Model::Transmission(belt)) = build(&values) else { panic!("no belt") };
            speed /= belt.coupling(0).speed;
        }
        close(speed, rpm(1440.6), 1e-12);
    }

    #[test]
    fn slip_loses_power_both_ways() {
        let values = pulleys(0.1, 0.2)
            .with("slip", FieldValue::Si(0.02))
            .with("efficiency_backward", FieldValue::Si(0.95));
        let Ok(Model::Transmission(belt)) = build(&values) else { panic!("no belt") };
        let c = belt.coupling(0);
        // Power out over power in, either way.
        close(c.effort * c.forward / c.speed, 0.96 * 0.98, 1e-14);
        let Known::Value(backward) = c.backward else { panic!("given") };
        close(backward * c.speed / c.effort, 0.95 * 0.98, 1e-14);
    }

    #[test]
    fn slip_is_asked_of_friction_belts_only() {
        let kind = |values: Values| build(&values).unwrap_err().remove(0).kind;
        assert!(matches!(kind(pulleys(0.1, 0.2)), FaultKind::Missing { .. }));
        let toothed = Values::default().with("teeth", FieldValue::Ratio { driver: 20.0, driven: 40.0 });
        assert!(build(&toothed).is_ok());
        assert!(matches!(kind(toothed.with("slip", FieldValue::Si(0.02))), FaultKind::Contradiction { .. }));
    }
}
