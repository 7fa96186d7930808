//! weldpole command line.
fn main() {}
