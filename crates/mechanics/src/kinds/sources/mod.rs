//! Power plants.

pub mod dc_motor;
mod dc_reading;
mod line_reading;
pub mod straight_line;
pub mod straight_line_force;
