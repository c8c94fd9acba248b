//! A rope drum.

use super::fixed::Fixed;
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, SMALL_INERTIA, positive, quantity, range,
};
use crate::kinds::reading::{bad_value, contradiction, differ, done, missing};
use crate::laws::rope as law;
use crate::model::{LimitOn, Model, Motion};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "drum",
    title: "rope drum",
    summary: "A drum that winds a rope, from a turning shaft to a running rope. The rope works at its pitch \
              diameter, from rope centre to rope centre, and farther out on every further layer.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::LAYER_DIAMETER, law::ROPE_SPEED, law::ROPE_PULL],
    cautions: &[
        "Rope, drum and their ratio of diameters, dead turns and end fixings follow the local code for the machine and \
         the rope maker's data; have lifting gear checked by a licensed person.",
    ],
    example: "transmission winch: drum { pitch_diameter = 270 mm; layers = 1; efficiency = 97 %; \
              efficiency_backward = 97 % }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    positive(
        "pitch_diameter",
        "length",
        Need::OneOf,
        range(0.01, 10.0),
        "diameter of the first layer, from rope centre to rope centre",
    ),
    positive(
        "barrel_diameter",
        "length",
        Need::OneOf,
        range(0.01, 10.0),
        "diameter of the bare drum; with rope_diameter it gives the pitch diameter",
    ),
    positive(
        "rope_diameter",
        "length",
        Need::Where("a drum given by its barrel, or with more than one layer"),
        range(1e-3, 0.2),
        "diameter of the rope",
    ),
    quantity(
        "layers",
        "count",
        Need::Required,
        range(1.0, 50.0),
        range(1.0, 10.0),
        "layers of rope on the full drum; each adds two rope diameters",
    ),
    quantity(
        "layer",
        "count",
        Need::Optional,
        range(1.0, 50.0),
        range(1.0, 10.0),
        "the layer the rope runs on, counted from the barrel; when not given, first and top layer are both judged",
    ),
    EFFICIENCY,
    EFFICIENCY_BACKWARD,
    positive(
        "max_rope_pull",
        "force",
        Need::Optional,
        range(10.0, 1e7),
        "most pull of the rope, by the rope's working load and the drum",
    ),
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[ResultRow {
    name: "layer_diameter",
    shape: ResultShape::Quantity("length"),
    meaning: "pitch diameter of the layer the rope runs on",
}];

/// Geometry of the drum.
#[derive(Clone, Copy, Debug)]
struct Geometry {
    /// Pitch diameter of the first layer.
    first: f64,
    rope: f64,
    layer: f64,
}

impl Geometry {
    fn diameter(self) -> f64 {
        law::layer_diameter(self.first, self.rope, self.layer)
    }
}

fn geometry(values: &Values, faults: &mut Vec<Fault>) -> Option<Geometry> {
    let rope = values.si("rope_diameter");
    let first = match (values.si("pitch_diameter"), values.si("barrel_diameter"), rope) {
        (Some(pitch), Some(barrel), Some(rope)) if differ(pitch, barrel + rope, 0.005) => {
            faults.push(contradiction(
                &["pitch_diameter", "barrel_diameter", "rope_diameter"],
                "barrel and rope make a pitch diameter of {0}, not {1}",
                &[(barrel + rope, "length"), (pitch, "length")],
            ));
            return None;
        }
        (Some(pitch), _, _) => pitch,
        (None, Some(barrel), Some(rope)) => barrel + rope,
        (None, _, _) => {
            let why = "the diameter the rope works at";
            faults.push(missing(&[&["pitch_diameter"], &["barrel_diameter", "rope_diameter"]], why));
            return None;
        }
    };
    let layers = values.si("layers").unwrap_or(1.0);
    let layer = values.si("layer").unwrap_or(layers);
    for (field, count) in [("layers", layers), ("layer", layer)] {
        if count != count.round() {
            faults.push(bad_value(field, "layers are counted: {0} is no whole number", &[(count, "number")]));
        }
    }
    if layer > layers {
        let template = "the drum has {0} layers, so the rope cannot run on layer {1}";
        faults.push(contradiction(&["layer", "layers"], template, &[(layers, "count"), (layer, "count")]));
    }
    if layer > 1.0 && rope.is_none() {
        let why = "every layer above the first adds two rope diameters";
        faults.push(missing(&[&["rope_diameter"]], why));
    }
    Some(Geometry { first, rope: rope.unwrap_or(0.0), layer })
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some(geometry) = geometry(values, &mut faults) else { return Err(faults) };
    let drum = Fixed {
        ports: (Motion::Rotary, Motion::Linear),
        constants: vec![
            ("D_1", geometry.first),
            ("D", geometry.diameter()),
            ("d", geometry.rope),
            ("n", geometry.layer),
        ],
        symbols: |coupling, state| {
            vec![("w", state.input_speed), ("T", state.input_effort), ("eta", coupling.forward)]
        },
        ..Fixed::geared(values, law::drum_ratio(geometry.diameter()))
    };
    let limits = [("max_rope_pull", LimitOn::OutputEffort), ("max_input_speed", LimitOn::InputSpeed)];
    done(drum.limited(values, &limits).model(), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    match geometry(values, &mut Vec::new()) {
        Some(geometry) => vec![("layer_diameter", geometry.diameter())],
        None => Vec::new(),
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::Model;
    use crate::values::{FieldValue::Si, Values};

    fn drum(fields: &[(&'static str, f64)]) -> Result<f64, FaultKind> {
        let mut values = Values::default();
        for (name, si) in fields {
            values.set(name, Si(*si));
        }
        match build(&values) {
            Ok(Model::Transmission(drum)) => Ok(2.0 / drum.coupling(0).speed),
            Ok(_) => panic!("not a transmission"),
            Err(mut faults) => Err(faults.remove(0).kind),
        }
    }

    #[test]
    fn the_top_layer_unless_said() {
        let base = [("pitch_diameter", 0.3), ("rope_diameter", 0.01), ("layers", 3.0)];
        close(drum(&base).unwrap(), 0.34, 1e-14);
        close(drum(&[&base[..], &[("layer", 1.0)]].concat()).unwrap(), 0.3, 1e-14);
        close(
            drum(&[("barrel_diameter", 0.29), ("rope_diameter", 0.01), ("layers", 1.0)]).unwrap(),
            0.3,
            1e-14,
        );
    }

    #[test]
    fn what_a_drum_cannot_be() {
        assert!(matches!(drum(&[("layers", 1.0)]), Err(FaultKind::Missing { .. })));
        assert!(matches!(drum(&[("barrel_diameter", 0.3), ("layers", 1.0)]), Err(FaultKind::Missing { .. })));
        assert!(matches!(drum(&[("pitch_diameter", 0.3), ("layers", 2.0)]), Err(FaultKind::Missing { .. })));
        assert!(matches!(drum(&[("pitch_diameter", 0.3), ("layers", 1.5)]), Err(FaultKind::Value { .. })));
        let beyond = [("pitch_diameter", 0.3), ("layers", 1.0), ("layer", 2.0), ("rope_diameter", 0.01)];
        assert!(matches!(drum(&beyond), Err(FaultKind::Contradiction { .. })));
        let clash =
            [("pitch_diameter", 0.3), ("barrel_diameter", 0.3), ("rope_diameter", 0.01), ("layers", 1.0)];
        assert!(matches!(drum(&clash), Err(FaultKind::Contradiction { .. })));
    }
}
