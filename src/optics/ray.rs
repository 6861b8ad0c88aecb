//! Ray matrices in reduced coordinates, so that every determinant is 1.
//!
//! A ray at a plane is (x, p): its height and p = n·θ, the optical direction cosine in a medium
//! of index n. Every element, refraction included, is then a real matrix of determinant 1,
//!
//! ```text
//!     (x₂)   (A  B) (x₁)
//!     (p₂) = (C  D) (p₁),      AD − BC = 1.
//! ```
//!
//! A flip of the tangential axis at a reflection is left out here and counted by the cavity.
//! Source: Kogelnik & Li, Appl. Opt. 5, 1550 (1966); reduced angles as in Siegman, *Lasers* (1986).

use super::PerPlane;
use crate::numeric::Real;

/// The ray matrix of an element in one plane, in reduced coordinates.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RayMatrix<T> {
    /// Height from height; no unit.
    pub a: T,
    /// Height from reduced angle, in metres.
    pub b: T,
    /// Reduced angle from height, in 1/m; the negative of the dioptric power.
    pub c: T,
    /// Reduced angle from reduced angle; no unit.
    pub d: T,
}

impl<T: Real> RayMatrix<T> {
    /// The element that changes nothing.
    #[inline(always)]
    pub fn identity() -> Self {
        Self::kick(T::constant(0.0))
    }

    /// Propagation over a reduced length L/n, in metres.
    #[inline(always)]
    pub fn propagation(reduced_length: T) -> Self {
        RayMatrix {
            a: T::constant(1.0),
            b: reduced_length,
            c: T::constant(0.0),
            d: T::constant(1.0),
        }
    }

    /// A thin element that adds `c`·x to the reduced angle (`c` in 1/m, negative where it focuses).
    #[inline(always)]
    pub fn kick(c: T) -> Self {
        RayMatrix {
            a: T::constant(1.0),
            b: T::constant(0.0),
            c,
            d: T::constant(1.0),
        }
    }

    /// The same function of every entry.
    #[inline(always)]
    pub fn map<U>(self, f: impl Fn(T) -> U) -> RayMatrix<U> {
        RayMatrix {
            a: f(self.a),
            b: f(self.b),
            c: f(self.c),
            d: f(self.d),
        }
    }

    /// This element followed by `next`.
    #[inline(always)]
    pub fn then(self, next: Self) -> Self {
        RayMatrix {
            a: next.a * self.a + next.b * self.c,
            b: next.a * self.b + next.b * self.d,
            c: next.c * self.a + next.d * self.c,
            d: next.c * self.b + next.d * self.d,
        }
    }

    /// This element followed by one that does not vary.
    #[inline(always)]
    pub fn then_fixed(self, next: RayMatrix<f64>) -> Self {
        if next.a == 1.0 && next.d == 1.0 {
            if next.b == 0.0 && next.c == 0.0 {
                return self;
            }
            if next.c == 0.0 {
                return self.propagated(T::constant(next.b));
            }
        }
        RayMatrix {
            a: self.a * next.a + self.c * next.b,
            b: self.b * next.a + self.d * next.b,
            c: self.a * next.c + self.c * next.d,
            d: self.b * next.c + self.d * next.d,
        }
    }

    /// This element followed by a propagation over a reduced length, in metres.
    #[inline(always)]
    pub fn propagated(self, reduced_length: T) -> Self {
        RayMatrix {
            a: self.a + reduced_length * self.c,
            b: self.b + reduced_length * self.d,
            ..self
        }
    }

    /// This element followed by a thin one that adds `c`·x to the reduced angle.
    #[inline(always)]
    pub fn kicked(self, c: T) -> Self {
        RayMatrix {
            c: self.c + c * self.a,
            d: self.d + c * self.b,
            ..self
        }
    }

    /// The same element met from its other side.
    #[inline(always)]
    pub fn reversed(self) -> Self {
        RayMatrix {
            a: self.d,
            d: self.a,
            ..self
        }
    }

    /// The element that undoes this one.
    #[inline(always)]
    pub fn inverse(self) -> Self {
        RayMatrix {
            a: self.d,
            b: -self.b,
            c: -self.c,
            d: self.a,
        }
    }

    /// Every entry with the other sign: a flip of the axis.
    pub fn flipped(self) -> Self {
        RayMatrix {
            a: -self.a,
            b: -self.b,
            c: -self.c,
            d: -self.d,
        }
    }

    /// The determinant, 1 for every element.
    #[inline(always)]
    pub fn determinant(self) -> T {
        self.a * self.d - self.b * self.c
    }

    /// Half the trace, (A + D)/2.
    #[inline(always)]
    pub fn half_trace(self) -> T {
        (self.a + self.d) * 0.5
    }
}

/// Both planes at a time, spelled out: a function handed to [`PerPlane::zip`] is not always inlined,
/// and what is not inlined does not use the vector instructions chosen at run time.
impl<T: Real> PerPlane<RayMatrix<T>> {
    /// These elements followed by `next`.
    #[inline(always)]
    pub fn then(self, next: Self) -> Self {
        PerPlane {
            tangential: self.tangential.then(next.tangential),
            sagittal: self.sagittal.then(next.sagittal),
        }
    }

    /// These elements followed by ones that do not vary.
    #[inline(always)]
    pub fn then_fixed(self, next: PerPlane<RayMatrix<f64>>) -> Self {
        PerPlane {
            tangential: self.tangential.then_fixed(next.tangential),
            sagittal: self.sagittal.then_fixed(next.sagittal),
        }
    }

    /// These elements followed by a propagation over the same reduced length, in metres.
    #[inline(always)]
    pub fn propagated(self, reduced_length: T) -> Self {
        PerPlane {
            tangential: self.tangential.propagated(reduced_length),
            sagittal: self.sagittal.propagated(reduced_length),
        }
    }

    /// These elements followed by a thin one that adds `c`·x to the reduced angle.
    #[inline(always)]
    pub fn kicked(self, c: PerPlane<T>) -> Self {
        PerPlane {
            tangential: self.tangential.kicked(c.tangential),
            sagittal: self.sagittal.kicked(c.sagittal),
        }
    }
}
