//! Power plants.

mod dc_draw;
pub mod dc_motor;
mod dc_reading;
pub mod induction_motor;
mod line_reading;
pub mod measured_curve;
pub mod person;
mod plate_reading;
pub mod servo;
pub mod straight_line;
pub mod straight_line_force;
