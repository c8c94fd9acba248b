//! A planetary train with one member fixed, or geared to the input.

use super::fixed::{Fixed, Own};
use super::gear::{LIMITS, REDUCTION_RESULT, symbols};
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, EFFICIENCY_BACKWARD, MAX_INPUT_SPEED, MAX_INPUT_TORQUE, MAX_OUTPUT_TORQUE, SMALL_INERTIA,
    plain, positive, quantity, range,
};
use crate::kinds::reading::{bad_value, contradiction, missing, only_one};
use crate::laws::gear;
use crate::laws::planetary as law;
use crate::laws::planetary::{Member, Train};
use crate::model::{Known, Model};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Transmission,
    name: "planetary",
    title: "planetary gear",
    summary: "Sun, planets on a carrier, and ring: one member is driven, one drives on, one is held. Its ratio follows \
              from teeth, or from the basic ratio of any train with a standing carrier. Trains behind one another stand \
              so in the chain; a third member that is geared to the input instead of held is said by how fast it turns.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        law::BASIC_RATIO,
        law::REDUCTION,
        gear::SPEED,
        gear::TORQUE,
        gear::TORQUE_BACKWARD,
        law::REACTION,
    ],
    cautions: &[
        "The fixed member and the housing carry the reaction torque: their screws and pins are part of the drive. Where the \
         fixed member is held by a band or a clutch, the load runs free when it slips.",
    ],
    example: "transmission hub: planetary { sun_teeth = 16; ring_teeth = 64; input = sun; fixed = ring; output = carrier; \
              efficiency = 97 % }",
    build,
    given,
};

const MEMBERS: Shape = Shape::Choice(&[
    ("sun", "the inner wheel, or the first of a train given by its basic ratio"),
    ("ring", "the outer wheel, or the second of such a train"),
    ("carrier", "what carries the planets"),
]);

static FIELDS: &[Field] = &[
    positive("sun_teeth", "count", Need::OneOf, range(6.0, 500.0), "teeth of the sun"),
    positive("ring_teeth", "count", Need::OneOf, range(12.0, 1000.0), "teeth of the ring"),
    quantity(
        "basic_ratio",
        "number",
        Need::OneOf,
        range(-1e6, 1e6),
        range(-20.0, 20.0),
        "sun speed over ring speed while the carrier stands: below 0 where they turn against each other",
    ),
    positive(
        "planets",
        "count",
        Need::Optional,
        range(1.0, 12.0),
        "planets, evenly spaced: whether they can be put in is checked",
    ),
    plain("input", MEMBERS, Need::Required, "the member the source drives"),
    plain("output", MEMBERS, Need::Required, "the member that drives the load"),
    plain("fixed", MEMBERS, Need::OneOf, "the member that is held"),
    quantity(
        "third_turns",
        "number",
        Need::OneOf,
        range(-1e3, 1e3),
        range(-20.0, 20.0),
        "speed of the third member over that of the input, where it is geared to the input instead of fixed",
    ),
    Field { need: Need::OneOf, ..EFFICIENCY },
    Field {
        need: Need::Where("a load that drives, lowering, stopping; the mesh efficiency gives it too"),
        ..EFFICIENCY_BACKWARD
    },
    quantity(
        "mesh_efficiency",
        "percentage",
        Need::OneOf,
        Bounds::EFFICIENCY,
        range(0.8, 0.999),
        "efficiency from sun to ring with a standing carrier, both meshes together; gives both efficiencies",
    ),
    MAX_INPUT_TORQUE,
    MAX_OUTPUT_TORQUE,
    MAX_INPUT_SPEED,
    SMALL_INERTIA,
];

static RESULTS: &[ResultRow] = &[
    REDUCTION_RESULT,
    ResultRow {
        name: "planet_teeth",
        shape: ResultShape::Quantity("count"),
        meaning: "teeth of a planet that fits between sun and ring",
    },
    ResultRow {
        name: "reaction_torque",
        shape: ResultShape::Quantity("torque"),
        meaning: "torque that the housing, or the fixed member, carries",
    },
];

static OWN: &[Own] = &[Own {
    name: "reaction_torque",
    kind: "torque",
    value: |part, state| law::reaction(part.constant("s"), state.output_effort, state.input_effort),
}];

fn member(values: &Values, field: &str) -> Option<Member> {
    match values.word(field)? {
        "sun" => Some(Member::Sun),
        "ring" => Some(Member::Ring),
        _ => Some(Member::Carrier),
    }
}

