//! The fields of an induction machine given by its circuit.

use super::starting::{CHANGEOVER_SPEED, STARTING, STARTING_VOLTAGE};
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, RATED_DUTY, RATED_TORQUE, SUPPLY, default, not_negative, plain,
    positive, quantity, range,
};
use crate::registry::{Field, Need, Shape};

/// The word for a machine connected in delta.
pub(super) const DELTA: &str = "delta";
/// The word for a machine on an inverter.
pub(super) const INVERTER: &str = "inverter";

/// How it hangs on its supply.
pub(super) const CONTROL: Field = plain(
    "control",
    Shape::Choice(&[
        ("direct", "on the voltage and frequency of its supply"),
        (
            INVERTER,
            "voltage over frequency constant up to rated_frequency, voltage constant above: the field weakens",
        ),
    ]),
    Need::Optional,
    "how it is fed; directly when not given",
);

/// Fields, the usual order of a spec.
pub(super) static CIRCUIT_FIELDS: &[Field] = &[
    SUPPLY,
    quantity("poles", "count", Need::Required, range(2.0, 120.0), range(2.0, 24.0), "number of poles, even"),
    positive(
        "rated_frequency",
        "frequency",
        Need::Required,
        range(10.0, 500.0),
        "frequency at which the reactances hold",
    ),
    positive(
        "rated_voltage",
        "voltage",
        Need::Where("control = inverter"),
        range(24.0, 15e3),
        "voltage between lines the machine is made for",
    ),
    plain(
        "connection",
        Shape::Choice(&[
            ("star", "a phase lies between line and star point: 1/√3 of the voltage between lines"),
            (DELTA, "a phase lies between two lines"),
        ]),
        Need::Required,
        "how the phases of the stator are connected; the circuit is that of one phase",
    ),
    not_negative(
        "stator_resistance",
        "resistance",
        Need::Required,
        range(1e-4, 1e3),
        "resistance R1 of a phase of the stator, warm",
    ),
    not_negative(
        "stator_reactance",
        "resistance",
        Need::Required,
        range(1e-3, 1e3),
        "leakage reactance X1 of a phase of the stator",
    ),
    positive(
        "rotor_resistance",
        "resistance",
        Need::Required,
        range(1e-4, 1e3),
        "resistance R2 of a phase of the rotor, referred to the stator, warm; with what is switched into it",
    ),
    not_negative(
        "rotor_reactance",
        "resistance",
        Need::Required,
        range(1e-3, 1e3),
        "leakage reactance X2 of a phase of the rotor, referred to the stator",
    ),
    positive(
        "magnetizing_reactance",
        "resistance",
        Need::Where("current, power factor and efficiency"),
        range(0.1, 1e5),
        "magnetising reactance Xm of a phase; left aside when not given",
    ),
    positive(
        "core_resistance",
        "resistance",
        Need::Optional,
        range(1.0, 1e6),
        "resistance across the magnetising reactance that stands for the core loss",
    ),
    not_negative(
        "rotational_loss",
        "mechanical_power",
        default(
            0.0,
            "no friction, windage or core loss is given: torque and efficiency come out a little high",
        ),
        range(0.0, 1e6),
        "friction, windage and whatever core loss is counted with them, near the synchronous speed",
    ),
    CONTROL,
    positive(
        "output_frequency",
        "frequency",
        Need::Where("control = inverter"),
        range(0.5, 1000.0),
        "frequency the inverter puts out",
    ),
    STARTING,
    STARTING_VOLTAGE,
    CHANGEOVER_SPEED,
    positive(
        "current_limit",
        "current",
        Need::Optional,
        range(0.1, 1e5),
        "most current in each line that a soft starter or inverter lets through, by lowering the voltage",
    ),
    RATED_TORQUE,
    positive(
        "rated_power",
        "mechanical_power",
        Need::Optional,
        range(10.0, 1e8),
        "power at the shaft it can give for the rated duty",
    ),
    positive(
        "rated_current",
        "current",
        Need::Optional,
        range(0.05, 1e5),
        "current in each line it stands for the rated duty",
    ),
    RATED_DUTY,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
];
