//! Every kind of part: one file a kind, with its registry row and its model beside it.

pub mod loads;
pub mod sources;
pub mod transmissions;

use crate::registry::KindRow;

/// Every kind, in the order of the reference.
pub static ROWS: &[&KindRow] =
    &[&sources::straight_line::ROW, &transmissions::gear::ROW, &loads::quadratic::ROW];
