//! Driven machines.

pub mod constant;
mod fields;
pub mod flywheel;
pub mod hoist;
pub mod incline;
pub mod measured_curve;
pub mod polynomial;
mod pulled;
pub mod quadratic;
mod resisting;
pub mod vehicle;
pub mod viscous;
