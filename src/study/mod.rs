//! Many cavities, few analyses: sweeps and tolerances.

pub mod batch;
pub mod sweep;
pub mod tolerance;
