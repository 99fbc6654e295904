//! The `tautring` command.

fn main() {}
