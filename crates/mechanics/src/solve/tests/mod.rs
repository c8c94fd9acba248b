//! The solver against closed forms and published checks.

mod outcomes;
mod published;
mod random;
mod supplies;
mod transient;
mod worked;
