//! What stands between two shafts, or between a shaft and a rope or wheel.

pub mod belt;
pub mod brake;
pub mod chain;
pub mod coupling;
pub mod drum;
mod fixed;
pub mod freewheel;
pub mod gear;
pub mod gearbox;
pub mod planetary;
pub mod reeving;
pub mod screw;
pub mod wheel;
pub mod worm;
