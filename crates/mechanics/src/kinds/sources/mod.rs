//! Power plants.

mod circuit_draw;
mod circuit_fields;
pub mod constant_speed;
mod dc_draw;
pub mod dc_motor;
mod dc_reading;
pub mod engine;
pub mod hydraulic_motor;
pub mod induction_circuit;
pub mod induction_motor;
mod line_reading;
pub mod measured_curve;
pub mod person;
mod plate_control;
mod plate_reading;
pub mod pneumatic_motor;
pub mod polynomial;
mod series_draw;
pub mod series_motor;
mod series_reading;
pub mod servo;
mod starting;
pub mod straight_line;
pub mod straight_line_force;
pub mod water_turbine;
pub mod wind_turbine;
