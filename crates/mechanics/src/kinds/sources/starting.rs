//! How a three-phase motor is started: on the line, in star, or with reduced voltage.

use crate::fault::Fault;
use crate::kinds::fields::{plain, positive, quantity, range};
use crate::kinds::reading::{contradiction, missing};
use crate::laws::induction_circuit::Start;
use crate::registry::{Bounds, Field, Need, Shape};
use crate::values::Values;

/// How it is started.
pub(super) const STARTING: Field = plain(
    "starting",
    Shape::Choice(&[
        (DIRECT, "full voltage from standstill on"),
        (STAR_DELTA, "in star up to changeover_speed: a third of torque and line current; then in delta"),
        (
            REDUCED_VOLTAGE,
            "with starting_voltage up to changeover_speed: its square in torque; then full voltage",
        ),
    ]),
    Need::Optional,
    "how it is started; on full voltage when not given",
);

/// The reduced voltage.
pub(super) const STARTING_VOLTAGE: Field = quantity(
    "starting_voltage",
    "percentage",
    Need::Where("starting = reduced_voltage"),
    Bounds { low: 0.0, low_in: false, high: 1.0, high_in: true },
    range(0.2, 1.0),
    "voltage of the soft starter or starting transformer over the voltage of the supply",
);

/// Where full voltage comes on.
pub(super) const CHANGEOVER_SPEED: Field = positive(
    "changeover_speed",
    "rotational_speed",
    Need::Where("starting in star or with reduced voltage"),
    range(1.0, 2000.0),
    "speed at which it is switched to full voltage",
);

const DIRECT: &str = "direct";
const STAR_DELTA: &str = "star_delta";
const REDUCED_VOLTAGE: &str = "reduced_voltage";

/// The start of the fields; none on full voltage.
pub(super) fn start(values: &Values, faults: &mut Vec<Fault>) -> Option<Start> {
    let word = values.word("starting").filter(|word| *word != DIRECT);
    let Some(word) = word else {
        for field in ["starting_voltage", "changeover_speed"] {
            if values.get(field).is_some() {
                let how =
                    "this belongs to a start in star or with reduced voltage, and it starts on full voltage";
                faults.push(contradiction(&[field, "starting"], how, &[]));
            }
        }
        return None;
    };
    let until = values.si("changeover_speed");
    if until.is_none() {
        let why = "the speed at which it is switched to full voltage";
        faults.push(missing(&[&["changeover_speed"]], why));
    }
    let factor = if word == STAR_DELTA {
        // The square of 1/√3, and the line carries the phase's current instead of √3 times it.
        Some((1.0 / 3.0, 1.0 / 3.0))
    } else {
        let voltage = values.si("starting_voltage");
        if voltage.is_none() {
            faults.push(missing(&[&["starting_voltage"]], "the voltage it starts with"));
        }
        voltage.map(|u| (u * u, u))
    };
    let ((torque, current), until) = (factor?, until?);
    Some(Start { torque, current, until })
}
