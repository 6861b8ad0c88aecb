//! Numbers exactly as they were written, until they become the nearest floating-point number.

/// mantissa · 10^exponent / divisor.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Written {
    mantissa: i128,
    exponent: i32,
    divisor: i128,
}

/// Decimal digits that a mantissa takes; the products formed here then mostly fit too.
const MOST_DIGITS: usize = 30;
/// Exponents beyond this are out of any range, and are kept from overflowing.
const MOST_EXPONENT: i64 = 9999;
/// Up to here every whole number is a floating-point number, so that a quotient rounds once.
const EXACT: i128 = 1 << 53;

fn clamped(exponent: i64) -> i32 {
    exponent.clamp(-MOST_EXPONENT, MOST_EXPONENT) as i32
}

impl Written {
    pub(super) const ONE: Written = Written::whole(1);

    pub(super) const fn whole(number: i128) -> Self {
        Self::new(number, 0)
    }

    pub(super) const fn new(mantissa: i128, exponent: i32) -> Self {
        Self {
            mantissa,
            exponent,
            divisor: 1,
        }
    }

    /// A fraction of whole numbers; the denominator is not zero.
    pub(super) fn fraction(numerator: u32, denominator: u32) -> Self {
        Self {
            mantissa: i128::from(numerator),
            exponent: 0,
            divisor: i128::from(denominator.max(1)),
        }
    }

    /// ASCII digits times a power of ten.
    pub(super) fn read(digits: &str, exponent: i64) -> Self {
        let digits = digits.trim_start_matches('0');
        let significant = digits.trim_end_matches('0');
        if significant.is_empty() {
            return Self::whole(0);
        }
        let exponent = exponent.saturating_add((digits.len() - significant.len()) as i64);
        match significant.parse::<i128>() {
            Ok(mantissa) if significant.len() <= MOST_DIGITS => {
                Self::new(mantissa, clamped(exponent))
            }
            _ => Self::from_f64(parsed(&format!("{significant}e{}", clamped(exponent)))),
        }
    }

    /// The shortest decimal that reads back as this number.
    pub(super) fn from_f64(number: f64) -> Self {
        if !number.is_finite() {
            return Self::new(1, clamped(MOST_EXPONENT));
        }
        let text = format!("{:e}", number.abs());
        let (mantissa, exponent) = text.split_once('e').unwrap_or((&text, "0"));
        let (whole, decimals) = mantissa.split_once('.').unwrap_or((mantissa, ""));
        let exponent = exponent.parse::<i64>().unwrap_or(0) - decimals.len() as i64;
        let magnitude = Self::read(&format!("{whole}{decimals}"), exponent);
        if number < 0.0 {
            magnitude.negated()
        } else {
            magnitude
        }
    }

    /// The floating-point number nearest to it; infinite where there is none.
    pub(super) fn to_f64(self) -> f64 {
        let decimal = parsed(&format!("{}e{}", self.mantissa, self.exponent));
        if self.divisor == 1 {
            return decimal;
        }
        let power = 10_i128.checked_pow(self.exponent.unsigned_abs());
        let scaled = |number: i128, applies: bool| {
            let factor = if applies { power? } else { 1 };
            number.checked_mul(factor).filter(|n| n.abs() <= EXACT)
        };
        let numerator = scaled(self.mantissa, self.exponent > 0);
        let denominator = scaled(self.divisor, self.exponent < 0);
        match (numerator, denominator) {
            (Some(numerator), Some(denominator)) => numerator as f64 / denominator as f64,
            _ => decimal / self.divisor as f64,
        }
    }

    /// The number in SI units, where it lies in the range that quantities have.
    pub(super) fn in_range(self) -> Option<f64> {
        const LEAST: f64 = 1e-30;
        const MOST: f64 = 1e30;
        let number = self.to_f64();
        if self.is_zero() {
            Some(0.0)
        } else {
            (LEAST..=MOST).contains(&number.abs()).then_some(number)
        }
    }

    pub(super) fn is_zero(self) -> bool {
        self.mantissa == 0
    }

    pub(super) fn is_negative(self) -> bool {
        self.mantissa < 0
    }

    pub(super) fn negated(self) -> Self {
        Self {
            mantissa: -self.mantissa,
            ..self
        }
    }

