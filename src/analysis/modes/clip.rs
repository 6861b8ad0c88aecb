//! What the openings along the way cut off every mode, as a first look: the power of the
//! undisturbed mode outside each opening in one pass, put together over a round trip.
//!
//! The loss in one pass is 1 − ∫|u_mn|² over the opening as the beam meets it; a round trip loses
//! 1 − Π(1 − each). What diffraction makes of it is left out: a mode reshapes itself to lose less.

use std::f64::consts::SQRT_2;

use super::hermite::{densities, reach, tails};
use crate::analysis::clipping::{Rim, footprint};
use crate::analysis::envelope::Envelope;
use crate::cavity::{Cavity, Form};
use crate::numeric::quadrature::gauss_legendre;
use crate::optics::beam::Beam;
use crate::optics::{PerPlane, Plane};

/// Products of modes, nodes and openings that are computed at the most: more is no cavity that
/// anybody builds.
const MOST_WORK: usize = 1_000_000_000;

/// The share of the power that each mode loses, by m and n.
#[derive(Clone, Debug, PartialEq)]
pub struct ClipLosses {
    highest: usize,
    losses: Vec<f64>,
}

impl ClipLosses {
    fn nothing(highest: usize) -> Self {
        ClipLosses {
            highest,
            losses: vec![0.0; (highest + 1) * (highest + 1)],
        }
    }

    /// The loss of TEM_mn, m + n up to the highest order computed.
    pub fn of(&self, m: usize, n: usize) -> f64 {
        self.losses[m * (self.highest + 1) + n]
    }

    fn at(&mut self, m: usize, n: usize) -> &mut f64 {
        &mut self.losses[m * (self.highest + 1) + n]
    }

    fn each(highest: usize) -> impl Iterator<Item = (usize, usize)> {
        (0..=highest).flat_map(move |m| (0..=highest - m).map(move |n| (m, n)))
    }
}

/// Share of the power of every TEM_mn up to the highest order outside one rim, for the 1/e² radii
/// of TEM_00 there, tangential and sagittal.
pub fn one_pass(rim: Rim, radii: [f64; 2], highest: usize) -> ClipLosses {
    let mut found = ClipLosses::nothing(highest);
    let scaled = |a: f64, w: f64| SQRT_2 * a / w;
    let outside = |a: f64, w: f64| {
        let mut both = Vec::new();
        tails(scaled(a, w), highest, &mut both);
        both.iter_mut().for_each(|tail| *tail *= 2.0);
        both
    };
    match rim {
        Rim::Slit(a, plane) => {
            let beside = outside(a, radii[usize::from(plane == Plane::Sagittal)]);
            for (m, n) in ClipLosses::each(highest) {
                *found.at(m, n) = match plane {
                    Plane::Tangential => beside[m],
                    Plane::Sagittal => beside[n],
                };
            }
        }
        Rim::Rectangle([a, b]) => {
            let (beside, above) = (outside(a, radii[0]), outside(b, radii[1]));
            for (m, n) in ClipLosses::each(highest) {
                *found.at(m, n) = beside[m] + above[n] - beside[m] * above[n];
            }
        }
        Rim::Round(a) => {
            let edge = radii.map(|w| scaled(a, w));
            let beside = outside(a, radii[0]);
            for (m, n) in ClipLosses::each(highest) {
                *found.at(m, n) = beside[m];
            }
            add_above(&mut found, edge);
        }
    }
    found
}

/// Adds what passes a round rim above and below, within its width.
///
/// With ξ = ξ_a sin φ the rim stands at η = η_a cos φ, and the power beyond it is
/// 4∫ψ_m²(ξ) T_n(η) ξ_a cos φ dφ over a quarter turn: smooth up to the ends, and all of it
/// positive, so that small losses keep their digits.
fn add_above(found: &mut ClipLosses, [edge_t, edge_s]: [f64; 2]) {
    let highest = found.highest;
    let reach = reach(highest);
    // Elsewhere one of the factors is nothing.
    let from = (reach / edge_s).min(1.0).acos();
    let to = (reach / edge_t).min(1.0).asin();
    if from >= to {
        return;
    }
    let (mut density, mut beyond) = (Vec::new(), Vec::new());
    for [x, weight] in gauss_legendre(nodes(highest)) {
        let angle = from + 0.5 * (to - from) * (x + 1.0);
        let (sine, cosine) = angle.sin_cos();
        densities(edge_t * sine, highest, &mut density);
        tails(edge_s * cosine, highest, &mut beyond);
        let weight = 4.0 * weight * 0.5 * (to - from) * edge_t * cosine;
        for (m, n) in ClipLosses::each(highest) {
            *found.at(m, n) += weight * density[m] * beyond[n];
        }
    }
    found
        .losses
        .iter_mut()
        .for_each(|loss| *loss = loss.min(1.0));
}

/// Enough for the lobes of the highest order twice over, and for the lowest within its reach.
fn nodes(highest: usize) -> usize {
    64 + 2 * highest
}

