//! Prove that a microcontroller's integers are good enough for a chain of two-ports.
pub mod chain_file;
pub mod diagnostic;
pub mod plan;
pub mod quantity;