/// The teeth of sun and ring, whole and able to mesh with evenly spaced planets.
fn teeth(values: &Values, faults: &mut Vec<Fault>) -> Option<(f64, f64)> {
    let (sun, ring) = (values.si("sun_teeth")?, values.si("ring_teeth")?);
    for (field, count) in [("sun_teeth", sun), ("ring_teeth", ring)] {
        if count != count.round() {
            faults.push(bad_value(field, "teeth are counted: {0} is no whole number", &[(count, "number")]));
        }
    }
    if ring <= sun {
        let how = "the ring lies around the sun: {1} teeth are no more than {0}";
        let quantities = [(sun, "count"), (ring, "count")];
        faults.push(contradiction(&["sun_teeth", "ring_teeth"], how, &quantities));
        return None;
    }
    if let Some(planets) = values.si("planets")
        && libm::fmod(sun + ring, planets) != 0.0
    {
        let how = "{0} evenly spaced planets cannot be put in: sun and ring have {1} teeth together, no multiple of that";
        let quantities = [(planets, "count"), (sun + ring, "count")];
        faults.push(contradiction(&["planets", "sun_teeth", "ring_teeth"], how, &quantities));
    }
    Some((sun, ring))
}

fn basic_ratio(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let by_teeth = values.get("sun_teeth").is_some() || values.get("ring_teeth").is_some();
    match (by_teeth, values.si("basic_ratio")) {
        (true, Some(_)) => {
            let how = "teeth and basic ratio say the same thing twice; keep one";
            faults.push(contradiction(&["basic_ratio", "sun_teeth", "ring_teeth"], how, &[]));
            None
        }
        (false, Some(ratio)) if ratio == 0.0 || ratio == 1.0 => {
            let how = "a basic ratio of {0} couples nothing";
            faults.push(bad_value("basic_ratio", how, &[(ratio, "number")]));
            None
        }
        (false, Some(ratio)) => Some(ratio),
        (_, None) if values.si("sun_teeth").is_some() && values.si("ring_teeth").is_some() => {
            let (sun, ring) = teeth(values, faults)?;
            Some(law::basic_ratio(sun, ring))
        }
        _ => {
            let why = "the ratio: teeth of sun and ring, or the ratio with a standing carrier";
            faults.push(missing(&[&["sun_teeth", "ring_teeth"], &["basic_ratio"]], why));
            None
        }
    }
}

/// The train, its members told apart.
fn train(values: &Values, faults: &mut Vec<Fault>) -> Option<Train> {
    let basic_ratio = basic_ratio(values, faults);
    let (input, output) = (member(values, "input")?, member(values, "output")?);
    if input == output {
        faults.push(contradiction(&["input", "output"], "these are two members of the train", &[]));
        return None;
    }
    let third =
        [Member::Sun, Member::Ring, Member::Carrier].into_iter().find(|m| *m != input && *m != output)?;
    let why = "what the third member does: it is fixed, or turns so many times as fast as the input";
    let way = only_one(values, &["fixed", "third_turns"], why, faults)?;
    if way == "fixed" && member(values, "fixed") != Some(third) {
        let how = "of the three members one is the input, one the output, and the third is fixed";
        faults.push(contradiction(&["fixed", "input", "output"], how, &[]));
        return None;
    }
    let third_turns = if way == "fixed" { 0.0 } else { values.si("third_turns").unwrap_or(0.0) };
    let train = Train { basic_ratio: basic_ratio?, input, output, third, third_turns };
    let reduction = train.reduction();
    if reduction.is_finite() && reduction != 0.0 {
        return Some(train);
    }
    let how = "with this speed of the third member the output stands still, or turns without the input";
    faults.push(bad_value("third_turns", how, &[]));
    None
}