/// What every TEM_mn up to the highest order loses in a round trip; `None` where no opening is
/// given.
///
/// Both faces of a slab cut off the same light: the narrower one counts, once a pass.
///
/// # Errors
/// Why it is not computed.
pub fn round_trip(
    cavity: &Cavity,
    values: &[f64],
    envelope: &Envelope<f64>,
    highest: usize,
) -> Result<Option<ClipLosses>, &'static str> {
    let wavelength = Cavity::WAVELENGTH.of(values);
    let parts = cavity.parts();
    let openings = parts.iter().filter(|part| part.opening.is_some()).count();
    if openings == 0 {
        return Ok(None);
    }
    let modes = (highest + 1) * (highest + 2) / 2;
    if 2 * openings * modes * nodes(highest) > MOST_WORK {
        return Err("so many openings are not computed to so high an order");
    }
    // Σ ln(1 − loss), so that small losses add up exactly.
    let mut survival = ClipLosses::nothing(highest);
    for (index, part) in parts.iter().enumerate() {
        let Some(rim) = Rim::of(cavity, part, values) else {
            continue;
        };
        let at = &envelope.parts[index];
        let on_face = |beam: PerPlane<Beam<f64>>, exit| {
            let radii = Plane::BOTH.map(|plane| beam[plane].radius(wavelength));
            footprint(part, exit, values, radii)
        };
        let mut faces = vec![on_face(at.arriving, false)];
        if part.inside().is_some() {
            faces.push(on_face(at.at_exit, true));
        }
        let is_end = index == 0 || index + 1 == parts.len();
        let passes = if cavity.form() == Form::Standing && !is_end {
            2.0
        } else {
            1.0
        };
        let faces: Vec<ClipLosses> = faces
            .into_iter()
            .map(|radii| one_pass(rim, radii, highest))
            .collect();
        for (m, n) in ClipLosses::each(highest) {
            let loss = faces.iter().map(|face| face.of(m, n)).fold(0.0, f64::max);
            *survival.at(m, n) += passes * (-loss).ln_1p();
        }
    }
    let mut losses = survival;
    losses
        .losses
        .iter_mut()
        .for_each(|sum| *sum = -sum.exp_m1());
    if losses.losses.iter().all(|loss| loss.is_finite()) {
        Ok(Some(losses))
    } else {
        Err("this value is too large or too small to be computed")
    }
}

#[cfg(test)]
mod tests {
    use std::f64::consts::PI;

    use super::*;
    use approx::assert_relative_eq;

    /// In the lowest mode it is what a check says of a Gaussian beam.
    #[test]
    fn the_lowest_mode_is_a_gaussian_beam() {
        for rim in [
            Rim::Round(1.0),
            Rim::Slit(0.7, Plane::Sagittal),
            Rim::Rectangle([1.2, 0.8]),
        ] {
            for radii in [[1.0, 1.0], [0.5, 0.9], [0.3, 0.4], [2.0, 0.1], [0.05, 3.0]] {
                let found = one_pass(rim, radii, 12).of(0, 0);
                assert_relative_eq!(found, rim.loss(radii), max_relative = 1e-9, epsilon = 1e-18);
            }
        }
    }

    /// Every mode against a quadrature over the opening in both directions, with the Hermite
    /// polynomials written out.
    #[test]
    fn modes_against_a_quadrature_over_the_opening() {
        let polynomial = |m: usize, x: f64| match m {
            0 => 1.0,
            1 => 2.0 * x,
            2 => 4.0 * x * x - 2.0,
            3 => 8.0 * x.powi(3) - 12.0 * x,
            _ => 16.0 * x.powi(4) - 48.0 * x * x + 12.0,
        };
        let density = |m: usize, x: f64, w: f64| {
            let factorial: f64 = (1..=m).map(|k| k as f64).product();
            let xi = SQRT_2 * x / w;
            let norm = SQRT_2 / (w * 2.0_f64.powi(m as i32) * factorial * PI.sqrt());
            norm * polynomial(m, xi).powi(2) * (-xi * xi).exp()
        };
        // In beam radii, far enough out to hold all of order 4.
        const ALL: f64 = 5.5;
        let rule = gauss_legendre(160);
        for radii in [[0.6, 0.45], [0.3, 0.9], [0.8, 0.8]] {
            let [all_t, all_s] = radii.map(|w| ALL * w);
            let height = |rim: Rim, x: f64| match rim {
                Rim::Round(a) => (a * a - x * x).sqrt(),
                Rim::Rectangle([_, b]) => b,
                Rim::Slit(_, Plane::Tangential) => all_s,
                Rim::Slit(b, Plane::Sagittal) => b,
            };
            let rims = [
                (Rim::Round(1.0), 1.0),
                (Rim::Rectangle([0.9, 0.7]), 0.9),
                (Rim::Slit(0.8, Plane::Tangential), 0.8),
                (Rim::Slit(0.8, Plane::Sagittal), all_t),
            ];
            for (rim, width) in rims {
                let found = one_pass(rim, radii, 4);
                for (m, n) in [(0, 0), (1, 0), (0, 3), (2, 2), (4, 0), (3, 1)] {
                    let mut inside = 0.0;
                    for [u, across] in &rule {
                        // By the angle along a rim, so that its ends are smooth.
                        let angle = 0.5 * PI * u;
                        let x = width * angle.sin();
                        let across = across * width * 0.5 * PI * angle.cos();
                        let b = height(rim, x);
                        let up: f64 = rule
                            .iter()
                            .map(|[v, weight]| weight * b * density(n, b * v, radii[1]))
                            .sum();
                        inside += across * density(m, x, radii[0]) * up;
                    }
                    assert_relative_eq!(found.of(m, n), 1.0 - inside, epsilon = 1e-9);
                }
            }
        }
    }
}
