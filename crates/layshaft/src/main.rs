//! The command. 
fn main() {}
