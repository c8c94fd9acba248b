//! A dc bus: a regulated or rectified voltage that several drives share.

use super::battery::{RESULTS, Stored};
use crate::fault::Fault;
use crate::kinds::fields::{ACCEPTS_RETURN, not_negative, positive, range};
use crate::laws::battery;
use crate::model::Model;
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Supply,
    name: "dc_bus",
    title: "dc bus",
    summary: "A direct voltage from a rectifier, converter or bus bar. A regulated bus has 0 Ω up to its current \
              limit: say so; stiffness is never assumed.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[battery::TERMINAL_VOLTAGE, battery::PEAK_POWER],
    cautions: &[
        "A rectified bus cannot take power back unless a converter or a braking resistor is made for it: its voltage \
         rises until something trips or breaks.",
    ],
    example: "supply bus: dc_bus { voltage = 560 V; resistance = 0 Ω; current_limit = 40 A; accepts_return = no }",
    build,
    given: |values| Stored::read(values, "voltage").given(),
};

static FIELDS: &[Field] = &[
    positive("voltage", "voltage", Need::Required, range(5.0, 1500.0), "voltage without load"),
    not_negative(
        "resistance",
        "resistance",
        Need::Required,
        range(0.0, 10.0),
        "fall of voltage per current, leads included; 0 Ω for a regulated bus",
    ),
    positive("current_limit", "current", Need::Optional, range(0.1, 5e3), "most current it gives"),
    ACCEPTS_RETURN,
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    Ok(Model::Supply(Box::new(Stored::read(values, "voltage"))))
}
