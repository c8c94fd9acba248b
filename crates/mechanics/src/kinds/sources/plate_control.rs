//! How an induction motor known by its plate is fed: directly, started in star or softly, or by an inverter.

use super::circuit_fields::INVERTER;
use super::plate_reading::Plate;
use super::starting::start;
use crate::curve::Law;
use crate::fault::Fault;
use crate::kinds::fields::{positive, range};
use crate::kinds::reading::{bad_value, contradiction};
use crate::laws::induction_circuit::Start;
use crate::laws::induction_curve::InductionCurve;
use crate::laws::inverter_envelope::InverterEnvelope;
use crate::registry::{Bounds, Field, Need, Shape};
use crate::scalar::Real;
use crate::values::Values;

/// What the inverter's current allows.
pub(super) const MAX_TORQUE: Field = Field {
    name: "max_torque",
    shape: Shape::OfRated("torque"),
    need: Need::Optional,
    hard: Bounds::POSITIVE,
    plausible: range(1e-2, 1e8),
    meaning: "most torque the inverter's current allows up to the rated speed; above it the power stays the same",
};

/// The frequency of an inverter without a speed to hold.
pub(super) const OUTPUT_FREQUENCY: Field = positive(
    "output_frequency",
    "frequency",
    Need::Where("control = inverter in a drive without set_speed"),
    range(0.5, 1000.0),
    "frequency the inverter puts out; with set_speed it is the inverter's own",
);

/// How the motor is fed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Feeding {
    /// On its supply, perhaps started otherwise.
    Direct(Option<Start>),
    /// By an inverter at this frequency.
    Frequency(f64),
    /// By an inverter that holds the drive's set speed.
    SetSpeed {
        /// Torque the inverter allows.
        limit: Option<f64>,
    },
}

/// From the fields.
pub(super) fn feeding(values: &Values, plate: &Plate, faults: &mut Vec<Fault>) -> Feeding {
    let frequency = values.si("output_frequency");
    let limit = values.of_rated("max_torque", Some(plate.torque));
    if values.word("control") != Some(INVERTER) {
        for field in ["output_frequency", "max_torque", "braking"] {
            if values.get(field).is_some() {
                let how = "this belongs to an inverter, and the motor hangs directly on its supply";
                faults.push(contradiction(&[field, "control"], how, &[]));
            }
        }
        return Feeding::Direct(start(values, faults));
    }
    if values.word("starting").is_some_and(|word| word != "direct") {
        let how = "an inverter starts the motor by its frequency, not in star or with reduced voltage";
        faults.push(contradiction(&["control", "starting"], how, &[]));
    }
    match frequency {
        Some(frequency) => Feeding::Frequency(frequency),
        None => Feeding::SetSpeed { limit },
    }
}

impl Feeding {
    /// Voltage and frequency at the motor.
    pub fn terminals(
        &self,
        plate: &Plate,
        voltage: f64,
        frequency: Option<f64>,
    ) -> Result<(f64, f64), Vec<Fault>> {
        let output = match (self, frequency) {
            (Self::Frequency(output), _) => *output,
            (Self::SetSpeed { .. }, _) => plate.frequency,
            (Self::Direct(_), Some(frequency)) => return Ok((voltage, frequency)),
            (Self::Direct(_), None) => {
                let why =
                    "an induction motor needs a supply with voltage and frequency: mains; or an inverter";
                return Err(vec![bad_value("supply", why, &[])]);
            }
        };
        let wanted = plate.voltage * f64::min(1.0, output / plate.frequency);
        Ok((f64::min(wanted, voltage), output))
    }

    /// Whether the speed where full voltage comes on can be reached.
    pub fn reaches(&self, field_speed: f64) -> Result<(), Vec<Fault>> {
        match self {
            Self::Direct(Some(start)) if start.until >= field_speed => {
                let why = "the change to full voltage at {0} is not reached: the synchronous speed is {1}";
                let quantities = [(start.until, "rotational_speed"), (field_speed, "rotational_speed")];
                Err(vec![bad_value("changeover_speed", why, &quantities)])
            }
            _ => Ok(()),
        }
    }

    /// What it gives at the most where an inverter holds the speed.
    pub fn envelope(
        &self,
        curve: &InductionCurve,
        plate: &Plate,
        highest: Option<f64>,
    ) -> Option<InverterEnvelope> {
        let Self::SetSpeed { limit } = self else { return None };
        Some(InverterEnvelope {
            breakdown: curve.breakdown.torque * curve.factor,
            field: curve.rated_field_speed,
            slip: curve.breakdown.slip,
            limit: limit.map(|torque| (torque, plate.speed)),
            highest: highest.unwrap_or(20.0 * curve.rated_field_speed),
        })
    }
}

/// The curve of a motor that is started in star or with reduced voltage.
#[derive(Clone, Debug)]
pub(super) struct Started {
    /// At full voltage.
    pub curve: InductionCurve,
    /// What stands before it.
    pub start: Start,
}

impl Law for Started {
    fn eval<R: Real>(&self, speed: R) -> R {
        speed.piecewise(&[self.start.until], |piece, speed| {
            let full = self.curve.eval(speed);
            if piece == 0 { full * self.start.torque } else { full }
        })
    }

    fn jumps(&self) -> Vec<f64> {
        vec![self.start.until]
    }

    fn kinks(&self) -> Vec<f64> {
        Law::kinks(&self.curve)
    }
}
