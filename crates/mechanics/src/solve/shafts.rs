//! Which way efforts are gathered, how fast each shaft turns, and what inertia sits on it.

use std::sync::Arc;

use super::assembly::{Far, Shaft, Stage};
use super::chain::{Hung, Tree};
use crate::drive::{Direction, DriveSpec};
use crate::fault::{Fault, FaultKind, Note};
use crate::model::{Known, Model, Motion, Transmission};

/// The names of the gears a drive can be in: those all its gearboxes have.
pub(crate) fn gear_names(tree: &Tree, models: &[Arc<Model>]) -> Vec<String> {
    let mut common: Option<Vec<String>> = None;
    for stage in &tree.stages {
        let Model::Transmission(model) = models[stage.part].as_ref() else { continue };
        let names = model.gears();
        if names.is_empty() {
            continue;
        }
        common = Some(match common {
            None => names,
            Some(so_far) => so_far.into_iter().filter(|name| names.contains(name)).collect(),
        });
    }
    common.unwrap_or_default()
}

/// The gear of every stage.
pub(super) fn gears_engaged(
    spec: &DriveSpec,
    tree: &Tree,
    models: &[Arc<Model>],
) -> Result<Vec<usize>, Vec<Fault>> {
    let mut engaged = Vec::new();
    let mut faults = Vec::new();
    for stage in &tree.stages {
        let Model::Transmission(model) = models[stage.part].as_ref() else { continue };
        if let Some(index) = model.gear_towards(spec.settings.direction) {
            engaged.push(index);
            continue;
        }
        let names = model.gears();
        let kind = match (&spec.settings.gear, names.len()) {
            (_, 0) | (None, 1) => {
                engaged.push(0);
                continue;
            }
            (Some(gear), _) => match names.iter().position(|name| name == gear) {
                Some(index) => {
                    engaged.push(index);
                    continue;
                }
                None => FaultKind::Chain {
                    how: Note::plain("this gearbox has no gear of the name the drive engages"),
                },
            },
            (None, _) => FaultKind::Missing {
                any_of: vec![vec!["gear"]],
                why: Note::plain("the gearbox has several gears and none is chosen silently"),
            },
        };
        faults.push(Fault { part: Some(stage.part), kind });
    }
    if faults.is_empty() { Ok(engaged) } else { Err(faults) }
}

/// The stages on the way from a shaft to the first load, or to the root of its part of the tree.
fn way(tree: &Tree, from: usize, to: usize) -> Vec<usize> {
    let mut came: Vec<Option<Option<usize>>> = vec![None; tree.shafts.len()];
    came[from] = Some(None);
    let mut queue = vec![from];
    let mut next = 0;
    while next < queue.len() {
        let shaft = queue[next];
        next += 1;
        for (index, stage) in tree.stages.iter().enumerate() {
            let other = if stage.input == shaft {
                stage.output
            } else if stage.output == shaft {
                stage.input
            } else {
                continue;
            };
            if came[other].is_none() {
                came[other] = Some(Some(index));
                queue.push(other);
            }
        }
    }
    let mut path = Vec::new();
    let mut at = to;
    while let Some(Some(index)) = came[at] {
        path.push(index);
        let stage = &tree.stages[index];
        at = if stage.input == at { stage.output } else { stage.input };
    }
    path.reverse();
    path
}

/// Where to balance: on the shaft at which the ways of all sources that are on to the first load have met, so that a
/// single source is balanced at its own shaft; but behind the last freewheel, neutral gear or open clutch on the
/// common way.
pub(super) fn root(spec: &DriveSpec, tree: &Tree, models: &[Arc<Model>], gears: &[usize]) -> usize {
    let goal = tree.loads[0].shaft;
    let on = |source: &&Hung| spec.parts[source.part].on;
    let mut ways: Vec<Vec<usize>> =
        tree.sources.iter().filter(on).map(|s| way(tree, s.shaft, goal)).collect();
    if ways.is_empty() {
        ways = tree.sources.iter().map(|s| way(tree, s.shaft, goal)).collect();
    }
    let mut common = 0;
    while ways
        .iter()
        .all(|w| w.len() > common && w[w.len() - 1 - common] == ways[0][ways[0].len() - 1 - common])
    {
        common += 1;
    }
    let shared = &ways[0][ways[0].len() - common..];
    let mut root = shared.first().map_or(goal, |index| tree.stages[*index].input);
    for index in shared {
        let stage = &tree.stages[*index];
        let apart = |t: &dyn Transmission| t.one_way() || t.open(gears[*index]);
        if matches!(models[stage.part].as_ref(), Model::Transmission(t) if apart(t.as_ref())) {
            root = stage.output;
        }
    }
    root
}

