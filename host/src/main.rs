//! The `stagebits` command.

use std::io::Write;
use std::process::ExitCode;

use clap::Parser;
use stagebits::cli::{Arguments, Failure, Outcome, run};

fn main() -> ExitCode {
    // clap itself ends with 2 on bad usage
    let arguments = Arguments::parse();
    match run(&arguments) {
        Ok(Outcome::Met) => ExitCode::SUCCESS,
        Ok(Outcome::NotMet) => ExitCode::from(1),
        Err(Failure::Input(diagnostic)) => fail(2, &diagnostic.to_string()),
        Err(Failure::Usage(message)) => fail(2, &format!("error: {message}")),
        Err(Failure::Write(message)) => fail(3, &format!("error: cannot write {message}")),
    }
}

fn fail(code: u8, message: &str) -> ExitCode {
    // nowhere else to say it
    let _ = writeln!(std::io::stderr(), "{message}");
    ExitCode::from(code)
}
