//! Renderings of results, text for a terminal and JSON for a program, and where they are written.

pub mod figures;
pub mod file;
pub mod json;
pub mod table;
pub mod text;
