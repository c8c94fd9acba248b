//! Reads the name plate and the catalogue ratios of an induction motor and checks them against one another.

use crate::fault::Fault;
use crate::kinds::reading::{bad_value, contradiction, differ, missing};
use crate::laws::induction_curve::CataloguePoint;
use crate::laws::{kloss, synchronous};
use crate::values::Values;

/// What plate and catalogue say, at rated voltage and frequency.
#[derive(Clone, Copy, Debug)]
pub(super) struct Plate {
    /// V
    pub voltage: f64,
    /// Hz
    pub frequency: f64,
    /// Number of poles.
    pub poles: f64,
    /// W at the shaft.
    pub power: f64,
    /// rad/s
    pub speed: f64,
    /// N·m
    pub torque: f64,
    /// rad/s
    pub field_speed: f64,
    /// Breakdown on Kloss's curve through the rated point.
    pub breakdown: CataloguePoint,
    /// N·m
    pub locked_rotor: Option<f64>,
    /// The lowest torque on the way up.
    pub pull_up: Option<CataloguePoint>,
}

/// Share of the synchronous speed at which the pull-up torque is taken to stand.
pub(super) const PULL_UP_SPEED: f64 = 0.2;

/// The plate; `None` with a fault for every reason against it.
pub(super) fn plate(values: &Values, faults: &mut Vec<Fault>) -> Option<Plate> {
    let before = faults.len();
    let field = |name| values.si(name).unwrap_or(0.0);
    let (frequency, speed, power) = (field("rated_frequency"), field("rated_speed"), field("rated_power"));
    let poles = poles(values, frequency, speed, faults)?;
    let field_speed = synchronous::synchronous_speed(frequency, poles);
    check_speed(speed, field_speed, poles, faults);
    let torque = synchronous::rated_torque(power, speed);
    if let Some(given) = values.si("rated_torque").filter(|given| differ(*given, torque, 0.02)) {
        faults.push(contradiction(
            &["rated_power", "rated_speed", "rated_torque"],
            "{0} at {1} is {2}, not {3}: which two of power, speed and torque are true?",
            &[
                (power, "mechanical_power"),
                (speed, "rotational_speed"),
                (torque, "torque"),
                (given, "torque"),
            ],
        ));
    }
    if faults.len() > before {
        return None;
    }
    let breakdown = breakdown(values, synchronous::slip(field_speed, speed), torque, faults)?;
    let (locked_rotor, pull_up) = starting(values, torque, breakdown, faults);
    let voltage = field("rated_voltage");
    let plate = Plate {
        voltage,
        frequency,
        poles,
        power,
        speed,
        torque,
        field_speed,
        breakdown,
        locked_rotor,
        pull_up,
    };
    (faults.len() == before).then_some(plate)
}

/// Number of poles as given, or the most that keep the synchronous speed above the rated one.
fn poles(values: &Values, frequency: f64, speed: f64, faults: &mut Vec<Fault>) -> Option<f64> {
    if let Some(poles) = values.si("poles") {
        let half = poles / 2.0;
        if half != half.round() {
            let why = "poles come in pairs: 2, 4, 6 …, not {0}";
            faults.push(bad_value("poles", why, &[(poles, "number")]));
            return None;
        }
        return Some(poles);
    }
    // Just below a synchronous speed the next larger number of poles would lie below the rated speed.
    let most = synchronous::synchronous_speed(frequency, 1.0) / speed;
    let pairs = ((most / 2.0) * (1.0 + 1e-9)).floor();
    if (1.0..=60.0).contains(&pairs) {
        return Some(2.0 * pairs);
    }
    let template = "{0} at {1} is no speed of an induction motor: two poles give {2}, and slip lowers it";
    faults.push(contradiction(
        &["rated_speed", "rated_frequency"],
        template,
        &[
            (speed, "rotational_speed"),
            (frequency, "frequency"),
            (synchronous::synchronous_speed(frequency, 2.0), "rotational_speed"),
        ],
    ));
    None
}

