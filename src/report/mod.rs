//! Results for readers: what to say (`describe`), as a neutral document, and how it looks
//! (`render`). Nothing here computes physics.

pub mod axis;
pub mod chart;
pub mod describe;
pub mod document;
pub mod figure;
pub mod harmless;
pub mod number;
pub mod render;
