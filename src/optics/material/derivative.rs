//! Exact first and second derivatives by dual numbers.

use crate::numeric::{Dual, Real};

/// f(x) and f′(x).
pub(super) fn first<T: Real>(x: T, f: impl Fn(Dual<T>) -> Dual<T>) -> (T, T) {
    let y = f(Dual::variable(x));
    (y.value, y.slope)
}

/// f″(x): the derivative of the derivative, by a dual number of dual numbers.
pub(super) fn second<T: Real>(x: T, f: impl Fn(Dual<Dual<T>>) -> Dual<Dual<T>>) -> T {
    first(Dual::variable(x), f).1.slope
}
