//! The number type over which the physics is written once.
//!
//! With `T = f64` the physics is the ordinary analysis, with [`Dual`](super::Dual) it gives exact
//! derivatives, and with [`Lanes`](super::Lanes) it evaluates eight cavities at a time. Hence the two
//! rules that the trait imposes: a decision that depends on a value is a [`Real::select`] between
//! two finite results, never a branch; and functions that are smooth for the physics are called
//! by their entire form ([`Real::cos_root`], [`Real::sinc_root`]), so that a duct may pass from
//! guiding to antiguiding without a special case.

use std::fmt::Debug;
use std::ops::{Add, BitAnd, Div, Mul, Neg, Sub};

/// A real number, or several of them evaluated alike.
pub trait Real:
    Copy
    + Debug
    + PartialEq
    + Send
    + Sync
    + 'static
    + Neg<Output = Self>
    + Add<Output = Self>
    + Sub<Output = Self>
    + Mul<Output = Self>
    + Div<Output = Self>
    + Add<f64, Output = Self>
    + Sub<f64, Output = Self>
    + Mul<f64, Output = Self>
    + Div<f64, Output = Self>
{
    /// The outcome of a comparison: `bool` for one number, one flag a lane for several.
    type Mask: Copy + Debug + BitAnd<Output = Self::Mask>;

    /// A number that does not vary.
    fn constant(value: f64) -> Self;
    /// Square root of a number that is not negative.
    fn sqrt(self) -> Self;
    /// Sine and cosine.
    fn sin_cos(self) -> (Self, Self);
    /// Arc cosine, in [0, π].
    fn acos(self) -> Self;
    /// Angle of the point (`x`, `self`), in (−π, π].
    fn atan2(self, x: Self) -> Self;
    /// Absolute value.
    fn abs(self) -> Self;
    /// Exponential function.
    fn exp(self) -> Self;
    /// Natural logarithm.
    fn ln(self) -> Self;
    /// cos √z as the entire function it is: cosh √−z below zero.
    fn cos_root(self) -> Self;
    /// sin √z / √z as the entire function it is: 1 at zero, sinh √−z / √−z below.
    fn sinc_root(self) -> Self;
    /// The largest whole number not above this one; its derivative counts as zero.
    fn floor(self) -> Self;
    /// The nearest whole number, the even one of two; its derivative counts as zero.
    fn round(self) -> Self;
    /// Whether `self < other`.
    fn less(self, other: Self) -> Self::Mask;
    /// `yes` where the mask holds, `no` elsewhere.
    fn select(mask: Self::Mask, yes: Self, no: Self) -> Self;

    /// A flag that is the same for all.
    #[inline(always)]
    fn always(flag: bool) -> Self::Mask {
        Self::constant(0.0).less(Self::constant(if flag { 1.0 } else { -1.0 }))
    }
    /// The smaller of two numbers.
    #[inline(always)]
    fn min(self, other: Self) -> Self {
        Self::select(self.less(other), self, other)
    }
    /// The larger of two numbers.
    #[inline(always)]
    fn max(self, other: Self) -> Self {
        Self::select(self.less(other), other, self)
    }
    /// What is left over the nearest whole number, in [−½, ½].
    #[inline(always)]
    fn folded(self) -> Self {
        self - self.round()
    }
    /// The square.
    #[inline(always)]
    fn squared(self) -> Self {
        self * self
    }
    /// The reciprocal.
    #[inline(always)]
    fn recip(self) -> Self {
        Self::constant(1.0) / self
    }
    /// Sine.
    #[inline(always)]
    fn sin(self) -> Self {
        self.sin_cos().0
    }
    /// Cosine.
    #[inline(always)]
    fn cos(self) -> Self {
        self.sin_cos().1
    }
}

/// Below this |z| the closed forms of the root functions lose digits to cancellation
/// in their derivatives; the power series needs few terms there.
const SERIES_BELOW: f64 = 0.5;

impl Real for f64 {
    type Mask = bool;

    fn constant(value: f64) -> f64 {
        value
    }
    fn sqrt(self) -> f64 {
        f64::sqrt(self)
    }
    fn sin_cos(self) -> (f64, f64) {
        f64::sin_cos(self)
    }
    fn acos(self) -> f64 {
        f64::acos(self)
    }
    fn atan2(self, x: f64) -> f64 {
        f64::atan2(self, x)
    }
    fn abs(self) -> f64 {
        f64::abs(self)
    }
    fn exp(self) -> f64 {
        f64::exp(self)
    }
    fn ln(self) -> f64 {
        f64::ln(self)
    }
    fn cos_root(self) -> f64 {
        if self.abs() < SERIES_BELOW {
            // Σ (−z)^k / (2k)!
            series(-self, |k| (2.0 * k - 1.0) * (2.0 * k))
        } else if self > 0.0 {
            self.sqrt().cos()
        } else {
            (-self).sqrt().cosh()
        }
    }
    fn sinc_root(self) -> f64 {
        if self.abs() < SERIES_BELOW {
            // Σ (−z)^k / (2k + 1)!
            series(-self, |k| (2.0 * k) * (2.0 * k + 1.0))
        } else if self > 0.0 {
            let root = self.sqrt();
            root.sin() / root
        } else {
            let root = (-self).sqrt();
            root.sinh() / root
        }
    }
    fn floor(self) -> f64 {
        f64::floor(self)
    }
    fn round(self) -> f64 {
        // From here on there are no halves. Below, adding three halves of 2⁵² leaves no room for a
        // fraction, and taking it off again costs no call.
        const NO_FRACTIONS: f64 = 2_251_799_813_685_248.0;
        if self.abs() < NO_FRACTIONS {
            (self + 3.0 * NO_FRACTIONS) - 3.0 * NO_FRACTIONS
        } else {
            self.round_ties_even()
        }
    }
    fn less(self, other: f64) -> bool {
        self < other
    }
    fn select(mask: bool, yes: f64, no: f64) -> f64 {
        if mask { yes } else { no }
    }
}

/// 1 + x/d(1) + x²/(d(1)d(2)) + … for |x| < [`SERIES_BELOW`]: nine terms reach rounding.
fn series(x: f64, divisor: impl Fn(f64) -> f64) -> f64 {
    (1..10)
        .rev()
        .fold(1.0, |tail, k| 1.0 + tail * x / divisor(f64::from(k)))
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn halves_are_rounded_to_even() {
        for x in [
            0.0,
            0.5,
            1.5,
            2.5,
            -0.5,
            -1.5,
            0.49999999999999994,
            1e15 + 0.5,
            2.3e15,
            -4.6e15,
            1e300,
        ] {
            assert_eq!(Real::round(x), x.round_ties_even(), "{x}");
        }
    }

    #[test]
    fn root_functions_join_smoothly_and_match_their_closed_forms() {
        for z in [-9.0, -0.6, -0.4999, -1e-9, 0.0, 1e-9, 0.4999, 0.6, 9.0_f64] {
            let (cos, sinc) = if z > 0.0 {
                let r = z.sqrt();
                (r.cos(), r.sin() / r)
            } else if z < 0.0 {
                let r = (-z).sqrt();
                (r.cosh(), r.sinh() / r)
            } else {
                (1.0, 1.0)
            };
            assert_relative_eq!(z.cos_root(), cos, max_relative = 4.0 * f64::EPSILON);
            assert_relative_eq!(z.sinc_root(), sinc, max_relative = 4.0 * f64::EPSILON);
        }
    }
}
