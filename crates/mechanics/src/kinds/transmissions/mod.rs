//! What stands between two shafts, or between a shaft and a rope or wheel.

pub mod belt;
pub mod brake;
pub mod chain;
pub mod coupling;
pub mod drum;
pub mod freewheel;
pub mod gear;
pub mod gearbox;
pub mod reeving;
pub mod wheel;
