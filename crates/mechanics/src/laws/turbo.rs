//! A pump or fan on a system: where its curve meets what the system asks, at any speed.
//!
//! Formula: at the speed w_r of the curve the machine gives `H_q = a + b*q + c*q^2` between two points, shaft power runs
//! straight between them; at another speed `H = H_q * (w / w_r)^2` with `Q = q * w / w_r`; the system asks
//! `H = H_s + H_f * (Q / Q_f)^2`. Together `a + b*q + (c - k)*q^2 = H_s * (w_r / w)^2`, `k = H_f / Q_f^2`.
//! Symbols: H head (m) or pressure (Pa); H_s static head or back pressure; H_f friction at the flow Q_f (m³/s); q, H_q
//! flow and head on the curve; w speed (rad/s).
//! Validity: the stable branch, where the head falls as the flow rises. Below the speed at which the head at no flow
//! passes the static head a check valve is taken to be shut: no flow, the shaft power of the closed valve.
//! Source: affinity laws and system curves, usual handbooks of pumps and fans; points joined by straight lines.
//! Revision: 1

use super::Checked;
use crate::curve::Law;
use crate::registry::Formula;
use crate::scalar::Real;

/// Head a system asks.
pub const SYSTEM_HEAD: Formula = Formula {
    name: "system_head",
    text: "H_s + H_f * (Q / Q_f)^2",
    symbols: &[
        ("H_s", "length", "static head"),
        ("H_f", "length", "head lost to friction at the flow Q_f"),
        ("Q", "flow", "flow"),
        ("Q_f", "flow", "flow of the stated friction"),
    ],
    validity: "turbulent flow, valves as they stand",
    source: "system curves, usual handbooks of pumps",
    revision: 1,
};

/// Pressure a system asks.
pub const SYSTEM_PRESSURE: Formula = Formula {
    name: "system_pressure",
    text: "p_s + p_f * (Q / Q_f)^2",
    symbols: &[
        ("p_s", "pressure", "back pressure"),
        ("p_f", "pressure", "pressure lost to friction at the flow Q_f"),
        ("Q", "flow", "flow"),
        ("Q_f", "flow", "flow of the stated friction"),
    ],
    validity: "turbulent flow, dampers as they stand",
    source: "system curves, usual handbooks of fans",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked { formula: &SYSTEM_HEAD, domain: DOMAIN, kernel: system },
    Checked { formula: &SYSTEM_PRESSURE, domain: DOMAIN, kernel: system },
];

const DOMAIN: &[(f64, f64)] = &[(0.0, 50.0), (0.0, 50.0), (0.0, 2.0), (0.01, 2.0)];

fn system(x: &[f64]) -> f64 {
    System { fixed: x[0], friction: x[1] / (x[3] * x[3]) }.asks(x[2])
}

/// What a system asks: a fixed part, and friction with the square of the flow.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct System {
    /// Static head or back pressure.
    pub fixed: f64,
    /// Friction per square of the flow.
    pub friction: f64,
}

impl System {
    /// At a flow.
    #[must_use]
    pub fn asks(&self, flow: f64) -> f64 {
        self.fixed + self.friction * flow * flow
    }
}

/// A point of a curve: flow, head or pressure, shaft power.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point {
    /// m³/s
    pub flow: f64,
    /// m or Pa
    pub head: f64,
    /// W
    pub power: f64,
}

/// Between two points of a curve.
#[derive(Clone, Copy, Debug, PartialEq)]
struct Piece {
    from: f64,
    to: f64,
    /// Head by powers of the flow, 0 to 2.
    head: [f64; 3],
    /// Power by powers of the flow, 0 and 1.
    power: [f64; 2],
    /// The speed, in shares of the curve's, from which the flow lies here; 0 without a fixed part.
    ratio: f64,
}

/// Why a machine and a system have no sole operating point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum NoFlow {
    /// Fewer than two points, or two at one flow.
    NoCurve,
    /// The static head can only be judged against the head at no flow.
    NoClosedValve,
    /// The flow would lie beyond the last point.
    Beyond,
    /// The curves meet more than once.
    Twice,
}

/// What the machine answers at a speed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Out {
    /// Torque at its shaft.
    Torque,
    /// Flow.
    Flow,
    /// Head or pressure.
    Head,
    /// Shaft power at the similar point of the curve.
    CurvePower,
    /// Flow at the similar point of the curve.
    CurveFlow,
    /// Head at the similar point of the curve.
    CurveHead,
    /// Flow times head.
    Lifted,
    /// Flow times head over shaft power.
    Share,
}

