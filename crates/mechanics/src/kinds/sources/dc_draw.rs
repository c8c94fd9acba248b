//! The electrical side of a dc motor on its supply, with or without a loss-free controller between.

use crate::laws::dc_envelope::DcEnvelope;
use crate::model::{DrawLaw, Drawn};
use crate::scalar::Real;

/// Currents and voltages at a speed and a torque.
pub(super) struct DcDraw {
    /// The machine on its supply.
    pub envelope: DcEnvelope,
    /// Beyond this speed a motor that does not brake carries no current.
    pub idle_above: Option<f64>,
    /// Whether a resistor, not the supply, takes what comes back.
    pub into_resistor: bool,
}

impl DrawLaw for DcDraw {
    fn eval<R: Real>(&self, speed: R, effort: R) -> Drawn<R> {
        let DcEnvelope { dc, open_circuit, supply_resistance, motor_limit, .. } = self.envelope;
        let loaded = (effort + dc.loss_torque) / dc.k_t;
        let current = match self.idle_above {
            Some(above) => speed.piecewise(&[above], |piece, _| if piece == 0 { loaded } else { R::of(0.0) }),
            None => loaded,
        };
        let voltage = speed * dc.k_e + current * dc.resistance;
        let power = voltage * current;
        let drawn = if motor_limit.is_some() {
            let root = (power * (-4.0 * supply_resistance) + open_circuit * open_circuit).sqrt();
            power * 2.0 / (root + open_circuit)
        } else {
            current
        };
        let supply_current = if self.into_resistor { drawn.max(R::of(0.0)) } else { drawn };
        Drawn {
            current: Some(current),
            supply_current: Some(supply_current),
            voltage: Some(voltage),
            input_power: Some(power),
        }
    }
}
