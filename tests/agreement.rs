//! The fixed-point kernel against the f64 reference.
//!
//! Every tolerance is derived from the word length and the conditioning of the point at hand; see
//! `agreement/bound.rs`.

#[path = "agreement/bound.rs"]
mod bound;
#[path = "agreement/case.rs"]
mod case;
#[path = "agreement/moves.rs"]
mod moves;
#[allow(unused_imports, reason = "shared by several test programs")]
#[path = "published/mod.rs"]
mod published;
#[path = "agreement/published_chains.rs"]
mod published_chains;
#[path = "agreement/random_chains.rs"]
mod random_chains;
mod strategies;
#[path = "agreement/uncertain.rs"]
mod uncertain;
#[path = "agreement/words.rs"]
mod words;
