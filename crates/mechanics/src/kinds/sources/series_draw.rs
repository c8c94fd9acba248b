//! The electrical side of a series motor on its supply, with or without a loss-free controller between.

use crate::laws::series_machine::SeriesEnvelope;
use crate::model::{DrawLaw, Drawn};
use crate::scalar::Real;

/// Currents and voltages at a speed and a torque.
pub(super) struct SeriesDraw {
    /// The machine on its supply.
    pub envelope: SeriesEnvelope,
}

impl DrawLaw for SeriesDraw {
    fn eval<R: Real>(&self, speed: R, effort: R) -> Drawn<R> {
        let SeriesEnvelope { magnet, resistance, open_circuit, supply_resistance, motor_limit, .. } =
            &self.envelope;
        let current = magnet.current(effort);
        let voltage = magnet.induced(current, speed) + current * *resistance;
        let power = voltage * current;
        let supply_current = if motor_limit.is_some() {
            let root = (power * (-4.0 * supply_resistance) + open_circuit * open_circuit).sqrt();
            power * 2.0 / (root + *open_circuit)
        } else {
            current
        };
        Drawn {
            current: Some(current),
            supply_current: Some(supply_current),
            voltage: Some(voltage),
            input_power: Some(power),
        }
    }
}
