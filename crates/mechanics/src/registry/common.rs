//! What every drive and every part of a role has: settings, fields and results, as rows like those of the kinds.

use super::{Bounds, Field, Need, ResultRow, ResultShape, Role, Shape};
use crate::kinds::derating::{ALTITUDE_DERATING, AMBIENT_DERATING};
use crate::solution::Mode;

const fn quantity(name: &'static str, kind: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity(kind), meaning }
}

const fn flag(name: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Flag, meaning }
}

const fn speed(name: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Speed, meaning }
}

const EFFORT: &str = "torque (or force, on linear motion) here, a magnitude in the direction of motion";
const MODE: ResultRow =
    ResultRow { name: "mode", shape: ResultShape::Word(Mode::WORDS), meaning: "how power flows here" };
const SPEED: ResultRow = speed("speed", "speed at the reached point, in the direction of motion");
const HIGHEST: ResultRow =
    speed("highest_speed", "highest speed it can reach in this case, stopping included");
const TORQUE: ResultRow = ResultRow { name: "torque", shape: ResultShape::Effort, meaning: EFFORT };
const FORCE: ResultRow = ResultRow { name: "force", shape: ResultShape::Effort, meaning: EFFORT };
const POWER: ResultRow = quantity("power", "mechanical_power", "mechanical power through here, a magnitude");
const PEAK: ResultRow =
    quantity("peak_power", "mechanical_power", "most mechanical power it can give along its curve");
const PEAK_SPEED: ResultRow = speed("peak_power_speed", "speed at which the peak power is given");
const SHARE: ResultRow = quantity("power_share", "percentage", "power at the reached point over peak power");

/// What can be asked of a drive.
pub static DRIVE_RESULTS: &[ResultRow] = &[
    speed("speed", "speed of the (first) load at the reached point"),
    quantity(
        "power",
        "mechanical_power",
        "mechanical power of all sources at the reached point, a magnitude",
    ),
    PEAK,
    speed("peak_power_speed", "speed of the (first) load at which the sources give their peak power"),
    SHARE,
    quantity(
        "efficiency",
        "percentage",
        "power that arrives over power that is put in, in the direction it flows",
    ),
    MODE,
    flag("starts", "it moves from rest in the direction asked for"),
    flag("stalls", "friction holds it at rest"),
    flag("driven_back", "the load turns it against the direction asked for"),
    flag("runaway", "the load turns it and nothing bounds its speed"),
    flag("self_moving", "the load alone sets it moving in the direction asked for"),
    flag("runs_up", "it starts and reaches its highest stable operating point"),
    speed("hangs_at", "speed at which it hangs below its highest stable operating point"),
    quantity("run_up_time", "time", "time from rest to the share `run_up_to` of the reached speed"),
    ResultRow {
        name: "run_up_distance",
        shape: ResultShape::Way,
        meaning: "way of the (first) load in that time",
    },
    quantity(
        "run_up_reserve",
        "number",
        "least ratio of available to required torque on the way up, breakaway included",
    ),
    quantity(
        "reversal_time",
        "time",
        "time from the reached point to the share `run_up_to` of the speed the other way, the source switched over",
    ),
    quantity(
        "reflected_inertia",
        "moment_of_inertia",
        "all inertias of the drive seen at its (first) source, its own included, losses left aside",
    ),
    quantity("stop_time", "time", "time from switching off to rest"),
    ResultRow {
        name: "stop_distance",
        shape: ResultShape::Way,
        meaning: "way of the (first) load in that time",
    },
    speed("stop_peak_speed", "highest speed of the (first) load while it stops"),
    HIGHEST,
    flag("holds_set_speed", "it runs at its set speed (within its droop)"),
    ResultRow {
        name: "limited_by",
        shape: ResultShape::Word(LIMITS),
        meaning: "what bounds it at the reached point",
    },
];

/// What can bound a drive.
pub static LIMITS: &[&str] =
    &["torque", "force", "current", "voltage", "supply", "power", "speed", "governor", "braking"];

static SUPPLY_RESULTS: &[ResultRow] = &[
    quantity("current", "current", "current it gives to all sources on it, a magnitude"),
    quantity("voltage", "voltage", "voltage at its terminals"),
    quantity("power", "electrical_power", "electrical power it gives, a magnitude"),
];

static SOURCE_RESULTS: &[ResultRow] = &[
    SPEED,
    TORQUE,
    FORCE,
    POWER,
    PEAK,
    PEAK_SPEED,
    SHARE,
    HIGHEST,
    MODE,
    quantity("torque_reserve", "number", "most torque it can give (or hold back) here over what it gives"),
    quantity("force_reserve", "number", "most force it can give (or hold back) here over what it gives"),
    quantity(
        "continuous_torque",
        "torque",
        "torque it can give for long at its rated duty, derated to the site of the drive",
    ),
    quantity(
        "continuous_power",
        "mechanical_power",
        "power it can give for long at its rated duty, derated to the site of the drive",
    ),
    quantity("derating", "percentage", "share of the rated values that is left at the site of the drive"),
    quantity(
        "load_share",
        "percentage",
        "its share of the power of all sources; below zero where another drives it",
    ),
    quantity("current", "current", "current of the machine, a magnitude"),
    quantity("voltage", "voltage", "voltage at the machine"),
    quantity("input_power", "electrical_power", "electrical power it takes in, a magnitude"),
    quantity("efficiency", "percentage", "power out over power in, in the direction it flows"),
];