/// Efficiencies forward and backward.
fn losses(values: &Values, train: Train, faults: &mut Vec<Fault>) -> Option<(f64, Known)> {
    let backward = Known::of(values.si("efficiency_backward"), "efficiency_backward");
    let why = "the loss: as a whole, or of the meshes with a standing carrier";
    match only_one(values, &["efficiency", "mesh_efficiency"], why, faults)? {
        "efficiency" => Some((values.si("efficiency")?, backward)),
        _ => {
            let mesh = values.si("mesh_efficiency")?;
            let (forward, back) = train.efficiencies(mesh);
            let Some(forward) = forward else {
                let how = "with {0} at its meshes this train locks itself: no torque at the input turns it";
                faults.push(bad_value("mesh_efficiency", how, &[(mesh, "percentage")]));
                return None;
            };
            let backward =
                if backward == Known::Missing("efficiency_backward") { Known::Value(back) } else { backward };
            Some((forward, backward))
        }
    }
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let train = train(values, &mut faults);
    let found = train.and_then(|train| Some((train, losses(values, train, &mut faults)?)));
    let Some((train, (forward, backward))) = found.filter(|_| faults.is_empty()) else { return Err(faults) };
    let reduction = train.reduction();
    let geared = Fixed::geared(values, reduction.abs()).limited(values, LIMITS);
    let mut part = Fixed { symbols, own: OWN, ..geared };
    part.coupling.forward = forward;
    part.coupling.backward = backward;
    part.coupling.reverses = reduction < 0.0;
    let c = |member: Member| member.coefficient(train.basic_ratio);
    part.constants.extend([
        ("c_in", c(train.input)),
        ("c_out", c(train.output)),
        ("c_3", c(train.third)),
        ("k", train.third_turns),
        ("s", reduction.signum()),
    ]);
    if let Some((sun, ring)) = teeth(values, &mut Vec::new()) {
        part.constants.extend([("z_s", sun), ("z_r", ring)]);
    }
    Ok(part.model())
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    let faults = &mut Vec::new();
    let reduction = train(values, faults).map(|train| ("reduction", train.reduction().abs()));
    let planet = teeth(values, faults).map(|(sun, ring)| ("planet_teeth", (ring - sun) / 2.0));
    reduction.into_iter().chain(planet).collect()
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::{Coupling, Known, Model};
    use crate::values::{FieldValue, Values};

    fn part(words: [&'static str; 3], fields: &[(&'static str, f64)]) -> Result<Coupling, FaultKind> {
        let mut values = Values::default();
        for (field, word) in ["input", "output", "fixed"].into_iter().zip(words) {
            if !word.is_empty() {
                values.set(field, FieldValue::Word(word));
            }
        }
        fields.iter().for_each(|(name, si)| values.set(name, FieldValue::Si(*si)));
        match build(&values) {
            Ok(Model::Transmission(part)) => Ok(part.coupling(0)),
            Ok(_) => panic!("not a transmission"),
            Err(mut faults) => Err(faults.remove(0).kind),
        }
    }

    #[test]
    fn any_member_fixed() {
        let teeth = [("sun_teeth", 16.0), ("ring_teeth", 64.0), ("efficiency", 0.97)];
        let down = part(["sun", "carrier", "ring"], &teeth).unwrap();
        close(down.speed, 5.0, 1e-15);
        assert!(!down.reverses && down.backward == Known::Missing("efficiency_backward"));
        close(part(["ring", "carrier", "sun"], &teeth).unwrap().speed, 1.25, 1e-15);
        let back = part(["sun", "ring", "carrier"], &teeth).unwrap();
        close(back.speed, 4.0, 1e-15);
        assert!(back.reverses);
    }

    #[test]
    fn a_geared_third_member() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 13.23: the ring turns a fifth as fast.
        let second = [("sun_teeth", 24.0), ("ring_teeth", 120.0), ("third_turns", 0.2), ("efficiency", 0.8)];
        close(part(["sun", "carrier", ""], &second).unwrap().speed, 3.0, 1e-14);
    }

    #[test]
    fn meshes_give_both_ways() {
        let set = [("sun_teeth", 16.0), ("ring_teeth", 64.0), ("mesh_efficiency", 0.96)];
        let found = part(["sun", "carrier", "ring"], &set).unwrap();
        close(found.forward, 4.84 / 5.0, 1e-14);
        assert!(matches!(found.backward, Known::Value(b) if b < 1.0 && b > 0.95));
    }

    #[test]
    fn what_a_train_cannot_be() {
        let teeth = [("sun_teeth", 16.0), ("ring_teeth", 64.0), ("efficiency", 0.97)];
        let clash = |words, fields: &[_]| matches!(part(words, fields), Err(FaultKind::Contradiction { .. }));
        assert!(clash(["sun", "sun", "ring"], &teeth));
        assert!(clash(["sun", "carrier", "sun"], &teeth));
        assert!(clash(["sun", "carrier", "ring"], &[&teeth[..], &[("planets", 3.0)]].concat()));
        assert!(clash(["sun", "carrier", "ring"], &[&teeth[..], &[("basic_ratio", -4.0)]].concat()));
        assert!(matches!(part(["sun", "carrier", "ring"], &teeth[..2]), Err(FaultKind::Missing { .. })));
        assert!(matches!(part(["sun", "carrier", ""], &teeth), Err(FaultKind::Missing { .. })));
    }
}
