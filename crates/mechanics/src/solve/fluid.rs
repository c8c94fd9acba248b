//! A source behind a fluid coupling: what it gives over the speed of the coupling's output.
//!
//! At an input speed w the source gives T(w), and the coupling passes that at one output speed y(w). Where y rises with
//! w everywhere, which is proved before, the source is followed over y instead of w: its own speed is the inverse.

use super::assembly::Assembly;
use super::bracket::bracketed;
use super::chain::Hung;
use crate::curve::{Curve, Law};
use crate::fault::{Fault, FaultKind, Note};
use crate::laws::fluid_coupling::Fluid;
use crate::model::Characteristic;
use crate::scalar::{Dual, Enclosure, Interval, Real};

/// A source's drive curve behind its coupling.
pub(crate) struct Behind {
    drive: Box<dyn Curve>,
    /// The coupling, its torque taken for each machine.
    law: Fluid,
    /// Input speeds between which the output is sought.
    low: f64,
    top: f64,
}

/// Boxes looked at before the rise of the output is called unproved.
const BUDGET: usize = 4_000;

/// A share by which found speeds are widened in bounds.
const PAD: f64 = 1e-13;

impl Behind {
    /// The source's own curve.
    pub fn source(&self) -> &dyn Curve {
        self.drive.as_ref()
    }

    /// The output speed at a speed of the source.
    pub fn output<R: Real>(&self, input: R) -> R {
        self.law.output(input, input.on(self.drive.as_ref()))
    }

    /// The source's own speed at an output speed, at full command.
    pub fn input(&self, output: f64) -> f64 {
        let high = 2.0 * (f64::max(output, 0.0) + self.top);
        bracketed(|input| self.output(input) - output, self.low, high)
    }

    /// The source's own speed at an output speed, while it gives this torque and not the most it can.
    pub fn input_at(&self, output: f64, torque: f64) -> f64 {
        let passes = |input: f64| self.law.torque(input, output) - torque;
        if torque < 0.0 {
            return bracketed(passes, output / (1.0 + self.law.shape) * (1.0 + PAD), output);
        }
        let mut high = f64::max(output, 1e-9 * self.top);
        for _ in 0..200 {
            if passes(high) >= 0.0 {
                break;
            }
            high *= 2.0;
        }
        bracketed(passes, f64::max(output, 1e-12 * self.top), high)
    }

    fn rate(&self, input: Enclosure, output: Enclosure) -> Interval {
        let along = self.drive.over(input).slope / self.output(input).slope;
        let jumps = self.drive.jumps();
        if !jumps.iter().any(|jump| input.value.lo <= *jump && *jump <= input.value.hi) {
            return along;
        }
        // On a vertical piece the source keeps its speed and the coupling alone decides.
        let held = |x: Enclosure| Enclosure { value: x.value, slope: Interval::ZERO };
        along.hull(self.law.by_output(held(input), held(output)).value)
    }
}

impl Curve for Behind {
    fn at(&self, x: f64) -> f64 {
        self.law.torque(self.input(x), x)
    }

    fn over(&self, x: Enclosure) -> Enclosure {
        let (lo, hi) = (self.input(x.value.lo), self.input(x.value.hi));
        let input = Enclosure::variable(lo * (1.0 - PAD), hi * (1.0 + PAD));
        let given = self.drive.over(input).value;
        let rounding = PAD * self.law.coefficient * hi * hi / self.law.shape;
        let value = Interval::new(given.lo - rounding, given.hi + rounding);
        Enclosure { value, slope: self.rate(input, x) * x.slope }
    }

    fn dual(&self, x: Dual) -> Dual {
        let input = self.input(x.value);
        let along = self.drive.dual(Dual::variable(input)).slope / self.output(Dual::variable(input)).slope;
        let held: f64 = self.law.by_output(input, x.value);
        let beside = PAD * input;
        let vertical = self.drive.jumps().iter().any(|jump| (jump - input).abs() <= beside);
        Dual { value: self.at(x.value), slope: if vertical { held } else { along } * x.slope }
    }

    fn jumps(&self) -> Vec<f64> {
        Vec::new()
    }

    fn kinks(&self) -> Vec<f64> {
        let beside = |jump: f64| [jump * (1.0 - PAD), jump * (1.0 + PAD)];
        let places = self.drive.jumps().into_iter().flat_map(beside).chain(self.drive.kinks());
        places.filter(|place| *place > self.low).map(|place| self.output(place)).collect()
    }
}

/// The coupling's torque at a share of full slip, less what the source gives.
struct Spare<'a> {
    behind: &'a Behind,
    share: f64,
}

impl Law for Spare<'_> {
    fn eval<R: Real>(&self, x: R) -> R {
        x.square() * (self.behind.law.coefficient * self.share) - x.on(self.behind.drive.as_ref())
    }

    fn jumps(&self) -> Vec<f64> {
        self.behind.drive.jumps()
    }
}

impl Behind {
    /// Zeros of the spare torque from `lo` to `hi`.
    fn meets(&self, share: f64, lo: f64, hi: f64) -> Option<Vec<f64>> {
        let size = |x: f64| x * x * self.law.coefficient * share + self.drive.at(x).abs();
        let found = super::zeros(&Spare { behind: self, share }, &size, lo, hi).ok()?;
        Some(found.into_iter().map(|(x, _)| x).collect())
    }