    pub(super) fn magnitude(self) -> Self {
        if self.is_negative() {
            self.negated()
        } else {
            self
        }
    }

    /// Times a power of ten.
    pub(super) fn shifted(self, exponent: i64) -> Self {
        Self {
            exponent: clamped(i64::from(self.exponent).saturating_add(exponent)),
            ..self
        }
    }

    /// Exact where it fits, else rounded.
    pub(super) fn product(self, other: Self) -> Self {
        let mantissa = self.mantissa.checked_mul(other.mantissa);
        let divisor = self.divisor.checked_mul(other.divisor);
        match (mantissa, divisor) {
            (Some(mantissa), Some(divisor)) => Self {
                mantissa,
                exponent: self.exponent,
                divisor,
            }
            .shifted(i64::from(other.exponent)),
            _ => Self::from_f64(self.to_f64() * other.to_f64()),
        }
    }

    /// Exact where it fits, else rounded.
    pub(super) fn plus(self, other: Self) -> Self {
        let exact = || {
            if self.divisor != 1 || other.divisor != 1 {
                return None;
            }
            let place = self.exponent.min(other.exponent);
            let aligned = |number: Self| {
                let factor = 10_i128.checked_pow((number.exponent - place).unsigned_abs())?;
                number.mantissa.checked_mul(factor)
            };
            let sum = aligned(self)?.checked_add(aligned(other)?)?;
            Some(Self::new(sum, place))
        };
        exact().unwrap_or_else(|| Self::from_f64(self.to_f64() + other.to_f64()))
    }

    /// Mantissa and exponent, where it is a decimal.
    pub(super) fn parts(self) -> (i128, i32) {
        (self.mantissa, self.exponent)
    }

    /// A text that reads back as this number, which must not be a fraction.
    pub(super) fn text(self) -> String {
        const LONGEST_PLAIN: i64 = 21;
        let digits = self.mantissa.unsigned_abs().to_string();
        let sign = if self.is_negative() { "-" } else { "" };
        if self.is_zero() {
            return "0".to_owned();
        }
        let exponent = i64::from(self.exponent);
        let before_point = digits.len() as i64 + exponent;
        let magnitude = if exponent >= 0 && before_point <= LONGEST_PLAIN {
            digits + &"0".repeat(exponent as usize)
        } else if exponent < 0 && before_point > 0 {
            let (whole, decimals) = digits.split_at(before_point as usize);
            format!("{whole}.{decimals}")
        } else if exponent < 0 && before_point > -5 {
            format!("0.{}{digits}", "0".repeat(-before_point as usize))
        } else {
            let (first, rest) = digits.split_at(1);
            let point = if rest.is_empty() { "" } else { "." };
            format!("{first}{point}{rest}e{}", before_point - 1)
        };
        format!("{sign}{magnitude}")
    }
}

/// Reads digits that are known to make a number.
fn parsed(text: &str) -> f64 {
    text.parse().unwrap_or(f64::INFINITY)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn decimals_become_the_nearest_number() {
        assert_eq!(Written::read("5", -6).to_f64(), 5e-6);
        assert_eq!(Written::read("1064", -9).to_f64(), 1064e-9);
        assert_eq!(Written::fraction(1, 3).to_f64(), 1.0 / 3.0);
        assert_eq!(Written::read("1", 400).in_range(), None);
        assert_eq!(Written::read("1", -400).in_range(), None);
        assert_eq!(Written::read("0", -400).in_range(), Some(0.0));
    }

    #[test]
    fn sums_and_products_are_exact() {
        let sum = Written::read("20", 0).plus(Written::read("27315", -2));
        assert_eq!(sum.to_f64(), 293.15);
        let product = Written::read("1", -1).product(Written::read("3", -2));
        assert_eq!(product.to_f64(), 0.003);
    }

    #[test]
    fn texts_read_back() {
        for number in [
            1.0, -0.1, 123.456, 1e-9, 5e29, 1.5e22, 0.000123, 7e20, 1e-5, 0.5,
        ] {
            let text = Written::from_f64(number).text();
            assert_eq!(text.parse::<f64>(), Ok(number), "{text}");
        }
    }
}
