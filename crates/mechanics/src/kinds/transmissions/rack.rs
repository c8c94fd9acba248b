//! A pinion on a rack.

use super::fixed::Fixed;
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, SMALL_INERTIA, positive, range,
};
use crate::kinds::reading::{bad_value, contradiction, differ, missing};
use crate::laws::rack as law;
use crate::model::{LimitOn, Model, Motion};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "rack",
    title: "rack and pinion",
    summary: "A pinion that runs along a rack, or pushes it: turning shaft to straight motion without slip. The size is \
              the pinion's pitch diameter, or module and teeth.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::PITCH_DIAMETER, law::SPEED, law::FORCE],
    cautions: &[
        "A carriage on a rack runs on when its drive fails: what can fall or run away needs a brake or a catch.",
    ],
    example: "transmission travel: rack { module = 4 mm; pinion_teeth = 20; efficiency = 95 % }",
    build,
    given: |values| diameter(values, &mut Vec::new()).map(|d| ("pitch_diameter", d)).into_iter().collect(),
};

static FIELDS: &[Field] = &[
    positive("pitch_diameter", "length", Need::OneOf, range(5e-3, 3.0), "pitch diameter of the pinion"),
    positive("module", "length", Need::OneOf, range(2e-4, 0.05), "module of the teeth"),
    positive("pinion_teeth", "count", Need::OneOf, range(8.0, 120.0), "teeth of the pinion"),
    EFFICIENCY,
    EFFICIENCY_BACKWARD,
    positive("max_rack_force", "force", Need::Optional, range(10.0, 1e7), "most force the teeth may carry"),
    MAX_INPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[ResultRow {
    name: "pitch_diameter",
    shape: ResultShape::Quantity("length"),
    meaning: "pitch diameter of the pinion",
}];

fn diameter(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let (module, teeth) = (values.si("module"), values.si("pinion_teeth"));
    if let Some(count) = teeth.filter(|count| *count != count.round()) {
        faults.push(bad_value(
            "pinion_teeth",
            "teeth are counted: {0} is no whole number",
            &[(count, "number")],
        ));
    }
    let made = module.zip(teeth).map(|(module, teeth)| law::pitch_diameter(module, teeth));
    match (values.si("pitch_diameter"), made) {
        (Some(given), Some(made)) if differ(given, made, 0.005) => {
            let how = "module and teeth make a pitch diameter of {0}, not {1}";
            let quantities = [(made, "length"), (given, "length")];
            faults.push(contradiction(&["pitch_diameter", "module", "pinion_teeth"], how, &quantities));
            None
        }
        (None, None) => {
            let why = "the size of the pinion";
            faults.push(missing(&[&["pitch_diameter"], &["module", "pinion_teeth"]], why));
            None
        }
        (given, made) => given.or(made),
    }
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let diameter = diameter(values, &mut faults).filter(|_| faults.is_empty());
    let Some(diameter) = diameter else { return Err(faults) };
    let mut rack = Fixed {
        ports: (Motion::Rotary, Motion::Linear),
        constants: vec![("d", diameter)],
        symbols: |coupling, state| {
            vec![("w", state.input_speed), ("T", state.input_effort), ("eta", coupling.forward)]
        },
        ..Fixed::geared(values, law::pinion_ratio(diameter))
    };
    if let (Some(module), Some(teeth)) = (values.si("module"), values.si("pinion_teeth")) {
        rack.constants.extend([("m", module), ("z", teeth)]);
    }
    let limits = [
        ("max_rack_force", LimitOn::OutputEffort),
        ("max_input_torque", LimitOn::InputEffort),
        ("max_input_speed", LimitOn::InputSpeed),
    ];
    Ok(rack.limited(values, &limits).model())
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::Model;
    use crate::values::{FieldValue::Si, Values};

    fn ratio(fields: &[(&'static str, f64)]) -> Result<f64, FaultKind> {
        let values = fields.iter().fold(Values::default(), |all, (name, si)| all.with(name, Si(*si)));
        match build(&values) {
            Ok(Model::Transmission(rack)) => Ok(rack.coupling(0).speed),
            Ok(_) => panic!("not a transmission"),
            Err(mut faults) => Err(faults.remove(0).kind),
        }
    }

    #[test]
    fn a_pinion_by_either_size() {
        close(ratio(&[("module", 0.004), ("pinion_teeth", 20.0)]).unwrap(), 25.0, 1e-14);
        close(ratio(&[("pitch_diameter", 0.08)]).unwrap(), 25.0, 1e-14);
    }

    #[test]
    fn what_a_pinion_cannot_be() {
        assert!(matches!(ratio(&[("module", 0.004)]), Err(FaultKind::Missing { .. })));
        assert!(matches!(ratio(&[("module", 0.004), ("pinion_teeth", 20.5)]), Err(FaultKind::Value { .. })));
        let clash = [("module", 0.004), ("pinion_teeth", 20.0), ("pitch_diameter", 0.09)];
        assert!(matches!(ratio(&clash), Err(FaultKind::Contradiction { .. })));
    }
}
