//! From the tree of a spec to its analysis: names, kinds, cases, drives, verdicts, findings.
//!
//! One pure function stands in the middle, [`analyze`]: the same texts give the same analysis, to the bit. Each stage
//! is total: it runs on what survived the stage before, and what it finds wrong it reports once, at its root.
//!
//! ```text
//! texts -> load -> defs -> cases -> eval (values, fields, drives) -> criteria -> findings -> allow -> Analysis
//! ```

pub mod analysis;
pub mod files;
pub mod index;
pub mod number;
pub mod quantity;
pub mod say;
pub mod unit;

mod allow;
mod cases;
mod criteria;
mod defs;
mod drives;
mod eval;
mod faults;
mod fields;
mod findings;
mod gears;
mod load;
mod piled;
mod record;
mod sink;
mod solver;
mod unit_memo;
mod world;

use std::sync::Arc;

pub use analysis::Analysis;
pub use files::{Files, MemoryFiles, NoFiles, ReadError};

use eval::Shared;

/// The trees and solved drives of the state analyzed before, so that an edit costs the items and drives it touches. A
/// memo skips work and never changes an answer; what a state does not use is dropped behind it.
#[derive(Debug, Default)]
pub struct Memo {
    texts: std::collections::BTreeMap<String, layshaft_syntax::Memo>,
    solver: solver::Solver,
}

impl Memo {
    fn parse(&mut self, path: &str, text: &str) -> Arc<layshaft_syntax::File> {
        let memo = self.texts.entry(path.to_owned()).or_default();
        Arc::new(layshaft_syntax::parse_with(text, memo))
    }

    /// Drops what this state of the texts did not use.
    fn forget_unused(&mut self, world: &world::World) {
        let used: std::collections::BTreeSet<&str> = world.files.iter().map(|file| &*file.path).collect();
        self.texts.retain(|path, _| used.contains(&**path));
        self.solver.forget_unused();
    }

    /// How many drives, and questions about them at stated speeds, are remembered.
    #[must_use]
    pub fn solved(&self) -> usize {
        self.solver.len()
    }
}

/// Analyzes the spec `path` with the text `text`; `files` hands out what it uses.
///
/// `path` is relative to the root that `files` reads from, `/` between names.
#[must_use]
pub fn analyze(path: &str, text: Arc<str>, files: &dyn Files) -> Analysis {
    analyze_with(path, text, files, &mut Memo::default())
}

/// The same, item trees kept from an earlier state of the texts. The answer is that of [`analyze`], to the bit.
#[must_use]
pub fn analyze_with(path: &str, text: Arc<str>, files: &dyn Files, memo: &mut Memo) -> Analysis {
    let sink = sink::Sink::default();
    let world = load::load(path, text, files, memo, &sink);
    let parts = defs::parts(&world, &sink);
    let drives = drives::drives(&world, &sink);
    let tables = fields::Tables::default();
    let units = unit_memo::Units::default();
    let shared = Shared {
        world: &world,
        parts: &parts,
        drives: &drives,
        files,
        tables: &tables,
        solver: &memo.solver,
        units: &units,
        sink: &sink,
    };
    let mut analysis = Analysis::default();
    record::identity(shared, &mut analysis);
    let states = cases::states(shared);
    record::check_everything(&states);
    let mut extra = Vec::new();
    analysis.criteria = criteria::judge(shared, &states, &mut extra);
    analysis.shows = criteria::shows(shared, &states, &mut extra);
    let all: Vec<&cases::State<'_>> = states.iter().chain(&extra).collect();
    findings::report(shared, &all);
    piled::report(shared);
    record::record(shared, &all, &mut analysis);
    let found = sink.finish();
    allow::accept(shared, found, &mut analysis);
    analysis.files.clone_from(&world.files);
    // What was stopped half-way has not come to ask for everything that is still good.
    if !files.interrupted() {
        memo.forget_unused(&world);
    }
    analysis
}

/// Reads a spec and the files it uses and evaluates nothing: the texts and trees alone, for what asks for names.
#[must_use]
pub fn read(path: &str, text: Arc<str>, files: &dyn Files, memo: &mut Memo) -> Analysis {
    let world = load::load(path, text, files, memo, &sink::Sink::default());
    Analysis { files: world.files, ..Analysis::default() }
}
