//! A power screw and its nut.

use super::fixed::{Fixed, Symbols};
use crate::fault::Fault;
use crate::kinds::fields::{
    BACKWARD_OR_LOCKED, FRICTION_EFFICIENCY, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, SMALL_INERTIA, default,
    not_negative, positive, quantity, range,
};
use crate::kinds::reading::{bad_value, contradiction, differ, done, missing};
use crate::laws::screw as law;
use crate::laws::screw::Thread;
use crate::model::{Coupling, Known, LimitOn, Model, Motion, TransmissionState};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "screw",
    title: "power screw",
    summary: "A turning screw that moves a nut and its load straight (or a turning nut and a screw). Sliding threads are \
              given by friction and mean diameter, which say both directions; rolling ones by their efficiencies.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        law::LEAD_ANGLE,
        law::THREAD_FRICTION,
        law::EFFICIENCY,
        law::EFFICIENCY_BACKWARD,
        law::SPEED,
        law::FORCE,
        law::TORQUE_BACKWARD,
    ],
    cautions: &[
        "A self-locking screw is not a brake: shaking, wear and grease lower its friction until it runs down. A load that \
         must not come down needs a brake or a catch of its own, by the local code for the machine.",
        "A nut wears through: lifting screws carry a second nut or a catch where people stand beneath or on the load.",
        "Slender screws buckle under load and whirl at speed: check both, the tool does not.",
    ],
    example: "transmission spindle: screw { pitch = 12.5 mm; mean_diameter = 50 mm; friction_coefficient = 0.13 }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    positive(
        "lead",
        "length",
        Need::OneOf,
        range(5e-4, 0.2),
        "way of the nut in one turn: pitch times starts",
    ),
    positive(
        "pitch",
        "length",
        Need::OneOf,
        range(5e-4, 0.1),
        "way from one thread to the next along the axis; with starts it gives the lead",
    ),
    quantity(
        "starts",
        "count",
        default(1.0, "a single thread, unless the drawing says more"),
        range(1.0, 20.0),
        range(1.0, 8.0),
        "threads side by side; counts with pitch",
    ),
    positive(
        "mean_diameter",
        "length",
        Need::Where("the losses of a screw that is given by its friction"),
        range(2e-3, 0.5),
        "diameter halfway up the thread",
    ),
    quantity(
        "friction_coefficient",
        "number",
        Need::OneOf,
        Bounds::closed(0.0, 1.0),
        range(0.02, 0.3),
        "friction of the sliding thread; gives both efficiencies",
    ),
    quantity(
        "thread_angle",
        "angle",
        default(0.0, "a square thread; 30° for a trapezoidal, 29° for an Acme thread ask more torque"),
        Bounds::closed(0.0, 2.0),
        range(0.0, 1.1),
        "angle between both flanks of the thread",
    ),
    not_negative(
        "collar_friction_coefficient",
        "number",
        default(
            0.0,
            "the thrust runs in a rolling bearing; a plain collar takes as much torque as the thread",
        ),
        range(0.0, 0.3),
        "friction of a plain collar that takes the thrust",
    ),
    positive(
        "collar_diameter",
        "length",
        Need::Where("a collar with friction"),
        range(2e-3, 1.0),
        "mean diameter of that collar",
    ),
    FRICTION_EFFICIENCY,
    BACKWARD_OR_LOCKED,
    positive(
        "max_load",
        "force",
        Need::Optional,
        range(10.0, 1e8),
        "most force the screw may carry, buckling counted",
    ),
    MAX_INPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[
    ResultRow { name: "lead", shape: ResultShape::Quantity("length"), meaning: "way of the nut in one turn" },
    ResultRow {
        name: "lead_angle",
        shape: ResultShape::Quantity("angle"),
        meaning: "lead angle at the mean diameter",
    },
];

