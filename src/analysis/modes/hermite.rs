//! Hermite–Gaussian modes across one plane, and the power they have beyond an edge.
//!
//! With ξ = √2·x/w a mode of order m is ψ_m(ξ), the orthonormal Hermite function. From
//! ψ_m′ = √(2m) ψ_{m−1} − ξψ_m follows (ψ_m ψ_{m−1})′ = √(2m)·(ψ²_{m−1} − ψ²_m), and so the power
//! beyond ξ,
//!
//! ```text
//!     T_m(ξ) = ∫_ξ^∞ ψ_m² = T_{m−1}(ξ) + ψ_m(ξ) ψ_{m−1}(ξ)/√(2m),     T_0(ξ) = ½ erfc ξ,
//! ```
//!
//! a sum of positive terms wherever the tail is small: no digit of it is lost.

/// ψ_0 … ψ_highest at ξ, by their three-term recurrence, which is stable upwards.
fn functions(xi: f64, highest: usize, mut take: impl FnMut(usize, f64, f64)) {
    let mut before = 0.0;
    let mut here = std::f64::consts::PI.powf(-0.25) * (-0.5 * xi * xi).exp();
    for m in 0..=highest {
        take(m, here, before);
        let k = m as f64;
        let next = (2.0 / (k + 1.0)).sqrt() * xi * here - (k / (k + 1.0)).sqrt() * before;
        (before, here) = (here, next);
    }
}

/// ψ_m²(ξ) for every m up to the highest order.
pub(super) fn densities(xi: f64, highest: usize, densities: &mut Vec<f64>) {
    densities.clear();
    functions(xi, highest, |_, here, _| densities.push(here * here));
}

/// The power of every order beyond ξ ≥ 0, on one side.
pub(super) fn tails(xi: f64, highest: usize, tails: &mut Vec<f64>) {
    tails.clear();
    let mut tail = 0.5 * libm::erfc(xi);
    functions(xi, highest, |m, here, before| {
        if m > 0 {
            tail += here * before / (2.0 * m as f64).sqrt();
        }
        tails.push(tail.clamp(0.0, 0.5));
    });
}

/// Beyond this ξ no order up to the highest has a share of its power that counts: the turning
/// point and a little more, over which it falls below 1e-16.
pub(super) fn reach(highest: usize) -> f64 {
    (2.0 * highest as f64 + 1.0).sqrt() + 6.0
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::numeric::quadrature::gauss_legendre;
    use approx::assert_relative_eq;

    /// The recurrence of the tails against an integral of the densities.
    #[test]
    fn tails_are_integrals_of_the_densities() {
        let rule = gauss_legendre(200);
        let mut found = Vec::new();
        for from in [0.0, 0.3, 1.7, 4.0, 6.5] {
            let highest = 30;
            let to = reach(highest) + 2.0;
            let mut sums = vec![0.0; highest + 1];
            for [x, weight] in &rule {
                let half = 0.5 * (to - from);
                densities(from + half * (x + 1.0), highest, &mut found);
                for (sum, density) in sums.iter_mut().zip(&found) {
                    *sum += weight * half * density;
                }
            }
            tails(from, highest, &mut found);
            for (sum, tail) in sums.iter().zip(&found) {
                assert_relative_eq!(*tail, *sum, max_relative = 1e-9, epsilon = 1e-20);
            }
        }
    }

    /// Nothing is left beyond the reach, and half of all power beyond the middle.
    #[test]
    fn the_reach_holds_everything() {
        let mut found = Vec::new();
        for highest in [0, 1, 12, 100] {
            tails(reach(highest), highest, &mut found);
            assert!(found.iter().all(|tail| *tail < 1e-16), "{highest}");
            tails(0.0, highest, &mut found);
            assert!(found.iter().all(|tail| (*tail - 0.5).abs() < 1e-13));
        }
    }
}
