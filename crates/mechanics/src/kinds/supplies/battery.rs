//! A battery: open-circuit voltage behind a resistance.

use crate::fault::Fault;
use crate::kinds::fields::{ACCEPTS_RETURN, not_negative, positive, range};
use crate::laws::battery::{self, Thevenin};
use crate::model::{Model, Supply, SupplyData};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Supply,
    name: "battery",
    title: "battery",
    summary: "Open-circuit voltage behind a resistance, at one state of charge and one temperature. Sources on one \
              battery pull its voltage down together. A cold or old pack is a case with other values.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[battery::TERMINAL_VOLTAGE, battery::PEAK_POWER],
    cautions: &[
        "A battery gives its whole short-circuit current into a fault: fuse it as its maker and the local code require.",
        "A full or cold battery may not take returned power; do not count on it to brake.",
    ],
    example: "supply pack: battery { open_circuit_voltage = 48 V; resistance = 40 mΩ; current_limit = 60 A; \
              accepts_return = yes }",
    build,
    given,
};

static FIELDS: &[Field] = &[
    positive(
        "open_circuit_voltage",
        "voltage",
        Need::Required,
        range(1.0, 1500.0),
        "voltage without load at the state of charge in question",
    ),
    not_negative(
        "resistance",
        "resistance",
        Need::Required,
        range(1e-5, 10.0),
        "internal resistance with leads and connectors, at the temperature in question",
    ),
    positive(
        "current_limit",
        "current",
        Need::Optional,
        range(0.1, 5e3),
        "most current it, its fuse or its protection lets through",
    ),
    ACCEPTS_RETURN,
];

/// Results of the kinds that are a voltage behind a resistance.
pub(super) static RESULTS: &[ResultRow] = &[
    result(
        "peak_power",
        "electrical_power",
        "the most power it can give, at half its open-circuit voltage; not a working point",
    ),
    result("peak_power_current", "current", "current at its peak power"),
    result("peak_power_voltage", "voltage", "voltage at its terminals at its peak power"),
    result(
        "peak_power_efficiency",
        "percentage",
        "power at its terminals over power inside, at its peak power",
    ),
    result("short_circuit_current", "current", "current into a short circuit at its terminals"),
];

const fn result(name: &'static str, kind: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity(kind), meaning }
}

/// A voltage behind a resistance, as a supply.
#[derive(Debug)]
pub(super) struct Stored {
    /// The law.
    pub law: Thevenin,
    /// What it says to sources.
    pub data: SupplyData,
}

impl Stored {
    /// From the field of its voltage.
    pub(super) fn read(values: &Values, voltage: &str) -> Self {
        let law = Thevenin {
            open_circuit: values.si(voltage).unwrap_or(0.0),
            resistance: values.si("resistance").unwrap_or(0.0),
        };
        let data = SupplyData {
            voltage: Some(law.open_circuit),
            resistance: Some(law.resistance),
            current_limit: values.si("current_limit"),
            accepts_return: values.flag("accepts_return"),
            ..SupplyData::default()
        };
        Self { law, data }
    }

    /// Its greatest power, where it is bounded.
    pub(super) fn given(&self) -> Vec<(&'static str, f64)> {
        let Thevenin { open_circuit, resistance } = self.law;
        if resistance <= 0.0 {
            return Vec::new();
        }
        let (peak, short) = (self.law.peak_power(), open_circuit / resistance);
        let current = 0.5 * short;
        vec![
            ("peak_power", peak),
            ("peak_power_current", current),
            ("peak_power_voltage", self.law.voltage(current)),
            ("peak_power_efficiency", peak / (open_circuit * current)),
            ("short_circuit_current", short),
        ]
    }
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    Ok(Model::Supply(Box::new(Stored::read(values, "open_circuit_voltage"))))
}

fn given(values: &Values) -> Vec<(&'static str, f64)> {
    Stored::read(values, "open_circuit_voltage").given()
}

impl Supply for Stored {
    fn data(&self) -> SupplyData {
        self.data
    }

    fn terminal(&self, current: f64) -> f64 {
        self.law.voltage(current)
    }

    fn symbols(&self, current: f64) -> Vec<(&'static str, f64)> {
        vec![("U_0", self.law.open_circuit), ("R", self.law.resistance), ("I", current)]
    }
}

#[cfg(test)]
mod tests {
    use super::{build, given};
    use crate::laws::testing::close;
    use crate::model::Model;
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn sags_under_load() {
        let values = Values::default().with("open_circuit_voltage", Si(37.0)).with("resistance", Si(0.110));
        let Ok(Model::Supply(pack)) = build(&values) else { panic!("no battery") };
        close(pack.terminal(29.2), 33.788, 1e-12);
        assert_eq!(pack.data().accepts_return, None);
        close(given(&values)[0].1, 37.0 * 37.0 / 0.44, 1e-12);
    }

    #[test]
    fn a_stiff_one_has_no_peak() {
        let values = Values::default().with("open_circuit_voltage", Si(37.0)).with("resistance", Si(0.0));
        assert!(given(&values).is_empty());
    }
}
