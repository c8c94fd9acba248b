//! Parts for the tests of the solver: sources, stages and loads straight from numbers.

use crate::curve::{Curve, Law};
use crate::drive::{Chain, Direction, DriveSpec, PartSpec, Port, Settings};
use crate::fault::Fault;
use crate::model::{
    Brake, Braking, Characteristic, Coupling, Feed, Known, Load, Model, Motion, Source, Standstill,
    Transmission,
};
use crate::registry::{KindRow, Role};
use crate::scalar::Real;
use crate::solution::Answer;
use crate::solve::{Solution, solve};
use crate::values::{FieldValue, Values};

/// `c0 + c1 x + c2 x² + c3 x³ + root √x + kloss(x) + power / x`, odd in its drag-like terms where `odd` says so.
#[derive(Clone, Copy, Debug, Default)]
pub(crate) struct Mixed {
    pub c: [f64; 4],
    pub root: f64,
    /// Breakdown effort, breakdown slip, synchronous speed.
    pub kloss: Option<(f64, f64, f64)>,
    /// Power and the speed below which the effort stays level.
    pub power: Option<(f64, f64)>,
    pub odd: bool,
}

impl Mixed {
    fn ahead<R: Real>(&self, x: R) -> R {
        let [c0, c1, c2, c3] = self.c;
        let mut sum = ((x * c3 + c2) * x + c1) * x + c0 + x.sqrt() * self.root;
        if let Some((most, breakdown, synchronous)) = self.kloss {
            let s = (R::of(synchronous) - x) / synchronous;
            // 2 M / (s / sk + sk / s) without a division by zero at no slip.
            sum = sum + s * (2.0 * most * breakdown) / (s.square() + breakdown * breakdown);
        }
        if let Some((power, from)) = self.power {
            sum = sum + R::of(power) / x.max(R::of(from));
        }
        sum
    }
}

impl Law for Mixed {
    fn eval<R: Real>(&self, x: R) -> R {
        if self.odd {
            x.piecewise(&[0.0], |piece, x| if piece == 0 { -self.ahead(-x) } else { self.ahead(x) })
        } else {
            self.ahead(x)
        }
    }
    fn jumps(&self) -> Vec<f64> {
        if self.odd { vec![0.0] } else { Vec::new() }
    }
}

fn mixed(values: &Values, odd: bool) -> Mixed {
    let si = |name: &str| values.si(name).unwrap_or(0.0);
    Mixed {
        c: [si("c0"), si("c1"), si("c2"), si("c3")],
        root: si("root"),
        kloss: values.si("most").map(|most| (most, si("breakdown_slip"), si("synchronous"))),
        power: values.si("power").map(|power| (power, si("from"))),
        odd,
    }
}

#[derive(Debug)]
struct TestSource(Values);

impl Source for TestSource {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }
    fn inertia(&self) -> Known {
        Known::of(self.0.si("inertia"), "inertia")
    }
    fn characteristic(&self, _: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let law = mixed(&self.0, false);
        let braking: Braking = match self.0.word("braking") {
            Some("none") => Braking::Cannot,
            None => Braking::Unknown("braking"),
            Some(_) => {
                let most = self.0.si("brake_effort").unwrap_or(0.0);
                Braking::Can(Box::new(crate::curve::Constant(most)))
            }
        };
        let top = self.0.si("top_speed").unwrap_or(100.0);
        let mut character = Characteristic::new(Box::new(law), braking, top);
        character.reversible = self.0.flag("one_way") != Some(true);
        character.idle = self.0.si("idle");
        character.measured = self.0.si("measured_to").map(|to| (0.0, to));
        Ok(character)
    }
}

#[derive(Debug)]
struct TestStage(Values);

impl Transmission for TestStage {
    fn input(&self) -> Motion {
        Motion::Rotary
    }
    fn output(&self) -> Motion {
        if self.0.flag("linear") == Some(true) { Motion::Linear } else { Motion::Rotary }
    }
    fn gears(&self) -> Vec<String> {
        match self.0.si("second") {
            Some(_) => vec!["1".into(), "2".into()],
            None => Vec::new(),
        }
    }
    fn coupling(&self, gear: usize) -> Coupling {
        let ratio = self.0.si(if gear == 1 { "second" } else { "ratio" }).unwrap_or(1.0);
        Coupling {
            reverses: self.0.flag("reverses") == Some(true),
            forward: self.0.si("forward").unwrap_or(1.0),
            backward: match (self.0.si("backward"), self.0.flag("lossy")) {
                (None, Some(true)) => Known::Missing("efficiency_backward"),
                (value, _) => Known::Value(value.unwrap_or(1.0)),
            },
            ..Coupling::ideal(ratio)
        }
    }
    fn drag(&self) -> Option<Box<dyn Curve>> {
        let law = Mixed { c: [self.0.si("drag")?, 0.0, 0.0, 0.0], odd: true, ..Mixed::default() };
        Some(Box::new(law))
    }
    fn input_inertia(&self) -> Known {
        Known::Value(self.0.si("inertia").unwrap_or(0.0))
    }
    fn brake(&self) -> Option<Brake> {
        let effort = self.0.si("brake")?;
        Some(Brake { effort, apply_time: Known::of(self.0.si("apply_time"), "apply_time") })
    }
    fn one_way(&self) -> bool {
        self.0.flag("freewheel") == Some(true)
    }
}

