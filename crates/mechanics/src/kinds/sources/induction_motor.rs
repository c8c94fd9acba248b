//! A three-phase cage motor from its name plate and its catalogue.

use super::circuit_fields::CONTROL;
use super::plate_control::{Feeding, MAX_TORQUE, OUTPUT_FREQUENCY, Started, feeding};
use super::plate_reading::{PULL_UP_SPEED, Plate, plate};
use super::starting::{CHANGEOVER_SPEED, STARTING, STARTING_VOLTAGE};
use super::straight_line::ratings;
use crate::curve::Curve;
use crate::fault::{Fault, Note};
use crate::kinds::fields::{
    BRAKING, FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, RATED_DUTY, SUPPLY, default, positive, quantity, range,
};
use crate::kinds::reading::{HoldBack, bad_value, braking, differ, done, inertia, missing, returning};
use crate::laws::induction_curve::{self, CataloguePoint, InductionCurve, flux_factor};
use crate::laws::inverter_envelope::{self, InverterEnvelope};
use crate::laws::{kloss, synchronous};
use crate::model::{Characteristic, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::solution::{Answer, Marks};
use crate::values::{Duty, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "induction_motor",
    title: "three-phase induction motor",
    summary: "A cage motor from its name plate and the torque ratios of its catalogue: on the mains, started in star or \
              softly, or on an inverter. Torque goes by the square of the voltage; above its synchronous speed it brakes. \
              A name plate gives no current away from the rated point.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        synchronous::SYNCHRONOUS_SPEED,
        synchronous::SLIP,
        synchronous::RATED_TORQUE,
        kloss::BREAKDOWN_SLIP,
        kloss::TORQUE,
        induction_curve::STRETCHED,
        induction_curve::VOLTAGE,
        inverter_envelope::WEAKENED,
    ],
    cautions: &[
        "Locked-rotor, pull-up and breakdown torque are for seconds: the rated torque at its duty is what the motor can \
         do for long.",
        "The shape between the catalogue's points is an assumption; where a start is close, ask for the measured curve.",
        "Work on mains is for licensed electricians; motor protection follows the local code.",
    ],
    example: "supply works: mains { voltage = 400 V; frequency = 50 Hz; accepts_return = yes }\n\
              source motor: induction_motor { supply = works; rated_power = 4 kW; rated_speed = 1440 rpm; \
              rated_voltage = 400 V; rated_frequency = 50 Hz; poles = 4; locked_rotor_torque = 2.3 × rated; \
              pull_up_torque = 1.9 × rated; breakdown_torque = 2.9 × rated; inertia = 0.019 kg·m² }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    SUPPLY,
    positive(
        "rated_power",
        "mechanical_power",
        Need::Required,
        range(10.0, 1e8),
        "power at the shaft on the name plate; not the electrical power",
    ),
    positive(
        "rated_speed",
        "rotational_speed",
        Need::Required,
        range(10.0, 2000.0),
        "speed at rated power, a few percent below the synchronous speed",
    ),
    positive(
        "rated_voltage",
        "voltage",
        Need::Required,
        range(24.0, 15e3),
        "voltage between lines on the name plate",
    ),
    positive(
        "rated_frequency",
        "frequency",
        Need::Required,
        range(10.0, 500.0),
        "frequency on the name plate",
    ),
    RATED_DUTY,
    quantity(
        "poles",
        "count",
        Need::Optional,
        range(2.0, 120.0),
        range(2.0, 24.0),
        "number of poles, even; by rated speed and frequency when not given",
    ),
    starting("locked_rotor_torque", Need::Optional, "torque at standstill; Kloss's formula when not given"),
    starting(
        "pull_up_torque",
        Need::Optional,
        "lowest torque between standstill and breakdown; no dip when not given",
    ),
    starting("breakdown_torque", Need::Required, "highest torque on the way up to rated speed"),
    quantity(
        "pull_up_speed_ratio",
        "percentage",
        default(
            PULL_UP_SPEED,
            "catalogues give no speed for the pull-up torque; cage motors dip at low speed",
        ),
        Bounds { low: 0.0, low_in: false, high: 1.0, high_in: false },
        range(0.05, 0.6),
        "speed of the pull-up torque over synchronous speed",
    ),
    positive(
        "rated_torque",
        "torque",
        Need::Optional,
        range(1e-2, 1e7),
        "torque on the name plate; it follows from power and speed and is checked against them",
    ),
    positive(
        "rated_current",
        "current",
        Need::Optional,
        range(0.05, 1e5),
        "current in each line at rated power",
    ),
    CONTROL,
    OUTPUT_FREQUENCY,
    MAX_TORQUE,
    STARTING,
    STARTING_VOLTAGE,
    CHANGEOVER_SPEED,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
    Field {
        meaning: "what its inverter does while the load drives; on the mains the supply decides",
        ..BRAKING
    },
];

