//! Power plants.

pub mod straight_line;
