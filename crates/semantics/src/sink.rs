//! Where the stages put what they find; one message for one mistake.

use std::cell::RefCell;
use std::collections::BTreeSet;

use layshaft_diagnostics::{Code, Diagnostic, FileSpan};

/// Collects findings. The same code at the same place is kept once: the first report, which is that of the plain spec,
/// stands, and what a case finds there again is the same mistake.
#[derive(Debug, Default)]
pub(crate) struct Sink {
    found: RefCell<Vec<Diagnostic>>,
    seen: RefCell<BTreeSet<(FileSpan, Code)>>,
}

impl Sink {
    /// Takes up a finding.
    pub fn push(&self, diagnostic: Diagnostic) {
        if self.seen.borrow_mut().insert((diagnostic.primary.place, diagnostic.code)) {
            self.found.borrow_mut().push(diagnostic);
        }
    }

    /// All findings, by file, place and code.
    pub fn finish(&self) -> Vec<Diagnostic> {
        let mut found = self.found.take();
        found.sort_by_key(|found| (found.primary.place, found.code));
        found
    }
}
