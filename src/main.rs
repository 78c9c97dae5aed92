//! Starts the program and hands its exit code to the system. It never decides anything.

use std::process::ExitCode;

fn main() -> ExitCode {
    stumpside::cli::run()
}
