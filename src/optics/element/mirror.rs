//! A mirror met at an angle of incidence θ, in a medium of index n:
//! C = −2n/(R cos θ) in its tangential plane and −2n cos θ/R in its sagittal plane.
//!
//! Its tangential axis also flips; the cavity counts that.
//! Source: Kogelnik, Ippen, Dienes & Shank, IEEE J. Quantum Electron. 8, 373 (1972); with
//! reduced angles the index appears as a factor.

use crate::numeric::Real;
use crate::optics::PerPlane;

/// Dioptric powers −C of a mirror in its own planes, in 1/m.
///
/// `curvature` is 1/R in either plane, concave positive; `cos_incidence` is cos θ.
#[inline(always)]
pub fn power<T: Real>(curvature: PerPlane<T>, cos_incidence: T, index: T) -> PerPlane<T> {
    PerPlane {
        tangential: curvature.tangential * index * 2.0 / cos_incidence,
        sagittal: curvature.sagittal * index * 2.0 * cos_incidence,
    }
}
