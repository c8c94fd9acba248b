//! How a drive comes to rest: sources off, each brake biting after its apply time, the load driving all the while.

use super::assembly::Assembly;
use super::bracket::bracketed;
use super::flow::{Acting, Flow, flow};
use super::motion::{acceleration, has_inertia};
use super::points::{Off, range};
use super::quadrature::integrate;
use super::rest::about_to_move;
use super::run_up::smooth_pieces;
use crate::fault::{Fault, FaultKind, Note};
use crate::model::Known;
use crate::scalar::Real;
use crate::solution::Answer;

/// How a drive stops.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Stop {
    /// s
    pub time: f64,
    /// m or rad at the drive's own station, back and forth counted together.
    pub distance: f64,
    /// Greatest magnitude of the root's speed on the way.
    pub peak: f64,
}

/// A brake: the stage it sits at, its effort and when it bites.
#[derive(Clone, Copy, Debug)]
struct Bite {
    stage: usize,
    effort: f64,
    time: f64,
}

fn absent(why: &'static str) -> Answer {
    Answer::Absent(Note::plain(why))
}

fn bites(drive: &Assembly) -> Result<Vec<Bite>, Answer> {
    let mut bites = Vec::new();
    let mut faults = Vec::new();
    for (index, stage) in drive.stages.iter().enumerate() {
        let Some(brake) = drive.transmission(stage).and_then(|t| t.brake()) else { continue };
        match brake.apply_time {
            Known::Value(time) => {
                bites.push(Bite { stage: index, effort: brake.effort * stage.at.count, time });
            }
            Known::Missing(field) => {
                let why = Note::plain("until the brake bites the load drives on: its time has no default");
                let kind = FaultKind::Missing { any_of: vec![vec![field]], why };
                faults.push(Fault { part: Some(stage.at.part), kind });
            }
        }
    }
    bites.sort_by(|a, b| a.time.total_cmp(&b.time));
    if faults.is_empty() { Ok(bites) } else { Err(Answer::Refused(faults)) }
}

/// Whether the load, sources off, would make the drive faster than it is at `x`.
pub(crate) fn load_drives_on(drive: &Assembly, x: f64) -> bool {
    let back = x < 0.0;
    let net = flow(drive, x, back, &Off(drive)).net;
    if back { net < 0.0 } else { net > 0.0 }
}

/// Follows the drive from speed `x` of the root to rest.
pub(crate) fn stop(drive: &Assembly, x: f64) -> Result<Stop, Answer> {
    let bites = bites(drive)?;
    if !drive.missing_inertia.is_empty() {
        return Err(Answer::Refused(drive.missing_inertia.clone()));
    }
    if !has_inertia(drive) {
        return Err(absent("nothing in this drive has inertia: it stops at once, or not at all"));
    }
    let mut run =
        Run { drive, x, time: 0.0, path: 0.0, peak: x.abs(), brakes: vec![0.0; drive.stages.len()] };
    for bite in &bites {
        run.until(bite.time)?;
        run.brakes[bite.stage] += bite.effort;
    }
    run.come_to_rest(!bites.is_empty())?;
    let station = drive.shaft_of(None, None).map_or(1.0, |shaft| drive.shafts[shaft].speed);
    Ok(Stop { time: run.time, distance: run.path * station, peak: run.peak })
}

/// A drive on its way to rest.
struct Run<'a> {
    drive: &'a Assembly,
    x: f64,
    time: f64,
    path: f64,
    peak: f64,
    brakes: Vec<f64>,
}

/// Efforts at rest with the brakes that bite.
struct Braked<'a> {
    rest: &'a Flow<f64>,
    brakes: &'a [f64],
}

impl<R: Real> Acting<R> for Braked<'_> {
    fn source(&self, _: usize, _: R) -> R {
        R::of(0.0)
    }
    fn load(&self, index: usize, _: R) -> R {
        R::of(self.rest.loads[index])
    }
    fn brake(&self, index: usize) -> f64 {
        self.brakes[index]
    }
}

/// Steps of the follower before it gives up.
const STEPS: usize = 20_000;

