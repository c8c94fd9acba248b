//! Renderers of an analysis: for a reader at a terminal, for a program as JSON.

pub mod json;
pub mod terminal;
