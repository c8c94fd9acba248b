//! What hangs on a rope.

use super::fields::BREAKAWAY_FORCE_INSTEAD;
use super::pulled::Pulled;
use super::resisting::breakaway;
use crate::curve::Constant;
use crate::fault::Fault;
use crate::kinds::fields::{BREAKAWAY_RATIO, default, not_negative, positive, quantity, range};
use crate::kinds::reading::{contradiction, done, limits, missing};
use crate::laws::incline::{self as law, Pull, balanced, weight};
use crate::model::{Known, LimitOn, Model, Motion, Own, Standstill};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "hoist",
    title: "hoist",
    summary: "A mass that hangs on a rope, with or without a counterweight. Forward lifts it, reverse lowers it; lowered \
              or let go it drives the machine; with a heavier counterweight it drives while it goes up.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[law::COUNTERWEIGHT, law::LIFTING_FORCE],
    cautions: &[
        "Nobody stands under a load. A hoist needs a brake that holds without power; its reserve, limit switches, \
         overload protection and inspections follow the local code, and lifting people is a matter for licensed \
         practice alone.",
        "Lowering turns the motor into a generator: check the highest speed and where the power goes.",
        "With a counterweight the empty car is a load case too: it may fall upward.",
    ],
    example: "load hook: hoist { mass = 1310 kg; breakaway_ratio = 1.15 }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    not_negative(
        "mass",
        "mass",
        Need::Required,
        range(0.1, 1e6),
        "all that is lifted: load, hook, block, cage, and the rope where it is heavy",
    ),
    not_negative(
        "counterweight",
        "mass",
        default(0.0, "no counterweight"),
        range(0.0, 1e6),
        "mass that goes down when the load goes up, at the same speed",
    ),
    quantity(
        "balanced_share",
        "percentage",
        Need::Optional,
        Bounds::closed(0.0, 2.0),
        range(0.2, 0.7),
        "share of rated_load that the counterweight balances beside the car: 40 % to 50 % is usual; instead of counterweight",
    ),
    not_negative(
        "car_mass",
        "mass",
        Need::Optional,
        range(1.0, 1e5),
        "mass of the empty car or cage; with balanced_share",
    ),
    positive(
        "rated_load",
        "mass",
        Need::Optional,
        range(1.0, 1e6),
        "load the hoist is rated for; with balanced_share",
    ),
    not_negative(
        "rope_mass",
        "mass_per_length",
        Need::Optional,
        range(0.01, 50.0),
        "mass of the rope per length, all falls together; with hanging_rope",
    ),
    not_negative(
        "hanging_rope",
        "length",
        Need::Optional,
        range(0.0, 3e3),
        "length of rope that hangs on the side of the load; the lowest position is the heaviest to lift",
    ),
    not_negative(
        "guide_friction",
        "force",
        default(0.0, "the efficiencies of the chain hold the friction"),
        range(0.0, 1e5),
        "friction of guides, opposing motion",
    ),
    BREAKAWAY_RATIO,
    BREAKAWAY_FORCE_INSTEAD,
    positive(
        "max_speed",
        "speed",
        Need::Optional,
        range(1e-3, 20.0),
        "highest speed it may run at, up or down",
    ),
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "unbalanced_force",
        shape: ResultShape::Quantity("force"),
        meaning: "weight that the counterweight leaves; below zero it pulls the load up",
    },
    ResultRow {
        name: "counterweight_mass",
        shape: ResultShape::Quantity("mass"),
        meaning: "mass of the counterweight, however it was given",
    },
];

/// The counterweight by whichever field says it.
fn counterweight(values: &Values, faults: &mut Vec<Fault>) -> f64 {
    let stated = values.si("counterweight");
    let Some(share) = values.si("balanced_share") else { return stated.unwrap_or(0.0) };
    let (Some(car), Some(load)) = (values.si("car_mass"), values.si("rated_load")) else {
        let why = "a balanced share is a share of the rated load, beside the whole car";
        faults.push(missing(&[&["car_mass", "rated_load"], &["counterweight"]], why));
        return 0.0;
    };
    let made = balanced(car, share, load);
    if let Some(stated) = stated {
        let template = "both say the same thing: the share makes {0}, the other field says {1}; keep one";
        let fields = ["counterweight", "balanced_share"];
        faults.push(contradiction(&fields, template, &[(made, "mass"), (stated, "mass")]));
    }
    made
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let counterweight = counterweight(values, &mut faults);
    let rope = match (values.si("rope_mass"), values.si("hanging_rope")) {
        (Some(per_length), Some(length)) => per_length * length,
        (None, None) => 0.0,
        _ => {
            faults.push(missing(
                &[&["rope_mass", "hanging_rope"]],
                "the rope weighs by its mass per length and its length",
            ));
            0.0
        }
    };
    let mass = values.si("mass").unwrap_or(0.0) + rope;
    let friction = values.si("guide_friction").unwrap_or(0.0);
    let pull = weight(mass - counterweight);
    let (up, down) = (pull + friction, friction - pull);
    // Breakaway counts where effort has to be brought up, whichever way that is; where the load helps it is not
    // counted on.
    let running = f64::max(up, down);
    let at_rest = breakaway(values, Motion::Linear, running, &mut faults);
    let given = values.si("breakaway_force").is_some();
    let ratio = if running > 0.0 { at_rest / running } else { 1.0 };
    let sticks = |effort: f64| {
        if effort <= 0.0 {
            effort
        } else if given {
            f64::max(effort, at_rest - (running - effort))
        } else {
            effort * ratio
        }
    };
    let load = Pulled {
        motion: Motion::Linear,
        demand: Pull { pull, friction },
        standstill: Standstill {
            holding: pull,
            breakaway_forward: sticks(up),
            breakaway_reverse: -sticks(down),
        },
        mass: Known::Value(mass + counterweight),
        needs_holding: pull != 0.0,
        limits: limits(values, &[("max_speed", LimitOn::InputSpeed)]),
        symbols: symbols(values, mass, counterweight, friction),
        own: vec![
            ("unbalanced_force", Own::law("force", Constant(pull))),
            ("counterweight_mass", Own::law("mass", Constant(counterweight))),
        ],
    };
    done(Model::Load(Box::new(load)), faults)
}

