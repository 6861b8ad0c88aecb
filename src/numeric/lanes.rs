//! Eight numbers evaluated alike.
//!
//! Written as plain arrays in plain loops, so that the compiler turns every operation into vector
//! instructions of whatever width the surrounding function is compiled for. No operation depends
//! on that width: results are the same bytes everywhere.

use std::f64::consts::{FRAC_PI_2, PI};
use std::ops::{Add, BitAnd, BitOr, Div, Mul, Neg, Not, Sub};

use super::Real;

/// Number of lanes.
pub const LANES: usize = 8;

/// Eight numbers.
#[derive(Clone, Copy, Debug, PartialEq)]
#[repr(align(64))]
pub struct Lanes(pub [f64; LANES]);

/// One flag a lane: all bits set, or none.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[repr(align(64))]
pub struct LaneMask(pub [u64; LANES]);

impl LaneMask {
    /// The flag of one lane.
    #[inline(always)]
    pub fn holds(self, lane: usize) -> bool {
        self.0[lane] != 0
    }

    /// Flags of the first lanes.
    #[inline(always)]
    pub fn first(count: usize) -> Self {
        LaneMask(each(|i| if i < count { u64::MAX } else { 0 }))
    }

    /// How many flags hold.
    #[inline(always)]
    pub fn count(self) -> usize {
        self.0.iter().map(|flag| (flag & 1) as usize).sum()
    }
}

impl BitOr for LaneMask {
    type Output = Self;
    #[inline(always)]
    fn bitor(self, other: Self) -> Self {
        LaneMask(each(|i| self.0[i] | other.0[i]))
    }
}

impl Not for LaneMask {
    type Output = Self;
    #[inline(always)]
    fn not(self) -> Self {
        LaneMask(each(|i| !self.0[i]))
    }
}

impl BitAnd for LaneMask {
    type Output = Self;
    #[inline(always)]
    fn bitand(self, other: Self) -> Self {
        LaneMask(each(|i| self.0[i] & other.0[i]))
    }
}

/// One value a lane, in a loop that the compiler always sees through.
#[inline(always)]
fn each<X: Copy + Default>(f: impl Fn(usize) -> X) -> [X; LANES] {
    let mut values = [X::default(); LANES];
    for (lane, value) in values.iter_mut().enumerate() {
        *value = f(lane);
    }
    values
}

/// Half of 2⁵³: adding and taking away 1.5·2⁵² rounds to the nearest whole number.
const ROUNDS: f64 = 1.5 * (1_u64 << 52) as f64;

/// Tangents of π/16, π/8 and 3π/16.
const TAN_11_25: f64 = 0.198_912_367_379_658;
const TAN_22_5: f64 = 0.414_213_562_373_095_03;
const TAN_33_75: f64 = 0.668_178_637_919_298_9;

impl Lanes {
    #[inline(always)]
    fn zip(self, other: Self, f: impl Fn(f64, f64) -> f64) -> Self {
        Lanes(each(|i| f(self.0[i], other.0[i])))
    }

    #[inline(always)]
    fn map(self, f: impl Fn(f64) -> f64) -> Self {
        Lanes(each(|i| f(self.0[i])))
    }

    /// A function that is dear, called lane by lane: once where all lanes are the same.
    #[inline(never)]
    fn map_dear(self, f: impl Fn(f64) -> f64) -> Self {
        if self.is_uniform() {
            Lanes([f(self.0[0]); LANES])
        } else {
            self.map(f)
        }
    }

    /// The sum of all lanes, in a fixed order.
    #[inline(always)]
    pub fn sum(self) -> f64 {
        let [a, b, c, d, e, f, g, h] = self.0;
        ((a + e) + (b + f)) + ((c + g) + (d + h))
    }

    /// The least of all lanes.
    #[inline(always)]
    pub fn least(self) -> f64 {
        self.0.into_iter().fold(f64::INFINITY, f64::min)
    }

    #[inline(always)]
    fn is_uniform(self) -> bool {
        let first = self.0[0].to_bits();
        let differs = self.0.iter().fold(0, |d, x| d | (x.to_bits() ^ first));
        differs == 0
    }
}

impl Neg for Lanes {
    type Output = Self;
    #[inline(always)]
    fn neg(self) -> Self {
        self.map(|x| -x)
    }
}

macro_rules! lane_by_lane {
    ($($trait:ident $function:ident $operator:tt)*) => {$(
        impl $trait for Lanes {
            type Output = Self;
            #[inline(always)]
            fn $function(self, other: Self) -> Self {
                self.zip(other, |a, b| a $operator b)
            }
        }
        impl $trait<f64> for Lanes {
            type Output = Self;
            #[inline(always)]
            fn $function(self, other: f64) -> Self {
                self.map(|a| a $operator other)
            }
        }
    )*};
}

lane_by_lane!(Add add + Sub sub - Mul mul * Div div /);

