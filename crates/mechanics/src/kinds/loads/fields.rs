//! Fields that several loads share.

use crate::kinds::fields::{default, not_negative, positive, range};
use crate::registry::{Field, Need};

/// Torque of the rated point.
pub(super) const RATED_TORQUE: Field =
    positive("rated_torque", "torque", Need::OneOf, range(1e-4, 1e8), "torque it takes at its rated speed");

/// Power of the rated point.
pub(super) const RATED_POWER: Field = positive(
    "rated_power",
    "mechanical_power",
    Need::OneOf,
    range(1e-2, 1e9),
    "power at its shaft at its rated speed; instead of rated_torque",
);

/// Speed of the rated point.
pub(super) const RATED_SPEED: Field = positive(
    "rated_speed",
    "rotational_speed",
    Need::OneOf,
    range(0.1, 1e4),
    "speed of the rated torque or power",
);

/// Mass of a load in straight motion.
pub(super) const MASS: Field = not_negative(
    "mass",
    "mass",
    Need::Where("run-up time, run-up distance and stopping of a load that runs straight"),
    range(1e-3, 1e7),
    "mass that is moved",
);

/// Torque at rest of a load that has little.
pub(super) const BREAKAWAY_TORQUE: Field = not_negative(
    "breakaway_torque",
    "torque",
    default(0.0, "nothing holds it at rest; say more where bearings, seals or product stick"),
    range(0.0, 1e7),
    "torque to set it moving from rest",
);

/// Force at rest of a load that has little.
pub(super) const BREAKAWAY_FORCE: Field = not_negative(
    "breakaway_force",
    "force",
    Need::Optional,
    range(0.0, 1e7),
    "force to set it moving from rest, for a load that runs straight; none when not given",
);

/// The same instead of a ratio.
pub(super) const BREAKAWAY_TORQUE_INSTEAD: Field = not_negative(
    "breakaway_torque",
    "torque",
    Need::Optional,
    range(0.0, 1e7),
    "torque to set it moving from rest; instead of breakaway_ratio",
);

/// The same instead of a ratio.
pub(super) const BREAKAWAY_FORCE_INSTEAD: Field = not_negative(
    "breakaway_force",
    "force",
    Need::Optional,
    range(0.0, 1e7),
    "force to set it moving from rest, running straight; instead of breakaway_ratio",
);
