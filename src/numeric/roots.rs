//! Roots of functions of one variable.
//!
//! [`bracketed`] is Brent's method. [`Proxy`] stands in for a smooth function on an interval by its
//! Chebyshev interpolant, from which *all* zeros and touches are found: the interpolant's
//! extrema cut the interval into pieces on which the function is monotone, and each piece holds
//! one zero at the most (after Boyd, SIAM Rev. 55, 375 (2013)).

use std::f64::consts::PI;

use nalgebra::DMatrix;

/// A zero of `f` between `a` and `b`, where it has opposite signs, to the last bits of `f`.
///
/// Brent, *Algorithms for Minimization without Derivatives* (1973), chapter 4: bisection,
/// secant and inverse quadratic interpolation, whichever is safe. Returns an end where `f`
/// vanishes there; `None` where the signs agree or a value is not a number.
pub fn bracketed(mut f: impl FnMut(f64) -> f64, a: f64, b: f64) -> Option<f64> {
    let (mut a, mut b) = (a, b);
    let (mut fa, mut fb) = (f(a), f(b));
    if fa == 0.0 {
        return Some(a);
    }
    if fb == 0.0 {
        return Some(b);
    }
    if !fa.is_finite() || !fb.is_finite() || (fa > 0.0) == (fb > 0.0) {
        return None;
    }
    let (mut c, mut fc) = (a, fa);
    let mut step = b - a;
    let mut step_before = step;
    // Bisection alone needs about 1100 halvings from the largest to the smallest number.
    for _ in 0..1200 {
        if fc.abs() < fb.abs() {
            (a, b, c) = (b, c, b);
            (fa, fb, fc) = (fb, fc, fb);
        }
        let tolerance = 2.0 * f64::EPSILON * b.abs() + f64::MIN_POSITIVE;
        let middle = 0.5 * (c - b);
        if middle.abs() <= tolerance || fb == 0.0 {
            return Some(b);
        }
        if step_before.abs() >= tolerance && fa.abs() > fb.abs() {
            let s = fb / fa;
            let (mut p, mut q) = if a == c {
                (2.0 * middle * s, 1.0 - s)
            } else {
                let (u, v) = (fa / fc, fb / fc);
                (
                    s * (2.0 * middle * u * (u - v) - (b - a) * (v - 1.0)),
                    (u - 1.0) * (v - 1.0) * (s - 1.0),
                )
            };
            if p > 0.0 {
                q = -q;
            }
            p = p.abs();
            let inside = (3.0 * middle * q - (tolerance * q).abs()).min((step_before * q).abs());
            if 2.0 * p < inside {
                step_before = step;
                step = p / q;
            } else {
                step = middle;
                step_before = middle;
            }
        } else {
            step = middle;
            step_before = middle;
        }
        (a, fa) = (b, fb);
        b += if step.abs() > tolerance {
            step
        } else {
            tolerance.copysign(middle)
        };
        fb = f(b);
        if !fb.is_finite() {
            return None;
        }
        if (fb > 0.0) == (fc > 0.0) {
            (c, fc) = (a, fa);
            step = b - a;
            step_before = step;
        }
    }
    Some(b)
}

/// Degree of the interpolants: enough for every polynomial that a handful of tied parts make,
/// so that only transcendental dependences need their interval halved.
pub const DEGREE: usize = 16;

/// The points at which a function is interpolated on [from, to].
pub fn nodes(from: f64, to: f64) -> [f64; DEGREE + 1] {
    std::array::from_fn(|k| {
        let x = -(PI * k as f64 / DEGREE as f64).cos();
        0.5 * (from + to) + 0.5 * (to - from) * x
    })
}

/// The Chebyshev interpolant of a function on an interval.
#[derive(Clone, Debug)]
pub struct Proxy {
    from: f64,
    to: f64,
    /// Coefficients of T₀, T₁ … on [−1, 1].
    coefficients: Vec<f64>,
    /// Whether the coefficients fall off to rounding.
    resolved: bool,
}

/// Coefficients below this share of the largest are rounding.
const TAIL: f64 = 1e-13;

impl Proxy {
    /// The interpolant of the values at the [`nodes`] of [from, to].
    pub fn new(from: f64, to: f64, values: &[f64; DEGREE + 1]) -> Proxy {
        let n = DEGREE;
        let weight = |k: usize| if k == 0 || k == n { 0.5 } else { 1.0 };
        let mut coefficients: Vec<f64> = (0..=n)
            .map(|j| {
                let sum: f64 = (0..=n)
                    .map(|k| {
                        // Node k lies at −cos(πk/n) = cos(π(n − k)/n).
                        let angle = PI * (j * (n - k) % (2 * n)) as f64 / n as f64;
                        weight(k) * values[k] * angle.cos()
                    })
                    .sum();
                sum * weight(j) * 2.0 / n as f64
            })
            .collect();
        let largest = coefficients.iter().fold(0.0_f64, |m, c| m.max(c.abs()));
        let is_tail = |c: &f64| c.abs() <= TAIL * largest;
        let resolved = coefficients.iter().rev().take(2).all(is_tail);
        while coefficients.len() > 1 && coefficients.last().is_some_and(is_tail) {
            coefficients.pop();
        }
        Proxy {
            from,
            to,
            coefficients,
            resolved,
        }
    }

