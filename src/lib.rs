//! modewright: stability, mode sizes and tolerances of lasers and optical cavities.

pub mod analysis;
pub mod cavity;
pub mod cli;
pub mod diagnostic;
pub mod file;
pub mod numeric;
pub mod optics;
pub mod quantity;
pub mod report;