#[derive(Debug)]
struct TestLoad(Values);

impl Load for TestLoad {
    fn motion(&self) -> Motion {
        if self.0.flag("linear") == Some(true) { Motion::Linear } else { Motion::Rotary }
    }
    fn demand(&self) -> Box<dyn Curve> {
        let pull = self.0.si("weight").unwrap_or(0.0);
        Box::new(Pulled(pull, mixed(&self.0, true)))
    }
    fn standstill(&self) -> Standstill {
        let pull = self.0.si("weight").unwrap_or(0.0);
        let rest = self.0.si("breakaway").unwrap_or(self.0.si("c0").unwrap_or(0.0));
        Standstill { holding: pull, breakaway_forward: pull + rest, breakaway_reverse: pull - rest }
    }
    fn inertia(&self) -> Known {
        Known::of(self.0.si("inertia"), "inertia")
    }
}

/// A pull with friction and drag around it.
struct Pulled(f64, Mixed);

impl Law for Pulled {
    fn eval<R: Real>(&self, x: R) -> R {
        self.1.eval(x) + self.0
    }
    fn jumps(&self) -> Vec<f64> {
        Law::jumps(&self.1)
    }
}

const fn row(role: Role, build: fn(&Values) -> Result<Model, Vec<Fault>>) -> KindRow {
    KindRow {
        role,
        name: "test",
        title: "",
        summary: "",
        fields: &[],
        results: &[],
        formulas: &[],
        cautions: &[],
        example: "",
        build,
        given: |_| Vec::new(),
    }
}

static SOURCE: KindRow = row(Role::Source, |v| Ok(Model::Source(Box::new(TestSource(v.clone())))));
static STAGE: KindRow = row(Role::Transmission, |v| Ok(Model::Transmission(Box::new(TestStage(v.clone())))));
static LOAD: KindRow = row(Role::Load, |v| Ok(Model::Load(Box::new(TestLoad(v.clone())))));

/// Fields from numbers.
pub(crate) fn values(fields: &[(&'static str, f64)]) -> Values {
    let mut out = Values::default();
    for (name, value) in fields {
        out.set(name, FieldValue::Si(*value));
    }
    out
}

/// A drive under test.
#[derive(Clone, Debug)]
pub(crate) struct Rig {
    pub spec: DriveSpec,
    pieces: Vec<Chain>,
}

impl Rig {
    pub fn new() -> Self {
        let chain = Chain::Series(Vec::new());
        Self {
            spec: DriveSpec { parts: Vec::new(), chain, settings: Settings::default() },
            pieces: Vec::new(),
        }
    }

    fn add(&mut self, row: &'static KindRow, values: Values) -> usize {
        self.spec.parts.push(PartSpec { name: format!("p{}", self.spec.parts.len()), row, values, on: true });
        self.spec.parts.len() - 1
    }

    fn put(mut self, row: &'static KindRow, values: Values) -> Self {
        let index = self.add(row, values);
        self.pieces.push(Chain::Part { index, count: 1 });
        self.spec.chain = Chain::Series(self.pieces.clone());
        self
    }

    pub fn source(self, fields: &[(&'static str, f64)]) -> Self {
        let braking = FieldValue::Word("as_generator");
        self.put(&SOURCE, values(fields).with("braking", braking))
    }

    pub fn source_of(self, values: Values) -> Self {
        self.put(&SOURCE, values)
    }

    pub fn stage(self, fields: &[(&'static str, f64)]) -> Self {
        self.put(&STAGE, values(fields))
    }

    pub fn stage_of(self, values: Values) -> Self {
        self.put(&STAGE, values)
    }

    pub fn load(self, fields: &[(&'static str, f64)]) -> Self {
        self.put(&LOAD, values(fields))
    }

    pub fn load_of(self, values: Values) -> Self {
        self.put(&LOAD, values)
    }

    /// Joins everything so far on one shaft, each piece its own branch.
    pub fn joined(mut self) -> Self {
        self.pieces = vec![Chain::Joined(self.pieces)];
        self.spec.chain = Chain::Series(self.pieces.clone());
        self
    }

    pub fn reverse(mut self) -> Self {
        self.spec.settings.direction = Direction::Reverse;
        self
    }

    pub fn solved(&self) -> Solution {
        solve(&self.spec).unwrap_or_else(|faults| panic!("{faults:?}"))
    }
}

/// A quantity, or the answer that is none.
pub(crate) fn number(solution: &Solution, part: Option<usize>, name: &str) -> Result<f64, Answer> {
    number_at(solution, part, None, name)
}

pub(crate) fn number_at(
    solution: &Solution,
    part: Option<usize>,
    port: Option<Port>,
    name: &str,
) -> Result<f64, Answer> {
    match solution.answer(part, port, name) {
        Answer::Quantity { si, .. } => Ok(si),
        other => Err(other),
    }
}

#[track_caller]
pub(crate) fn near(got: f64, expected: f64, relative: f64) {
    assert!((got - expected).abs() <= relative * expected.abs(), "{got} is not {expected}");
}
