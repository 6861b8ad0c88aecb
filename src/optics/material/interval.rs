//! A closed range of wavelengths or temperatures.

/// A closed interval, in the unit of what it bounds.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Interval {
    /// Lower end.
    pub low: f64,
    /// Upper end.
    pub high: f64,
}

impl Interval {
    /// Wavelengths from `low` to `high`, given in micrometres as papers do, kept in metres.
    pub const fn micrometres(low: f64, high: f64) -> Self {
        Interval {
            low: low * 1e-6,
            high: high * 1e-6,
        }
    }

    /// Temperatures from `low` to `high`, given in degrees Celsius, kept in kelvin.
    pub const fn celsius(low: f64, high: f64) -> Self {
        Interval {
            low: low + 273.15,
            high: high + 273.15,
        }
    }

    /// Temperatures in kelvin.
    pub const fn kelvin(low: f64, high: f64) -> Self {
        Interval { low, high }
    }

    /// Whether `x` lies inside, ends included. An end counts as reached within the rounding of a
    /// change of units, for "1064 nm" must meet a range that ends at 1.064 µm.
    pub fn contains(&self, x: f64) -> bool {
        let slack = 1e-12 * (self.low.abs() + self.high.abs());
        self.low - slack <= x && x <= self.high + slack
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ends_belong_to_it_and_nothing_else_does() {
        let range = Interval::micrometres(0.2894, 1.064);
        assert!(range.contains(1064e-9));
        assert!(range.contains(289.4e-9));
        assert!(!range.contains(1064.001e-9));
        assert!(!range.contains(f64::NAN));
    }
}
