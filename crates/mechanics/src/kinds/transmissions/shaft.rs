//! A shaft in its bearings.

use super::fixed::{Fixed, Own};
use crate::fault::Fault;
use crate::kinds::fields::{MAX_INPUT_SPEED, SMALL_INERTIA, default, not_negative, positive, range};
use crate::laws::shaft as law;
use crate::laws::shaft::Drag;
use crate::model::{LimitOn, Model};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "shaft",
    title: "shaft",
    summary: "A shaft with the drag of its bearings and seals, its inertia, the most it may carry, and how far it twists. \
              Its drag does not depend on the load: it counts at light load too, where an efficiency would not.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::DRAG, law::TWIST],
    cautions: &[
        "Guard shafts that turn within reach. Shafts have critical speeds: keep clear of them, the tool does not check.",
    ],
    example: "transmission propshaft: shaft { drag_torque = 1.2 N·m; inertia = 0.08 kg·m²; max_torque = 900 N·m }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    not_negative(
        "drag_torque",
        "torque",
        default(0.0, "good bearings lose little against what passes; give it where the load is light"),
        range(0.0, 1e4),
        "drag of bearings and seals, the same at any speed",
    ),
    not_negative(
        "viscous_drag",
        "viscous_torque_coefficient",
        default(0.0, "oil drags little at moderate speed"),
        range(0.0, 100.0),
        "drag that grows with the speed, per speed",
    ),
    positive("max_torque", "torque", Need::Optional, range(1e-3, 1e8), "most torque it may carry"),
    positive(
        "torsional_stiffness",
        "torsional_stiffness",
        Need::Where("its twist"),
        range(1.0, 1e9),
        "torque per angle of twist between its ends",
    ),
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[ResultRow {
    name: "twist",
    shape: ResultShape::Quantity("angle"),
    meaning: "angle between its ends under the torque it passes on",
}];

static OWN: &[Own] = &[Own {
    name: "twist",
    kind: "angle",
    value: |part, state| state.output_effort.abs() / part.known("k").unwrap_or(f64::NAN),
}];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let si = |field| values.si(field).unwrap_or(0.0);
    let drag = Drag { constant: si("drag_torque"), viscous: si("viscous_drag") };
    let stiffness = values.si("torsional_stiffness").map(|stiffness| ("k", stiffness));
    let shaft = Fixed {
        drag: Some(drag).filter(|drag| drag.constant > 0.0 || drag.viscous > 0.0),
        constants: [("T_0", drag.constant), ("b", drag.viscous)].into_iter().chain(stiffness).collect(),
        symbols: |_, state| vec![("w", state.input_speed), ("T", state.output_effort.abs())],
        own: OWN,
        ..Fixed::shafts(values)
    };
    let limits = [("max_torque", LimitOn::InputEffort), ("max_input_speed", LimitOn::InputSpeed)];
    Ok(shaft.limited(values, &limits).model())
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::model::Model;
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn drag_opposes_either_way() {
        let values = Values::default().with("drag_torque", Si(2.0)).with("viscous_drag", Si(0.1));
        let Ok(Model::Transmission(shaft)) = build(&values) else { panic!("no shaft") };
        let drag = shaft.drag().unwrap();
        assert_eq!((drag.at(10.0), drag.at(-10.0)), (3.0, -3.0));
        assert_eq!(drag.jumps(), [0.0]);
        let Ok(Model::Transmission(bare)) = build(&Values::default()) else { panic!("no shaft") };
        assert!(bare.drag().is_none());
    }
}
