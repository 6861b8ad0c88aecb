//! Few digits in the unit a reader expects: 0.0231 m is "23.1 mm".

use super::unit::Unit;
use super::{Kind, Spread};

/// What stands for a value that cannot be printed.
const NO_VALUE: &str = "–";

/// Units of a kind, each from the magnitude on at which it is used, and the one used for zero.
fn ladder(kind: Kind) -> (&'static [(f64, Unit)], Unit) {
    match kind {
        // Wavelengths up to 2 µm are called by their nanometres.
        Kind::Length | Kind::Position | Kind::Radius | Kind::Face | Kind::Focal => (
            &[
                (0.0, Unit::NM),
                (2e-6, Unit::UM),
                (1e-3, Unit::MM),
                (1.0, Unit::M),
                (1e3, Unit::KM),
            ],
            Unit::MM,
        ),
        Kind::Angle | Kind::SlabAngle => (
            &[
                (0.0, Unit::URAD),
                (1e-3, Unit::MRAD),
                (std::f64::consts::PI / 180.0, Unit::DEG),
            ],
            Unit::DEG,
        ),
        Kind::Curvature | Kind::Strength => (&[], Unit::PER_M),
        Kind::Number => (&[], Unit::ONE),
        Kind::Ratio | Kind::Loss => (&[(0.0, Unit::PPM), (1e-3, Unit::PERCENT)], Unit::PERCENT),
        Kind::Frequency => (
            &[
                (0.0, Unit::HZ),
                (1e3, Unit::KHZ),
                (1e6, Unit::MHZ),
                (1e9, Unit::GHZ),
                (1e12, Unit::THZ),
            ],
            Unit::MHZ,
        ),
        Kind::Power => (
            &[
                (0.0, Unit::MILLIWATT),
                (1.0, Unit::W),
                (1e3, Unit::KILOWATT),
                (1e6, Unit::MEGAWATT),
            ],
            Unit::W,
        ),
        Kind::Energy => (
            &[(0.0, Unit::UJ), (1e-3, Unit::MJ), (1.0, Unit::J)],
            Unit::MJ,
        ),
        Kind::Time => (
            &[
                (0.0, Unit::FS),
                (1e-12, Unit::PS),
                (1e-9, Unit::NS),
                (1e-6, Unit::US),
                (1e-3, Unit::MS),
                (1.0, Unit::S),
            ],
            Unit::NS,
        ),
        Kind::Temperature => (&[], Unit::CELSIUS),
        Kind::PerWatt => (&[], Unit::PER_W),
        Kind::Damage => (
            &[
                (0.0, Unit::W_PER_CM2),
                (1e7, Unit::KW_PER_CM2),
                (1e10, Unit::MW_PER_CM2),
                (1e13, Unit::GW_PER_CM2),
            ],
            Unit::MW_PER_CM2,
        ),
    }
}

/// The unit in which a reader expects a value of this magnitude, given in SI units; good for the
/// head of a column whose largest entry it is.
pub fn unit_for(kind: Kind, magnitude: f64) -> Unit {
    let (ladder, usual) = ladder(kind);
    let magnitude = magnitude.abs();
    if magnitude == 0.0 {
        return usual;
    }
    ladder
        .iter()
        .rev()
        .find(|(from, _)| magnitude >= *from)
        .map_or(usual, |(_, unit)| *unit)
}

/// A value in SI units for readers: the unit they expect and that many significant digits.
///
/// Ratios print in % or ppm, temperatures in °C, what coatings endure in W/cm² (for energies per
/// area and losses per length use [`in_unit`]). A value that is not finite prints as a dash.
pub fn human(value: f64, kind: Kind, digits: usize) -> String {
    let unit = unit_for(kind, rounded(value, digits));
    significant(unit.of_si(value), digits)
        .map_or_else(|| NO_VALUE.to_owned(), |number| unit.behind(&number))
}

/// A difference of two values in SI units, its sign always shown: "+0.50 mm", "-1.0 K".
pub fn deviation(difference: f64, kind: Kind, digits: usize) -> String {
    let sign = if difference > 0.0 { "+" } else { "" };
    distance(difference, kind, digits)
        .map_or_else(|| NO_VALUE.to_owned(), |number| format!("{sign}{number}"))
}

/// A spread for readers, such as "± 0.50 mm", "+0.20 mm/-0.50 mm" or "u = 0.050 mm"; empty where
/// it is exact. For the spread of a flat say [`Kind::Curvature`].
pub fn human_spread(spread: Spread, kind: Kind, digits: usize) -> String {
    let text = |x| distance(x, kind, digits).unwrap_or_else(|| NO_VALUE.to_owned());
    match spread {
        Spread::Exact => String::new(),
        Spread::Limits { below, above } if below == above => format!("± {}", text(above)),
        Spread::Limits { below, above } => format!("+{}/-{}", text(above), text(below)),
        Spread::Standard { uncertainty } => format!("u = {}", text(uncertainty)),
    }
}

