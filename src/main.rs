//! The `modewright` command.

fn main() {}
