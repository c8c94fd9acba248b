//! A friction clutch, or a coupling that slips above a torque.

use super::fixed::{Fixed, Own};
use super::wrap::{SLIP_RESERVE, slip_reserve};
use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, SMALL_INERTIA, default, plain, positive, quantity, range};
use crate::kinds::reading::{bad_value, contradiction, missing};
use crate::laws::clutch as law;
use crate::model::{LimitOn, Model, Slip};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "clutch",
    title: "clutch",
    summary: "Joins two shafts by friction and lets go above a torque: a clutch of plates, or a coupling that slips to \
              protect what stands behind it. Engaged it runs without loss; an engine brings its load to speed through \
              it, from its idle speed on. Not engaged, it passes nothing.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::TORQUE, law::ENGAGEMENT_SPEED, law::ENGAGEMENT_TIME, law::ENGAGEMENT_HEAT],
    cautions: &[
        "A clutch that slips heats up within seconds. Hot, oily or worn linings carry less: use its least torque. It is no \
         holding device.",
    ],
    example: "transmission main_clutch: clutch { max_torque = 310 N·m; inertia = 0.02 kg·m² }",
    build,
    given: |values| capacity(values, &mut Vec::new()).map(|t| ("torque_capacity", t)).into_iter().collect(),
};

static FIELDS: &[Field] = &[
    positive("max_torque", "torque", Need::OneOf, range(1e-3, 1e7), "torque above which it slips"),
    positive("clamp_force", "force", Need::OneOf, range(1.0, 1e6), "force that presses the plates together"),
    quantity(
        "friction_coefficient",
        "number",
        Need::Where("a clutch that is given by its plates"),
        Bounds::closed(0.0, 1.5),
        range(0.03, 0.8),
        "friction of the lining",
    ),
    positive(
        "outer_diameter",
        "length",
        Need::Where("a clutch that is given by its plates"),
        range(0.01, 2.0),
        "outer diameter of the lining",
    ),
    positive(
        "inner_diameter",
        "length",
        Need::Where("a clutch that is given by its plates"),
        range(5e-3, 2.0),
        "inner diameter of the lining",
    ),
    quantity(
        "surfaces",
        "count",
        Need::Where("a clutch that is given by its plates"),
        range(1.0, 100.0),
        range(1.0, 40.0),
        "rubbing surfaces: two for a plate that is gripped on both sides",
    ),
    plain(
        "engaged",
        Shape::Flag,
        default(1.0, "a clutch that stands in a drive is in"),
        "whether it is in; out, it passes nothing",
    ),
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "torque_capacity",
        shape: ResultShape::Quantity("torque"),
        meaning: "torque above which it slips",
    },
    SLIP_RESERVE,
    ResultRow {
        name: "engagement_time",
        shape: ResultShape::Quantity("time"),
        meaning: "time it slips when it engages at this speed with its output at rest, source and load left aside",
    },
    ResultRow {
        name: "engagement_speed",
        shape: ResultShape::Quantity("rotational_speed"),
        meaning: "speed at which both sides meet then",
    },
    ResultRow {
        name: "engagement_heat",
        shape: ResultShape::Quantity("energy"),
        meaning: "heat in its linings from that",
    },
];

static OWN: &[Own] = &[Own { name: "slip_reserve", kind: "number", value: slip_reserve }];

const PLATES: [&str; 5] =
    ["surfaces", "friction_coefficient", "clamp_force", "outer_diameter", "inner_diameter"];

/// The torque above which it slips.
fn capacity(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let plates = values.si("clamp_force").is_some();
    match (values.si("max_torque"), plates) {
        (Some(_), true) => {
            let how = "plates and torque say the same thing twice; keep one";
            faults.push(contradiction(&["max_torque", "clamp_force"], how, &[]));
            None
        }
        (Some(torque), false) => Some(torque),
        (None, true) => by_plates(values, faults),
        (None, false) => {
            faults.push(missing(&[&["max_torque"], &PLATES], "the torque above which it slips"));
            None
        }
    }
}

