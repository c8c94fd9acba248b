//! Editor features in editor words: offsets, labels, markup, never protocol types.
//!
//! One feature a file, each a function of a [`Snapshot`] and a place; a handler of the server converts, asks, converts.

pub mod definition;
#[cfg(test)]
mod fixture;
pub mod folding;
pub mod hover;
pub mod links;
mod markup;
mod numbers;
pub mod references;
pub mod snapshot;
pub mod symbols;
mod tree;

pub use snapshot::Snapshot;
