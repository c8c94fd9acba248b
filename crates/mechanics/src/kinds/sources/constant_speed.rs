//! A source that holds one speed whatever is asked of it: sizing before a motor is chosen.

use crate::curve::Constant;
use crate::fault::Fault;
use crate::kinds::fields::{FLYWHEEL_EFFECT, INERTIA, positive, range};
use crate::kinds::reading::{done, inertia};
use crate::model::{Braking, Characteristic, Feed, Known, Model, Motion, Source};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "constant_speed",
    title: "source of constant speed",
    summary: "A drive before its motor is chosen: it turns at the speed that is wanted and gives whatever torque that \
              takes, in either direction of power. The result is the torque and the power to look for. Reserve, peak \
              power and run-up are known when a motor stands in its place.",
    fields: FIELDS,
    results: &[],
    formulas: &[],
    cautions: &[
        "It says nothing of starting, breakaway, overload or warmth: those decide a motor as often as the running torque.",
    ],
    example: "source wanted: constant_speed { speed = 1450 rpm }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive("speed", "rotational_speed", Need::Required, range(0.1, 1e4), "speed it turns at"),
    INERTIA,
    FLYWHEEL_EFFECT,
];

#[derive(Debug)]
struct ConstantSpeed {
    speed: f64,
    inertia: Known,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let source = ConstantSpeed { speed: values.si("speed").unwrap_or(0.0), inertia };
    done(Model::Source(Box::new(source)), faults)
}

impl Source for ConstantSpeed {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, _feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let nothing = || Box::new(Constant(0.0));
        let mut character = Characteristic::new(nothing(), Braking::Can(nothing()), self.speed);
        character.follows_set_speed = false;
        character.holds = Some(self.speed);
        Ok(character)
    }

    fn limited_by(&self, _feed: &Feed, _speed: f64) -> &'static str {
        "speed"
    }
}