/// A torque of the catalogue, usually a multiple of the rated one.
const fn starting(name: &'static str, need: Need, meaning: &'static str) -> Field {
    Field {
        name,
        shape: Shape::OfRated("torque"),
        need,
        hard: Bounds::POSITIVE,
        plausible: range(1e-2, 1e8),
        meaning,
    }
}

static RESULTS: &[ResultRow] = &[
    result("rated_torque", "torque", "torque at rated power and speed"),
    result("synchronous_speed", "rotational_speed", "speed of the field at the supply's frequency"),
    result("slip", "percentage", "how far the shaft lags behind the field; below zero it brakes"),
    result("locked_rotor_torque", "torque", "torque at standstill at the supply's voltage"),
    result("pull_up_torque", "torque", "lowest torque on the way up at the supply's voltage"),
    result("breakdown_torque", "torque", "highest torque at the supply's voltage"),
    result("breakdown_speed", "rotational_speed", "speed of the breakdown torque"),
];

const fn result(name: &'static str, kind: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity(kind), meaning }
}

/// Frequencies of the supply, over the rated one, within which the law holds.
const FREQUENCIES: (f64, f64) = (0.8, 1.25);

#[derive(Debug)]
struct InductionMotor {
    plate: Plate,
    feeding: Feeding,
    braking: Option<&'static str>,
    inertia: Known,
    ratings: Ratings,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let Some(plate) = plate(values, &mut faults) else { return Err(faults) };
    let ratings = Ratings {
        effort: Some(plate.torque),
        power: Some(plate.power),
        current: values.si("rated_current"),
        ..ratings(values, "rated_torque")
    };
    let feeding = feeding(values, &plate, &mut faults);
    let motor = InductionMotor { plate, feeding, braking: values.word("braking"), inertia, ratings };
    done(Model::Source(Box::new(motor)), faults)
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    match plate(values, &mut Vec::new()) {
        Some(plate) => vec![("rated_torque", plate.torque)],
        None => Vec::new(),
    }
}

impl InductionMotor {
    fn curve(&self, feed: &Feed) -> Result<InductionCurve, Vec<Fault>> {
        let Some(supply) = feed.supply else {
            return Err(vec![missing(&[&["supply"]], "voltage and frequency of the mains it hangs on")]);
        };
        let Some(voltage) = supply.voltage else {
            return Err(vec![bad_value("supply", "this supply has no voltage", &[])]);
        };
        let plate = &self.plate;
        let (voltage, frequency) = self.feeding.terminals(plate, voltage, supply.frequency)?;
        let ratio = frequency / plate.frequency;
        let direct = matches!(self.feeding, Feeding::Direct(_));
        if direct && !(FREQUENCIES.0..=FREQUENCIES.1).contains(&ratio) {
            let why = "at {0} a plate for {1} says too little: the law leaves the stator's resistance aside";
            let quantities = [(frequency, "frequency"), (plate.frequency, "frequency")];
            return Err(vec![bad_value("supply", why, &quantities)]);
        }
        let field_speed = synchronous::synchronous_speed(frequency, plate.poles);
        self.feeding.reaches(field_speed)?;
        Ok(InductionCurve {
            field_speed,
            rated_field_speed: plate.field_speed,
            breakdown: plate.breakdown,
            locked_rotor: plate.locked_rotor,
            pull_up: plate.pull_up,
            factor: flux_factor(voltage, plate.voltage, frequency, plate.frequency),
        })
    }

    /// What it gives at the most where its inverter holds a speed.
    fn envelope(&self, curve: &InductionCurve) -> Option<InverterEnvelope> {
        self.feeding.envelope(curve, &self.plate, self.ratings.max_speed)
    }

    /// Whether the supply is another than the plate's.
    fn scaled(&self, feed: &Feed) -> bool {
        let supply = feed.supply.unwrap_or_default();
        let Some(voltage) = supply.voltage else { return false };
        let at = self.feeding.terminals(&self.plate, voltage, supply.frequency);
        at.is_ok_and(|(voltage, frequency)| {
            differ(voltage, self.plate.voltage, 1e-3) || differ(frequency, self.plate.frequency, 1e-3)
        })
    }
}

