//! Starts the program.

use std::process::ExitCode;

fn main() -> ExitCode {
    plumbfold::program(std::env::args_os(), &mut std::io::stdout(), &mut std::io::stderr()).into()
}
