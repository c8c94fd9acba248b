//! A person at pedals, a crank or a handwheel.

use crate::fault::Fault;
use crate::kinds::fields::{plain, positive, range};
use crate::laws::person_power::{self as law, PersonPower};
use crate::model::{Braking, Characteristic, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{Bounds, Field, KindRow, Need, Role, Shape};
use crate::values::{Duty, FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "person",
    title: "person",
    summary: "A power that one person keeps up within a range of cadence, as a mean over a turn: for pedals, cranks and \
              handwheels. Above the highest cadence nobody follows; below the lowest the torque stays.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::TORQUE],
    cautions: &[
        "What a person keeps up depends on training, age, heat and time: common practice counts on some 75 W for a \
         working day and on more only for minutes. Local rules bound the forces at work.",
        "A hand crank that a load can turn back breaks arms: it needs a ratchet or a brake.",
    ],
    example: "source rider: person { sustained_power = 90 W; cadence = 50 rpm .. 90 rpm }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive(
        "sustained_power",
        "mechanical_power",
        Need::Required,
        range(10.0, 1500.0),
        "power kept up for as long as the work lasts",
    ),
    Field {
        hard: Bounds::POSITIVE,
        plausible: range(2.0, 20.0),
        ..plain(
            "cadence",
            Shape::Interval("rotational_speed"),
            Need::Required,
            "lowest and highest speed of the crank at which the power is kept up",
        )
    },
];

#[derive(Debug)]
struct Person(PersonPower);

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let (lowest, highest) = match values.get("cadence") {
        Some(FieldValue::Interval(lowest, highest)) => (*lowest, *highest),
        _ => (1.0, 1.0),
    };
    let power = values.si("sustained_power").unwrap_or(0.0);
    Ok(Model::Source(Box::new(Person(PersonPower { power, lowest, highest }))))
}

impl Source for Person {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        // Legs and arms move with the crank, but far less than what it drives.
        Known::Value(0.0)
    }

    fn characteristic(&self, _feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let mut character = Characteristic::new(Box::new(self.0), Braking::Cannot, self.0.highest);
        character.follows_set_speed = false;
        Ok(character)
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        Ratings { power: Some(self.0.power), ..Ratings::default() }
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        vec![("P", self.0.power), ("w", state.speed)]
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::{close, rpm};
    use crate::model::{Braking, Feed, Model};
    use crate::values::{FieldValue, Values};

    #[test]
    fn keeps_up_within_the_cadence() {
        let values = Values::default()
            .with("sustained_power", FieldValue::Si(90.0))
            .with("cadence", FieldValue::Interval(rpm(50.0), rpm(90.0)));
        let Ok(Model::Source(rider)) = build(&values) else { panic!("no rider") };
        let feed = Feed { supply: None, machines: 1.0, ambient: None, altitude: None };
        let character = rider.characteristic(&feed).unwrap();
        close(character.drive.at(rpm(60.0)), 90.0 / rpm(60.0), 1e-14);
        assert_eq!(character.drive.at(rpm(95.0)), 0.0);
        assert!(matches!(character.braking, Braking::Cannot));
    }
}
