//! A gearbox with named gears.

use super::fixed::Fixed;
use super::gear::LIMITS;
use super::shifted::Shifted;
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, MAX_OUTPUT_TORQUE, SMALL_INERTIA,
    plain,
};
use crate::kinds::reading::{bad_value, limits, missing};
use crate::laws::gear as law;
use crate::model::{Coupling, Known, Model};
use crate::registry::{Field, KindRow, Need, Role, Shape};
use crate::values::{FieldValue, Gear, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "gearbox",
    title: "gearbox",
    summary: "A gearbox of which one gear is engaged at a time; the drive or a case says which. No gear is chosen \
              silently: where none is said, every gear is solved and shown. In a gear that is `neutral` nothing passes, and nothing holds the load. A \
              gear may have an efficiency of its own: `efficiency 1 = 91 %`.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::SPEED, law::TORQUE, law::TORQUE_BACKWARD],
    cautions: &[],
    example: "transmission box: gearbox { gear 1 = reduction 14.5; gear 2 = reduction 8.2; efficiency = 93 % }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    plain(
        "gear",
        Shape::Gears,
        Need::Required,
        "a gear and its ratio: `gear 1 = reduction 14.5`, `gear low = 13 drives 42`, `gear n = neutral`",
    ),
    Field { need: Need::OneOf, ..EFFICIENCY },
    EFFICIENCY_BACKWARD,
    MAX_INPUT_TORQUE,
    MAX_OUTPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let gears = match values.get("gear") {
        Some(FieldValue::Gears(gears)) if !gears.is_empty() => gears,
        _ => {
            let why = "a gearbox has at least one gear: `gear 1 = reduction 14.5`";
            return Err(vec![missing(&[&["gear"]], why)]);
        }
    };
    let ratios = gears.iter().filter_map(|gear| gear.reduction);
    if let Some(ratio) = ratios.clone().find(|ratio| !(*ratio > 0.0 && ratio.is_finite())) {
        let how = "the ratio of a gear must be above zero, not {0}; a reversing gear is a part of its own";
        return Err(vec![bad_value("gear", how, &[(ratio, "number")])]);
    }
    if ratios.count() == 0 {
        return Err(vec![bad_value("gear", "a gearbox has a gear beside neutral", &[])]);
    }
    let whole = Fixed::geared(values, 1.0).coupling;
    if gears.iter().any(|gear| gear.reduction.is_some() && gear.efficiency.is_none())
        && values.si("efficiency").is_none()
    {
        let why = "the loss of the gears that give none of their own";
        return Err(vec![missing(&[&["efficiency"]], why)]);
    }
    let coupling = |gear: &Gear| {
        let backward = gear.efficiency_backward.map_or(whole.backward, Known::Value);
        let forward = gear.efficiency.unwrap_or(whole.forward);
        Some(Coupling { forward, backward, ..Coupling::ideal(gear.reduction?) })
    };
    Ok(Model::Transmission(Box::new(Shifted {
        gears: gears.iter().map(|gear| (gear.name.clone(), coupling(gear))).collect(),
        by_direction: false,
        inertia: values.si("inertia").unwrap_or(0.0),
        limits: limits(values, LIMITS),
    })))
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::model::Model;
    use crate::values::{FieldValue, Gear, Values};

    fn gear(name: &str, reduction: Option<f64>, efficiency: Option<f64>) -> Gear {
        Gear { name: name.to_owned(), reduction, efficiency, efficiency_backward: None }
    }

    #[test]
    fn gears_by_name_and_index() {
        let gears = vec![gear("1", Some(14.5), Some(0.9)), gear("2", Some(8.2), None), gear("n", None, None)];
        let values =
            Values::default().with("gear", FieldValue::Gears(gears)).with("efficiency", FieldValue::Si(0.93));
        let Ok(Model::Transmission(gearbox)) = build(&values) else { panic!("no gearbox") };
        assert_eq!(gearbox.gears(), ["1", "2", "n"]);
        assert_eq!((gearbox.coupling(0).speed, gearbox.coupling(0).forward), (14.5, 0.9));
        assert_eq!((gearbox.coupling(1).effort, gearbox.coupling(1).forward), (8.2, 0.93));
        assert!(gearbox.open(2) && !gearbox.open(1));
    }

    #[test]
    fn a_gearbox_without_gears() {
        assert!(build(&Values::default()).is_err());
        let refused = [
            vec![],
            vec![gear("r", Some(-3.0), Some(0.9))],
            vec![gear("n", None, None)],
            vec![gear("1", Some(3.0), None)],
        ];
        for gears in refused {
            assert!(build(&Values::default().with("gear", FieldValue::Gears(gears))).is_err());
        }
    }
}
