//! The solver against closed forms and published checks.

mod apart;
mod fluid;
mod outcomes;
mod published;
mod random;
mod supplies;
mod transient;
mod worked;
