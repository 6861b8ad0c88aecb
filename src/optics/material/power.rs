//! Whole powers and polynomials, by multiplication.

use crate::numeric::Real;

/// x to a whole power.
pub(super) fn power<T: Real>(x: T, exponent: i32) -> T {
    let size = (0..exponent.unsigned_abs()).fold(T::constant(1.0), |product, _| product * x);
    if exponent < 0 { size.recip() } else { size }
}

/// Σ cₖ xᵏ, the constant first.
pub(super) fn polynomial<T: Real>(coefficients: &[f64], x: T) -> T {
    coefficients
        .iter()
        .rev()
        .fold(T::constant(0.0), |tail, &c| tail * x + c)
}
