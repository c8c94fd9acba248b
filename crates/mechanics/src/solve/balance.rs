//! The net effort at the root, and nothing else, as fast as it can be had.
//!
//! The same sums as in [`flow`](super::flow::flow), with stages that do nothing but pass on contracted into one:
//! without drag, freewheel or anything hung between them, a row of stages keeps the sign of the effort, and its gains
//! multiply.

use super::assembly::{Assembly, Far};
use crate::scalar::Real;

/// A row of stages as one.
#[derive(Clone, Debug)]
struct Link {
    /// Slot away from the root.
    far: usize,
    /// Slot toward the root.
    near: usize,
    /// Which end is away.
    side: Far,
    /// Effort nearer to the root per effort away from it, while that is not below zero and while it is: ahead and back.
    gains: [(f64, f64); 2],
    /// Whether it passes only driving effort.
    one_way: bool,
}

/// How to sum up a drive.
#[derive(Clone, Debug, Default)]
pub(crate) struct Program {
    slots: usize,
    root: usize,
    /// Slot, speed per root speed and count of each source, then of each load.
    sources: Vec<(usize, f64, f64)>,
    loads: Vec<(usize, f64, f64)>,
    /// Slot, speed and count of each stage with drag, by index.
    drags: Vec<(usize, usize, f64, f64)>,
    links: Vec<Link>,
}

/// Net effort at the root, and what of it comes from the side of the sources.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Balance<R> {
    /// Available.
    pub driving: R,
    /// Required.
    pub required: R,
}

impl<R: Real> Balance<R> {
    /// Available less required.
    pub fn net(self) -> R {
        self.driving - self.required
    }
}

/// Slots held without allocating.
const SMALL: usize = 6;

impl Program {
    /// Contracts a drive.
    pub fn new(drive: &Assembly) -> Self {
        let busy = |shaft: usize| {
            shaft == drive.root
                || drive.sources.iter().any(|s| s.at.shaft == shaft)
                || drive.loads.iter().any(|l| l.at.shaft == shaft)
                || drive.stages.iter().any(|s| s.at.input == shaft && s.drag.is_some())
        };
        let mut degree = vec![0; drive.shafts.len()];
        for stage in &drive.stages {
            degree[stage.at.input] += 1;
            degree[stage.at.output] += 1;
        }
        let mut links: Vec<Link> = Vec::new();
        for index in &drive.order {
            let stage = &drive.stages[*index];
            let (far, near) = match stage.far {
                Far::Input => (stage.at.input, stage.at.output),
                Far::Output => (stage.at.output, stage.at.input),
            };
            let gains = match stage.far {
                Far::Input => [stage.gains(false), stage.gains(true)],
                Far::Output => [stage.needs(false), stage.needs(true)],
            };
            let link = Link { far, near, side: stage.far, gains, one_way: stage.one_way };
            let before = links.iter().position(|l| l.near == far && l.side == stage.far);
            match before {
                Some(at) if degree[far] == 2 && !busy(far) && passes(&links[at]) && passes(&link) => {
                    let mut joined = links.remove(at);
                    joined.near = near;
                    for (sum, own) in joined.gains.iter_mut().zip(gains) {
                        *sum = (sum.0 * own.0, sum.1 * own.1);
                    }
                    links.push(joined);
                }
                _ => links.push(link),
            }
        }
        Self::numbered(drive, links)
    }

    /// Gives slots to the shafts that are left.
    fn numbered(drive: &Assembly, mut links: Vec<Link>) -> Self {
        let mut slots: Vec<usize> = Vec::new();
        let mut slot = |shaft: usize| {
            slots.iter().position(|s| *s == shaft).unwrap_or_else(|| {
                slots.push(shaft);
                slots.len() - 1
            })
        };
        let root = slot(drive.root);
        for link in &mut links {
            link.far = slot(link.far);
            link.near = slot(link.near);
        }
        let at = |shaft: usize| drive.shafts[shaft].speed;
        let sources = drive.sources.iter().map(|s| (slot(s.at.shaft), at(s.at.shaft), s.at.count)).collect();
        let loads = drive.loads.iter().map(|l| (slot(l.at.shaft), at(l.at.shaft), l.at.count)).collect();
        let mut drags = Vec::new();
        for (index, stage) in drive.stages.iter().enumerate() {
            if stage.drag.is_some() {
                drags.push((index, slot(stage.at.input), at(stage.at.input), stage.at.count));
            }
        }
        Self { slots: slots.len(), root, sources, loads, drags, links }
    }

    /// Sums up at `x`, moving back or not, with sources at full command.
    pub fn at<R: Real>(&self, drive: &Assembly, x: R, back: bool) -> Balance<R> {
        if self.slots <= SMALL {
            let mut sums = [R::of(0.0); SMALL];
            self.sum(drive, x, back, &mut sums)
        } else {
            let mut sums = vec![R::of(0.0); self.slots];
            self.sum(drive, x, back, &mut sums)
        }
    }

    fn sum<R: Real>(&self, drive: &Assembly, x: R, back: bool, sums: &mut [R]) -> Balance<R> {
        let mut driving = R::of(0.0);
        for ((slot, speed, count), source) in self.sources.iter().zip(&drive.sources) {
            let effort = scaled(source.effort(scaled(x, *speed)), *count);
            if *slot == self.root {
                driving = driving + effort;
            } else {
                sums[*slot] = sums[*slot] + effort;
            }
        }
        for ((slot, speed, count), load) in self.loads.iter().zip(&drive.loads) {
            sums[*slot] = sums[*slot] - scaled(load.effort(scaled(x, *speed)), *count);
        }
        for (index, slot, speed, count) in &self.drags {
            if let Some(drag) = &drive.stages[*index].drag {
                sums[*slot] = sums[*slot] - scaled(scaled(x, *speed).on(drag.as_ref()), *count);
            }
        }
        for link in &self.links {
            let (ahead, behind) = link.gains[usize::from(back)];
            let from = sums[link.far];
            match link.side {
                Far::Input => {
                    let mut passed = from.by_sign(ahead, behind);
                    if link.one_way {
                        passed = passed.max(R::of(0.0));
                    }
                    if link.near == self.root {
                        driving = driving + passed;
                    } else {
                        sums[link.near] = sums[link.near] + passed;
                    }
                }
                Far::Output => {
                    let mut asked = (-from).by_sign(ahead, behind);
                    if link.one_way {
                        asked = asked.max(R::of(0.0));
                    }
                    sums[link.near] = sums[link.near] - asked;
                }
            }
        }
        // What is left at the root without the sources is what is asked there.
        Balance { driving, required: -sums[self.root] }
    }
}

/// Times a factor that is often one.
fn scaled<R: Real>(value: R, factor: f64) -> R {
    if factor == 1.0 { value } else { value * factor }
}

/// Whether a link keeps the sign of every effort.
fn passes(link: &Link) -> bool {
    !link.one_way && link.gains.iter().all(|(ahead, behind)| *ahead > 0.0 && *behind > 0.0)
}
