//! A worm and its wheel.

use super::fixed::Fixed;
use super::gear::{LIMITS, REDUCTION_RESULT, by_reduction_or_teeth, symbols};
use crate::fault::Fault;
use crate::kinds::fields::{
    BACKWARD_OR_LOCKED, FRICTION_EFFICIENCY, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, MAX_OUTPUT_TORQUE,
    SMALL_INERTIA, default, plain, positive, quantity, range,
};
use crate::kinds::reading::{bad_value, contradiction, differ, done, missing};
use crate::laws::{gear, worm as law};
use crate::model::{Known, Model};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::{FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "worm",
    title: "worm gear",
    summary: "A worm that drives a wheel: a high reduction in one step, with the loss of a sliding thread. Its efficiency \
              is given, or follows from the friction and the lead angle, which also say what it does when the wheel \
              drives.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        gear::REDUCTION,
        law::LEAD_ANGLE,
        law::EFFICIENCY,
        law::EFFICIENCY_BACKWARD,
        gear::SPEED,
        gear::TORQUE,
        gear::TORQUE_BACKWARD,
    ],
    cautions: &[
        "A self-locking worm is not a brake: shaking, wear, heat and good oil lower its friction until it runs back. What \
         must not run back needs a brake of its own, by the local code for the machine.",
        "The friction of a worm is highest at rest: starting under load asks more torque than running.",
    ],
    example: "transmission slewing: worm { teeth = 2 drives 40; diameter_factor = 8; friction_coefficient = 0.032 }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    positive("reduction", "number", Need::OneOf, range(3.0, 300.0), "input speed over output speed"),
    plain(
        "teeth",
        Shape::Ratio { diameters: false },
        Need::OneOf,
        "starts of the worm and teeth of the wheel: `2 drives 40`",
    ),
    FRICTION_EFFICIENCY,
    BACKWARD_OR_LOCKED,
    quantity(
        "friction_coefficient",
        "number",
        Need::OneOf,
        Bounds::closed(0.0, 1.0),
        range(0.01, 0.2),
        "friction along the thread at the sliding speed it runs at; with the lead angle it gives both efficiencies",
    ),
    quantity(
        "lead_angle",
        "angle",
        Need::Where("the losses of a worm that is given by its friction"),
        Bounds { low: 0.0, low_in: false, high: 1.5, high_in: true },
        range(0.02, 0.8),
        "lead angle of the worm at its pitch diameter; or say diameter_factor",
    ),
    positive(
        "diameter_factor",
        "number",
        Need::Optional,
        range(5.0, 25.0),
        "pitch diameter of the worm over the axial module; with the starts it gives the lead angle",
    ),
    quantity(
        "pressure_angle",
        "angle",
        default(0.349_065_850_398_865_9, "the usual normal pressure angle of worms, 20 degrees"),
        Bounds::closed(0.0, 0.7),
        range(0.0, 0.55),
        "normal pressure angle of the thread",
    ),
    MAX_INPUT_TORQUE,
    MAX_OUTPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[
    REDUCTION_RESULT,
    ResultRow {
        name: "lead_angle",
        shape: ResultShape::Quantity("angle"),
        meaning: "lead angle of the worm",
    },
];

fn starts(values: &Values) -> Option<f64> {
    match values.get("teeth") {
        Some(FieldValue::Ratio { driver, .. }) => Some(*driver),
        _ => None,
    }
}

/// The lead angle, given or by the starts and the diameter factor.
fn lead_angle(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let made = match (values.si("diameter_factor"), starts(values)) {
        (Some(factor), Some(starts)) => Some(law::lead_angle(starts, factor)),
        (Some(_), None) => {
            let why = "the diameter factor gives a lead angle only with the starts: `teeth = 2 drives 40`";
            faults.push(missing(&[&["teeth"], &["lead_angle"]], why));
            None
        }
        _ => None,
    };
    match (values.si("lead_angle"), made) {
        (Some(given), Some(made)) if differ(given, made, 0.01) => {
            let how = "starts and diameter factor make a lead angle of {0}, not {1}";
            let quantities = [(made, "angle"), (given, "angle")];
            faults.push(contradiction(&["lead_angle", "diameter_factor"], how, &quantities));
            None
        }
        (given, made) => given.or(made),
    }
}