/// A machine on its system.
#[derive(Clone, Debug, PartialEq)]
pub struct Turbo {
    speed: f64,
    /// Before the flow begins: head and power at no flow.
    closed: (f64, f64),
    fixed: f64,
    friction: f64,
    pieces: Vec<Piece>,
    breaks: Vec<f64>,
    /// The sole similar flow where there is no fixed part, and its piece.
    sole: Option<(usize, f64)>,
    /// Head at no flow is reached again by a falling branch that begins at this flow: a jump when above zero.
    opens_at: f64,
}

impl Turbo {
    /// A machine with one similar point at every speed: no static head.
    #[must_use]
    pub fn similar(speed: f64, point: Point) -> Self {
        let piece = Piece {
            from: 0.0,
            to: f64::INFINITY,
            head: [point.head, 0.0, 0.0],
            power: [point.power, 0.0],
            ratio: 0.0,
        };
        Self {
            speed,
            closed: (point.head, point.power),
            fixed: 0.0,
            friction: 0.0,
            pieces: vec![piece],
            breaks: Vec::new(),
            sole: Some((0, point.flow)),
            opens_at: 0.0,
        }
    }

    /// A machine whose valve or damper is shut.
    #[must_use]
    pub fn shut(speed: f64, head: f64, power: f64) -> Self {
        Self::similar(speed, Point { flow: 0.0, head, power })
    }

    /// Through points, straight between them.
    ///
    /// # Errors
    /// The points and the system have no sole operating point.
    pub fn through(speed: f64, mut points: Vec<Point>, system: System) -> Result<Self, NoFlow> {
        points.sort_by(|a, b| a.flow.total_cmp(&b.flow));
        if points.len() < 2 || points.windows(2).any(|p| p[0].flow >= p[1].flow) {
            return Err(NoFlow::NoCurve);
        }
        let straight = |pair: &[Point]| {
            let width = pair[1].flow - pair[0].flow;
            let (rise, gain) =
                ((pair[1].head - pair[0].head) / width, (pair[1].power - pair[0].power) / width);
            Piece {
                from: pair[0].flow,
                to: pair[1].flow,
                head: [pair[0].head - rise * pair[0].flow, rise, 0.0],
                power: [pair[0].power - gain * pair[0].flow, gain],
                ratio: 0.0,
            }
        };
        Self::on(speed, points.windows(2).map(straight).collect(), system)
    }

    /// By the heads at no flow and at the rated flow: a parabola, the power straight between.
    ///
    /// # Errors
    /// The curve and the system have no operating point.
    pub fn parabola(speed: f64, closed: Point, rated: Point, system: System) -> Result<Self, NoFlow> {
        let square = rated.flow * rated.flow;
        let piece = Piece {
            from: 0.0,
            to: f64::INFINITY,
            head: [closed.head, 0.0, (rated.head - closed.head) / square],
            power: [closed.power, (rated.power - closed.power) / rated.flow],
            ratio: 0.0,
        };
        Self::on(speed, vec![piece], system)
    }

    fn on(speed: f64, mut pieces: Vec<Piece>, system: System) -> Result<Self, NoFlow> {
        let first = pieces.first().ok_or(NoFlow::NoCurve)?;
        let closed = (first.head_at(first.from), first.power_at(first.from));
        if system.fixed > 0.0 && first.from > 0.0 {
            return Err(NoFlow::NoClosedValve);
        }
        // Of the branch that falls from the head at no flow to where the system asks nothing more.
        let k = system.friction;
        let target = if first.from > 0.0 { f64::INFINITY } else { closed.0 };
        let (start, opens_at) = falling_from(&pieces, k, target)?;
        pieces.drain(..start);
        if !pieces.iter().all(|piece| piece.falls(k, f64::max(piece.from, opens_at))) {
            return Err(NoFlow::Twice);
        }
        for piece in &mut pieces {
            let from = f64::max(piece.from, opens_at);
            let level = piece.head_at(from) - k * from * from;
            piece.ratio = if level > 0.0 { (system.fixed / level).sqrt() } else { f64::INFINITY };
        }
        pieces.retain(|piece| piece.ratio.is_finite());
        let mut out = Self {
            speed,
            closed,
            fixed: system.fixed,
            friction: k,
            breaks: Vec::new(),
            pieces,
            sole: None,
            opens_at,
        };
        let last = out.pieces.last().ok_or(NoFlow::Beyond)?;
        if system.fixed > 0.0 {
            out.breaks = out.pieces.iter().map(|piece| piece.ratio * speed).collect();
        } else {
            let flow: f64 = last.flow(k, 0.0);
            if !flow.is_finite() || flow > last.to * (1.0 + 1e-9) {
                return Err(NoFlow::Beyond);
            }
            out.sole = Some((out.pieces.len() - 1, flow));
        }
        Ok(out)
    }