static TRANSMISSION_RESULTS: &[ResultRow] = &[
    SPEED,
    TORQUE,
    FORCE,
    POWER,
    HIGHEST,
    quantity("efficiency", "percentage", "power out over power in, in the direction it flows"),
];

static LOAD_RESULTS: &[ResultRow] = &[SPEED, TORQUE, FORCE, POWER, HIGHEST];

/// What can be asked of every part of a role, beyond the results of its kind. Of `torque` and `force` a station has
/// the one of its motion.
#[must_use]
pub fn common_results(role: Role) -> &'static [ResultRow] {
    match role {
        Role::Supply => SUPPLY_RESULTS,
        Role::Source => SOURCE_RESULTS,
        Role::Transmission => TRANSMISSION_RESULTS,
        Role::Load => LOAD_RESULTS,
    }
}

static SOURCE_FIELDS: &[Field] = &[
    Field {
        name: "on",
        shape: Shape::Flag,
        need: Need::Default { si: 1.0, why: "a source that stands in a drive drives" },
        hard: Bounds::ANY,
        plausible: Bounds::ANY,
        meaning: "whether it drives; off, it gives and brakes nothing, but its inertia stays",
    },
    ALTITUDE_DERATING,
    AMBIENT_DERATING,
];

/// Fields every part of a role has, beyond those of its kind.
#[must_use]
pub fn common_fields(role: Role) -> &'static [Field] {
    match role {
        Role::Source => SOURCE_FIELDS,
        Role::Supply | Role::Transmission | Role::Load => &[],
    }
}

/// Fields that say the same as a field with a default: where one of them is given, the default is not taken.
#[must_use]
pub fn said_otherwise(field: &str) -> &'static [&'static str] {
    match field {
        "breakaway_ratio" => &["breakaway_torque", "breakaway_force", "breakaway_pressure"],
        "counterweight" => &["balanced_share"],
        _ => &[],
    }
}

/// Settings of a drive, the usual order of its block.
pub static DRIVE_FIELDS: &[Field] = &[
    Field {
        name: "direction",
        shape: Shape::Choice(&[
            ("forward", "as the load counts its motion: a hoist lifts, a vehicle goes ahead"),
            ("reverse", "the other way: a hoist lowers, a vehicle backs"),
        ]),
        need: Need::Default { si: 0.0, why: "the load's own sense: lifting, going ahead" },
        hard: Bounds::ANY,
        plausible: Bounds::ANY,
        meaning: "which way the load is to move; speeds and torques are counted positive that way",
    },
    Field {
        name: "gear",
        shape: Shape::Gears,
        need: Need::Optional,
        hard: Bounds::ANY,
        plausible: Bounds::ANY,
        meaning: "the gear engaged in every gearbox; with none given all are solved and shown",
    },
    Field {
        name: "set_speed",
        shape: Shape::Quantity("rotational_speed"),
        need: Need::Optional,
        hard: Bounds::POSITIVE,
        plausible: Bounds { low: 0.0, low_in: false, high: 10_500.0, high_in: true },
        meaning: "speed held by servo, inverter or governor: a rotational speed at the source, a linear one at the load",
    },
    Field {
        name: "droop",
        shape: Shape::Quantity("percentage"),
        need: Need::Default {
            si: 0.0,
            why: "a servo or inverter holds its speed; a governor's droop is to be given",
        },
        hard: Bounds { low: 0.0, low_in: true, high: 1.0, high_in: false },
        plausible: Bounds::closed(0.0, 0.15),
        meaning: "drop of the set speed from no torque to full torque",
    },
    Field {
        name: "duty",
        shape: Shape::Duty,
        need: Need::Optional,
        hard: Bounds::ANY,
        plausible: Bounds::ANY,
        meaning: "duty type the drive is used at; continuous limits are taken for it",
    },
    Field {
        name: "starts_per_hour",
        shape: Shape::Quantity("rate"),
        need: Need::Optional,
        hard: Bounds::NOT_NEGATIVE,
        plausible: Bounds::closed(0.0, 1.0),
        meaning: "how often it is started; written in the record, not computed with",
    },
    Field {
        name: "application_factor",
        shape: Shape::Quantity("number"),
        need: Need::Default {
            si: 1.0,
            why: "no factor: limits of parts are compared with the computed torque",
        },
        hard: Bounds { low: 0.0, low_in: false, high: 100.0, high_in: true },
        plausible: Bounds::closed(1.0, 3.0),
        meaning: "factor on torques where they are held against the limits of parts; does not move the operating point",
    },
    Field {
        name: "run_up_to",
        shape: Shape::Quantity("percentage"),
        need: Need::Default { si: 0.95, why: "the last of the speed is reached ever more slowly" },
        hard: Bounds { low: 0.0, low_in: false, high: 1.0, high_in: true },
        plausible: Bounds::closed(0.5, 1.0),
        meaning: "share of the reached speed at which the run-up counts as done",
    },
    Field {
        name: "ambient",
        shape: Shape::Quantity("temperature"),
        need: Need::Optional,
        hard: Bounds::POSITIVE,
        plausible: Bounds::closed(213.15, 353.15),
        meaning: "temperature of the surroundings",
    },
    Field {
        name: "altitude",
        shape: Shape::Quantity("length"),
        need: Need::Optional,
        hard: Bounds::closed(-500.0, 10_000.0),
        plausible: Bounds::closed(-430.0, 5_500.0),
        meaning: "height of the site above the sea",
    },
];
