//! How much of the source's power is in each mode: |c_mn|² of the beam that is sent in, compared
//! with the mode where both are outside the input mirror.
//!
//! The mode is carried out through the mirror's substrate, which is a lens on the way, and turned
//! round: what is sent in like that is in the fundamental alone. In ξ = √2·x/w of the mode, and
//! with its wavefront taken off, the source is exp(−σξ²/2 + δξ). The ladder a − a† = √2 d/dξ makes
//! of that a recurrence,
//!
//! ```text
//!     (1 + σ) √(m + 1) c_{m+1} = √2 δ c_m + (1 − σ) √m c_{m−1},
//!     |c_0|² = 2√(Re σ)/|1 + σ| · exp(Re(δ²/(1 + σ)) − (Re δ)²/Re σ),
//! ```
//!
//! which for δ = 0 is the overlap of two Gaussian beams.

use std::f64::consts::{PI, SQRT_2};

use num_complex::Complex;

use crate::analysis::envelope::Envelope;
use crate::analysis::leaving;
use crate::cavity::{Cavity, Element, Form, SourceBeam};
use crate::optics::beam::Beam;
use crate::optics::{PerPlane, Plane};

/// Shares of the source's power in the orders of either plane.
pub type Shares = PerPlane<Vec<f64>>;

/// |c_m|² of the cavity's source for every order up to the highest, in either plane, around the
/// mode whose beam the envelope holds.
///
/// Of a source with M² above 1 it is the Gaussian beam of the same wavefronts and Rayleigh length
/// that is meant: an estimate.
///
/// # Errors
/// Why there is none.
pub fn of_source(
    cavity: &Cavity,
    values: &[f64],
    envelope: &Envelope<f64>,
    highest: usize,
) -> Result<Shares, &'static str> {
    const UNSENT: &str = "no source is written";
    let source = cavity.source.as_ref().ok_or(UNSENT)?;
    match source.beam {
        None => return Err("nothing is written of the source's shape"),
        Some(SourceBeam::Cavity { .. }) => {
            return Err("the beam of another cavity is not computed as a source yet");
        }
        Some(_) => {}
    }
    let ambient = cavity.ambient();
    let start = source.start(values, ambient).ok_or(UNSENT)?;
    let sent = start.zip(cavity.feed_way(values), Beam::after);
    let part = &cavity.parts()[cavity.input];
    let Element::Mirror(mirror) = &part.element else {
        return Err("the source enters by no mirror");
    };
    let at = &envelope.parts[cavity.input];
    let is_end = cavity.input == 0 || cavity.input + 1 == cavity.parts().len();
    // Away from the mirror, into the cavity. The walk ends in the middle of an end mirror's
    // reflection.
    let inwards = if cavity.form() == Form::Standing && is_end {
        at.arriving.map(Beam::reversed)
    } else {
        at.left
    };
    let outwards = inwards.map(Beam::reversed);
    let mode = leaving::behind(part, mirror, ambient, values, outwards)
        .ok_or("the beam is totally reflected on its way in")?
        .map(Beam::reversed);
    let wavelength = Cavity::WAVELENGTH.of(values);
    let index = ambient.phase(values);
    let shares = |plane: Plane| {
        let offset = source.offset[plane].of(values);
        let tilt = index * source.tilt[plane].of(values);
        orders(mode[plane], sent[plane], offset, tilt, wavelength, highest)
    };
    let shares = PerPlane::from_fn(shares);
    let is_finite = |shares: &Vec<f64>| shares.iter().all(|share| share.is_finite());
    if is_finite(&shares.tangential) && is_finite(&shares.sagittal) {
        Ok(shares)
    } else {
        Err("this value is too large or too small to be computed")
    }
}

