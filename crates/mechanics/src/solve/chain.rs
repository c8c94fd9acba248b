//! From the words of a chain to shafts: which part sits between which, and what hangs where.
//!
//! Every shaft has one motion; every transmission stands between two shafts; the shafts form one tree.

use std::sync::Arc;

use crate::drive::Chain;
use crate::fault::{Fault, FaultKind, Note};
use crate::model::{Model, Motion};
use crate::registry::Role;

/// A transmission between two shafts.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Between {
    /// The part.
    pub part: usize,
    /// Equal parts side by side.
    pub count: f64,
    /// The shaft at its input.
    pub input: usize,
    /// The shaft at its output.
    pub output: usize,
}

/// A source or load on a shaft.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Hung {
    /// The part.
    pub part: usize,
    /// Equal parts side by side.
    pub count: f64,
    /// The shaft.
    pub shaft: usize,
}

/// The shafts of a drive.
#[derive(Clone, Debug, Default)]
pub(crate) struct Tree {
    /// Motion of each shaft.
    pub shafts: Vec<Motion>,
    /// Transmissions, in the order of the chain.
    pub stages: Vec<Between>,
    /// Sources, in the order of the chain.
    pub sources: Vec<Hung>,
    /// Loads, in the order of the chain.
    pub loads: Vec<Hung>,
}

/// Nesting beyond this is refused.
const DEEPEST: usize = 256;

fn fault(part: Option<usize>, how: &'static str) -> Fault {
    Fault { part, kind: FaultKind::Chain { how: Note::plain(how) } }
}

/// Builds the tree.
pub(crate) fn tree(chain: &Chain, roles: &[Role], models: &[Arc<Model>]) -> Result<Tree, Vec<Fault>> {
    let mut walk = Walk { roles, models, tree: Tree::default(), used: vec![false; models.len()] };
    let out = walk.chain(chain, None, 0).map_err(|fault| vec![fault])?;
    let mut faults = Vec::new();
    if out.is_some() {
        faults.push(fault(None, "the chain ends without a load: put the driven machine at its end"));
    }
    if walk.tree.sources.is_empty() {
        faults.push(fault(None, "no source drives this chain: it starts with the power plant"));
    }
    if walk.tree.loads.is_empty() && out.is_none() {
        faults.push(fault(None, "nothing is driven: put a load at the end of the chain"));
    }
    if faults.is_empty() { Ok(walk.tree) } else { Err(faults) }
}

struct Walk<'a> {
    roles: &'a [Role],
    models: &'a [Arc<Model>],
    tree: Tree,
    used: Vec<bool>,
}