fn symbols(values: &Values, mass: f64, counterweight: f64, friction: f64) -> Vec<(&'static str, f64)> {
    let mut out = vec![("m", mass), ("m_c", counterweight), ("F_f", friction)];
    let share = [("m_0", "car_mass"), ("s", "balanced_share"), ("m_n", "rated_load")];
    out.extend(share.iter().filter_map(|(symbol, field)| Some((*symbol, values.si(field)?))));
    out
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::{Known, Load, Model};
    use crate::values::{FieldValue::Si, Values};

    fn hoist(fields: &[(&'static str, f64)]) -> Box<dyn Load> {
        let values = fields.iter().fold(Values::default(), |values, (name, si)| values.with(name, Si(*si)));
        let Ok(Model::Load(load)) = build(&values) else { panic!("no hoist") };
        load
    }

    #[test]
    fn weight_does_not_turn_over() {
        let load = hoist(&[("mass", 1310.0), ("breakaway_ratio", 1.15)]);
        close(load.demand().at(0.25), 12_846.711_5, 1e-10);
        close(load.demand().at(-0.25), 12_846.711_5, 1e-10);
        let rest = load.standstill();
        close(rest.breakaway_forward, 1.15 * rest.holding, 1e-14);
        close(rest.breakaway_reverse, rest.holding, 1e-14);
        assert!(load.needs_holding());
        assert_eq!(load.inertia(), Known::Value(1310.0));
    }

    #[test]
    fn counterweight_balances_and_adds_mass() {
        let load = hoist(&[("mass", 500.0), ("counterweight", 500.0), ("guide_friction", 40.0)]);
        assert_eq!((load.demand().at(1.0), load.demand().at(-1.0)), (40.0, -40.0));
        assert_eq!(load.inertia(), Known::Value(1000.0));
        assert!(!load.needs_holding());
        let heavy = hoist(&[("mass", 100.0), ("counterweight", 500.0), ("breakaway_ratio", 2.0)]);
        // Lifting goes by itself; down has to be driven, and sticks.
        close(heavy.standstill().breakaway_reverse, 2.0 * heavy.standstill().holding, 1e-14);
        close(heavy.standstill().breakaway_forward, heavy.standstill().holding, 1e-14);
    }

    #[test]
    fn a_share_balances_the_rated_load() {
        let lift = [("mass", 900.0), ("car_mass", 900.0), ("rated_load", 630.0), ("balanced_share", 0.5)];
        let load = hoist(&lift);
        close(load.demand().at(1.0), -9.806_65 * 315.0, 1e-12);
        assert_eq!(load.inertia(), Known::Value(900.0 + 1215.0));
        let short = Values::default().with("mass", Si(900.0)).with("balanced_share", Si(0.5));
        assert!(build(&short).is_err());
    }

    #[test]
    fn the_rope_weighs() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., Ex. 3.2: 500 kg and 100 m of 3 kg/m.
        let load = hoist(&[("mass", 500.0), ("rope_mass", 3.0), ("hanging_rope", 100.0)]);
        close(load.demand().at(1.0), 800.0 * 9.806_65, 1e-12);
    }

    #[test]
    fn breakaway_by_force() {
        let load = hoist(&[("mass", 100.0), ("breakaway_force", 1200.0)]);
        close(load.standstill().breakaway_forward, 1200.0, 1e-12);
        close(load.standstill().breakaway_reverse, 980.665, 1e-12);
        let low = Values::default().with("mass", Si(100.0)).with("breakaway_force", Si(900.0));
        assert!(build(&low).is_err());
    }
}
