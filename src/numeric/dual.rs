//! Dual numbers: a value with its exact derivative, carried through any function of the physics.
//!
//! (v, d) stands for v + dε with ε² = 0; see Clifford, Proc. Lond. Math. Soc. 4, 381 (1873), and
//! for the use made here Griewank & Walther, *Evaluating Derivatives* (2008), forward mode.

use std::ops::{Add, Div, Mul, Neg, Sub};

use super::Real;

/// A value and its derivative with respect to one chosen variable.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dual<T> {
    /// The value.
    pub value: T,
    /// The derivative.
    pub slope: T,
}

impl<T: Real> Dual<T> {
    /// The variable itself: its derivative is one.
    pub fn variable(value: T) -> Self {
        Dual {
            value,
            slope: T::constant(1.0),
        }
    }

    /// A number that does not depend on the variable.
    pub fn fixed(value: T) -> Self {
        Dual {
            value,
            slope: T::constant(0.0),
        }
    }

    /// f(self), given f and f′ at the value.
    fn chain(self, f: T, derivative: T) -> Self {
        Dual {
            value: f,
            slope: self.slope * derivative,
        }
    }
}

impl<T: Real> Neg for Dual<T> {
    type Output = Self;
    fn neg(self) -> Self {
        Dual {
            value: -self.value,
            slope: -self.slope,
        }
    }
}

impl<T: Real> Add for Dual<T> {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Dual {
            value: self.value + other.value,
            slope: self.slope + other.slope,
        }
    }
}

impl<T: Real> Sub for Dual<T> {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Dual {
            value: self.value - other.value,
            slope: self.slope - other.slope,
        }
    }
}

impl<T: Real> Mul for Dual<T> {
    type Output = Self;
    fn mul(self, other: Self) -> Self {
        Dual {
            value: self.value * other.value,
            slope: self.slope * other.value + self.value * other.slope,
        }
    }
}

impl<T: Real> Div for Dual<T> {
    type Output = Self;
    fn div(self, other: Self) -> Self {
        let value = self.value / other.value;
        Dual {
            value,
            slope: (self.slope - value * other.slope) / other.value,
        }
    }
}

impl<T: Real> Add<f64> for Dual<T> {
    type Output = Self;
    fn add(self, other: f64) -> Self {
        Dual {
            value: self.value + other,
            slope: self.slope,
        }
    }
}

impl<T: Real> Sub<f64> for Dual<T> {
    type Output = Self;
    fn sub(self, other: f64) -> Self {
        self + -other
    }
}

impl<T: Real> Mul<f64> for Dual<T> {
    type Output = Self;
    fn mul(self, factor: f64) -> Self {
        Dual {
            value: self.value * factor,
            slope: self.slope * factor,
        }
    }
}

impl<T: Real> Div<f64> for Dual<T> {
    type Output = Self;
    fn div(self, divisor: f64) -> Self {
        Dual {
            value: self.value / divisor,
            slope: self.slope / divisor,
        }
    }
}

impl<T: Real> Real for Dual<T> {
    type Mask = T::Mask;

    fn constant(value: f64) -> Self {
        Dual::fixed(T::constant(value))
    }
    fn sqrt(self) -> Self {
        let root = self.value.sqrt();
        self.chain(root, T::constant(0.5) / root)
    }
    fn sin_cos(self) -> (Self, Self) {
        let (sin, cos) = self.value.sin_cos();
        (self.chain(sin, cos), self.chain(cos, -sin))
    }
    fn acos(self) -> Self {
        let x = self.value;
        let derivative = T::constant(-1.0) / ((x + 1.0) * (-x + 1.0)).sqrt();
        self.chain(x.acos(), derivative)
    }
    fn atan2(self, x: Self) -> Self {
        let square = self.value.squared() + x.value.squared();
        Dual {
            value: self.value.atan2(x.value),
            slope: (self.slope * x.value - self.value * x.slope) / square,
        }
    }
    fn abs(self) -> Self {
        let negative = self.value.less(T::constant(0.0));
        Self::select(negative, -self, self)
    }
    fn exp(self) -> Self {
        let e = self.value.exp();
        self.chain(e, e)
    }
    fn ln(self) -> Self {
        self.chain(self.value.ln(), self.value.recip())
    }
    fn cos_root(self) -> Self {
        // d cos√z / dz = −sin√z / (2√z)
        let z = self.value;
        self.chain(z.cos_root(), z.sinc_root() * -0.5)
    }
    fn sinc_root(self) -> Self {
        let z = self.value;
        self.chain(z.sinc_root(), sinc_root_slope(z))
    }
    fn floor(self) -> Self {
        Dual::fixed(self.value.floor())
    }
    fn round(self) -> Self {
        Dual::fixed(self.value.round())
    }
    fn less(self, other: Self) -> Self::Mask {
        self.value.less(other.value)
    }
    fn select(mask: Self::Mask, yes: Self, no: Self) -> Self {
        Dual {
            value: T::select(mask, yes.value, no.value),
            slope: T::select(mask, yes.slope, no.slope),
        }
    }
}

/// d(sin√z/√z)/dz = (cos√z − sin√z/√z)/(2z), by its power series −Σ k(−z)^(k−1)/(2k+1)! near zero,
/// where the closed form cancels.
fn sinc_root_slope<T: Real>(z: T) -> T {
    let one = T::constant(1.0);
    let near = z.abs().less(T::constant(0.5));
    // The lane that takes the series must not divide by zero in the closed form.
    let safe = T::select(near, one, z);
    let closed = (safe.cos_root() - safe.sinc_root()) / (safe * 2.0);
    let mut series = T::constant(0.0);
    let mut coefficient = 1.0; // 1/(2k+1)!, from k = 9 downwards
    for k in 1..10 {
        coefficient /= f64::from(2 * k) * f64::from(2 * k + 1);
    }
    for k in (1..10).rev() {
        series = series * -z - f64::from(k) * coefficient;
        coefficient *= f64::from(2 * k) * f64::from(2 * k + 1);
    }
    T::select(near, series, closed)
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    /// Each derivative against a central difference of the value.
    #[test]
    fn derivatives_match_differences() {
        type Case = (fn(Dual<f64>) -> Dual<f64>, &'static [f64]);
        let cases: [Case; 8] = [
            (|x| x.sqrt(), &[0.3, 2.0]),
            (|x| x.sin_cos().0 / x.sin_cos().1, &[0.3, 1.0]),
            (|x| x.acos(), &[-0.9, 0.2]),
            (|x| x.atan2(x * x - 2.0), &[0.5, 3.0]),
            (|x| x.exp() * x.ln(), &[0.5, 3.0]),
            (|x| x.cos_root(), &[-8.0, -0.2, 0.0, 0.3, 12.0]),
            (
                |x| x.sinc_root(),
                &[-8.0, -0.5001, -0.4999, -0.2, 0.0, 0.3, 12.0],
            ),
            (|x| (-x).abs() / (x + 3.0) - x * 2.0, &[-1.0, 1.0]),
        ];
        for (f, points) in cases {
            for &x in points {
                let h = 1e-5;
                let difference =
                    (f(Dual::fixed(x + h)).value - f(Dual::fixed(x - h)).value) / (2.0 * h);
                // The central difference itself is good to about h² and eps/h.
                assert_relative_eq!(
                    f(Dual::variable(x)).slope,
                    difference,
                    max_relative = 1e-8,
                    epsilon = 1e-9
                );
            }
        }
    }
}
