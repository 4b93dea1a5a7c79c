//! The merestone program.
fn main() {}
