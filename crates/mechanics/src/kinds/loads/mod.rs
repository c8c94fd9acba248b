//! Driven machines.

pub mod quadratic;
