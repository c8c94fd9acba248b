//! What feeds sources.

pub mod battery;
pub mod dc_bus;
pub mod mains;