/// Which end of each stage is away from the root, and the stages from the ends to the root.
pub(super) fn directed(tree: &Tree, root: usize) -> (Vec<Far>, Vec<usize>) {
    let mut far = vec![Far::Output; tree.stages.len()];
    let mut seen = vec![false; tree.stages.len()];
    let mut order = Vec::with_capacity(tree.stages.len());
    let mut touching: Vec<Vec<usize>> = vec![Vec::new(); tree.shafts.len()];
    for (index, stage) in tree.stages.iter().enumerate() {
        touching[stage.input].push(index);
        touching[stage.output].push(index);
    }
    let mut queue = vec![root];
    let mut next = 0;
    while next < queue.len() {
        let shaft = queue[next];
        next += 1;
        for index in &touching[shaft] {
            if seen[*index] {
                continue;
            }
            seen[*index] = true;
            let stage = &tree.stages[*index];
            far[*index] = if stage.input == shaft { Far::Output } else { Far::Input };
            queue.push(if stage.input == shaft { stage.output } else { stage.input });
            order.push(*index);
        }
    }
    order.reverse();
    (far, order)
}

pub(super) fn stages(tree: &Tree, models: &[Arc<Model>], gears: &[usize], far: &[Far]) -> Vec<Stage> {
    let mut stages = Vec::with_capacity(tree.stages.len());
    for (index, at) in tree.stages.iter().enumerate() {
        let Model::Transmission(model) = models[at.part].as_ref() else { continue };
        stages.push(Stage {
            at: *at,
            gear: gears[index],
            coupling: model.coupling(gears[index]),
            drag: model.drag(),
            one_way: model.one_way(),
            open: model.open(gears[index]),
            far: far[index],
        });
    }
    stages
}

/// A self-locking stage between two sources cannot be solved from its source side.
pub(super) fn self_locking_in_branch(stages: &[Stage], models: &[Arc<Model>]) -> Result<(), Vec<Fault>> {
    let locked = |stage: &&Stage| {
        stage.far == Far::Input
            && matches!(stage.coupling.backward, Known::Value(value) if value <= 0.0)
            && matches!(models[stage.at.part].as_ref(), Model::Transmission(_))
    };
    match stages.iter().find(locked) {
        None => Ok(()),
        Some(stage) => {
            let how = "a self-locking stage in one of several joined branches is not covered: put it behind the \
                       shaft where they meet";
            Err(vec![Fault { part: Some(stage.at.part), kind: FaultKind::Chain { how: Note::plain(how) } }])
        }
    }
}

pub(super) fn shafts(tree: &Tree, stages: &[Stage], order: &[usize], root: usize) -> Vec<Shaft> {
    let blank = |motion: &Motion| Shaft { motion: *motion, speed: 1.0, inertia: 0.0, sense: 1.0 };
    let mut shafts: Vec<Shaft> = tree.shafts.iter().map(blank).collect();
    shafts[root].speed = 1.0;
    for index in order.iter().rev() {
        let stage = &stages[*index];
        let flip = if stage.coupling.reverses { -1.0 } else { 1.0 };
        match stage.far {
            Far::Output => {
                let near = shafts[stage.at.input];
                let far = &mut shafts[stage.at.output];
                far.speed = near.speed / stage.coupling.speed;
                far.sense = near.sense * flip;
            }
            Far::Input => {
                let near = shafts[stage.at.output];
                let far = &mut shafts[stage.at.input];
                far.speed = near.speed * stage.coupling.speed;
                far.sense = near.sense * flip;
            }
        }
    }
    shafts
}

/// Turns all shafts so that the first load moves the way that is asked for.
pub(super) fn turn(shafts: &mut [Shaft], tree: &Tree, direction: Direction) {
    let wanted = if direction == Direction::Forward { 1.0 } else { -1.0 };
    let flip = wanted * shafts[tree.loads[0].shaft].sense;
    for shaft in shafts {
        shaft.sense *= flip;
    }
}

pub(super) fn inertias(shafts: &mut [Shaft], tree: &Tree, models: &[Arc<Model>]) -> Vec<Fault> {
    let mut faults = Vec::new();
    let mut put = |shaft: usize, count: f64, part: usize, known: Known| match known {
        Known::Value(value) => shafts[shaft].inertia += count * value,
        Known::Missing(field) => {
            let why = Note::plain("run-up and stop need every inertia; a missing one is not zero");
            let kind = FaultKind::Missing { any_of: vec![vec![field]], why };
            faults.push(Fault { part: Some(part), kind });
        }
    };
    for hung in tree.sources.iter().chain(&tree.loads) {
        match models[hung.part].as_ref() {
            Model::Source(source) => put(hung.shaft, hung.count, hung.part, source.inertia()),
            Model::Load(load) => put(hung.shaft, hung.count, hung.part, load.inertia()),
            _ => {}
        }
    }
    for stage in &tree.stages {
        if let Model::Transmission(model) = models[stage.part].as_ref() {
            put(stage.input, stage.count, stage.part, model.input_inertia());
            put(stage.output, stage.count, stage.part, model.output_inertia());
        }
    }
    faults
}
