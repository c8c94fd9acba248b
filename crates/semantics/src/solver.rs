//! What was solved, remembered by the exact bits of each drive: cases that leave a drive alone share its solution, and
//! an edit solves the drives it changes.
//!
//! A memo skips work and changes nothing: an answer depends on the bits of its question alone, never on what was asked
//! before. What the newest state of the texts did not ask for is dropped, so that a long session does not grow.

use std::cell::RefCell;
use std::collections::BTreeMap;
use std::sync::Arc;

use layshaft_mechanics::drive::{Bits, DriveSpec, Port, StatedSpeed};
use layshaft_mechanics::fault::Fault;
use layshaft_mechanics::solve::{Extremes, Question, Solution, solve, solve_at, worst_over};

/// An answer of the solver, or why there is none.
pub(crate) type Outcome<T> = Result<T, Vec<Fault>>;

/// A side of a part at which a speed is stated.
pub(crate) type Station = (Option<usize>, Option<Port>);

/// A question over a range of stated speeds: the ends of the range, and the result by part, side and name.
type Range = (Bits, Bits, Option<usize>, Option<Port>, Box<str>);

/// Everything solved in the newest state of the texts.
#[derive(Debug, Default)]
pub(crate) struct Solver {
    known: RefCell<BTreeMap<Arc<Bits>, Known>>,
}

/// Something remembered.
#[derive(Debug)]
struct Kept<T> {
    value: T,
    /// Whether this state asked for it.
    used: bool,
}

/// A drive, and what was asked of it.
#[derive(Debug)]
struct Known {
    spec: Arc<DriveSpec>,
    from_rest: Outcome<Arc<Solution>>,
    stated: BTreeMap<Bits, Kept<Outcome<Arc<Solution>>>>,
    ranges: BTreeMap<Range, Kept<Outcome<Extremes>>>,
    used: bool,
}

/// A drive as the solver knows it.
#[derive(Clone, Debug)]
pub(crate) struct Handle {
    pub spec: Arc<DriveSpec>,
    bits: Arc<Bits>,
}

impl<T: Clone> Kept<T> {
    fn take(&mut self) -> T {
        self.used = true;
        self.value.clone()
    }
}

/// The value of a question, worked out where it is asked for the first time.
fn remembered<K: Ord, T: Clone>(
    known: &mut BTreeMap<K, Kept<T>>,
    question: K,
    answer: impl FnOnce() -> T,
) -> T {
    known.entry(question).or_insert_with(|| Kept { value: answer(), used: false }).take()
}

fn forget<K: Ord, T>(known: &mut BTreeMap<K, Kept<T>>) {
    known.retain(|_, kept| std::mem::take(&mut kept.used));
}

impl Solver {
    /// Follows a drive from rest.
    pub fn solve(&self, spec: DriveSpec) -> (Handle, Outcome<Arc<Solution>>) {
        let mut known = self.known.borrow_mut();
        let bits = Arc::new(spec.bits());
        if let Some(drive) = known.get_mut(&bits) {
            drive.used = true;
            return (Handle { spec: Arc::clone(&drive.spec), bits }, drive.from_rest.clone());
        }
        let from_rest = solve(&spec).map(Arc::new);
        let spec = Arc::new(spec);
        let drive = Known {
            spec: Arc::clone(&spec),
            from_rest: from_rest.clone(),
            stated: BTreeMap::new(),
            ranges: BTreeMap::new(),
            used: true,
        };
        known.insert(Arc::clone(&bits), drive);
        (Handle { spec, bits }, from_rest)
    }

    /// Takes a drive at a stated speed.
    pub fn solve_at(&self, drive: &Handle, speed: StatedSpeed) -> Outcome<Arc<Solution>> {
        let solved = || solve_at(&drive.spec, speed).map(Arc::new);
        match self.known.borrow_mut().get_mut(&drive.bits) {
            Some(known) => remembered(&mut known.stated, speed.bits(), solved),
            None => solved(),
        }
    }

    /// The extremes of an answer over a range of speeds stated at a station.
    pub fn worst_over(
        &self,
        drive: &Handle,
        (part, port): Station,
        (low, high): (f64, f64),
        question: Question<'_>,
    ) -> Outcome<Extremes> {
        let end = |speed| StatedSpeed { part, port, speed }.bits();
        let range = (end(low), end(high), question.part, question.port, question.name.into());
        let found = || worst_over(&drive.spec, (part, port), (low, high), question);
        match self.known.borrow_mut().get_mut(&drive.bits) {
            Some(known) => remembered(&mut known.ranges, range, found),
            None => found(),
        }
    }

    /// Drops what was not asked for since the last call.
    pub fn forget_unused(&mut self) {
        self.known.get_mut().retain(|_, drive| {
            forget(&mut drive.stated);
            forget(&mut drive.ranges);
            std::mem::take(&mut drive.used)
        });
    }

    /// How many drives and questions about them are remembered.
    pub fn len(&self) -> usize {
        self.known.borrow().values().map(|drive| 1 + drive.stated.len() + drive.ranges.len()).sum()
    }
}
