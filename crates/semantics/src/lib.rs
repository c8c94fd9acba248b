//! From the tree of a spec to its analysis: names, kinds, cases, drives, verdicts, findings.
//!
//! One pure function stands in the middle, [`analyze`]: the same texts give the same analysis, to the bit.

pub mod analysis;
pub mod files;
pub mod quantity;

pub use analysis::Analysis;
pub use files::{Files, ReadError};
