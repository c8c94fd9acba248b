//! The laws, one file each: formula, symbols with units, validity, source, revision, and the kernel that computes it.
//!
//! A kind (see `kinds`) puts laws together; a law knows no fields and no messages.

use crate::registry::Formula;

pub mod battery;
pub mod belt;
pub mod brake;
pub mod dc_machine;
pub mod drag;
pub mod gear;
pub mod incline;
pub mod inertia;
pub mod road;
pub mod rope;
pub mod straight_line;
pub mod synchronous;
pub mod wheel;
pub mod winding;

/// Standard gravity, m/s² (3rd CGPM, 1901; ISO 80000-3).
pub const G_N: f64 = 9.806_65;

/// A formula as it is printed, and the kernel that must equal it for every input of a box.
#[derive(Debug)]
pub struct Checked {
    /// The formula.
    pub formula: &'static Formula,
    /// Lowest and highest value of each symbol, in the order of `formula.symbols`.
    pub domain: &'static [(f64, f64)],
    /// The kernel; takes the symbols in that order, in SI.
    pub kernel: fn(&[f64]) -> f64,
}

/// Every formula with its kernel.
pub fn checked() -> impl Iterator<Item = &'static Checked> {
    let laws: [&'static [Checked]; 14] = [
        battery::CHECKED,
        belt::CHECKED,
        brake::CHECKED,
        dc_machine::CHECKED,
        drag::CHECKED,
        gear::CHECKED,
        incline::CHECKED,
        inertia::CHECKED,
        road::CHECKED,
        rope::CHECKED,
        straight_line::CHECKED,
        synchronous::CHECKED,
        wheel::CHECKED,
        winding::CHECKED,
    ];
    laws.into_iter().flatten()
}

#[cfg(test)]
pub(crate) mod testing;