/// |c_m|² of a beam in the orders of a mode at one place and in one plane; its axis lies `offset`
/// (metres) off the mode's there and is tilted by a reduced angle (radians).
pub fn orders(
    mode: Beam<f64>,
    sent: Beam<f64>,
    offset: f64,
    tilt: f64,
    wavelength: f64,
    highest: usize,
) -> Vec<f64> {
    // exp(−σξ²/2) of a beam alone, with the mode's wavefront on it.
    let own = Complex::new(1.0, -sent.alpha) * (mode.beta / sent.beta);
    let sigma = own + Complex::new(0.0, mode.alpha);
    let unit = mode.radius(wavelength) / SQRT_2;
    let delta = own * (offset / unit) - Complex::new(0.0, 2.0 * PI / wavelength * tilt * unit);
    let above = sigma + 1.0;
    let exponent = (delta * delta / above).re - delta.re * delta.re / sigma.re;
    let lowest = 2.0 * sigma.re.sqrt() / above.norm() * exponent.exp();
    let mut before = Complex::new(0.0, 0.0);
    let mut here = Complex::new(lowest.sqrt(), 0.0);
    (0..=highest)
        .map(|m| {
            let share = here.norm_sqr();
            let m = m as f64;
            let next = (delta * SQRT_2 * here - (sigma - 1.0) * m.sqrt() * before)
                / (above * (m + 1.0).sqrt());
            (before, here) = (here, next);
            share
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::numeric::quadrature::gauss_legendre;
    use approx::assert_relative_eq;

    const WAVELENGTH: f64 = 1e-6;

    fn beam(radius: f64, curvature: f64) -> Beam<f64> {
        let beta = PI * radius * radius / WAVELENGTH;
        Beam::new(beta, -beta * curvature)
    }

    /// The overlap integrals themselves, summed over the plane.
    #[test]
    fn orders_are_overlap_integrals() {
        let mode = beam(1.1e-3, 0.4);
        for (sent, offset, tilt) in [
            (mode, 0.0, 0.0),
            (beam(0.8e-3, -0.3), 0.0, 0.0),
            (beam(1.5e-3, 0.4), 0.4e-3, 0.0),
            (beam(1.0e-3, 0.1), -0.3e-3, 2e-4),
        ] {
            let highest = 6;
            let found = orders(mode, sent, offset, tilt, WAVELENGTH, highest);
            let k = 2.0 * PI / WAVELENGTH;
            let w = mode.radius(WAVELENGTH);
            let field = |beam: Beam<f64>, x: f64| {
                let norm = (2.0 / (PI * beam.radius(WAVELENGTH).powi(2))).powf(0.25);
                let exponent = Complex::new(-1.0, beam.alpha) * (PI / WAVELENGTH / beam.beta);
                (exponent * x * x).exp() * norm
            };
            let mut sums = vec![Complex::new(0.0, 0.0); highest + 1];
            let reach = 8e-3;
            for [u, weight] in gauss_legendre(600) {
                let x = reach * u;
                let tilted = Complex::new(0.0, -k * tilt * x).exp();
                let light = field(sent, x - offset) * tilted * weight * reach;
                // H_m(ξ)/√(2^m m!) of the mode.
                let xi = SQRT_2 * x / w;
                let (mut before, mut hermite) = (0.0, 1.0);
                for (m, sum) in sums.iter_mut().enumerate() {
                    *sum += field(mode, x).conj() * hermite * light;
                    let m = m as f64;
                    let next =
                        (2.0 / (m + 1.0)).sqrt() * xi * hermite - (m / (m + 1.0)).sqrt() * before;
                    (before, hermite) = (hermite, next);
                }
            }
            for (share, sum) in found.iter().zip(&sums) {
                assert_relative_eq!(*share, sum.norm_sqr(), epsilon = 1e-9);
            }
        }
    }

    /// All of the power is somewhere.
    #[test]
    fn shares_sum_to_one() {
        let mode = beam(1e-3, 0.2);
        for (sent, offset, tilt) in [
            (beam(0.7e-3, 0.5), 0.2e-3, 1e-4),
            (beam(1.6e-3, 0.2), 0.0, 0.0),
        ] {
            let sum: f64 = orders(mode, sent, offset, tilt, WAVELENGTH, 100)
                .iter()
                .sum();
            assert_relative_eq!(sum, 1.0, epsilon = 1e-9);
        }
    }
}
