//! Laws that hold for any text whatever: of the reader, the formatter, the analysis and the reader of tables.
//!
//! Fuzzing looks for texts that break them; the seeds and what fuzzing found run as plain tests.

mod debug;
mod reading;
mod whole;
mod writing;

pub use reading::parse;
pub use whole::{analyze, csv};
pub use writing::format;
