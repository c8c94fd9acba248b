//! Runtime kinds of quantity, their algebra, and the unit table.
