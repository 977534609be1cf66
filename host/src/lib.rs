//! Prove that a microcontroller's integers are good enough for a chain of two-ports.
pub mod arithmetic;
pub mod budget;
pub mod chain_file;
pub mod cli;
pub mod comparison;
pub mod constants;
pub mod diagnostic;
pub mod envelope;
mod input;
pub mod output;
pub mod plan;
pub mod quantity;
pub mod reference;
pub mod respond;
pub mod size;
pub mod spread;
pub mod theory;
pub mod touchstone;