    /// Whether the interpolant is the function to rounding.
    pub fn is_resolved(&self) -> bool {
        self.resolved
    }

    /// Whether the function stays clear of zero on the whole interval.
    ///
    /// No Chebyshev polynomial exceeds 1 there; the share left to rounding keeps touches.
    pub fn has_no_root(&self) -> bool {
        let constant = self.coefficients[0].abs();
        let rest: f64 = self.coefficients[1..].iter().map(|c| c.abs()).sum();
        constant > rest + 1e-9 * constant
    }

    /// Whether the function is a straight line to rounding.
    pub fn is_straight(&self) -> bool {
        self.coefficients.len() <= 2
    }

    /// The slope of a straight line.
    pub fn slope(&self) -> f64 {
        self.coefficients.get(1).copied().unwrap_or(0.0) * 2.0 / (self.to - self.from)
    }

    /// Points that cut the interval into pieces on which the function is monotone, in order, ends
    /// included; some of them may cut where nothing needs to be.
    pub fn cuts(&self) -> Vec<f64> {
        let mut cuts = vec![self.from];
        let mut inside: Vec<f64> = real_parts_of_roots(&derivative(&self.coefficients))
            .into_iter()
            .filter(|x| x.abs() < 1.0)
            .map(|x| 0.5 * (self.from + self.to) + 0.5 * (self.to - self.from) * x)
            .collect();
        inside.sort_by(f64::total_cmp);
        cuts.extend(inside);
        cuts.push(self.to);
        cuts
    }
}

/// Chebyshev coefficients of the derivative.
fn derivative(c: &[f64]) -> Vec<f64> {
    let n = c.len();
    let mut d = vec![0.0; n + 1];
    for k in (1..n).rev() {
        d[k - 1] = d[k + 1] + 2.0 * k as f64 * c[k];
    }
    d.truncate(n.saturating_sub(1));
    if let Some(first) = d.first_mut() {
        *first *= 0.5;
    }
    d
}

/// Real parts of all roots of a Chebyshev series: eigenvalues of its colleague matrix
/// (Good, Q. J. Math. 12, 61 (1961)).
fn real_parts_of_roots(c: &[f64]) -> Vec<f64> {
    // An iteration for eigenvalues does not end on what is no number.
    if !c.iter().all(|x| x.is_finite()) {
        return Vec::new();
    }
    let largest = c.iter().fold(0.0_f64, |m, x| m.max(x.abs()));
    let degree = c
        .iter()
        .rposition(|x| x.abs() > TAIL * largest)
        .unwrap_or(0);
    match degree {
        0 => Vec::new(),
        1 => vec![-c[0] / c[1]],
        n => {
            let mut m = DMatrix::<f64>::zeros(n, n);
            m[(0, 1)] = 1.0;
            for k in 1..n {
                m[(k, k - 1)] = 0.5;
                if k + 1 < n {
                    m[(k, k + 1)] = 0.5;
                }
            }
            for k in 0..n {
                m[(n - 1, k)] -= c[k] / (2.0 * c[n]);
            }
            m.complex_eigenvalues().iter().map(|z| z.re).collect()
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn brent_finds_a_root_to_the_last_bits() {
        let root = bracketed(|x| x * x - 2.0, 0.0, 9.0).unwrap();
        assert_relative_eq!(root, 2.0_f64.sqrt(), max_relative = 2.0 * f64::EPSILON);
        let steep = bracketed(|x| (x - 1e-9).powi(3), -1.0, 1.0).unwrap();
        // A triple root is flat to within the cube root of the smallest difference.
        assert_relative_eq!(steep, 1e-9, epsilon = 1e-12);
        assert_eq!(bracketed(|x| x * x + 1.0, -1.0, 1.0), None);
    }

    #[test]
    fn a_polynomial_is_cut_at_its_extrema() {
        let f = |x: f64| x.powi(4) - 5.0 * x.powi(2) + 4.0;
        let proxy = Proxy::new(-3.0, 2.5, &nodes(-3.0, 2.5).map(f));
        assert!(proxy.is_resolved());
        let cuts = proxy.cuts();
        for extremum in [-(2.5_f64.sqrt()), 0.0, 2.5_f64.sqrt()] {
            assert!(cuts.iter().any(|x| (x - extremum).abs() < 1e-12));
        }
    }

    #[test]
    fn what_it_cannot_follow_is_not_called_resolved() {
        let f = |x: f64| (40.0 * x).sin();
        assert!(!Proxy::new(0.0, 1.0, &nodes(0.0, 1.0).map(f)).is_resolved());
    }
}