fn by_plates(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    for field in PLATES {
        if values.si(field).is_none() {
            faults.push(missing(&[&[field]], "plates carry torque by friction, force and size"));
        }
    }
    let (friction, force) = (values.si("friction_coefficient")?, values.si("clamp_force")?);
    let (outer, inner) = (values.si("outer_diameter")?, values.si("inner_diameter")?);
    let surfaces = values.si("surfaces")?;
    if surfaces != surfaces.round() {
        let how = "surfaces are counted: {0} is no whole number";
        faults.push(bad_value("surfaces", how, &[(surfaces, "number")]));
    }
    if inner >= outer {
        let how = "a lining of {0} outside cannot be {1} inside";
        let quantities = [(outer, "length"), (inner, "length")];
        faults.push(contradiction(&["outer_diameter", "inner_diameter"], how, &quantities));
    }
    Some(law::torque(surfaces, friction, force, (outer, inner)))
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let capacity = capacity(values, &mut faults).filter(|_| faults.is_empty());
    let Some(capacity) = capacity else { return Err(faults) };
    let symbols = [
        ("n", values.si("surfaces")),
        ("mu", values.si("friction_coefficient")),
        ("F", values.si("clamp_force")),
        ("d_o", values.si("outer_diameter")),
        ("d_i", values.si("inner_diameter")),
    ];
    let clutch = Fixed {
        open: values.flag("engaged") == Some(false),
        slip: Some(|part, state| Slip {
            asked: state.output_effort.abs(),
            most: part.constant("T_c"),
            kind: "torque",
        }),
        hidden: vec![("T_c", capacity)],
        constants: symbols.into_iter().filter_map(|(name, si)| Some((name, si?))).collect(),
        own: OWN,
        ..Fixed::shafts(values)
    };
    Ok(clutch.limited(values, &[("max_input_speed", LimitOn::InputSpeed)]).model())
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::{Model, Transmission, TransmissionState};
    use crate::values::{FieldValue, FieldValue::Si, Values};

    fn clutch(fields: &[(&'static str, f64)]) -> Result<Box<dyn Transmission>, FaultKind> {
        let values = fields.iter().fold(Values::default(), |all, (name, si)| all.with(name, Si(*si)));
        match build(&values) {
            Ok(Model::Transmission(clutch)) => Ok(clutch),
            Ok(_) => panic!("not a transmission"),
            Err(mut faults) => Err(faults.remove(0).kind),
        }
    }

    const PLATES: [(&str, f64); 5] = [
        ("surfaces", 2.0),
        ("friction_coefficient", 0.3),
        ("clamp_force", 4000.0),
        ("outer_diameter", 0.24),
        ("inner_diameter", 0.16),
    ];

    #[test]
    fn plates_carry_by_their_mean_radius() {
        let state = TransmissionState {
            input_speed: 1.0,
            input_effort: 50.0,
            output_speed: 1.0,
            output_effort: 50.0,
            gear: 0,
        };
        let slip = clutch(&PLATES).unwrap().slip(&state).unwrap();
        close(slip.most, 2.0 * 0.3 * 4000.0 * 0.1, 1e-14);
        close(slip.asked, 50.0, 1e-15);
    }

    #[test]
    fn out_it_passes_nothing() {
        let values = Values::default().with("max_torque", Si(9.0)).with("engaged", FieldValue::Flag(false));
        let Ok(Model::Transmission(clutch)) = build(&values) else { panic!("no clutch") };
        assert!(clutch.open(0));
    }

    #[test]
    fn what_a_clutch_must_say() {
        assert!(matches!(clutch(&[]), Err(FaultKind::Missing { .. })));
        assert!(matches!(clutch(&PLATES[..2]), Err(FaultKind::Missing { .. })));
        let twice = [&PLATES[..], &[("max_torque", 3.0)]].concat();
        assert!(matches!(clutch(&twice), Err(FaultKind::Contradiction { .. })));
        let inside_out = [&PLATES[..4], &[("inner_diameter", 0.3)]].concat();
        assert!(matches!(clutch(&inside_out), Err(FaultKind::Contradiction { .. })));
    }
}
