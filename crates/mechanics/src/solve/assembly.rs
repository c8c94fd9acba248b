//! A drive put together: models, shafts with their fixed speed ratios, what each source gives on its supply.

use std::sync::Arc;

use super::balance::Program;
use super::chain::{Between, Hung, Tree, tree};
use super::flow::Flow;
use super::held;
use super::shafts::{directed, gears_engaged, inertias, root, self_locking_in_branch, shafts, stages, turn};
use super::source::{SourceAt, sources};
use crate::curve::Curve;
use crate::drive::{DriveSpec, Port, StatedSpeed};
use crate::fault::{Fault, FaultKind, Note};
use crate::model::{Coupling, Known, Load, Model, Motion, Transmission};
use crate::registry::Role;
use crate::scalar::Real;

/// A shaft.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Shaft {
    /// Its motion.
    pub motion: Motion,
    /// Its speed per speed of the root, above 0.
    pub speed: f64,
    /// Inertia of everything on it.
    pub inertia: f64,
    /// 1 where the direction of motion is the positive sense of what hangs on it, else -1.
    pub sense: f64,
}

/// Which end of a stage is away from the root.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Far {
    /// Its input: it stands on the side of the sources.
    Input,
    /// Its output: it stands on the side of the loads.
    Output,
}

/// A transmission in place.
pub(crate) struct Stage {
    /// Where.
    pub at: Between,
    /// Index of the gear engaged.
    pub gear: usize,
    /// How it couples in this gear.
    pub coupling: Coupling,
    /// Its drag.
    pub drag: Option<Box<dyn Curve>>,
    /// Whether it can be left behind.
    pub one_way: bool,
    /// Whether it passes nothing.
    pub open: bool,
    /// Which end is away from the root.
    pub far: Far,
}

impl Stage {
    /// Efficiency while power flows back; where it is not given, what holds until the question is refused.
    fn backward(&self) -> f64 {
        match self.coupling.backward {
            Known::Value(value) => value,
            Known::Missing(_) => 1.0,
        }
    }

    /// Output effort per input effort while that is not below zero, and while it is.
    pub fn gains(&self, back: bool) -> (f64, f64) {
        if self.open {
            return (0.0, 0.0);
        }
        let forth = self.coupling.effort * self.coupling.forward;
        let returned = self.coupling.effort / self.backward();
        if back { (returned, forth) } else { (forth, returned) }
    }

    /// Input effort per output effort while that is not below zero, and while it is.
    pub fn needs(&self, back: bool) -> (f64, f64) {
        if self.open {
            return (0.0, 0.0);
        }
        let forth = 1.0 / (self.coupling.effort * self.coupling.forward);
        let returned = self.backward() / self.coupling.effort;
        if back { (returned, forth) } else { (forth, returned) }
    }
}

/// A load in place.
pub(crate) struct LoadAt {
    /// Where.
    pub at: Hung,
    /// Effort over its own speed, in its own sense.
    pub demand: Box<dyn Curve>,
    /// 1 where the direction of motion is its positive sense, else -1.
    pub sense: f64,
}

impl LoadAt {
    /// Effort against the direction of motion at the speed in that direction.
    pub fn effort<R: Real>(&self, speed: R) -> R {
        if self.sense > 0.0 { speed.on(self.demand.as_ref()) } else { -(-speed).on(self.demand.as_ref()) }
    }
}

/// A drive put together.
pub(crate) struct Assembly {
    /// What was asked.
    pub spec: DriveSpec,
    /// The models, one a part.
    pub models: Vec<Arc<Model>>,
    /// Where everything stands.
    pub tree: Tree,
    /// The shafts.
    pub shafts: Vec<Shaft>,
    /// The transmissions.
    pub stages: Vec<Stage>,
    /// The sources.
    pub sources: Vec<SourceAt>,
    /// The loads.
    pub loads: Vec<LoadAt>,
    /// The shaft where everything is balanced.
    pub root: usize,
    /// Stages from the ends of the tree to the root.
    pub order: Vec<usize>,
    /// The set speed, as a speed of the root.
    pub set: Option<f64>,
    /// A speed of the root of the order of the highest useful one.
    pub scale: f64,
    /// How to sum up the net effort.
    pub program: Program,
    /// Inertias that are not given.
    pub missing_inertia: Vec<Fault>,
}

impl Assembly {
    /// Puts a drive together.
    pub fn new(spec: &DriveSpec) -> Result<Self, Vec<Fault>> {
        let models = models(spec)?;
        let roles: Vec<Role> = spec.parts.iter().map(|part| part.row.role).collect();
        let tree = tree(&spec.chain, &roles, &models)?;
        let gears = gears_engaged(spec, &tree, &models)?;
        let root = root(spec, &tree, &models, &gears);
        let (far, order) = directed(&tree, root);
        let stages = stages(&tree, &models, &gears, &far);
        self_locking_in_branch(&stages, &models)?;
        let mut shafts = shafts(&tree, &stages, &order, root);
        turn(&mut shafts, &tree, spec.settings.direction);
        let missing_inertia = inertias(&mut shafts, &tree, &models);
        let loads: Vec<LoadAt> = tree
            .loads
            .iter()
            .filter_map(|at| {
                let Model::Load(load) = models[at.part].as_ref() else { return None };
                Some(LoadAt { at: *at, demand: load.demand(), sense: shafts[at.shaft].sense })
            })
            .collect();
        let mut drive = Self {
            spec: spec.clone(),
            models,
            tree,
            shafts,
            stages,
            sources: Vec::new(),
            loads,
            root,
            order,
            set: None,
            scale: 1.0,
            program: Program::default(),
            missing_inertia,
        };
        drive.set = match &spec.settings.set_speed {
            Some(stated) => Some(drive.coordinate(stated)?),
            None => None,
        };
        drive.sources = sources(&drive)?;
        if let Some(fault) = held::more_than_one(&drive) {
            return Err(vec![fault]);
        }
        for source in &drive.sources {
            if source.behind.is_some() {
                // It runs up by itself, nearly unloaded; the load comes after.
                drive.shafts[source.at.shaft].inertia = 0.0;
            }
        }
        drive.scale = drive.natural_scale();
        drive.program = Program::new(&drive);
        Ok(drive)
    }