fn lead(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let starts = values.si("starts").unwrap_or(1.0);
    if starts != starts.round() {
        faults.push(bad_value("starts", "starts are counted: {0} is no whole number", &[(starts, "number")]));
    }
    let made = values.si("pitch").map(|pitch| pitch * starts);
    match (values.si("lead"), made) {
        (Some(lead), Some(made)) if differ(lead, made, 0.005) => {
            let how = "pitch and starts make a lead of {0}, not {1}";
            let quantities = [(made, "length"), (lead, "length")];
            faults.push(contradiction(&["lead", "pitch", "starts"], how, &quantities));
            None
        }
        (None, None) => {
            let why = "how far the nut goes in one turn";
            faults.push(missing(&[&["lead"], &["pitch"]], why));
            None
        }
        (lead, made) => lead.or(made),
    }
}

/// Thread and collar of a screw that is given by its friction.
fn thread(values: &Values, lead: f64, faults: &mut Vec<Fault>) -> Option<Thread> {
    let friction = values.si("friction_coefficient")?;
    let Some(diameter) = values.si("mean_diameter") else {
        faults.push(missing(
            &[&["mean_diameter"]],
            "friction makes a torque only with the diameter it acts at",
        ));
        return None;
    };
    let collar = values.si("collar_friction_coefficient").unwrap_or(0.0);
    let collar_diameter = values.si("collar_diameter");
    if collar > 0.0 && collar_diameter.is_none() {
        faults.push(missing(&[&["collar_diameter"]], "the friction of the collar acts at its mean diameter"));
    }
    Some(Thread {
        lead_angle: law::lead_angle(lead, diameter),
        friction: law::flank_friction(friction, values.si("thread_angle").unwrap_or(0.0)),
        collar: collar * collar_diameter.unwrap_or(0.0) / diameter,
    })
}

/// Efficiencies with the screw and with the load driving.
fn losses(values: &Values, lead: f64, faults: &mut Vec<Fault>) -> Option<(f64, Known)> {
    let backward = values.si("efficiency_backward");
    match (values.si("efficiency"), values.si("friction_coefficient")) {
        (Some(_), Some(_)) => {
            let how = "an efficiency and a friction say the same loss twice; keep one";
            faults.push(contradiction(&["efficiency", "friction_coefficient"], how, &[]));
            None
        }
        (Some(forward), None) => Some((forward, Known::of(backward, "efficiency_backward"))),
        (None, Some(friction)) => {
            let thread = thread(values, lead, faults)?;
            let forward = thread.efficiency();
            if forward > 0.0 && forward <= 1.0 {
                return Some((forward, Known::Value(backward.unwrap_or(thread.efficiency_backward()))));
            }
            let how = "with a friction of {0} this thread cannot be turned under load";
            faults.push(bad_value("friction_coefficient", how, &[(friction, "number")]));
            None
        }
        (None, None) => {
            let why =
                "the loss of the screw: friction and mean diameter of a sliding thread, or its efficiency";
            faults.push(missing(&[&["friction_coefficient", "mean_diameter"], &["efficiency"]], why));
            None
        }
    }
}

