//! Single elements: from their parameters to their ray matrices in the element's own two planes.

pub mod duct;
pub mod mirror;
pub mod surface;