impl Walk<'_> {
    /// Walks a piece of chain that begins at shaft `entering`, or with sources; gives the shaft it ends at, or none
    /// when it ends in loads.
    fn chain(
        &mut self,
        chain: &Chain,
        entering: Option<usize>,
        depth: usize,
    ) -> Result<Option<usize>, Fault> {
        if depth > DEEPEST {
            return Err(fault(None, "the chain is nested too deeply"));
        }
        match chain {
            Chain::Part { index, count } => self.part(*index, *count, entering),
            Chain::Series(pieces) => {
                let mut at = entering;
                for (place, piece) in pieces.iter().enumerate() {
                    if place > 0 && at.is_none() {
                        return Err(fault(
                            first_part(piece),
                            "a load ends its branch: nothing can stand behind it",
                        ));
                    }
                    at = self.chain(piece, at, depth + 1)?;
                }
                Ok(at)
            }
            Chain::Joined(branches) => self.joined(branches, entering, depth),
        }
    }

    /// Branches on one shaft: those that begin with sources bring it, or lie on the one that is entered.
    fn joined(
        &mut self,
        branches: &[Chain],
        entering: Option<usize>,
        depth: usize,
    ) -> Result<Option<usize>, Fault> {
        let own = |chain: &Chain| first_part(chain).and_then(|p| self.roles.get(p)) == Some(&Role::Source);
        let (sources, others): (Vec<&Chain>, Vec<&Chain>) = branches.iter().partition(|b| own(b));
        let mut shaft = None;
        let mut through = 0;
        let ahead = |walk: &mut Self, branch: &Chain, from: Option<usize>, shaft: &mut Option<usize>| {
            let out = walk.chain(branch, from, depth + 1)?;
            if let Some(out) = out {
                *shaft = Some(match *shaft {
                    Some(first) => walk.join(first, out, first_part(branch))?,
                    None => out,
                });
            }
            Ok::<bool, Fault>(out.is_some())
        };
        for branch in sources {
            ahead(self, branch, None, &mut shaft)?;
        }
        let from = entering.or(shaft);
        for branch in others {
            if from.is_none() {
                return Err(fault(first_part(branch), "nothing drives this branch"));
            }
            if ahead(self, branch, from, &mut shaft)? {
                through += 1;
            }
        }
        let closed = through > 1 || (through > 0 && entering.is_none());
        if closed {
            let how = "two paths lie between the same shafts: only sources and loads can share a shaft";
            return Err(fault(branches.first().and_then(first_part), how));
        }
        Ok(if entering.is_some() && through == 0 && shaft.is_none() { None } else { shaft })
    }

    fn part(&mut self, index: usize, count: u32, entering: Option<usize>) -> Result<Option<usize>, Fault> {
        let at = Some(index);
        match self.used.get_mut(index) {
            None => return Err(fault(None, "the chain names a part that the drive does not have")),
            Some(used) if *used => {
                return Err(fault(
                    at,
                    "this part stands in the chain twice: declare a second one, or a variant",
                ));
            }
            Some(used) => *used = true,
        }
        if count == 0 {
            return Err(fault(at, "none of this part: the number before it must be 1 or more"));
        }
        let count = f64::from(count);
        match (self.models[index].as_ref(), entering) {
            (Model::Source(source), None) => {
                let shaft = self.shaft(source.motion());
                self.tree.sources.push(Hung { part: index, count, shaft });
                Ok(Some(shaft))
            }
            (Model::Source(_), Some(_)) => Err(fault(
                at,
                "a source stands at the beginning of its branch; join it with + to what drives beside it",
            )),
            (Model::Transmission(stage), Some(input)) => {
                self.same_motion(input, stage.input(), at)?;
                let output = self.shaft(stage.output());
                self.tree.stages.push(Between { part: index, count, input, output });
                Ok(Some(output))
            }
            (Model::Load(load), Some(shaft)) => {
                self.same_motion(shaft, load.motion(), at)?;
                self.tree.loads.push(Hung { part: index, count, shaft });
                Ok(None)
            }
            (Model::Transmission(_) | Model::Load(_), None) => {
                Err(fault(at, "nothing drives this part: the chain starts with a source"))
            }
            (Model::Supply(_), _) => Err(fault(
                at,
                "a supply does not stand in the chain: name it in the field `supply` of a source",
            )),
        }
    }

    fn shaft(&mut self, motion: Motion) -> usize {
        self.tree.shafts.push(motion);
        self.tree.shafts.len() - 1
    }

    fn same_motion(&self, shaft: usize, motion: Motion, part: Option<usize>) -> Result<(), Fault> {
        match (self.tree.shafts[shaft], motion) {
            (a, b) if a == b => Ok(()),
            (Motion::Rotary, _) => {
                let how = "this part is pulled straight, but what stands before it turns: a drum, wheel, rack or \
                           screw must stand between";
                Err(fault(part, how))
            }
            (Motion::Linear, _) => {
                let how = "this part turns, but what stands before it runs straight: a drum, wheel, rack or screw \
                           must stand between";
                Err(fault(part, how))
            }
        }
    }

    /// Makes two shafts one.
    fn join(&mut self, first: usize, second: usize, part: Option<usize>) -> Result<usize, Fault> {
        self.same_motion(first, self.tree.shafts[second], part)?;
        let rename = |shaft: &mut usize| {
            if *shaft == second {
                *shaft = first;
            }
        };
        for stage in &mut self.tree.stages {
            rename(&mut stage.input);
            rename(&mut stage.output);
        }
        for hung in self.tree.sources.iter_mut().chain(&mut self.tree.loads) {
            rename(&mut hung.shaft);
        }
        Ok(first)
    }
}

/// The part a piece of chain begins with.
fn first_part(chain: &Chain) -> Option<usize> {
    let mut at = chain;
    loop {
        match at {
            Chain::Part { index, .. } => return Some(*index),
            Chain::Series(pieces) | Chain::Joined(pieces) => at = pieces.first()?,
        }
    }
}
