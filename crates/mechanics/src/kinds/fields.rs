//! Fields that several kinds share, and short ways to write a field.

use crate::registry::{Bounds, Field, Need, Role, Shape};

/// Both ends inside; shorter to read in a table of fields.
pub(crate) const fn range(low: f64, high: f64) -> Bounds {
    Bounds::closed(low, high)
}

/// A quantity.
pub(crate) const fn quantity(
    name: &'static str,
    kind: &'static str,
    need: Need,
    hard: Bounds,
    plausible: Bounds,
    meaning: &'static str,
) -> Field {
    Field { name, shape: Shape::Quantity(kind), need, hard, plausible, meaning }
}

/// A quantity above zero.
pub(crate) const fn positive(
    name: &'static str,
    kind: &'static str,
    need: Need,
    plausible: Bounds,
    meaning: &'static str,
) -> Field {
    quantity(name, kind, need, Bounds::POSITIVE, plausible, meaning)
}

/// A quantity that may be zero.
pub(crate) const fn not_negative(
    name: &'static str,
    kind: &'static str,
    need: Need,
    plausible: Bounds,
    meaning: &'static str,
) -> Field {
    quantity(name, kind, need, Bounds::NOT_NEGATIVE, plausible, meaning)
}

/// A field whose shape carries no number of its own.
pub(crate) const fn plain(name: &'static str, shape: Shape, need: Need, meaning: &'static str) -> Field {
    Field { name, shape, need, hard: Bounds::ANY, plausible: Bounds::ANY, meaning }
}

/// A value taken when the field is not given.
pub(crate) const fn default(si: f64, why: &'static str) -> Need {
    Need::Default { si, why }
}

const ACCELERATION: Need = Need::Where("run-up time, run-up distance and stopping");

/// Inertia of a source or a rotary load.
pub(crate) const INERTIA: Field = quantity(
    "inertia",
    "moment_of_inertia",
    ACCELERATION,
    Bounds::NOT_NEGATIVE,
    range(1e-7, 1e5),
    "moment of inertia at its own shaft; the tool reflects it through the chain",
);

/// The same as GD².
pub(crate) const FLYWHEEL_EFFECT: Field = quantity(
    "flywheel_effect",
    "flywheel_effect",
    ACCELERATION,
    Bounds::NOT_NEGATIVE,
    range(4e-7, 4e5),
    "GD², four times the moment of inertia; instead of inertia, never beside it",
);

/// Inertia of a part that is usually small against the machines beside it.
pub(crate) const SMALL_INERTIA: Field = quantity(
    "inertia",
    "moment_of_inertia",
    default(0.0, "small against the machines it stands between; give it where run-up or stopping is close"),
    Bounds::NOT_NEGATIVE,
    range(0.0, 1e4),
    "moment of inertia at the input shaft",
);

/// Efficiency with power flowing to the load.
pub(crate) const EFFICIENCY: Field = quantity(
    "efficiency",
    "percentage",
    Need::Required,
    Bounds::EFFICIENCY,
    range(0.2, 0.999),
    "power out over power in while the source drives, at the load it runs at",
);

/// Efficiency with power flowing back.
pub(crate) const EFFICIENCY_BACKWARD: Field = quantity(
    "efficiency_backward",
    "percentage",
    Need::Where("a load that drives, lowering, running downhill, stopping"),
    Bounds::EFFICIENCY,
    range(0.2, 0.999),
    "power out over power in while the load drives",
);

/// Efficiency of a sliding thread, which may be given by its friction instead.
pub(crate) const FRICTION_EFFICIENCY: Field = Field {
    need: Need::OneOf,
    plausible: range(0.1, 0.98),
    meaning: "power out over power in while the source drives; or give the friction",
    ..EFFICIENCY
};