/// A value in SI units as a number in one unit, with so many decimals and without the unit's
/// symbol, as the cell of a column. A value that is not finite prints as a dash.
pub fn in_unit(value: f64, unit: Unit, decimals: usize) -> String {
    const MOST_DECIMALS: usize = 17;
    let number = unit.of_si(value);
    if !number.is_finite() {
        return NO_VALUE.to_owned();
    }
    let text = format!("{number:.*}", decimals.min(MOST_DECIMALS));
    without_sign_of_zero(text)
}

fn distance(difference: f64, kind: Kind, digits: usize) -> Option<String> {
    let unit = match kind {
        Kind::Temperature => Unit::K,
        _ => unit_for(kind, rounded(difference, digits)),
    };
    significant(unit.difference_of_si(difference), digits).map(|number| unit.behind(&number))
}

const MOST_DIGITS: usize = 17;

fn rounded(value: f64, digits: usize) -> f64 {
    let text = format!("{value:.*e}", digits.clamp(1, MOST_DIGITS) - 1);
    text.parse().unwrap_or(value)
}

/// So many significant digits, as a plain decimal where that is short.
fn significant(number: f64, digits: usize) -> Option<String> {
    const SHORTEST: i32 = -5;
    const LONGEST: i32 = 6;
    if !number.is_finite() {
        return None;
    }
    if number == 0.0 {
        return Some("0".to_owned());
    }
    let digits = digits.clamp(1, MOST_DIGITS);
    let scientific = format!("{number:.*e}", digits - 1);
    let exponent: i32 = scientific.split_once('e')?.1.parse().ok()?;
    let decimals = digits as i32 - 1 - exponent;
    if exponent <= SHORTEST || exponent >= LONGEST.max(digits as i32) {
        return Some(scientific);
    }
    let plain = if decimals >= 0 {
        format!("{number:.*}", decimals as usize)
    } else {
        // Digits that are not significant are zeros.
        format!("{:.0}", rounded(number, digits))
    };
    Some(plain)
}

fn without_sign_of_zero(text: String) -> String {
    let is_zero = text.chars().all(|c| matches!(c, '-' | '0' | '.'));
    match text.strip_prefix('-') {
        Some(zero) if is_zero => zero.to_owned(),
        _ => text,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn readers_get_their_units() {
        for (value, kind, digits, text) in [
            (0.0231, Kind::Length, 3, "23.1 mm"),
            (3.4e-5, Kind::Length, 3, "34.0 µm"),
            (1.064e-6, Kind::Length, 4, "1064 nm"),
            (0.99996, Kind::Length, 3, "1.00 m"),
            (3994.5, Kind::Length, 3, "3.99 km"),
            (-0.1, Kind::Radius, 3, "-100 mm"),
            (0.0, Kind::Length, 3, "0 mm"),
            (1.00896e9, Kind::Frequency, 6, "1.00896 GHz"),
            (8_f64.to_radians(), Kind::Angle, 3, "8.00°"),
            (5e-5, Kind::Angle, 2, "50 µrad"),
            (0.985, Kind::Ratio, 3, "98.5 %"),
            (5e-5, Kind::Loss, 2, "50 ppm"),
            (293.15, Kind::Temperature, 3, "20.0 °C"),
            (1.0 / 0.3, Kind::Curvature, 3, "3.33 1/m"),
            (1e-6, Kind::Curvature, 2, "1.0e-6 1/m"),
            (1234.0, Kind::Number, 2, "1200"),
            (f64::NAN, Kind::Length, 3, "–"),
            (f64::INFINITY, Kind::Number, 3, "–"),
        ] {
            assert_eq!(human(value, kind, digits), text);
        }
    }

    #[test]
    fn columns_keep_one_unit() {
        assert_eq!(in_unit(0.0231, Unit::MM, 2), "23.10");
        assert_eq!(in_unit(-1e-9, Unit::MM, 2), "0.00");
        assert_eq!(in_unit(f64::MAX, Unit::NM, 2), "–");
        assert_eq!(in_unit(0.1, Unit::PERCENT_PER_CM, 2), "0.10");
    }

    #[test]
    fn deviations_show_their_sign() {
        assert_eq!(deviation(5e-4, Kind::Length, 2), "+500 µm");
        assert_eq!(deviation(-1.0, Kind::Temperature, 2), "-1.0 K");
        assert_eq!(deviation(0.0, Kind::Length, 2), "0 mm");
        let spread = Spread::Limits {
            below: 0.001,
            above: 0.001,
        };
        assert_eq!(human_spread(spread, Kind::Ratio, 1), "± 0.1 %");
    }
}
