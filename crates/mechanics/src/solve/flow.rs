//! How speed and effort pass through the shafts, in numbers of any kind.
//!
//! All speeds are fixed multiples of one coordinate x, the speed of the root shaft. Efforts are gathered from the
//! ends of the tree toward the root; at every stage the losses are those of the direction in which power flows
//! there. What is left at the root is the net effort: zero at an operating point.

use super::assembly::{Assembly, Far};
use crate::scalar::Real;

/// What acts on the shafts, beside the chain itself.
pub(crate) trait Acting<R> {
    /// Effort of each machine of source number `index` at its speed.
    fn source(&self, index: usize, speed: R) -> R;
    /// Effort each machine of load number `index` takes, at the speed of its shaft in the direction of motion.
    fn load(&self, index: usize, speed: R) -> R;
    /// Acceleration of the root, for inertias.
    fn acceleration(&self) -> Option<R> {
        None
    }
    /// Effort of a brake at the input of stage number `index`, opposing motion.
    fn brake(&self, _index: usize) -> f64 {
        0.0
    }
}

/// Efforts through a drive; of all equal parts together.
#[derive(Clone, Debug)]
pub(crate) struct Flow<R> {
    /// What is left at the root.
    pub net: R,
    /// The part of it that comes from the side of the sources.
    pub driving: R,
    /// At each transmission.
    pub through: Vec<Through<R>>,
    /// Effort of each machine of each source.
    pub sources: Vec<R>,
    /// Effort of each machine of each load.
    pub loads: Vec<R>,
}

/// Efforts at a transmission.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Through<R> {
    /// At its input, drag already taken off.
    pub input: R,
    /// At its output.
    pub output: R,
    /// Its drag and brake, at its input.
    pub hold: R,
}

/// Efforts at `x`, which is below zero when `back` says so: the drive moves against the direction asked for.
pub(crate) fn flow<R: Real>(drive: &Assembly, x: R, back: bool, acting: &impl Acting<R>) -> Flow<R> {
    let zero = R::of(0.0);
    let mut sums = vec![zero; drive.shafts.len()];
    let mut out = Flow {
        net: zero,
        driving: zero,
        through: vec![Through { input: zero, output: zero, hold: zero }; drive.stages.len()],
        sources: Vec::with_capacity(drive.sources.len()),
        loads: Vec::with_capacity(drive.loads.len()),
    };
    hang(drive, x, acting, &mut sums, &mut out);
    hold(drive, x, back, acting, &mut sums, &mut out);
    for index in &drive.order {
        let stage = &drive.stages[*index];
        let (from, to) = (stage.at.input, stage.at.output);
        let (input, output) = match stage.far {
            Far::Input => {
                let (ahead, behind) = stage.gains(back);
                let input = sums[from];
                let mut output = input.by_sign(ahead, behind);
                if stage.one_way {
                    output = output.max(zero);
                }
                sums[to] = sums[to] + output;
                if to == drive.root {
                    out.driving = out.driving + output;
                }
                (input, output)
            }
            Far::Output => {
                let output = -sums[to];
                let (ahead, behind) = stage.needs(back);
                let mut input = output.by_sign(ahead, behind);
                if stage.one_way {
                    input = input.max(zero);
                }
                sums[from] = sums[from] - input;
                (input, output)
            }
        };
        out.through[*index].input = input;
        out.through[*index].output = output;
    }
    out.net = sums[drive.root];
    out
}

/// What hangs on the shafts: sources, loads and, while the drive gains speed, inertias.
fn hang<R: Real>(drive: &Assembly, x: R, acting: &impl Acting<R>, sums: &mut [R], out: &mut Flow<R>) {
    for (index, source) in drive.sources.iter().enumerate() {
        let effort = acting.source(index, x * drive.shafts[source.at.shaft].speed);
        sums[source.at.shaft] = sums[source.at.shaft] + effort * source.at.count;
        if source.at.shaft == drive.root {
            out.driving = out.driving + effort * source.at.count;
        }
        out.sources.push(effort);
    }
    for (index, load) in drive.loads.iter().enumerate() {
        let effort = acting.load(index, x * drive.shafts[load.at.shaft].speed);
        sums[load.at.shaft] = sums[load.at.shaft] - effort * load.at.count;
        out.loads.push(effort);
    }
    if let Some(acceleration) = acting.acceleration() {
        for (sum, shaft) in sums.iter_mut().zip(&drive.shafts) {
            *sum = *sum - acceleration * (shaft.inertia * shaft.speed);
        }
    }
}

/// Drags and brakes, at the inputs of the stages.
fn hold<R: Real>(
    drive: &Assembly,
    x: R,
    back: bool,
    acting: &impl Acting<R>,
    sums: &mut [R],
    out: &mut Flow<R>,
) {
    let against = if back { -1.0 } else { 1.0 };
    for (index, stage) in drive.stages.iter().enumerate() {
        let shaft = stage.at.input;
        let mut hold = R::of(against * acting.brake(index));
        if let Some(drag) = &stage.drag {
            hold = hold + (x * drive.shafts[shaft].speed).on(drag.as_ref()) * stage.at.count;
        }
        sums[shaft] = sums[shaft] - hold;
        out.through[index].hold = hold;
    }
}
