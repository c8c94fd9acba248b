//! The Layshaft language: lexer, grammar, tree and formatter.
//!
//! [`parse`] is total: any text gives a [`File`] of items, each with its own problems, and a broken item
//! leaves its neighbours whole.

pub mod tree;

pub use tree::*;