fn symbols(coupling: &Coupling, state: &TransmissionState) -> Symbols {
    let mut out = vec![
        ("w", state.input_speed),
        ("T", state.input_effort),
        ("F", state.output_effort),
        ("eta", coupling.forward),
    ];
    if let Known::Value(backward) = coupling.backward {
        out.push(("eta_b", backward));
    }
    out
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some(lead) = lead(values, &mut faults) else { return Err(faults) };
    let Some((forward, backward)) = losses(values, lead, &mut faults) else { return Err(faults) };
    let ports = (Motion::Rotary, Motion::Linear);
    let mut screw = Fixed { ports, symbols, ..Fixed::geared(values, law::screw_ratio(lead)) };
    screw.coupling.forward = forward;
    screw.coupling.backward = backward;
    screw.constants.push(("L", lead));
    if let Some(thread) = thread(values, lead, &mut Vec::new()) {
        let diameter = values.si("mean_diameter").unwrap_or(0.0);
        screw.constants.extend([
            ("d", diameter),
            ("l", thread.lead_angle),
            ("m", thread.friction),
            ("mu", values.si("friction_coefficient").unwrap_or(0.0)),
            ("b", values.si("thread_angle").unwrap_or(0.0)),
            ("m_c", values.si("collar_friction_coefficient").unwrap_or(0.0)),
            ("d_c", values.si("collar_diameter").unwrap_or(diameter)),
        ]);
    }
    let limits = [
        ("max_load", LimitOn::OutputEffort),
        ("max_input_torque", LimitOn::InputEffort),
        ("max_input_speed", LimitOn::InputSpeed),
    ];
    done(screw.limited(values, &limits).model(), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    let Some(lead) = lead(values, &mut Vec::new()) else { return Vec::new() };
    let angle = values.si("mean_diameter").map(|diameter| ("lead_angle", law::lead_angle(lead, diameter)));
    [("lead", lead)].into_iter().chain(angle).collect()
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::{Coupling, Known, Model, Motion};
    use crate::values::{FieldValue::Si, Values};

    fn screw(fields: &[(&'static str, f64)]) -> Result<Coupling, FaultKind> {
        let mut values = Values::default();
        fields.iter().for_each(|(name, si)| values.set(name, Si(*si)));
        match build(&values) {
            Ok(Model::Transmission(screw)) => {
                assert_eq!((screw.input(), screw.output()), (Motion::Rotary, Motion::Linear));
                Ok(screw.coupling(0))
            }
            Ok(_) => panic!("not a transmission"),
            Err(mut faults) => Err(faults.remove(0).kind),
        }
    }

    #[test]
    fn published_jack() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 10.10 (p. 279), recomputed.
        let jack =
            [("pitch", 0.0125), ("starts", 1.0), ("mean_diameter", 0.05), ("friction_coefficient", 0.13)];
        let found = screw(&jack).unwrap();
        close(25e3 / found.effort / found.forward, 132.355_143_109, 1e-10);
        let Known::Value(backward) = found.backward else { panic!("derived") };
        close(25e3 * backward / found.effort, -31.191_402_995_8, 1e-10);
    }

    #[test]
    fn a_collar_and_a_sloping_flank_lose_more() {
        let plain = [("lead", 0.006), ("mean_diameter", 0.03), ("friction_coefficient", 0.12)];
        let trapezoidal = [&plain[..], &[("thread_angle", 0.52)]].concat();
        let collar = [("collar_friction_coefficient", 0.1), ("collar_diameter", 0.04)];
        let collared = [&plain[..], &collar].concat();
        let forward = |fields: &[(&'static str, f64)]| screw(fields).unwrap().forward;
        assert!(forward(&trapezoidal) < forward(&plain) && forward(&collared) < forward(&trapezoidal));
    }

    #[test]
    fn what_a_screw_must_say() {
        let fields: [&[(&'static str, f64)]; 5] = [
            &[("efficiency", 0.9)],
            &[("lead", 0.01)],
            &[("lead", 0.01), ("friction_coefficient", 0.1)],
            &[
                ("lead", 0.01),
                ("mean_diameter", 0.05),
                ("friction_coefficient", 0.1),
                ("collar_friction_coefficient", 0.1),
            ],
            &[("lead", 0.01), ("mean_diameter", 0.01), ("friction_coefficient", 0.1), ("efficiency", 0.2)],
        ];
        for fields in &fields[..4] {
            assert!(matches!(screw(fields), Err(FaultKind::Missing { .. })), "{fields:?}");
        }
        assert!(matches!(screw(fields[4]), Err(FaultKind::Contradiction { .. })));
        assert_eq!(
            screw(&[("lead", 0.01), ("efficiency", 0.9)]).unwrap().backward,
            Known::Missing("efficiency_backward")
        );
    }
}
