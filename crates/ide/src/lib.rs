//! Editor features in editor words: offsets, labels, markup, never protocol types.
//!
//! One feature a file, each a function of a [`Snapshot`] and a place; a handler of the server converts, asks, converts.

pub mod actions;
pub mod base;
pub mod call_hierarchy;
pub mod completion;
mod cursor;
pub mod definition;
pub mod diagnostics;
pub mod documents;
#[cfg(test)]
mod fixture;
pub mod folding;
pub mod hints;
pub mod hover;
pub mod implementations;
pub mod lenses;
pub mod links;
mod markup;
pub mod moves;
mod names;
mod numbers;
pub mod on_type;
pub mod references;
pub mod results;
pub mod sensitivity;
pub mod signature;
pub mod snapshot;
pub mod symbols;
pub mod tokens;
mod tree;
pub mod type_definition;

pub use snapshot::Snapshot;
