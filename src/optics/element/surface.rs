//! A refracting surface between two media, met at an angle.
//!
//! With θ₁ and θ₂ by Snell's law, N = n₂ cos θ₂ − n₁ cos θ₁, and R positive where the centre of
//! curvature is on the far side:
//!
//! ```text
//!     tangential   A = cos θ₂/cos θ₁,  D = 1/A,  C = −N/(R cos θ₁ cos θ₂)
//!     sagittal     A = D = 1,                    C = −N/R
//! ```
//!
//! Source: Massey & Siegman, Appl. Opt. 8, 975 (1969).

use crate::numeric::Real;
use crate::optics::PerPlane;
use crate::optics::ray::RayMatrix;

/// How a ray crosses from one medium into another.
#[derive(Clone, Copy, Debug)]
pub struct Crossing<T> {
    /// Index of the medium it comes from.
    pub index_from: T,
    /// Index of the medium it enters.
    pub index_to: T,
    /// Cosine of the angle of incidence.
    pub cos_from: T,
    /// Cosine of the angle of refraction.
    pub cos_to: T,
}

impl<T: Real> Crossing<T> {
    /// The crossing at a given angle of incidence (radians), refracted by Snell's law.
    ///
    /// The caller has made sure that the ray is not totally reflected.
    #[inline(always)]
    pub fn at_incidence(index_from: T, index_to: T, incidence: T) -> Self {
        let (sin_from, cos_from) = incidence.sin_cos();
        let sin_to = sin_from * index_from / index_to;
        Crossing {
            index_from,
            index_to,
            cos_from,
            cos_to: ((sin_to + 1.0) * (-sin_to + 1.0)).sqrt(),
        }
    }

    /// The crossing at Brewster's angle, tan θ₁ = n₂/n₁.
    #[inline(always)]
    pub fn at_brewster(index_from: T, index_to: T) -> Self {
        let hypotenuse = (index_from.squared() + index_to.squared()).sqrt();
        Crossing {
            index_from,
            index_to,
            cos_from: index_from / hypotenuse,
            cos_to: index_to / hypotenuse,
        }
    }

    /// The way back through the same surface.
    #[inline(always)]
    pub fn reversed(self) -> Self {
        Crossing {
            index_from: self.index_to,
            index_to: self.index_from,
            cos_from: self.cos_to,
            cos_to: self.cos_from,
        }
    }

    /// Ray matrices of the surface in its own planes; `curvature` is 1/R in either plane, positive
    /// where the centre is on the far side.
    #[inline(always)]
    pub fn matrices(self, curvature: PerPlane<T>) -> PerPlane<RayMatrix<T>> {
        let zero = T::constant(0.0);
        let one = T::constant(1.0);
        let strength = self.index_to * self.cos_to - self.index_from * self.cos_from;
        let stretch = self.cos_to / self.cos_from;
        PerPlane {
            tangential: RayMatrix {
                a: stretch,
                b: zero,
                c: -strength * curvature.tangential / (self.cos_from * self.cos_to),
                d: one / stretch,
            },
            sagittal: RayMatrix::kick(-strength * curvature.sagittal),
        }
    }
}