impl Real for Lanes {
    type Mask = LaneMask;

    #[inline(always)]
    fn constant(value: f64) -> Self {
        Lanes([value; LANES])
    }
    #[inline(always)]
    fn sqrt(self) -> Self {
        self.map(f64::sqrt)
    }
    #[inline(always)]
    fn sin_cos(self) -> (Self, Self) {
        (self.map_dear(f64::sin), self.map_dear(f64::cos))
    }
    #[inline(always)]
    fn acos(self) -> Self {
        ((self + 1.0) * (-self + 1.0)).sqrt().atan2(self)
    }
    /// The angle of the octant less the nearer of π/16 and 3π/16, whose tangent then is at most
    /// tan(π/16): eleven terms of the series t − t³/3 + t⁵/5 … reach rounding.
    #[inline(always)]
    fn atan2(self, x: Self) -> Self {
        let zero = Self::constant(0.0);
        let (up, across) = (self.abs(), x.abs());
        let steep = across.less(up);
        let (low, high) = (up.min(across), up.max(across));
        let flat = low.less(high * TAN_22_5);
        let both =
            |near: f64, far: f64| Self::select(flat, Self::constant(near), Self::constant(far));
        let tangent = both(TAN_11_25, TAN_33_75);
        let nothing = high.less(Self::constant(f64::MIN_POSITIVE));
        let across = Self::select(nothing, Self::constant(1.0), high + tangent * low);
        let t = (low - tangent * high) / across;
        let square = -t.squared();
        let mut series = zero;
        for k in (0..11).rev() {
            series = series * square + 1.0 / f64::from(2 * k + 1);
        }
        let angle = t * series + both(PI / 16.0, 3.0 * PI / 16.0);
        let octant = Self::select(nothing, zero, angle);
        let quadrant = Self::select(steep, -octant + FRAC_PI_2, octant);
        let half_plane = Self::select(x.less(zero), -quadrant + PI, quadrant);
        Self::select(self.less(zero), -half_plane, half_plane)
    }
    #[inline(always)]
    fn abs(self) -> Self {
        self.map(f64::abs)
    }
    #[inline(always)]
    fn exp(self) -> Self {
        self.map_dear(f64::exp)
    }
    #[inline(always)]
    fn ln(self) -> Self {
        self.map_dear(f64::ln)
    }
    #[inline(always)]
    fn cos_root(self) -> Self {
        self.map_dear(|z| z.cos_root())
    }
    #[inline(always)]
    fn sinc_root(self) -> Self {
        self.map_dear(|z| z.sinc_root())
    }
    #[inline(always)]
    fn floor(self) -> Self {
        let nearest = self.round();
        let above = self.less(nearest);
        Self::select(above, nearest - 1.0, nearest)
    }
    #[inline(always)]
    fn round(self) -> Self {
        self.map(|x| (x + ROUNDS) - ROUNDS)
    }
    #[inline(always)]
    fn less(self, other: Self) -> LaneMask {
        LaneMask(each(|i| if self.0[i] < other.0[i] { u64::MAX } else { 0 }))
    }
    #[inline(always)]
    fn select(mask: LaneMask, yes: Self, no: Self) -> Self {
        Lanes(each(|i| {
            let bits = (yes.0[i].to_bits() & mask.0[i]) | (no.0[i].to_bits() & !mask.0[i]);
            f64::from_bits(bits)
        }))
    }
    #[inline(always)]
    fn min(self, other: Self) -> Self {
        self.zip(other, |a, b| if a < b { a } else { b })
    }
    #[inline(always)]
    fn max(self, other: Self) -> Self {
        self.zip(other, |a, b| if a < b { b } else { a })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    #[test]
    fn angles_are_those_of_the_library() {
        for step in 0..4000 {
            let angle = f64::from(step) * 0.0017 - 3.1;
            let radius = f64::from(step % 7 + 1);
            let (y, x) = (radius * angle.sin(), radius * angle.cos());
            let found = Lanes::constant(y).atan2(Lanes::constant(x)).0[3];
            assert_abs_diff_eq!(found, y.atan2(x), epsilon = 4.0 * f64::EPSILON);
            let found = Lanes::constant(x / radius).acos().0[0];
            assert_abs_diff_eq!(found, (x / radius).acos(), epsilon = 1e-15);
        }
        let zero = Lanes::constant(0.0);
        assert_eq!(zero.atan2(zero).0[0], 0.0);
    }

    #[test]
    fn whole_numbers_are_those_of_the_library() {
        for x in [-2.5, -1.7, -1.0, -0.2, 0.0, 0.3, 0.5, 1.0, 1.5, 7.99, 1e6] {
            assert_eq!(Lanes::constant(x).floor().0[2], x.floor());
            assert_eq!(Lanes::constant(x).round().0[2], x.round_ties_even());
        }
    }
}
