//! A winder or unwinder of a web, a rope or a wire.

use super::fields::BREAKAWAY_TORQUE_INSTEAD;
use super::pulled::Pulled;
use super::resisting::breakaway;
use crate::curve::{Constant, Line};
use crate::fault::Fault;
use crate::kinds::fields::{BREAKAWAY_RATIO, MAX_SPEED, default, not_negative, positive, quantity, range};
use crate::kinds::reading::{bad_value, done, limits};
use crate::laws::incline::Pull;
use crate::laws::winder::{self as law, roll_inertia, roll_mass, tension};
use crate::model::{Known, LimitOn, Model, Motion, Own, Standstill};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "winder",
    title: "winder",
    summary: "A roll that winds a web under tension at one diameter. Torque is greatest on the full roll, speed on the core: \
              judge both ends by `diameter = each 90 mm, 800 mm`. Forward winds up; reverse unwinds, and the web drives \
              the machine.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::TENSION, law::TORQUE, law::ROLL_INERTIA],
    cautions: &[
        "A roll draws in hands and clothes, and a full roll turns on for long: guards and stopping times follow the local \
         code.",
    ],
    example: "load reel: winder { web_tension = 260 N; core_diameter = 90 mm; diameter = 800 mm; web_width = 1.2 m; \
              web_density = 820 kg/m³ }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive(
        "web_tension",
        "force",
        Need::Required,
        range(1e-2, 1e6),
        "tension of the web, at the core where it is tapered",
    ),
    positive(
        "diameter",
        "length",
        Need::Required,
        range(1e-3, 10.0),
        "diameter of the roll as it stands; both ends by `each`: the core for speed, the full roll for torque",
    ),
    positive("core_diameter", "length", Need::Required, range(1e-3, 3.0), "diameter of the core"),
    quantity(
        "taper",
        "percentage",
        default(0.0, "the same tension on every diameter"),
        Bounds::closed(0.0, 1.0),
        range(0.0, 0.7),
        "share of the tension that is let go as the roll grows without end",
    ),
    positive(
        "web_width",
        "length",
        Need::Where("run-up time, run-up distance and stopping"),
        range(1e-4, 20.0),
        "width of the web",
    ),
    positive(
        "web_density",
        "density",
        Need::Where("run-up time, run-up distance and stopping"),
        range(10.0, 2e4),
        "density of the wound web, air between the layers included",
    ),
    not_negative(
        "core_inertia",
        "moment_of_inertia",
        default(0.0, "small against a full roll"),
        range(0.0, 1e4),
        "inertia of core, mandrel and chucks",
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
    ResultRow { name: "web_speed", shape: ResultShape::Quantity("speed"), meaning: "speed of the web" },
    ResultRow { name: "tension", shape: ResultShape::Quantity("force"), meaning: "tension at this diameter" },
    ResultRow { name: "roll_mass", shape: ResultShape::Quantity("mass"), meaning: "mass of the wound web" },
    ResultRow {
        name: "roll_inertia",
        shape: ResultShape::Quantity("moment_of_inertia"),
        meaning: "inertia of the wound web about its axis",
    },
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let field = |name| values.si(name).unwrap_or(0.0);
    let (roll, core) = (field("diameter"), field("core_diameter"));
    if roll < core {
        let template = "the roll is no smaller than its core of {0}";
        faults.push(bad_value("diameter", template, &[(core, "length")]));
    }
    let (at_core, taper) = (field("web_tension"), field("taper"));
    let tension = tension(at_core, taper, core, roll);
    let friction = field("friction_torque");
    let pull = tension * roll / 2.0;
    let at_rest = breakaway(values, Motion::Rotary, pull + friction, &mut faults);
    let web = values.si("web_density").zip(values.si("web_width"));
    let lacking = if values.si("web_density").is_some() { "web_width" } else { "web_density" };
    let of_web = |kind, value: fn(f64, f64, f64, f64) -> f64| match web {
        Some((density, width)) => Own::law(kind, Constant(value(density, width, roll, core))),
        None => Own::Missing(lacking),
    };
    let wound = web.map(|(density, width)| roll_inertia(density, width, roll, core));
    let mut symbols =
        vec![("F_0", at_core), ("t", taper), ("d", core), ("D", roll), ("F", tension), ("T_f", friction)];
    symbols.extend(web.iter().flat_map(|(density, width)| [("rho", *density), ("b", *width)]));
    let load = Pulled {
        motion: Motion::Rotary,
        demand: Pull { pull, friction },
        standstill: Standstill {
            holding: pull,
            breakaway_forward: at_rest,
            breakaway_reverse: pull - friction,
        },
        mass: wound.map_or(Known::Missing(lacking), |wound| Known::Value(wound + field("core_inertia"))),
        needs_holding: false,
        limits: limits(values, &[("max_speed", LimitOn::InputSpeed)]),
        symbols,
        own: vec![
            ("web_speed", Own::law("speed", Line { at_zero: 0.0, slope: roll / 2.0 })),
            ("tension", Own::law("force", Constant(tension))),
            ("roll_mass", of_web("mass", roll_mass)),
            ("roll_inertia", of_web("moment_of_inertia", roll_inertia)),
        ],
    };
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::{Known, Model, Own};
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn both_ends_of_a_roll() {
        let bare = Values::default()
            .with("web_tension", Si(260.0))
            .with("core_diameter", Si(0.09))
            .with("diameter", Si(0.8));
        let Ok(Model::Load(load)) = build(&bare) else { panic!("no load") };
        close(load.demand().at(5.0), 104.0, 1e-12);
        close(load.demand().at(-5.0), 104.0, 1e-12);
        assert_eq!(load.inertia(), Known::Missing("web_density"));
        let Some(Own::Law { curve, .. }) = load.own("web_speed") else { panic!("a speed") };
        close(curve.at(5.0), 2.0, 1e-12);
        let Ok(Model::Load(load)) = build(&bare.clone().with("diameter", Si(0.09)).with("taper", Si(0.5)))
        else {
            panic!("no load")
        };
        close(load.demand().at(5.0), 11.7, 1e-12);
        assert!(build(&bare.with("diameter", Si(0.05))).is_err());
    }
}
