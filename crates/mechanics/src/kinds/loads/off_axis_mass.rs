//! A mass beside its axis: an arm, a lid, a crank with a weight.

use super::fields::BREAKAWAY_TORQUE_INSTEAD;
use super::pulled::Pulled;
use super::resisting::breakaway;
use crate::curve::Constant;
use crate::fault::Fault;
use crate::kinds::fields::{BREAKAWAY_RATIO, MAX_SPEED, default, not_negative, positive, quantity, range};
use crate::kinds::reading::{contradiction, done, limits};
use crate::laws::incline::Pull;
use crate::laws::off_axis::{self as law, extremes, pull};
use crate::model::{Known, LimitOn, Model, Motion, Own, Standstill};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::values::{FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "off_axis_mass",
    title: "mass beside its axis",
    summary: "A mass on an arm about a level axis: a lid, a tilting table, a barrier, a roll that is out of balance. Its \
              torque changes with the angle; it is taken at one angle, the worst unless the swing or the angle says \
              otherwise, and no speed over a turn is made of it. Forward lifts.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::TORQUE, law::INERTIA],
    cautions: &[
        "What stands beside its axis falls when nothing holds it, and over the top it drives the machine: it needs a brake \
         or a catch, and guards, by the local code.",
    ],
    example: "load lid: off_axis_mass { mass = 38 kg; radius = 0.55 m; swing = 0° .. 85° }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive("mass", "mass", Need::Required, range(0.01, 1e6), "mass beside the axis"),
    positive("radius", "length", Need::Required, range(1e-3, 30.0), "distance of its centre from the axis"),
    Field {
        name: "swing",
        shape: Shape::Interval("angle"),
        need: Need::Optional,
        hard: Bounds::ANY,
        plausible: range(-7.0, 7.0),
        meaning: "angles of the arm above the level that it sweeps; all round when neither this nor angle is given",
    },
    quantity(
        "angle",
        "angle",
        Need::Optional,
        Bounds::ANY,
        range(-7.0, 7.0),
        "the one angle above the level to be looked at; instead of swing",
    ),
    not_negative(
        "own_inertia",
        "moment_of_inertia",
        default(0.0, "small against mass times radius squared"),
        range(0.0, 1e5),
        "inertia about its own centre, and of what turns with it",
    ),
    not_negative(
        "friction_torque",
        "torque",
        default(0.0, "the efficiencies of the chain hold the friction"),
        range(0.0, 1e5),
        "friction of the bearings, opposing motion",
    ),
    BREAKAWAY_RATIO,
    BREAKAWAY_TORQUE_INSTEAD,
    MAX_SPEED,
];

static RESULTS: &[ResultRow] = &[
    torque("pull_torque", "torque of the weight at the angle it is taken at; below zero it helps"),
    torque(
        "least_pull_torque",
        "torque of the weight where it pulls least; below zero it drives the machine",
    ),
    ResultRow {
        name: "taken_at",
        shape: ResultShape::Quantity("angle"),
        meaning: "angle above the level the torque is taken at: the worst of those swept",
    },
];

const fn torque(name: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity("torque"), meaning }
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let (worst, mildest) = match (values.get("swing"), values.si("angle")) {
        (Some(_), Some(_)) => {
            faults.push(contradiction(&["swing", "angle"], "one angle or the swing; keep one", &[]));
            (0.0, 0.0)
        }
        (Some(FieldValue::Interval(from, to)), None) => extremes(*from, *to),
        (_, Some(angle)) => (angle, angle),
        _ => (0.0, std::f64::consts::PI),
    };
    let field = |name| values.si(name).unwrap_or(0.0);
    let (mass, radius) = (field("mass"), field("radius"));
    let friction = field("friction_torque");
    let (most, least) = (pull(mass, radius, worst), pull(mass, radius, mildest));
    let up = most + friction;
    let at_rest = breakaway(values, Motion::Rotary, f64::max(up, 0.0), &mut faults);
    let own = field("own_inertia");
    let load = Pulled {
        motion: Motion::Rotary,
        demand: Pull { pull: most, friction },
        standstill: Standstill {
            holding: most,
            breakaway_forward: if up > 0.0 { at_rest } else { up },
            breakaway_reverse: most - friction,
        },
        mass: Known::Value(law::inertia(mass, radius, own)),
        needs_holding: most.abs() > friction || least.abs() > friction,
        limits: limits(values, &[("max_speed", LimitOn::InputSpeed)]),
        symbols: vec![("m", mass), ("r", radius), ("a", worst), ("T_f", friction), ("J_0", own)],
        own: vec![
            ("pull_torque", Own::law("torque", Constant(most))),
            ("least_pull_torque", Own::law("torque", Constant(least))),
            ("taken_at", Own::law("angle", Constant(worst))),
        ],
    };
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::kinds::loads::testing::loaded;
    use crate::laws::testing::close;
    use crate::model::{Known, Load};
    use crate::values::{FieldValue, Values};

    fn built(values: &Values) -> Box<dyn Load> {
        loaded(build(values))
    }

    #[test]
    fn worst_of_what_is_swept() {
        let arm = Values::default().with("mass", FieldValue::Si(12.0)).with("radius", FieldValue::Si(0.4));
        let all = built(&arm);
        close(all.demand().at(1.0), 47.071_92, 1e-12);
        close(all.demand().at(-1.0), 47.071_92, 1e-12);
        assert!(all.needs_holding());
        let Known::Value(inertia) = all.inertia() else { panic!("an inertia") };
        close(inertia, 1.92, 1e-12);
        let (from, to) = (60.0_f64.to_radians(), 80.0_f64.to_radians());
        let steep = arm.with("swing", FieldValue::Interval(from, to));
        close(built(&steep).demand().at(1.0), 23.535_96, 1e-12);
        assert!(build(&steep.with("angle", FieldValue::Si(0.1))).is_err());
    }
}
