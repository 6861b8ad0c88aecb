//! Gaussian beams in one plane.
//!
//! With exp(iωt − ikz) a beam has 1/q = 1/R − iλ/(πw²); in reduced form q̂ = q/n and
//! 1/q̂ = n/R − iλ₀/(πw²), λ₀ the vacuum wavelength in every medium, and an element takes q̂ to
//! (Aq̂ + B)/(Cq̂ + D) (Kogelnik & Li, Appl. Opt. 5, 1550 (1966)).
//!
//! The same beam is kept here as three real numbers that never need a division by something
//! that may vanish,
//!
//! ```text
//!     β = πw²/λ₀,   α = −β n/R,   γ = (1 + α²)/β,     1/q̂ = (−α − i)/β,   q̂ = (−α + i)/γ,
//! ```
//!
//! so that 1/γ is the reduced Rayleigh length and α/γ the reduced distance to the waist ahead.
//! They are the parameters by which Courant & Snyder, Ann. Phys. 3, 1 (1958), describe particle
//! beams; a ray matrix acts on them as on any second moments.

use std::f64::consts::{FRAC_1_PI, PI};

use num_complex::Complex;

use super::ray::RayMatrix;
use crate::numeric::Real;

/// A Gaussian beam at one place, in one plane.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Beam<T> {
    /// πw²/λ₀ in metres: the Rayleigh length of a waist of the radius found here.
    pub beta: T,
    /// −β n/R: positive where the beam converges.
    pub alpha: T,
    /// (1 + α²)/β in 1/m: the reciprocal of the reduced Rayleigh length.
    pub gamma: T,
}

impl<T: Real> Beam<T> {
    /// The beam with the given β (metres) and α.
    #[inline(always)]
    pub fn new(beta: T, alpha: T) -> Self {
        Beam {
            beta,
            alpha,
            gamma: (alpha.squared() + 1.0) / beta,
        }
    }

    /// The beam behind an element.
    ///
    /// Written as sums of squares, so that a tight focus costs no digits.
    #[inline(always)]
    pub fn after(self, m: RayMatrix<T>) -> Self {
        let height = m.a * self.beta - m.b * self.alpha;
        let angle = m.c * self.beta - m.d * self.alpha;
        let scale = self.beta.recip();
        Beam {
            beta: (height.squared() + m.b.squared()) * scale,
            alpha: -(height * angle + m.b * m.d) * scale,
            gamma: (angle.squared() + m.d.squared()) * scale,
        }
    }

    /// The same beam as a complex ray.
    #[inline(always)]
    pub fn ray(self) -> ComplexRay<T> {
        let zero = T::constant(0.0);
        let root = self.beta.sqrt();
        let scale = root.recip();
        ComplexRay {
            height: [root, zero],
            angle: [-self.alpha * scale, scale],
        }
    }

    /// The same beam travelling the other way.
    #[inline(always)]
    pub fn reversed(self) -> Self {
        Beam {
            alpha: -self.alpha,
            ..self
        }
    }

    /// Gouy phase gained through an element, −arg(A + B/q̂), in (−π, π]; in (0, π) for a gap.
    pub fn gouy_phase(self, m: RayMatrix<T>) -> T {
        m.b.atan2(m.a * self.beta - m.b * self.alpha)
    }

    /// Beam radius w (1/e² of the intensity), in metres.
    #[inline(always)]
    pub fn radius(self, wavelength: T) -> T {
        (wavelength * FRAC_1_PI * self.beta).sqrt()
    }

    /// Wavefront curvature 1/R in a medium of the given index, in 1/m; diverging is positive.
    pub fn wavefront_curvature(self, index: T) -> T {
        // Adding zero keeps a plane wavefront from being −0.
        -self.alpha / (self.beta * index) + 0.0
    }

    /// Radius of the waist, here or elsewhere, in metres.
    #[inline(always)]
    pub fn waist_radius(self, wavelength: T) -> T {
        (wavelength / (self.gamma * PI)).sqrt()
    }

    /// Distance from here to the waist in a medium of the given index, in metres, downstream
    /// positive.
    #[inline(always)]
    pub fn distance_to_waist(self, index: T) -> T {
        index * self.alpha / self.gamma
    }

    /// Rayleigh length n·πw₀²/λ₀ in a medium of the given index, in metres.
    pub fn rayleigh_length(self, index: T) -> T {
        index / self.gamma
    }

    /// Far-field half-angle λ₀/(πnw₀) in a medium of the given index, in radians.
    pub fn divergence(self, wavelength: T, index: T) -> T {
        (wavelength * self.gamma / PI).sqrt() / index
    }
}

