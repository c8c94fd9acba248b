//! What a supply must answer, and what a source sees of it.

use std::fmt::Debug;

use crate::solution::Answer;

/// What a supply feeds with.
#[derive(Clone, Copy, Debug, PartialEq, Default)]
pub struct SupplyData {
    /// Voltage without load, V.
    pub voltage: Option<f64>,
    /// Frequency, Hz; none for direct current.
    pub frequency: Option<f64>,
    /// Inner resistance with its leads, Ω; `Some(0.0)` where it is declared stiff, `None` where nothing is said.
    pub resistance: Option<f64>,
    /// Most current it gives, A.
    pub current_limit: Option<f64>,
    /// Whether it takes power back; `None` where nothing is said.
    pub accepts_return: Option<bool>,
    /// Pressure difference of a hydraulic or pneumatic supply, Pa.
    pub pressure: Option<f64>,
    /// Most flow it gives, m³/s.
    pub flow_limit: Option<f64>,
}

/// A supply.
pub trait Supply: Debug + Send + Sync {
    /// What it feeds with.
    fn data(&self) -> SupplyData;

    /// Voltage (or pressure) at its terminals while it gives this current (or flow); a current below zero comes back.
    fn terminal(&self, current: f64) -> f64 {
        let data = self.data();
        match (data.voltage, data.pressure) {
            (Some(voltage), _) => voltage - data.resistance.unwrap_or(0.0) * current,
            (None, pressure) => pressure.unwrap_or(0.0),
        }
    }

    /// Results of its own, `None` if it has no result of this name.
    fn answer(&self, _name: &str, _current: f64) -> Option<Answer> {
        None
    }

    /// Values of the symbols in its row's formulas.
    fn symbols(&self, _current: f64) -> Vec<(&'static str, f64)> {
        Vec::new()
    }
}

/// What a source hangs on.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Feed {
    /// The supply of its field `supply`; `None` when it names none.
    pub supply: Option<SupplyData>,
    /// How many equal machines hang on that supply and pull it down together, itself included: each sees `machines`
    /// times the supply's resistance and a `machines`-th of its current limit.
    pub machines: f64,
    /// Ambient temperature, K, where the drive gives it.
    pub ambient: Option<f64>,
    /// Altitude, m, where the drive gives it.
    pub altitude: Option<f64>,
}
