//! The `modewright` command; everything it does is a call of the library.

use std::process::ExitCode;

fn main() -> ExitCode {
    modewright::cli::run()
}
