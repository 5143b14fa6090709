//! The command line; see `src/commands`.
fn main() {}
