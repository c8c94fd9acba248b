//! The electrical side of an induction machine given by its circuit.

use crate::laws::induction_circuit::CircuitCurve;
use crate::model::{DrawLaw, Drawn};
use crate::scalar::Real;

/// Currents and powers at a speed and a torque.
pub(super) struct CircuitDraw {
    /// The machine over its speed.
    pub curve: CircuitCurve,
}

/// Below this share of the breakdown torque two torques are both nothing.
const TRACE: f64 = 1e-9;

impl DrawLaw for CircuitDraw {
    fn eval<R: Real>(&self, speed: R, effort: R) -> Drawn<R> {
        let curve = &self.curve;
        if curve.circuit.magnetizing.is_none() {
            // Without its magnetising branch the circuit gives no current of the stator.
            return Drawn::NOTHING;
        }
        let slip = curve.slip(speed);
        // At a speed that is stated the voltage is lowered until the torque fits: torque and power go with its square.
        let trace = TRACE * curve.air_gap_torque(curve.breakdown_slip());
        let trace = slip.piecewise(&[0.0], |piece, _| R::of(if piece == 0 { -trace } else { trace }));
        let share = (effort + curve.friction(speed) + trace) / (curve.air_gap_torque(slip) + trace);
        let share = share.max(R::of(0.0));
        let (active, _) = curve.power(slip);
        let current = curve.phase_current(slip) * curve.line_factor(speed, share);
        Drawn {
            current: Some(current),
            supply_current: Some(current),
            voltage: Some(share.sqrt() * (curve.circuit.voltage * 3.0_f64.sqrt() / curve.lines)),
            input_power: Some(active * share),
        }
    }
}
