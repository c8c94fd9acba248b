//! Sources, transmissions, loads and the solver for their operating points: plain values in, plain values out.
//!
//! This crate knows no syntax and no spans. Beside every law stands its [`registry`] row: fields, results, kinds,
//! ranges, words, formula text and source as plain data, from which checking, completion, reference and messages
//! are derived.

pub mod curve;
pub mod drive;
pub mod fault;
pub mod kinds;
pub mod laws;
pub mod model;
pub mod registry;
pub mod scalar;
pub mod solution;
pub mod solve;
pub mod typed;
pub mod values;

pub use solve::{OperatingPoint, Solution, gears, solve, solve_at};
