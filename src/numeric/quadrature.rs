//! Integrals of smooth functions.

use std::f64::consts::PI;

/// Nodes and weights of Gauss and Legendre's rule with the given count of nodes on [−1, 1]: exact
/// for polynomials up to degree 2·count − 1.
///
/// Newton's method on the Legendre polynomial, from the usual guess of its roots (Abramowitz &
/// Stegun, *Handbook of Mathematical Functions* (1964), 25.4.29 and 22.16.6).
pub fn gauss_legendre(count: usize) -> Vec<[f64; 2]> {
    let n = count as f64;
    (0..count)
        .map(|k| {
            let mut x = -(PI * (k as f64 + 0.75) / (n + 0.5)).cos();
            let mut slope = 1.0;
            // Four steps reach rounding from that guess; a few more cost nothing.
            for _ in 0..8 {
                let (value, before) = legendre(count, x);
                slope = n * (x * value - before) / (x * x - 1.0);
                x -= value / slope;
            }
            [x, 2.0 / ((1.0 - x * x) * slope * slope)]
        })
        .collect()
}

/// The Legendre polynomials of a degree and of the one below.
fn legendre(degree: usize, x: f64) -> (f64, f64) {
    (0..degree).fold((1.0, 0.0), |(value, before), k| {
        let k = k as f64;
        (
            ((2.0 * k + 1.0) * x * value - k * before) / (k + 1.0),
            value,
        )
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn polynomials_of_full_degree_are_exact() {
        for count in [1, 2, 5, 40, 250] {
            let rule = gauss_legendre(count);
            for degree in [0, 2 * ((2 * count - 1) / 2)] {
                let sum: f64 = rule.iter().map(|[x, w]| w * x.powi(degree as i32)).sum();
                // The integral of an even power.
                let exact = 2.0 / (degree as f64 + 1.0);
                assert_relative_eq!(sum, exact, max_relative = 1e-11);
            }
        }
    }
}