fn check_speed(speed: f64, field_speed: f64, poles: f64, faults: &mut Vec<Fault>) {
    let slip = synchronous::slip(field_speed, speed);
    let template = if slip.abs() < 1e-4 {
        "with {1} poles, {0} is the synchronous speed, where an induction motor has no torque: the plate's speed lies a \
         few percent lower"
    } else if slip < 0.0 {
        "with {1} poles the synchronous speed is {2}: no induction motor drives at {0}, above it"
    } else if slip > 0.25 {
        "with {1} poles the synchronous speed is {2}, far above {0}: is the number of poles right?"
    } else {
        return;
    };
    let quantities = [(speed, "rotational_speed"), (poles, "count"), (field_speed, "rotational_speed")];
    faults.push(contradiction(&["rated_speed", "rated_frequency", "poles"], template, &quantities));
}

fn breakdown(values: &Values, slip: f64, rated: f64, faults: &mut Vec<Fault>) -> Option<CataloguePoint> {
    let torque = values.of_rated("breakdown_torque", Some(rated)).unwrap_or(0.0);
    if torque <= rated {
        faults.push(contradiction(
            &["breakdown_torque", "rated_power", "rated_speed"],
            "breakdown torque, {0}, is the highest the motor has, and rated torque is {1}",
            &[(torque, "torque"), (rated, "torque")],
        ));
        return None;
    }
    let point = CataloguePoint { slip: kloss::breakdown_slip(slip, torque / rated), torque };
    if point.slip >= 1.0 {
        faults.push(contradiction(
            &["breakdown_torque", "rated_speed"],
            "with so much slip Kloss's formula puts breakdown below standstill, at slip {0}: give this motor by measured \
             points, as measured_curve",
            &[(point.slip, "number")],
        ));
        return None;
    }
    Some(point)
}

/// Locked-rotor and pull-up torque.
fn starting(
    values: &Values,
    rated: f64,
    breakdown: CataloguePoint,
    faults: &mut Vec<Fault>,
) -> (Option<f64>, Option<CataloguePoint>) {
    let locked = values.of_rated("locked_rotor_torque", Some(rated));
    let pull_up = values.of_rated("pull_up_torque", Some(rated));
    if let Some(locked) = locked.filter(|locked| *locked > breakdown.torque) {
        faults.push(contradiction(
            &["locked_rotor_torque", "breakdown_torque"],
            "breakdown torque, {0}, is the highest on the curve, so the locked rotor cannot have {1}",
            &[(breakdown.torque, "torque"), (locked, "torque")],
        ));
    }
    let Some(pull_up) = pull_up else { return (locked, None) };
    let Some(locked) = locked else {
        let why = "pull-up torque is the dip after the locked-rotor torque";
        faults.push(missing(&[&["locked_rotor_torque"]], why));
        return (None, None);
    };
    // A breakdown torque below the locked-rotor torque has been said already; what follows from it is no second mistake.
    if pull_up > locked || (pull_up > breakdown.torque && locked <= breakdown.torque) {
        faults.push(contradiction(
            &["pull_up_torque", "locked_rotor_torque"],
            "pull-up torque is the lowest on the way up, so it cannot be {0} with {1} at the locked rotor",
            &[(pull_up, "torque"), (locked, "torque")],
        ));
    }
    let slip = 1.0 - values.si("pull_up_speed_ratio").unwrap_or(PULL_UP_SPEED);
    if slip <= breakdown.slip {
        faults.push(contradiction(
            &["pull_up_speed_ratio", "breakdown_torque"],
            "the pull-up torque stands below the breakdown speed, which is {0} of the synchronous speed",
            &[(1.0 - breakdown.slip, "percentage")],
        ));
    }
    (Some(locked), Some(CataloguePoint { slip, torque: pull_up }))
}
