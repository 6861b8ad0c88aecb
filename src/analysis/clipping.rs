//! The power of a centred Gaussian beam that misses an opening, in one pass.
//!
//! A round beam on a round hole of radius a loses exp(−2a²/w²); past a straight edge at a
//! distance a it loses ½ erfc(√2 a/w). (Siegman, *Lasers* (1986), chapter 17.)

use std::f64::consts::{SQRT_2, TAU};

use crate::cavity::{Cavity, Element, Opening, Part, slab_crossing};
use crate::optics::Plane;

/// The usable rim of an opening, in metres.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Rim {
    /// A round hole of this radius.
    Round(f64),
    /// A slit of this half-width, and the plane it limits.
    Slit(f64, Plane),
    /// A rectangle of these half-widths in the tangential and the sagittal plane.
    Rectangle([f64; 2]),
}

impl Rim {
    /// The rim of a part, its usable share counted; none where no opening is given.
    pub fn of(cavity: &Cavity, part: &Part, values: &[f64]) -> Option<Rim> {
        let usable = 0.5 * part.clear;
        Some(match part.opening? {
            Opening::Round { diameter } => Rim::Round(usable * diameter.of(values)),
            Opening::Hole { radius } => Rim::Round(radius.of(values)),
            Opening::Slit { half_width, plane } => Rim::Slit(half_width.of(values), plane),
            Opening::Rectangle { width, height } => {
                let (across, up) = (usable * width.of(values), usable * height.of(values));
                Rim::Rectangle(if cavity.tangential_is_horizontal() {
                    [across, up]
                } else {
                    [up, across]
                })
            }
        })
    }

    /// Share of a centred Gaussian beam outside, for its 1/e² radii on the surface, tangential and
    /// sagittal.
    pub fn loss(self, [t, s]: [f64; 2]) -> f64 {
        match self {
            Rim::Round(a) => round(a, t, s),
            Rim::Slit(a, Plane::Tangential) => slit(a, t),
            Rim::Slit(a, Plane::Sagittal) => slit(a, s),
            Rim::Rectangle([a, b]) => rectangle(a, b, t, s),
        }
    }
}

/// Radii of a beam on the surface of a part that it meets at an angle, from those across the
/// beam, tangential and sagittal; `at_exit` where the beam is inside a slab, before its exit.
pub fn footprint(part: &Part, at_exit: bool, values: &[f64], radii: [f64; 2]) -> [f64; 2] {
    let cosine = match &part.element {
        Element::Mirror(mirror) => mirror.incidence.of(values).cos(),
        Element::Slab(slab) => {
            let crossing = slab_crossing(slab, part.before.phase(values), values);
            if at_exit {
                crossing.cos_to
            } else {
                crossing.cos_from
            }
        }
        _ => 1.0,
    };
    let mut radii = radii;
    radii[usize::from(part.swapped)] /= cosine;
    radii
}

/// Share of the power outside a round hole of radius `a`, for 1/e² radii `x` and `y` of the spot
/// in its plane; all in the same unit.
///
/// Along each direction φ the power beyond the rim is exp(−2a²g)/g with
/// g = cos²φ/x² + sin²φ/y²; the integrand is smooth and periodic, so that the trapezoidal rule
/// converges faster than any power of the step.
pub fn round(a: f64, x: f64, y: f64) -> f64 {
    let (narrow, wide) = (x.min(y), x.max(y));
    if narrow == wide {
        return (-2.0 * (a / wide).powi(2)).exp();
    }
    // The integrand peaks along the wide axis, over an angle of about narrow/wide or, for a rare
    // tail, narrow/a.
    let peak = (narrow / wide).min(narrow / a).max(1e-3);
    let steps = (40.0 / peak).ceil() as usize;
    let quarter: f64 = (0..steps)
        .map(|k| {
            let angle = TAU / 4.0 * (k as f64 + 0.5) / steps as f64;
            let g = (angle.cos() / x).powi(2) + (angle.sin() / y).powi(2);
            (-2.0 * a * a * g).exp() / g
        })
        .sum();
    (quarter / steps as f64 / (x * y)).min(1.0)
}

/// Share of the power outside a slit of half-width `a`, for a 1/e² radius `w` across it.
pub fn slit(a: f64, w: f64) -> f64 {
    libm::erfc(SQRT_2 * a / w)
}

/// Share of the power outside a rectangle of half-widths `a` and `b`, for 1/e² radii `x` and `y`.
pub fn rectangle(a: f64, b: f64, x: f64, y: f64) -> f64 {
    let (beside, above) = (slit(a, x), slit(b, y));
    beside + above - beside * above
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    /// exp(−2a²/w²) at round ratios; the values are the closed form's, printed to nine digits.
    #[test]
    fn a_round_beam_on_a_round_hole() {
        for (ratio, clipped) in [
            (1.0, 0.135335283),
            (1.5, 0.0111089965),
            (2.0, 0.0003354626),
            (3.0, 1.522998e-8),
        ] {
            assert_relative_eq!(round(ratio, 1.0, 1.0), clipped, max_relative = 1e-6);
        }
    }

    /// The same integral by a plain sum over the plane outside the hole's rim.
    #[test]
    fn an_elliptical_beam_on_a_round_hole() {
        for (a, x, y) in [
            (1.0, 1.0, 0.3),
            (1.5, 0.5, 0.9),
            (0.4, 2.0, 0.1),
            (1.0, 0.999, 1.0),
        ] {
            let (inside, n) = (
                {
                    let n = 2000;
                    let mut sum = 0.0;
                    for i in 0..n {
                        // Strips of the disc, each an error function across.
                        let u = (f64::from(i) + 0.5) / f64::from(n) * TAU / 2.0;
                        let (s, h) = (-a * u.cos(), a * u.sin());
                        let density =
                            (-2.0 * (s / x).powi(2)).exp() * SQRT_2 / (x * (TAU / 2.0).sqrt());
                        sum += density * libm::erf(SQRT_2 * h / y) * a * u.sin();
                    }
                    sum * TAU / 2.0
                },
                2000.0,
            );
            assert_relative_eq!(round(a, x, y), 1.0 - inside / n, max_relative = 1e-4);
        }
    }

    #[test]
    fn a_wide_rectangle_is_a_slit() {
        assert_relative_eq!(
            rectangle(0.5, 50.0, 1.0, 1.0),
            slit(0.5, 1.0),
            max_relative = 1e-14
        );
        // One-dimensional normal distribution: two standard deviations, w = 2σ.
        assert_relative_eq!(slit(1.0, 1.0), 0.0455002639, max_relative = 1e-8);
    }
}
