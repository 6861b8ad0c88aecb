//! How far a quantity may lie from its nominal value.

/// A spread about a nominal value, as plain data in the SI unit of that value.
///
/// Distances count on the signed value: of "100 mm +0.2/-0.5 mm convex", a mirror's radius of
/// −0.1 m, the distance below is 0.2 mm. Of a flat they are curvatures in 1/m, of a face they
/// count on the radius without sense.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub enum Spread {
    /// None is written.
    #[default]
    Exact,
    /// Limits that are not exceeded.
    Limits {
        /// Distance to the lower limit, not negative.
        below: f64,
        /// Distance to the upper limit, not negative.
        above: f64,
    },
    /// A standard uncertainty (JCGM 100:2008, 7.2.2).
    Standard {
        /// Not negative.
        uncertainty: f64,
    },
}

impl Spread {
    /// The same spread seen on the negated value.
    pub(super) fn mirrored(self) -> Self {
        match self {
            Spread::Limits { below, above } => Spread::Limits {
                below: above,
                above: below,
            },
            other => other,
        }
    }
}