/// The way back through a sliding thread, which may be no way at all.
pub(crate) const BACKWARD_OR_LOCKED: Field = quantity(
    "efficiency_backward",
    "percentage",
    Need::Where("a load that drives, lowering, stopping; friction and lead angle give it too"),
    range(-20.0, 1.0),
    range(-5.0, 0.95),
    "power out over power in while the load drives; 0 or below where the thread locks itself and must be turned down",
);

/// Highest torque at the output.
pub(crate) const MAX_OUTPUT_TORQUE: Field = positive(
    "max_output_torque",
    "torque",
    Need::Optional,
    range(1e-3, 1e8),
    "most torque the output may carry, for the duty of the drive",
);

/// Highest torque at the input.
pub(crate) const MAX_INPUT_TORQUE: Field = positive(
    "max_input_torque",
    "torque",
    Need::Optional,
    range(1e-3, 1e8),
    "most torque the input may carry, for the duty of the drive",
);

/// Highest speed at the input.
pub(crate) const MAX_INPUT_SPEED: Field = positive(
    "max_input_speed",
    "rotational_speed",
    Need::Optional,
    range(0.1, 1e4),
    "highest speed the input may turn at",
);

/// Highest speed of a source or a load.
pub(crate) const MAX_SPEED: Field = positive(
    "max_speed",
    "rotational_speed",
    Need::Optional,
    range(0.1, 1e4),
    "highest speed it may turn at, driven or driving",
);

/// Highest power through a part.
pub(crate) const MAX_POWER: Field = positive(
    "max_power",
    "mechanical_power",
    Need::Optional,
    range(1.0, 1e8),
    "most power it may carry, for the duty of the drive",
);

/// How a source with an electrical side takes a load that drives it.
pub(crate) const BRAKING: Field = plain(
    "braking",
    Shape::Choice(&[
        (AS_GENERATOR, "holds back along its own line and returns the power to a supply that accepts it"),
        (INTO_RESISTOR, "holds back along its own line; a braking resistor sized for it takes the power"),
        (NO_BRAKING, "gives nothing while the load drives"),
    ]),
    Need::Where("a load that drives"),
    "what it does while the load drives; there is no default",
);

/// The word for returning power.
pub(crate) const AS_GENERATOR: &str = "as_generator";
/// The word for burning power in a resistor.
pub(crate) const INTO_RESISTOR: &str = "into_resistor";
/// The word for doing nothing.
pub(crate) const NO_BRAKING: &str = "none";

/// Continuous torque of a source that has no name plate of power and speed.
pub(crate) const RATED_TORQUE: Field = positive(
    "rated_torque",
    "torque",
    Need::Optional,
    range(1e-3, 1e7),
    "torque it can give for the rated duty without growing too warm",
);

/// The duty of the rated values.
pub(crate) const RATED_DUTY: Field = plain(
    "rated_duty",
    Shape::Duty,
    Need::Optional,
    "duty type of IEC 60034-1 the rated values are for; continuous running, S1, when none is given",
);

/// The supply a source cannot run without; a motor of a catalogue has none until a spec hangs it on one.
pub(crate) const SUPPLY: Field =
    plain("supply", Shape::Part(Role::Supply), Need::Where("a drive it runs in"), "the supply it hangs on");

/// The supply of a source that may do without.
pub(crate) const SUPPLY_IF_ANY: Field = plain(
    "supply",
    Shape::Part(Role::Supply),
    Need::Optional,
    "the supply it hangs on; it says whether returned power is accepted",
);

/// Whether a supply takes power back.
pub(crate) const ACCEPTS_RETURN: Field = plain(
    "accepts_return",
    Shape::Flag,
    Need::Where("a load that drives"),
    "whether it takes back the power of a braking source; there is no default",
);

/// What a load asks at rest over what it asks just moving.
pub(crate) const BREAKAWAY_RATIO: Field = quantity(
    "breakaway_ratio",
    "number",
    default(1.0, "no more at rest than just moving; say more where bearings, seals or product stick"),
    range(1.0, 20.0),
    range(1.0, 3.0),
    "effort to set it moving over the effort just after",
);