    /// The speed of its curve.
    #[must_use]
    pub fn speed(&self) -> f64 {
        self.speed
    }

    /// The speeds at which the flow lies within the points, where their last one bounds it.
    #[must_use]
    pub fn measured(&self) -> Option<(f64, f64)> {
        let last = self.pieces.last().filter(|last| self.sole.is_none() && last.to.is_finite())?;
        let level = last.head_at(last.to) - self.friction * last.to * last.to;
        (level > 0.0).then(|| (0.0, self.speed * (self.fixed / level).sqrt()))
    }

    /// One of its answers, as a law of a speed of zero or above.
    #[must_use]
    pub fn law(&self, out: Out, scale: f64) -> TurboLaw {
        TurboLaw { turbo: self.clone(), out, scale }
    }

    /// Flow, head and power at the similar point of the curve, for a speed of zero or above.
    fn point<R: Real>(&self, piece: usize, speed: R) -> (R, R, R) {
        let shut = (R::of(0.0), R::of(self.closed.0), R::of(self.closed.1));
        let (piece, flow) = match self.sole {
            Some((piece, flow)) => (&self.pieces[piece], R::of(flow)),
            None if piece == 0 => return shut,
            None => {
                let piece = &self.pieces[piece - 1];
                let level = R::of(self.fixed * self.speed * self.speed) / speed.square();
                (piece, piece.flow(self.friction, level))
            }
        };
        (flow, piece.head_at(flow), piece.power_at(flow))
    }
}

/// The first piece of the branch that falls from a level, and the flow at which it has this level.
fn falling_from(pieces: &[Piece], k: f64, level: f64) -> Result<(usize, f64), NoFlow> {
    if level == f64::INFINITY {
        return Ok((0, 0.0));
    }
    for (index, piece) in pieces.iter().enumerate().rev() {
        let below = |q: f64| piece.head_at(q) - k * q * q <= level * (1.0 + 1e-12);
        let ends_below = piece.to.is_infinite() || below(piece.to);
        if !ends_below {
            continue;
        }
        let flow: f64 = piece.flow(k, level);
        if flow.is_finite() && flow >= piece.from * (1.0 - 1e-12) && flow <= piece.to {
            return Ok((index, f64::max(flow, 0.0)));
        }
    }
    Err(NoFlow::Beyond)
}

impl Piece {
    fn head_at<R: Real>(&self, flow: R) -> R {
        (flow * self.head[2] + self.head[1]) * flow + self.head[0]
    }

    fn power_at<R: Real>(&self, flow: R) -> R {
        flow * self.power[1] + self.power[0]
    }

    /// Whether the head less the friction falls from this flow on.
    fn falls(&self, k: f64, flow: f64) -> bool {
        let square = k - self.head[2];
        let slope = self.head[1] - 2.0 * square * flow;
        slope < 0.0 || (slope == 0.0 && square > 0.0)
    }

    /// The greater flow at which head less friction has this level.
    fn flow<R: Real>(&self, k: f64, level: R) -> R {
        let (square, straight) = (k - self.head[2], -self.head[1]);
        let left = -level + self.head[0];
        let root = (left * (4.0 * square) + straight * straight).sqrt();
        if straight > 0.0 { left * 2.0 / (root + straight) } else { (root - straight) / (2.0 * square) }
    }
}

/// An answer of a machine over its speed.
#[derive(Clone, Debug, PartialEq)]
pub struct TurboLaw {
    turbo: Turbo,
    out: Out,
    scale: f64,
}

impl Law for TurboLaw {
    fn eval<R: Real>(&self, speed: R) -> R {
        let turbo = &self.turbo;
        speed.piecewise(&turbo.breaks, |piece, speed| {
            let (flow, head, power) = turbo.point(piece, speed);
            let ratio = speed / turbo.speed;
            let square = ratio.square();
            let value = match self.out {
                Out::Torque => power * square / turbo.speed,
                Out::Flow => flow * ratio,
                Out::Head => head * square,
                Out::CurvePower => power,
                Out::CurveFlow => flow,
                Out::CurveHead => head,
                Out::Lifted => flow * head * square * ratio,
                Out::Share => flow * head / power,
            };
            value * self.scale
        })
    }

    fn jumps(&self) -> Vec<f64> {
        let first = self.turbo.breaks.first().filter(|_| self.turbo.opens_at > 0.0);
        first.copied().into_iter().collect()
    }

    fn kinks(&self) -> Vec<f64> {
        self.turbo.breaks.clone()
    }
}

#[cfg(test)]
mod tests;
