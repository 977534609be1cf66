//! What can be written on the command line.

use std::path::PathBuf;

use clap::{Args, Parser, Subcommand};

/// Prove that a microcontroller's integers are good enough for a chain of two-ports.
#[derive(Debug, Parser)]
#[command(version, about, max_term_width = 80, after_help = AFTER)]
pub struct Arguments {
    /// What to do.
    #[command(subcommand)]
    pub command: Command,
}

const AFTER: &str = "Exit status: 0 met, 1 accuracy not met, 2 bad input or usage, \
    3 result not written.\n\nExample: stagebits budget examples/tide-gauge-buoy.toml";

/// The commands.
#[derive(Debug, Subcommand)]
pub enum Command {
    /// Show what the chain does over its band, in f64 and in the firmware's words.
    #[command(after_help = "Example: stagebits respond buoy.toml --load '36 ohm, -120 ohm'")]
    Respond(Respond),
    /// Show how wrong the firmware's words are over the whole envelope, and why.
    #[command(after_help = "Example: stagebits budget buoy.toml --word-bits 16 --points 1000000")]
    Budget(Budget),
    /// Show every word length and f32 over the envelope, and which is long enough.
    #[command(after_help = "Example: stagebits size buoy.toml --points 1000000")]
    Size(Size),
}

/// Arguments of `respond`.
#[derive(Debug, Args)]
pub struct Respond {
    /// What every command takes.
    #[command(flatten)]
    pub common: Common,
    /// The words.
    #[command(flatten)]
    pub words: Words,
    /// Load impedance as 'R, X' [default: the first load listed, else the reference resistance].
    #[arg(long, value_name = "R, X", allow_hyphen_values = true)]
    pub load: Option<String>,
    /// State of the banks, a word for each from the radio side, bit 0 for the first step
    /// [default: all steps off].
    #[arg(long, value_name = "WORD, ...", allow_hyphen_values = true)]
    pub switches: Option<String>,
}

/// Arguments of `budget`.
#[derive(Debug, Args)]
pub struct Budget {
    /// What every command takes.
    #[command(flatten)]
    pub common: Common,
    /// The words.
    #[command(flatten)]
    pub words: Words,
    /// The search.
    #[command(flatten)]
    pub search: Search,
}

/// Arguments of `size`.
#[derive(Debug, Args)]
pub struct Size {
    /// What every command takes.
    #[command(flatten)]
    pub common: Common,
    /// The search.
    #[command(flatten)]
    pub search: Search,
}

/// What every command takes.
#[derive(Debug, Args)]
pub struct Common {
    /// The chain file.
    pub file: PathBuf,
    /// Write JSON.
    #[arg(long)]
    pub json: bool,
    /// Write to a file rather than to standard output.
    #[arg(long, value_name = "PATH")]
    pub output: Option<PathBuf>,
}

/// The words, where there is one kind of them.
#[derive(Debug, Args)]
pub struct Words {
    /// Word length in bits, 10 to 32, in place of the chain file's.
    #[arg(long, value_name = "BITS", value_parser = clap::value_parser!(u32).range(10..=32))]
    pub word_bits: Option<u32>,
}

/// How thoroughly the envelope is searched.
#[derive(Debug, Args)]
pub struct Search {
    /// Frequency and load pairs to try before the local ascent.
    #[arg(long, default_value_t = 100_000, value_parser = clap::value_parser!(u64).range(1..=1_000_000_000_000))]
    pub points: u64,
    /// Seed of the random points.
    #[arg(long, default_value_t = 1)]
    pub seed: u64,
}
