//! Power plants.

mod line_reading;
pub mod straight_line;
pub mod straight_line_force;
