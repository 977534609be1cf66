//! Proofs at link time.
