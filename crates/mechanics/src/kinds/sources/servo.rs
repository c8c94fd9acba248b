//! A servo or field-weakened drive: motor and electronics together.

use super::straight_line::ratings;
use crate::curve::Curve;
use crate::fault::Fault;
use crate::kinds::fields::{
    AS_GENERATOR, BRAKING, FLYWHEEL_EFFECT, INERTIA, RATED_DUTY, RATED_TORQUE, SUPPLY_IF_ANY, positive, range,
};
use crate::kinds::reading::{braking, contradiction, done, inertia, missing};
use crate::laws::servo_envelope::{self as law, Envelope};
use crate::model::{Characteristic, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{Field, KindRow, Need, Role, Shape};
use crate::values::{Duty, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "servo",
    title: "servo drive",
    summary: "Motor and drive as one, by their limits: peak torque for seconds, rated torque for the duty, constant \
              power above rated speed where the field is weakened. It runs at the drive's set_speed as long as the \
              torque lies within.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::FIELD_WEAKENING],
    cautions: &[
        "Peak torque is for seconds; what the duty needs stands against the rated torque.",
        "A servo without power holds nothing: what can fall or run away needs a brake of its own.",
    ],
    example: "source axis: servo { peak_torque = 12 N·m; rated_torque = 4 N·m; rated_speed = 3000 rpm; \
              max_speed = 4500 rpm; inertia = 0.0006 kg·m²; braking = into_resistor }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    SUPPLY_IF_ANY,
    Field {
        shape: Shape::OfRated("torque"),
        ..positive(
            "peak_torque",
            "torque",
            Need::Required,
            range(1e-3, 1e6),
            "most torque, for seconds, up to its speed; also as a multiple of the rated torque",
        )
    },
    Field { need: Need::Required, ..RATED_TORQUE },
    positive(
        "rated_speed",
        "rotational_speed",
        Need::Required,
        range(1.0, 1e4),
        "speed up to which the rated torque is there; above it the power stays the same",
    ),
    positive(
        "peak_torque_speed",
        "rotational_speed",
        Need::Optional,
        range(1.0, 1e4),
        "speed up to which the peak torque is there; the rated speed when not given",
    ),
    positive(
        "max_speed",
        "rotational_speed",
        Need::Required,
        range(1.0, 1e4),
        "highest speed; above it the drive gives nothing and brakes nothing",
    ),
    RATED_DUTY,
    INERTIA,
    FLYWHEEL_EFFECT,
    BRAKING,
];

#[derive(Debug)]
struct Servo {
    peak: Envelope,
    inertia: Known,
    braking: Option<&'static str>,
    ratings: Ratings,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let field = |name| values.si(name).unwrap_or(0.0);
    let rated = field("rated_torque");
    let peak = values.of_rated("peak_torque", Some(rated)).unwrap_or(0.0);
    let (rated_speed, highest) = (field("rated_speed"), field("max_speed"));
    let corner = values.si("peak_torque_speed").unwrap_or(rated_speed);
    if peak < rated {
        faults.push(contradiction(
            &["peak_torque", "rated_torque"],
            "peak torque, {0}, is for seconds and cannot be less than the rated torque, {1}, for long",
            &[(peak, "torque"), (rated, "torque")],
        ));
    }
    for (name, speed) in [("rated_speed", rated_speed), ("peak_torque_speed", corner)] {
        if speed > highest && values.get(name).is_some() {
            let quantities = [(speed, "rotational_speed"), (highest, "rotational_speed")];
            faults.push(contradiction(
                &[name, "max_speed"],
                "{0} lies above the highest speed, {1}",
                &quantities,
            ));
        }
    }
    if values.word("braking") == Some(AS_GENERATOR) && values.get("supply").is_none() {
        faults.push(missing(
            &[&["supply"]],
            "the supply that takes the returned power; or brake into_resistor",
        ));
    }
    let servo = Servo {
        peak: Envelope { torque: peak, corner, highest },
        inertia,
        braking: values.word("braking"),
        ratings: Ratings {
            power: Some(rated * rated_speed),
            max_effort: Some(peak),
            ..ratings(values, "rated_torque")
        },
    };
    done(Model::Source(Box::new(servo)), faults)
}

impl Source for Servo {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let hold = || -> Box<dyn Curve> { Box::new(self.peak) };
        Ok(Characteristic::new(Box::new(self.peak), braking(self.braking, feed, hold), self.peak.highest))
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn limited_by(&self, _feed: &Feed, speed: f64) -> &'static str {
        if speed < self.peak.highest { "torque" } else { "speed" }
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        vec![("T_c", self.peak.torque), ("w_c", self.peak.corner), ("w", state.speed)]
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::{Braking, Feed, Model, Source, SupplyData};
    use crate::values::{FieldValue, Values};

    fn values() -> Values {
        Values::default()
            .with("peak_torque", FieldValue::Si(12.0))
            .with("rated_torque", FieldValue::Si(4.0))
            .with("rated_speed", FieldValue::Si(300.0))
            .with("max_speed", FieldValue::Si(450.0))
    }

    fn servo(values: &Values) -> Box<dyn Source> {
        let Ok(Model::Source(servo)) = build(values) else { panic!("no servo") };
        servo
    }

    const ALONE: Feed = Feed { supply: None, machines: 1.0, ambient: None, altitude: None };

    #[test]
    fn peak_envelope_and_continuous_limit() {
        let servo = servo(&values());
        let character = servo.characteristic(&ALONE).unwrap();
        close(character.drive.at(400.0) * 400.0, 3600.0, 1e-14);
        assert!(character.follows_set_speed);
        assert!(matches!(character.braking, Braking::Unknown("braking")));
        let ratings = servo.ratings(None);
        assert_eq!(
            (ratings.effort, ratings.power, ratings.max_speed),
            (Some(4.0), Some(1200.0), Some(450.0))
        );
    }

    #[test]
    fn returned_power_needs_someone_to_take_it() {
        let values = values().with("braking", FieldValue::Word("as_generator"));
        assert!(build(&values).is_err());
        let values = values.with("supply", FieldValue::Part(0));
        let supply = SupplyData { accepts_return: Some(false), ..SupplyData::default() };
        let feed = Feed { supply: Some(supply), ..ALONE };
        assert!(matches!(servo(&values).characteristic(&feed).unwrap().braking, Braking::Cannot));
        let resistor = values.with("braking", FieldValue::Word("into_resistor"));
        assert!(matches!(servo(&resistor).characteristic(&feed).unwrap().braking, Braking::Can(_)));
    }

    #[test]
    fn limits_in_the_wrong_order() {
        assert!(build(&values().with("rated_torque", FieldValue::Si(13.0))).is_err());
        assert!(build(&values().with("rated_speed", FieldValue::Si(500.0))).is_err());
        assert!(build(&values().with("peak_torque_speed", FieldValue::Si(500.0))).is_err());
    }
}
