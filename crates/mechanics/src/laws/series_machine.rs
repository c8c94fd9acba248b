//! A series-wound dc machine: its current makes its own field.
//!
//! Formula: `T = k * I^2 - T_0` with `I = U_0 / (R + R_s + k * w)`; k is constant while the iron is not saturated, and the
//! flux over current of the measured points at this current where there are several.
//! Symbols: T torque at the shaft (N·m); k series constant, induced voltage per speed and current (N·m/A²); I current
//! (A); T_0 loss torque (N·m); U_0 open-circuit voltage (V); R, R_s resistance of motor and supply (Ω); w speed (rad/s).
//! Validity: steady state on direct voltage. Between points flux and loss torque go straight over the current, below the
//! first the flux goes straight to zero. Turned backwards the machine is counted with its torque at standstill. Without
//! load nothing but the loss torque bounds the speed.
//! Source: equivalent circuit of the dc machine, common practice.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;
use std::sync::Arc;

/// Torque at full voltage.
pub const TORQUE: Formula = Formula {
    name: "torque",
    text: "k * (U_0 / (R + R_s + k * w))^2 - T_0",
    symbols: &[
        ("k", "series_constant", "series constant, at this current where the iron saturates"),
        ("U_0", "voltage", "open-circuit voltage of the supply"),
        ("R", "resistance", "resistance of armature and field, warm, with brushes"),
        ("R_s", "resistance", "resistance of the supply as this machine sees it"),
        ("w", "rotational_speed", "speed"),
        ("T_0", "torque", "loss torque at this current"),
    ],
    validity: "below every current limit, not turned backwards",
    source: "equivalent circuit of the dc machine, common practice",
    revision: 1,
};

/// The series constant from a measured point.
pub const SERIES_CONSTANT: Formula = Formula {
    name: "series_constant",
    text: "(U - R * I) / (w * I)",
    symbols: &[
        ("U", "voltage", "voltage at the motor at the point"),
        ("R", "resistance", "resistance of armature and field, as at the point"),
        ("I", "current", "current at the point"),
        ("w", "rotational_speed", "speed at the point"),
    ],
    validity: "at the point's current",
    source: "equivalent circuit of the dc machine, common practice",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &TORQUE,
        domain: &[(1e-3, 0.5), (10.0, 800.0), (0.01, 5.0), (0.0, 2.0), (0.0, 500.0), (0.0, 2.0)],
        kernel: |x| bare(x[0], x[5], x[2], x[3], x[1]).eval(x[4]),
    },
    Checked {
        formula: &SERIES_CONSTANT,
        domain: &[(50.0, 800.0), (0.01, 0.5), (1.0, 50.0), (10.0, 400.0)],
        kernel: |x| induced_flux(x[0], x[1], x[2], x[3]) / x[2],
    },
];

fn bare(k: f64, loss: f64, resistance: f64, supply: f64, voltage: f64) -> SeriesEnvelope {
    SeriesEnvelope {
        magnet: Magnet::straight(k, loss),
        resistance,
        open_circuit: voltage,
        supply_resistance: supply,
        supply_limit: None,
        motor_limit: None,
    }
}

/// Flux (V·s/rad) at a measured point.
#[must_use]
pub fn induced_flux(voltage: f64, resistance: f64, current: f64, speed: f64) -> f64 {
    (voltage - resistance * current) / speed
}

/// A point of the magnetisation.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Knot {
    /// A, above zero.
    pub current: f64,
    /// V·s/rad, which is N·m/A; above zero.
    pub flux: f64,
    /// N·m
    pub loss: f64,
}

impl Knot {
    /// Torque at the shaft.
    fn torque(&self) -> f64 {
        self.flux * self.current - self.loss
    }
}

/// Straight pieces over the current: `flux = a + b I`, `loss = c + d I`.
#[derive(Clone, Copy, Debug)]
struct Piece {
    a: f64,
    b: f64,
    c: f64,
    d: f64,
}

/// Flux and loss torque over the current, a copy shares them.
#[derive(Clone, Debug, PartialEq)]
pub struct Magnet {
    knots: Arc<[Knot]>,
}

impl Magnet {
    /// Without saturation.
    #[must_use]
    pub fn straight(k: f64, loss: f64) -> Self {
        Self { knots: Arc::new([Knot { current: 1.0, flux: k, loss }]) }
    }

    /// Through points; `None` unless flux and torque rise with the current.
    #[must_use]
    pub fn new(mut knots: Vec<Knot>) -> Option<Self> {
        knots.sort_by(|a, b| a.current.total_cmp(&b.current));
        let good =
            knots.iter().all(|k| k.current > 0.0 && k.flux > 0.0 && k.flux.is_finite() && k.loss >= 0.0);
        let rising = knots
            .windows(2)
            .all(|w| w[1].current > w[0].current && w[1].flux >= w[0].flux && w[1].torque() > w[0].torque());
        (good && rising && !knots.is_empty()).then(|| Self { knots: knots.into() })
    }

    fn piece(&self, index: usize) -> Piece {
        let Some(first) = self.knots.first() else { return Piece { a: 0.0, b: 1.0, c: 0.0, d: 0.0 } };
        if index == 0 {
            return Piece { a: 0.0, b: first.flux / first.current, c: first.loss, d: 0.0 };
        }
        let (from, to) = (self.knots[index - 1], self.knots[index]);
        let span = to.current - from.current;
        let (b, d) = ((to.flux - from.flux) / span, (to.loss - from.loss) / span);
        Piece { a: from.flux - b * from.current, b, c: from.loss - d * from.current, d }
    }

    /// The knots between pieces; the last piece goes on beyond the last knot.
    fn inner(&self) -> &[Knot] {
        &self.knots[..self.knots.len().saturating_sub(1)]
    }

