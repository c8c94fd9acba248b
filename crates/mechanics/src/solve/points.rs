//! Where available and required effort meet: all such speeds, and how efforts stand there.

use super::BESIDE;
use super::assembly::Assembly;
use super::bracket::bracketed;
use super::flow::{Acting, Flow, flow};
use super::roots::{Crossing, Task};
use crate::curve::Law;
use crate::scalar::Real;

/// Sources at full command, bounded by a set speed, and loads as they move.
pub(crate) struct Full<'a>(pub &'a Assembly);

impl<R: Real> Acting<R> for Full<'_> {
    fn source(&self, index: usize, speed: R) -> R {
        self.0.sources[index].effort(speed)
    }
    fn load(&self, index: usize, speed: R) -> R {
        self.0.loads[index].effort(speed)
    }
}

/// Sources off, loads as they move.
pub(crate) struct Off<'a>(pub &'a Assembly);

impl<R: Real> Acting<R> for Off<'_> {
    fn source(&self, _: usize, _: R) -> R {
        R::of(0.0)
    }
    fn load(&self, index: usize, speed: R) -> R {
        self.0.loads[index].effort(speed)
    }
}

/// The net effort at the root over its speed.
pub(crate) struct Net<'a> {
    /// The drive.
    pub drive: &'a Assembly,
    /// Whether the speeds asked for are below zero.
    pub back: bool,
}

impl Law for Net<'_> {
    fn eval<R: Real>(&self, x: R) -> R {
        self.drive.program.at(self.drive, x, self.back).net()
    }
}

/// Where the net effort meets zero.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Meet {
    /// Speed of the root.
    pub x: f64,
    /// How.
    pub crossing: Crossing,
    /// Whether it lies on a vertical piece.
    pub vertical: bool,
}

/// All meetings on a range, and a part of it that could not be decided.
pub(crate) struct Meets {
    /// Rising in speed.
    pub all: Vec<Meet>,
    /// A range that stays undecided.
    pub undecided: Option<(f64, f64)>,
}

/// How far beyond the natural speeds a drive is followed.
const FARTHEST: f64 = 1e4;

/// The range of speeds looked at, above zero.
pub(crate) fn range(drive: &Assembly) -> (f64, f64) {
    (1e-12 * drive.scale, FARTHEST * drive.scale)
}

/// The pieces of a range between jumps.
pub(crate) fn pieces(jumps: &[f64], lo: f64, hi: f64) -> Vec<(f64, f64)> {
    let mut pieces = Vec::new();
    let mut from = lo;
    for jump in jumps {
        let beside = BESIDE * jump.abs();
        if jump - beside <= from || jump + beside >= hi {
            continue;
        }
        pieces.push((from, jump - beside));
        from = jump + beside;
    }
    pieces.push((from, hi));
    pieces
}

/// The size of the efforts at a speed, referred to the root.
pub(crate) fn size(drive: &Assembly, x: f64) -> f64 {
    let mut sum = 0.0;
    for source in &drive.sources {
        let speed = drive.shafts[source.at.shaft].speed;
        sum += source.effort(x * speed).abs() * speed * source.at.count;
    }
    for load in &drive.loads {
        let speed = drive.shafts[load.at.shaft].speed;
        sum += load.effort(x * speed).abs() * speed * load.at.count;
    }
    sum
}

/// All meetings above zero, or below.
pub(crate) fn meets(drive: &Assembly, back: bool) -> Meets {
    let (near, far) = range(drive);
    let (lo, hi) = if back { (-far, -near) } else { (near, far) };
    let net = Net { drive, back };
    let magnitude = |x: f64| size(drive, x);
    let task = Task { curve: &net, size: &magnitude };
    let cuts = [if back { -1.25 * drive.scale } else { 1.25 * drive.scale }];
    let jumps = drive.jumps();
    let pieces = pieces(&jumps, lo, hi);
    let mut out = Meets { all: Vec::new(), undecided: None };
    for (index, (from, to)) in pieces.iter().enumerate() {
        let found = task.roots_cut(*from, *to, &cuts);
        out.undecided = out.undecided.or(found.undecided);
        let meet = |root: &super::roots::Root| Meet { x: root.x, crossing: root.crossing, vertical: false };
        out.all.extend(found.roots.iter().map(meet));
        let Some((next, _)) = pieces.get(index + 1) else { continue };
        let (before, after) = (net.eval(*to), net.eval(*next));
        if before * after < 0.0 {
            let crossing = if before > 0.0 { Crossing::Falling } else { Crossing::Rising };
            out.all.push(Meet { x: 0.5 * to + 0.5 * next, crossing, vertical: true });
        }
    }
    out
}

/// Efforts on a vertical piece: every jump of the drive there taken to the same share.
struct Share<'a> {
    drive: &'a Assembly,
    sides: (f64, f64),
    share: f64,
}

impl Share<'_> {
    fn between(&self, speed: f64, effort: impl Fn(f64) -> f64) -> f64 {
        let (before, after) = (effort(self.sides.0 * speed), effort(self.sides.1 * speed));
        before + self.share * (after - before)
    }
}

impl Acting<f64> for Share<'_> {
    fn source(&self, index: usize, _: f64) -> f64 {
        let source = &self.drive.sources[index];
        self.between(self.drive.shafts[source.at.shaft].speed, |w| source.effort(w))
    }
    fn load(&self, index: usize, _: f64) -> f64 {
        let load = &self.drive.loads[index];
        self.between(self.drive.shafts[load.at.shaft].speed, |w| load.effort(w))
    }
}

/// How efforts stand at a meeting.
pub(crate) fn at(drive: &Assembly, meet: &Meet) -> Flow<f64> {
    let back = meet.x < 0.0;
    if !meet.vertical {
        return flow(drive, meet.x, back, &Full(drive));
    }
    let beside = 2.0 * BESIDE * meet.x.abs();
    let acting = |share: f64| Share { drive, sides: (meet.x - beside, meet.x + beside), share };
    let share = bracketed(|share| flow(drive, meet.x, back, &acting(share)).net, 0.0, 1.0);
    flow(drive, meet.x, back, &acting(share))
}

/// Sources driven to a share of what they can give, 0 to 1, or of what they can hold back, 0 to -1.
pub(crate) struct Commanded<'a> {
    /// The drive.
    pub drive: &'a Assembly,
    /// The share.
    pub share: f64,
}

impl Acting<f64> for Commanded<'_> {
    fn source(&self, index: usize, speed: f64) -> f64 {
        let source = &self.drive.sources[index];
        if self.share >= 0.0 { self.share * source.most(speed) } else { self.share * source.braking(speed) }
    }
    fn load(&self, index: usize, speed: f64) -> f64 {
        self.drive.loads[index].effort(speed)
    }
}