impl Source for InductionMotor {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let curve = self.curve(feed)?;
        let top_speed = curve.field_speed;
        let on_inverter = !matches!(self.feeding, Feeding::Direct(_));
        let hold = || -> Box<dyn Curve> { Box::new(HoldBack(curve.clone())) };
        let mut character = if let Some(envelope) = self.envelope(&curve) {
            let braking = braking(self.braking, feed, || Box::new(envelope));
            Characteristic::new(Box::new(envelope), braking, top_speed)
        } else {
            let braking = if on_inverter { braking(self.braking, feed, hold) } else { returning(feed, hold) };
            let drive: Box<dyn Curve> = match self.feeding {
                Feeding::Direct(Some(start)) => Box::new(Started { curve: curve.clone(), start }),
                _ => Box::new(curve.clone()),
            };
            Characteristic::new(drive, braking, top_speed)
        };
        let holds_speed = matches!(self.feeding, Feeding::SetSpeed { .. });
        character.scaled = self.scaled(feed);
        character.follows_set_speed = holds_speed;
        character.needs_set_speed = holds_speed.then_some("output_frequency");
        Ok(character)
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn answer(&self, name: &str, state: &SourceState<'_>) -> Option<Answer> {
        let curve = self.curve(state.feed).ok()?;
        if self.envelope(&curve).is_some()
            && ["slip", "locked_rotor_torque", "pull_up_torque"].contains(&name)
        {
            return Some(Answer::Absent(Note::plain(
                "its inverter sets the frequency as the speed needs it",
            )));
        }
        let first = match self.feeding {
            Feeding::Direct(Some(start)) => start.torque,
            _ => 1.0,
        };
        let torque = |torque: f64| (torque * curve.factor, "torque");
        let (si, kind) = match name {
            "synchronous_speed" => (curve.field_speed, "rotational_speed"),
            "slip" => (synchronous::slip(curve.field_speed, state.speed), "percentage"),
            "locked_rotor_torque" => {
                torque(first * curve.over_slip(curve.field_speed / curve.rated_field_speed))
            }
            "pull_up_torque" => match curve.pull_up {
                Some(point) => torque(first * point.torque),
                None => return Some(Answer::Absent(Note::plain("no pull-up torque is given"))),
            },
            "breakdown_torque" => torque(curve.breakdown.torque),
            "breakdown_speed" => (curve.speed_at(curve.breakdown.slip), "rotational_speed"),
            _ => return None,
        };
        let marks = Marks { outside: false, scaled: self.scaled(state.feed) && kind == "torque" };
        Some(Answer::Quantity { si, kind, marks })
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let plate = &self.plate;
        let Ok(curve) = self.curve(state.feed) else { return Vec::new() };
        if let Some(envelope) = self.envelope(&curve) {
            return vec![
                ("T_b", envelope.breakdown),
                ("w_s", envelope.field),
                ("w", state.speed),
                ("s_b", envelope.slip),
            ];
        }
        let slip = (curve.field_speed - state.speed) / curve.rated_field_speed;
        let kloss = |slip| kloss::torque(plate.breakdown.torque, plate.breakdown.slip, slip);
        let supply = state.feed.supply.unwrap_or_default();
        let mut out = vec![
            ("p", plate.poles),
            ("w_s", curve.field_speed),
            ("w", state.speed),
            ("P_n", plate.power),
            ("w_n", plate.speed),
            ("s_n", synchronous::slip(plate.field_speed, plate.speed)),
            ("k", plate.breakdown.torque / plate.torque),
            ("T_b", plate.breakdown.torque),
            ("s_b", plate.breakdown.slip),
            ("s", slip),
            ("K", kloss(slip)),
            ("T", curve.over_slip(slip)),
            ("U_n", plate.voltage),
        ];
        out.extend(supply.frequency.map(|f| ("f", f)));
        out.extend(supply.voltage.map(|u| ("U", u)));
        let locked = plate.locked_rotor.map(|torque| CataloguePoint { slip: 1.0, torque });
        if let Some(low) = plate.pull_up.or(locked) {
            out.extend([("T_u", low.torque), ("K_u", kloss(low.slip))]);
        }
        out
    }
}

#[cfg(test)]
mod tests;
