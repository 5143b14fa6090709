//! The program: arguments in, library calls, exit code out. See `src/commands`.

mod commands;

fn main() -> std::process::ExitCode {
    commands::main()
}
