//! Numbers, tables and sentences shared by every renderer: what terminal, JSON, hover and record show is made here,
//! once, so that they cannot disagree. Plain data in, plain data out; nothing is coloured, escaped or laid out.
//!
//! [`sheet::sheet`] turns an analysis into what a reader is shown; [`shown::shown`] writes one value.

pub mod derivation;
pub mod escape;
pub mod kind;
pub mod note;
pub mod sheet;
pub mod shown;
pub mod unit;

pub use layshaft_semantics::number;
