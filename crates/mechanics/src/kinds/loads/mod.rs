//! Driven machines.

pub mod constant;
pub mod constant_power;
pub mod conveyor;
pub mod cutting;
pub mod fan;
mod fields;
pub mod flywheel;
pub mod generator;
pub mod hoist;
pub mod incline;
pub mod measured_curve;
pub mod off_axis_mass;
pub mod polynomial;
mod power;
pub mod power_law;
pub mod propeller;
mod pulled;
pub mod pump;
pub mod quadratic;
mod resisting;
#[cfg(test)]
mod testing;
mod turbo;
pub mod vehicle;
pub mod viscous;
pub mod winder;
pub mod work_stroke;
