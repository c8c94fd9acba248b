//! What a friction belt and a friction pulley share: the wrap, its tensions and the pull at which it slips.

use super::fixed::{Fixed, Own, Symbols};
use crate::fault::Fault;
use crate::kinds::fields::{default, not_negative, positive, quantity, range};
use crate::kinds::reading::{contradiction, missing};
use crate::laws::capstan as law;
use crate::model::{Slip, TransmissionState};
use crate::registry::{Bounds, Field, Need, ResultRow, ResultShape};
use crate::values::Values;
use core::f64::consts::PI;

/// Friction of belt or rope on its pulley.
pub(super) const FRICTION: Field = quantity(
    "friction_coefficient",
    "number",
    Need::Optional,
    Bounds::closed(0.0, 2.0),
    range(0.05, 1.0),
    "friction of belt or rope on the pulley; with wrap and a tension, slipping is checked",
);

/// How far it goes round.
pub(super) const WRAP: Field = positive(
    "wrap",
    "angle",
    Need::Where("the pull at which a friction drive slips"),
    range(0.7, 63.0),
    "angle over which belt or rope lies on the pulley, on the smaller one of two: 165°, 2.5 rev",
);

/// A wedge presses more.
pub(super) const GROOVE: Field = quantity(
    "groove_angle",
    "angle",
    default(PI, "a flat belt or a plain drum; a V-belt sits in a groove of some 38°"),
    Bounds { low: 0.0, low_in: false, high: PI, high_in: true },
    range(0.4, PI),
    "angle between both flanks of the groove",
);

/// Held by the take-up.
pub(super) const SLACK: Field = positive(
    "slack_tension",
    "force",
    Need::OneOf,
    range(1.0, 1e6),
    "tension of the slack side while it runs: what take-up, tail weight or hand holds",
);

/// What the belt may carry.
pub(super) const TIGHT: Field = positive(
    "tight_tension",
    "force",
    Need::OneOf,
    range(1.0, 1e6),
    "tension of the tight side while it runs, where that is known instead",
);

/// What a running belt loses of its grip.
pub(super) const MASS: Field = not_negative(
    "mass_per_length",
    "mass_per_length",
    default(0.0, "a light belt at moderate speed presses with all its tension"),
    range(0.0, 200.0),
    "mass of belt or rope per length: running round takes tension that does not press",
);

/// Tensions and reserve.
pub(super) const TENSIONS: [ResultRow; 4] = [
    ResultRow {
        name: "tension_ratio",
        shape: ResultShape::Quantity("number"),
        meaning: "tight over slack tension at which the wrap slips",
    },
    ResultRow {
        name: "tight_tension",
        shape: ResultShape::Quantity("force"),
        meaning: "tension of the tight side",
    },
    ResultRow {
        name: "slack_tension",
        shape: ResultShape::Quantity("force"),
        meaning: "tension of the slack side",
    },
    SLIP_RESERVE,
];

/// How far a friction part is from slipping.
pub(super) const SLIP_RESERVE: ResultRow = ResultRow {
    name: "slip_reserve",
    shape: ResultShape::Quantity("number"),
    meaning: "most its friction passes over what passes; below 1 it slips",
};

/// The value of that result.
pub(super) fn slip_reserve(part: &Fixed, state: &TransmissionState) -> f64 {
    part.slip_at(state).map_or(f64::NAN, |slip| slip.most / slip.asked)
}

/// Results of a wrap.
pub(super) static OWN: &[Own] = &[
    Own { name: "tight_tension", kind: "force", value: tight_tension },
    Own { name: "slack_tension", kind: "force", value: slack_tension },
    Own { name: "slip_reserve", kind: "number", value: slip_reserve },
];

/// Tension of the tight side.
fn tight_tension(part: &Fixed, state: &TransmissionState) -> f64 {
    match part.known("F_1") {
        Some(tight) => tight,
        None => part.known("F_2").unwrap_or(f64::NAN) + pull(part, state),
    }
}

/// Tension of the slack side.
fn slack_tension(part: &Fixed, state: &TransmissionState) -> f64 {
    match part.known("F_2") {
        Some(slack) => slack,
        None => part.known("F_1").unwrap_or(f64::NAN) - pull(part, state),
    }
}

/// Pull of the belt at the pulley's rim: the greater of what goes in and what comes out.
fn pull(part: &Fixed, state: &TransmissionState) -> f64 {
    let (input, output) = (part.constant("pull_in"), part.constant("pull_out"));
    f64::max(state.input_effort.abs() * input, state.output_effort.abs() * output)
}

/// What is asked of the wrap, and the most it passes.
pub(super) fn slip(part: &Fixed, state: &TransmissionState) -> Slip {
    let taken = law::centrifugal(part.constant("q"), state.input_speed * part.constant("rim"));
    let ratio = part.constant("K");
    let most = match (part.known("F_2"), part.known("F_1")) {
        (Some(slack), _) => law::pull_by_slack(slack - taken, ratio),
        (None, tight) => law::pull_by_tight(tight.unwrap_or(f64::NAN) - taken, ratio),
    };
    Slip { asked: pull(part, state), most, kind: "force" }
}

/// Tension ratio of the fields, if they give one.
pub(super) fn tension_ratio(values: &Values) -> Option<f64> {
    let (friction, wrap) = (values.si("friction_coefficient")?, values.si("wrap")?);
    Some(law::tension_ratio(friction, wrap, values.si("groove_angle").unwrap_or(PI)))
}

/// The symbols of a wrap whose slipping can be checked; `None` where a part that may do without gives none of them.
pub(super) fn wrapped(values: &Values, required: bool, faults: &mut Vec<Fault>) -> Option<Symbols> {
    let before = faults.len();
    let (slack, tight) = (values.si("slack_tension"), values.si("tight_tension"));
    let told = ["friction_coefficient", "wrap", "slack_tension", "tight_tension"];
    if !required && !told.iter().any(|field| values.si(field).is_some()) {
        return None;
    }
    for (field, why) in [("friction_coefficient", "what it pulls with"), ("wrap", "how far it goes round")] {
        if values.si(field).is_none() {
            faults.push(missing(&[&[field]], why));
        }
    }
    let tension = match (slack, tight) {
        (Some(slack), Some(tight)) => {
            let how = "take-up and load settle both tensions: {0} and {1} cannot both be given, keep one";
            let quantities = [(slack, "force"), (tight, "force")];
            faults.push(contradiction(&["slack_tension", "tight_tension"], how, &quantities));
            return None;
        }
        (Some(slack), None) => ("F_2", slack),
        (None, Some(tight)) => ("F_1", tight),
        (None, None) => {
            let why = "friction needs a tension to pull with: what the take-up holds, or the tight side";
            faults.push(missing(&[&["slack_tension"], &["tight_tension"]], why));
            return None;
        }
    };
    let ratio = tension_ratio(values).filter(|_| faults.len() == before)?;
    Some(vec![
        ("mu", values.si("friction_coefficient")?),
        ("a", values.si("wrap")?),
        ("g", values.si("groove_angle").unwrap_or(PI)),
        ("K", ratio),
        ("q", values.si("mass_per_length").unwrap_or(0.0)),
        tension,
    ])
}