    /// Flux and loss torque at a current.
    #[must_use]
    pub fn at(&self, current: f64) -> (f64, f64) {
        let piece = self.piece(self.inner().partition_point(|k| k.current <= current));
        (piece.a + piece.b * current, piece.c + piece.d * current)
    }

    /// Torque at the shaft at a current.
    pub fn torque<R: Real>(&self, current: R) -> R {
        let breaks: Vec<f64> = self.inner().iter().map(|k| k.current).collect();
        current.piecewise(&breaks, |index, i| {
            let Piece { a, b, c, d } = self.piece(index);
            i.square() * b + i * (a - d) - c
        })
    }

    /// Induced voltage at a current and a speed.
    pub fn induced<R: Real>(&self, current: R, speed: R) -> R {
        let breaks: Vec<f64> = self.inner().iter().map(|k| k.current).collect();
        let flux = current.piecewise(&breaks, |index, i| {
            let Piece { a, b, .. } = self.piece(index);
            i * b + a
        });
        flux * speed
    }

    /// The current that gives a torque at the shaft.
    pub fn current<R: Real>(&self, torque: R) -> R {
        let breaks: Vec<f64> = self.inner().iter().map(Knot::torque).collect();
        torque.piecewise(&breaks, |index, torque| {
            let Piece { a, b, c, d } = self.piece(index);
            let gap = (torque + c).max(R::of(0.0));
            if index == 0 {
                return (gap / b).sqrt();
            }
            let line = a - d;
            gap * 2.0 / ((gap * (4.0 * b) + line * line).sqrt() + line)
        })
    }

    /// The lowest current measured.
    #[must_use]
    pub fn lowest(&self) -> f64 {
        self.knots.first().map_or(1.0, |k| k.current)
    }

    /// Whether there are several points.
    #[must_use]
    pub fn saturates(&self) -> bool {
        self.knots.len() > 1
    }
}

/// A machine on its supply.
#[derive(Clone, Debug, PartialEq)]
pub struct SeriesEnvelope {
    /// Flux and losses.
    pub magnet: Magnet,
    /// Resistance of armature and field, warm, Ω, above zero.
    pub resistance: f64,
    /// Open-circuit voltage of the supply, V, above zero.
    pub open_circuit: f64,
    /// Resistance of the supply as this machine sees it, Ω.
    pub supply_resistance: f64,
    /// Most current of the supply for this machine, A.
    pub supply_limit: Option<f64>,
    /// Most current of the motor, A: it hangs on a controller.
    pub motor_limit: Option<f64>,
}

impl SeriesEnvelope {
    /// The speed at a current at full voltage.
    #[must_use]
    pub fn speed(&self, current: f64) -> f64 {
        let drop = (self.resistance + self.supply_resistance) * current;
        (self.open_circuit - drop) / self.magnet.at(current).0
    }

    /// The speed without load; none where no loss torque bounds it.
    #[must_use]
    pub fn no_load_speed(&self) -> Option<f64> {
        let current = self.magnet.current(0.0);
        (current > 0.0).then(|| self.speed(current)).filter(|speed| speed.is_finite())
    }

    /// Power that the supply's limit lets a controller pass.
    #[must_use]
    pub fn power_limit(&self) -> Option<f64> {
        self.motor_limit?;
        let half = if self.supply_resistance > 0.0 {
            self.open_circuit / (2.0 * self.supply_resistance)
        } else {
            f64::INFINITY
        };
        let cap = self.supply_limit.map_or(half, |limit| f64::min(limit, half));
        cap.is_finite().then_some((self.open_circuit - self.supply_resistance * cap) * cap)
    }

    /// Current at full command.
    pub fn current<R: Real>(&self, speed: R) -> R {
        let speed = speed.max(R::of(0.0));
        let total = self.resistance + self.supply_resistance;
        let knots = self.magnet.inner();
        // With growing speed the current falls from piece to piece.
        let breaks: Vec<f64> = knots.iter().rev().map(|k| self.speed(k.current)).collect();
        let mut current = speed.piecewise(&breaks, |index, w| {
            let Piece { a, b, .. } = self.magnet.piece(knots.len() - index);
            (-(w * a) + self.open_circuit) / (w * b + total)
        });
        if let Some(power) = self.power_limit() {
            let at = |k: &Knot| (power / k.current - self.resistance * k.current) / k.flux;
            let breaks: Vec<f64> = knots.iter().rev().map(at).collect();
            let limited = speed.piecewise(&breaks, |index, w| {
                let Piece { a, b, .. } = self.magnet.piece(knots.len() - index);
                let line = w * a;
                let square = line.square() + (w * b + self.resistance) * (4.0 * power);
                R::of(2.0 * power) / (square.sqrt() + line)
            });
            current = current.min(limited);
        } else if let Some(limit) = self.supply_limit {
            current = current.min(R::of(limit));
        }
        match self.motor_limit {
            Some(limit) => current.min(R::of(limit)),
            None => current,
        }
    }
}

impl Law for SeriesEnvelope {
    fn eval<R: Real>(&self, speed: R) -> R {
        self.magnet.torque(self.current(speed).max(R::of(0.0)))
    }

    fn kinks(&self) -> Vec<f64> {
        let limits = self.motor_limit.into_iter().chain(self.supply_limit);
        let mut kinks: Vec<f64> = limits.map(|limit| self.speed(limit)).collect();
        kinks.extend(self.magnet.inner().iter().map(|k| self.speed(k.current)));
        kinks.push(0.0);
        kinks.retain(|x| x.is_finite());
        kinks.sort_by(f64::total_cmp);
        kinks
    }
}

#[cfg(test)]
mod tests;
