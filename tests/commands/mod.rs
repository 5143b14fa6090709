//! The program as it is run: what it prints, where, and with which exit code.

mod messages;
mod results;

use assert_cmd::Command;

/// The program, its surroundings made plain.
fn haloshed() -> Command {
    let mut command = Command::new(assert_cmd::cargo::cargo_bin!("haloshed"));
    // The width of help pages must not follow the terminal of whoever runs the tests.
    command.env_remove("COLUMNS");
    command
}
