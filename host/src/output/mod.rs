//! Renderings of results: text for a terminal, JSON for a program.

pub mod figures;
pub mod json;
pub mod table;
pub mod text;
