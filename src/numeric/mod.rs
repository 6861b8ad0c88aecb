//! Numerics without optics: the number type the physics is written over, root finding, quadrature.

mod dual;
mod lanes;
pub mod quadrature;
mod real;
pub mod roots;
pub mod statistics;

pub use dual::Dual;
pub use lanes::{LANES, LaneMask, Lanes};
pub use real::Real;