    /// The transmission of a stage.
    pub fn transmission(&self, stage: &Stage) -> Option<&dyn Transmission> {
        match self.models[stage.at.part].as_ref() {
            Model::Transmission(model) => Some(model.as_ref()),
            _ => None,
        }
    }

    /// The model of a load.
    pub fn load(&self, load: &LoadAt) -> Option<&dyn Load> {
        match self.models[load.at.part].as_ref() {
            Model::Load(model) => Some(model.as_ref()),
            _ => None,
        }
    }

    /// The shaft at a side of a part; the usual side of its role when none is named, the first load for the drive.
    pub fn shaft_of(&self, part: Option<usize>, port: Option<Port>) -> Option<usize> {
        let Some(part) = part else { return self.tree.loads.first().map(|load| load.shaft) };
        if let Some(hung) = self.tree.sources.iter().chain(&self.tree.loads).find(|h| h.part == part) {
            return Some(hung.shaft);
        }
        let stage = self.tree.stages.iter().find(|s| s.part == part)?;
        Some(if port == Some(Port::Input) { stage.input } else { stage.output })
    }

    /// A stated speed as a speed of the root.
    pub fn coordinate(&self, stated: &StatedSpeed) -> Result<f64, Vec<Fault>> {
        let wrong = |how| vec![Fault { part: stated.part, kind: FaultKind::Chain { how: Note::plain(how) } }];
        let shaft = match self.shaft_of(stated.part, stated.port) {
            Some(shaft) => shaft,
            None => return Err(wrong("a speed is stated at a part that does not stand in this drive")),
        };
        if self.sources.iter().any(|s| s.at.shaft == shaft && s.behind.is_some()) {
            let how = "a source before a fluid coupling has a speed of its own: state the speed of a part behind it";
            return Err(wrong(how));
        }
        let x = stated.speed / self.shafts[shaft].speed;
        if x > 0.0 && x.is_finite() {
            Ok(x)
        } else {
            Err(wrong("a stated speed must be above zero: it is counted in the direction of motion"))
        }
    }

    /// The speed of a shaft while the root runs at `x` under these efforts: of a source behind a fluid coupling its own.
    pub fn speed_at(&self, shaft: usize, x: f64, flow: &Flow<f64>) -> f64 {
        let speed = x * self.shafts[shaft].speed;
        let own = self.sources.iter().zip(&flow.sources).find(|(s, _)| s.at.shaft == shaft);
        own.map_or(speed, |(source, effort)| source.own_speed(speed, *effort))
    }

    fn natural_scale(&self) -> f64 {
        let mut scale = self.set.unwrap_or(0.0);
        for source in &self.sources {
            if let Some(character) = &source.character {
                scale = f64::max(scale, character.top_speed / self.shafts[source.at.shaft].speed);
            }
        }
        for load in &self.loads {
            if let Some(usual) = self.load(load).and_then(|l| l.usual_speed()) {
                scale = f64::max(scale, usual / self.shafts[load.at.shaft].speed);
            }
        }
        if scale > 0.0 && scale.is_finite() { scale } else { 1000.0 }
    }

    /// Speeds of the root at which the net effort jumps, rising.
    pub fn jumps(&self) -> Vec<f64> {
        let mut jumps = Vec::new();
        for source in &self.sources {
            let speed = self.shafts[source.at.shaft].speed;
            jumps.extend(source.jumps().into_iter().map(|w| w / speed));
        }
        for load in &self.loads {
            let factor = load.sense / self.shafts[load.at.shaft].speed;
            jumps.extend(load.demand.jumps().into_iter().map(|w| w * factor));
        }
        for stage in &self.stages {
            let speed = self.shafts[stage.at.input].speed;
            jumps.extend(stage.drag.iter().flat_map(|d| d.jumps()).map(|w| w / speed));
        }
        jumps.retain(|x| x.is_finite());
        jumps.sort_by(f64::total_cmp);
        jumps.dedup_by(|a, b| (*a - *b).abs() <= 4.0 * super::BESIDE * b.abs());
        jumps
    }

    /// Speeds of the root at which the slope jumps, rising; not all.
    pub fn kinks(&self) -> Vec<f64> {
        let mut kinks = Vec::new();
        for source in &self.sources {
            let speed = self.shafts[source.at.shaft].speed;
            kinks.extend(source.kinks().into_iter().map(|w| w / speed));
        }
        for load in &self.loads {
            let factor = load.sense / self.shafts[load.at.shaft].speed;
            kinks.extend(load.demand.kinks().into_iter().map(|w| w * factor));
        }
        kinks.retain(|x| x.is_finite());
        kinks.sort_by(f64::total_cmp);
        kinks
    }
}

fn models(spec: &DriveSpec) -> Result<Vec<Arc<Model>>, Vec<Fault>> {
    let mut models = Vec::with_capacity(spec.parts.len());
    let mut faults = Vec::new();
    for (index, part) in spec.parts.iter().enumerate() {
        match (part.row.build)(&part.values) {
            Ok(model) => models.push(Arc::new(model)),
            Err(found) => {
                faults.extend(found.into_iter().map(|f| Fault { part: f.part.or(Some(index)), ..f }));
            }
        }
    }
    if faults.is_empty() { Ok(models) } else { Err(faults) }
}
