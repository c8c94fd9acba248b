//! A mass drawn up a slope.

use super::pulled::Pulled;
use crate::fault::Fault;
use crate::kinds::fields::{not_negative, positive, quantity, range};
use crate::kinds::reading::{contradiction, done, limits, only_one};
use crate::laws::incline::{self as law, Pull, cosine_of_grade, sine_of_grade, weight};
use crate::model::{Known, LimitOn, Model, Motion, Standstill};
use crate::registry::{Bounds, Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "incline",
    title: "inclined track",
    summary: "A mass drawn along a slope by rope, rack or chain: a skip, a boat on a slipway, a sledge. Forward is \
              uphill. The slope is a grade (rise per run) or an angle: 15 % is not 15°.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::UPHILL_FORCE],
    cautions: &[
        "What stands on a slope runs back when the rope, the brake or the power fails: keep the track below it clear; \
         brakes and catches follow the local code.",
    ],
    example: "load skip: incline { mass = 900 kg; slope = 20°; friction_coefficient = 0.05 }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    not_negative("mass", "mass", Need::Required, range(0.1, 1e6), "all that is moved"),
    GRADE,
    SLOPE,
    not_negative(
        "friction_coefficient",
        "number",
        Need::Required,
        range(0.0, 1.0),
        "friction or rolling resistance while moving, over the force that presses on the track",
    ),
    not_negative(
        "breakaway_coefficient",
        "number",
        Need::Optional,
        range(0.0, 1.5),
        "the same at rest; as while moving when not given",
    ),
    positive(
        "max_speed",
        "speed",
        Need::Optional,
        range(1e-3, 50.0),
        "highest speed it may run at, up or down",
    ),
];

/// Slope as rise per run.
pub(super) const GRADE: Field = quantity(
    "grade",
    "grade",
    Need::OneOf,
    Bounds::ANY,
    range(-0.5, 0.5),
    "rise per run, uphill positive: 15 % is 8.5°; instead of slope",
);

/// Slope as an angle.
pub(super) const SLOPE: Field = quantity(
    "slope",
    "slope",
    Need::OneOf,
    range(-std::f64::consts::FRAC_PI_2, std::f64::consts::FRAC_PI_2),
    range(-0.8, 0.8),
    "angle to the level, uphill positive: 15° is 26.8 %; instead of grade",
);

/// Sine and cosine of the slope by either field.
pub(super) fn slope(values: &Values, faults: &mut Vec<Fault>) -> Option<(f64, f64)> {
    let why = "how steep it is: grade is rise per run, slope an angle; 0 for the level";
    let way = only_one(values, &["grade", "slope"], why, faults)?;
    let value = values.si(way)?;
    Some(match way {
        "grade" => (sine_of_grade(value), cosine_of_grade(value)),
        _ => (libm::sin(value), libm::cos(value)),
    })
}

/// The coefficient at rest, which is not below the one while moving.
pub(super) fn breakaway(
    values: &Values,
    (moving, rest): (&'static str, &'static str),
    faults: &mut Vec<Fault>,
) -> f64 {
    let while_moving = values.si(moving).unwrap_or(0.0);
    let at_rest = values.si(rest).unwrap_or(while_moving);
    if at_rest < while_moving {
        let template = "friction at rest, {0}, is not below friction while moving, {1}";
        faults.push(contradiction(
            &[rest, moving],
            template,
            &[(at_rest, "number"), (while_moving, "number")],
        ));
    }
    at_rest
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let at_rest = breakaway(values, ("friction_coefficient", "breakaway_coefficient"), &mut faults);
    let Some((sine, cosine)) = slope(values, &mut faults) else { return Err(faults) };
    let mass = values.si("mass").unwrap_or(0.0);
    let coefficient = values.si("friction_coefficient").unwrap_or(0.0);
    let (pull, normal) = (weight(mass) * sine, weight(mass) * cosine);
    let load = Pulled {
        motion: Motion::Linear,
        demand: Pull { pull, friction: coefficient * normal },
        standstill: Standstill {
            holding: pull,
            breakaway_forward: pull + at_rest * normal,
            breakaway_reverse: pull - at_rest * normal,
        },
        mass: Known::Value(mass),
        needs_holding: pull.abs() > coefficient * normal,
        limits: limits(values, &[("max_speed", LimitOn::InputSpeed)]),
        symbols: vec![("m", mass), ("a", libm::atan2(sine, cosine)), ("mu", coefficient)],
        own: Vec::new(),
    };
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::fault::FaultKind;
    use crate::laws::testing::close;
    use crate::model::Model;
    use crate::values::{FieldValue::Si, Values};

    fn values(fields: &[(&'static str, f64)]) -> Values {
        fields.iter().fold(Values::default(), |values, (name, si)| values.with(name, Si(*si)))
    }

    #[test]
    fn grade_and_slope_are_two_things() {
        // Closed form: 85 kg on 15 % pulls with 123.65 N, on 15° with 215.7 N.
        for (field, value, pull) in [("grade", 0.15, 123.65), ("slope", 15.0_f64.to_radians(), 215.74)] {
            let fields = values(&[("mass", 85.0), (field, value), ("friction_coefficient", 0.0)]);
            let Ok(Model::Load(load)) = build(&fields) else { panic!("no load") };
            close(load.demand().at(1.0), pull, 1e-4);
            assert!(load.needs_holding());
        }
        let both = values(&[("mass", 85.0), ("grade", 0.1), ("slope", 0.1), ("friction_coefficient", 0.0)]);
        assert!(matches!(build(&both).unwrap_err()[0].kind, FaultKind::Contradiction { .. }));
        assert!(matches!(build(&values(&[("mass", 85.0)])).unwrap_err()[0].kind, FaultKind::Missing { .. }));
    }

    #[test]
    fn friction_turns_over_and_holds() {
        let fields =
            [("mass", 100.0), ("grade", 0.1), ("friction_coefficient", 0.2), ("breakaway_coefficient", 0.3)];
        let Ok(Model::Load(load)) = build(&values(&fields)) else { panic!("no load") };
        let (up, down) = (load.demand().at(1.0), load.demand().at(-1.0));
        close((up - down) / (up + down), 2.0, 1e-12);
        let rest = load.standstill();
        assert!(rest.breakaway_reverse < 0.0 && 0.0 < rest.breakaway_forward);
        assert!(!load.needs_holding());
        let upside =
            [("mass", 100.0), ("grade", 0.1), ("friction_coefficient", 0.2), ("breakaway_coefficient", 0.1)];
        assert!(build(&values(&upside)).is_err());
    }
}
