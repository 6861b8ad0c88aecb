//! Where the transverse modes resonate.
//!
//! TEM_mn lies above TEM_00 by FSR·[(mψ_t + nψ_s)/2π + (mF_t + nF_s)/2], folded into half a free
//! spectral range to either side; ψ is the Gouy phase of a round trip and F the number of flips of
//! an axis (Kogelnik & Li, Appl. Opt. 5, 1550 (1966), with the flips of a ring's frame).

use std::f64::consts::{FRAC_2_PI, PI, TAU};

use super::eigenmode::PlaneMode;
use crate::cavity::Cavity;
use crate::numeric::Real;
use crate::optics::{PerPlane, Plane};

/// Spacing of neighbouring orders in either plane, in free spectral ranges, flips counted.
#[inline(always)]
pub fn spacings<T: Real>(cavity: &Cavity, modes: &PerPlane<PlaneMode<T>>) -> PerPlane<T> {
    let spacing = |plane: Plane| {
        let odd = cavity.flips()[plane] % 2 == 1;
        modes[plane].gouy_phase * (1.0 / TAU) + if odd { 0.5 } else { 0.0 }
    };
    PerPlane {
        tangential: spacing(Plane::Tangential),
        sagittal: spacing(Plane::Sagittal),
    }
}

/// Multiples of a spacing, folded: the table from which offsets of modes are summed.
#[derive(Clone, Debug)]
pub struct Multiples<T>(Vec<T>);

impl<T> Default for Multiples<T> {
    fn default() -> Self {
        Multiples(Vec::new())
    }
}

impl<T: Real> Multiples<T> {
    /// The multiples from none to the highest.
    #[inline(always)]
    fn of(&mut self, spacing: T, highest: usize) -> &[T] {
        let Multiples(folded) = self;
        folded.clear();
        let mut turns = T::constant(0.0);
        for _ in 0..=highest {
            folded.push(turns.folded());
            turns = turns + spacing;
        }
        folded
    }
}

/// Calls `visit` with m, n and the *nearness* of every TEM_mn with 1 ≤ m + n ≤ `highest`: half a
/// free spectral range less its distance from the fundamental, in free spectral ranges, from the
/// spacings of [`spacings`].
///
/// With both multiples folded, their sum x lies within ±1 and its distance from the nearest whole
/// number is ½ − ||x| − ½|.
#[inline(always)]
pub fn each_nearness<T: Real>(
    spacing: PerPlane<T>,
    highest: usize,
    multiples: &mut Multiples<T>,
    mut visit: impl FnMut(usize, usize, T),
) {
    let sagittal = multiples.of(spacing.sagittal, highest);
    let mut turns = T::constant(0.0);
    for m in 0..=highest {
        let tangential = turns.folded();
        let from = usize::from(m == 0);
        for (n, sagittal) in sagittal.iter().enumerate().take(highest + 1 - m).skip(from) {
            let sum = tangential + *sagittal;
            visit(m, n, (sum.abs() - 0.5).abs());
        }
        turns = turns + spacing.tangential;
    }
}

/// Offset of TEM_mn from the fundamental in free spectral ranges, in [−½, ½), from the spacings of
/// [`spacings`].
pub fn offset(spacing: PerPlane<f64>, m: usize, n: usize) -> f64 {
    let tangential = Real::folded(spacing.tangential * m as f64);
    let sagittal = Real::folded(spacing.sagittal * n as f64);
    in_one_range(tangential + sagittal)
}

/// A frequency in free spectral ranges, folded into [−½, ½).
pub fn in_one_range(turns: f64) -> f64 {
    let folded = Real::folded(turns);
    if folded >= 0.5 { folded - 1.0 } else { folded }
}

/// How much less of the power a mode holds at an offset (in free spectral ranges) than on its own
/// resonance: 1 + F_c sin²(πΔ/FSR), with F_c = (2ℱ/π)² the coefficient of finesse.
#[inline(always)]
pub fn suppression<T: Real>(offset: T, finesse: T) -> T {
    let coefficient = (finesse * FRAC_2_PI).squared();
    coefficient * (offset * PI).sin().squared() + 1.0
}

/// The least |offset| from the fundamental of any TEM_mn with 1 ≤ m + n ≤ `highest`, in free
/// spectral ranges.
#[inline(always)]
pub fn least_offset<T: Real>(
    spacing: PerPlane<T>,
    highest: usize,
    multiples: &mut Multiples<T>,
) -> T {
    // As `each_nearness`, but two at a time: a greatest waits for the one before it.
    let sagittal = multiples.of(spacing.sagittal, highest);
    let mut nearest = [T::constant(0.0); 2];
    let mut turns = T::constant(0.0);
    for m in 0..=highest {
        let tangential = turns.folded();
        let nearness = |sagittal: T| ((tangential + sagittal).abs() - 0.5).abs();
        let from = usize::from(m == 0);
        let (pairs, odd) = sagittal[from..highest + 1 - m].as_chunks::<2>();
        for [even, odd] in pairs {
            nearest[0] = nearest[0].max(nearness(*even));
            nearest[1] = nearest[1].max(nearness(*odd));
        }
        for last in odd {
            nearest[0] = nearest[0].max(nearness(*last));
        }
        turns = turns + spacing.tangential;
    }
    -nearest[0].max(nearest[1]) + 0.5
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    /// Offsets of orders 1 to 22 of a 38.55 m cavity with a 57.1 m mirror, in MHz: laboratory log of
    /// the Caltech 40 m interferometer, entry 469 (after Siegman, *Lasers*, eq. 19.23). Published
    /// to four decimals.
    #[test]
    fn offsets_of_a_long_cavity() {
        const ORDERS: [f64; 22] = [
            1.1936, 2.3871, 3.5807, 0.8859, 2.0795, 3.273, 0.5782, 1.7718, 2.9654, 0.2706, 1.4641,
            2.6577, 3.8512, 1.1564, 2.35, 3.5436, 0.8488, 2.0423, 3.2359, 0.5411, 1.7347, 2.9282,
        ];
        let (length, r1, r2) = (38.55, 1e6, 57.1);
        let product: f64 = (1.0 - length / r1) * (1.0 - length / r2);
        let spacing = product.sqrt().acos() / std::f64::consts::PI;
        let fsr = 299.792458 / (2.0 * length);
        let mut nearest = f64::INFINITY;
        for (index, listed) in ORDERS.iter().enumerate() {
            let turns = spacing * (index + 1) as f64;
            let offset = (turns - turns.floor()) * fsr;
            assert_abs_diff_eq!(offset, *listed, epsilon = 6e-5);
            nearest = nearest.min(listed.min(fsr - listed));
            let least = least_offset(
                PerPlane::both(spacing),
                index + 1,
                &mut Multiples::default(),
            ) * fsr;
            assert_abs_diff_eq!(least, nearest, epsilon = 6e-5);
        }
    }
}