/// Efficiencies with the worm and with the wheel driving.
fn losses(values: &Values, lead: Option<f64>, faults: &mut Vec<Fault>) -> Option<(f64, Known)> {
    let pressure = values.si("pressure_angle").unwrap_or(0.0);
    let given_back = values.si("efficiency_backward");
    match (values.si("efficiency"), values.si("friction_coefficient"), lead) {
        (Some(_), Some(_), _) => {
            let how = "an efficiency and a friction say the same loss twice; keep one";
            faults.push(contradiction(&["efficiency", "friction_coefficient"], how, &[]));
            None
        }
        (Some(forward), None, Some(lead)) if given_back.is_none() => {
            let friction = law::friction_of(forward, lead, pressure);
            Some((forward, Known::Value(law::efficiency_backward(lead, pressure, friction))))
        }
        (Some(forward), None, _) => Some((forward, Known::of(given_back, "efficiency_backward"))),
        (None, Some(friction), Some(lead)) => {
            let forward = law::efficiency(lead, pressure, friction);
            if forward > 0.0 {
                let backward = given_back.unwrap_or(law::efficiency_backward(lead, pressure, friction));
                return Some((forward, Known::Value(backward)));
            }
            let how = "with a friction of {0} the worm cannot turn its wheel at this lead angle";
            faults.push(bad_value("friction_coefficient", how, &[(friction, "number")]));
            None
        }
        (None, Some(_), None) => {
            if faults.is_empty() {
                let why = "friction makes a loss only with the lead angle of the thread";
                faults.push(missing(&[&["lead_angle"], &["diameter_factor", "teeth"]], why));
            }
            None
        }
        (None, None, _) => {
            let why = "the loss of the worm: its efficiency, or friction and lead angle";
            faults.push(missing(&[&["efficiency"], &["friction_coefficient", "lead_angle"]], why));
            None
        }
    }
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let reduction = by_reduction_or_teeth(values, &mut faults);
    let lead = lead_angle(values, &mut faults);
    let losses = losses(values, lead, &mut faults);
    let (Some(reduction), Some((forward, backward))) = (reduction, losses) else { return Err(faults) };
    let mut worm = Fixed { symbols, ..Fixed::geared(values, reduction).limited(values, LIMITS) };
    worm.coupling.forward = forward;
    worm.coupling.backward = backward;
    let own = [
        ("l", lead),
        ("q", values.si("diameter_factor")),
        ("mu", values.si("friction_coefficient")),
        ("z_1", starts(values)),
        ("z_2", starts(values).map(|starts| starts * reduction)),
        ("a", values.si("pressure_angle")),
    ];
    worm.constants.extend(own.into_iter().filter_map(|(name, si)| Some((name, si?))));
    done(worm.model(), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    let faults = &mut Vec::new();
    let reduction = by_reduction_or_teeth(values, faults).map(|i| ("reduction", i));
    let lead = lead_angle(values, faults).map(|lead| ("lead_angle", lead));
    reduction.into_iter().chain(lead).collect()
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::{Coupling, Known, Model};
    use crate::values::{FieldValue, Values};

    const DEG: f64 = core::f64::consts::PI / 180.0;

    fn worm(fields: &[(&'static str, f64)]) -> Result<Coupling, FaultKind> {
        let teeth = FieldValue::Ratio { driver: 2.0, driven: 40.0 };
        let mut values = Values::default().with("teeth", teeth).with("pressure_angle", FieldValue::Si(0.0));
        fields.iter().for_each(|(name, si)| values.set(name, FieldValue::Si(*si)));
        match build(&values) {
            Ok(Model::Transmission(worm)) => Ok(worm.coupling(0)),
            Ok(_) => panic!("not a transmission"),
            Err(mut faults) => Err(faults.remove(0).kind),
        }
    }

    #[test]
    fn friction_gives_both_ways() {
        let steep = worm(&[("friction_coefficient", 0.05), ("lead_angle", 20.0 * DEG)]).unwrap();
        close(steep.forward, 0.863_217_903_403, 1e-11);
        assert!(matches!(steep.backward, Known::Value(b) if (b - 0.847_208_200_664).abs() < 1e-11));
        let flat = worm(&[("friction_coefficient", 0.1), ("lead_angle", 5.0 * DEG)]).unwrap();
        assert!(matches!(flat.backward, Known::Value(b) if b < 0.0));
        close(flat.speed, 20.0, 1e-15);
    }

    #[test]
    fn an_efficiency_alone_says_nothing_of_the_way_back() {
        let plain = worm(&[("efficiency", 0.7)]).unwrap();
        assert_eq!(plain.backward, Known::Missing("efficiency_backward"));
        // With the lead angle the friction behind the efficiency is known, and so is the way back.
        let angled = worm(&[("efficiency", 0.863_217_903_403), ("lead_angle", 20.0 * DEG)]).unwrap();
        assert!(matches!(angled.backward, Known::Value(b) if (b - 0.847_208_200_664).abs() < 1e-10));
    }

    #[test]
    fn what_a_worm_must_say() {
        assert!(matches!(worm(&[]), Err(FaultKind::Missing { .. })));
        assert!(matches!(worm(&[("friction_coefficient", 0.1)]), Err(FaultKind::Missing { .. })));
        let twice = [("friction_coefficient", 0.1), ("efficiency", 0.5), ("lead_angle", 0.1)];
        assert!(matches!(worm(&twice), Err(FaultKind::Contradiction { .. })));
        let clash = [("efficiency", 0.5), ("lead_angle", 0.1), ("diameter_factor", 8.0)];
        assert!(matches!(worm(&clash), Err(FaultKind::Contradiction { .. })));
    }
}
