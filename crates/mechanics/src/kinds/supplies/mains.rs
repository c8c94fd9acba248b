//! The public or works mains: a stiff alternating voltage.

use crate::fault::Fault;
use crate::kinds::fields::{ACCEPTS_RETURN, positive, range};
use crate::model::{Model, Supply, SupplyData};
use crate::registry::{Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Supply,
    name: "mains",
    title: "three-phase mains",
    summary: "Alternating voltage of a works or public network, taken as it stands at the machine's terminals. \
              A long feeder lowers it at starting: give the voltage that is left then, in a case of its own.",
    fields: FIELDS,
    results: &[],
    formulas: &[],
    cautions: &[
        "Work on mains is for licensed electricians; protection, cable sizes and earthing follow the local code.",
    ],
    example: "supply works: mains { voltage = 400 V; frequency = 50 Hz; accepts_return = yes }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive(
        "voltage",
        "voltage",
        Need::Required,
        range(90.0, 15e3),
        "voltage between two lines, at the machine",
    ),
    positive("frequency", "frequency", Need::Required, range(10.0, 500.0), "frequency"),
    ACCEPTS_RETURN,
];

#[derive(Debug)]
struct Mains(SupplyData);

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    Ok(Model::Supply(Box::new(Mains(SupplyData {
        voltage: values.si("voltage"),
        frequency: values.si("frequency"),
        accepts_return: values.flag("accepts_return"),
        ..SupplyData::default()
    }))))
}

impl Supply for Mains {
    fn data(&self) -> SupplyData {
        self.0
    }
}
