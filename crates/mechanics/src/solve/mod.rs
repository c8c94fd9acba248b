//! The solver: from parts in a chain to operating points and everything that is asked about them.

mod extreme;
mod roots;