    /// Whether the output rises with the input all the way.
    fn rises(&self, lo: f64, hi: f64) -> bool {
        let mut jumps: Vec<f64> = self.drive.jumps().into_iter().filter(|x| *x > lo && *x < hi).collect();
        jumps.sort_by(f64::total_cmp);
        // A fall of the torque lets the output leap ahead; a leap of the torque would throw it back.
        if jumps.iter().any(|x| self.drive.at(x * (1.0 - PAD)) < self.drive.at(x * (1.0 + PAD))) {
            return false;
        }
        let mut boxes = super::points::pieces(&jumps, lo, hi);
        let mut left = BUDGET;
        while let Some((lo, hi)) = boxes.pop() {
            let slope = self.output(Enclosure::variable(lo, hi)).slope;
            if slope.lo > 0.0 {
                continue;
            }
            let middle = 0.5 * lo + 0.5 * hi;
            if left == 0 || slope.hi <= 0.0 || middle <= lo || middle >= hi {
                return false;
            }
            left -= 1;
            boxes.extend([(lo, middle), (middle, hi)]);
        }
        true
    }
}

/// The fluid coupling directly behind a source, with how many couplings there are.
fn coupling(drive: &Assembly, at: &Hung) -> Result<Option<(usize, Fluid, f64)>, Fault> {
    let mut fluids = drive
        .stages
        .iter()
        .filter_map(|stage| Some((stage, drive.transmission(stage)?.fluid()?)))
        .filter(|(stage, _)| stage.at.input == at.shaft);
    let Some((stage, law)) = fluids.next() else { return Ok(None) };
    let sources = drive.tree.sources.iter().filter(|s| s.shaft == at.shaft).count();
    let loads = drive.tree.loads.iter().filter(|l| l.shaft == at.shaft).count();
    let ends = |s: &&super::assembly::Stage| s.at.input == at.shaft || s.at.output == at.shaft;
    if sources > 1 || loads > 0 || drive.stages.iter().filter(ends).count() > 1 {
        let how = Note::plain("nothing but its one source stands before a fluid coupling");
        return Err(Fault { part: Some(stage.at.part), kind: FaultKind::Chain { how } });
    }
    Ok(Some((stage.at.part, law, stage.at.count)))
}

/// A fluid coupling that does not stand directly behind a source.
pub(super) fn misplaced(drive: &Assembly) -> Option<Fault> {
    let own = |shaft: usize| drive.tree.sources.iter().any(|s| s.shaft == shaft);
    let stage = drive
        .stages
        .iter()
        .find(|s| drive.transmission(s).is_some_and(|t| t.fluid().is_some()) && !own(s.at.input))?;
    let how =
        Note::plain("a fluid coupling stands directly behind its source: put the other parts behind it");
    Some(Fault { part: Some(stage.at.part), kind: FaultKind::Chain { how } })
}

/// Puts a source behind its fluid coupling, if it has one: what is left of the source is its link.
pub(super) fn put_behind(
    drive: &Assembly,
    at: &Hung,
    character: Characteristic,
) -> Result<(Characteristic, Option<std::sync::Arc<Behind>>), Fault> {
    let Some((part, law, couplings)) = coupling(drive, at)? else { return Ok((character, None)) };
    let fault = |how| Fault { part: Some(part), kind: FaultKind::Chain { how } };
    if character.holds.is_some() {
        let how = "a source of constant speed needs no fluid coupling: put the machine it stands for here";
        return Err(fault(Note::plain(how)));
    }
    if drive.set.is_some() {
        let how =
            "a set speed behind a fluid coupling is not covered: the source's own governor is in its curve";
        return Err(fault(Note::plain(how)));
    }
    let each = Fluid { coefficient: law.coefficient * couplings / at.count, ..law };
    let top = character.top_speed;
    let start = f64::max(character.idle.unwrap_or(0.0), 1e-9 * top);
    let mut behind = Behind { drive: character.drive, law: each, low: start, top };
    let full = 1.0 / (1.0 + law.shape);
    let stalled = behind.meets(full, start, 4.0 * top).unwrap_or_default();
    let [stall] = stalled[..] else {
        let template = "the coupling holds the source down before it is up to speed: it is too large for this source, or \
                        fed by a curve that is not covered (stall torque {0} at rated-like speed {1})";
        let quantities = vec![(each.torque(top, 0.0), "torque"), (top, "rotational_speed")];
        return Err(fault(Note { template, quantities }));
    };
    if let Some(last) = behind.meets(1.0, start, stall).unwrap_or_default().last() {
        behind.low = last * (1.0 + 1e-9);
    }
    if !behind.rises(stall * (1.0 - 1e-9), 1.25 * top) {
        let how = "with this coupling the source has two speeds for one speed of the load: it is too large for the \
                   source, whose torque dips below what it passes";
        return Err(fault(Note::plain(how)));
    }
    let measured = character.measured.map(|(lo, hi)| {
        (if lo <= stall { 0.0 } else { behind.output(lo) }, behind.output(f64::max(hi, stall)))
    });
    let link = std::sync::Arc::new(behind);
    let over_output = Characteristic {
        drive: Box::new(Linked(std::sync::Arc::clone(&link))),
        idle: None,
        measured,
        follows_set_speed: false,
        ..character
    };
    Ok((over_output, Some(link)))
}

/// The link as a curve.
struct Linked(std::sync::Arc<Behind>);

impl Curve for Linked {
    fn at(&self, x: f64) -> f64 {
        self.0.at(x)
    }
    fn over(&self, x: Enclosure) -> Enclosure {
        self.0.over(x)
    }
    fn dual(&self, x: Dual) -> Dual {
        self.0.dual(x)
    }
    fn jumps(&self) -> Vec<f64> {
        self.0.jumps()
    }
    fn kinks(&self) -> Vec<f64> {
        self.0.kinks()
    }
}
