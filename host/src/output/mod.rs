//! Renderings of results: text and JSON.

pub mod figures;
pub mod table;
