//! What hangs on a rope.

use super::pulled::Pulled;
use crate::fault::Fault;
use crate::kinds::fields::{BREAKAWAY_RATIO, default, not_negative, positive, range};
use crate::kinds::reading::limits;
use crate::laws::incline::{self as law, Pull, weight};
use crate::model::{Known, LimitOn, Model, Standstill};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "hoist",
    title: "hoist",
    summary: "A mass that hangs on a rope, with or without a counterweight. Forward lifts it, reverse lowers it; lowered \
              or let go it drives the machine.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::LIFTING_FORCE],
    cautions: &[
        "Nobody stands under a load. A hoist needs a brake that holds without power; its reserve, limit switches, \
         overload protection and inspections follow the local code, and lifting people is a matter for licensed \
         practice alone.",
        "Lowering turns the motor into a generator: check the highest speed and where the power goes.",
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
    not_negative(
        "guide_friction",
        "force",
        default(0.0, "the efficiencies of the chain hold the friction"),
        range(0.0, 1e5),
        "friction of guides, opposing motion",
    ),
    BREAKAWAY_RATIO,
    positive(
        "max_speed",
        "speed",
        Need::Optional,
        range(1e-3, 20.0),
        "highest speed it may run at, up or down",
    ),
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mass = values.si("mass").unwrap_or(0.0);
    let counterweight = values.si("counterweight").unwrap_or(0.0);
    let friction = values.si("guide_friction").unwrap_or(0.0);
    let pull = weight(mass - counterweight);
    let ratio = values.si("breakaway_ratio").unwrap_or(1.0);
    // The ratio counts where effort has to be brought up, whichever way that is; where the load helps it is not
    // counted on.
    let breakaway = |effort: f64, against: f64| if effort * against > 0.0 { effort * ratio } else { effort };
    Ok(Model::Load(Box::new(Pulled {
        demand: Pull { pull, friction },
        standstill: Standstill {
            holding: pull,
            breakaway_forward: breakaway(pull + friction, 1.0),
            breakaway_reverse: breakaway(pull - friction, -1.0),
        },
        mass: Known::Value(mass + counterweight),
        needs_holding: pull != 0.0,
        limits: limits(values, &[("max_speed", LimitOn::InputSpeed)]),
        symbols: vec![("m", mass), ("m_c", counterweight), ("F_f", friction)],
    })))
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
        // Up goes by itself; down has to be driven, and sticks.
        close(heavy.standstill().breakaway_reverse, 2.0 * heavy.standstill().holding, 1e-14);
        close(heavy.standstill().breakaway_forward, heavy.standstill().holding, 1e-14);
    }
}
