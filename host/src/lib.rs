//! Prove that a microcontroller's integers are good enough for a chain of two-ports.
pub mod constants;
pub mod plan;
pub mod reference;
