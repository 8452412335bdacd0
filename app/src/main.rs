//! Wedgewright.
fn main() {}