impl Run<'_> {
    /// Acceleration at a speed, moving one way; a speed that has passed zero counts as just short of it.
    fn rate(&self, x: f64, back: bool) -> f64 {
        let (near, _) = range(self.drive);
        let x = if back { f64::min(x, -near) } else { f64::max(x, near) };
        acceleration(self.drive, x, back, &flow(self.drive, x, back, &Off(self.drive)), &self.brakes)
    }

    /// Which way it leaves rest: 0 if it is held.
    fn leaves(&self) -> f64 {
        let (near, _) = range(self.drive);
        let net = |back: bool| {
            let rest = about_to_move(self.drive, back, false);
            let x = if back { -near } else { near };
            flow(self.drive, x, back, &Braked { rest: &rest, brakes: &self.brakes }).net
        };
        if net(false) > 0.0 {
            1.0
        } else if net(true) < 0.0 {
            -1.0
        } else {
            0.0
        }
    }

    /// Follows the drive up to a time.
    fn until(&mut self, end: f64) -> Result<(), Answer> {
        let mut step = (end - self.time) / 64.0;
        for _ in 0..STEPS {
            if self.time >= end {
                return Ok(());
            }
            let mut back = self.x < 0.0;
            if self.x == 0.0 {
                let way = self.leaves();
                if way == 0.0 {
                    self.time = end;
                    return Ok(());
                }
                back = way < 0.0;
            }
            step = f64::min(step, end - self.time);
            if step <= f64::EPSILON * end {
                self.time = end;
                return Ok(());
            }
            step = self.advance(step, back);
        }
        Err(absent("how it stops did not settle"))
    }

    /// One step of Dormand and Prince's pair of orders 5 and 4; gives the next step to try.
    fn advance(&mut self, step: f64, back: bool) -> f64 {
        let (next, path, error) = self.try_step(step, back);
        let size = f64::max(self.x.abs(), next.abs()) + 1e-9 * self.drive.scale;
        let off = error / (1e-11 * size);
        if off > 1.0 && step > 1e-14 * (self.time + step) {
            return step * f64::max(0.2, 0.9 * libm::pow(off, -0.2));
        }
        let passed = (self.x > 0.0 && next < 0.0) || (self.x < 0.0 && next > 0.0);
        let (taken, next, path) = if passed {
            let taken = bracketed(|h| self.try_step(h, back).0, 0.0, step);
            (taken, 0.0, self.try_step(taken, back).1)
        } else {
            (step, next, path)
        };
        self.x = next;
        self.time += taken;
        self.path += path.abs();
        self.peak = f64::max(self.peak, next.abs());
        step * f64::min(4.0, 0.9 * libm::pow(f64::max(off, 1e-6), -0.2))
    }

    /// Speed and way after a step, and how uncertain the speed is.
    fn try_step(&self, h: f64, back: bool) -> (f64, f64, f64) {
        let x = self.x;
        let k1 = self.rate(x, back);
        let k2 = self.rate(x + h * k1 / 5.0, back);
        let k3 = self.rate(x + h * (3.0 / 40.0 * k1 + 9.0 / 40.0 * k2), back);
        let k4 = self.rate(x + h * (44.0 / 45.0 * k1 - 56.0 / 15.0 * k2 + 32.0 / 9.0 * k3), back);
        let sum5 =
            19_372.0 / 6561.0 * k1 - 25_360.0 / 2187.0 * k2 + 64_448.0 / 6561.0 * k3 - 212.0 / 729.0 * k4;
        let k5 = self.rate(x + h * sum5, back);
        let sum6 = 9017.0 / 3168.0 * k1 - 355.0 / 33.0 * k2 + 46_732.0 / 5247.0 * k3 + 49.0 / 176.0 * k4
            - 5103.0 / 18_656.0 * k5;
        let k6 = self.rate(x + h * sum6, back);
        let mean = 35.0 / 384.0 * k1 + 500.0 / 1113.0 * k3 + 125.0 / 192.0 * k4 - 2187.0 / 6784.0 * k5
            + 11.0 / 84.0 * k6;
        let next = x + h * mean;
        let k7 = self.rate(next, back);
        let apart = 71.0 / 57_600.0 * k1 - 71.0 / 16_695.0 * k3 + 71.0 / 1920.0 * k4
            - 17_253.0 / 339_200.0 * k5
            + 22.0 / 525.0 * k6
            - k7 / 40.0;
        // The way by Hermite's cubic through both ends: exact to the order of the pair's step.
        let path = h * 0.5 * (x + next) + h * h / 12.0 * (k1 - k7);
        (next, path, (h * apart).abs())
    }

    /// Follows the drive to rest under the brakes that bite.
    fn come_to_rest(&mut self, braked: bool) -> Result<(), Answer> {
        let fails = if braked {
            "the brake does not bring the load to rest"
        } else {
            "nothing brings it to rest when the source is off: no brake, and friction alone does not do it"
        };
        if self.x != 0.0 {
            let (top, back) = (self.x.abs(), self.x < 0.0);
            let sign = if back { -1.0 } else { 1.0 };
            let slowing = |x: f64| -sign * self.rate(sign * x, back);
            let (near, _) = range(self.drive);
            if slowing(near) <= 1e-9 * slowing(top).abs() {
                return Err(absent(fails));
            }
            let pieces: Vec<(f64, f64)> = if back {
                smooth_pieces(self.drive, -top, 0.0).into_iter().map(|(a, b)| (-b, -a)).collect()
            } else {
                smooth_pieces(self.drive, 0.0, top)
            };
            let rate = |x: f64| {
                let a = slowing(x);
                (a > 0.0).then(|| [1.0 / a, x / a])
            };
            let Some([time, way]) = integrate(rate, &pieces) else { return Err(absent(fails)) };
            self.time += time;
            self.path += way;
            self.x = 0.0;
        }
        if self.leaves() != 0.0 {
            return Err(absent("it comes to rest but is not held there"));
        }
        Ok(())
    }
}
