//! Variance shares of the function of Ishigami & Homma (Proc. ISUMA '90, 398 (1990)),
//! f = sin x₁ + a sin² x₂ + b x₃⁴ sin x₁ over [−π, π]³ with a = 7, b = 0.1. Its shares are known in
//! closed form (Sobol' & Levitan, Comput. Phys. Commun. 117, 52 (1999); recomputed from them):
//! D = a²/8 + bπ⁴/5 + b²π⁸/18 + 1/2, V₁ = ½(1 + bπ⁴/5)², V₂ = a²/8, V₃ = 0, V₁₃ = 8b²π⁸/225.

use std::f64::consts::PI;

use modewright::study::tolerance::variance_shares;
use rand::{RngExt, SeedableRng};
use rand_chacha::ChaCha8Rng;

#[test]
fn known_shares_are_found_within_their_own_uncertainty() {
    let (a, b) = (7.0_f64, 0.1_f64);
    let v1 = 0.5 * (1.0 + b * PI.powi(4) / 5.0).powi(2);
    let v2 = a * a / 8.0;
    let v13 = 8.0 * b * b * PI.powi(8) / 225.0;
    let variance = v1 + v2 + v13;
    let whole = a * a / 8.0 + b * PI.powi(4) / 5.0 + b * b * PI.powi(8) / 18.0 + 0.5;
    assert!((variance - whole).abs() < 1e-12 * whole);

    let sample = |number: u64| {
        let mut chance = ChaCha8Rng::seed_from_u64(number);
        let mut point = || (0..3).map(|_| chance.random_range(-PI..PI)).collect();
        [point(), point()]
    };
    let output = |x: &[f64]| x[0].sin() * (1.0 + b * x[2].powi(4)) + a * x[1].sin().powi(2);
    let found = variance_shares(3, 200_000, sample, output).unwrap();
    let known = [
        (v1 / variance, (v1 + v13) / variance),
        (v2 / variance, v2 / variance),
        (0.0, v13 / variance),
    ];
    for (share, (first, total)) in found.iter().zip(known) {
        // 0.314, 0.442, 0 and 0.558, 0.442, 0.244; four standard uncertainties, and those small.
        assert!(
            (share.first_order - first).abs() < 4.0 * share.first_order_u + 1e-12,
            "{share:?}"
        );
        assert!(
            (share.total - total).abs() < 4.0 * share.total_u + 1e-12,
            "{share:?}"
        );
        assert!(
            share.first_order_u < 0.01 && share.total_u < 0.01,
            "{share:?}"
        );
    }
}
