//! The command line of Plankform.

mod cli;

use std::process::ExitCode;

fn main() -> ExitCode {
    cli::run()
}
