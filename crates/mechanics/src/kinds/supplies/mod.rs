//! What feeds sources.

pub mod battery;
pub mod compressed_air;
pub mod dc_bus;
pub mod hydraulic_unit;
pub mod mains;
