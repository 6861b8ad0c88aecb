//! Numerics without optics: the number type the physics is written over, and root finding.

mod dual;
mod lanes;
mod real;
pub mod roots;
pub mod statistics;

pub use dual::Dual;
pub use lanes::{LANES, LaneMask, Lanes};
pub use real::Real;