/// A Gaussian beam as one ray with complex height and angle, to which ray matrices apply as to
/// any ray: β is the square of the height's size.
///
/// Its real and imaginary parts are two ordinary rays; carrying them costs no division, however
/// many places the beam is looked at.
/// Source: Arnaud, Appl. Opt. 24, 538 (1985).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ComplexRay<T> {
    /// Real and imaginary part of the height, in √m.
    height: [T; 2],
    /// Real and imaginary part of the reduced angle, in 1/√m.
    angle: [T; 2],
}

impl<T: Real> ComplexRay<T> {
    /// The ray behind an element.
    #[inline(always)]
    pub fn after(self, m: RayMatrix<T>) -> Self {
        let ([x1, x2], [p1, p2]) = (self.height, self.angle);
        ComplexRay {
            height: [m.a * x1 + m.b * p1, m.a * x2 + m.b * p2],
            angle: [m.c * x1 + m.d * p1, m.c * x2 + m.d * p2],
        }
    }

    /// The ray behind an element that does not vary.
    #[inline(always)]
    pub fn after_fixed(self, m: RayMatrix<f64>) -> Self {
        self.after(m.map(T::constant))
    }

    /// β of the beam, in metres.
    #[inline(always)]
    pub fn beta(self) -> T {
        let [re, im] = self.height;
        re.squared() + im.squared()
    }

    /// The beam.
    #[inline(always)]
    pub fn beam(self) -> Beam<T> {
        let ([x1, x2], [p1, p2]) = (self.height, self.angle);
        Beam {
            beta: self.beta(),
            alpha: -(x1 * p1 + x2 * p2),
            gamma: p1.squared() + p2.squared(),
        }
    }
}

impl Beam<f64> {
    /// The beam of a reduced complex parameter q̂ = q/n (metres); its imaginary part is positive.
    pub fn from_q(q: Complex<f64>) -> Self {
        let inverse = q.inv();
        Beam {
            beta: -1.0 / inverse.im,
            alpha: inverse.re / inverse.im,
            gamma: 1.0 / q.im,
        }
    }

    /// The reduced complex parameter q̂ = q/n, in metres.
    pub fn q(self) -> Complex<f64> {
        Complex::new(-self.alpha, 1.0) / self.gamma
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    /// A few roundings, nothing more.
    const ROUNDING: f64 = 1e-14;

    #[test]
    fn an_element_acts_as_on_the_complex_parameter() {
        let q = Complex::new(-0.3, 0.12);
        let m = RayMatrix::propagation(0.2)
            .then(RayMatrix::kick(-3.0))
            .then(RayMatrix::propagation(0.7));
        let expected = (q * m.a + m.b) / (q * m.c + m.d);
        let beam = Beam::from_q(q);
        let after = beam.after(m);
        assert_relative_eq!(after.q().re, expected.re, max_relative = ROUNDING);
        assert_relative_eq!(after.q().im, expected.im, max_relative = ROUNDING);
        let phase = -(q.inv() * m.b + m.a).arg();
        assert_relative_eq!(beam.gouy_phase(m), phase, max_relative = ROUNDING);
        let as_ray = beam.ray().after(m).beam();
        assert_relative_eq!(as_ray.beta, after.beta, max_relative = ROUNDING);
        assert_relative_eq!(as_ray.alpha, after.alpha, max_relative = ROUNDING);
        assert_relative_eq!(as_ray.gamma, after.gamma, max_relative = ROUNDING);
        let consistent = after.beta * after.gamma - after.alpha.powi(2);
        assert_relative_eq!(consistent, 1.0, max_relative = 10.0 * ROUNDING);
    }

    #[test]
    fn a_waist_is_where_the_beam_says() {
        let wavelength = 1.064e-6;
        let (waist, ahead) = (250e-6, 0.4);
        let rayleigh = PI * waist * waist / wavelength;
        let beam = Beam::from_q(Complex::new(-ahead, rayleigh));
        assert_relative_eq!(
            beam.waist_radius(wavelength),
            waist,
            max_relative = ROUNDING
        );
        assert_relative_eq!(beam.distance_to_waist(1.0), ahead, max_relative = ROUNDING);
        assert_relative_eq!(beam.rayleigh_length(1.0), rayleigh, max_relative = ROUNDING);
        let spread = (1.0 + (ahead / rayleigh).powi(2)).sqrt();
        assert_relative_eq!(
            beam.radius(wavelength),
            waist * spread,
            max_relative = ROUNDING
        );
        assert!(beam.wavefront_curvature(1.0) < 0.0, "it converges");
    }
}
