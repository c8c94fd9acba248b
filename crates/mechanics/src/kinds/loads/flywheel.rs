//! A flywheel: inertia and nothing else.

use crate::curve::{Constant, Curve};
use crate::fault::Fault;
use crate::kinds::fields::{FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, positive, range};
use crate::kinds::reading::{contradiction, differ, done, inertia, limits, missing};
use crate::laws::inertia as law;
use crate::model::{Known, Limit, LimitOn, Load, Model, Motion, Standstill};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "flywheel",
    title: "flywheel",
    summary: "A rotor that takes no torque at steady speed: it counts in run-up and stopping only. By its inertia, its \
              flywheel effect, or its mass and radius of gyration.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::FROM_FLYWHEEL_EFFECT, law::FROM_GYRATION],
    cautions: &[
        "A flywheel that bursts kills: its highest speed, its test and its guard follow the local code and the maker.",
    ],
    example: "load rotor: flywheel { inertia = 3.5 kg·m²; max_speed = 1800 rpm }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    Field { need: Need::OneOf, ..INERTIA },
    Field { need: Need::OneOf, ..FLYWHEEL_EFFECT },
    positive("mass", "mass", Need::OneOf, range(0.01, 1e6), "mass; with radius_of_gyration"),
    positive(
        "radius_of_gyration",
        "length",
        Need::OneOf,
        range(1e-3, 10.0),
        "radius at which the mass may be thought; a solid disc has 0.707 of its radius",
    ),
    MAX_SPEED,
];

#[derive(Debug)]
struct Flywheel {
    inertia: Known,
    limits: Vec<Limit>,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let stated = inertia(values, &mut faults);
    let of_mass = match (values.si("mass"), values.si("radius_of_gyration")) {
        (Some(mass), Some(radius)) => Some(law::from_gyration(mass, radius)),
        _ => None,
    };
    let inertia = match (stated, of_mass) {
        (Known::Value(stated), Some(of_mass)) if differ(stated, of_mass, 0.02) => {
            faults.push(contradiction(
                &["inertia", "mass", "radius_of_gyration"],
                "mass and radius of gyration make an inertia of {0}, not {1}",
                &[(of_mass, "moment_of_inertia"), (stated, "moment_of_inertia")],
            ));
            stated
        }
        (Known::Value(stated), _) => stated,
        (_, Some(of_mass)) => of_mass,
        _ => {
            let choices: [&[&'static str]; 3] =
                [&["inertia"], &["flywheel_effect"], &["mass", "radius_of_gyration"]];
            faults.push(missing(&choices, "a flywheel is its inertia"));
            0.0
        }
    };
    let limits = limits(values, &[("max_speed", LimitOn::InputSpeed)]);
    done(Model::Load(Box::new(Flywheel { inertia: Known::Value(inertia), limits })), faults)
}

impl Load for Flywheel {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn demand(&self) -> Box<dyn Curve> {
        Box::new(Constant(0.0))
    }

    fn standstill(&self) -> Standstill {
        Standstill { holding: 0.0, breakaway_forward: 0.0, breakaway_reverse: 0.0 }
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::model::{Known, Model};
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn three_ways_to_say_it() {
        let ways: [&[(&'static str, f64)]; 3] = [
            &[("inertia", 45.0)],
            &[("flywheel_effect", 180.0)],
            &[("mass", 125.0), ("radius_of_gyration", 0.6)],
        ];
        for way in ways {
            let values = way.iter().fold(Values::default(), |values, (name, si)| values.with(name, Si(*si)));
            let Ok(Model::Load(load)) = build(&values) else { panic!("no flywheel") };
            assert_eq!(load.inertia(), Known::Value(45.0));
            assert_eq!(load.demand().at(300.0), 0.0);
        }
    }

    #[test]
    fn contradictions() {
        assert!(build(&Values::default()).is_err());
        let both = Values::default().with("inertia", Si(45.0));
        assert!(build(&both.clone().with("flywheel_effect", Si(45.0))).is_err());
        assert!(build(&both.with("mass", Si(125.0)).with("radius_of_gyration", Si(0.5))).is_err());
    }
}
