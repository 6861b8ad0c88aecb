//! A duct: a medium whose index falls (or rises) with the square of the distance from the axis,
//! n(r) = n₀(1 − γ²r²/2), over a length L.
//!
//! ```text
//!     A = D = cos γL,   B = sin γL/(n₀γ),   C = −n₀γ sin γL
//! ```
//!
//! γ² < 0 is an antiguiding duct and γ² = 0 plain propagation; written over γ² through entire
//! functions the three are one formula. A thermal lens of dioptric power P spread along a path ℓ
//! is the duct with γ² = P/(n₀ℓ).
//! Source: Kogelnik & Li, Appl. Opt. 5, 1550 (1966), table I.

use std::f64::consts::PI;

use crate::numeric::Real;
use crate::optics::beam::Beam;
use crate::optics::ray::RayMatrix;

/// A straight stretch of the way through a medium, in one plane.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stretch<T> {
    /// Length along the beam, in metres.
    pub length: T,
    /// Index on the axis.
    pub index: T,
    /// γ² in 1/m²: positive guides, negative antiguides; none in a uniform medium.
    pub strength_squared: Option<T>,
}

impl Stretch<f64> {
    /// The same stretch over another number type, not varying.
    #[inline(always)]
    pub fn constant<T: Real>(self) -> Stretch<T> {
        Stretch {
            length: T::constant(self.length),
            index: T::constant(self.index),
            strength_squared: self.strength_squared.map(T::constant),
        }
    }
}

impl<T: Real> Stretch<T> {
    /// A uniform medium.
    #[inline(always)]
    pub fn uniform(length: T, index: T) -> Self {
        Stretch {
            length,
            index,
            strength_squared: None,
        }
    }

    /// The ray matrix.
    #[inline(always)]
    pub fn matrix(self) -> RayMatrix<T> {
        let Some(strength_squared) = self.strength_squared else {
            return RayMatrix::propagation(self.length / self.index);
        };
        let z = strength_squared * self.length.squared();
        let cos = z.cos_root();
        let reduced_sine = self.length * z.sinc_root();
        RayMatrix {
            a: cos,
            b: reduced_sine / self.index,
            c: -self.index * strength_squared * reduced_sine,
            d: cos,
        }
    }

    /// A ray matrix followed by this stretch.
    #[inline(always)]
    pub fn after(self, before: RayMatrix<T>) -> RayMatrix<T> {
        match self.strength_squared {
            None => before.propagated(self.length / self.index),
            Some(_) => before.then(self.matrix()),
        }
    }

    /// The first `share` of the stretch, a number from 0 to 1.
    #[inline(always)]
    pub fn part(self, share: f64) -> Self {
        Stretch {
            length: self.length * share,
            ..self
        }
    }

    /// Gouy phase gained by a beam that enters the stretch, followed continuously, in radians.
    ///
    /// Through every half period γL = π of the rays the phase gains exactly π.
    pub fn gouy_phase(self, beam: Beam<T>) -> T {
        let m = self.matrix();
        let Some(strength_squared) = self.strength_squared else {
            return beam.gouy_phase(m);
        };
        let zero = T::constant(0.0);
        let z = strength_squared * self.length.squared();
        let half_periods = (z.max(zero).sqrt() / PI).floor();
        // The matrix after whole half periods has the sign (−1)^k.
        let odd = half_periods - (half_periods * 0.5).floor() * 2.0;
        let m = RayMatrix {
            a: T::select(zero.less(odd), -m.a, m.a),
            b: T::select(zero.less(odd), -m.b, m.b),
            ..m
        };
        beam.gouy_phase(m) + half_periods * PI
    }

    /// The least β (metres) of a beam anywhere between entry and exit, ends included.
    #[inline(always)]
    pub fn least_beta(self, entering: Beam<T>) -> T {
        let Some(strength_squared) = self.strength_squared else {
            return self.least_of_one_extremum(entering, entering.after(self.matrix()));
        };
        // β repeats itself every half period γL = π of the rays, so that half of a shorter
        // stretch holds one extremum at the most.
        let half = self.part(0.5);
        let matrix = half.matrix();
        let middle = entering.after(matrix);
        let leaving = middle.after(matrix);
        let short = half
            .least_of_one_extremum(entering, middle)
            .min(half.least_of_one_extremum(middle, leaving));
        let z = strength_squared * self.length.squared();
        let long = T::constant(PI * PI).less(z);
        T::select(long, self.beta_at_waist(entering), short)
    }

    #[inline(always)]
    fn least_of_one_extremum(self, entering: Beam<T>, leaving: Beam<T>) -> T {
        let zero = T::constant(0.0);
        let at_ends = entering.beta.min(leaving.beta);
        let least = self.beta_at_waist(entering);
        let converges = T::select(zero.less(entering.alpha), least, at_ends);
        T::select(leaving.alpha.less(zero), converges, at_ends)
    }

    /// β at a waist in the same medium, however far it goes on.
    ///
    /// γ + n₀²γ_duct²β is the same at every place; at an extremum α = 0 and γ = 1/β, so that β
    /// is the smaller root of a quadratic.
    #[inline(always)]
    fn beta_at_waist(self, beam: Beam<T>) -> T {
        let Some(strength_squared) = self.strength_squared else {
            return beam.gamma.recip();
        };
        let strength = strength_squared * self.index.squared();
        let invariant = beam.gamma + strength * beam.beta;
        // Not negative but for rounding: (γ − Kβ)² + 4Kα².
        let square = (invariant.squared() - strength * 4.0).max(T::constant(0.0));
        T::constant(2.0) / (invariant + square.sqrt())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    const CASES: [f64; 8] = [-900.0, -3.0, 0.0, 1e-9, 4.0, 400.0, 900.0, 9000.0];

    fn stretch(strength_squared: f64) -> Stretch<f64> {
        Stretch {
            length: 0.12,
            index: 1.7,
            strength_squared: Some(strength_squared),
        }
    }

    fn beams() -> [Beam<f64>; 3] {
        [
            Beam::new(0.02, 0.7),
            Beam::new(0.3, -1.4),
            Beam::new(0.001, 0.1),
        ]
    }

    /// The phase by its definition, ∫ dz/(nβ), summed with the midpoint rule.
    #[test]
    fn the_gouy_phase_is_the_integral_of_the_beam() {
        for strength_squared in CASES {
            for beam in beams() {
                let whole = stretch(strength_squared);
                let steps = 40_000;
                let sum: f64 = (0..steps)
                    .map(|i| {
                        let share = (f64::from(i) + 0.5) / f64::from(steps);
                        1.0 / beam.after(whole.part(share).matrix()).beta
                    })
                    .sum();
                let integral = sum * whole.length / whole.index / f64::from(steps);
                // Midpoint rule on 40 000 steps.
                assert_relative_eq!(whole.gouy_phase(beam), integral, max_relative = 1e-5);
            }
        }
    }

    /// The least radius against a scan; a scan of 20 000 points can only lie above it.
    #[test]
    fn the_least_radius_is_that_of_a_scan() {
        for strength_squared in CASES {
            for beam in beams() {
                let whole = stretch(strength_squared);
                let scanned = (0..=20_000)
                    .map(|i| {
                        beam.after(whole.part(f64::from(i) / 20_000.0).matrix())
                            .beta
                    })
                    .fold(f64::INFINITY, f64::min);
                let least = whole.least_beta(beam);
                assert!(least <= scanned * (1.0 + 1e-12));
                assert_relative_eq!(least, scanned, max_relative = 1e-3);
            }
        }
    }
}
