//! How a document or a result looks on a given medium.

pub mod csv;
pub mod diagnostics;
pub mod json;
pub mod plot;
pub mod terminal;
