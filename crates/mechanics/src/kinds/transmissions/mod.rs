//! What stands between two shafts, or between a shaft and a rope or wheel.

pub mod belt;
pub mod brake;
pub mod chain;
pub mod clutch;
pub mod coupling;
pub mod crank;
pub mod drum;
mod fixed;
pub mod fluid_coupling;
pub mod freewheel;
pub mod friction_pulley;
pub mod gear;
pub mod gearbox;
pub mod planetary;
pub mod rack;
pub mod reeving;
pub mod reversing_gear;
pub mod screw;
pub mod shaft;
mod shifted;
pub mod universal_joint;
pub mod variable;
pub mod wheel;
pub mod worm;
mod wrap;
