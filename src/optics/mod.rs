//! Rays and beams through single optical elements, in plain SI numbers.
//!
//! Two planes are kept apart throughout: the *tangential* plane, which is the plane of incidence,
//! and the *sagittal* plane square to it. The frame (t, s, k) follows the beam, right-handed with
//! t = s × k.

pub mod beam;
pub mod element;
pub mod material;
pub mod ray;

/// One of the two transverse planes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Plane {
    /// In the plane of incidence.
    Tangential,
    /// Square to the plane of incidence.
    Sagittal,
}

impl Plane {
    /// Both planes, tangential first.
    pub const BOTH: [Plane; 2] = [Plane::Tangential, Plane::Sagittal];

    /// The plane's name in words and addresses.
    pub fn name(self) -> &'static str {
        match self {
            Plane::Tangential => "tangential",
            Plane::Sagittal => "sagittal",
        }
    }
}

/// One value for each plane.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct PerPlane<X> {
    /// Value in the tangential plane.
    pub tangential: X,
    /// Value in the sagittal plane.
    pub sagittal: X,
}

impl<X> PerPlane<X> {
    /// A value computed for each plane.
    #[inline(always)]
    pub fn from_fn(mut f: impl FnMut(Plane) -> X) -> Self {
        PerPlane {
            tangential: f(Plane::Tangential),
            sagittal: f(Plane::Sagittal),
        }
    }

    /// The same function of each plane's value.
    #[inline(always)]
    pub fn map<Y>(self, mut f: impl FnMut(X) -> Y) -> PerPlane<Y> {
        PerPlane {
            tangential: f(self.tangential),
            sagittal: f(self.sagittal),
        }
    }

    /// A function of the values that two pairs have in each plane.
    #[inline(always)]
    pub fn zip<Y, Z>(self, other: PerPlane<Y>, mut f: impl FnMut(X, Y) -> Z) -> PerPlane<Z> {
        PerPlane {
            tangential: f(self.tangential, other.tangential),
            sagittal: f(self.sagittal, other.sagittal),
        }
    }

    /// The two values exchanged.
    #[inline(always)]
    pub fn swapped(self) -> Self {
        PerPlane {
            tangential: self.sagittal,
            sagittal: self.tangential,
        }
    }
}

impl<X: Clone> PerPlane<X> {
    /// The same value in both planes.
    #[inline(always)]
    pub fn both(value: X) -> Self {
        PerPlane {
            tangential: value.clone(),
            sagittal: value,
        }
    }
}

impl<X> std::ops::Index<Plane> for PerPlane<X> {
    type Output = X;
    #[inline(always)]
    fn index(&self, plane: Plane) -> &X {
        match plane {
            Plane::Tangential => &self.tangential,
            Plane::Sagittal => &self.sagittal,
        }
    }
}

impl<X> std::ops::IndexMut<Plane> for PerPlane<X> {
    #[inline(always)]
    fn index_mut(&mut self, plane: Plane) -> &mut X {
        match plane {
            Plane::Tangential => &mut self.tangential,
            Plane::Sagittal => &mut self.sagittal,
        }
    }
}
