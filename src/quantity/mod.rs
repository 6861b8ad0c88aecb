//! Quantities as a builder writes them.

/// Kinds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)]
pub enum Kind {
    Length,
    Position,
    Radius,
    Face,
    Focal,
    Angle,
    Curvature,
    Strength,
    Number,
    Ratio,
    Loss,
    Frequency,
    Power,
    Energy,
    Time,
    Temperature,
    PerWatt,
    Damage,
}
/// Spread.
#[derive(Clone, Copy, Debug, PartialEq)]
#[allow(missing_docs)]
pub enum Spread {
    Exact,
    Limits { below: f64, above: f64 },
    Standard { uncertainty: f64 },
}
