//! The command line: raw arguments → a checked request → its run. `main` owns the exit codes.

mod arguments;
mod run;
mod switches;

pub use arguments::Arguments;
pub use run::{Failure, Outcome, run};
