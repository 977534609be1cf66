//! The `stagebits` command.
fn main() {}
