//! The `coldseam` binary.

use std::io::{stderr, stdout};
use std::process::ExitCode;

use coldseam::commands::{Terminal, run};

fn main() -> ExitCode {
    run(std::env::args_os(), &mut stdout(), &mut stderr(), &Terminal::detect()).into()
}
