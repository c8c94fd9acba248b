//! What stands between two shafts.

pub mod gear;
